//! `echelon`: two parallel wires, one ahead of the other along the beam and a little aside.

use super::phasing;
use super::stage::{Directive, Seat, Stage};
use crate::plan::Position;
use crate::project::EchelonSpec;
use crate::units::Frequency;

/// The two seats, front first: the front wire `offset` to the right, the rear wire half a step behind the centre.
///
/// `ratio` is the delay line's electrical length over the stagger.
pub fn expand(spec: &EchelonSpec, ratio: rust_decimal::Decimal, design: Frequency) -> Stage {
    let half_step = spec.stagger.metres() / 2.0;
    let half_offset = spec.offset.metres() / 2.0;
    let pair = phasing::pair(&spec.phasing, spec.stagger, "stagger", ratio, design);
    let places =
        [Position::from_metres(half_step, half_offset), Position::from_metres(-half_step, -half_offset)];
    let seats = ["front", "rear"]
        .into_iter()
        .zip(places)
        .zip(&pair.weights)
        .map(|((role, at), weight)| Seat { role: role.to_owned(), at, weight: *weight })
        .collect();
    Stage { seats, recipe: pair.recipe, directive: Directive::Forward(5) }
}
