//! The reversal check: an end-fire stage must hear the front better than the rear.

use num_complex::Complex64;

use super::stage::{Directive, Stage};
use crate::units::{Angle, Frequency};

/// How a stage hears forward and backward at one frequency and elevation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FrontRear {
    /// |AF| toward the wanted direction.
    pub forward: f64,
    /// |AF| away from it.
    pub backward: f64,
    /// Sum of the amplitudes, the most that |AF| can be.
    pub greatest: f64,
}

/// The array factor of a stage forward and backward at an elevation.
///
/// AF = Σ w·e^(+jk û·r) with û toward the source: an element nearer the source leads, a delay multiplies by e^(−jkd).
pub fn front_rear(stage: &Stage, frequency: Frequency, elevation: Angle) -> FrontRear {
    let k = frequency.wavenumber();
    let cosine = libm::cos(elevation.radians());
    let factor = |sense: f64| {
        stage
            .seats
            .iter()
            .map(|seat| {
                let phase = seat.weight.phase(frequency) + k * seat.at.forward_m() * cosine * sense;
                Complex64::from_polar(seat.weight.amplitude, phase)
            })
            .sum::<Complex64>()
            .norm()
    };
    let greatest = stage.seats.iter().map(|seat| seat.weight.amplitude).sum();
    FrontRear { forward: factor(1.0), backward: factor(-1.0), greatest }
}

/// What the reversal check says of a stage.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Verdict {
    /// It hears the front well.
    Good,
    /// Forward over backward is under 1.5.
    Weak(FrontRear),
    /// It hears the rear at least as well as the front.
    Backward(FrontRear),
    /// It hardly hears the front at all.
    Deaf(FrontRear),
}

/// Judges a stage at one frequency, on the horizon and at 20°; a broadside row is the same both ways and always good.
pub fn judge(stage: &Stage, frequency: Frequency) -> Verdict {
    let floor = match stage.directive {
        Directive::Both => return Verdict::Good,
        Directive::Forward(hundredths) => f64::from(hundredths) / 100.0,
        Directive::Advised => 0.01,
    };
    let mut verdict = Verdict::Good;
    for elevation in [0.0, 20.0] {
        let heard = front_rear(stage, frequency, Angle::from_degrees(elevation));
        if heard.forward < floor * heard.greatest {
            return Verdict::Deaf(heard);
        }
        if heard.forward <= heard.backward {
            return Verdict::Backward(heard);
        }
        if heard.forward < 1.5 * heard.backward {
            verdict = Verdict::Weak(heard);
        }
    }
    verdict
}
