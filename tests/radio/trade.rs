//! Facts of the trade, tests/reference/trade.toml: common practice, no source, wide tolerances.

use arraywright::radio::{Directivity, RadioElement, Response, Soil, delay_factor, directivity};
use num_complex::Complex64;
use toml::{Table, Value};

use crate::support::{crossfire, equal, mhz, vertical, wire};

const FOOT_M: f64 = 0.3048;
/// 270 m wires, 3 m high, average ground, as the facts say.
const LENGTH_M: f64 = 270.0;
const HEIGHT_M: f64 = 3.0;
const STAGGER_M: f64 = 60.0 * FOOT_M;
const OFFSET_M: f64 = 15.0 * FOOT_M;

/// Facts about parts: they are checked where parts are counted.
const PARTS: [&str; 2] = ["cell-pair-parts", "four-wire-parts"];
/// Facts checked here.
const HERE: [&str; 12] = [
    "three-in-line-cell",
    "cell-pair-width",
    "wire-pair-width",
    "wire-pair-signal",
    "wire-pair-best-width",
    "echelon-gain",
    "echelon-rear",
    "echelon-offset",
    "echelon-lines",
    "crossfire-bandwidth",
    "echelon-pairs-broadside",
    "two-verticals",
];

fn facts() -> Vec<Table> {
    let file: Table = include_str!("../reference/trade.toml").parse().expect("the table parses");
    let list = file["fact"].as_array().expect("facts");
    list.iter().map(|fact| fact.as_table().expect("a table").clone()).collect()
}

fn fact(id: &str) -> Table {
    facts().into_iter().find(|fact| fact["id"].as_str() == Some(id)).unwrap_or_else(|| panic!("no fact {id}"))
}

fn number(value: &Value) -> f64 {
    value
        .as_float()
        .or_else(|| value.as_integer().map(|whole| f64::from(i32::try_from(whole).expect("small"))))
        .expect("a number")
}

fn expect(id: &str, key: &str) -> f64 {
    number(&fact(id)["expect"][key])
}

fn numbers(value: &Value) -> Vec<f64> {
    value.as_array().expect("a list").iter().map(number).collect()
}

#[test]
fn every_fact_has_its_check() {
    for fact in facts() {
        let id = fact["id"].as_str().expect("an id");
        assert!(HERE.contains(&id) || PARTS.contains(&id), "{id} is not checked");
    }
}

fn found(elements: &[RadioElement], weights: &[Complex64]) -> Directivity {
    let response = Response::new(elements, Soil::AVERAGE, mhz(1.83)).expect("a legal array");
    directivity(&response, weights)
}

/// A cell of three verticals 70 ft apart at `y` to the left.
fn cell(y: f64) -> Vec<RadioElement> {
    [0.0, 70.0, 140.0].map(|feet| vertical(feet * FOOT_M, y, 6.0)).to_vec()
}

/// The usual weights of such a cell: amplitudes 1, 1.8, 1, a lag of 24° a row, the middle inverted.
fn cell_weights() -> Vec<Complex64> {
    let lag = Complex64::cis(-24_f64.to_radians());
    vec![lag * lag, -1.8 * lag, Complex64::ONE]
}

fn single() -> Directivity {
    found(&[wire(0.0, 0.0, LENGTH_M, HEIGHT_M)], &equal(1))
}

fn wire_pair(width: f64) -> Directivity {
    found(&[wire(0.0, 0.0, LENGTH_M, HEIGHT_M), wire(0.0, width, LENGTH_M, HEIGHT_M)], &equal(2))
}

fn echelon(length: f64, offset: f64, ratio: f64) -> Directivity {
    let elements = [wire(0.0, 0.0, length, HEIGHT_M), wire(STAGGER_M, offset, length, HEIGHT_M)];
    found(&elements, &crossfire(mhz(1.83), ratio * STAGGER_M))
}

#[test]
fn three_in_line_cell() {
    let rdf = found(&cell(0.0), &cell_weights()).rdf_db;
    let wanted = expect("three-in-line-cell", "rdf_db");
    assert!((rdf - wanted).abs() <= expect("three-in-line-cell", "tolerance"), "{rdf}");
}

#[test]
fn two_cells_abreast_by_width() {
    let fact = fact("cell-pair-width");
    let weights = [cell_weights(), cell_weights()].concat();
    for (feet, wanted) in numbers(&fact["widths_ft"]).into_iter().zip(numbers(&fact["expect"]["rdf_db"])) {
        let rdf = found(&[cell(0.0), cell(feet * FOOT_M)].concat(), &weights).rdf_db;
        assert!(
            (rdf - wanted).abs() <= number(&fact["expect"]["tolerance"]),
            "{feet} ft: {rdf}, wanted {wanted}"
        );
    }
}

#[test]
fn two_wires_abreast_by_width() {
    let fact = fact("wire-pair-width");
    for (feet, wanted) in numbers(&fact["widths_ft"]).into_iter().zip(numbers(&fact["expect"]["rdf_gain_db"]))
    {
        let gain = wire_pair(feet * FOOT_M).rdf_db - single().rdf_db;
        assert!(
            (gain - wanted).abs() <= number(&fact["expect"]["tolerance"]),
            "{feet} ft: {gain}, wanted {wanted}"
        );
    }
}

#[test]
fn two_wires_abreast_bring_3_db_of_signal() {
    let gain = wire_pair(200.0 * FOOT_M).gain_rel_db;
    assert!(
        (gain - expect("wire-pair-signal", "gain_db")).abs() <= expect("wire-pair-signal", "tolerance"),
        "{gain}"
    );
}

#[test]
fn useful_width_of_two_wires_abreast() {
    let wavelength = mhz(1.83).wavelength_m();
    let widths: Vec<f64> = (32..=100).map(|percent| f64::from(percent) / 100.0).collect();
    let rdf: Vec<f64> = widths.iter().map(|width| wire_pair(width * wavelength).rdf_db).collect();
    let best = rdf.iter().copied().fold(f64::NEG_INFINITY, f64::max);
    let first = widths.iter().zip(&rdf).find(|(_, rdf)| **rdf >= best - 0.3).expect("the best itself").0;
    let wanted = expect("wire-pair-best-width", "wavelengths");
    assert!((first - wanted).abs() <= expect("wire-pair-best-width", "tolerance"), "{first}");
}

#[test]
fn an_echelon_pair_adds_directivity() {
    let gain = echelon(LENGTH_M, OFFSET_M, 0.94).rdf_db - single().rdf_db;
    assert!(
        (gain - expect("echelon-gain", "rdf_gain_db")).abs() <= expect("echelon-gain", "tolerance"),
        "{gain}"
    );
}

#[test]
fn an_echelon_pair_rejects_the_rear_and_better_with_a_little_less_delay() {
    let rear = |ratio| echelon(LENGTH_M, OFFSET_M, ratio).worst_rear.level_db;
    assert!(rear(1.0) <= single().worst_rear.level_db - 3.0);
    assert!(rear(0.9) < rear(1.0));
}

#[test]
fn the_sideways_distance_of_an_echelon_pair_may_shrink_without_loss() {
    let feet = numbers(&fact("echelon-offset")["expect"]["offsets_ft"]);
    let rdf = |feet: f64| echelon(LENGTH_M, feet * FOOT_M, 0.94).rdf_db;
    let loss = rdf(feet[1]) - rdf(feet[0]);
    // closer is even a little better; only a loss would contradict the fact
    assert!(
        loss <= expect("echelon-offset", "rdf_loss_db") + expect("echelon-offset", "tolerance"),
        "{loss}"
    );
}

#[test]
fn the_rear_wire_has_the_longer_line() {
    let elements = [wire(0.0, 0.0, LENGTH_M, HEIGHT_M), wire(STAGGER_M, OFFSET_M, LENGTH_M, HEIGHT_M)];
    let right = found(&elements, &crossfire(mhz(1.83), STAGGER_M));
    let wrong = found(&elements, &[-Complex64::ONE, delay_factor(mhz(1.83), STAGGER_M)]);
    assert!(right.rdf_db > wrong.rdf_db + 3.0, "{} against {}", right.rdf_db, wrong.rdf_db);
    assert!(right.front_to_back_db > 15.0);
}

#[test]
fn crossfire_keeps_its_rear_null_over_two_octaves() {
    let elements = [vertical(0.0, 0.0, 6.0), vertical(STAGGER_M, 0.0, 6.0)];
    for f in [1.83, 3.65, 7.1] {
        let frequency = mhz(f);
        assert!(STAGGER_M < 0.45 * frequency.wavelength_m());
        let response = Response::new(&elements, Soil::AVERAGE, frequency).expect("a legal array");
        let weights = crossfire(frequency, 0.94 * STAGGER_M);
        let back = |elevation: u32| response.power(&weights, 180.0, f64::from(elevation));
        let deepest = (5..=45).min_by(|a, b| back(*a).total_cmp(&back(*b))).expect("elevations");
        assert!((18..=22).contains(&deepest), "{f} MHz: null at {deepest}°");
        assert!(back(deepest) < 1e-3 * response.power(&weights, 0.0, 20.0));
    }
}

#[test]
fn two_echelon_pairs_abreast() {
    let pair = |y: f64| [wire(0.0, y, LENGTH_M, HEIGHT_M), wire(STAGGER_M, y + OFFSET_M, LENGTH_M, HEIGHT_M)];
    let elements = [pair(0.0), pair(400.0 * FOOT_M)].concat();
    let weights = [crossfire(mhz(1.83), 0.94 * STAGGER_M), crossfire(mhz(1.83), 0.94 * STAGGER_M)].concat();
    let rdf = found(&elements, &weights).rdf_db;
    assert!((expect("echelon-pairs-broadside", "wire_length_m") - LENGTH_M).abs() < 1e-9);
    assert!(rdf > expect("echelon-pairs-broadside", "rdf_db_more_than"), "{rdf}");
}

#[test]
fn two_verticals_make_a_cardioid_or_a_figure_of_eight() {
    let frequency = mhz(1.83);
    let close = [vertical(0.0, 0.0, 6.0), vertical(STAGGER_M, 0.0, 6.0)];
    let response = Response::new(&close, Soil::AVERAGE, frequency).expect("a legal array");
    let weights = crossfire(frequency, STAGGER_M);
    let at = |azimuth: f64| response.power(&weights, azimuth, 5.0);
    assert!(at(180.0) < 1e-3 * at(0.0) && at(90.0) > 0.1 * at(0.0) && at(90.0) < 0.5 * at(0.0));
    let half = frequency.wavelength_m() / 2.0;
    let wide = [vertical(0.0, 0.0, 6.0), vertical(0.0, half, 6.0)];
    let response = Response::new(&wide, Soil::AVERAGE, frequency).expect("a legal array");
    let at = |azimuth: f64| response.power(&equal(2), azimuth, 5.0);
    assert!((at(180.0) / at(0.0) - 1.0).abs() < 1e-9);
    assert!(at(90.0) < 1e-3 * at(0.0) && at(270.0) < 1e-3 * at(0.0));
}
