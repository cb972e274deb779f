//! Tables of the trade handbook that were computed beforehand, by an independent implementation of the same method.

use arraywright::radio::{RadioElement, Response, Soil, delay_factor, directivity};
use num_complex::Complex64;

use crate::pattern_cases::Differences;
use crate::support::{crossfire, mhz, vertical, wire};

const STEP_M: f64 = 18.3;

#[test]
fn two_verticals_over_perfect_ground_at_20_degrees() {
    // delay over step, RDF, signal over one element at its best, rear at 20° over forward at 20°
    let table = [
        (1.22, 7.88, 2.2, Some(-17.0)),
        (1.0, 8.31, 1.5, Some(-29.0)),
        (0.94, 8.43, 1.2, None),
        (0.5, 9.15, -0.8, Some(-10.0)),
    ];
    let elements = [vertical(0.0, 0.0, 6.0), vertical(STEP_M, 0.0, 6.0)];
    let response = Response::new(&elements, Soil::Perfect, mhz(1.83)).expect("a legal array");
    let best = response.power(&[Complex64::ONE, Complex64::ZERO], 0.0, 0.0);
    let mut differences = Differences::default();
    for (ratio, rdf, signal, rear) in table {
        let weights = crossfire(mhz(1.83), ratio * STEP_M);
        let front = response.power(&weights, 0.0, 20.0);
        differences.check(&format!("RDF at {ratio}"), response.quotient(20.0).rdf_db(&weights), rdf, 0.006);
        differences.check(&format!("signal at {ratio}"), 10.0 * (front / best).log10(), signal, 0.06);
        let back = 10.0 * (response.power(&weights, 180.0, 20.0) / front).log10();
        match rear {
            Some(rear) => differences.check(&format!("rear at {ratio}"), back, rear, 0.6),
            None => assert!(back < -50.0, "no null at {ratio}: {back}"),
        }
    }
    let aligned = [Complex64::ONE, delay_factor(mhz(1.83), STEP_M)];
    differences.check("RDF in phase", response.quotient(20.0).rdf_db(&aligned), 4.96, 0.006);
    differences.none();
}

fn line(xs: &[f64]) -> Vec<RadioElement> {
    xs.iter().map(|x| vertical(*x, 0.0, 6.0)).collect()
}

/// Crossfire weights by row: rear rows delayed, signs alternating, given the row (0 front) and amplitude of each element.
fn rows(step_m: f64, ratio: f64, legs: &[(i32, f64)]) -> Vec<Complex64> {
    legs.iter().map(|&(row, a)| a * (-delay_factor(mhz(1.83), ratio * step_m)).powi(row)).collect()
}

type Table = [(f64, f64, f64); 5];

fn compare(name: &str, elements: &[RadioElement], weights: impl Fn(f64) -> Vec<Complex64>, table: Table) {
    let response = Response::new(elements, Soil::AVERAGE, mhz(1.83)).expect("a legal array");
    let mut differences = Differences::default();
    for (ratio, rdf, rear) in table {
        let found = directivity(&response, &weights(ratio));
        differences.check(&format!("{name} RDF at {ratio}"), found.at[2].rdf_db, rdf, 0.06);
        differences.check(&format!("{name} rear at {ratio}"), found.worst_rear.level_db, rear, 0.06);
    }
    differences.none();
}

#[test]
fn echelon_wires_against_the_delay() {
    let elements = [wire(0.0, 2.3, 176.0, 2.5), wire(STEP_M, -2.3, 176.0, 2.5)];
    let table = [
        (1.0, 11.9, -13.7),
        (0.94, 11.9, -13.9),
        (0.8, 12.1, -14.3),
        (0.65, 12.2, -14.8),
        (0.5, 12.3, -15.0),
    ];
    compare("echelon", &elements, |ratio| rows(STEP_M, ratio, &[(1, 1.0), (0, 1.0)]), table);
}

#[test]
fn a_pair_of_verticals_against_the_delay() {
    let table = [(1.0, 8.9, -5.2), (0.94, 9.0, -5.4), (0.8, 9.3, -6.2), (0.65, 9.7, -7.3), (0.5, 9.9, -8.7)];
    compare("pair", &line(&[0.0, STEP_M]), |ratio| rows(STEP_M, ratio, &[(1, 1.0), (0, 1.0)]), table);
}

#[test]
fn three_in_line_against_the_delay() {
    let table = [
        (1.0, 10.5, -10.2),
        (0.94, 10.7, -10.7),
        (0.8, 11.0, -12.3),
        (0.65, 11.4, -14.5),
        (0.5, 11.7, -17.4),
    ];
    let weights = |ratio| rows(20.0, ratio, &[(2, 1.0), (1, 2.0), (0, 1.0)]);
    compare("three in line", &line(&[0.0, 20.0, 40.0]), weights, table);
}

#[test]
fn a_square_against_the_delay() {
    let table =
        [(1.0, 11.7, -17.0), (0.94, 11.8, -16.8), (0.8, 12.1, -13.7), (0.65, 12.3, -10.8), (0.5, 12.4, -8.3)];
    let step = 24.4 / 2_f64.sqrt();
    let elements = [(-step, 0.0), (0.0, step), (0.0, -step), (step, 0.0)].map(|(x, y)| vertical(x, y, 6.0));
    compare("square", &elements, |ratio| rows(step, ratio, &[(2, 1.0), (1, 1.0), (1, 1.0), (0, 1.0)]), table);
}

#[test]
fn a_ring_of_six_against_the_delay() {
    let table = [(1.0, 8.6, -4.6), (0.94, 8.7, -4.9), (0.8, 9.1, -5.8), (0.65, 9.5, -7.0), (0.5, 9.8, -8.5)];
    let at = |deg: f64| vertical(18.0 * deg.to_radians().cos(), 18.0 * deg.to_radians().sin(), 6.0);
    let step = 36.0 * 30_f64.to_radians().cos();
    let elements = [150.0, 210.0, 30.0, 330.0].map(at);
    compare("ring", &elements, |ratio| rows(step, ratio, &[(1, 1.0), (1, 1.0), (0, 1.0), (0, 1.0)]), table);
}
