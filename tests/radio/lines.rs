//! Propagation constants and impedances of low wires.
//!
//! Source of the numbers: the same formulas evaluated by an independent implementation (Python); the reference column
//! comes from the currents of method-of-moments solutions (Burke & Poggio 1981).

use arraywright::radio::{Soil, line_terms, pair_constants};
use num_complex::Complex64;

use crate::pattern_cases::Differences;
use crate::support::mhz;

/// Frequency, soil, height, velocity factor, dB per 100 m, Z₀ of a wire of 0.8 mm radius.
const TABLE: [(f64, Soil, f64, f64, f64, f64, f64); 16] = [
    (1.83, Soil::POOR, 1.0, 0.9204, 2.477, 553.0, -13.0),
    (1.83, Soil::POOR, 2.0, 0.9497, 1.991, 575.0, -15.0),
    (1.83, Soil::POOR, 3.0, 0.9648, 1.698, 588.0, -15.0),
    (1.83, Soil::AVERAGE, 1.0, 0.9233, 1.791, 517.0, -16.0),
    (1.83, Soil::AVERAGE, 2.0, 0.9538, 1.394, 543.0, -14.0),
    (1.83, Soil::AVERAGE, 3.0, 0.9679, 1.149, 560.0, -12.0),
    (1.83, Soil::AVERAGE, 4.5, 0.9790, 0.911, 578.0, -10.0),
    (1.83, Soil::GOOD, 2.0, 0.9680, 0.899, 529.0, -11.0),
    (1.83, Soil::GOOD, 3.0, 0.9782, 0.699, 549.0, -9.0),
    (3.65, Soil::POOR, 2.0, 0.9764, 3.128, 568.0, -24.0),
    (3.65, Soil::AVERAGE, 3.0, 0.9844, 2.004, 556.0, -12.0),
    (3.65, Soil::GOOD, 1.0, 0.9582, 2.432, 494.0, -13.0),
    (7.1, Soil::AVERAGE, 3.0, 0.9976, 2.670, 551.0, -13.0),
    (7.1, Soil::POOR, 4.5, 1.0029, 1.804, 581.0, -23.0),
    (10.1, Soil::AVERAGE, 2.0, 0.9980, 4.222, 528.0, -16.0),
    (10.1, Soil::GOOD, 4.5, 0.9999, 1.422, 565.0, -4.0),
];

#[test]
fn velocity_loss_and_impedance_follow_height_soil_and_frequency() {
    let mut differences = Differences::default();
    for (f, soil, height, vf, loss, re, im) in TABLE {
        let frequency = mhz(f);
        let line = line_terms(frequency, soil.index_squared(frequency), height, 0.0008).constants(frequency);
        let name = format!("{f} MHz {soil:?} {height} m");
        differences.check(&format!("{name} VF"), line.velocity_factor(frequency), vf, 6e-5);
        differences.check(&format!("{name} dB/100 m"), line.attenuation_db_per_100m(), loss, 6e-4);
        differences.check(&format!("{name} Re Z0"), line.impedance.re, re, 0.6);
        differences.check(&format!("{name} Im Z0"), line.impedance.im, im, 0.6);
    }
    differences.none();
}

#[test]
fn the_formula_stays_near_the_currents_of_the_method_of_moments() {
    // height, soil, velocity factor, dB per 100 m of the reference at 1.83 MHz
    let reference = [
        (1.0, Soil::AVERAGE, 0.9197, 1.664),
        (2.0, Soil::POOR, 0.9383, 2.028),
        (2.0, Soil::AVERAGE, 0.9497, 1.303),
        (2.0, Soil::GOOD, 0.9665, 0.857),
        (3.0, Soil::POOR, 0.9536, 1.739),
        (3.0, Soil::AVERAGE, 0.9635, 1.072),
        (3.0, Soil::GOOD, 0.9762, 0.660),
    ];
    let frequency = mhz(1.83);
    for (height, soil, vf, loss) in reference {
        let line = line_terms(frequency, soil.index_squared(frequency), height, 0.0008).constants(frequency);
        assert!((line.velocity_factor(frequency) - vf).abs() < 0.0125, "{height} m {soil:?}");
        assert!((line.attenuation_db_per_100m() / loss - 1.0).abs() < 0.08, "{height} m {soil:?}");
    }
}

#[test]
fn two_wires_have_an_even_and_an_odd_mode() {
    let frequency = mhz(1.83);
    let modes = pair_constants(frequency, Soil::AVERAGE.index_squared(frequency), 3.0, 0.0008, 4.572);
    let near = |value: Complex64, re: f64, im: f64, tolerance: f64| {
        assert!(
            (value.re - re).abs() < tolerance && (value.im - im).abs() < tolerance,
            "{value} is not {re} + {im}j"
        );
    };
    near(modes.single.gamma, 0.001_323, 0.039_624, 6e-7);
    near(modes.even.gamma, 0.002_357, 0.040_540, 6e-7);
    near(modes.odd.gamma, 0.000_137, 0.038_574, 6e-7);
    near(modes.single.impedance, 560.27, -12.16, 6e-3);
    near(modes.even.impedance, 605.46, -20.19, 6e-3);
    near(modes.odd.impedance, 515.14, -3.35, 6e-3);
}

#[test]
fn over_perfect_ground_only_the_skin_effect_is_left() {
    let frequency = mhz(1.83);
    let terms = line_terms(frequency, None, 3.0, 0.0008);
    assert_eq!((terms.earth_impedance, terms.earth_potential), (Complex64::ZERO, Complex64::ZERO));
    let line = terms.constants(frequency);
    assert!(line.velocity_factor(frequency) > 0.995);
    assert!(line.attenuation_db_per_100m() < 0.1);
}
