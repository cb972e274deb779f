//! Laws of physics that hold for every array.

use arraywright::radio::{
    Array, Correlation, Directivity, ElementKind, ErrorSize, RadioElement, RadioError, Response, Soil,
    SphereRule, Termination, azimuth_cut, directivity, elevation_cut, group, plain_rdf_db, report, turned_to,
    validity,
};
use arraywright::units::{Angle, Conductivity, Diameter, Frequency, Length, Resistance};
use num_complex::Complex64;
use proptest::prelude::*;
use proptest::test_runner::RngSeed;

use crate::support::{crossfire, equal, mhz, vertical, wire, wire_ending};

fn response(elements: &[RadioElement], soil: Soil) -> Response {
    Response::new(elements, soil, mhz(1.83)).expect("a legal array")
}

fn soils() -> impl Strategy<Value = Soil> {
    prop_oneof![Just(Soil::POOR), Just(Soil::AVERAGE), Just(Soil::GOOD)]
}

fn places(counts: std::ops::Range<usize>) -> impl Strategy<Value = Vec<(f64, f64)>> {
    prop::collection::vec((-60.0..60.0, -60.0..60.0), counts)
}

fn verticals(places: &[(f64, f64)]) -> Vec<RadioElement> {
    places.iter().map(|(x, y)| vertical(*x, *y, 6.0)).collect()
}

/// Wires far enough apart not to couple, each with a stagger of its own.
fn wires(staggers: &[f64]) -> Vec<RadioElement> {
    staggers.iter().zip(0..).map(|(x, row)| wire(*x, f64::from(row) * 61.0, 176.0, 3.0)).collect()
}

/// An echelon pair with another stagger and offset, twice abreast.
fn echelons(stagger: f64, offset: f64) -> Vec<RadioElement> {
    [0.0, 110.0]
        .into_iter()
        .flat_map(|y| [wire(0.0, y, 176.0, 3.0), wire(stagger, y + offset, 176.0, 3.0)])
        .collect()
}

fn weights_for(count: usize) -> impl Strategy<Value = Vec<Complex64>> {
    let weight = (0.3..1.0, 0.0..360.0_f64).prop_map(|(a, deg)| Complex64::from_polar(a, deg.to_radians()));
    prop::collection::vec(weight, count)
}

/// Unit weights, each `step` radians on.
fn phases(count: usize, step: f64) -> Vec<Complex64> {
    (0..count).zip(0_u32..).map(|(_, i)| Complex64::cis(f64::from(i) * step)).collect()
}

/// An array of any kind with weights.
fn arrays() -> impl Strategy<Value = (Vec<RadioElement>, Vec<Complex64>)> {
    let elements = prop_oneof![
        places(1..6).prop_map(|places| verticals(&places)),
        prop::collection::vec(-30.0..30.0, 1..4).prop_map(|staggers| wires(&staggers)),
        (0.0..40.0, 2.0..20.0).prop_map(|(stagger, offset)| echelons(stagger, offset)),
    ];
    elements.prop_flat_map(|elements| {
        let count = elements.len();
        (Just(elements), weights_for(count))
    })
}

fn mirrored(elements: &[RadioElement]) -> Vec<RadioElement> {
    let mut mirrored = elements.to_vec();
    for element in &mut mirrored {
        element.position.right_m = -element.position.right_m;
    }
    mirrored
}

fn near(a: f64, b: f64, tolerance: f64) -> bool {
    (a - b).abs() <= tolerance
}

/// Levels in dB agree where either can be heard at all.
fn same(a: &Directivity, b: &Directivity) -> bool {
    let level = |db: f64| 10_f64.powf(db / 20.0);
    near(a.rdf_db, b.rdf_db, 1e-6)
        && near(a.peak_elevation_deg, b.peak_elevation_deg, 1e-6)
        && near(a.beamwidth_deg, b.beamwidth_deg, 1e-4)
        && near(a.gain_rel_db, b.gain_rel_db, 1e-6)
        && near(level(a.worst_rear.level_db), level(b.worst_rear.level_db), 1e-7)
        && near(level(-a.front_to_back_db), level(-b.front_to_back_db), 1e-6)
}

fn settings(cases: u32) -> ProptestConfig {
    ProptestConfig {
        cases,
        failure_persistence: None,
        rng_seed: RngSeed::Fixed(20),
        ..ProptestConfig::default()
    }
}

proptest! {
    #![proptest_config(settings(24))]

    #[test]
    fn a_mirrored_array_has_the_mirrored_pattern((elements, weights) in arrays(), soil in soils(), azimuth in 0.0..360.0, elevation in 1.0..89.0) {
        let (plain, mirror) = (response(&elements, soil), response(&mirrored(&elements), soil));
        let there = plain.power(&weights, azimuth, elevation);
        prop_assert!(near(there / mirror.power(&weights, 360.0 - azimuth, elevation), 1.0, 1e-6));
        let (a, b) = (directivity(&plain, &weights), directivity(&mirror, &weights));
        prop_assert!(same(&a, &b), "{a:?}\n{b:?}");
    }

    #[test]
    fn directivity_never_exceeds_the_bound((elements, weights) in arrays(), soil in soils(), elevation in 5.0..60.0) {
        let quotient = response(&elements, soil).quotient(elevation);
        let bound = quotient.bound(0.0).rdf_db;
        prop_assert!(quotient.rdf_db(&weights) <= bound + 1e-9);
        prop_assert!(quotient.bound(0.01).rdf_db <= bound + 1e-9);
    }

    #[test]
    fn shifting_the_array_changes_no_figure((elements, weights) in arrays(), forward in -200.0..200.0, right in -200.0..200.0) {
        let mut shifted = elements.clone();
        for element in &mut shifted {
            element.position.forward_m += forward;
            element.position.right_m += right;
        }
        let (a, b) = (directivity(&response(&elements, Soil::AVERAGE), &weights), directivity(&response(&shifted, Soil::AVERAGE), &weights));
        prop_assert!(same(&a, &b), "{a:?}\n{b:?}");
    }

    #[test]
    fn order_and_scale_of_the_weights_change_no_figure((elements, weights) in arrays(), scale in 0.1..10.0, deg in 0.0..360.0_f64) {
        let reversed: Vec<RadioElement> = elements.iter().rev().copied().collect();
        let factor = Complex64::from_polar(scale, deg.to_radians());
        let scaled: Vec<Complex64> = weights.iter().rev().map(|weight| weight * factor).collect();
        let (a, b) = (directivity(&response(&elements, Soil::POOR), &weights), directivity(&response(&reversed, Soil::POOR), &scaled));
        prop_assert!(same(&a, &b), "{a:?}\n{b:?}");
    }

    #[test]
    fn turning_an_array_of_verticals_turns_its_pattern(places in places(2..6), turn in 0.0..360.0, azimuth in 0.0..360.0, elevation in 1.0..89.0, soil in soils()) {
        let elements = verticals(&places);
        let weights: Vec<Complex64> = phases(elements.len(), 2.1);
        let (plain, turned) = (response(&elements, soil), response(&turned_to(&elements, Angle::from_degrees(turn)), soil));
        let (a, b) = (plain.power(&weights, azimuth, elevation), turned.power(&weights, azimuth - turn, elevation));
        prop_assert!(near(a, b, 1e-9 * plain.power(&[Complex64::ONE], 0.0, elevation)), "{a} {b}");
        let (a, b) = (plain.correlation().average(&weights), turned.correlation().average(&weights));
        prop_assert!(near(a / b, 1.0, 1e-9));
        // turned there and back, looking the same way again, no figure changes
        let back = turned_to(&turned_to(&elements, Angle::from_degrees(turn)), Angle::from_degrees(-turn));
        prop_assert!(same(&directivity(&plain, &weights), &directivity(&response(&back, soil), &weights)));
    }

    #[test]
    fn two_coincident_halves_are_one_vertical(places in places(1..4), soil in soils()) {
        let elements = verticals(&places);
        let weights: Vec<Complex64> = phases(elements.len(), 1.3);
        let mut doubled = elements.clone();
        doubled.push(elements[0]);
        let mut halves = weights.clone();
        halves[0] *= 0.5;
        halves.push(halves[0]);
        let (a, b) = (directivity(&response(&elements, soil), &weights), directivity(&response(&doubled, soil), &halves));
        // gain_rel counts the weights, so it alone may differ
        let b = Directivity { gain_rel_db: a.gain_rel_db, ..b };
        prop_assert!(same(&a, &b), "{a:?}\n{b:?}");
        let bound = response(&doubled, soil).quotient(20.0).bound(0.0).rdf_db;
        prop_assert!(near(bound, response(&elements, soil).quotient(20.0).bound(0.0).rdf_db, 1e-3), "{bound}");
    }

    #[test]
    fn size_and_wavelength_together_change_nothing_over_perfect_ground(places in places(1..5), octaves in 1_u32..3) {
        let factor = f64::from(2_u32.pow(octaves));
        let small: Vec<RadioElement> = places.iter().map(|(x, y)| vertical(x / factor, y / factor, 8.0 / factor)).collect();
        let large: Vec<RadioElement> = places.iter().map(|(x, y)| vertical(*x, *y, 8.0)).collect();
        let weights: Vec<Complex64> = phases(places.len(), 1.7);
        let at = |elements: &[RadioElement], f: f64| {
            directivity(&Response::new(elements, Soil::Perfect, mhz(f)).expect("a legal array"), &weights)
        };
        let (a, b) = (at(&large, 1.83), at(&small, 1.83 * factor));
        prop_assert!(same(&a, &b), "{a:?}\n{b:?}");
    }

    #[test]
    fn two_alike_abreast_gain_3_db_of_signal(width in 50.0..300.0, length in 100.0..300.0, soil in soils()) {
        let rows = [0.0, width].map(|y| wire(0.0, y, length, 3.0));
        prop_assert!(near(directivity(&response(&rows, soil), &equal(2)).gain_rel_db, 20.0 * 2_f64.sqrt().log10(), 1e-9));
        let posts = [0.0, width].map(|y| vertical(0.0, y, 6.0));
        prop_assert!(near(directivity(&response(&posts, soil), &equal(2)).gain_rel_db, 20.0 * 2_f64.sqrt().log10(), 1e-9));
    }

    #[test]
    fn the_matrix_gives_what_plain_quadrature_gives((elements, weights) in arrays(), soil in soils()) {
        let response = response(&elements, soil);
        let plain = plain_rdf_db(&response, &weights, 20.0, SphereRule::FULL);
        prop_assert!(near(response.quotient(20.0).rdf_db(&weights), plain, 2e-4), "{} {plain}", response.quotient(20.0).rdf_db(&weights));
    }

    #[test]
    fn the_rule_for_the_extent_is_fine_enough((elements, weights) in arrays(), f in prop_oneof![Just(1.83), Just(3.65), Just(7.1), Just(10.1)], soil in soils()) {
        let fine = SphereRule { elevations: 96, azimuths: 512 };
        let found = Correlation::new(&elements, soil, mhz(f)).expect("a legal array").average(&weights);
        let wanted = Correlation::by_rule(&elements, soil, mhz(f), fine).expect("a legal array").average(&weights);
        prop_assert!((10.0 * (found / wanted).log10()).abs() < 2e-4, "{}", 10.0 * (found / wanted).log10());
    }
}

proptest! {
    #![proptest_config(settings(16))]

    #[test]
    fn absurd_dimensions_are_an_error_or_a_report_and_never_a_panic(
        sizes in prop::collection::vec((1..9_i32, 0..8_i32, -1..7_i32, 0..9_u32), 1..4),
        (f, sigma, permittivity) in (-3..9_i32, -9..9_i32, -3..5_i32),
    ) {
        let power = |exponent: i32| 10_f64.powi(exponent);
        let elements: Vec<RadioElement> = sizes
            .iter()
            .map(|&(length, height, diameter, place)| {
                let at = f64::from(place) * 17.0;
                let mut element = wire(at, 2.0 * at, 1.0, 1.0);
                element.kind = ElementKind::LowWire {
                    length: Length::from_metres_nearest(power(length - 3)),
                    height: Length::from_metres_nearest(power(height - 3)),
                    diameter: Diameter::from_um(Length::from_metres_nearest(power(diameter)).mm() / 1000),
                    termination: Termination::Matched,
                };
                if place % 3 == 0 { vertical(at, at, power(height - 2)) } else { element }
            })
            .collect();
        let soil = Soil::Real { conductivity: Conductivity::new(power(sigma)), permittivity: power(permittivity) };
        let array = Array { weights: equal(elements.len()), elements };
        if let Ok(found) = report(&array, soil, mhz(power(f - 3)), &ErrorSize::default()) {
            prop_assert!(found.bound.weights.len() == array.elements.len());
        }
    }
}

#[test]
fn a_pair_apart_less_than_50_m_is_coupled_and_one_further_apart_is_not() {
    let at = |y: f64| group(&[wire(0.0, 0.0, 176.0, 3.0), wire(18.0, y, 176.0, 3.0)]);
    assert_eq!(at(49.9).pairs, [(0, 1)]);
    assert!(at(50.0).pairs.is_empty() && at(50.0).uncovered.is_empty());
    assert_eq!(group(&echelons(18.0, 4.6)).pairs, [(0, 1), (2, 3)]);
}

#[test]
fn clusters_that_are_not_covered_are_said_and_computed_without_coupling() {
    let three: Vec<RadioElement> = [0.0, 30.0, 60.0].map(|y| wire(0.0, y, 176.0, 3.0)).to_vec();
    let uneven = [wire(0.0, 0.0, 176.0, 3.0), wire(18.0, 5.0, 176.0, 2.5)];
    let shifted = [wire(0.0, 0.0, 90.0, 3.0), wire(95.0, 5.0, 90.0, 3.0)];
    let in_line = [wire(0.0, 0.0, 176.0, 3.0), wire(18.0, 0.0, 176.0, 3.0)];
    for elements in [&three[..], &uneven, &shifted, &in_line] {
        let grouping = group(elements);
        assert!(grouping.pairs.is_empty() && grouping.uncovered.len() == 1, "{grouping:?}");
        let judged = validity(&response(elements, Soil::AVERAGE));
        assert!(!judged.valid && judged.why_not.expect("a reason").contains("without coupling"));
    }
}

#[test]
fn limits_of_the_method_are_said() {
    let judge = |elements: &[RadioElement], soil: Soil, f: f64| {
        validity(&Response::new(elements, soil, mhz(f)).expect("a legal array"))
    };
    let good = [wire(0.0, 0.0, 176.0, 3.0)];
    assert!(judge(&good, Soil::AVERAGE, 1.83).valid);
    let pair = [wire(0.0, 0.0, 176.0, 3.0), wire(9.0, 4.6, 176.0, 3.0)];
    assert!(judge(&pair, Soil::POOR, 1.83).valid);
    let bad = [
        (judge(&[wire(0.0, 0.0, 270.0, 6.0)], Soil::AVERAGE, 7.1), "height"),
        (judge(&[wire(0.0, 0.0, 80.0, 3.0)], Soil::AVERAGE, 1.83), "length"),
        (judge(&good, Soil::Perfect, 1.83), "perfect"),
        (judge(&good, Soil::AVERAGE, 14.2), "14.2 MHz"),
        (judge(&pair, Soil::POOR, 3.65), "wetter"),
        (judge(&[vertical(0.0, 0.0, 25.0)], Soil::AVERAGE, 1.83), "eighth"),
        (
            judge(&[vertical(0.0, 0.0, 6.0), wire(0.0, 100.0, 176.0, 3.0)], Soil::AVERAGE, 1.83),
            "wires and verticals",
        ),
    ];
    for (judged, word) in bad {
        let why = judged.why_not.unwrap_or_default();
        assert!(!judged.valid && why.contains(word), "{word}: {why}");
    }
    let mismatched = [wire_ending(0.0, 0.0, 176.0, 3.0, Termination::Total(Resistance::new(200.0)))];
    assert!(!judge(&mismatched, Soil::AVERAGE, 1.83).valid);
    let nearly = [wire_ending(0.0, 0.0, 176.0, 3.0, Termination::Total(Resistance::new(500.0)))];
    assert!(judge(&nearly, Soil::AVERAGE, 1.83).valid);
}

#[test]
fn unusable_input_is_an_error_and_never_a_panic() {
    let one = [vertical(0.0, 0.0, 6.0)];
    let new = |elements: &[RadioElement], soil, frequency| Response::new(elements, soil, frequency).err();
    assert_eq!(new(&[], Soil::AVERAGE, mhz(1.83)), Some(RadioError::NoElement));
    let frequency = Some(RadioError::NotPositive { element: None, what: "frequency" });
    assert_eq!(new(&one, Soil::AVERAGE, Frequency::from_hz(0)), frequency);
    let height = Some(RadioError::NotPositive { element: Some(0), what: "height" });
    assert_eq!(new(&[vertical(0.0, 0.0, 0.0)], Soil::AVERAGE, mhz(1.83)), height);
    let position = Some(RadioError::NotPositive { element: Some(0), what: "position" });
    assert_eq!(new(&[vertical(f64::NAN, 0.0, 6.0)], Soil::AVERAGE, mhz(1.83)), position);
    let response = response(&one, Soil::AVERAGE);
    assert_eq!(response.check_weights(&equal(2)), Err(RadioError::WeightCount { elements: 1, weights: 2 }));
    assert_eq!(response.check_weights(&[Complex64::ZERO]), Err(RadioError::UnusableWeights));
    let array = Array { elements: one.to_vec(), weights: equal(3) };
    assert!(report(&array, Soil::AVERAGE, mhz(1.83), &ErrorSize::default()).is_err());
}

#[test]
fn cuts_start_ahead_and_turn_clockwise() {
    let elements = [wire(0.0, 0.0, 176.0, 3.0), wire(18.288, -4.572, 176.0, 3.0)];
    let response = response(&elements, Soil::AVERAGE);
    let weights = crossfire(mhz(1.83), 17.2);
    let take_off = directivity(&response, &weights).peak_elevation_deg;
    let around = azimuth_cut(&response, &weights, take_off, 5.0);
    assert_eq!(around.len(), 73);
    assert!(near(around[0].level_db, 0.0, 0.01) && near(around[72].level_db, around[0].level_db, 1e-9));
    let right =
        10.0 * (response.power(&weights, 40.0, take_off) / response.power(&weights, 0.0, take_off)).log10();
    assert!(near(around[8].level_db - around[0].level_db, right, 1e-9));
    let over = elevation_cut(&response, &weights, 1.0);
    assert_eq!(over.len(), 181);
    assert!(over.iter().all(|point| point.level_db < 0.001));
}

#[test]
fn a_two_way_wire_is_a_thicker_wire_and_its_way_home_costs_signal_only() {
    use arraywright::radio::{ReturnPath, average_gain, balanced_return, realised_gain_dbi};
    use arraywright::units::VelocityFactor;
    let kind = |path| ElementKind::TwoWayWire {
        length: Length::from_mm(176_000),
        height: Length::from_mm(3_000),
        diameter: Diameter::from_um(1_600),
        spacing: Length::from_mm(300),
        path,
    };
    let velocity_factor = VelocityFactor::new(rust_decimal::Decimal::new(97, 2)).expect("below 1");
    let build = |path| {
        let mut element = wire(0.0, 0.0, 176.0, 3.0);
        element.kind = kind(path);
        response(&[element], Soil::AVERAGE)
    };
    let (direct, home) = (build(ReturnPath::Direct), build(ReturnPath::Balanced { velocity_factor }));
    let (a, b) = (directivity(&direct, &equal(1)), directivity(&home, &equal(1)));
    assert_eq!(a, b);
    let factor = balanced_return(mhz(1.83), &kind(ReturnPath::Balanced { velocity_factor }));
    // −360° × 176 m / (0.97 λ), and some tenths of a dB of copper loss
    let turn = Complex64::cis(-mhz(1.83).wavenumber() * 176.0 / 0.97);
    assert!((factor / factor.norm() - turn).norm() < 1e-12);
    assert!(factor.norm() < 1.0 && factor.norm() > 0.9, "{factor}");
    let (gain, average) = (realised_gain_dbi(&direct, &equal(1)), average_gain(&direct, &equal(1)));
    let (gain, average) = (gain.expect("a wire"), average.expect("a wire"));
    assert!(near(gain - 10.0 * average.log10(), a.rdf_db, 0.01), "RDF is gain over average gain");
    let lost =
        average_gain(&home, &equal(1)).expect("a wire") / average_gain(&direct, &equal(1)).expect("a wire");
    assert!(near(lost, factor.norm_sqr(), 1e-12));
    // radius √(0.8 mm × 300 mm) = 15.5 mm against a lone wire of 31 mm diameter
    let mut thick = wire(0.0, 0.0, 176.0, 3.0);
    thick.kind = ElementKind::LowWire {
        length: Length::from_mm(176_000),
        height: Length::from_mm(3_000),
        diameter: Diameter::from_um(30_984),
        termination: Termination::Matched,
    };
    assert!(near(directivity(&response(&[thick], Soil::AVERAGE), &equal(1)).rdf_db, a.rdf_db, 1e-4));
    assert!(validity(&direct).valid && !validity(&direct).notes.is_empty());
}
