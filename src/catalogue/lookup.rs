//! Velocity factor and loss of a cable at a frequency.

use std::fmt;

use rust_decimal::Decimal;
use rust_decimal::prelude::{FromPrimitive, ToPrimitive};

use crate::units::{Frequency, VelocityFactor};

use super::model::{Cable, VelocityData};

/// Why there is no loss figure.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NoLoss {
    /// The catalogue has no loss point of this cable.
    NoPoints,
    /// The frequency lies below the lowest point.
    Below(Frequency),
    /// The frequency lies above the highest point.
    Above(Frequency),
}

impl fmt::Display for NoLoss {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoPoints => write!(out, "no loss figure for this cable; measured value needed"),
            Self::Below(lowest) => {
                write!(out, "no loss figure below {lowest} for this cable; measured value needed")
            }
            Self::Above(highest) => {
                write!(out, "no loss figure above {highest} for this cable; measured value needed")
            }
        }
    }
}

impl std::error::Error for NoLoss {}

impl Cable {
    /// The velocity factor at a frequency, if the catalogue has one.
    ///
    /// One number holds at every frequency. Points are joined by straight lines over the logarithm of frequency,
    /// rounded to six decimals, and held flat outside.
    pub fn velocity_at(&self, frequency: Frequency) -> Option<VelocityFactor> {
        match &self.velocity_factor {
            VelocityData::None => None,
            VelocityData::One(factor) => Some(*factor),
            VelocityData::Points(points) => velocity_between(points, frequency),
        }
    }

    /// The matched loss in dB per 100 m at a frequency, log-log between the points of the catalogue.
    ///
    /// # Errors
    /// Outside the points, because a square-root law fails there for copper-clad steel at low frequencies, and for
    /// a cable without points.
    pub fn loss_db_per_100m(&self, frequency: Frequency) -> Result<f64, NoLoss> {
        let (Some((lowest, _)), Some((highest, _))) = (self.loss.first(), self.loss.last()) else {
            return Err(NoLoss::NoPoints);
        };
        if frequency < *lowest {
            return Err(NoLoss::Below(*lowest));
        }
        let above = self.loss.iter().position(|(point, _)| *point >= frequency);
        let above = above.ok_or(NoLoss::Above(*highest))?;
        let value = |index: usize| self.loss[index].1.to_f64().unwrap_or_default();
        if self.loss[above].0 == frequency {
            return Ok(value(above));
        }
        let share = log_share(self.loss[above - 1].0, self.loss[above].0, frequency);
        let (from, to) = (libm::log(value(above - 1)), libm::log(value(above)));
        Ok(libm::exp(from + share * (to - from)))
    }
}

fn velocity_between(points: &[(Frequency, VelocityFactor)], frequency: Frequency) -> Option<VelocityFactor> {
    let Some(above) = points.iter().position(|(point, _)| *point >= frequency) else {
        return points.last().map(|(_, factor)| *factor);
    };
    let (point, factor) = points[above];
    if above == 0 || point == frequency {
        return Some(factor);
    }
    let (before, lower) = points[above - 1];
    let share = Decimal::from_f64(log_share(before, point, frequency))?;
    let ratio = lower.ratio() + (factor.ratio() - lower.ratio()) * share;
    VelocityFactor::new(ratio.round_dp(6).normalize())
}

/// How far `at` lies between two frequencies on a logarithmic scale, 0 to 1.
fn log_share(from: Frequency, to: Frequency, at: Frequency) -> f64 {
    libm::log(at.mhz() / from.mhz()) / libm::log(to.mhz() / from.mhz())
}

#[cfg(test)]
mod tests {
    use crate::units::Frequency;

    #[test]
    fn the_refusal_is_the_sentence_of_the_trade() {
        let refusal = super::NoLoss::Below(Frequency::from_hz(1_800_000));
        assert_eq!(refusal.to_string(), "no loss figure below 1.8 MHz for this cable; measured value needed");
    }
}
