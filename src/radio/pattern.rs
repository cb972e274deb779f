//! Cuts through the pattern, for drawing.

use num_complex::Complex64;

use super::directivity::peak;
use super::quotient::db;
use super::response::Response;

/// One point of a cut.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CutPoint {
    /// The angle along the cut in degrees: azimuth clockwise from the wanted direction, or elevation.
    pub angle_deg: f64,
    /// Power over the forward maximum in dB.
    pub level_db: f64,
}

/// The pattern around the horizon at one elevation, clockwise from the wanted direction, every `step_deg` degrees (at
/// least a tenth of a degree).
pub fn azimuth_cut(
    response: &Response,
    weights: &[Complex64],
    elevation_deg: f64,
    step_deg: f64,
) -> Vec<CutPoint> {
    cut(response, weights, 360.0, step_deg, |angle| (angle, elevation_deg))
}

/// The pattern from the horizon ahead over the zenith (90°) to the horizon behind (180°), every `step_deg` degrees (at least
/// a tenth of a degree).
pub fn elevation_cut(response: &Response, weights: &[Complex64], step_deg: f64) -> Vec<CutPoint> {
    cut(
        response,
        weights,
        180.0,
        step_deg,
        |angle| {
            if angle <= 90.0 { (0.0, angle) } else { (180.0, 180.0 - angle) }
        },
    )
}

fn cut(
    response: &Response,
    weights: &[Complex64],
    end: f64,
    step_deg: f64,
    direction: impl Fn(f64) -> (f64, f64),
) -> Vec<CutPoint> {
    let step = step_deg.max(0.1);
    let forward_db = peak(response, weights).level_db;
    std::iter::successors(Some(0.0), |angle| Some(angle + step))
        .take_while(|angle| *angle <= end + 1e-9)
        .map(|angle_deg| {
            let (azimuth, elevation) = direction(angle_deg);
            CutPoint { angle_deg, level_db: db(response.power(weights, azimuth, elevation)) - forward_db }
        })
        .collect()
}
