//! `endfire`: two or three verticals in line along the beam.

use super::phasing;
use super::stage::{Directive, Seat, Stage};
use crate::plan::Position;
use crate::project::EndfireSpec;
use crate::units::Frequency;

/// The seats front to rear, `spacing` apart, the row centred.
///
/// `ratio` is the delay line's electrical length over the spacing.
#[expect(clippy::cast_precision_loss, reason = "two or three elements")]
pub fn expand(spec: &EndfireSpec, ratio: rust_decimal::Decimal, design: Frequency) -> Stage {
    let (roles, phased, floor): (&[&str], _, _) = if spec.count == 3 {
        (&["front", "middle", "rear"], phasing::three(&spec.phasing, spec.spacing, ratio, design), 1)
    } else {
        (&["front", "rear"], phasing::pair(&spec.phasing, spec.spacing, "spacing", ratio, design), 5)
    };
    let step = spec.spacing.metres();
    let first = step * (roles.len() - 1) as f64 / 2.0;
    let seats = roles
        .iter()
        .zip(&phased.weights)
        .enumerate()
        .map(|(n, (role, weight))| Seat {
            role: (*role).to_owned(),
            at: Position::from_metres(first - step * n as f64, 0.0),
            weight: *weight,
        })
        .collect();
    Stage { seats, recipe: phased.recipe, directive: Directive::Forward(floor) }
}
