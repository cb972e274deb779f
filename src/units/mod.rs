//! Numbers that know what they are: lengths, frequencies, angles, money.
//!
//! Lengths of things that are bought and cut are whole millimetres; electrical lengths and ratios are
//! exact decimals; radio works in `f64`. Nothing here knows a project, a file or a price list.

mod angle;
mod electrical;
mod length;
mod money;
mod parse;
mod quantity;

pub use angle::{Angle, Bearing};
pub use electrical::{ElectricalLength, Frequency, SPEED_OF_LIGHT_M_PER_S, VelocityFactor};
pub use length::{Diameter, Length, ceil_to_step};
pub use money::{Currency, Money};
pub use parse::{Percent, UnitError, parse_decimal, parse_percent};
pub use quantity::{Conductivity, Current, Decibel, Force, Resistance, Resistivity, Voltage};
