//! Preferred values of resistors.

use crate::units::Resistance;

/// The E24 series of one decade (IEC 60063, from memory).
const E24: [f64; 24] = [
    1.0, 1.1, 1.2, 1.3, 1.5, 1.6, 1.8, 2.0, 2.2, 2.4, 2.7, 3.0, 3.3, 3.6, 3.9, 4.3, 4.7, 5.1, 5.6, 6.2, 6.8,
    7.5, 8.2, 9.1,
];

/// The E24 value nearest to a resistance in ohms, ties to the smaller; `None` unless it is positive and finite.
pub fn nearest_e24(wanted: Resistance) -> Option<Resistance> {
    let ohms = wanted.ohms();
    if !ohms.is_finite() || ohms <= 0.0 {
        return None;
    }
    let decade = 10_f64.powf(ohms.log10().floor());
    let candidates = E24.iter().map(|value| value * decade).chain([10.0 * decade]);
    let nearest = candidates.min_by(|a, b| (a - ohms).abs().total_cmp(&(b - ohms).abs()))?;
    Some(Resistance::new((nearest * 1e6).round() / 1e6))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_nearest_value_may_be_in_the_next_decade() {
        let nearest = |ohms| nearest_e24(Resistance::new(ohms)).unwrap().ohms();
        assert!((nearest(467.6) - 470.0).abs() < 1e-9);
        assert!((nearest(97.0) - 100.0).abs() < 1e-9);
        assert!((nearest(7.4) - 7.5).abs() < 1e-9);
        assert_eq!(nearest_e24(Resistance::new(-3.0)), None);
    }
}
