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
use serde::Deserialize;
use serde_json::Value;

use crate::support::{Differences, Expanded, figures, read};

/// Cases that no project file can say, with the reason.
const NOT_WRITTEN: [(&str, &str); 0] = [];

#[derive(Deserialize)]
struct File {
    case: Vec<Case>,
}

#[derive(Deserialize)]
struct Case {
    id: String,
    frequency_mhz: f64,
    wanted_azimuth_deg: f64,
    stated_elevation_deg: f64,
    ground: Ground,
    verticals: Option<Verticals>,
    wires: Option<Wires>,
    reference: Figures,
    engine: Figures,
    tolerance: Tolerance,
}

#[derive(Deserialize)]
struct Ground {
    name: String,
    sigma_ms_per_m: Option<f64>,
    eps_r: Option<f64>,
}

#[derive(Deserialize)]
struct Verticals {
    height_m: f64,
    elements: Vec<Placed>,
}

#[derive(Deserialize)]
struct Wires {
    height_m: f64,
    radius_m: f64,
    termination_reflection: f64,
    wire: Vec<Placed>,
}

#[derive(Deserialize)]
struct Placed {
    x_m: f64,
    y_m: f64,
    length_m: Option<f64>,
    amp: f64,
    phase_deg: f64,
    delay_m: f64,
}

#[derive(Deserialize)]
struct Figures {
    rdf_peak_db: f64,
    rdf_stated_db: f64,
    takeoff_elevation_deg: f64,
    front_to_back_db: f64,
    front_to_back_stated_db: f64,
    worst_rear_db: f64,
    azimuth_beamwidth_deg: f64,
    gain_rel_db: Option<f64>,
}

#[derive(Deserialize, Clone, Copy)]
struct Tolerance {
    rdf_db: f64,
    elevation_deg: f64,
    beamwidth_deg: f64,
    gain_rel_db: Option<f64>,
    fb_amplitude: f64,
    worst_rear_amplitude: f64,
}

/// What an implementation of the same method must meet.
const CLOSE: Tolerance = Tolerance {
    rdf_db: 0.01,
    elevation_deg: 0.1,
    beamwidth_deg: 0.1,
    gain_rel_db: Some(0.01),
    fb_amplitude: 0.002,
    worst_rear_amplitude: 0.002,
};

fn cases() -> Vec<Case> {
    let file: File =
        toml::from_str(include_str!("../reference/pattern-cases.toml")).expect("the table parses");
    file.case
}

impl Case {
    fn placed(&self) -> &[Placed] {
        match (&self.verticals, &self.wires) {
            (Some(verticals), None) => &verticals.elements,
            (None, Some(wires)) => &wires.wire,
            _ => panic!("case {} has verticals or wires", self.id),
        }
    }

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

/// A level in dB as an amplitude.
fn amplitude(db: f64) -> f64 {
    10_f64.powf(db / 20.0)
}

fn number(value: &Value) -> f64 {
    value.as_f64().unwrap_or(f64::NAN)
}

fn compare(differences: &mut Differences, case: &Case, json: &Value, wanted: &Figures, tolerance: Tolerance) {
    let found = figures(json, "case");
    let at = found["rdf_at"].as_array().expect("rdf_at");
    let stated = at.iter().find(|at| (number(&at["elevation_deg"]) - case.stated_elevation_deg).abs() < 1e-9);
    let stated = stated.expect("the stated elevation");
    let mut check = |name: &str, value: f64, wanted: f64, tolerance: f64| {
        differences.check(&format!("{} {name}", case.id), value, wanted, tolerance);
    };
    check("RDF", number(&found["rdf_db"]), wanted.rdf_peak_db, tolerance.rdf_db);
    check("RDF stated", number(&stated["rdf_db"]), wanted.rdf_stated_db, tolerance.rdf_db);
    let peak = number(&found["peak_elevation_deg"]);
    check("take-off", peak, wanted.takeoff_elevation_deg, tolerance.elevation_deg);
    let beam = number(&found["beamwidth_deg"]);
    check("beamwidth", beam, wanted.azimuth_beamwidth_deg, tolerance.beamwidth_deg);
    if let (Some(wanted), Some(tolerance)) = (wanted.gain_rel_db, tolerance.gain_rel_db) {
        check("gain_rel", number(&found["gain_rel_db"]), wanted, tolerance);
    }
    let backs = [
        ("front to back", &found["front_to_back_db"], wanted.front_to_back_db),
        ("front to back stated", &stated["front_to_back_db"], wanted.front_to_back_stated_db),
    ];
    for (name, value, wanted) in backs {
        check(name, amplitude(-number(value)), amplitude(-wanted), tolerance.fb_amplitude);
    }
    let (rear, wanted_rear) = (amplitude(number(&found["worst_rear_db"])), amplitude(wanted.worst_rear_db));
    check("worst rear", rear, wanted_rear, tolerance.worst_rear_amplitude);
}

#[test]
fn every_case_passes_through_a_project_file_and_agrees_with_both_references() {
    let (mut reference, mut engine) = (Differences::default(), Differences::default());
    let mut written = 0;
    for case in cases() {
        if NOT_WRITTEN.iter().any(|(id, _)| *id == case.id) {
            continue;
        }
        assert!(case.wanted_azimuth_deg.abs() < 1e-9, "{} does not look ahead", case.id);
        let json = case.json();
        compare(&mut reference, &case, &json, &case.reference, case.tolerance);
        compare(&mut engine, &case, &json, &case.engine, CLOSE);
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
