//! `custom`: given positions and given weights.

use super::phasing;
use super::stage::{Directive, Seat, Stage};
use crate::plan::Position;
use crate::project::CustomSpec;
use crate::units::Frequency;

/// The seats in the order of the file, as given.
pub fn expand(spec: &CustomSpec, design: Frequency) -> Stage {
    let phased = phasing::given(&spec.weights, design);
    let seats = spec
        .positions
        .iter()
        .zip(&phased.weights)
        .enumerate()
        .map(|(n, (place, weight))| Seat {
            role: format!("position {}", n + 1),
            at: Position::from(*place),
            weight: *weight,
        })
        .collect();
    Stage { seats, recipe: phased.recipe, directive: Directive::Advised }
}
