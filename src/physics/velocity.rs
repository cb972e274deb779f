//! Velocity factor, delay and the frequencies at which a finished line proves its length.

use std::fmt;

use rust_decimal::Decimal;
use rust_decimal::prelude::FromPrimitive;

use super::hertz;
use crate::units::{Angle, ElectricalLength, Frequency, Length, SPEED_OF_LIGHT_M_PER_S, VelocityFactor};

/// Why velocity factor points were refused.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum VelocityError {
    /// There are none.
    NoPoints,
    /// A point at frequency zero.
    ZeroFrequency,
    /// Two points at one frequency.
    Repeated {
        /// That frequency.
        frequency: Frequency,
    },
}

impl fmt::Display for VelocityError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoPoints => out.write_str("no velocity factor points"),
            Self::ZeroFrequency => out.write_str("a velocity factor point needs a frequency above zero"),
            Self::Repeated { frequency } => write!(out, "two velocity factor points at {frequency}"),
        }
    }
}

impl std::error::Error for VelocityError {}

/// A cable's velocity factor by frequency.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct VelocityPoints {
    points: Vec<(Frequency, VelocityFactor)>,
}

impl VelocityPoints {
    /// Points in any order.
    ///
    /// # Errors
    /// When there are none, when one is at frequency zero, or when a frequency occurs twice.
    pub fn new(mut points: Vec<(Frequency, VelocityFactor)>) -> Result<Self, VelocityError> {
        points.sort_by_key(|(frequency, _)| *frequency);
        match points.first() {
            None => return Err(VelocityError::NoPoints),
            Some((lowest, _)) if lowest.hz() == 0 => return Err(VelocityError::ZeroFrequency),
            Some(_) => {}
        }
        match points.windows(2).find(|pair| pair[0].0 == pair[1].0) {
            Some(pair) => Err(VelocityError::Repeated { frequency: pair[0].0 }),
            None => Ok(Self { points }),
        }
    }

    /// One velocity factor for every frequency.
    pub fn constant(factor: VelocityFactor) -> Self {
        Self { points: vec![(Frequency::from_hz(1), factor)] }
    }

    /// The velocity factor as a ratio: linear in log f between the points, held flat outside them.
    pub fn ratio_at(&self, frequency: Frequency) -> f64 {
        let above = self.points.partition_point(|point| point.0 < frequency);
        match (above.checked_sub(1).and_then(|below| self.points.get(below)), self.points.get(above)) {
            (Some(lower), Some(upper)) => {
                let share = (frequency.mhz() / lower.0.mhz()).ln() / (upper.0.mhz() / lower.0.mhz()).ln();
                lower.1.value() + share * (upper.1.value() - lower.1.value())
            }
            (Some(only), None) | (None, Some(only)) => only.1.value(),
            (None, None) => 1.0,
        }
    }

    /// The velocity factor to six decimals (0.02 mm in 20 m), for cutting.
    pub fn at(&self, frequency: Frequency) -> VelocityFactor {
        factor(self.ratio_at(frequency)).unwrap_or(self.points[0].1)
    }
}

/// A velocity factor to six decimals, or `None` outside 0 to 1.
fn factor(ratio: f64) -> Option<VelocityFactor> {
    VelocityFactor::new(Decimal::from_f64(ratio)?.round_dp(6))
}

/// The far end of a line under test.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum FarEnd {
    /// Nothing connected: lowest input impedance first at a quarter wave.
    Open,
    /// Shorted: lowest input impedance first at a half wave.
    Shorted,
}

impl FarEnd {
    /// Line length in wavelengths at the first impedance minimum.
    const fn waves(self) -> f64 {
        match self {
            Self::Open => 0.25,
            Self::Shorted => 0.5,
        }
    }
}

/// A test frequency and how it came about.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TestFrequency {
    /// Where the finished piece shows its first impedance minimum.
    pub frequency: Frequency,
    /// Velocity factor at that frequency over that at the design frequency; 1 where the cable has one figure only.
    pub velocity_ratio: f64,
}

/// The first impedance minimum of a line that is `electrical` long at its design frequency, or `None` without length.
///
/// f = c/(4d) (open) or c/(2d) (shorted), times VF(f)/VF(design), repeated until it stands still. The physical length
/// drops out, so the piece is trimmed to a frequency and not to a tape. Lossless line theory, any length.
pub fn test_frequency(
    electrical: ElectricalLength,
    far_end: FarEnd,
    design: Frequency,
    velocity: &VelocityPoints,
) -> Option<TestFrequency> {
    let metres = electrical.metres();
    if metres <= 0.0 {
        return None;
    }
    let plain_mhz = far_end.waves() * SPEED_OF_LIGHT_M_PER_S / metres / 1e6;
    let reference = velocity.ratio_at(design);
    let mut ratio = 1.0;
    for _ in 0..20 {
        ratio = velocity.ratio_at(Frequency::from_mhz(plain_mhz * ratio)) / reference;
    }
    Some(TestFrequency { frequency: Frequency::from_mhz(plain_mhz * ratio), velocity_ratio: ratio })
}

/// Velocity factor of a sample from the frequency of its first impedance minimum: 4 L f/c open, 2 L f/c shorted, or
/// `None` when the result is not between 0 and 1.
pub fn measured(length: Length, first_minimum: Frequency, far_end: FarEnd) -> Option<VelocityFactor> {
    factor(length.metres() * hertz(first_minimum) / (far_end.waves() * SPEED_OF_LIGHT_M_PER_S))
}

/// Velocity factor of a long sample from two neighbouring impedance minima, 2 L (f2 − f1)/c for either far end, or
/// `None` when the result is not between 0 and 1.
pub fn measured_between(length: Length, lower: Frequency, upper: Frequency) -> Option<VelocityFactor> {
    factor(2.0 * length.metres() * (hertz(upper) - hertz(lower)) / SPEED_OF_LIGHT_M_PER_S)
}

/// Wavelength in metres inside a cable.
pub fn wavelength_m(velocity_factor: f64, frequency: Frequency) -> f64 {
    velocity_factor * frequency.wavelength_m()
}

/// Physical length in metres of a line of phase φ: φ/360 · VF · c/f.
pub fn length_of_phase_m(phase: Angle, velocity_factor: f64, frequency: Frequency) -> f64 {
    phase.degrees() / 360.0 * wavelength_m(velocity_factor, frequency)
}

/// Phase of a physical length: 360 L f/(VF c) degrees.
pub fn phase_of_length(metres: f64, velocity_factor: f64, frequency: Frequency) -> Angle {
    Angle::from_degrees(360.0 * metres / wavelength_m(velocity_factor, frequency))
}

/// Delay in seconds of a physical length: L/(VF c).
pub fn delay_s(metres: f64, velocity_factor: f64) -> f64 {
    metres / (velocity_factor * SPEED_OF_LIGHT_M_PER_S)
}

/// The true phase of a line that was cut for `assumed` and has `true_factor`.
pub fn phase_with_true_factor(planned: Angle, assumed: f64, true_factor: f64) -> Angle {
    Angle::from_degrees(planned.degrees() * assumed / true_factor)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn mhz(mhz: f64) -> Frequency {
        Frequency::from_mhz(mhz)
    }

    fn vf(ten_thousandths: i64) -> VelocityFactor {
        VelocityFactor::new(Decimal::new(ten_thousandths, 4)).unwrap()
    }

    fn metres(millimetres: i64) -> ElectricalLength {
        ElectricalLength::from_metres(Decimal::new(millimetres, 3))
    }

    #[test]
    fn between_points_linear_in_log_frequency_outside_flat() {
        let cable = VelocityPoints::new(vec![(mhz(7.2), vf(8220)), (mhz(1.8), vf(8140))]).unwrap();
        assert_eq!(cable.at(mhz(3.6)), vf(8180));
        assert_eq!(cable.at(mhz(0.5)), vf(8140));
        assert_eq!(cable.at(mhz(50.0)), vf(8220));
        assert_eq!(cable.at(mhz(1.8)), vf(8140));
    }

    #[test]
    fn the_ratio_moves_the_test_frequency() {
        // 18.3 m of foam cable with 0.8141 at 1.83 MHz and 0.8193 at 4.1 MHz: 4.0955 MHz without, 4.122 with the ratio.
        let cable = VelocityPoints::new(vec![(mhz(1.83), vf(8141)), (mhz(4.1), vf(8193))]).unwrap();
        let plain =
            test_frequency(metres(18_300), FarEnd::Open, mhz(1.83), &VelocityPoints::constant(vf(8200)))
                .unwrap();
        assert!((plain.frequency.mhz() - 4.0955).abs() < 5e-5);
        assert!((plain.velocity_ratio - 1.0).abs() < 1e-12);
        let with = test_frequency(metres(18_300), FarEnd::Open, mhz(1.83), &cable).unwrap();
        assert!((with.velocity_ratio - 1.006).abs() < 5e-4);
        assert!((with.frequency.mhz() - 4.122).abs() < 5e-4);
    }

    #[test]
    fn a_measured_sample_gives_its_velocity_factor_back() {
        let sample = Length::from_mm(20_000);
        let true_vf = 0.82;
        let open = mhz(true_vf * 299.792_458 / (4.0 * 20.0));
        let shorted = mhz(true_vf * 299.792_458 / (2.0 * 20.0));
        assert_eq!(measured(sample, open, FarEnd::Open), Some(vf(8200)));
        assert_eq!(measured(sample, shorted, FarEnd::Shorted), Some(vf(8200)));
        assert_eq!(measured_between(sample, open, mhz(3.0 * open.mhz())), Some(vf(8200)));
        assert_eq!(measured(sample, mhz(20.0), FarEnd::Open), None);
    }

    #[test]
    fn wrong_points_are_refused_and_no_length_has_no_frequency() {
        assert_eq!(VelocityPoints::new(vec![]), Err(VelocityError::NoPoints));
        let twice = vec![(mhz(1.8), vf(8100)), (mhz(1.8), vf(8200))];
        assert_eq!(VelocityPoints::new(twice), Err(VelocityError::Repeated { frequency: mhz(1.8) }));
        let flat = VelocityPoints::constant(vf(6600));
        assert_eq!(test_frequency(ElectricalLength::ZERO, FarEnd::Open, mhz(1.83), &flat), None);
    }
}
