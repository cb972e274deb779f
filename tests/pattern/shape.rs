//! The pinned shape, on every demo project and on arrays that go wrong.

use arraywright::radio::RadioError;
use arraywright::reception::{Figures, Weighting};
use arraywright::report::pattern;
use serde_json::Value;

use crate::support::{Settled, demos, figures};

const NUMBERS: [&str; 9] = [
    "mhz",
    "rdf_db",
    "peak_elevation_deg",
    "front_to_back_db",
    "worst_rear_db",
    "beamwidth_deg",
    "gain_rel_db",
    "bound_rdf_db",
    "buildable_rdf_db",
];

fn is_three_in_order(value: &Value) -> bool {
    let numbers: Vec<f64> =
        value.as_array().expect("three numbers").iter().map(|n| n.as_f64().expect("a number")).collect();
    numbers.len() == 3 && numbers.is_sorted()
}

#[test]
fn every_demo_has_the_pinned_shape() {
    let demos = demos();
    assert!(demos.len() >= 3);
    for (name, text) in demos {
        for weighting in [Weighting::Ideal, Weighting::Built] {
            let json = Settled::new(&text, weighting).json();
            assert_eq!(json["schema"], "arraywright/pattern/1");
            assert_eq!(json["hash"], "0123abcd");
            for option in json["options"].as_array().expect("options") {
                assert!(option["option"].is_string());
                for array in option["arrays"].as_array().expect("arrays") {
                    assert!(array["array"].is_string());
                    for direction in array["directions"].as_array().expect("directions") {
                        assert!(direction["bearing_deg"].is_number());
                        for frequency in direction["frequencies"].as_array().expect("frequencies") {
                            check_frequency(&name, frequency);
                        }
                    }
                }
            }
        }
    }
}

fn check_frequency(name: &str, frequency: &Value) {
    for key in NUMBERS {
        assert!(frequency[key].is_number(), "{name} {key}: {}", frequency[key]);
    }
    let at = frequency["rdf_at"].as_array().expect("rdf_at");
    let elevations: Vec<f64> = at.iter().map(|at| at["elevation_deg"].as_f64().expect("a number")).collect();
    assert_eq!(elevations, [5.0, 10.0, 20.0, 30.0, 45.0]);
    assert!(at.iter().all(|at| at["rdf_db"].is_number()));
    let weights = frequency["weights"].as_array().expect("weights");
    let levels: Vec<f64> = weights.iter().map(|w| w["amplitude"].as_f64().expect("a number")).collect();
    assert!((levels.iter().copied().fold(0.0, f64::max) - 1.0).abs() < 1e-9);
    assert!(weights.iter().all(|weight| weight["element"].is_string()));
    assert!(weights[0]["phase_deg"].as_f64().expect("a phase").abs() < 1e-9);
    assert!(is_three_in_order(&frequency["spread"]["rdf_db"]));
    assert!(is_three_in_order(&frequency["spread"]["worst_rear_db"]));
    for key in ["fa_db", "degradation_db", "with_amplifier_db"] {
        assert!(frequency["noise"][key].is_number(), "{name} noise {key}");
    }
    assert!(frequency["method"].as_str().is_some_and(|method| !method.is_empty()));
    assert_eq!(frequency["valid"] == true, frequency["why_not"].is_null());
    let figure = |key: &str| frequency[key].as_f64().expect("a number");
    // nothing beats the bound at its own elevation, and the loaded bound lies below it
    assert!(figure("bound_rdf_db") >= figure("rdf_db") - 0.01, "{name}");
    assert!(figure("bound_rdf_db") >= figure("buildable_rdf_db") - 1e-6, "{name}");
    let rdf = &frequency["spread"]["rdf_db"];
    assert!((rdf[1].as_f64().expect("a number") - figure("rdf_db")).abs() < 0.5, "{name}: {rdf}");
}

/// A demo whose first array cannot be computed.
fn broken() -> Settled {
    let text = &demos()[0].1;
    let mut settled = Settled::new(text, Weighting::Ideal);
    settled.options[0].1[0].directions[0].frequencies[0].figures = Err(RadioError::UnusableWeights);
    settled
}

#[test]
fn an_array_that_cannot_be_computed_has_nulls_and_the_reason() {
    let settled = broken();
    let json = settled.json();
    let found = figures(&json, &settled.options[0].1[0].array);
    for key in NUMBERS.iter().filter(|key| **key != "mhz") {
        assert!(found[key].is_null(), "{key}");
    }
    for key in ["rdf_at", "spread", "noise", "method"] {
        assert!(found[key].is_null(), "{key}");
    }
    assert_eq!(found["valid"], false);
    assert_eq!(found["why_not"], RadioError::UnusableWeights.to_string());
    let text = pattern::sheet(&settled.view()).to_text();
    assert!(text.contains("cannot be computed: all weights are zero"), "{text}");
    assert!(!text.contains("NaN"));
}

/// A wire of 6 m at 7.1 MHz lies 0.14 wavelength high, above the limit of the method.
const HIGH_WIRE: &str = r#"
[project]
title = "Too high"
currency = "EUR"
estimated = 2026-06-01
frequency = "7.1 MHz"

[site]
ground = "average"
terrain = "pasture"
receiver = { east = "-100 m", north = "0 m" }

[[array]]
name = "high"
heading = "40 deg"
element.wire = { length = "134 m", height = "6 m" }
"#;

#[test]
fn outside_its_limits_a_figure_has_no_decimals_and_a_warning() {
    let settled = Settled::new(HIGH_WIRE, Weighting::Built);
    let json = settled.json();
    let found = figures(&json, "high");
    assert_eq!(found["valid"], false);
    assert!(found["why_not"].as_str().is_some_and(|why| why.contains("height")), "{}", found["why_not"]);
    assert!(found["rdf_db"].is_number());
    let sheet = pattern::sheet(&settled.view());
    assert!(sheet.answer[0].contains("hears about "), "{}", sheet.answer[0]);
    assert!(
        sheet.answer.iter().any(|line| line.starts_with("warning: high: at 7.1 MHz a wire height ")),
        "{:?}",
        sheet.answer
    );
    let first_row = &sheet.tables[0].rows[0];
    let rdf = found["rdf_db"].as_f64().expect("a number");
    assert_eq!(first_row[1], format!("about {rdf:.0}"));
}

#[test]
fn the_answer_comes_first_and_says_what_the_figures_say() {
    let settled = Settled::new(&demos()[1].1, Weighting::Built);
    let sheet = pattern::sheet(&settled.view());
    let json = settled.json();
    let found = figures(&json, "nw-echelon");
    let figure = |key: &str| found[key].as_f64().expect("a number");
    let line = sheet.answer.iter().find(|line| line.starts_with("nw-echelon")).expect("the answer");
    assert!(line.contains(&format!(
        "{:.1} dB RDF at {:.0}°",
        figure("rdf_db"),
        figure("peak_elevation_deg")
    )));
    assert!(line.contains(&format!("worst rear lobe −{:.1} dB", -figure("worst_rear_db"))), "{line}");
    assert!(line.contains(&format!("front-to-back {:.0} dB", figure("front_to_back_db"))), "{line}");
    let notes = sheet.notes.join(" ");
    for word in ["equally from everywhere", "1000 draws", "seed 1", "method of nw-echelon", "as built"] {
        assert!(notes.contains(word), "{word}");
    }
}

#[test]
fn front_to_back_above_25_db_is_not_printed() {
    let mut settled = Settled::new(&demos()[1].1, Weighting::Built);
    let set = |figures: &mut Figures| figures.report.directivity.front_to_back_db = 41.7;
    for (_, reports) in &mut settled.options {
        for direction in reports.iter_mut().flat_map(|report| &mut report.directions) {
            direction.frequencies.iter_mut().filter_map(|f| f.figures.as_mut().ok()).for_each(set);
        }
    }
    let text = pattern::sheet(&settled.view()).to_text();
    assert!(text.contains("front-to-back > 25 dB") && !text.contains("41.7") && !text.contains("42 dB"));
}

#[test]
fn the_amplifier_verdict_follows_the_degradation() {
    for (db, verdict) in [(0.4, "not needed"), (2.0, "optional"), (6.5, "needed; the receiver")] {
        let mut settled = Settled::new(&demos()[0].1, Weighting::Built);
        let first = &mut settled.options[0].1[0].directions[0].frequencies[0];
        let noise = first.figures.as_mut().expect("figures").noise.as_mut().expect("a budget");
        noise.degradation = arraywright::units::Decibel::new(db);
        let text = pattern::sheet(&settled.view()).to_text();
        assert!(text.contains(&format!("amplifier: {verdict}")), "{db}: {text}");
    }
}

#[test]
fn the_delay_table_marks_the_design_and_both_best_points() {
    let settled = Settled::new(&demos()[1].1, Weighting::Built);
    let sheet = pattern::sheet(&settled.view());
    let table = sheet.tables.iter().find(|table| table.title.contains("delay line")).expect("the table");
    assert!(table.title.starts_with("nw-echelon"));
    let remarks: Vec<&str> = table.rows.iter().map(|row| row[4].as_str()).collect();
    for wanted in ["this design", "quietest to the rear", "sharpest"] {
        assert!(remarks.iter().any(|remark| remark.contains(wanted)), "{wanted}: {remarks:?}");
    }
}
