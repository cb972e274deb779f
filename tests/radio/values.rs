//! Point values of the patterns, and the tables of bounds.
//!
//! Source of the numbers: an independent implementation (Python, numpy and scipy) of the same method; values marked
//! "reference" come from method-of-moments solutions (Burke & Poggio 1981).

use arraywright::radio::{
    Correlation, RadioElement, Response, Soil, SphereRule, Termination, delay_curve, delay_factor,
    directivity, realised_gain_dbi, reflection, vertical_field,
};
use arraywright::units::{Length, Resistance};
use num_complex::Complex64;

use crate::pattern_cases::Differences;
use crate::support::{crossfire, equal, mhz, vertical, wire, wire_ending};

fn near(value: Complex64, re: f64, im: f64, tolerance: f64) {
    assert!(
        (value.re - re).abs() < tolerance && (value.im - im).abs() < tolerance,
        "{value} is not {re} + {im}j"
    );
}

fn average(elements: &[RadioElement]) -> Response {
    Response::new(elements, Soil::AVERAGE, mhz(1.83)).expect("a legal array")
}

#[test]
fn ground_and_vertical_at_20_degrees() {
    let n2 = Soil::AVERAGE.index_squared(mhz(1.83)).expect("real soil");
    near(n2, 13.0, -49.112_304_85, 1e-6);
    let theta = 70_f64.to_radians();
    let ground = reflection(Some(n2), theta);
    near(ground.vertical, 0.457_281_159, -0.271_279_566, 1e-8);
    near(ground.horizontal, -0.925_474_437, 0.055_012_937, 1e-8);
    let field = vertical_field(mhz(1.83), Some(n2), Length::from_mm(6_000), theta);
    near(field, -4.104_097_618_5, 0.727_377_070_8, 1e-8);
}

#[test]
fn a_short_vertical_over_perfect_ground_has_three_times_the_average() {
    let response =
        Response::new(&[vertical(0.0, 0.0, 0.5)], Soil::Perfect, mhz(1.83)).expect("a legal array");
    let found = directivity(&response, &equal(1));
    assert!((found.rdf_db - 10.0 * 3_f64.log10()).abs() < 2e-4, "{}", found.rdf_db);
    assert!(found.peak_elevation_deg.abs() < 1e-9);
    assert!((found.beamwidth_deg - 360.0).abs() < 1e-9);
}

#[test]
fn a_lone_wire_at_20_degrees() {
    let response = average(&[wire(0.0, 0.0, 176.0, 3.0)]);
    // fields are for one volt behind the matched receiver: times 2 Z₀ gives them for a unit current at the feed
    let unit = 2.0
        * arraywright::radio::line_terms(mhz(1.83), Soil::AVERAGE.index_squared(mhz(1.83)), 3.0, 0.0008)
            .constants(mhz(1.83))
            .impedance;
    let at = |anticlockwise: f64| response.fields(-anticlockwise, 20.0)[0];
    near(unit * at(0.0).theta, 31.236_042_12, 6.192_417_77, 1e-6);
    near(unit * at(0.0).phi, 0.0, 0.0, 1e-9);
    near(unit * at(60.0).theta, -3.693_995_99, -5.036_631_68, 1e-6);
    near(unit * at(60.0).phi, -7.458_831_7, 7.084_831_4, 1e-6);
    near(unit * at(180.0).theta, -4.097_471_68, -1.688_152_37, 1e-6);
}

#[test]
fn a_coupled_pair_at_20_degrees() {
    let response = average(&[wire(0.0, -2.286, 176.0, 3.0), wire(18.288, 2.286, 176.0, 3.0)]);
    let ahead = response.fields(0.0, 20.0);
    near(ahead[0].theta, 0.023_819_23, 0.003_791_84, 1e-8);
    near(ahead[1].theta, 0.016_774_11, 0.018_157_46, 1e-8);
    let behind = response.fields(180.0, 20.0);
    near(behind[0].theta, -3.566_501_67e-3, -1.829_463_48e-4, 1e-11);
    near(behind[1].theta, -5.403_199_79e-3, 5.377_584_94e-4, 1e-11);
}

#[test]
fn a_pair_without_stagger_and_one_with_the_wires_listed_front_first_work() {
    let abreast = average(&[wire(0.0, -10.0, 176.0, 3.0), wire(0.0, 10.0, 176.0, 3.0)]);
    let fields = abreast.fields(0.0, 20.0);
    assert!((fields[0].theta - fields[1].theta).norm() < 1e-12, "two equal wires hear the same");
    let swapped = average(&[wire(18.288, 2.286, 176.0, 3.0), wire(0.0, -2.286, 176.0, 3.0)]);
    near(swapped.fields(0.0, 20.0)[1].theta, 0.023_819_23, 0.003_791_84, 1e-8);
}

#[test]
fn the_termination_moves_the_front_to_back_but_hardly_the_directivity() {
    let table = [
        (200.0, 10.54, 7.0),
        (300.0, 10.64, 11.0),
        (450.0, 10.59, 18.0),
        (560.0, 10.49, 24.0),
        (650.0, 10.40, 21.0),
        (800.0, 10.25, 15.0),
    ];
    let mut differences = Differences::default();
    for (ohms, rdf, front_to_back) in table {
        let termination = Termination::Total(Resistance::new(ohms));
        let response = average(&[wire_ending(0.0, 0.0, 176.0, 3.0, termination)]);
        let found = directivity(&response, &equal(1));
        differences.check(&format!("RDF at {ohms} ohm"), found.rdf_db, rdf, 0.03);
        differences.check(&format!("F/B at {ohms} ohm"), found.front_to_back_db, front_to_back, 0.6);
    }
    differences.none();
}

#[test]
fn realised_gain_of_one_wire() {
    let long = realised_gain_dbi(&average(&[wire(0.0, 0.0, 176.0, 3.0)]), &equal(1)).expect("a wire");
    assert!((long - -10.0).abs() < 0.06, "{long}");
    assert!((long - -10.2).abs() < 0.8, "{long} against the reference");
    let short = Response::new(&[wire(0.0, 0.0, 88.0, 3.0)], Soil::GOOD, mhz(1.83)).expect("a legal array");
    let short = realised_gain_dbi(&short, &equal(1)).expect("a wire");
    assert!((short - -16.3).abs() < 0.06, "{short}");
    assert!(realised_gain_dbi(&average(&[vertical(0.0, 0.0, 6.0)]), &equal(1)).is_none());
}

#[test]
fn matrix_of_verticals() {
    let in_line = |step: f64| [0.0, step, 2.0 * step].map(|x| vertical(x, 0.0, 6.0));
    let matrix =
        |step: f64| Correlation::new(&in_line(step), Soil::AVERAGE, mhz(1.83)).expect("a legal array");
    let (pair, three) = (matrix(18.3), matrix(21.336));
    assert!((pair.entry(0, 0).re - 5.865_942).abs() < 1e-6);
    let ratio = |matrix: &Correlation, j: usize| matrix.entry(0, j).re / matrix.entry(0, 0).re;
    assert!((ratio(&pair, 1) - 0.913_356).abs() < 6e-7);
    assert!((ratio(&three, 1) - 0.883_249).abs() < 6e-7);
    assert!((ratio(&three, 2) - 0.577_315).abs() < 6e-7);
}

#[test]
fn matrix_of_point_verticals_over_perfect_ground_has_a_closed_form() {
    // B_ij ~ sin x/x + cos x/x² − sin x/x³, 2/3 at x = 0
    let frequency = mhz(1.83);
    for (x, closed) in [(0.1, 0.665_334_05), (1.0, 0.540_302_31), (2.0, 0.236_949_83), (6.0, -0.018_604_27)] {
        let rho = x / frequency.wavenumber();
        let elements = [vertical(0.0, 0.0, 0.01), vertical(0.0, rho, 0.01)];
        let matrix = Correlation::new(&elements, Soil::Perfect, frequency).expect("a legal array");
        let ratio = matrix.entry(0, 1).re / matrix.entry(0, 0).re;
        assert!((ratio - closed * 1.5).abs() < 1e-6, "{x}: {ratio} is not {}", closed * 1.5);
    }
}

#[test]
fn matrix_of_wires() {
    let matrix = |elements: [RadioElement; 2]| {
        Correlation::by_rule(&elements, Soil::AVERAGE, mhz(1.83), SphereRule::FULL).expect("a legal array")
    };
    let abreast = matrix([wire(0.0, 0.0, 176.0, 3.0), wire(0.0, 121.92, 176.0, 3.0)]);
    let ratio = abreast.entry(0, 1) / abreast.entry(0, 0);
    near(ratio, 0.074_02, 0.0, 6e-6);
}

type Bounded = (&'static str, Vec<RadioElement>, [(f64, f64); 3]);

/// Layout, its elements, and (RDF, signal) for a loading of 0, 0.001 and 0.01.
fn rayleigh() -> [Bounded; 6] {
    let line = |xs: &[f64], y: f64| xs.iter().map(|x| vertical(*x, y, 6.0)).collect::<Vec<_>>();
    let twice = |xs: &[f64]| [line(xs, -60.96), line(xs, 60.96)].concat();
    let corner = 24.0 / 2_f64.sqrt();
    let square = [(-corner, 0.0), (0.0, corner), (0.0, -corner), (corner, 0.0)];
    let ring = (0..8)
        .map(|i| f64::from(i) * 45_f64.to_radians())
        .map(|a| vertical(25.0 * a.cos(), 25.0 * a.sin(), 6.0));
    let threes = [0.0, 21.336, 42.672];
    [
        ("pair", line(&[0.0, 18.3], 0.0), [(9.974, -4.02), (9.974, -4.00), (9.964, -3.78)]),
        ("three in line", line(&threes, 0.0), [(12.822, -10.93), (12.801, -10.35), (12.082, -6.58)]),
        (
            "square",
            square.map(|(x, y)| vertical(x, y, 6.0)).to_vec(),
            [(12.527, -8.09), (12.521, -7.74), (12.214, -5.31)],
        ),
        ("two pairs", twice(&[0.0, 18.3]), [(13.629, -0.12), (13.629, -0.09), (13.617, 0.18)]),
        ("two threes", twice(&threes), [(15.468, -7.70), (15.442, -6.84), (14.796, -1.88)]),
        ("ring of 8", ring.collect(), [(15.459, -28.76), (14.024, -11.65), (12.922, -2.80)]),
    ]
}

#[test]
fn largest_directivity_and_its_price() {
    let mut differences = Differences::default();
    for (name, elements, wanted) in rayleigh() {
        let response = average(&elements);
        let quotient = response.quotient(20.0);
        for (loading, (rdf, gain)) in [0.0, 0.001, 0.01].into_iter().zip(wanted) {
            let bound = quotient.bound(loading);
            differences.check(&format!("{name} at {loading}: RDF"), bound.rdf_db, rdf, 1e-3);
            // the table's signal is over one element at the same elevation
            let one = [Complex64::ONE]
                .into_iter()
                .chain(vec![Complex64::ZERO; elements.len() - 1])
                .collect::<Vec<_>>();
            let total: f64 = bound.weights.iter().map(Complex64::norm_sqr).sum();
            let signal = response.power(&bound.weights, 0.0, 20.0) / total / response.power(&one, 0.0, 20.0);
            differences.check(&format!("{name} at {loading}: gain"), 10.0 * signal.log10(), gain, 0.006);
        }
    }
    differences.none();
}

#[test]
fn buildable_weights_of_three_in_line_and_of_a_pair() {
    let three =
        average(&[0.0, 21.336, 42.672].map(|x| vertical(x, 0.0, 6.0))).quotient(20.0).bound(0.01).weights;
    // relative to the middle one, as the table has it
    let relative: Vec<Complex64> = three.iter().map(|weight| weight / three[1]).collect();
    near(relative[0], 0.5408 * 156.34_f64.to_radians().cos(), 0.5408 * 156.34_f64.to_radians().sin(), 1e-4);
    near(relative[2], 0.5408 * 156.34_f64.to_radians().cos(), -0.5408 * 156.34_f64.to_radians().sin(), 1e-4);
    let pair = average(&[0.0, 18.3].map(|x| vertical(x, 0.0, 6.0))).quotient(20.0).bound(0.01).weights;
    near(pair[0], 1.0, 0.0, 1e-9);
    assert!((pair[1].arg().to_degrees() - -163.30).abs() < 0.006, "{}", pair[1].arg().to_degrees());
}

#[test]
fn the_delay_curve_of_an_echelon_pair() {
    let frequency = mhz(1.83);
    let response = average(&[wire(0.0, -2.286, 176.0, 3.0), wire(18.288, 2.286, 176.0, 3.0)]);
    let curve = delay_curve(&response, |ratio| crossfire(frequency, ratio * 18.288));
    let table = [
        (0.4, 12.42, -12.8),
        (0.6, 12.33, -14.8),
        (0.7, 12.26, -14.5),
        (0.8, 12.19, -14.1),
        (1.0, 12.04, -13.3),
    ];
    let mut differences = Differences::default();
    for (ratio, rdf, rear) in table {
        let point =
            curve.points.iter().find(|point| (point.ratio - ratio).abs() < 1e-9).expect("a hundredth");
        differences.check(&format!("RDF at {ratio}"), point.rdf_db, rdf, 0.006);
        differences.check(&format!("rear at {ratio}"), point.worst_rear_db, rear, 0.06);
    }
    differences.none();
    assert_eq!(curve.points.len(), 61);
    assert!((0.55..=0.70).contains(&curve.best_rear.ratio), "{:?}", curve.best_rear);
    assert!((0.40..=0.50).contains(&curve.best_rdf.ratio), "{:?}", curve.best_rdf);
    let plateau = curve.rear_plateau;
    assert!(plateau.from_ratio <= curve.best_rear.ratio && curve.best_rear.ratio <= plateau.to_ratio);
    assert!(plateau.to_ratio - plateau.from_ratio > 0.05, "{plateau:?}");
}

#[test]
fn delays_within_reach_of_best_are_told_apart_from_the_rest() {
    let response = average(&[0.0, 18.3].map(|x| vertical(x, 0.0, 6.0)));
    let curve = delay_curve(&response, |ratio| crossfire(mhz(1.83), ratio * 18.3));
    for point in &curve.points {
        let inside = (curve.rdf_plateau.from_ratio..=curve.rdf_plateau.to_ratio).contains(&point.ratio);
        assert_eq!(inside, point.rdf_db >= curve.best_rdf.rdf_db - 0.1, "{point:?}");
    }
    assert!(delay_factor(mhz(1.83), 0.0) == Complex64::ONE);
}
