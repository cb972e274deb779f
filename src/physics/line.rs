//! Transmission lines in general: constants, input impedance, what a wrong load does, wires as lines.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::loss::LossRate;
use super::{ETA0, omega};
use crate::units::{Angle, Frequency, Resistance, SPEED_OF_LIGHT_M_PER_S};

/// Propagation constant and characteristic impedance of a uniform line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineConstants {
    /// Propagation constant in 1/m: attenuation in nepers, phase in radians.
    pub gamma: Complex64,
    /// Characteristic impedance in ohms.
    pub impedance: Complex64,
}

impl LineConstants {
    /// From series impedance in ohms a metre and shunt admittance in siemens a metre: γ = √(ZY), Z0 = √(Z/Y).
    pub fn from_series_and_shunt(series: Complex64, shunt: Complex64) -> Self {
        Self { gamma: (series * shunt).sqrt(), impedance: (series / shunt).sqrt() }
    }

    /// Phase velocity over the speed of light, ω/(βc).
    pub fn velocity_factor(self, frequency: Frequency) -> f64 {
        omega(frequency) / (self.gamma.im * SPEED_OF_LIGHT_M_PER_S)
    }

    /// Matched loss.
    pub fn loss(self) -> LossRate {
        LossRate::from_nepers_per_m(self.gamma.re)
    }
}

/// Input impedance of a lossless line of electrical length θ: Z0 (Zl + jZ0 tanθ)/(Z0 + jZl tanθ).
///
/// Written with sine and cosine, so 90° is an ordinary case.
pub fn input_impedance(z0: Resistance, load: Complex64, length: Angle) -> Complex64 {
    let (sin, cos) = length.radians().sin_cos();
    let z0 = z0.ohms();
    z0 * (load * cos + Complex64::i() * (z0 * sin))
        / (Complex64::from(z0 * cos) + Complex64::i() * load * sin)
}

/// The voltage at a line's load over that at its input.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Transfer {
    /// Phase, negative for lag.
    pub phase: Angle,
    /// Magnitude.
    pub magnitude: f64,
}

/// What a lossless line of electrical length θ does when its load is a resistance other than Z0:
/// V(load)/V(in) = 1/(cosθ + j(Z0/R) sinθ). The phase is −θ only at multiples of 90° or when R = Z0.
pub fn loaded_line(z0: Resistance, load: Resistance, length: Angle) -> Transfer {
    let (sin, cos) = length.radians().sin_cos();
    let inverse = Complex64::new(cos, z0.ohms() / load.ohms() * sin);
    Transfer { phase: Angle::from_radians(-inverse.arg()), magnitude: inverse.norm().recip() }
}

/// Characteristic impedance of a wire over a perfect ground: (η0/2π) acosh(2h/d), d the **diameter** in the unit of h.
pub fn wire_over_ground(height_m: f64, diameter_m: f64) -> Resistance {
    Resistance::new(ETA0 / TAU * (2.0 * height_m / diameter_m).acosh())
}

/// Characteristic impedance of two parallel wires: (η0/π) acosh(S/d), S between centres, d the diameter.
pub fn two_wires(spacing_m: f64, diameter_m: f64) -> Resistance {
    Resistance::new(2.0 * ETA0 / TAU * (spacing_m / diameter_m).acosh())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_quarter_wave_inverts_impedance() {
        let z = input_impedance(Resistance::new(75.0), Complex64::from(150.0), Angle::from_degrees(90.0));
        assert!((z - 37.5).norm() < 1e-9);
    }

    #[test]
    fn two_wires_are_twice_one_over_its_image() {
        let over_ground = wire_over_ground(0.15, 0.002).ohms();
        let pair = two_wires(0.3, 0.002).ohms();
        assert!((pair - 2.0 * over_ground).abs() < 1e-9);
    }
}
