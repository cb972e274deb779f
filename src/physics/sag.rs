//! Sag of wire between supports.

use crate::units::Force;

/// Thermal expansion of copper in 1/K (from memory).
pub const COPPER_EXPANSION_PER_K: f64 = 17e-6;
/// Modulus of elasticity of copper wire in Pa (from memory).
pub const COPPER_MODULUS_PA: f64 = 117e9;

/// A wire between two supports of one height.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Weight of the wire in newtons a metre, above 0; ice and wind included where they matter.
    pub weight_n_per_m: f64,
    /// Distance between the supports in metres.
    pub length_m: f64,
    /// Horizontal tension, above 0.
    pub tension: Force,
}

impl Span {
    /// Half the span over the catenary parameter, wL/(2H).
    fn half(self) -> f64 {
        self.weight_n_per_m * self.length_m / (2.0 * self.tension.newtons())
    }

    /// Sag in metres by the parabola, wL²/(8H). Low by 0.02 % at a sag of 1.4 % of the span, by 0.9 % at 8 %.
    pub fn parabola_sag_m(self) -> f64 {
        self.half() * self.length_m / 4.0
    }

    /// Sag in metres by the catenary, (H/w)(cosh(wL/2H) − 1), written with sinh² so that tight wires keep their digits.
    pub fn catenary_sag_m(self) -> f64 {
        self.length_m * (self.half() / 2.0).sinh().powi(2) / self.half()
    }

    /// Length of wire in metres by the parabola, L + 8S²/(3L).
    pub fn parabola_length_m(self) -> f64 {
        self.length_m + extra_length_m(self.length_m, self.parabola_sag_m())
    }

    /// Length of wire in metres by the catenary, (2H/w) sinh(wL/2H).
    pub fn catenary_length_m(self) -> f64 {
        self.length_m * self.half().sinh() / self.half()
    }

    /// Tension at the support, H + wS with the catenary's sag.
    pub fn support_tension(self) -> Force {
        Force::new(self.tension.newtons() + self.weight_n_per_m * self.catenary_sag_m())
    }

    /// Distance in metres of the lowest point from the lower support when the other stands `rise_m` higher; negative
    /// when it lies outside the span. x0 = L/2 − (H/w) asinh(Δh/(2(H/w) sinh(wL/2H))), exact for the catenary.
    pub fn lowest_point_m(self, rise_m: f64) -> f64 {
        let parameter = self.tension.newtons() / self.weight_n_per_m;
        self.length_m / 2.0 - parameter * (rise_m / (2.0 * parameter * self.half().sinh())).asinh()
    }

    /// The tension after a change of temperature of an elastic wire strung at this one.
    ///
    /// Solves 1 + s₁ = (1 + α·ΔT)(1 + (H₁ − H₀)/(EA))(1 + s₀) by halving, with the parabola's slack s = w²L²/(24H²)
    /// (the usual change-of-state equation of overhead lines, from memory); all bays alike and the wire free to slide.
    /// Creep and the give of posts are left out, so a real wire pulls less in the cold.
    pub fn tension_after(self, elastic: Elastic, rise_k: f64) -> Force {
        let load = (self.weight_n_per_m * self.length_m).powi(2) / 24.0;
        let before = self.tension.newtons();
        let thermal = (1.0 + elastic.expansion_per_k * rise_k) * (1.0 + load / (before * before));
        let surplus = |after: f64| {
            thermal * (1.0 + (after - before) / elastic.stiffness_n) - (1.0 + load / (after * after))
        };
        // The surplus rises with the tension, from below zero to above it.
        let cold = elastic.stiffness_n * elastic.expansion_per_k * rise_k.abs();
        let (mut low, mut high) = (before * 1e-6, 2.0 * (before + cold));
        for _ in 0..200 {
            let middle = f64::midpoint(low, high);
            if surplus(middle) < 0.0 { low = middle } else { high = middle }
        }
        Force::new(f64::midpoint(low, high))
    }
}

/// How a wire stretches.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Elastic {
    /// Modulus of elasticity times cross-section, in newtons.
    pub stiffness_n: f64,
    /// Thermal expansion in 1/K.
    pub expansion_per_k: f64,
}

/// Extra wire in metres of a bay with sag: 8S²/(3L), by the parabola.
pub fn extra_length_m(span_m: f64, sag_m: f64) -> f64 {
    8.0 * sag_m * sag_m / (3.0 * span_m)
}

/// The longest bay in metres with at most `sag_m` of sag: √(8HS/w), by the parabola.
pub fn longest_bay_m(weight_n_per_m: f64, tension: Force, sag_m: f64) -> f64 {
    (8.0 * tension.newtons() * sag_m / weight_n_per_m).sqrt()
}

/// How many equal bays a span needs when none may be longer than `longest_m`; at least 1.
///
/// A billionth of a bay over a whole number counts as nothing: 99.9 m in bays of 33.3 m are three, though the quotient
/// of the two binary numbers is a little above 3.
#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    reason = "a count of posts is small and positive"
)]
pub fn bays(span_m: f64, longest_m: f64) -> u32 {
    (span_m / longest_m - 1e-9).ceil().clamp(1.0, 1e6) as u32
}

/// The horizontal tension for a wanted sag: wL²/(8S), by the parabola.
pub fn tension_for_sag(weight_n_per_m: f64, span_m: f64, sag_m: f64) -> Force {
    Force::new(weight_n_per_m * span_m * span_m / (8.0 * sag_m))
}

/// Sag in metres after warming by `rise_k` without elasticity: the wire's length grows by α·ΔT and the parabola's length
/// formula is turned round. A real wire relaxes and sags a little less. 0 when cooling takes up all the slack.
pub fn sag_after_warming_m(span_m: f64, sag_cold_m: f64, expansion_per_k: f64, rise_k: f64) -> f64 {
    let length = (span_m + extra_length_m(span_m, sag_cold_m)) * (1.0 + expansion_per_k * rise_k);
    ((length - span_m).max(0.0) * 3.0 * span_m / 8.0).sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::physics::wire::{area_m2, weight_n_per_m};

    #[test]
    fn a_tight_copper_wire_pulls_hard_in_the_cold() {
        // 176 m of 1.63 mm copper strung at 50 N: in 6 bays 72 N at −20 K and 119 N at −40 K; in 8 bays 88 and 157 N.
        let diameter = 1.628e-3;
        let elastic = Elastic {
            stiffness_n: COPPER_MODULUS_PA * area_m2(diameter),
            expansion_per_k: COPPER_EXPANSION_PER_K,
        };
        for (bays, rise, expected) in
            [(6.0, -20.0, 72.0), (6.0, -40.0, 119.0), (8.0, -20.0, 88.0), (8.0, -40.0, 157.0)]
        {
            let span = Span {
                weight_n_per_m: weight_n_per_m(8960.0, diameter),
                length_m: 176.0 / bays,
                tension: Force::new(50.0),
            };
            let after = span.tension_after(elastic, rise).newtons();
            assert!(
                (after - expected).abs() < 1.0,
                "{bays} bays, {rise} K: {after} N instead of {expected} N"
            );
        }
    }

    #[test]
    fn no_change_of_temperature_no_change_of_tension() {
        let span = Span { weight_n_per_m: 0.18, length_m: 30.0, tension: Force::new(50.0) };
        let elastic = Elastic { stiffness_n: 2.4e5, expansion_per_k: 17e-6 };
        assert!((span.tension_after(elastic, 0.0).newtons() - 50.0).abs() < 1e-9);
        assert!(span.tension_after(elastic, 30.0).newtons() < 50.0);
    }

    #[test]
    fn one_bay_at_least_and_none_too_long() {
        assert_eq!(bays(10.0, 33.0), 1);
        assert_eq!(bays(66.0, 33.0), 2);
        assert_eq!(bays(66.1, 33.0), 3);
        assert_eq!(bays(99.9, 33.3), 3);
    }
}
