//! The two results of expanding a composition: a layout (named points) and a feed tree, with the lengths of its lines.

pub mod cable;
pub mod feed;
pub mod geometry;
pub mod layout;
pub mod measure;
pub mod weight;

pub use cable::{CablePart, Cables, check_impedance, choose as choose_cables};
pub use feed::{
    Connection, FeedTree, Hub, HubId, Leg, Line, LineId, LineRole, Node, RoleId, State, Switch, Termini,
};
pub use geometry::{Position, SitePosition};
pub use layout::{
    EarthSet, EarthUse, Element, ElementId, ElementKind, Fixture, Layout, MastFoot, Point, PointId,
    PointKind, Span, WireElement,
};
pub use measure::{Allowances, LineLength, chokes_on, measure};
pub use weight::{DesignWeight, Polarity};

/// One array, expanded: where everything stands and how it is joined.
#[derive(Clone, Debug)]
pub struct ArrayPlan {
    /// The array's name in the project.
    pub name: String,
    /// Named points and what stands on them.
    pub layout: Layout,
    /// How the elements are joined.
    pub feed: FeedTree,
    /// The weight that each element is meant to have, in the order of `layout.elements`.
    pub design: Vec<DesignWeight>,
}
