//! `element.wire`: a terminated low wire, feed point at the rear, termination in front.

use crate::plan::layout::Support;
use crate::plan::{
    EarthSet, EarthUse, Element, ElementId, ElementKind, Fixture, Layout, PointKind, Position, Span,
    WireElement,
};
use crate::project::WireSpec;
use crate::units::{Diameter, Length};

/// Adds one wire with its feed point at `at`: two ends, the posts between, two earth sets, two boxes.
///
/// `max_bay` is the longest bay between supports; bays = span / longest bay, rounded up.
#[expect(clippy::cast_precision_loss, reason = "a handful of posts")]
pub fn add(
    layout: &mut Layout,
    spec: &WireSpec,
    name: String,
    at: Position,
    max_bay: Length,
    diameter: Diameter,
) {
    let element = ElementId(layout.elements.len());
    let along = |metres: f64| at.plus(Position::from_metres(metres, 0.0));
    let earth = Fixture::Earth(EarthSet { serves: EarthUse::WireEnd, nearest_other: None });
    let support = Support { kind: spec.supports, height: spec.height };
    let end = Fixture::WireEnd(support);
    let bays = spec.length.steps_of(max_bay).max(1);
    let from = layout.add_point(
        format!("{name}-F"),
        PointKind::FeedPoint,
        at,
        vec![end.clone(), Fixture::WireFeedBox, earth.clone()],
    );
    for post in 1..bays {
        let place = along(spec.length.metres() * post as f64 / bays as f64);
        layout.add_point(format!("{name}-P{post}"), PointKind::Post, place, vec![Fixture::WirePost(support)]);
    }
    let to = layout.add_point(
        format!("{name}-T"),
        PointKind::Termination,
        along(spec.length.metres()),
        vec![end, Fixture::TerminationBox, earth],
    );
    layout.spans.push(Span {
        element,
        from,
        to,
        length: spec.length,
        height: spec.height,
        supports: spec.supports,
        bays,
    });
    layout.elements.push(Element {
        name,
        at,
        feed_point: from,
        kind: ElementKind::Wire(WireElement {
            length: spec.length,
            height: spec.height,
            diameter,
            termination: spec.termination,
        }),
    });
}
