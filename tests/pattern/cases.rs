//! The 152 reference cases, each written as a project file, read, expanded and reported.
//!
//! Every case goes through the reader: single elements as an array without a stage, the others as `custom` positions and
//! weights in whole millimetres and decimal degrees. The 152 cases hold nothing that the reader refuses (no weight of
//! amplitude 0, no number of elements other than 2^a·3^b); a case that did would be listed in [`NOT_WRITTEN`].

use std::fmt::Write as _;

use arraywright::catalogue;
use arraywright::reception::{Ends, Weighting};
use arraywright::report::pattern::document_of;
use arraywright::units::Frequency;
use serde_json::Value;

use crate::pattern_cases::{CLOSE, Case, Differences, Figures, Placed, cases};
use crate::support::{Expanded, figures, read};

/// Cases that no project file can say, with the reason.
const NOT_WRITTEN: [(&str, &str); 0] = [];

impl Case {
    /// The case as a project file; lengths in metres to the millimetre, as people write them.
    fn project(&self) -> String {
        let ground = match (self.ground.sigma_ms_per_m, self.ground.eps_r) {
            (Some(sigma), Some(permittivity)) if self.ground.name != "perfect" => {
                format!("{{ conductivity = \"{sigma} mS/m\", permittivity = {permittivity} }}")
            }
            _ => "\"perfect\"".to_owned(),
        };
        let mut text = format!(
            "[project]\ntitle = \"{}\"\nestimated = 2026-06-01\ncurrency = \"EUR\"\nfrequency = \"{} MHz\"\n\n[site]\nground = {ground}\n\
             terrain = \"open\"\nreceiver = {{ east = \"-500 m\", north = \"0 m\" }}\n\n[[array]]\nname = \"case\"\nheading = \"0 deg\"\n{}\n",
            self.id,
            self.frequency_mhz,
            self.element()
        );
        let placed = self.placed();
        if placed.len() > 1 {
            let positions = placed
                .iter()
                .map(|p| format!("{{ forward = \"{:.3} m\", right = \"{:.3} m\" }}", p.x_m, -p.y_m + 0.0));
            let weights = placed
                .iter()
                .map(|p| format!("{{ amplitude = {}, phase = \"{} deg\" }}", p.amp, self.phase(p)));
            let list = |items: Vec<String>| items.join(", ");
            let _ = writeln!(text, "custom.positions = [{}]", list(positions.collect()));
            let _ = writeln!(text, "custom.weights = [{}]", list(weights.collect()));
        }
        text
    }

    fn element(&self) -> String {
        if let Some(verticals) = &self.verticals {
            return format!("element.vertical = {{ height = \"{} m\" }}", verticals.height_m);
        }
        let wires = self.wires.as_ref().expect("wires");
        let length = wires.wire[0].length_m.expect("a length");
        assert!(wires.wire.iter().all(|wire| wire.length_m == Some(length)), "{}", self.id);
        let termination = if wires.termination_reflection.abs() > 0.0 {
            format!("{{ reflection = {} }}", wires.termination_reflection)
        } else {
            "\"matched\"".to_owned()
        };
        format!(
            "element.wire = {{ length = \"{length} m\", height = \"{} m\", diameter = \"{:.3} mm\", termination = {termination} }}",
            wires.height_m,
            2e3 * wires.radius_m
        )
    }

    /// What the leg adds at the frequency of the case.
    fn phase(&self, placed: &Placed) -> String {
        let wavelength = Frequency::from_mhz(self.frequency_mhz).wavelength_m();
        let degrees = placed.phase_deg - 360.0 * placed.delay_m / wavelength;
        format!("{degrees:.9}")
    }

    fn json(&self) -> Value {
        let project = read(&self.project());
        let expanded = Expanded::new(&project, &catalogue::built_in());
        assert_eq!(expanded.plan.layout.elements.len(), self.placed().len(), "{}", self.id);
        let report = expanded.report(&project, Ends::Matched, Weighting::Ideal);
        document_of("", &project, &[(String::new(), vec![report])])
    }
}

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or(f64::NAN)
}

fn found(case: &Case, json: &Value) -> Figures {
    let found = figures(json, "case");
    let at = found["rdf_at"].as_array().expect("rdf_at");
    let stated = at.iter().find(|at| (number(&at["elevation_deg"]) - case.stated_elevation_deg).abs() < 1e-9);
    let stated = stated.expect("the stated elevation");
    Figures {
        rdf_peak_db: number(&found["rdf_db"]),
        rdf_stated_db: number(&stated["rdf_db"]),
        takeoff_elevation_deg: number(&found["peak_elevation_deg"]),
        front_to_back_db: number(&found["front_to_back_db"]),
        front_to_back_stated_db: number(&stated["front_to_back_db"]),
        worst_rear_db: number(&found["worst_rear_db"]),
        azimuth_beamwidth_deg: number(&found["beamwidth_deg"]),
        gain_rel_db: found["gain_rel_db"].as_f64(),
        velocity_factor: None,
        attenuation_db_per_100m: None,
        characteristic_impedance_ohm: None,
    }
}

#[test]
fn every_case_passes_through_a_project_file_and_agrees_with_both_references() {
    let (mut reference, mut engine) = (Differences::default(), Differences::default());
    let mut written = 0;
    for case in cases() {
        if NOT_WRITTEN.iter().any(|(id, _)| *id == case.id) {
            continue;
        }
        let found = found(&case, &case.json());
        case.compare(&mut reference, &found, &case.reference, &case.tolerance);
        case.compare(&mut engine, &found, &case.engine, &CLOSE);
        written += 1;
    }
    assert_eq!((written, NOT_WRITTEN.len()), (152, 0));
    reference.none();
    engine.none();
}

#[test]
fn positions_of_the_cases_are_whole_millimetres_but_for_six() {
    let off = |metres: f64| (metres * 1000.0 - (metres * 1000.0).round()).abs() > 1e-6;
    let rounded: Vec<String> = cases()
        .into_iter()
        .filter(|case| case.placed().iter().any(|p| off(p.x_m) || off(p.y_m)))
        .map(|case| case.id)
        .collect();
    assert_eq!(rounded, ["F01", "F02", "F03", "F04", "F08", "F09"]);
}

/// Two verticals abreast; what arrives from the right reaches the right one first, so delaying that one turns the beam
/// to the right.
#[test]
fn delaying_the_right_element_turns_the_beam_to_the_right() {
    let text = |weights: &str| {
        format!(
            r#"
[project]
title = "Abreast"
currency = "EUR"
estimated = 2026-06-01
frequency = "1.83 MHz"
[site]
terrain = "open"
receiver = {{ east = "-500 m", north = "0 m" }}
[[array]]
name = "case"
heading = "0 deg"
element.vertical = {{ height = "6 m" }}
custom.positions = [{{ forward = "0 m", right = "-30 m" }}, {{ forward = "0 m", right = "30 m" }}]
custom.weights = {weights}
"#
        )
    };
    let loudest = |weights: &str| {
        let project = read(&text(weights));
        let expanded = Expanded::new(&project, &catalogue::built_in());
        let report = expanded.report(&project, Ends::Matched, Weighting::Ideal);
        let figures = report.directions[0].frequencies[0].figures.as_ref().expect("figures");
        let level = |degrees: f64| {
            let at = figures.azimuth.iter().find(|point| (point.angle_deg - degrees).abs() < 1e-9);
            at.expect("a point of the cut").level_db
        };
        level(30.0) - level(330.0)
    };
    let unit = r#"{ amplitude = 1, phase = "0 deg" }"#;
    let late = r#"{ amplitude = 1, phase = "-40 deg" }"#;
    assert!(loudest(&format!("[{unit}, {unit}]")).abs() < 1e-9);
    assert!(loudest(&format!("[{unit}, {late}]")) > 1.0);
    assert!(loudest(&format!("[{late}, {unit}]")) < -1.0);
}
