//! `element.vertical`: a short vertical, active or passive.

use crate::plan::{EarthSet, EarthUse, Element, ElementKind, Fixture, Layout, MastFoot, PointKind, Position};
use crate::project::VerticalSpec;

/// Adds one vertical with its base at `at`: mast, base, feed box and one earth set.
pub fn add(layout: &mut Layout, spec: &VerticalSpec, name: String, at: Position) {
    let foot = MastFoot { height: spec.height, kind: spec.kind };
    let earth = Fixture::Earth(EarthSet { serves: EarthUse::Vertical, nearest_other: None });
    let point = layout.add_point(name.clone(), PointKind::FeedPoint, at, vec![Fixture::Mast(foot), earth]);
    layout.elements.push(Element { name, at, feed_point: point, kind: ElementKind::Vertical(foot) });
}
