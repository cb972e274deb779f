//! What an array hears: the `pattern` document, the same for people, and a page to print.

mod page;
mod sheet;
mod table;
mod words;

use std::collections::BTreeMap;

use num_complex::Complex64;
use rust_decimal::Decimal;
use serde_json::{Value, json};

use super::machine::{document, rounded};
use crate::design::{self, Design};
use crate::project::Project;
use crate::radio::{AtElevation, DelayCurve, Quantiles};
use crate::reception::{self, ArrayReport, DirectionReport, Figures, FrequencyReport, Noise, Weighting};

pub(in crate::report) use page::contents;
pub use page::page;
pub use sheet::sheet;

/// Decimals of figures in JSON: a comparison to 0.001 must be possible.
const PLACES: i32 = 6;

/// The reports of one option: its name, and one report an array.
pub type OptionReports = (String, Vec<ArrayReport>);

/// Everything that a sheet or page of patterns is written from.
#[derive(Clone, Copy, Debug)]
pub struct View<'a> {
    /// The project.
    pub project: &'a Project,
    /// The short hash of its inputs.
    pub hash: &'a str,
    /// Which weights the reports were made with.
    pub weighting: Weighting,
    /// The reports.
    pub options: &'a [OptionReports],
    /// The delay of each array that has one, by array name.
    pub delays: &'a BTreeMap<String, Delay>,
}

/// Reports on every array of every design at every band of the project.
pub fn reports(project: &Project, designs: &[&Design], weighting: Weighting) -> Vec<OptionReports> {
    let bands = project.frequencies();
    designs
        .iter()
        .map(|design| {
            let arrays = design.arrays.iter();
            let reports = arrays.map(|array| reception::report(&array.subject(weighting), &bands)).collect();
            (design.option.clone(), reports)
        })
        .collect()
}

/// The delay line of an array, and what other lengths would give.
#[derive(Clone, Debug)]
pub struct Delay {
    /// Its electrical length over the row step.
    pub ratio: Decimal,
    /// What each ratio from 0.4 to 1.0 would give at the design frequency.
    pub curve: DelayCurve,
}

/// The delays of every array that has one, by array name.
pub fn delays(project: &Project, designs: &[&Design]) -> BTreeMap<String, Delay> {
    let mut delays = BTreeMap::new();
    for array in designs.iter().flat_map(|design| &design.arrays) {
        if !delays.contains_key(&array.plan.name)
            && let Some(curve) = design::delay_curve(project, array)
        {
            delays.insert(array.plan.name.clone(), Delay { ratio: array.ratio, curve });
        }
    }
    delays
}

/// The `pattern` document.
pub fn document_of(hash: &str, project: &Project, options: &[OptionReports]) -> Value {
    let options: Vec<Value> = options
        .iter()
        .map(|(option, arrays)| {
            let arrays: Vec<Value> = arrays.iter().map(array_json).collect();
            json!({ "option": option, "arrays": arrays })
        })
        .collect();
    document("pattern", hash, Some(project), vec![("options", json!(options))])
}

fn array_json(report: &ArrayReport) -> Value {
    let directions: Vec<Value> = report.directions.iter().map(direction_json).collect();
    json!({ "array": report.array, "directions": directions })
}

fn direction_json(direction: &DirectionReport) -> Value {
    let frequencies: Vec<Value> = direction.frequencies.iter().map(frequency_json).collect();
    json!({ "bearing_deg": figure(direction.bearing.degrees()), "frequencies": frequencies })
}

fn frequency_json(report: &FrequencyReport) -> Value {
    let figures = report.figures.as_ref();
    let known = figures.ok();
    let of = |value: &dyn Fn(&Figures) -> f64| known.map_or(Value::Null, |figures| figure(value(figures)));
    let validity = known.map(|figures| &figures.report.validity);
    let why_not = match figures {
        Ok(figures) => figures.report.validity.why_not.clone(),
        Err(error) => Some(error.to_string()),
    };
    let notes = known.map(|figures| [figures.notes.as_slice(), &figures.report.validity.notes].concat());
    json!({
        "mhz": report.frequency.mhz(),
        "rdf_db": of(&|f| f.report.directivity.rdf_db),
        "peak_elevation_deg": of(&|f| f.report.directivity.peak_elevation_deg),
        "rdf_at": known.map(|f| f.report.directivity.at.iter().map(at_json).collect::<Vec<_>>()),
        "front_to_back_db": of(&|f| f.report.directivity.front_to_back_db),
        "worst_rear_db": of(&|f| f.report.directivity.worst_rear.level_db),
        "beamwidth_deg": of(&|f| f.report.directivity.beamwidth_deg),
        "gain_rel_db": of(&|f| f.report.directivity.gain_rel_db),
        "bound_rdf_db": of(&|f| f.report.bound.rdf_db),
        "buildable_rdf_db": of(&|f| f.report.buildable.rdf_db),
        "weights": weights_json(report),
        "spread": known.map(|f| json!({
            "rdf_db": quantiles_json(&f.report.spread.rdf_db),
            "worst_rear_db": quantiles_json(&f.report.spread.worst_rear_db),
        })),
        "noise": known.and_then(|f| f.noise.as_ref()).map(noise_json),
        "method": validity.map(|validity| validity.method.clone()),
        "valid": validity.is_some_and(|validity| validity.valid),
        "why_not": why_not,
        "notes": notes.unwrap_or_default(),
    })
}

/// A number, or null when there is none.
fn figure(value: f64) -> Value {
    if value.is_finite() { json!(rounded(value, PLACES)) } else { Value::Null }
}

fn at_json(at: &AtElevation) -> Value {
    json!({
        "elevation_deg": figure(at.elevation_deg),
        "rdf_db": figure(at.rdf_db),
        "front_to_back_db": figure(at.front_to_back_db),
    })
}

fn quantiles_json(quantiles: &Quantiles) -> Value {
    json!([figure(quantiles.p10), figure(quantiles.p50), figure(quantiles.p90)])
}

fn noise_json(noise: &Noise) -> Value {
    json!({
        "fa_db": figure(noise.external.db()),
        "degradation_db": figure(noise.degradation.db()),
        "with_amplifier_db": noise.with_amplifier.map(|db| figure(db.db())),
    })
}

fn weights_json(report: &FrequencyReport) -> Value {
    let weights = normalised(&report.weights);
    let rows = report.names.iter().zip(weights).map(|(name, (amplitude, phase))| {
        json!({
            "element": name,
            "amplitude": figure(amplitude),
            "phase_deg": phase.map(figure),
        })
    });
    Value::Array(rows.collect())
}

/// Amplitudes with the largest 1, and phases in degrees after the first element that is not idle; an idle one has none.
fn normalised(weights: &[Complex64]) -> Vec<(f64, Option<f64>)> {
    let largest = weights.iter().map(|weight| weight.norm()).fold(0.0, f64::max);
    let first = weights.iter().find(|weight| weight.norm() > 0.0).copied().unwrap_or(Complex64::ONE);
    let after = |weight: &Complex64| {
        let degrees = (weight / first).arg().to_degrees();
        // the two names of half a turn differ by rounding alone
        if degrees < -180.0 + 1e-9 { degrees + 360.0 } else { degrees }
    };
    weights
        .iter()
        .map(|weight| (weight.norm() / largest, (weight.norm() > 0.0).then(|| after(weight))))
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_largest_weight_is_one_and_the_first_has_no_phase() {
        let weights =
            [Complex64::from_polar(2.0, 1.0), Complex64::from_polar(4.0, 1.0 + 0.5), Complex64::ZERO];
        let [first, second, idle] = normalised(&weights)[..] else { panic!("three weights") };
        assert!((first.0 - 0.5).abs() < 1e-12 && first.1.is_some_and(|phase| phase.abs() < 1e-12));
        assert!((second.0 - 1.0).abs() < 1e-12);
        assert!(second.1.is_some_and(|phase| (phase - 0.5_f64.to_degrees()).abs() < 1e-9));
        assert!(idle.0.abs() < 1e-12 && idle.1.is_none());
    }
}
