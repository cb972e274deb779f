//! Reflection: coefficient, standing wave ratio, return loss, and what two reflections do to a delay.

use num_complex::Complex64;

use super::{power_db, voltage_db};
use crate::units::{Angle, Decibel, Resistance};

/// Reflection coefficient of a load on a line: (Z − Z0)/(Z + Z0).
pub fn reflection_coefficient(load: Complex64, z0: Resistance) -> Complex64 {
    (load - z0.ohms()) / (load + z0.ohms())
}

/// The magnitude of a reflection, 0 (matched) to 1 (everything comes back).
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct Reflection {
    magnitude: f64,
}

impl Reflection {
    /// The reflection of a load on a line.
    pub fn of(load: Complex64, z0: Resistance) -> Self {
        Self { magnitude: reflection_coefficient(load, z0).norm() }
    }

    /// From a return loss, positive decibels: |Γ| = 10^(−RL/20).
    pub fn from_return_loss(return_loss: Decibel) -> Self {
        Self { magnitude: 10f64.powf(-return_loss.db() / 20.0) }
    }

    /// |Γ|.
    pub const fn magnitude(self) -> f64 {
        self.magnitude
    }

    /// Standing wave ratio (1 + |Γ|)/(1 − |Γ|); infinite at |Γ| = 1.
    pub fn swr(self) -> f64 {
        (1.0 + self.magnitude) / (1.0 - self.magnitude)
    }

    /// Return loss −20 log10 |Γ|, positive; infinite for a perfect match.
    pub fn return_loss(self) -> Decibel {
        Decibel::new(-voltage_db(self.magnitude))
    }

    /// Mismatch loss −10 log10(1 − |Γ|²).
    pub fn mismatch_loss(self) -> Decibel {
        Decibel::new(-power_db(1.0 - self.magnitude * self.magnitude))
    }
}

/// The most by which the phase through a line wanders from its length when both ends reflect: arcsin |Γs Γl|.
///
/// The wave that went three times through the line adds Γs Γl at an unknown phase to the one that went once. Higher
/// trips are left out: their part is |Γs Γl|² and smaller.
pub fn phase_wander(source: Reflection, load: Reflection) -> Angle {
    Angle::from_radians((source.magnitude * load.magnitude).min(1.0).asin())
}

/// The impedance of `z` with a reactance `x` ohms across it.
pub fn shunted(z: Complex64, x: f64) -> Complex64 {
    (z.inv() + Complex64::new(0.0, x).inv()).inv()
}

/// How much a choke lowers the common-mode current of a path: 20 log10 |1 + Zchoke/Zpath|.
///
/// Negative when a reactive choke resonates with a reactive path: then the current rises.
pub fn choke_reduction(choke: Complex64, path: Complex64) -> Decibel {
    Decibel::new(voltage_db((Complex64::from(1.0) + choke / path).norm()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn fourteen_decibels_at_both_ends_wander_two_degrees() {
        let end = Reflection::from_return_loss(Decibel::new(14.0));
        let wander = phase_wander(end, end);
        assert!((wander.radians() - 0.04).abs() < 5e-4);
        assert!((wander.degrees() - 2.3).abs() < 0.05);
    }

    #[test]
    fn the_wander_bounds_the_exact_phase_of_a_doubly_mismatched_line() {
        let reflection = Reflection::from_return_loss(Decibel::new(14.0));
        let product = reflection.magnitude() * reflection.magnitude();
        // All trips summed: 1/(1 − ΓsΓl e^(−2jθ)); its argument never exceeds arcsin |ΓsΓl|, and reaches it.
        let exact = |turn: u32| {
            let echo = Complex64::from_polar(product, f64::from(turn).to_radians() / 10.0);
            (Complex64::from(1.0) - echo).inv().arg().abs()
        };
        let largest = (0..3600).map(exact).fold(0.0, f64::max);
        let bound = phase_wander(reflection, reflection).radians();
        assert!(largest <= bound + 1e-12 && largest > 0.999 * bound);
    }

    #[test]
    fn a_reactive_choke_on_a_capacitive_path_makes_things_worse() {
        let path = Complex64::new(100.0, -800.0);
        assert!(choke_reduction(Complex64::new(0.0, 800.0), path).db() < 0.0);
        assert!(choke_reduction(Complex64::new(800.0, 0.0), path).db() > 0.0);
    }
}
