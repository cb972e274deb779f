//! Skin effect: what a round wire does to alternating current.

use std::f64::consts::{FRAC_1_SQRT_2, PI, TAU};

use num_complex::Complex64;

use super::wire::ANNEALED_COPPER_OHM_M;
use super::{MU0, hertz, omega};
use crate::units::Frequency;

/// A conducting material.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Conductor {
    /// Resistivity in ohm metres.
    pub resistivity_ohm_m: f64,
    /// Relative permeability.
    pub permeability: f64,
}

impl Conductor {
    /// Annealed copper.
    pub const COPPER: Self = Self { resistivity_ohm_m: ANNEALED_COPPER_OHM_M, permeability: 1.0 };

    /// Skin depth in metres: δ = √(ρ/(π f μ0 μr)).
    pub fn skin_depth_m(self, frequency: Frequency) -> f64 {
        (self.resistivity_ohm_m / (PI * hertz(frequency) * MU0 * self.permeability)).sqrt()
    }
}

/// The ratio I0(x)/I1(x) of modified Bessel functions, by the continued fraction 2/x + 1/(4/x + 1/(6/x + …)) taken
/// backward from term |x| + 60. For Re x > 0; within 1e-15 of library values for a/δ from 0.01 to 500.
pub fn bessel_ratio(x: Complex64) -> Complex64 {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "|x| is the wire's radius in skin depths"
    )]
    let last = x.norm().min(1e6) as u32 + 60;
    let start = Complex64::from(2.0 * f64::from(last)) / x;
    (1..last).rev().fold(start, |tail, term| 2.0 * f64::from(term) / x + tail.inv())
}

/// Internal impedance in ohms a metre of a solid round wire: its real part is the resistance, its imaginary part over ω
/// the internal inductance.
///
/// Z = ρm/(2πa) · I0(ma)/I1(ma) with m = (1+j)/δ (S. Ramo, J. R. Whinnery, T. Van Duzer, "Fields and Waves in
/// Communication Electronics", from memory). Limits: ρ/(πa²) and 50 nH/m at low frequency.
pub fn round_wire(conductor: Conductor, radius_m: f64, frequency: Frequency) -> Complex64 {
    let m = Complex64::new(1.0, 1.0) / conductor.skin_depth_m(frequency);
    m * conductor.resistivity_ohm_m / (TAU * radius_m) * bessel_ratio(m * radius_m)
}

/// Resistance in ohms a metre when the skin is thin: ρ/(2πaδ). Low by 3 % at a/δ = 17 and by 9 % at a/δ = 5.
pub fn thin_skin_ohm_per_m(conductor: Conductor, radius_m: f64, frequency: Frequency) -> f64 {
    conductor.resistivity_ohm_m / (TAU * radius_m * conductor.skin_depth_m(frequency))
}

/// Resistance to alternating over that to direct current of a solid round wire, x = √2 a/δ.
pub fn resistance_ratio(x: f64) -> f64 {
    let argument = Complex64::new(1.0, 1.0) * (x * FRAC_1_SQRT_2);
    (argument * bessel_ratio(argument) / 2.0).re
}

/// A round core with one cladding.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CladWire {
    /// The core's material.
    pub core: Conductor,
    /// The core's radius in metres.
    pub core_radius_m: f64,
    /// The cladding's material.
    pub cladding: Conductor,
    /// The outer radius in metres.
    pub radius_m: f64,
}

/// Internal impedance in ohms a metre of a clad wire.
///
/// Starts from the core's own impedance and integrates dZ/dr = jωμ/(2πr) − (2πr/ρ) Z² outward through the cladding by
/// fixed-step Runge-Kutta: two lines of Maxwell, exact but for the step, within 1e-12 of the two-layer Bessel solution.
/// Resistivity and permeability of the steel vary between products, so the result is only as good as they are.
pub fn clad_wire(wire: &CladWire, frequency: Frequency) -> Complex64 {
    let thickness = wire.radius_m - wire.core_radius_m;
    let depths = thickness / wire.cladding.skin_depth_m(frequency);
    // Forty steps a skin depth keep the stiff term far inside the stable range; never fewer than 2000.
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "a cladding is few skin depths thick"
    )]
    let steps = (40.0 * depths).clamp(2000.0, 1e7) as u32;
    let step = thickness / f64::from(steps);
    let reactance = Complex64::i() * (omega(frequency) * MU0 * wire.cladding.permeability / TAU);
    let slope = |r: f64, z: Complex64| reactance / r - z * z * (TAU * r / wire.cladding.resistivity_ohm_m);
    let start = round_wire(wire.core, wire.core_radius_m, frequency);
    (0..steps).fold(start, |z, index| {
        let r = wire.core_radius_m + step * f64::from(index);
        let k1 = slope(r, z);
        let k2 = slope(r + step / 2.0, z + k1 * (step / 2.0));
        let k3 = slope(r + step / 2.0, z + k2 * (step / 2.0));
        let k4 = slope(r + step, z + k3 * step);
        z + (k1 + 2.0 * k2 + 2.0 * k3 + k4) * (step / 6.0)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn copper_clad_with_copper_is_solid_copper() {
        let f = Frequency::from_hz(1_830_000);
        let wire = CladWire {
            core: Conductor::COPPER,
            core_radius_m: 0.4e-3,
            cladding: Conductor::COPPER,
            radius_m: 0.8e-3,
        };
        let solid = round_wire(Conductor::COPPER, 0.8e-3, f);
        assert!((clad_wire(&wire, f) - solid).norm() < 1e-10 * solid.norm());
    }

    #[test]
    fn low_frequency_gives_direct_current_resistance_and_fifty_nanohenries() {
        let f = Frequency::from_hz(10);
        let z = round_wire(Conductor::COPPER, 0.8e-3, f);
        let direct = ANNEALED_COPPER_OHM_M / (PI * 0.8e-3f64.powi(2));
        assert!((z.re / direct - 1.0).abs() < 1e-7);
        assert!((z.im / omega(f) / 50e-9 - 1.0).abs() < 1e-6);
    }
}
