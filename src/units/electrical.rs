//! Frequency, electrical length and velocity factor.

use std::fmt;

use rust_decimal::prelude::ToPrimitive;
use rust_decimal::{Decimal, RoundingStrategy};

use super::length::Length;
use super::parse::{UnitError, split_quantity};

/// The speed of light in vacuum, exact by definition of the metre (SI).
pub const SPEED_OF_LIGHT_M_PER_S: f64 = 299_792_458.0;

/// A frequency in whole hertz.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Frequency {
    hz: u64,
}

impl Frequency {
    /// A frequency of `hz` hertz.
    pub const fn from_hz(hz: u64) -> Self {
        Self { hz }
    }

    /// The frequency nearest to `mhz` megahertz.
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "frequencies are positive and small"
    )]
    pub fn from_mhz(mhz: f64) -> Self {
        Self { hz: (mhz * 1e6).round() as u64 }
    }

    /// Megahertz.
    #[expect(clippy::cast_precision_loss, reason = "frequencies are far below 2^53 Hz")]
    pub fn mhz(self) -> f64 {
        self.hz as f64 / 1e6
    }

    /// Hertz.
    pub const fn hz(self) -> u64 {
        self.hz
    }

    /// Megahertz as an exact decimal.
    pub fn decimal_mhz(self) -> Decimal {
        Decimal::from(self.hz) / Decimal::from(1_000_000)
    }

    /// The free-space wavelength in metres.
    pub fn wavelength_m(self) -> f64 {
        SPEED_OF_LIGHT_M_PER_S / (self.mhz() * 1e6)
    }

    /// The free-space wavenumber 2π/λ in radians a metre.
    pub fn wavenumber(self) -> f64 {
        std::f64::consts::TAU / self.wavelength_m()
    }

    /// Half a free-space wavelength as an exact decimal electrical length.
    pub fn half_wave(self) -> ElectricalLength {
        ElectricalLength::from_metres(
            Decimal::from(299_792_458) / Decimal::from(self.hz.max(1)) / Decimal::TWO,
        )
    }

    /// Reads "1.83 MHz" or "1830 kHz".
    ///
    /// # Errors
    /// When the text has no number, no unit, an unknown unit or a decimal comma.
    pub fn parse(text: &str) -> Result<Self, UnitError> {
        const UNITS: [(&str, Decimal); 3] = [
            ("MHz", Decimal::from_parts(1_000_000, 0, 0, false, 0)),
            ("kHz", Decimal::ONE_THOUSAND),
            ("Hz", Decimal::ONE),
        ];
        let hz = split_quantity(text, &UNITS, "a frequency such as \"1.83 MHz\"")?;
        match hz.round().to_u64() {
            Some(hz) => Ok(Self { hz }),
            None if hz.is_sign_negative() => Ok(Self { hz: 0 }),
            None => Err(UnitError::TooLarge { given: text.to_owned() }),
        }
    }
}

impl fmt::Display for Frequency {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{} MHz", self.decimal_mhz().normalize())
    }
}

/// The electrical length of a line: exact decimal metres of free space that it stands for.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct ElectricalLength {
    metres: Decimal,
}

impl ElectricalLength {
    /// No delay.
    pub const ZERO: Self = Self { metres: Decimal::ZERO };

    /// `metres` of free space.
    pub const fn from_metres(metres: Decimal) -> Self {
        Self { metres }
    }

    /// The exact decimal metres.
    pub const fn decimal_metres(self) -> Decimal {
        self.metres
    }

    /// Metres as a binary float, for radio.
    pub fn metres(self) -> f64 {
        self.metres.to_f64().unwrap_or_default()
    }

    /// The physical length in a cable of velocity factor `vf`: electrical × velocity factor, nearest millimetre.
    pub fn physical(self, vf: VelocityFactor) -> Length {
        Length::from_decimal_metres_nearest(self.metres.saturating_mul(vf.ratio())).unwrap_or_default()
    }

    /// Its phase at `frequency` in degrees, 360 a wavelength.
    pub fn degrees(self, frequency: Frequency) -> f64 {
        360.0 * self.metres() / frequency.wavelength_m()
    }
}

impl fmt::Display for ElectricalLength {
    /// Metres to the millimetre: "17.202 m".
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let rounded = self.metres.round_dp_with_strategy(3, RoundingStrategy::MidpointAwayFromZero);
        write!(out, "{rounded:.3} m")
    }
}

/// A velocity factor: above 0, at most 1.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct VelocityFactor {
    ratio: Decimal,
}

impl VelocityFactor {
    /// A velocity factor, or `None` outside 0 to 1.
    pub fn new(ratio: Decimal) -> Option<Self> {
        (ratio > Decimal::ZERO && ratio <= Decimal::ONE).then_some(Self { ratio })
    }

    /// The exact decimal ratio.
    pub const fn ratio(self) -> Decimal {
        self.ratio
    }

    /// The ratio as a binary float, for radio.
    pub fn value(self) -> f64 {
        self.ratio.to_f64().unwrap_or(1.0)
    }
}

impl fmt::Display for VelocityFactor {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{}", self.ratio.normalize())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn delay_is_electrical_times_velocity_factor_nearest_millimetre() {
        let electrical = ElectricalLength::from_metres(Decimal::new(17_202, 3));
        let vf = VelocityFactor::new(Decimal::new(82, 2)).unwrap();
        assert_eq!(electrical.physical(vf), Length::from_mm(14_106));
    }

    #[test]
    fn frequency_reads_and_prints() {
        let f = Frequency::parse("1.83 MHz").unwrap();
        assert_eq!(f, Frequency::parse("1830 kHz").unwrap());
        assert_eq!(f.to_string(), "1.83 MHz");
        assert!((f.wavelength_m() - 163.821_015).abs() < 1e-5);
    }
}
