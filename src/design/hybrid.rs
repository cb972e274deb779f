//! Whether the combining trees can be built from 2- and 3-way hybrids.

use super::Design;
use super::code;
use crate::plan::Node;
use crate::problem::{Problem, Problems};

/// Every combiner must be a 2- or a 3-way hybrid; a pattern can be computed without, a bill cannot.
pub fn check_hybrids(designs: &[Design]) -> Problems {
    let mut problems = Problems::default();
    for array in designs.iter().flat_map(|design| &design.arrays) {
        for node in array.plan.feed.nodes() {
            let Node::Combine { inputs, .. } = node else { continue };
            if inputs.len() == 2 || inputs.len() == 3 {
                continue;
            }
            let legs = array.spec.broadside.as_ref().map_or(array.plan.feed.legs.len(), |row| row.count);
            let legs = if is_buildable(legs) { array.plan.feed.legs.len() } else { legs };
            let places = &array.spec.places;
            let place = places.broadside.clone().filter(|_| array.spec.broadside.is_some());
            let message = format!("{legs} equal legs cannot be joined by 2- and 3-way hybrids");
            let help = format!(
                "the nearest numbers that can: {} and {} (`pattern` can be computed as it is)",
                (1..legs).rev().find(|n| is_buildable(*n)).unwrap_or(1),
                (legs + 1..=2 * legs).find(|n| is_buildable(*n)).unwrap_or(legs)
            );
            let place = place.or_else(|| places.endfire.clone());
            problems.push(Problem::error(code::ROW_NOT_BUILDABLE, place, message, help));
        }
    }
    problems.deduplicated()
}

/// Whether a number is 2^a·3^b.
fn is_buildable(mut count: usize) -> bool {
    if count == 0 {
        return false;
    }
    for factor in [2, 3] {
        while count.is_multiple_of(factor) {
            count /= factor;
        }
    }
    count == 1
}
