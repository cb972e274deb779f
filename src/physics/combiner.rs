//! Combiners: hybrids, Wilkinson dividers, and what errors at their inputs cost.

use std::f64::consts::{FRAC_PI_2, SQRT_2};

use nalgebra::{Matrix3, SMatrix};
use num_complex::Complex64;

use super::voltage_db;
use crate::units::{Angle, Decibel, Resistance};

/// A two-way hybrid: a balanced winding with a centre tap and a resistor across it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hybrid {
    /// Impedance at the centre tap, Z/2.
    pub sum_port: Resistance,
    /// Balancing resistor across the winding, 2Z.
    pub balancing_resistor: Resistance,
    /// Impedance ratio of the transformer that brings the sum back to Z.
    pub step_up_impedance_ratio: f64,
    /// Its turns ratio, √2.
    pub step_up_turns_ratio: f64,
}

/// The hybrid for ports of impedance `z`. Ideal transformers; isolation needs the sum port matched.
pub fn hybrid(z: Resistance) -> Hybrid {
    let sum_port = Resistance::new(z.ohms() / 2.0);
    let ratio = z.ohms() / sum_port.ohms();
    Hybrid {
        sum_port,
        balancing_resistor: Resistance::new(2.0 * z.ohms()),
        step_up_impedance_ratio: ratio,
        step_up_turns_ratio: ratio.sqrt(),
    }
}

/// Parts of a Wilkinson divider of equal branches (E. J. Wilkinson, "An N-way hybrid power divider", 1960, from memory).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wilkinson {
    /// Impedance of each quarter-wave line, √N Z0.
    pub line: Resistance,
    /// Resistors from the branches to a floating common point, Z0 each.
    pub star_resistor: Resistance,
    /// For two ways: the one resistor between the branches that replaces two star resistors, 2 Z0.
    pub between_resistor: Option<Resistance>,
    /// Power division, 10 log10 N.
    pub split_loss: Decibel,
}

/// A Wilkinson divider of `ways` equal branches.
pub fn wilkinson(z0: Resistance, ways: u32) -> Wilkinson {
    let n = f64::from(ways);
    Wilkinson {
        line: Resistance::new(n.sqrt() * z0.ohms()),
        star_resistor: z0,
        between_resistor: (ways == 2).then(|| Resistance::new(2.0 * z0.ohms())),
        split_loss: Decibel::new(10.0 * n.log10()),
    }
}

/// Parts of a two-way Wilkinson divider with unequal branches.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct UnequalWilkinson {
    /// Line to the branch that gets k² times the power of the other.
    pub strong_line: Resistance,
    /// Line to the other branch.
    pub weak_line: Resistance,
    /// Resistor between the branches.
    pub resistor: Resistance,
}

/// The two-way divider whose branches differ by the power ratio k²: Z03 = Z0 √((1+k²)/k³), Z02 = k² Z03,
/// R = Z0 (k + 1/k) (D. M. Pozar, "Microwave Engineering", from memory). The branches' loads are then Z0 k and Z0/k.
///
/// `power_ratio` is P3/P2, above 0.
pub fn unequal_wilkinson(z0: Resistance, power_ratio: f64) -> UnequalWilkinson {
    let k = power_ratio.sqrt();
    let z03 = z0.ohms() * ((1.0 + k * k) / k.powi(3)).sqrt();
    UnequalWilkinson {
        strong_line: Resistance::new(z03),
        weak_line: Resistance::new(k * k * z03),
        resistor: Resistance::new(z0.ohms() * (k + k.recip())),
    }
}

/// What an ideal two-way Wilkinson divider does away from its design frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WilkinsonResponse {
    /// Transmission from the sum port to one branch, negative decibels.
    pub transmission: Decibel,
    /// Isolation between the branches, positive.
    pub isolation: Decibel,
    /// Return loss at the sum port, positive.
    pub sum_return_loss: Decibel,
    /// Return loss at a branch, positive.
    pub branch_return_loss: Decibel,
}

/// The ideal two-way Wilkinson divider at `frequency_ratio` times its design frequency, by nodal admittances:
/// S = (1 + Z0Y)⁻¹ (1 − Z0Y). Lossless lines, ratio strictly between 0 and 2 (the lines are half a wave at 2).
pub fn wilkinson_response(frequency_ratio: f64) -> Option<WilkinsonResponse> {
    let theta = FRAC_PI_2 * frequency_ratio;
    let own = Complex64::new(0.0, -1.0 / (SQRT_2 * theta.tan()));
    let through = Complex64::new(0.0, 1.0 / (SQRT_2 * theta.sin()));
    let resistor = Complex64::from(0.5);
    let y: Matrix3<Complex64> = SMatrix::from_row_slice(&[
        own * 2.0,
        through,
        through,
        through,
        own + resistor,
        -resistor,
        through,
        -resistor,
        own + resistor,
    ]);
    let one = Matrix3::<Complex64>::identity();
    let s = (one + y).lu().solve(&(one - y))?;
    let loss = |row: usize, column: usize| Decibel::new(-voltage_db(s[(row, column)].norm()));
    Some(WilkinsonResponse {
        transmission: Decibel::new(-loss(1, 0).db()),
        isolation: loss(1, 2),
        sum_return_loss: loss(0, 0),
        branch_return_loss: loss(1, 1),
    })
}

/// Loss of an in-phase sum of two equal inputs that differ by `error` in phase: −20 log10 cos(φ/2).
pub fn phase_error_loss(error: Angle) -> Decibel {
    Decibel::new(-voltage_db((error.radians() / 2.0).cos().abs()))
}

/// Depth below the in-phase sum of a null of two opposed equal inputs with a phase error: −20 log10 sin(φ/2).
pub fn phase_error_null(error: Angle) -> Decibel {
    Decibel::new(-voltage_db((error.radians() / 2.0).sin().abs()))
}

/// Depth below the in-phase sum of a null whose two inputs differ by `error` in size: −20 log10((1−r)/(1+r)).
pub fn amplitude_error_null(error: Decibel) -> Decibel {
    let r = 10f64.powf(-error.db().abs() / 20.0);
    Decibel::new(-voltage_db((1.0 - r) / (1.0 + r)))
}

/// Change of a coherent sum through a matched hybrid when `dead` of `inputs` equal inputs fail: 20 log10((n−d)/n).
pub fn dead_input_change(inputs: u32, dead: u32) -> Decibel {
    Decibel::new(voltage_db(f64::from(inputs.saturating_sub(dead)) / f64::from(inputs)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn hybrid_resistors_of_both_usual_impedances() {
        assert!((hybrid(Resistance::new(75.0)).balancing_resistor.ohms() - 150.0).abs() < 1e-12);
        assert!((hybrid(Resistance::new(50.0)).balancing_resistor.ohms() - 100.0).abs() < 1e-12);
    }

    #[test]
    fn no_power_appears_from_nowhere() {
        for ratio in [0.3, 0.5, 0.9, 1.0, 1.4, 1.9] {
            let response = wilkinson_response(ratio).unwrap();
            let power = |db: f64| 10f64.powf(db / 10.0);
            let total = 2.0 * power(response.transmission.db()) + power(-response.sum_return_loss.db());
            assert!((total - 1.0).abs() < 1e-12, "fed at the sum port nothing is lost in the resistor");
        }
    }

    #[test]
    fn an_unequal_divider_splits_by_its_ratio() {
        // Quarter-wave lines into loads Z0 k (weak) and Z0/k (strong): powers go as 1/input resistance.
        let parts = unequal_wilkinson(Resistance::new(50.0), 2.0);
        let k = SQRT_2.sqrt() * SQRT_2.sqrt();
        let weak_input = parts.weak_line.ohms().powi(2) / (50.0 * k);
        let strong_input = parts.strong_line.ohms().powi(2) / (50.0 / k);
        assert!((weak_input / strong_input - 2.0).abs() < 1e-9);
        assert!((1.0 / (1.0 / weak_input + 1.0 / strong_input) - 50.0).abs() < 1e-9);
    }
}
