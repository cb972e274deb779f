//! From one composition to a layout and a feed tree.

use super::hub;
use super::stage::{Recipe, Seat, Stage};
use super::{Context, Names, vertical, wire};
use crate::plan::geometry::Frame;
use crate::plan::layout::Shelter;
use crate::plan::{
    ArrayPlan, Connection, DesignWeight, ElementId, FeedTree, Fixture, Hub, HubId, Layout, Leg, Line, LineId,
    LineRole, Node, PointId, PointKind, Position, RoleId, State, Switch, Termini,
};
use crate::project::{ArraySpec, Combining, DelayStyle, ElementSpec, HubPlace, Join};
use crate::units::{Angle, ElectricalLength};

/// Expands one array from its stages.
pub(super) fn compose(
    spec: &ArraySpec,
    inner: Option<&Stage>,
    outer: Option<&Stage>,
    design: Vec<DesignWeight>,
    context: &Context,
    names: &mut Names,
) -> ArrayPlan {
    let unit = Stage::single();
    let (inner_stage, outer_stage) = (inner.unwrap_or(&unit), outer.unwrap_or(&unit));
    let frame = Frame::new(spec.centre, spec.heading);
    let mut builder = Builder::new(spec, context, names, Layout::new(spec.heading, frame));
    for cell in &outer_stage.seats {
        for seat in &inner_stage.seats {
            builder.add_element(cell.at.plus(seat.at));
            builder.roles.push(role_name(inner.map(|_| seat), outer.map(|_| cell)));
        }
    }
    let receiver = builder.add_receiver();
    let root = match (inner, outer) {
        (None, None) => builder.alone(receiver),
        (Some(stage), None) | (None, Some(stage)) => builder.one_hub(stage, receiver),
        (Some(cells), Some(row)) => match spec.feed.combining {
            Combining::ByCell => builder.by_cell(cells, row, receiver),
            Combining::ByRow => builder.by_row(cells, row, receiver),
        },
    };
    builder.finish(root, design)
}

impl Stage {
    /// The stage that is not there: one copy, in place.
    fn single() -> Self {
        let seat = Seat { role: String::new(), at: Position::default(), weight: DesignWeight::UNIT };
        Self { seats: vec![seat], recipe: Recipe::Seat(0), directive: super::stage::Directive::Both }
    }
}

fn role_name(seat: Option<&Seat>, cell: Option<&Seat>) -> String {
    match (seat, cell) {
        (Some(seat), Some(cell)) => format!("{} of {}", seat.role, cell.role),
        (Some(one), None) | (None, Some(one)) => one.role.clone(),
        (None, None) => "the only element".to_owned(),
    }
}

/// Grows a layout and a feed tree side by side.
struct Builder<'a> {
    spec: &'a ArraySpec,
    context: &'a Context,
    names: &'a mut Names,
    layout: Layout,
    roles: Vec<String>,
    legs: Vec<Leg>,
    lines: Vec<Line>,
    hubs: Vec<Hub>,
}

/// Whether a line that arrives at the outermost hub comes home by itself.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Outermost {
    Yes,
    No,
}

impl<'a> Builder<'a> {
    fn new(spec: &'a ArraySpec, context: &'a Context, names: &'a mut Names, layout: Layout) -> Self {
        let (roles, legs, lines, hubs) = (Vec::new(), Vec::new(), Vec::new(), Vec::new());
        Self { spec, context, names, layout, roles, legs, lines, hubs }
    }

    fn add_element(&mut self, at: Position) {
        match &self.spec.element {
            ElementSpec::Wire(spec) => {
                let name = self.names.next("W");
                let diameter = spec.diameter.unwrap_or(self.context.wire_diameter);
                wire::add(&mut self.layout, spec, name, at, self.context.max_bay, diameter);
            }
            ElementSpec::Vertical(spec) => {
                let name = self.names.next("V");
                vertical::add(&mut self.layout, spec, name, at);
            }
        }
        let element = ElementId(self.layout.elements.len() - 1);
        self.legs.push(Leg { element, branch: None });
    }

    fn add_receiver(&mut self) -> PointId {
        let at = self.layout.frame.to_array(self.context.receiver.into());
        self.layout.add_point("RX".to_owned(), PointKind::Receiver, at, vec![Fixture::StationEntry])
    }

    /// A hub in the field, or at the receiver when the outermost lines come home.
    fn add_hub(&mut self, at: Position, outermost: Outermost, receiver: PointId) -> HubId {
        let point = if self.comes_home(outermost) {
            self.layout.points[receiver.0].fixtures.push(Fixture::HubBox(Shelter::Indoors));
            receiver
        } else {
            let fixtures = vec![Fixture::HubBox(Shelter::Outdoors)];
            self.layout.add_point(self.names.next("H"), PointKind::Hub, at, fixtures)
        };
        self.hubs.push(Hub { point, inputs: 0, outputs: 0 });
        HubId(self.hubs.len() - 1)
    }

    fn comes_home(&self, outermost: Outermost) -> bool {
        outermost == Outermost::Yes && self.spec.feed.join == Join::Receiver
    }

    fn add_line(&mut self, role: LineRole, termini: Termini, match_group: &str, serves: &str) -> LineId {
        let prefix = match role {
            LineRole::Branch => "B",
            LineRole::Run => "R",
            LineRole::Delay => "D",
            LineRole::Main => "M",
        };
        self.lines.push(Line {
            label: self.names.next(prefix),
            role,
            termini,
            match_group: match_group.to_owned(),
            delay: ElectricalLength::ZERO,
            delay_reason: String::new(),
            connection: Connection::Sockets,
            serves: serves.to_owned(),
        });
        LineId(self.lines.len() - 1)
    }

    /// One element without a hub: the main begins at its feed box.
    fn alone(&mut self, receiver: PointId) -> Node {
        let from = self.layout.elements[0].feed_point;
        let line = self.add_line(LineRole::Main, Termini { from, to: receiver }, "", "the only element");
        Node::Line { line, input: Box::new(Node::Role(RoleId(0))) }
    }

    /// One stage: all legs meet at one hub.
    fn one_hub(&mut self, stage: &Stage, receiver: PointId) -> Node {
        let places = self.layout.feed_places();
        let at = self.place_hub(self.spec.feed.hub, &places, receiver);
        let hub = self.add_hub(at, Outermost::Yes, receiver);
        let legs: Vec<usize> = (0..self.legs.len()).collect();
        let group = self.names.next_group();
        let inputs = self.branches(&legs, hub, Outermost::Yes, &group);
        let joined = self.join(&stage.recipe, &inputs, hub, Loop::InLine);
        self.onward(joined, hub, receiver)
    }

    /// Both stages, a hub for every cell and one for the array.
    fn by_cell(&mut self, cells: &Stage, row: &Stage, receiver: PointId) -> Node {
        let size = cells.seats.len();
        let (branch_group, run_group) = (self.names.next_group(), self.names.next_group());
        let places = self.layout.feed_places();
        let centres: Vec<Position> = places.chunks(size).map(Position::mean).collect();
        let array_at = self.place_hub(self.spec.feed.array_hub, &centres, receiver);
        let mut cell_nodes = Vec::new();
        for (n, cell) in row.seats.iter().enumerate() {
            let legs: Vec<usize> = (n * size..(n + 1) * size).collect();
            let feeds = &places[n * size..(n + 1) * size];
            let cost = self.context.branch_cost;
            let at = hub::place(self.spec.feed.hub, feeds, array_at, cost);
            let hub = self.add_hub(at, Outermost::No, receiver);
            let inputs = self.branches(&legs, hub, Outermost::No, &branch_group);
            let joined = self.join(&cells.recipe, &inputs, hub, Loop::InLine);
            cell_nodes.push((joined, hub, cell.role.clone()));
        }
        let array_hub = self.add_hub(array_at, Outermost::Yes, receiver);
        let mut inputs = Vec::new();
        for (joined, hub, role) in cell_nodes {
            let from = self.hubs[hub.0].point;
            let to = self.hubs[array_hub.0].point;
            let kind = if self.comes_home(Outermost::Yes) { LineRole::Main } else { LineRole::Run };
            let line = self.add_line(kind, Termini { from, to }, &run_group, &role);
            self.hubs[hub.0].outputs += 1;
            self.hubs[array_hub.0].inputs += 1;
            inputs.push(Input {
                node: Node::Line { line, input: Box::new(joined) },
                leg_line: Some(line),
                serves: role,
            });
        }
        let joined = self.join(&row.recipe, &inputs, array_hub, Loop::InLine);
        self.onward(joined, array_hub, receiver)
    }

    /// Both stages, one hub: each row of all cells is combined first, then the rows.
    fn by_row(&mut self, cells: &Stage, row: &Stage, receiver: PointId) -> Node {
        let size = cells.seats.len();
        let places = self.layout.feed_places();
        let at = self.place_hub(self.spec.feed.hub, &places, receiver);
        let hub = self.add_hub(at, Outermost::Yes, receiver);
        let group = self.names.next_group();
        let legs: Vec<usize> = (0..self.legs.len()).collect();
        let branches = self.branches(&legs, hub, Outermost::Yes, &group);
        let mut rows = Vec::new();
        for (seat, role) in cells.seats.iter().enumerate() {
            let of_row: Vec<Input> = branches.iter().skip(seat).step_by(size).cloned().collect();
            let node = self.join(&row.recipe, &of_row, hub, Loop::OnSockets);
            rows.push(Input { node, leg_line: None, serves: format!("{} row", role.role) });
        }
        let joined = self.join(&cells.recipe, &rows, hub, Loop::OnSockets);
        self.onward(joined, hub, receiver)
    }

    fn place_hub(&self, choice: HubPlace, sources: &[Position], receiver: PointId) -> Position {
        hub::place(choice, sources, self.layout.point(receiver).at, self.context.main_cost)
    }

    /// The branch lines of some legs to one hub.
    fn branches(&mut self, legs: &[usize], hub: HubId, outermost: Outermost, group: &str) -> Vec<Input> {
        let role = if self.comes_home(outermost) { LineRole::Main } else { LineRole::Branch };
        let to = self.hubs[hub.0].point;
        legs.iter()
            .map(|leg| {
                let from = self.layout.elements[*leg].feed_point;
                let serves = self.roles[*leg].clone();
                let line = self.add_line(role, Termini { from, to }, group, &serves);
                self.legs[*leg].branch = Some(line);
                self.hubs[hub.0].inputs += 1;
                Input { node: Node::Role(RoleId(*leg)), leg_line: Some(line), serves }
            })
            .collect()
    }

    /// Follows a recipe with the given inputs, all boxes standing in `hub`.
    fn join(&mut self, recipe: &Recipe, inputs: &[Input], hub: HubId, style: Loop) -> Node {
        match recipe {
            Recipe::Seat(seat) => inputs[*seat].node.clone(),
            Recipe::Invert(of) => Node::Inverter { hub, input: Box::new(self.join(of, inputs, hub, style)) },
            Recipe::Pad { db, why, of } => {
                let input = Box::new(self.join(of, inputs, hub, style));
                Node::Pad { hub, db: *db, why: why.clone(), input }
            }
            Recipe::Combine(of) => {
                let inputs = of.iter().map(|part| self.join(part, inputs, hub, style)).collect();
                Node::Combine { hub, inputs }
            }
            Recipe::Delay { electrical, reason, of } => {
                self.delay(*electrical, reason, of, inputs, hub, style)
            }
        }
    }

    fn delay(
        &mut self,
        electrical: ElectricalLength,
        reason: &str,
        of: &Recipe,
        inputs: &[Input],
        hub: HubId,
        style: Loop,
    ) -> Node {
        let behind = self.join(of, inputs, hub, style);
        let source = match of {
            Recipe::Seat(seat) => Some(&inputs[*seat]),
            Recipe::Delay { .. } | Recipe::Invert(_) | Recipe::Pad { .. } | Recipe::Combine(_) => None,
        };
        if self.spec.feed.delay_style == DelayStyle::Merged
            && let Some(line) = source.and_then(|input| input.leg_line)
        {
            let line = &mut self.lines[line.0];
            line.delay = electrical;
            reason.clone_into(&mut line.delay_reason);
            return behind;
        }
        let serves = source.map_or_else(String::new, |input| input.serves.clone());
        let point = self.hubs[hub.0].point;
        let group = self.names.delay_group(&self.spec.name, electrical);
        let line = self.add_line(LineRole::Delay, Termini { from: point, to: point }, &group, &serves);
        let added = &mut self.lines[line.0];
        added.delay = electrical;
        reason.clone_into(&mut added.delay_reason);
        added.connection = match style {
            Loop::InLine => Connection::InLine,
            Loop::OnSockets => Connection::Looped,
        };
        Node::Line { line, input: Box::new(behind) }
    }

    /// What follows the outermost combiner: an amplifier where one is fitted, and the main line.
    fn onward(&mut self, joined: Node, hub: HubId, receiver: PointId) -> Node {
        let joined = match self.context.amplifier {
            super::HubAmplifier::Fitted => Node::Amplifier { hub, input: Box::new(joined) },
            super::HubAmplifier::Absent => joined,
        };
        if self.comes_home(Outermost::Yes) {
            return joined;
        }
        let termini = Termini { from: self.hubs[hub.0].point, to: receiver };
        let line = self.add_line(LineRole::Main, termini, "", "the whole array");
        self.hubs[hub.0].outputs += 1;
        Node::Line { line, input: Box::new(joined) }
    }

    fn finish(mut self, root: Node, design: Vec<DesignWeight>) -> ArrayPlan {
        blank_lone_groups(&mut self.lines);
        let roles = (0..self.legs.len()).map(|leg| Some(RoleId(leg))).collect();
        let steer = self.spec.broadside.as_ref().map_or_else(Angle::default, |row| row.steer);
        let states = vec![State { bearing: self.spec.heading.turned(steer), roles }];
        let mut layout = self.layout;
        super::earth::measure_distances(&mut layout);
        ArrayPlan {
            name: self.spec.name.clone(),
            layout,
            feed: FeedTree {
                root,
                roles: self.roles,
                legs: self.legs,
                lines: self.lines,
                hubs: self.hubs,
                switch: Switch { states },
            },
            design,
        }
    }
}

/// A line that has nobody to agree with is in no group.
fn blank_lone_groups(lines: &mut [Line]) {
    let groups: Vec<String> = lines.iter().map(|line| line.match_group.clone()).collect();
    for line in lines {
        if groups.iter().filter(|group| **group == line.match_group).count() == 1 {
            line.match_group.clear();
        }
    }
}

/// How the delays of a hub are connected.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Loop {
    /// In line with the leg, one barrel each.
    InLine,
    /// On two sockets of the hub.
    OnSockets,
}

/// What a recipe's seat stands for.
#[derive(Clone)]
struct Input {
    node: Node,
    leg_line: Option<LineId>,
    serves: String,
}
