//! Everything about one array at one frequency.

use super::directivity::{Directivity, directivity};
use super::element::Array;
use super::error::RadioError;
use super::ground::Soil;
use super::monte_carlo::{ErrorSize, Sampling, Spread, monte_carlo};
use super::quotient::Bound;
use super::response::Response;
use super::validity::{Validity, validity};
use crate::units::Frequency;

/// The diagonal loading that stands for what can be built: 0.5 dB and 5° an element.
const BUILDABLE_LOADING: f64 = 0.01;

/// The figures of an array at one frequency over one soil.
#[derive(Clone, Debug, PartialEq)]
pub struct PatternReport {
    /// Directivity, rear rejection, beamwidth and signal.
    pub directivity: Directivity,
    /// The largest RDF of these elements at the take-off elevation, whatever the weights.
    pub bound: Bound,
    /// The same with a diagonal loading of 0.01.
    pub buildable: Bound,
    /// The spread under random errors.
    pub spread: Spread,
    /// Whether the figures may be trusted.
    pub validity: Validity,
}

/// Computes the whole report.
///
/// # Errors
/// As [`Response::new`] and [`Response::check_weights`].
pub fn report(
    array: &Array,
    soil: Soil,
    frequency: Frequency,
    errors: &ErrorSize,
) -> Result<PatternReport, RadioError> {
    let response = Response::new(&array.elements, soil, frequency)?;
    response.check_weights(&array.weights)?;
    Ok(report_of(&response, array, errors))
}

/// The report from a prepared response; the weights must have been checked.
pub fn report_of(response: &Response, array: &Array, errors: &ErrorSize) -> PatternReport {
    let directivity = directivity(response, &array.weights);
    let quotient = response.quotient(directivity.peak_elevation_deg);
    PatternReport {
        bound: quotient.bound(0.0),
        buildable: quotient.bound(BUILDABLE_LOADING),
        spread: monte_carlo(response, &array.weights, *errors, Sampling::default()),
        validity: validity(response),
        directivity,
    }
}
