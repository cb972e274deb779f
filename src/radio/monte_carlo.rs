//! Drawn errors: how far directivity and rear rejection spread.

use num_complex::Complex64;
use rand_distr::{Distribution, StandardNormal};
use rand_pcg::Pcg64;
use rayon::prelude::*;

use super::directivity::refined;
use super::quotient::db;
use super::rear::Scratch;
use super::response::{GRID_ROWS, Response};
use super::tolerance::ElementError;

/// Draws that share one stream of random numbers; the streams, not the threads, fix the result.
const CHUNK: usize = 50;
/// Every so many rows the forward maximum is looked for before it is followed to its top.
const ROW_STEP: usize = 5;

/// Standard deviations of independent errors on every element.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ErrorSize {
    /// Level in dB.
    pub amplitude_db: f64,
    /// Phase in degrees.
    pub phase_deg: f64,
}

impl Default for ErrorSize {
    /// 0.5 dB and 2°, a careful amateur installation (common practice).
    fn default() -> Self {
        Self { amplitude_db: 0.5, phase_deg: 2.0 }
    }
}

/// How often to draw, and from which seed.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Sampling {
    /// Draws.
    pub draws: usize,
    /// Seed of the generator.
    pub seed: u64,
}

impl Default for Sampling {
    fn default() -> Self {
        Self { draws: 1000, seed: 1 }
    }
}

/// Three quantiles of a drawn figure.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Quantiles {
    /// A tenth of the draws lie below.
    pub p10: f64,
    /// The median.
    pub p50: f64,
    /// A tenth of the draws lie above.
    pub p90: f64,
}

/// The spread of an array's figures under random errors.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spread {
    /// RDF at the take-off elevation in dB.
    pub rdf_db: Quantiles,
    /// Worst rear lobe in dB.
    pub worst_rear_db: Quantiles,
}

/// Draws errors on every weight (normal in dB and in degrees) and gives the spread of RDF and worst rear lobe.
///
/// The result depends on the seed alone: draws come in chunks with a stream of their own each, whatever the number of
/// threads.
pub fn monte_carlo(
    response: &Response,
    weights: &[Complex64],
    size: ErrorSize,
    sampling: Sampling,
) -> Spread {
    let chunks = sampling.draws.max(1).div_ceil(CHUNK);
    response.rear();
    let drawn: Vec<(f64, f64)> = (0..chunks)
        .into_par_iter()
        .flat_map_iter(|chunk| {
            let count = CHUNK.min(sampling.draws.max(1) - chunk * CHUNK);
            draw_chunk(response, weights, size, (sampling.seed, chunk), count)
        })
        .collect();
    let (rdf, rear): (Vec<f64>, Vec<f64>) = drawn.into_iter().unzip();
    Spread { rdf_db: quantiles(rdf), worst_rear_db: quantiles(rear) }
}

fn draw_chunk(
    response: &Response,
    weights: &[Complex64],
    size: ErrorSize,
    (seed, chunk): (u64, usize),
    count: usize,
) -> Vec<(f64, f64)> {
    let mut random = Pcg64::new(u128::from(seed), chunk as u128);
    let mut scratch = Scratch::default();
    let mut drawn = weights.to_vec();
    (0..count)
        .map(|_| {
            for (weight, nominal) in drawn.iter_mut().zip(weights) {
                let mut normal = || -> f64 { StandardNormal.sample(&mut random) };
                let error = ElementError {
                    amplitude_db: size.amplitude_db * normal(),
                    phase_deg: size.phase_deg * normal(),
                };
                *weight = nominal * error.factor();
            }
            let forward_db = quick_peak_db(response, &drawn);
            let rear = response.rear().strongest_quick(&drawn, &mut scratch);
            (forward_db - db(response.correlation().average(&drawn)), db(rear) - forward_db)
        })
        .collect()
}

/// The refined forward maximum in dB, found on every fifth row and followed to its top.
fn quick_peak_db(response: &Response, weights: &[Complex64]) -> f64 {
    let power = |row: usize| response.forward_power(weights, row);
    let mut best = (f64::NEG_INFINITY, 0);
    for row in (0..GRID_ROWS).step_by(ROW_STEP) {
        let own = power(row);
        if own > best.0 {
            best = (own, row);
        }
    }
    for step in [-1_isize, 1] {
        while let Some(next) = best.1.checked_add_signed(step).filter(|row| *row < GRID_ROWS) {
            let own = power(next);
            if own <= best.0 {
                break;
            }
            best = (own, next);
        }
    }
    refined(best.1, power).level_db
}

/// Quantiles by linear interpolation between the sorted values.
#[expect(clippy::cast_precision_loss, reason = "some thousand draws")]
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a place in the list")]
fn quantiles(mut values: Vec<f64>) -> Quantiles {
    values.sort_by(f64::total_cmp);
    let at = |part: f64| {
        let place = part * (values.len() - 1) as f64;
        let below = place.floor() as usize;
        let above = (below + 1).min(values.len() - 1);
        values[below] + (place - below as f64) * (values[above] - values[below])
    };
    Quantiles { p10: at(0.1), p50: at(0.5), p90: at(0.9) }
}
