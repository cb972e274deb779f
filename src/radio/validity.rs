//! Where the figures hold: the limits within which the method was compared with a reference.

use super::cluster::wire_spec;
use super::element::{ElementKind, Termination};
use super::ground::Soil;
use super::line::LineConstants;
use super::low_wire::{WireSpec, reflection_coefficient};
use super::response::Response;

/// A computed front-to-back above this is shown as "more than": deep nulls are beyond any model of real ground, in dB.
pub const FRONT_TO_BACK_CEILING_DB: f64 = 25.0;

/// Frequencies compared, in MHz.
const FREQUENCY_MHZ: (f64, f64) = (1.8, 10.15);
/// Highest wire over wavelength: 0.10 in two digits.
const WIRE_HEIGHT: f64 = 0.105;
/// Shortest and longest wire over wavelength: 0.54 and 6.4 in two digits.
const WIRE_LENGTH: (f64, f64) = (0.535, 6.45);
/// Highest vertical over wavelength. Bare probes agree with the reference up to 0.20; elements with a load couple more the
/// taller they are.
const VERTICAL_HEIGHT: f64 = 0.125;
/// Conductivities compared, in mS/m.
const CONDUCTIVITY: (f64, f64) = (1.0, 20.0);
/// Permittivities compared.
const PERMITTIVITY: (f64, f64) = (5.0, 20.0);
/// Largest reflection at the termination.
const REFLECTION: f64 = 0.3;
/// A coupled pair needs soil of at least this |n²|: 7 fails, 11 holds.
const PAIR_INDEX_SQUARED: f64 = 9.0;
/// A value this much beyond a limit, relative to it, is still on it.
const SLACK: f64 = 1e-9;

/// Whether the figures may be trusted, and how they were made.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Validity {
    /// The method in a few words.
    pub method: String,
    /// Whether every limit is kept.
    pub valid: bool,
    /// The limits that are not kept, in words.
    pub why_not: Option<String>,
    /// What to know though every limit is kept.
    pub notes: Vec<String>,
}

/// Judges an array: within the limits RDF is within 0.3 dB of a method-of-moments reference (152 cases).
pub fn validity(response: &Response) -> Validity {
    let mut reasons = Vec::new();
    let mut notes = Vec::new();
    let mhz = response.frequency().mhz();
    if outside(mhz, FREQUENCY_MHZ) {
        reasons.push(format!("{mhz} MHz is outside 1.8 to 10.15 MHz"));
    }
    let mut kinds = (false, false);
    for element in response.elements() {
        match &element.kind {
            ElementKind::ShortVertical { height } => {
                kinds.0 = true;
                judge_vertical(response, height.metres(), &mut reasons);
            }
            ElementKind::LowWire { .. } => kinds.1 = true,
            ElementKind::TwoWayWire { .. } => {
                kinds.1 = true;
                notes.push("two-way wires were not compared with a reference".to_owned());
            }
        }
        if let Some(spec) = wire_spec(&element.kind) {
            judge_wire(response, &spec, &mut reasons);
        }
    }
    if kinds == (true, true) {
        reasons.push("wires and verticals in one array have no common scale of signal".to_owned());
    }
    judge_soil(response.soil(), kinds.1, &mut reasons);
    judge_coupling(response, &mut reasons);
    notes.dedup();
    let mut seen = Vec::new();
    reasons.retain(|reason| {
        !seen.contains(reason) && {
            seen.push(reason.clone());
            true
        }
    });
    let why_not = (!reasons.is_empty()).then(|| reasons.join("; "));
    Validity { method: method(response, kinds), valid: why_not.is_none(), why_not, notes }
}

fn method(response: &Response, (verticals, wires): (bool, bool)) -> String {
    let grouping = &response.scanner.grouping;
    let wire_method = match (grouping.pairs.is_empty(), grouping.lone.is_empty()) {
        (true, _) => "travelling wave over lossy ground",
        (false, true) => "coupled pairs of travelling-wave lines over lossy ground",
        (false, false) => "travelling wave over lossy ground, pairs coupled",
    };
    match (verticals, wires) {
        (true, true) => format!("short verticals without coupling, {wire_method}"),
        (_, false) => "short verticals without coupling".to_owned(),
        (false, true) => wire_method.to_owned(),
    }
}

fn outside(value: f64, (least, most): (f64, f64)) -> bool {
    value < least * (1.0 - SLACK) || value > most * (1.0 + SLACK)
}

fn judge_vertical(response: &Response, height_m: f64, reasons: &mut Vec<String>) {
    let height = height_m / response.frequency().wavelength_m();
    if outside(height, (0.0, VERTICAL_HEIGHT)) {
        reasons.push(format!("a vertical of {height:.2} wavelength is above an eighth"));
    }
}

fn judge_wire(response: &Response, spec: &WireSpec, reasons: &mut Vec<String>) {
    let wavelength = response.frequency().wavelength_m();
    let (height, length) = (spec.height / wavelength, spec.length / wavelength);
    if outside(height, (0.0, WIRE_HEIGHT)) {
        reasons.push(format!("a wire height of {height:.2} wavelength is above 0.10"));
    }
    if outside(length, WIRE_LENGTH) {
        reasons.push(format!("a wire length of {length:.2} wavelengths is outside 0.54 to 6.4"));
    }
    let LineConstants { gamma: _, impedance } = spec.constants(response.frequency(), response.scanner.n2);
    let reflected = match spec.termination {
        Termination::Matched => 0.0,
        Termination::Reflection(_) | Termination::Total(_) => {
            reflection_coefficient(spec.termination, impedance).norm()
        }
    };
    if outside(reflected, (0.0, REFLECTION)) {
        reasons.push(format!("a reflection of {reflected:.2} at the termination is above 0.30"));
    }
}

fn judge_soil(soil: Soil, wires: bool, reasons: &mut Vec<String>) {
    match soil {
        Soil::Perfect if wires => reasons.push("wires over perfect ground were not compared".to_owned()),
        Soil::Perfect => {}
        Soil::Real { conductivity, permittivity } => {
            let sigma = conductivity.ms_per_m();
            if outside(sigma, CONDUCTIVITY) || outside(permittivity, PERMITTIVITY) {
                let compared = "1 to 20 mS/m and 5 to 20";
                reasons.push(format!("soil of {sigma} mS/m and {permittivity} is outside {compared}"));
            }
        }
    }
}

fn judge_coupling(response: &Response, reasons: &mut Vec<String>) {
    let grouping = &response.scanner.grouping;
    for uncovered in &grouping.uncovered {
        reasons.push(format!("{}: computed without coupling", uncovered.why));
    }
    if let (Some(n2), false) = (response.scanner.n2, grouping.pairs.is_empty())
        && n2.norm() < PAIR_INDEX_SQUARED
    {
        reasons.push(format!("coupled wires need wetter soil than |n²| = {:.0}", n2.norm()));
    }
}
