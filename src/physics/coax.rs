//! Coaxial line from its dimensions.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::line::LineConstants;
use super::skin::Conductor;
use super::{EPSILON0, ETA0, MU0, omega};
use crate::units::{Frequency, Resistance, SPEED_OF_LIGHT_M_PER_S};

/// A coaxial line with perfect conductors, or any line at frequencies where the skin is very thin.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct IdealCoax {
    /// Diameter of the inner conductor in metres.
    pub inner_diameter_m: f64,
    /// Inside diameter of the outer conductor in metres.
    pub outer_diameter_m: f64,
    /// Relative permittivity of the dielectric.
    pub permittivity: f64,
}

impl IdealCoax {
    fn log_ratio(self) -> f64 {
        (self.outer_diameter_m / self.inner_diameter_m).ln()
    }

    /// Z0 = (η0/2π)/√εr · ln(D/d).
    pub fn impedance(self) -> Resistance {
        Resistance::new(ETA0 / TAU / self.permittivity.sqrt() * self.log_ratio())
    }

    /// 1/√εr.
    pub fn velocity_factor(self) -> f64 {
        self.permittivity.sqrt().recip()
    }

    /// C = 2πε0εr/ln(D/d), in F/m.
    pub fn capacitance_f_per_m(self) -> f64 {
        TAU * EPSILON0 * self.permittivity / self.log_ratio()
    }

    /// L = (μ0/2π) ln(D/d), in H/m.
    pub fn inductance_h_per_m(self) -> f64 {
        MU0 / TAU * self.log_ratio()
    }
}

/// A coaxial line with real conductors.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LossyCoax {
    /// Its dimensions and dielectric.
    pub shape: IdealCoax,
    /// Loss tangent of the dielectric.
    pub loss_tangent: f64,
    /// The outer conductor's material.
    pub outer: Conductor,
}

/// Series impedance, shunt admittance and what follows from them, at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CoaxConstants {
    /// Series impedance in ohms a metre.
    pub series: Complex64,
    /// Shunt admittance in siemens a metre.
    pub shunt: Complex64,
    /// Propagation constant and impedance.
    pub line: LineConstants,
}

impl LossyCoax {
    /// Line constants with the internal impedance of the inner conductor (`skin::round_wire` or `skin::clad_wire`).
    ///
    /// Z = Zi + (1+j) ρ/(2πbδ) + jω(μ0/2π) ln(b/a), Y = (tanδ + j) ω 2πε0εr/ln(b/a) (S. A. Schelkunoff, "The
    /// electromagnetic theory of coaxial transmission lines and cylindrical shields", 1934, from memory). The outer
    /// conductor is taken as a tube many skin depths thick: foil and braid are thinner, so real cable is somewhat
    /// lossier and slowed slightly less.
    pub fn constants(self, inner_impedance: Complex64, frequency: Frequency) -> CoaxConstants {
        let w = omega(frequency);
        let rise = TAU * self.shape.outer_diameter_m / 2.0 * self.outer.skin_depth_m(frequency);
        let shield = Complex64::new(1.0, 1.0) * (self.outer.resistivity_ohm_m / rise);
        let series = inner_impedance + shield + Complex64::i() * (w * self.shape.inductance_h_per_m());
        let shunt = Complex64::new(self.loss_tangent, 1.0) * (w * self.shape.capacitance_f_per_m());
        CoaxConstants { series, shunt, line: LineConstants::from_series_and_shunt(series, shunt) }
    }
}

/// Characteristic impedance from velocity and capacitance: 1/(c · VF · C).
///
/// In old units 101 670/(velocity in % × pF per foot) (MIL-DTL-28830E, 4.7.10).
pub fn impedance_from_capacitance(velocity_factor: f64, capacitance_f_per_m: f64) -> Resistance {
    Resistance::new((SPEED_OF_LIGHT_M_PER_S * velocity_factor * capacitance_f_per_m).recip())
}

/// Velocity factor from characteristic impedance and capacitance: 1/(c · Z0 · C).
pub fn velocity_from_capacitance(impedance: Resistance, capacitance_f_per_m: f64) -> f64 {
    (SPEED_OF_LIGHT_M_PER_S * impedance.ohms() * capacitance_f_per_m).recip()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::skin::round_wire;

    #[test]
    fn impedance_is_the_root_of_inductance_over_capacitance() {
        let coax = IdealCoax { inner_diameter_m: 1.02e-3, outer_diameter_m: 4.57e-3, permittivity: 1.45 };
        let root = (coax.inductance_h_per_m() / coax.capacitance_f_per_m()).sqrt();
        assert!((coax.impedance().ohms() - root).abs() < 1e-9);
    }

    #[test]
    fn solid_copper_foam_cable_at_the_low_bands() {
        // Velocity 0.8141 at 1.83 and 0.8193 at 4.1 MHz; loss 0.8, 1.1, 1.6 and 1.9 dB/100 m at 1.8, 3.6, 7 and 10 MHz.
        let shape =
            IdealCoax { inner_diameter_m: 1.0236e-3, outer_diameter_m: 4.572e-3, permittivity: 1.4516 };
        let coax = LossyCoax { shape, loss_tangent: 0.0, outer: Conductor::COPPER };
        let line = |mhz: f64| {
            let f = Frequency::from_mhz(mhz);
            let line = coax.constants(round_wire(Conductor::COPPER, 0.5118e-3, f), f).line;
            (line.velocity_factor(f), line.loss().db_per_100m())
        };
        assert!((line(1.83).0 - 0.8141).abs() < 1e-4 && (line(4.1).0 - 0.8193).abs() < 1e-4);
        for (mhz, loss) in [(1.8, 0.8), (3.6, 1.1), (7.0, 1.6), (10.0, 1.9)] {
            assert!((line(mhz).1 - loss).abs() < 0.06, "{mhz} MHz");
        }
    }

    #[test]
    fn loss_of_real_conductors_nears_r_over_twice_z0() {
        let shape = IdealCoax { inner_diameter_m: 1.02e-3, outer_diameter_m: 4.57e-3, permittivity: 1.45 };
        let coax = LossyCoax { shape, loss_tangent: 0.0, outer: Conductor::COPPER };
        let f = Frequency::from_hz(200_000_000);
        let constants = coax.constants(round_wire(Conductor::COPPER, 0.51e-3, f), f);
        let estimate = constants.series.re / (2.0 * shape.impedance().ohms());
        assert!((constants.line.gamma.re / estimate - 1.0).abs() < 0.005);
    }
}
