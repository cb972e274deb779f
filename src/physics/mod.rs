//! Published formulas of wires, lines, matching, noise, earths and sag, each with its range and its source.
//!
//! Nothing here knows a project, a catalogue or a rule of the trade. Phasors use exp(+jωt). Quantities that the unit
//! types hold without loss come as those types; the rest are `f64` whose name or docstring says the unit.

pub mod coax;
pub mod combiner;
pub mod control;
pub mod earth;
pub mod earth_set;
pub mod line;
pub mod loss;
pub mod matching;
pub mod noise;
pub mod pad;
pub mod phasing;
pub mod preferred;
pub mod sag;
pub mod skin;
pub mod transformer;
pub mod velocity;
pub mod wire;

use std::f64::consts::{PI, TAU};

use crate::units::{Frequency, SPEED_OF_LIGHT_M_PER_S};

/// Permeability of vacuum in H/m; the measured value of 2018 differs by 5·10⁻¹⁰ relative.
pub const MU0: f64 = 4e-7 * PI;
/// Permittivity of vacuum in F/m, 1/(μ0 c²).
pub const EPSILON0: f64 = 1.0 / (MU0 * SPEED_OF_LIGHT_M_PER_S * SPEED_OF_LIGHT_M_PER_S);
/// Wave impedance of vacuum in ohms, μ0 c.
pub const ETA0: f64 = MU0 * SPEED_OF_LIGHT_M_PER_S;
/// Boltzmann's constant in J/K, exact (SI).
pub const BOLTZMANN: f64 = 1.380_649e-23;
/// The reference temperature of noise figures in kelvin.
pub const NOISE_REFERENCE_K: f64 = 290.0;
/// Standard gravity in m/s², exact.
pub const GRAVITY: f64 = 9.806_65;
/// Decibels in a neper, 20 log10 e.
pub const DB_PER_NEPER: f64 = 20.0 * std::f64::consts::LOG10_E;

/// Hertz as a binary float.
pub(crate) fn hertz(frequency: Frequency) -> f64 {
    frequency.mhz() * 1e6
}

/// Angular frequency 2πf in rad/s.
pub(crate) fn omega(frequency: Frequency) -> f64 {
    TAU * hertz(frequency)
}

/// The power ratio of `db` decibels.
pub(crate) fn power_ratio(db: f64) -> f64 {
    10f64.powf(db / 10.0)
}

/// Decibels of a power ratio.
pub(crate) fn power_db(ratio: f64) -> f64 {
    10.0 * ratio.log10()
}

/// Decibels of a voltage ratio.
pub(crate) fn voltage_db(ratio: f64) -> f64 {
    20.0 * ratio.log10()
}
