//! How far each earth set is from the next element's.

use crate::plan::{Fixture, Layout, Position};
use crate::units::Length;

/// Fills in, for every earth set, the distance to the nearest earth of another element.
pub(super) fn measure_distances(layout: &mut Layout) {
    let earths: Vec<(String, Position)> = layout
        .points
        .iter()
        .filter(|point| point.fixtures.iter().any(|fixture| matches!(fixture, Fixture::Earth(_))))
        .map(|point| (owner(&point.name).to_owned(), point.at))
        .collect();
    for point in &mut layout.points {
        let own = owner(&point.name).to_owned();
        let nearest = earths
            .iter()
            .filter(|(other, _)| *other != own)
            .map(|(_, at)| point.at.distance_m(*at))
            .min_by(f64::total_cmp)
            .map(Length::from_metres_nearest);
        for fixture in &mut point.fixtures {
            if let Fixture::Earth(set) = fixture {
                set.nearest_other = nearest;
            }
        }
    }
}

/// The element's name in a point's name: `W1` of `W1-F`.
fn owner(point: &str) -> &str {
    point.split('-').next().unwrap_or(point)
}
