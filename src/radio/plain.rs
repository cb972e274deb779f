//! RDF by plain quadrature over the sky, to compare with.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::quotient::db;
use super::response::{Response, total};
use super::sphere::SphereRule;

/// RDF in dB at one elevation: the weighted pattern is evaluated anew in every direction of `rule`.
///
/// The matrix of [`super::Quotient`] gives the same number without the directions; this is the yardstick for its
/// correctness and its speed.
#[expect(clippy::cast_precision_loss, reason = "some hundred points")]
pub fn plain_rdf_db(response: &Response, weights: &[Complex64], elevation_deg: f64, rule: SphereRule) -> f64 {
    let mut average = 0.0;
    for (u, weight) in rule.nodes() {
        let elevation = u.asin().to_degrees();
        for step in 0..rule.azimuths {
            let azimuth = (TAU * step as f64 / rule.azimuths as f64).to_degrees();
            let power = total(&response.fields(azimuth, elevation), weights).power();
            average += 0.5 * weight * power / rule.azimuths as f64;
        }
    }
    db(response.power(weights, 0.0, elevation_deg) / average)
}
