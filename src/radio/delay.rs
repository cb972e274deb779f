//! The search for the best delay line.

use num_complex::Complex64;

use super::directivity::{gain_rel_db, peak};
use super::quotient::db;
use super::response::Response;

/// Delay over row step, in hundredths: 0.40 to 1.00.
const HUNDREDTHS: std::ops::RangeInclusive<u32> = 40..=100;
/// RDF within this of the best counts as equally good, in dB.
const RDF_WITHIN_DB: f64 = 0.1;
/// Worst rear within this of the best counts as equally good, in dB.
const REAR_WITHIN_DB: f64 = 0.5;

/// The array at one delay.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DelayPoint {
    /// Electrical length of the delay over the row step.
    pub ratio: f64,
    /// RDF at the take-off elevation in dB.
    pub rdf_db: f64,
    /// Worst rear lobe in dB.
    pub worst_rear_db: f64,
    /// Signal over one element in dB.
    pub gain_rel_db: f64,
}

/// The stretch of the curve about its best point that is nearly as good.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plateau {
    /// The lowest ratio of the stretch.
    pub from_ratio: f64,
    /// The highest.
    pub to_ratio: f64,
    /// Nearly as good: within so many dB.
    pub within_db: f64,
}

/// RDF, rear and signal against the delay, and the two best points.
#[derive(Clone, Debug, PartialEq)]
pub struct DelayCurve {
    /// From ratio 0.40 to 1.00 in hundredths.
    pub points: Vec<DelayPoint>,
    /// The lowest worst rear lobe.
    pub best_rear: DelayPoint,
    /// The highest RDF.
    pub best_rdf: DelayPoint,
    /// How far the rear stays within 0.5 dB of its best.
    pub rear_plateau: Plateau,
    /// How far RDF stays within 0.1 dB of its best.
    pub rdf_plateau: Plateau,
}

/// Computes the curve; `weights` gives the weights of the array at a ratio of delay to row step.
pub fn delay_curve(response: &Response, weights: impl Fn(f64) -> Vec<Complex64>) -> DelayCurve {
    let points: Vec<DelayPoint> = HUNDREDTHS
        .map(|hundredths| f64::from(hundredths) / 100.0)
        .map(|ratio| point(response, ratio, &weights(ratio)))
        .collect();
    let (best_rear, rear_plateau) = best(&points, REAR_WITHIN_DB, |point| -point.worst_rear_db);
    let (best_rdf, rdf_plateau) = best(&points, RDF_WITHIN_DB, |point| point.rdf_db);
    DelayCurve { points, best_rear, best_rdf, rear_plateau, rdf_plateau }
}

fn point(response: &Response, ratio: f64, weights: &[Complex64]) -> DelayPoint {
    let peak = peak(response, weights);
    DelayPoint {
        ratio,
        rdf_db: peak.level_db - db(response.correlation().average(weights)),
        worst_rear_db: db(response.rear().strongest(weights).power) - peak.level_db,
        gain_rel_db: gain_rel_db(response, weights, &peak),
    }
}

/// The point with the highest merit (the first of equals) and its plateau.
fn best(points: &[DelayPoint], within_db: f64, merit: impl Fn(&DelayPoint) -> f64) -> (DelayPoint, Plateau) {
    let top =
        (0..points.len()).fold(0, |top, i| if merit(&points[i]) > merit(&points[top]) { i } else { top });
    let good = |i: &usize| merit(&points[*i]) >= merit(&points[top]) - within_db;
    let from = (0..=top).rev().take_while(good).last().unwrap_or(top);
    let to = (top..points.len()).take_while(good).last().unwrap_or(top);
    (points[top], Plateau { from_ratio: points[from].ratio, to_ratio: points[to].ratio, within_db })
}
