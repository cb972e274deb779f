//! The figures of a weighted array: directivity, rear rejection, beamwidth, signal.

use num_complex::Complex64;

use super::quotient::{combine, db};
use super::response::{GRID_AZIMUTH_STEP_DEG, GRID_ROWS, Response, grid_thetas, total};

/// The elevations at which RDF is stated beside its peak, in degrees.
pub const REPORTED_ELEVATIONS_DEG: [f64; 5] = [5.0, 10.0, 20.0, 30.0, 45.0];

/// Half power in dB.
const HALF_POWER_DB: f64 = 3.0103;
/// Keeps the logarithm of a perfect null finite.
const TINY: f64 = 1e-300;

/// Figures at one elevation.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AtElevation {
    /// Elevation in degrees.
    pub elevation_deg: f64,
    /// RDF towards azimuth 0 in dB.
    pub rdf_db: f64,
    /// Power from azimuth 0 over power from azimuth 180°, in dB.
    pub front_to_back_db: f64,
}

/// The strongest lobe of the rear half of the sky, zenith included.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WorstRear {
    /// Over the forward maximum, in dB.
    pub level_db: f64,
    /// Degrees clockwise from the wanted direction.
    pub azimuth_deg: f64,
    /// Elevation in degrees.
    pub elevation_deg: f64,
}

/// The figures of a weighted array.
#[derive(Clone, Debug, PartialEq)]
pub struct Directivity {
    /// RDF at the take-off elevation in dB.
    pub rdf_db: f64,
    /// The elevation of the array's own maximum at azimuth 0, in degrees (not an ionospheric angle).
    pub peak_elevation_deg: f64,
    /// RDF and front-to-back at the reported elevations.
    pub at: Vec<AtElevation>,
    /// Front-to-back at the take-off elevation in dB.
    pub front_to_back_db: f64,
    /// The worst rear lobe.
    pub worst_rear: WorstRear,
    /// Half-power width in azimuth at the take-off elevation in degrees; 360 when there is no half-power point.
    pub beamwidth_deg: f64,
    /// Signal over one element through a lossless matched combiner, in dB.
    pub gain_rel_db: f64,
}

/// The forward maximum: grid row, refined level and elevation.
#[derive(Clone, Copy, Debug)]
pub(super) struct Peak {
    pub(super) row: usize,
    pub(super) power: f64,
    pub(super) level_db: f64,
    pub(super) elevation_deg: f64,
}

/// A parabola through three dB values about the middle one: shift of its top and its height.
pub(super) fn parabola(before: f64, middle: f64, after: f64) -> (f64, f64) {
    let curvature = before - 2.0 * middle + after;
    if curvature >= 0.0 {
        return (0.0, middle);
    }
    let shift = 0.5 * (before - after) / curvature;
    (shift, middle - 0.25 * (before - after) * shift)
}

/// Refines the maximum at `row`; `power` gives the forward power of any row.
#[expect(clippy::cast_precision_loss, reason = "91 rows")]
pub(super) fn refined(row: usize, power: impl Fn(usize) -> f64) -> Peak {
    let own = power(row);
    let level = |row: usize| db(power(row) + TINY);
    let (shift, level_db) = if row == 0 || row == GRID_ROWS - 1 {
        (0.0, db(own + TINY))
    } else {
        parabola(level(row - 1), db(own + TINY), level(row + 1))
    };
    Peak { row, power: own, level_db, elevation_deg: 90.0 - row as f64 - shift }
}

/// The forward maximum over all elevations.
pub(super) fn peak(response: &Response, weights: &[Complex64]) -> Peak {
    let powers: Vec<f64> = (0..GRID_ROWS).map(|row| response.forward_power(weights, row)).collect();
    let row = (0..GRID_ROWS).fold(0, |best, row| if powers[row] > powers[best] { row } else { best });
    refined(row, |row| powers[row])
}

/// Signal gain over one element in dB: forward maximum over Σ|w|², against the first element alone.
pub(super) fn gain_rel_db(response: &Response, weights: &[Complex64], peak: &Peak) -> f64 {
    let total: f64 = weights.iter().map(Complex64::norm_sqr).sum();
    db(peak.power / total / response.one_element_peak())
}

/// All figures of an array with these weights.
///
/// Definitions: RDF is the power towards azimuth 0 over the average over the whole sphere, the lower half counting zero. The
/// take-off elevation comes from a grid of 1° and a parabola through the three dB values about the maximum; the worst
/// rear lobe is the maximum of the grid values (1° by 2°) over azimuth 90 to 270° and all elevations.
#[expect(clippy::cast_precision_loss, reason = "91 rows and columns")]
pub fn directivity(response: &Response, weights: &[Complex64]) -> Directivity {
    let average = response.correlation().average(weights);
    let peak = peak(response, weights);
    let rear = response.rear();
    let strongest = rear.strongest(weights);
    let azimuth = 90.0 + GRID_AZIMUTH_STEP_DEG * strongest.column as f64;
    Directivity {
        rdf_db: peak.level_db - db(average),
        peak_elevation_deg: peak.elevation_deg,
        at: REPORTED_ELEVATIONS_DEG
            .iter()
            .map(|&elevation| at(response, weights, average, elevation))
            .collect(),
        front_to_back_db: db(peak.power / rear.back(weights, peak.row)),
        worst_rear: WorstRear {
            level_db: db(strongest.power) - peak.level_db,
            azimuth_deg: 360.0 - azimuth,
            elevation_deg: 90.0 - strongest.row as f64,
        },
        beamwidth_deg: beamwidth_deg(response, weights, peak.row),
        gain_rel_db: gain_rel_db(response, weights, &peak),
    }
}

fn at(response: &Response, weights: &[Complex64], average: f64, elevation_deg: f64) -> AtElevation {
    let ahead: Vec<Complex64> = response.fields(0.0, elevation_deg).iter().map(|field| field.theta).collect();
    let front = combine(&ahead, weights).norm_sqr();
    let back = response.power(weights, 180.0, elevation_deg);
    AtElevation { elevation_deg, rdf_db: db(front / average), front_to_back_db: db(front / back) }
}

/// The two half-power azimuths next to azimuth 0 at one elevation, linear in dB between grid points.
fn beamwidth_deg(response: &Response, weights: &[Complex64], row: usize) -> f64 {
    let phis: Vec<f64> = (0..=90).map(|step| f64::from(step) * GRID_AZIMUTH_STEP_DEG.to_radians()).collect();
    let (mut left, mut right) = (Vec::new(), Vec::new());
    response.scanner.scan(&grid_thetas()[row..=row], &phis, |_, _, there, mirrored| {
        left.push(db(total(there, weights).power()));
        right.push(db(total(mirrored, weights).power()));
    });
    half_width_deg(&left) + half_width_deg(&right)
}

/// From azimuth 0 to the first half-power point on one side; 180 when there is none.
#[expect(clippy::cast_precision_loss, reason = "91 steps")]
fn half_width_deg(levels: &[f64]) -> f64 {
    for (step, pair) in levels.windows(2).enumerate() {
        let (here, next) = (pair[0] - levels[0], pair[1] - levels[0]);
        if next < -HALF_POWER_DB {
            return (step as f64 + (here + HALF_POWER_DB) / (here - next)) * GRID_AZIMUTH_STEP_DEG;
        }
    }
    180.0
}
