//! Tolerances: closed forms and drawn errors.
//!
//! Source of the numbers: an independent implementation (Python): closed form and pattern for single errors, 400 draws
//! for random ones. Drawn quantiles are compared within what 400 draws can tell.

use arraywright::radio::{
    ElementError, ErrorSize, RadioElement, Response, Sampling, Soil, delay_factor, directivity, line_error_m,
    monte_carlo, pair_null_floor_db, random_errors, single_error_limit,
};
use arraywright::units::VelocityFactor;
use num_complex::Complex64;
use rust_decimal::Decimal;

use crate::pattern_cases::Differences;
use crate::support::{crossfire, mhz, vertical, wire};

const STEP_M: f64 = 18.3;

fn pair() -> Response {
    average(&[vertical(0.0, 0.0, 6.0), vertical(STEP_M, 0.0, 6.0)])
}

fn average(elements: &[RadioElement]) -> Response {
    Response::new(elements, Soil::AVERAGE, mhz(1.83)).expect("a legal array")
}

#[test]
fn one_error_in_an_end_fire_pair() {
    // dB, degrees, floor for a delay of 9.15, 13 and 18.3 m
    let table = [
        (0.25, 0.0, [-30.48, -31.54, -32.75]),
        (0.5, 0.0, [-24.47, -25.53, -26.74]),
        (1.0, 0.0, [-18.49, -19.54, -20.74]),
        (0.0, 2.0, [-28.52, -29.63, -30.89]),
        (0.0, 5.0, [-20.13, -21.30, -22.63]),
        (0.0, 10.0, [-13.32, -14.62, -16.08]),
        (1.0, 10.0, [-11.83, -13.11, -14.55]),
    ];
    let response = pair();
    let mut differences = Differences::default();
    for (delay, column) in [9.15, 13.0, 18.3].into_iter().zip(0..) {
        let weights = crossfire(mhz(1.83), delay);
        for (amplitude_db, phase_deg, floors) in table {
            let error = ElementError { amplitude_db, phase_deg };
            let wrong = [weights[0] * error.factor(), weights[1]];
            // as the table: the take-off elevation with the error
            let take_off = directivity(&response, &wrong).peak_elevation_deg;
            let closed = pair_null_floor_db(mhz(1.83), STEP_M, delay, take_off, error);
            differences.check(
                &format!("{amplitude_db} dB {phase_deg}° at {delay} m"),
                closed,
                floors[column],
                0.03,
            );
            let null = (delay / STEP_M).acos().to_degrees();
            let forward = response.power(&wrong, 0.0, take_off) / one(&response, take_off);
            let residual = response.power(&wrong, 180.0, null) / one(&response, null);
            if null > 1.0 {
                let engine = 10.0 * (residual / forward).log10();
                differences.check(
                    &format!("pattern, {amplitude_db} dB {phase_deg}° at {delay} m"),
                    engine,
                    closed,
                    0.02,
                );
            }
        }
    }
    differences.none();
}

/// What one element hears at an elevation.
fn one(response: &Response, elevation: f64) -> f64 {
    response.power(&[Complex64::ONE, Complex64::ZERO], 0.0, elevation)
}

struct Layout {
    name: &'static str,
    elements: Vec<RadioElement>,
    weights: Vec<Complex64>,
}

fn three(y: f64) -> Vec<RadioElement> {
    [0.0, 21.336, 42.672].map(|x| vertical(x, y, 6.0)).to_vec()
}

fn three_weights() -> Vec<Complex64> {
    let lag = delay_factor(mhz(1.83), 24.0 / 360.0 * mhz(1.83).wavelength_m());
    vec![lag * lag, -1.8 * lag, Complex64::ONE]
}

fn layouts() -> Vec<Layout> {
    let lone_pair = [vertical(0.0, 0.0, 6.0), vertical(STEP_M, 0.0, 6.0)];
    let corner = 24.0 / 2_f64.sqrt();
    let square =
        [(-corner, 0.0), (0.0, corner), (0.0, -corner), (corner, 0.0)].map(|(x, y)| vertical(x, y, 6.0));
    let lag = -delay_factor(mhz(1.83), 12.0);
    vec![
        Layout { name: "pair 9.15", elements: lone_pair.to_vec(), weights: crossfire(mhz(1.83), 9.15) },
        Layout { name: "pair 15.5", elements: lone_pair.to_vec(), weights: crossfire(mhz(1.83), 15.5) },
        Layout { name: "three", elements: three(0.0), weights: three_weights() },
        Layout {
            name: "square",
            elements: square.to_vec(),
            weights: vec![lag * lag, lag, lag, Complex64::ONE],
        },
        Layout {
            name: "two threes",
            elements: [three(0.0), three(121.92)].concat(),
            weights: [three_weights(), three_weights()].concat(),
        },
    ]
}

type Drawn = (&'static str, f64, f64, f64, f64, f64, f64, f64, f64);

/// The table was drawn on a grid of 2°, so its forward maxima stand up to a degree aside: 0.08 dB of floor, 0.03 of rear.
///
/// Layout, dB, degrees, floor, RDF loss by formula and drawn, worst rear without errors, drawn median and 90 %.
const DRAWN: [Drawn; 11] = [
    ("pair 9.15", 0.5, 2.0, -20.08, 0.094, 0.079, -8.74, -8.16, -7.31),
    ("pair 9.15", 1.0, 5.0, -13.44, 0.402, 0.346, -8.74, -6.95, -4.53),
    ("pair 15.5", 0.5, 2.0, -21.76, 0.051, 0.052, -5.93, -5.83, -5.35),
    ("pair 15.5", 1.0, 5.0, -15.13, 0.226, 0.132, -5.93, -5.75, -4.68),
    ("three", 0.25, 1.0, -22.71, 0.102, 0.105, -14.28, -13.98, -10.60),
    ("three", 0.5, 2.0, -16.69, 0.388, 0.372, -14.28, -13.47, -7.84),
    ("three", 1.0, 5.0, -10.06, 1.463, 1.477, -14.28, -9.82, -2.61),
    ("square", 0.5, 2.0, -17.78, 0.322, 0.303, -11.92, -10.80, -6.92),
    ("square", 1.0, 5.0, -11.15, 1.252, 1.291, -11.92, -8.62, -2.78),
    ("two threes", 0.5, 2.0, -19.70, 0.430, 0.409, -16.79, -15.42, -11.22),
    ("two threes", 1.0, 5.0, -13.07, 1.648, 1.586, -16.79, -10.60, -5.61),
];

#[test]
fn random_errors_by_formula_and_by_drawing() {
    let layouts = layouts();
    let mut differences = Differences::default();
    for (name, amplitude_db, phase_deg, floor, loss, _, rear, median, high) in DRAWN {
        let Layout { elements, weights, .. } =
            layouts.iter().find(|layout| layout.name == name).expect("a layout");
        let response = average(elements);
        let size = ErrorSize { amplitude_db, phase_deg };
        let closed = random_errors(&response, weights, size);
        let label = format!("{name} {amplitude_db} dB {phase_deg}°");
        differences.check(&format!("{label} floor"), closed.rear_floor_db, floor, 0.08);
        differences.check(&format!("{label} loss"), closed.rdf_loss_db, loss, 0.008);
        let nominal = directivity(&response, weights);
        differences.check(&format!("{label} rear"), nominal.worst_rear.level_db, rear, 0.04);
        let spread = monte_carlo(&response, weights, size, Sampling::default());
        // the standard error of a quantile of 400 draws grows with the spread
        let width = (spread.worst_rear_db.p90 - spread.worst_rear_db.p10).abs();
        differences.check(&format!("{label} median"), spread.worst_rear_db.p50, median, 0.05 + 0.15 * width);
        differences.check(&format!("{label} 90 %"), spread.worst_rear_db.p90, high, 0.05 + 0.2 * width);
        assert!(spread.rdf_db.p10 < spread.rdf_db.p50 && spread.rdf_db.p50 < spread.rdf_db.p90);
        assert!(spread.rdf_db.p50 < nominal.rdf_db + 0.1, "{label}");
    }
    differences.none();
}

#[test]
fn mean_loss_of_directivity_agrees_with_drawing() {
    let layouts = layouts();
    for (name, amplitude_db, phase_deg, _, loss, drawn, _, _, _) in DRAWN {
        let Layout { elements, weights, .. } =
            layouts.iter().find(|layout| layout.name == name).expect("a layout");
        let response = average(elements);
        let size = ErrorSize { amplitude_db, phase_deg };
        let spread = monte_carlo(&response, weights, size, Sampling { draws: 2000, seed: 7 });
        let lost = directivity(&response, weights).rdf_db - spread.rdf_db.p50;
        // the median loses a little less than the mean, and 400 draws tell the mean to some hundredths of a dB
        assert!(
            lost < loss.max(drawn) + 0.1 && lost > 0.4 * loss.min(drawn) - 0.06,
            "{name} {amplitude_db}: {lost}"
        );
    }
}

#[test]
fn coupling_weakens_the_wires_and_their_sum_alike_and_leaves_the_floor() {
    // the table's −21.86 and −15.23 are for the same pair without coupling
    let response = average(&[wire(0.0, -2.286, 176.0, 3.0), wire(18.288, 2.286, 176.0, 3.0)]);
    let weights = crossfire(mhz(1.83), 0.95 * 18.288);
    for (amplitude_db, phase_deg, wanted) in [(0.5, 2.0, -21.86), (1.0, 5.0, -15.23)] {
        let floor = random_errors(&response, &weights, ErrorSize { amplitude_db, phase_deg }).rear_floor_db;
        assert!((floor - wanted).abs() < 0.15, "{floor}");
    }
    let spread = monte_carlo(
        &response,
        &weights,
        ErrorSize { amplitude_db: 1.0, phase_deg: 5.0 },
        Sampling::default(),
    );
    // each wire rejects the rear by itself, so the spread is narrow: without coupling 1.4 dB from median to 90 %
    assert!(spread.worst_rear_db.p90 - spread.worst_rear_db.p50 < 2.0, "{spread:?}");
}

#[test]
fn the_same_seed_gives_the_same_bytes_whatever_the_threads() {
    let response = pair();
    let weights = crossfire(mhz(1.83), 9.15);
    let draw = |threads: usize, seed: u64| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().expect("a pool");
        pool.install(|| monte_carlo(&response, &weights, ErrorSize::default(), Sampling { draws: 500, seed }))
    };
    assert_eq!(draw(1, 1), draw(3, 1));
    assert_ne!(draw(1, 1), draw(1, 2));
}

#[test]
fn no_error_no_spread() {
    let response = pair();
    let weights = crossfire(mhz(1.83), 9.15);
    let none = ErrorSize { amplitude_db: 0.0, phase_deg: 0.0 };
    let spread = monte_carlo(&response, &weights, none, Sampling { draws: 60, seed: 3 });
    let found = directivity(&response, &weights);
    for value in [spread.rdf_db.p10, spread.rdf_db.p50, spread.rdf_db.p90] {
        assert!((value - found.rdf_db).abs() < 1e-9);
    }
    for value in [spread.worst_rear_db.p10, spread.worst_rear_db.p90] {
        assert!((value - found.worst_rear.level_db).abs() < 1e-9);
    }
}

#[test]
fn the_largest_single_error_is_where_the_closed_form_meets_the_wanted_rejection() {
    let response = pair();
    let weights = crossfire(mhz(1.83), 9.15);
    let limit = single_error_limit(&response, &weights, 0, 20.0);
    let take_off = directivity(&response, &weights).peak_elevation_deg;
    let floor = |amplitude_db: f64, phase_deg: f64| {
        pair_null_floor_db(mhz(1.83), STEP_M, 9.15, take_off, ElementError { amplitude_db, phase_deg })
    };
    let worst_phase = floor(0.0, limit.phase_deg).max(floor(0.0, -limit.phase_deg));
    let worst_amplitude = floor(limit.amplitude_db, 0.0).max(floor(-limit.amplitude_db, 0.0));
    assert!((worst_phase - -20.0).abs() < 0.05, "{worst_phase} at {}", limit.phase_deg);
    assert!((worst_amplitude - -20.0).abs() < 0.05, "{worst_amplitude} at {}", limit.amplitude_db);
    let stricter = single_error_limit(&response, &weights, 0, 26.0);
    assert!((limit.phase_deg / stricter.phase_deg - 2.0).abs() < 0.15);
    assert!(stricter.amplitude_db < limit.amplitude_db);
}

#[test]
fn an_element_without_weight_may_be_as_wrong_as_it_likes() {
    let weights = [Complex64::ZERO, Complex64::ONE];
    let limit = single_error_limit(&pair(), &weights, 0, 20.0);
    assert!((limit.phase_deg - 90.0).abs() < 1e-9 && (limit.amplitude_db - 10.0).abs() < 1e-9);
}

#[test]
fn a_tenth_of_a_metre_of_cable_in_degrees() {
    let table = [(1.83, 0.33, 0.26), (3.65, 0.66, 0.52), (7.1, 1.29, 1.00)];
    for (f, solid, foam) in table {
        for (vf, degrees) in [(66, solid), (85, foam)] {
            let vf = VelocityFactor::new(Decimal::new(vf, 2)).expect("below 1");
            let metres = line_error_m(mhz(f), degrees, vf);
            assert!((metres - 0.1).abs() < 0.002, "{f} MHz: {metres}");
        }
    }
}
