//! Several earth rods bonded together.

use nalgebra::{DMatrix, DVector};

use super::earth::Rod;
use crate::units::{Length, Resistance, Resistivity};

/// Factors by which n rods, one rod length apart, fall short of a n-th of one rod (IEEE Std 142, "Grounding of Industrial
/// and Commercial Power Systems", from memory).
const FACTORS: [(u32, f64); 9] =
    [(1, 1.0), (2, 1.16), (3, 1.29), (4, 1.36), (8, 1.68), (12, 1.80), (16, 1.92), (20, 2.00), (24, 2.16)];

/// The factor F of R = F R1/n for rods at least one rod length apart in a line, hollow triangle, circle or square.
///
/// Linear in n between the tabulated numbers; `None` for no rods and for more than 24.
pub fn rod_factor(rods: u32) -> Option<f64> {
    let above = FACTORS.iter().position(|(n, _)| *n >= rods)?;
    let (high, high_factor) = FACTORS[above];
    if high == rods {
        return Some(high_factor);
    }
    let (low, low_factor) = FACTORS[above.checked_sub(1)?];
    Some(low_factor + (high_factor - low_factor) * f64::from(rods - low) / f64::from(high - low))
}

/// Resistance of n rods by the tabulated factor: F R1/n; `None` where there is no factor.
pub fn set_resistance(one_rod: Resistance, rods: u32) -> Option<Resistance> {
    Some(Resistance::new(rod_factor(rods)? * one_rod.ohms() / f64::from(rods)))
}

/// Resistance of equal rods at any places, bonded by a wire that itself is not counted.
///
/// Average-potential method: mutual resistances Rik, all rods at one volt, R I = 1, total 1/ΣI. Uniform soil, uniform
/// leakage along each rod; within 1 % of Dwight for two rods. `None` without rods or when two stand at one place.
pub fn array_resistance(rod: Rod, soil: Resistivity, places: &[(Length, Length)]) -> Option<Resistance> {
    let n = places.len();
    let distance = |i: usize, k: usize| {
        let (a, b) = (places[i], places[k]);
        (a.0 - b.0).metres().hypot((a.1 - b.1).metres())
    };
    let same_place = (0..n).any(|i| (0..i).any(|k| distance(i, k) <= 0.0));
    if n == 0 || same_place {
        return None;
    }
    let mutual = |i: usize, k: usize| {
        if i == k { rod.own_ohm(soil) } else { rod.mutual_ohm(soil, distance(i, k)) }
    };
    let currents = DMatrix::from_fn(n, n, mutual).lu().solve(&DVector::repeat(n, 1.0))?;
    Some(Resistance::new(currents.sum().recip()))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::units::Diameter;

    const ROD: Rod = Rod { length: Length::from_mm(2400), diameter: Diameter::from_um(16_000) };

    #[test]
    fn factors_between_the_tabulated_numbers() {
        assert!((rod_factor(6).unwrap() - 1.52).abs() < 1e-12);
        assert_eq!(rod_factor(0), None);
        assert_eq!(rod_factor(25), None);
        assert!((set_resistance(Resistance::new(85.0), 1).unwrap().ohms() - 85.0).abs() < 1e-12);
    }

    #[test]
    fn two_rods_agree_with_the_closed_series() {
        let soil = Resistivity::new(100.0);
        for spacing in [1200, 2400, 4800, 9600] {
            let places = [(Length::ZERO, Length::ZERO), (Length::from_mm(spacing), Length::ZERO)];
            let array = array_resistance(ROD, soil, &places).unwrap().ohms();
            let series = ROD.pair_resistance(soil, Length::from_mm(spacing)).ohms();
            assert!((array / series - 1.0).abs() < 0.002, "{spacing} mm");
        }
    }

    #[test]
    fn the_tabulated_factors_agree_with_rods_on_a_circle() {
        // Within 4 % up to 20 rods. The table's 2.16 for 24 rods jumps away from its own trend: the circle gives 2.00.
        let one = ROD.own_ohm(Resistivity::new(100.0));
        for (rods, factor) in FACTORS.into_iter().filter(|(rods, _)| (2..=20).contains(rods)) {
            let radius = 1.2 / (std::f64::consts::PI / f64::from(rods)).sin();
            let place = |index: u32| {
                let (sin, cos) = (std::f64::consts::TAU * f64::from(index) / f64::from(rods)).sin_cos();
                (Length::from_metres_nearest(radius * cos), Length::from_metres_nearest(radius * sin))
            };
            let places: Vec<_> = (0..rods).map(place).collect();
            let together = array_resistance(ROD, Resistivity::new(100.0), &places).unwrap().ohms();
            assert!((together / one * f64::from(rods) / factor - 1.0).abs() < 0.04, "{rods} rods");
        }
    }

    #[test]
    fn two_rods_at_one_place_are_refused() {
        let soil = Resistivity::new(100.0);
        assert_eq!(array_resistance(ROD, soil, &[]), None);
        assert_eq!(array_resistance(ROD, soil, &[(Length::ZERO, Length::ZERO); 2]), None);
    }
}
