//! Angles and bearings.

use std::fmt;

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use super::parse::{UnitError, split_quantity};

/// An angle in degrees.
#[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
pub struct Angle {
    degrees: f64,
}

impl Angle {
    /// An angle of `degrees`.
    pub const fn from_degrees(degrees: f64) -> Self {
        Self { degrees }
    }

    /// An angle of `radians`.
    pub fn from_radians(radians: f64) -> Self {
        Self { degrees: radians.to_degrees() }
    }

    /// Degrees.
    pub const fn degrees(self) -> f64 {
        self.degrees
    }

    /// Radians.
    pub fn radians(self) -> f64 {
        self.degrees.to_radians()
    }

    /// Reads "20 deg".
    ///
    /// # Errors
    /// When the text has no number, no unit, an unknown unit or a decimal comma.
    pub fn parse(text: &str) -> Result<Self, UnitError> {
        const UNITS: [(&str, Decimal); 1] = [("deg", Decimal::ONE)];
        let degrees = split_quantity(text, &UNITS, "an angle such as \"20 deg\"")?;
        Ok(Self { degrees: degrees.to_f64().unwrap_or_default() })
    }
}

impl fmt::Display for Angle {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{:.1}°", self.degrees)
    }
}

/// A direction on the ground, degrees clockwise from true north, 0 up to but not including 360.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct Bearing {
    degrees: f64,
}

impl Bearing {
    /// The bearing `degrees` clockwise from true north, brought into one turn.
    pub fn from_degrees(degrees: f64) -> Self {
        let turned = degrees.rem_euclid(360.0);
        Self { degrees: if turned >= 360.0 { 0.0 } else { turned } }
    }

    /// Degrees clockwise from true north.
    pub const fn degrees(self) -> f64 {
        self.degrees
    }

    /// Radians clockwise from true north.
    pub fn radians(self) -> f64 {
        self.degrees.to_radians()
    }

    /// This bearing turned clockwise.
    #[must_use]
    pub fn turned(self, by: Angle) -> Self {
        Self::from_degrees(self.degrees + by.degrees())
    }
}

impl fmt::Display for Bearing {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{:05.1}°", self.degrees)
    }
}
