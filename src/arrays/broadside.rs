//! `broadside`: equal groups side by side across the beam, fed in phase.

use rust_decimal::Decimal;
use rust_decimal::prelude::FromPrimitive;

use super::stage::{Directive, Recipe, Seat, Stage};
use crate::plan::{DesignWeight, Position};
use crate::project::BroadsideSpec;
use crate::units::ElectricalLength;

/// The seats from the left, `spacing` apart, the row centred.
///
/// `steer` > 0 turns the beam clockwise: the group at v gets the delay `(v − v_min)·sin(steer)`, measured from the group
/// on the side that the beam turns to.
#[expect(clippy::cast_precision_loss, reason = "a handful of groups")]
pub fn expand(spec: &BroadsideSpec) -> Stage {
    let step = spec.spacing.metres();
    let first = -step * (spec.count as f64 - 1.0) / 2.0;
    let sine = libm::sin(spec.steer.radians());
    let mut seats = Vec::new();
    let mut legs = Vec::new();
    for n in 0..spec.count {
        let steps_behind = if sine >= 0.0 { n } else { spec.count - 1 - n };
        let metres = step * steps_behind as f64 * sine.abs();
        let electrical = ElectricalLength::from_metres(Decimal::from_f64(metres).unwrap_or_default());
        let reason = format!("{steps_behind} × spacing {} × sin {}", spec.spacing, spec.steer);
        seats.push(Seat {
            role: format!("group {} from the left", n + 1),
            at: Position::from_metres(0.0, first + step * n as f64),
            weight: DesignWeight { delay: electrical, ..DesignWeight::UNIT },
        });
        legs.push(Recipe::delayed(Recipe::Seat(n), electrical, reason));
    }
    Stage { seats, recipe: Recipe::combined(legs), directive: Directive::Both }
}
