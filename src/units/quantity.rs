//! The smaller electrical and mechanical quantities: decibels, ohms, volts, newtons.

use std::fmt;

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use super::parse::{UnitError, split_quantity};

macro_rules! quantity {
    ($(#[$doc:meta])* $name:ident, $field:ident, $wanted:literal, $symbol:literal, [$($unit:literal => $scale:expr),+]) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, Default, PartialEq, PartialOrd)]
        pub struct $name {
            $field: f64,
        }

        impl $name {
            /// From the base unit.
            pub const fn new($field: f64) -> Self {
                Self { $field }
            }

            /// The value in the base unit.
            pub const fn $field(self) -> f64 {
                self.$field
            }

            /// Reads a number with its unit.
            ///
            /// # Errors
            /// When the text has no number, no unit, an unknown unit or a decimal comma.
            pub fn parse(text: &str) -> Result<Self, UnitError> {
                let units = [$(($unit, $scale)),+];
                let value = split_quantity(text, &units, $wanted)?;
                Ok(Self { $field: value.to_f64().unwrap_or_default() })
            }
        }

        impl fmt::Display for $name {
            fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
                write!(out, concat!("{} ", $symbol), self.$field)
            }
        }
    };
}

quantity!(
    /// A level or gain in decibels.
    Decibel, db, "decibels such as \"20 dB\"", "dB", ["dB" => Decimal::ONE]
);
quantity!(
    /// A resistance or impedance magnitude in ohms.
    Resistance, ohms, "a resistance such as \"450 ohm\"", "ohm", ["ohm" => Decimal::ONE, "kohm" => Decimal::ONE_THOUSAND]
);
quantity!(
    /// A soil resistivity in ohm metres.
    Resistivity, ohm_metres, "a resistivity such as \"120 ohm m\"", "ohm m", ["ohm m" => Decimal::ONE]
);
quantity!(
    /// A soil conductivity in millisiemens a metre.
    Conductivity, ms_per_m, "a conductivity such as \"5 mS/m\"", "mS/m",
    ["mS/m" => Decimal::ONE, "S/m" => Decimal::ONE_THOUSAND]
);
quantity!(
    /// A force in newtons.
    Force, newtons, "a force such as \"50 N\"", "N", ["N" => Decimal::ONE]
);
quantity!(
    /// A voltage in volts.
    Voltage, volts, "a voltage such as \"12 V\"", "V", ["V" => Decimal::ONE]
);
quantity!(
    /// A current in milliamperes.
    Current, milliamperes, "a current such as \"60 mA\"", "mA", ["mA" => Decimal::ONE, "A" => Decimal::ONE_THOUSAND]
);
