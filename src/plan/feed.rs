//! The feed tree: the only description of how elements are connected.
//!
//! The root is the main feedline at the receiver; the leaves are roles. Outside the leaves hang the legs (element,
//! choke, branch line), each once; a switch maps leg to role for every direction. A fixed array is the same with one
//! state and no relays. The bill and the weights are two walks over this one tree.

use super::layout::{ElementId, PointId};
use crate::units::{Bearing, ElectricalLength};

/// A line's index in its feed tree.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct LineId(pub usize);

/// A hub's index in its feed tree.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct HubId(pub usize);

/// A role's index in its feed tree.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct RoleId(pub usize);

/// How the elements of one array are joined.
#[derive(Clone, Debug)]
pub struct FeedTree {
    /// From the receiver to the roles.
    pub root: Node,
    /// The roles' names, such as "front of cell 1".
    pub roles: Vec<String>,
    /// Element, choke and branch line of each leg.
    pub legs: Vec<Leg>,
    /// Every coax line, those of the legs included.
    pub lines: Vec<Line>,
    /// Every hub.
    pub hubs: Vec<Hub>,
    /// Which leg plays which role, for each direction.
    pub switch: Switch,
}

/// A node of the tree, seen from the receiver: what the signal passes, and where it comes from.
#[derive(Clone, Debug)]
pub enum Node {
    /// A leaf: whichever leg plays this role.
    Role(RoleId),
    /// A coax line: run, delay or main.
    Line {
        /// Which line.
        line: LineId,
        /// Where the signal comes from.
        input: Box<Node>,
    },
    /// A phase inverter.
    Inverter {
        /// The box it sits in.
        hub: HubId,
        /// Where the signal comes from.
        input: Box<Node>,
    },
    /// A resistive pad.
    Pad {
        /// The box it sits in.
        hub: HubId,
        /// Its loss.
        db: f64,
        /// Why it is there.
        why: String,
        /// Where the signal comes from.
        input: Box<Node>,
    },
    /// An amplifier in a hub.
    Amplifier {
        /// The box it sits in.
        hub: HubId,
        /// Where the signal comes from.
        input: Box<Node>,
    },
    /// An in-phase hybrid with as many ways as inputs.
    Combine {
        /// The box it sits in.
        hub: HubId,
        /// Where the signals come from.
        inputs: Vec<Node>,
    },
}

impl Node {
    /// The nodes directly behind this one.
    pub fn inputs(&self) -> &[Node] {
        match self {
            Self::Role(_) => &[],
            Self::Line { input, .. }
            | Self::Inverter { input, .. }
            | Self::Pad { input, .. }
            | Self::Amplifier { input, .. } => std::slice::from_ref(input),
            Self::Combine { inputs, .. } => inputs,
        }
    }

    /// Calls `visit` for this node and everything behind it, receiver first.
    pub fn walk<'a>(&'a self, visit: &mut impl FnMut(&'a Node)) {
        visit(self);
        for input in self.inputs() {
            input.walk(visit);
        }
    }
}

/// One leg: an element and the line that brings it to its hub.
#[derive(Clone, Debug)]
pub struct Leg {
    /// The element.
    pub element: ElementId,
    /// The branch line; none when the element feeds the main line directly.
    pub branch: Option<LineId>,
}

/// One coax line.
#[derive(Clone, Debug)]
pub struct Line {
    /// B1, R1, D1, M1 …
    pub label: String,
    /// What it does.
    pub role: LineRole,
    /// Its ends.
    pub termini: Termini,
    /// Letter of the group of lines that must agree; empty for a line by itself.
    pub match_group: String,
    /// The electrical length that this line adds on purpose: all of a delay line, the merged part of a branch.
    pub delay: ElectricalLength,
    /// How the delay's electrical length came about.
    pub delay_reason: String,
    /// How a delay line is connected.
    pub connection: Connection,
    /// What plays through it, such as "rear wire".
    pub serves: String,
}

/// What a line does.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum LineRole {
    /// Element to hub.
    Branch,
    /// Hub to hub.
    Run,
    /// A delay.
    Delay,
    /// To the receiver.
    Main,
}

impl LineRole {
    /// The piece role in outputs.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Branch => "branch",
            Self::Run => "run",
            Self::Delay => "delay",
            Self::Main => "main",
        }
    }
}

/// The two ends of a line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Termini {
    /// The end nearer the elements.
    pub from: PointId,
    /// The end nearer the receiver.
    pub to: PointId,
}

/// How a line joins its neighbours.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Connection {
    /// Plugs into sockets at both ends.
    Sockets,
    /// A delay in line with its leg, joined by one barrel.
    InLine,
    /// A delay looped on two sockets of the hub.
    Looped,
}

/// A hub and its box.
#[derive(Clone, Debug)]
pub struct Hub {
    /// Its point.
    pub point: PointId,
    /// Lines arriving from the elements' side.
    pub inputs: usize,
    /// Lines leaving toward the receiver, 0 or 1.
    pub outputs: usize,
}

/// Which leg plays which role.
#[derive(Clone, Debug)]
pub struct Switch {
    /// One state a direction; a fixed array has one.
    pub states: Vec<State>,
}

/// One direction.
#[derive(Clone, Debug)]
pub struct State {
    /// Where the array listens.
    pub bearing: Bearing,
    /// For each leg the role it plays, or none when idle.
    pub roles: Vec<Option<RoleId>>,
}

impl FeedTree {
    /// The line behind an id.
    pub fn line(&self, id: LineId) -> &Line {
        &self.lines[id.0]
    }

    /// Every node, receiver first.
    pub fn nodes(&self) -> Vec<&Node> {
        let mut all = Vec::new();
        self.root.walk(&mut |node| all.push(node));
        all
    }
}
