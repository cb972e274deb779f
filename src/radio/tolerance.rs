//! What amplitude and phase errors do, in closed form.

use num_complex::Complex64;

use super::directivity::peak;
use super::monte_carlo::ErrorSize;
use super::quotient::{combine, db};
use super::response::Response;
use crate::units::{Frequency, VelocityFactor};

/// Nepers of amplitude a decibel.
const AMPLITUDE_PER_DB: f64 = std::f64::consts::LN_10 / 20.0;
/// No single error is searched beyond this phase, in degrees.
const WIDEST_PHASE_DEG: f64 = 90.0;
/// Nor beyond this level, in dB.
const WIDEST_AMPLITUDE_DB: f64 = 10.0;

/// One element's departure from its weight.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct ElementError {
    /// Level in dB, positive is too strong.
    pub amplitude_db: f64,
    /// Phase in degrees, positive is too short a line.
    pub phase_deg: f64,
}

impl ElementError {
    /// The factor g = (1 + δ) e^{jε} on the weight.
    pub fn factor(self) -> Complex64 {
        Complex64::from_polar(10_f64.powf(self.amplitude_db / 20.0), self.phase_deg.to_radians())
    }
}

/// The residual in the null of an end-fire pair of verticals over its forward maximum, in dB, for one error in one element.
///
/// |1 − g| / |1 − g e^{−jk(S cos ψ + D)}| with row step S, delay D and take-off elevation ψ.
pub fn pair_null_floor_db(
    frequency: Frequency,
    step_m: f64,
    delay_m: f64,
    take_off_deg: f64,
    error: ElementError,
) -> f64 {
    let g = error.factor();
    let path = step_m * take_off_deg.to_radians().cos() + delay_m;
    let forward = 1.0 - g * Complex64::cis(-frequency.wavenumber() * path);
    db((1.0 - g).norm_sqr() / forward.norm_sqr())
}

/// What independent random errors do on average.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RandomErrors {
    /// Standard deviation of a weight, relative to it.
    pub sigma: f64,
    /// Root-mean-square residual over the forward maximum, in dB.
    pub rear_floor_db: f64,
    /// Mean loss of RDF in dB.
    pub rdf_loss_db: f64,
}

/// The closed form for independent errors on every element.
///
/// σ² = (0.115129 a)² + (0.0174533 p)² with a in dB and p in degrees; floor = 20 lg σ − G with G the signal over one element at the take-off elevation;
/// loss = 10 lg((1 + t A₁/A)/(1 + t P₁/P₀)), t = σ² Σ|w|². The floor holds in a direction in which one element is as strong as
/// towards the forward maximum; elsewhere subtract the element's own pattern.
/// Within 0.7 dB of drawn errors up to 1 dB and 10°. Principle: Ruze, "The effect of aperture errors on the antenna
/// radiation pattern", 1952 (from memory).
pub fn random_errors(response: &Response, weights: &[Complex64], size: ErrorSize) -> RandomErrors {
    let variance = (AMPLITUDE_PER_DB * size.amplitude_db).powi(2) + size.phase_deg.to_radians().powi(2);
    let peak = peak(response, weights);
    let correlation = response.correlation();
    let ahead: f64 = response
        .forward_fields(peak.row)
        .iter()
        .zip(weights)
        .map(|(field, weight)| (field * weight).norm_sqr())
        .sum();
    let spread = 1.0 + variance * correlation.independent(weights) / correlation.average(weights);
    let forward = 1.0 + variance * ahead / peak.power;
    RandomErrors {
        sigma: variance.sqrt(),
        rear_floor_db: db(variance * ahead / peak.power),
        rdf_loss_db: db(spread / forward),
    }
}

/// The largest single error on one element that keeps a wanted rear rejection.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SingleErrorLimit {
    /// Phase error alone, either sign, in degrees; at most 90.
    pub phase_deg: f64,
    /// Level error alone, either sign, in dB; at most 10.
    pub amplitude_db: f64,
}

/// How wrong one element's phase or level may be while its residual in a rear null stays `reject_db` below the forward
/// maximum.
///
/// The closed form of [`pair_null_floor_db`] for any array: |e| |1 − g| over |y + (g − 1) e| with e its own part of the output y, all towards the
/// unperturbed forward maximum. It takes the element to be as strong to the rear as forward, which is right for
/// verticals and on the safe side for wires. An element without weight has no limit and gets the widest one.
pub fn single_error_limit(
    response: &Response,
    weights: &[Complex64],
    element: usize,
    reject_db: f64,
) -> SingleErrorLimit {
    let fields = response.forward_fields(peak(response, weights).row);
    let whole = combine(fields, weights);
    let own = fields[element] * weights[element];
    let allowed = 10_f64.powf(-reject_db / 20.0);
    let keeps = |error: ElementError| {
        let change = error.factor() - 1.0;
        own.norm() * change.norm() <= allowed * (whole + change * own).norm()
    };
    let both = |error: fn(f64) -> ElementError, x: f64| keeps(error(x)) && keeps(error(-x));
    let phase = |x| ElementError { amplitude_db: 0.0, phase_deg: x };
    let amplitude = |x| ElementError { amplitude_db: x, phase_deg: 0.0 };
    SingleErrorLimit {
        phase_deg: first_failure(WIDEST_PHASE_DEG, |x| both(phase, x)),
        amplitude_db: first_failure(WIDEST_AMPLITUDE_DB, |x| both(amplitude, x)),
    }
}

/// The largest x up to which `keeps` holds all the way from 0, at most `widest`.
fn first_failure(widest: f64, keeps: impl Fn(f64) -> bool) -> f64 {
    const STEPS: u32 = 360;
    let at = |step: u32| widest * f64::from(step) / f64::from(STEPS);
    let Some(failed) = (1..=STEPS).find(|&step| !keeps(at(step))) else { return widest };
    let (mut good, mut bad) = (at(failed - 1), at(failed));
    for _ in 0..50 {
        let middle = f64::midpoint(good, bad);
        if keeps(middle) { good = middle } else { bad = middle }
    }
    good
}

/// The physical length in metres of cable that makes a phase of `phase_deg`: ε = 360° δl / (VF λ).
pub fn line_error_m(frequency: Frequency, phase_deg: f64, velocity_factor: VelocityFactor) -> f64 {
    phase_deg / 360.0 * velocity_factor.value() * frequency.wavelength_m()
}
