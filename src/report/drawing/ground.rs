//! From the site to paper: a round scale, true north up.

use super::place::{Point, Rect};
use crate::plan::SitePosition;

/// How the site lies on paper.
#[derive(Clone, Copy, Debug)]
pub(super) struct Ground {
    /// Millimetres on paper a metre on the ground.
    mm_per_m: f64,
    /// 1 : this.
    pub(super) denominator: f64,
    middle_site: (f64, f64),
    middle_paper: Point,
}

/// Round scales, 1 : this.
const SCALES: [f64; 17] = [
    50.0, 100.0, 150.0, 200.0, 250.0, 400.0, 500.0, 750.0, 1_000.0, 1_500.0, 2_000.0, 2_500.0, 4_000.0,
    5_000.0, 7_500.0, 10_000.0, 20_000.0,
];

impl Ground {
    /// The largest round scale at which `places` fit into `area` with a margin.
    pub(super) fn fitting(places: &[SitePosition], area: Rect, margin: f64) -> Self {
        let (east, north) = (extent(places, SitePosition::east_m), extent(places, SitePosition::north_m));
        let room = (area.right - area.left - 2.0 * margin, area.bottom - area.top - 2.0 * margin);
        let needed = ((east.1 - east.0) * 1_000.0 / room.0).max((north.1 - north.0) * 1_000.0 / room.1);
        let coarsest = (needed / 10_000.0).ceil().max(1.0) * 10_000.0;
        let denominator = SCALES.into_iter().find(|scale| *scale >= needed).unwrap_or(coarsest);
        Self {
            mm_per_m: 1_000.0 / denominator,
            denominator,
            middle_site: (f64::midpoint(east.0, east.1), f64::midpoint(north.0, north.1)),
            middle_paper: (f64::midpoint(area.left, area.right), f64::midpoint(area.top, area.bottom)),
        }
    }

    /// A place on paper.
    pub(super) fn paper(&self, place: SitePosition) -> Point {
        (
            self.middle_paper.0 + (place.east_m() - self.middle_site.0) * self.mm_per_m,
            self.middle_paper.1 - (place.north_m() - self.middle_site.1) * self.mm_per_m,
        )
    }

    /// Millimetres on paper for metres on the ground.
    pub(super) fn mm(&self, metres: f64) -> f64 {
        metres * self.mm_per_m
    }
}

fn extent(places: &[SitePosition], of: impl Fn(SitePosition) -> f64) -> (f64, f64) {
    let low = places.iter().map(|p| of(*p)).fold(f64::INFINITY, f64::min);
    let high = places.iter().map(|p| of(*p)).fold(f64::NEG_INFINITY, f64::max);
    if low <= high { (low, high) } else { (0.0, 0.0) }
}
