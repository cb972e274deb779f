//! Absolute signal: realised and average gain, for the noise budget.

use num_complex::Complex64;
use std::f64::consts::PI;

use super::cluster::wire_spec;
use super::directivity::peak;
use super::ground::ETA0;
use super::quotient::db;
use super::response::Response;
use super::two_way::balanced_return;

/// The weights times the balanced return of two-way wires.
fn delivered(response: &Response, weights: &[Complex64]) -> Vec<Complex64> {
    let home = |kind| balanced_return(response.frequency(), kind);
    response.elements().iter().zip(weights).map(|(element, weight)| weight * home(&element.kind)).collect()
}

/// k² η |Z₀|/π: from |E|² (for one volt behind a matched receiver) to gain; `None` unless every element is a wire.
fn gain_scale(response: &Response) -> Option<f64> {
    let mut specs = response.elements().iter().map(|element| wire_spec(&element.kind));
    let first = specs.next()??;
    if specs.any(|spec| spec.is_none()) {
        return None;
    }
    let constants = first.constants(response.frequency(), response.scanner.n2);
    Some(response.scanner.wavenumber.powi(2) * ETA0 * constants.impedance.norm() / PI)
}

/// Realised gain of an array of matched wires at its forward maximum, in dBi; `None` when an element is a vertical.
///
/// G = k² η |N|²/(4π Z₀) with N in metres for a unit current at the feed. `weights` are the voltage transfers from feed to
/// output (1 for one wire alone). Within 0.8 dB of a method-of-moments reference for single wires.
pub fn realised_gain_dbi(response: &Response, weights: &[Complex64]) -> Option<f64> {
    let weights = delivered(response, weights);
    Some(db(gain_scale(response)? * peak(response, &weights).power))
}

/// Average gain of an array of matched wires over the whole sphere (nothing from below), as a ratio; `None` when an element is
/// a vertical. `weights` as in [`realised_gain_dbi`].
pub fn average_gain(response: &Response, weights: &[Complex64]) -> Option<f64> {
    let weights = delivered(response, weights);
    Some(gain_scale(response)? * response.correlation().average(&weights))
}

/// Sky average of the weighted array over that of the first element alone, as a ratio: the noise that arrives at the
/// output against the noise of one probe.
pub fn average_over_one_element(response: &Response, weights: &[Complex64]) -> f64 {
    response.correlation().average(weights) / response.correlation().entry(0, 0).re
}
