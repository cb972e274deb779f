//! The layout: named points on the ground, and what stands on each.
//!
//! The takeoff counts fixtures and spans and never asks which family they came from.

use super::geometry::{Frame, Position, SitePosition};
use crate::project::{Supports, Termination, VerticalKind};
use crate::units::{Bearing, Diameter, Length};

/// A point's index in its layout.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct PointId(pub usize);

/// An element's index in its layout.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct ElementId(pub usize);

/// Where everything of one array stands.
#[derive(Clone, Debug)]
pub struct Layout {
    /// The wanted direction.
    pub heading: Bearing,
    /// How the array's frame lies in the site.
    pub frame: Frame,
    /// The elements, cell by cell from the left, front to rear within a cell.
    pub elements: Vec<Element>,
    /// Antenna wires.
    pub spans: Vec<Span>,
    /// Every named point.
    pub points: Vec<Point>,
}

impl Layout {
    /// An empty layout in `frame`.
    pub fn new(heading: Bearing, frame: Frame) -> Self {
        Self { heading, frame, elements: Vec::new(), spans: Vec::new(), points: Vec::new() }
    }

    /// The point behind an id.
    pub fn point(&self, id: PointId) -> &Point {
        &self.points[id.0]
    }

    /// Adds a point at a place in the array's frame.
    pub fn add_point(
        &mut self,
        name: String,
        kind: PointKind,
        at: Position,
        fixtures: Vec<Fixture>,
    ) -> PointId {
        let site = self.frame.to_site(at);
        self.points.push(Point { name, kind, at, site, fixtures });
        PointId(self.points.len() - 1)
    }

    /// The feed points' places in element order.
    pub fn feed_places(&self) -> Vec<Position> {
        self.elements.iter().map(|element| element.at).collect()
    }
}

/// A named point on the ground.
#[derive(Clone, Debug)]
pub struct Point {
    /// Its name on stakes and sheets.
    pub name: String,
    /// What it is.
    pub kind: PointKind,
    /// Where, in the array's frame.
    pub at: Position,
    /// Where, in the site's frame.
    pub site: SitePosition,
    /// What stands there.
    pub fixtures: Vec<Fixture>,
}

/// What a point is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum PointKind {
    /// A wire's feed point or a vertical's base.
    FeedPoint,
    /// The terminated end of a wire.
    Termination,
    /// A support between the ends.
    Post,
    /// Where legs meet.
    Hub,
    /// Where the main feedline ends.
    Receiver,
}

impl PointKind {
    /// The word on the sheets.
    pub const fn word(self) -> &'static str {
        match self {
            Self::FeedPoint => "feed point",
            Self::Termination => "termination",
            Self::Post => "post",
            Self::Hub => "hub",
            Self::Receiver => "receiver",
        }
    }
}

/// One thing that stands on a point.
#[derive(Clone, Debug, PartialEq)]
pub enum Fixture {
    /// The end of a wire: support, insulator, backstay.
    WireEnd(Support),
    /// A support between the ends, with its insulator.
    WirePost(Support),
    /// A feed box for a wire, with its surge device.
    WireFeedBox,
    /// A termination box, with its surge device.
    TerminationBox,
    /// An earth set.
    Earth(EarthSet),
    /// A short vertical on its base.
    Mast(MastFoot),
    /// A hub's box.
    HubBox(Shelter),
    /// The station entry: panel, arresters, earth.
    StationEntry,
}

/// What holds a wire up at one point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Support {
    /// Post or tree.
    pub kind: Supports,
    /// Height of the wire above ground.
    pub height: Length,
}

/// Whether a box stands outdoors.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Shelter {
    /// In the field, with a surge rod of its own.
    Outdoors,
    /// In the station.
    Indoors,
}

/// An earth set.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct EarthSet {
    /// What it serves.
    pub serves: EarthUse,
    /// Distance to the nearest earth of another element, if there is one.
    pub nearest_other: Option<Length>,
}

/// What an earth set serves.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum EarthUse {
    /// One end of a wire.
    WireEnd,
    /// A vertical.
    Vertical,
}

/// A short vertical on its base.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct MastFoot {
    /// Height above ground.
    pub height: Length,
    /// With an amplifier or passive.
    pub kind: VerticalKind,
}

/// One element.
#[derive(Clone, Debug)]
pub struct Element {
    /// W1, W2 … for wires, V1, V2 … for verticals.
    pub name: String,
    /// Its reference point: the feed point of a wire, the base of a vertical.
    pub at: Position,
    /// The point there.
    pub feed_point: PointId,
    /// What it is, electrically.
    pub kind: ElementKind,
}

/// What an element is, electrically.
#[derive(Clone, Debug, PartialEq)]
pub enum ElementKind {
    /// A terminated low wire along the heading.
    Wire(WireElement),
    /// A short vertical.
    Vertical(MastFoot),
}

/// A terminated low wire.
#[derive(Clone, Debug, PartialEq)]
pub struct WireElement {
    /// Span between the end supports.
    pub length: Length,
    /// Height above ground.
    pub height: Length,
    /// Wire diameter.
    pub diameter: Diameter,
    /// The far end.
    pub termination: Termination,
}

/// One antenna wire.
#[derive(Clone, Debug)]
pub struct Span {
    /// The element it belongs to.
    pub element: ElementId,
    /// The end with the feed box.
    pub from: PointId,
    /// The far end.
    pub to: PointId,
    /// Distance between the end supports.
    pub length: Length,
    /// Height above ground, which is also the drop at each end.
    pub height: Length,
    /// What holds it up.
    pub supports: Supports,
    /// Bays between supports.
    pub bays: i64,
}
