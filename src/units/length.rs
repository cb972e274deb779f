//! Lengths in whole millimetres and thin diameters in micrometres.

use std::fmt;
use std::iter::Sum;
use std::ops::{Add, AddAssign, Mul, Neg, Sub};

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use super::parse::{UnitError, split_quantity};

/// A length or coordinate in whole millimetres.
///
/// Everything that is bought, cut or staked is counted in this unit, so sums are exact.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Length {
    mm: i64,
}

impl Length {
    /// No length at all.
    pub const ZERO: Self = Self { mm: 0 };

    /// A length of `mm` millimetres.
    pub const fn from_mm(mm: i64) -> Self {
        Self { mm }
    }

    /// The length nearest to `metres`, halves away from zero.
    #[expect(clippy::cast_possible_truncation, reason = "site lengths are far below 2^53 mm")]
    pub fn from_metres_nearest(metres: f64) -> Self {
        Self { mm: (metres * 1000.0).round() as i64 }
    }

    /// The length nearest to a decimal number of metres, halves away from zero.
    ///
    /// Returns `None` when the number is too large for a length.
    pub fn from_decimal_metres_nearest(metres: Decimal) -> Option<Self> {
        let mm = metres
            .checked_mul(Decimal::ONE_THOUSAND)?
            .round_dp_with_strategy(0, rust_decimal::RoundingStrategy::MidpointAwayFromZero);
        mm.to_i64().map(Self::from_mm)
    }

    /// The whole number of millimetres.
    pub const fn mm(self) -> i64 {
        self.mm
    }

    /// Metres as a binary float, for radio and drawing only.
    #[expect(clippy::cast_precision_loss, reason = "site lengths are far below 2^53 mm")]
    pub fn metres(self) -> f64 {
        self.mm as f64 / 1000.0
    }

    /// Metres as an exact decimal with three places.
    pub fn decimal_metres(self) -> Decimal {
        Decimal::new(self.mm, 3)
    }

    /// This length times an exact decimal ratio, rounded up to the millimetre (a reach or a routed length).
    #[must_use]
    pub fn times_up(self, ratio: Decimal) -> Self {
        let product = Decimal::from(self.mm).saturating_mul(ratio).ceil();
        Self { mm: product.to_i64().unwrap_or(i64::MAX) }
    }

    /// This length rounded up to a multiple of `step`; unchanged when `step` is zero or less.
    #[must_use]
    pub fn up_to(self, step: Self) -> Self {
        Self { mm: ceil_to_step(self.mm, step.mm) }
    }

    /// How many steps of `step` cover this length, at least zero.
    pub fn steps_of(self, step: Self) -> i64 {
        if step.mm <= 0 || self.mm <= 0 { 0 } else { ceil_to_step(self.mm, step.mm) / step.mm }
    }

    /// The distance without its sign.
    #[must_use]
    pub const fn abs(self) -> Self {
        Self { mm: self.mm.abs() }
    }

    /// Reads "60 ft", "18.3 m", "25 mm", "4 in", "7 ft 6 in" or "1.2 km", converting once to the nearest millimetre.
    ///
    /// # Errors
    /// When the text has no number, no unit, an unknown unit or a decimal comma.
    pub fn parse(text: &str) -> Result<Self, UnitError> {
        const UNITS: [(&str, Decimal); 7] = [
            ("m", Decimal::ONE_THOUSAND),
            ("mm", Decimal::ONE),
            ("cm", Decimal::TEN),
            ("km", Decimal::from_parts(1_000_000, 0, 0, false, 0)),
            ("ft", Decimal::from_parts(3048, 0, 0, false, 1)),
            ("in", Decimal::from_parts(254, 0, 0, false, 1)),
            ("yd", Decimal::from_parts(9144, 0, 0, false, 1)),
        ];
        let sum = split_quantity(text, &UNITS, "a length such as \"18.3 m\" or \"60 ft\"")?;
        let mm = sum.round_dp_with_strategy(0, rust_decimal::RoundingStrategy::MidpointAwayFromZero);
        match mm.to_i64() {
            Some(mm) if mm.abs() <= 1_000_000_000 => Ok(Self { mm }),
            _ => Err(UnitError::TooLarge { given: text.to_owned() }),
        }
    }
}

/// `value` rounded up to a multiple of `step` by integer division; unchanged when `step` is zero or less.
pub const fn ceil_to_step(value: i64, step: i64) -> i64 {
    if step <= 0 {
        value
    } else {
        value.div_euclid(step) * step + if value.rem_euclid(step) > 0 { step } else { 0 }
    }
}

impl Add for Length {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self { mm: self.mm + other.mm }
    }
}

impl AddAssign for Length {
    fn add_assign(&mut self, other: Self) {
        self.mm += other.mm;
    }
}

impl Sub for Length {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self { mm: self.mm - other.mm }
    }
}

impl Neg for Length {
    type Output = Self;
    fn neg(self) -> Self {
        Self { mm: -self.mm }
    }
}

impl Mul<i64> for Length {
    type Output = Self;
    fn mul(self, count: i64) -> Self {
        Self { mm: self.mm * count }
    }
}

impl Sum for Length {
    fn sum<I: Iterator<Item = Self>>(items: I) -> Self {
        items.fold(Self::ZERO, Add::add)
    }
}

impl fmt::Display for Length {
    /// Metres with as many of the three decimals as the value needs, at least one: "18.3 m", "15.006 m".
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let metres = self.decimal_metres().normalize();
        let places = metres.scale().max(1) as usize;
        write!(out, "{metres:.places$} m")
    }
}

/// The diameter of a wire, cable or rod, in whole micrometres.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Diameter {
    um: i64,
}

impl Diameter {
    /// A diameter of `um` micrometres.
    pub const fn from_um(um: i64) -> Self {
        Self { um }
    }

    /// Millimetres as an exact decimal.
    pub fn decimal_mm(self) -> Decimal {
        Decimal::new(self.um, 3)
    }

    /// Metres as a binary float.
    #[expect(clippy::cast_precision_loss, reason = "a diameter is far below 2^53 micrometres")]
    pub fn metres(self) -> f64 {
        self.um as f64 / 1e6
    }

    /// Reads "1.6 mm" or "0.064 in".
    ///
    /// # Errors
    /// When the text has no number, no unit, an unknown unit or a decimal comma.
    pub fn parse(text: &str) -> Result<Self, UnitError> {
        const UNITS: [(&str, Decimal); 4] = [
            ("mm", Decimal::ONE_THOUSAND),
            ("cm", Decimal::from_parts(10_000, 0, 0, false, 0)),
            ("m", Decimal::from_parts(1_000_000, 0, 0, false, 0)),
            ("in", Decimal::from_parts(25_400, 0, 0, false, 0)),
        ];
        let um = split_quantity(text, &UNITS, "a diameter such as \"1.6 mm\"")?;
        match um.round().to_i64() {
            Some(um) if um.abs() <= 1_000_000_000 => Ok(Self { um }),
            _ => Err(UnitError::TooLarge { given: text.to_owned() }),
        }
    }
}

impl fmt::Display for Diameter {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{} mm", self.decimal_mm().normalize())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn feet_are_exact_by_definition() {
        assert_eq!(Length::parse("60 ft").unwrap(), Length::from_mm(18_288));
        assert_eq!(Length::parse("400 ft").unwrap(), Length::from_mm(121_920));
        assert_eq!(Length::parse("7 ft 6 in").unwrap(), Length::from_mm(2_286));
    }

    #[test]
    fn one_hundred_and_fifty_metres_times_1_05_is_exact() {
        assert_eq!(Length::from_mm(150_000).times_up(Decimal::new(105, 2)), Length::from_mm(157_500));
    }

    #[test]
    fn lengths_print_without_padding() {
        assert_eq!(Length::from_mm(18_300).to_string(), "18.3 m");
        assert_eq!(Length::from_mm(15_006).to_string(), "15.006 m");
        assert_eq!(Length::from_mm(-4_000).to_string(), "-4.0 m");
    }

    #[test]
    fn rounding_up_leaves_whole_steps_alone() {
        assert_eq!(Length::from_mm(162_100).up_to(Length::from_mm(100)), Length::from_mm(162_100));
        assert_eq!(Length::from_mm(162_101).up_to(Length::from_mm(100)), Length::from_mm(162_200));
    }
}
