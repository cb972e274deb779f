//! How fast the electrical engine is. Run with `cargo bench --bench radio`.

use arraywright::radio::{
    Array, Correlation, ElementKind, ErrorSize, Position, Quotient, RadioElement, Response, Sampling, Soil,
    SphereRule, Termination, delay_curve, delay_factor, directivity, monte_carlo, plain_rdf_db, report_of,
};
use arraywright::units::{Diameter, Frequency, Length};
use divan::{Bencher, black_box};
use num_complex::Complex64;
use rayon::prelude::*;

fn main() {
    divan::main();
}

const STAGGER_M: f64 = 18.288;

/// Layouts of four elements.
#[derive(Clone, Copy, Debug)]
enum Layout {
    FourVerticals,
    TwoEchelonPairs,
    FourWires,
}

const WIRES: [Layout; 2] = [Layout::TwoEchelonPairs, Layout::FourWires];
const ALL: [Layout; 3] = [Layout::FourVerticals, Layout::TwoEchelonPairs, Layout::FourWires];

fn frequency() -> Frequency {
    Frequency::from_mhz(1.83)
}

fn elements(layout: Layout) -> Vec<RadioElement> {
    let wire = ElementKind::LowWire {
        length: Length::from_mm(176_000),
        height: Length::from_mm(3_000),
        diameter: Diameter::from_um(1_600),
        termination: Termination::Matched,
    };
    let vertical = ElementKind::ShortVertical { height: Length::from_mm(6_000) };
    let (kind, places) = match layout {
        Layout::FourVerticals => {
            (vertical, [(0.0, -60.96), (STAGGER_M, -60.96), (0.0, 60.96), (STAGGER_M, 60.96)])
        }
        Layout::TwoEchelonPairs => (wire, [(0.0, -63.2), (STAGGER_M, -58.6), (0.0, 58.6), (STAGGER_M, 63.2)]),
        Layout::FourWires => (wire, [(0.0, -91.44), (0.0, -30.48), (0.0, 30.48), (0.0, 91.44)]),
    };
    places
        .map(|(forward_m, right_m)| RadioElement { position: Position { forward_m, right_m }, kind })
        .to_vec()
}

/// Crossfire weights of two pairs, or equal ones for a plain row.
fn weights(layout: Layout, ratio: f64) -> Vec<Complex64> {
    let rear = -delay_factor(frequency(), ratio * STAGGER_M);
    match layout {
        Layout::FourVerticals | Layout::TwoEchelonPairs => vec![rear, Complex64::ONE, rear, Complex64::ONE],
        Layout::FourWires => vec![Complex64::ONE; 4],
    }
}

fn response(layout: Layout) -> Response {
    Response::new(&elements(layout), Soil::AVERAGE, frequency()).expect("a legal array")
}

/// One RDF evaluation with new weights, the matrix being there: 256 a turn.
#[divan::bench(args = ALL, counters = [divan::counter::ItemsCount::new(256_u32)])]
fn rdf_with_matrix(bencher: Bencher<'_, '_>, layout: Layout) {
    let quotient = response(layout).quotient(20.0);
    let many: Vec<Vec<Complex64>> = (0..256).map(|i| weights(layout, 0.4 + f64::from(i) / 500.0)).collect();
    bencher.bench_local(|| {
        many.iter().map(|weights| quotient.rdf_db(black_box(weights))).fold(f64::NEG_INFINITY, f64::max)
    });
}

/// One RDF evaluation with the matrix built afresh.
#[divan::bench(args = ALL)]
fn rdf_with_new_matrix(bencher: Bencher<'_, '_>, layout: Layout) {
    let (elements, weights) = (elements(layout), weights(layout, 0.94));
    bencher.bench_local(|| {
        let quotient =
            Quotient::build(black_box(&elements), Soil::AVERAGE, frequency(), 20.0).expect("a legal array");
        quotient.rdf_db(&weights)
    });
}

/// RDF evaluations on every core: 65 536 weight vectors against one matrix.
#[divan::bench(args = ALL, sample_count = 20, counters = [divan::counter::ItemsCount::new(65_536_u32)])]
fn rdf_with_matrix_on_every_core(bencher: Bencher<'_, '_>, layout: Layout) {
    let quotient = response(layout).quotient(20.0);
    let many: Vec<Vec<Complex64>> =
        (0..65_536).map(|i| weights(layout, 0.4 + f64::from(i) / 120_000.0)).collect();
    bencher.bench_local(|| {
        let rdf = many.par_iter().map(|weights| quotient.rdf_db(black_box(weights)));
        rdf.reduce(|| f64::NEG_INFINITY, f64::max)
    });
}

/// 256 RDF evaluations on every core, each with its matrix built afresh.
#[divan::bench(args = ALL, sample_count = 20, counters = [divan::counter::ItemsCount::new(256_u32)])]
fn rdf_with_new_matrix_on_every_core(bencher: Bencher<'_, '_>, layout: Layout) {
    let (elements, weights) = (elements(layout), weights(layout, 0.94));
    bencher.bench_local(|| {
        let one = |_| {
            let quotient = Quotient::build(black_box(&elements), Soil::AVERAGE, frequency(), 20.0);
            quotient.expect("a legal array").rdf_db(&weights)
        };
        (0..256).into_par_iter().map(one).reduce(|| f64::NEG_INFINITY, f64::max)
    });
}

/// The same number by plain quadrature, 32 by 180 directions, every element evaluated in each.
#[divan::bench(args = ALL, sample_count = 20)]
fn rdf_by_plain_quadrature(bencher: Bencher<'_, '_>, layout: Layout) {
    let (response, weights) = (response(layout), weights(layout, 0.94));
    bencher.bench_local(|| plain_rdf_db(black_box(&response), &weights, 20.0, SphereRule::FULL));
}

/// The same number by a full matrix rule, 32 by 180 directions.
#[divan::bench(args = WIRES, sample_count = 20)]
fn matrix_by_full_rule(bencher: Bencher<'_, '_>, layout: Layout) {
    let elements = elements(layout);
    bencher.bench_local(|| {
        Correlation::by_rule(black_box(&elements), Soil::AVERAGE, frequency(), SphereRule::FULL)
    });
}

/// Preparing an array: forward column, one element alone, matrix.
#[divan::bench(args = ALL)]
fn prepare(bencher: Bencher<'_, '_>, layout: Layout) {
    let elements = elements(layout);
    bencher.bench_local(|| Response::new(black_box(&elements), Soil::AVERAGE, frequency()));
}

/// All figures of one array, the rear grid built afresh.
#[divan::bench(args = ALL)]
fn figures(bencher: Bencher<'_, '_>, layout: Layout) {
    let weights = weights(layout, 0.94);
    bencher.bench_local(|| directivity(&response(black_box(layout)), &weights));
}

/// 1000 draws.
#[divan::bench(args = ALL, sample_count = 20)]
fn thousand_draws(bencher: Bencher<'_, '_>, layout: Layout) {
    let (response, weights) = (response(layout), weights(layout, 0.94));
    bencher.bench_local(|| {
        monte_carlo(black_box(&response), &weights, ErrorSize::default(), Sampling::default())
    });
}

/// 61 delays.
#[divan::bench(args = ALL, sample_count = 20)]
fn delay_search(bencher: Bencher<'_, '_>, layout: Layout) {
    let response = response(layout);
    bencher.bench_local(|| delay_curve(black_box(&response), |ratio| weights(layout, ratio)));
}

/// Everything a pattern needs: figures, 1000 draws, both bounds, the delay curve, validity.
#[divan::bench(args = ALL, sample_count = 20)]
fn whole_report(bencher: Bencher<'_, '_>, layout: Layout) {
    let array = Array { elements: elements(layout), weights: weights(layout, 0.94) };
    bencher.bench_local(|| {
        let response = Response::new(&array.elements, Soil::AVERAGE, frequency()).expect("a legal array");
        let report = report_of(black_box(&response), &array, &ErrorSize::default());
        (report, delay_curve(&response, |ratio| weights(layout, ratio)))
    });
}
