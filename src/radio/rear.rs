//! The rear half of the pattern grid, and the quick way to its strongest lobe.

use num_complex::Complex64;

use super::response::{GRID_AZIMUTH_STEP_DEG, GRID_ROWS, grid_thetas};
use super::scan::Scanner;

/// Azimuths of the rear half: 90 to 270° in steps of 2°.
pub(super) const REAR_COLUMNS: usize = 91;
/// The column that looks straight back.
const BACK: usize = 45;
/// How many points are worked on together.
const BLOCK: usize = 64;
/// A coarse lobe is followed to its top when it reaches this part of the strongest coarse value.
const WORTH_CLIMBING: f64 = 0.7;
/// At most so many coarse lobes are followed.
const CLIMBS: usize = 5;

/// The fields of one element over a list of points, component by component.
#[derive(Clone, Debug, Default)]
struct Planes {
    theta_re: Vec<f64>,
    theta_im: Vec<f64>,
    phi_re: Vec<f64>,
    phi_im: Vec<f64>,
}

impl Planes {
    fn zeros(points: usize) -> Self {
        let zero = vec![0.0; points];
        Self { theta_re: zero.clone(), theta_im: zero.clone(), phi_re: zero.clone(), phi_im: zero }
    }

    fn gather(&self, points: &[usize]) -> Self {
        let pick = |from: &[f64]| points.iter().map(|&point| from[point]).collect();
        Self {
            theta_re: pick(&self.theta_re),
            theta_im: pick(&self.theta_im),
            phi_re: pick(&self.phi_re),
            phi_im: pick(&self.phi_im),
        }
    }
}

/// Every element over the rear half of the grid, and over a coarse part of it.
#[derive(Debug)]
pub(super) struct RearGrid {
    fine: Vec<Planes>,
    coarse: Vec<Planes>,
    /// Both polarisations count; verticals have one.
    horizontal: bool,
    row_step: usize,
    column_step: usize,
}

/// Room for the coarse values of one search.
#[derive(Debug, Default)]
pub(super) struct Scratch {
    powers: Vec<f64>,
    tops: Vec<(f64, usize)>,
}

/// The strongest point of the rear half.
#[derive(Clone, Copy, Debug)]
pub(super) struct Strongest {
    pub(super) power: f64,
    /// Degrees from the zenith.
    pub(super) row: usize,
    /// Steps of 2° from azimuth 90°.
    pub(super) column: usize,
}

impl RearGrid {
    pub(super) fn new(scanner: &Scanner, extent: f64) -> Self {
        let mut fine = vec![Planes::zeros(GRID_ROWS * REAR_COLUMNS); scanner.elements()];
        let phis: Vec<f64> = (0..=BACK).map(azimuth_rad).collect();
        scanner.scan(&grid_thetas(), &phis, |row, column, left, right| {
            for (fields, column) in [(right, REAR_COLUMNS - 1 - column), (left, column)] {
                let point = row * REAR_COLUMNS + column;
                for (planes, field) in fine.iter_mut().zip(fields) {
                    planes.theta_re[point] = field.theta.re;
                    planes.theta_im[point] = field.theta.im;
                    planes.phi_re[point] = field.phi.re;
                    planes.phi_im[point] = field.phi.im;
                }
            }
        });
        let step = coarse_step_deg(extent);
        let (row_step, column_step) =
            (largest(&[1, 2, 3, 5, 6, 9, 10], step), largest(&[1, 2, 3, 5], step / 2));
        let points: Vec<usize> = (0..GRID_ROWS)
            .step_by(row_step)
            .flat_map(|row| {
                (0..REAR_COLUMNS).step_by(column_step).map(move |column| row * REAR_COLUMNS + column)
            })
            .collect();
        let coarse = fine.iter().map(|planes| planes.gather(&points)).collect();
        Self { fine, coarse, horizontal: !scanner.all_vertical(), row_step, column_step }
    }

    /// The power at one point of the fine grid.
    pub(super) fn power(&self, weights: &[Complex64], row: usize, column: usize) -> f64 {
        let point = row * REAR_COLUMNS + column;
        let (mut theta, mut phi) = (Complex64::ZERO, Complex64::ZERO);
        for (planes, weight) in self.fine.iter().zip(weights) {
            theta += weight * Complex64::new(planes.theta_re[point], planes.theta_im[point]);
            phi += weight * Complex64::new(planes.phi_re[point], planes.phi_im[point]);
        }
        theta.norm_sqr() + phi.norm_sqr()
    }

    /// The power straight back, `row` degrees from the zenith.
    pub(super) fn back(&self, weights: &[Complex64], row: usize) -> f64 {
        self.power(weights, row, BACK)
    }

    /// The strongest point of the whole rear half.
    pub(super) fn strongest(&self, weights: &[Complex64]) -> Strongest {
        let mut powers = vec![0.0; GRID_ROWS * REAR_COLUMNS];
        self.powers(&self.fine, weights, &mut powers);
        let mut best = (f64::NEG_INFINITY, 0);
        for (point, &power) in powers.iter().enumerate() {
            if power > best.0 {
                best = (power, point);
            }
        }
        Strongest { power: best.0, row: best.1 / REAR_COLUMNS, column: best.1 % REAR_COLUMNS }
    }

    /// The strongest power of the rear half, found on the coarse grid and followed to the top on the fine one.
    ///
    /// The coarse grid has at least four points a period of the fastest ripple that an array of this size can show.
    pub(super) fn strongest_quick(&self, weights: &[Complex64], scratch: &mut Scratch) -> f64 {
        let columns = (REAR_COLUMNS - 1) / self.column_step + 1;
        let rows = (GRID_ROWS - 1) / self.row_step + 1;
        scratch.powers.resize(rows * columns, 0.0);
        self.powers(&self.coarse, weights, &mut scratch.powers);
        let Scratch { powers, tops } = scratch;
        let best = powers.iter().copied().fold(0.0, f64::max);
        tops.clear();
        for (point, &power) in powers.iter().enumerate() {
            let (row, column) = (point / columns, point % columns);
            let zenith_again = row == 0 && column > 0;
            if power >= WORTH_CLIMBING * best
                && !zenith_again
                && is_top(powers, (rows, columns), (row, column))
            {
                tops.push((power, point));
            }
        }
        tops.sort_by(|a, b| b.0.total_cmp(&a.0).then(a.1.cmp(&b.1)));
        tops.iter().take(CLIMBS).fold(best, |highest, &(power, point)| {
            let start = (point / columns * self.row_step, point % columns * self.column_step);
            highest.max(self.climb(weights, start, power))
        })
    }

    /// Walks uphill on the fine grid, with steps that shrink to one.
    fn climb(&self, weights: &[Complex64], start: (usize, usize), power: f64) -> f64 {
        let (mut row, mut column) = start;
        let mut best = power;
        let mut step = self.row_step.max(self.column_step).div_ceil(2);
        loop {
            let mut moved = false;
            let rows = [row.saturating_sub(step), row, (row + step).min(GRID_ROWS - 1)];
            let columns = [column.saturating_sub(step), column, (column + step).min(REAR_COLUMNS - 1)];
            for (r, c) in rows.into_iter().flat_map(|r| columns.map(|c| (r, c))) {
                let power = self.power(weights, r, c);
                if power > best {
                    (best, row, column, moved) = (power, r, c, true);
                }
            }
            match (moved, step) {
                (true, _) => {}
                (false, 1) => return best,
                (false, _) => step = step.div_ceil(2),
            }
        }
    }

    /// Powers over all points of `planes`.
    fn powers(&self, planes: &[Planes], weights: &[Complex64], out: &mut [f64]) {
        for (block, chunk) in out.chunks_mut(BLOCK).enumerate() {
            let range = block * BLOCK..block * BLOCK + chunk.len();
            chunk.fill(0.0);
            add_power(planes, weights, range.clone(), chunk, |p| (&p.theta_re, &p.theta_im));
            if self.horizontal {
                add_power(planes, weights, range, chunk, |p| (&p.phi_re, &p.phi_im));
            }
        }
    }
}

/// Adds |Σ w E|² of one polarisation over a block of points; laid out so that the compiler works on several at once.
fn add_power<'a>(
    planes: &'a [Planes],
    weights: &[Complex64],
    range: std::ops::Range<usize>,
    out: &mut [f64],
    component: impl Fn(&'a Planes) -> (&'a Vec<f64>, &'a Vec<f64>),
) {
    let (mut re, mut im) = ([0.0; BLOCK], [0.0; BLOCK]);
    let count = out.len().min(BLOCK);
    for (plane, weight) in planes.iter().zip(weights) {
        let (from_re, from_im) = component(plane);
        let (from_re, from_im) = (&from_re[range.clone()], &from_im[range.clone()]);
        for i in 0..count {
            re[i] += weight.re * from_re[i] - weight.im * from_im[i];
            im[i] += weight.re * from_im[i] + weight.im * from_re[i];
        }
    }
    for i in 0..count {
        out[i] += re[i] * re[i] + im[i] * im[i];
    }
}

/// Whether no neighbour on the coarse grid is stronger.
fn is_top(powers: &[f64], (rows, columns): (usize, usize), (row, column): (usize, usize)) -> bool {
    let own = powers[row * columns + column];
    let (top, bottom) = (row.saturating_sub(1), (row + 1).min(rows - 1));
    let (left, right) = (column.saturating_sub(1), (column + 1).min(columns - 1));
    (top..=bottom).all(|r| (left..=right).all(|c| powers[r * columns + c] <= own))
}

/// Four points a period of the fastest ripple, 360°/(2πX + 2), in whole degrees.
#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "between 1 and 45")]
fn coarse_step_deg(extent: f64) -> usize {
    (90.0 / (std::f64::consts::TAU * extent.min(100.0) + 2.0)).floor().max(1.0) as usize
}

/// The largest of `steps` (ascending) that is at most `limit`.
fn largest(steps: &[usize], limit: usize) -> usize {
    steps.iter().copied().filter(|&step| step <= limit).max().unwrap_or(1)
}

/// The anticlockwise azimuth of a rear column in radians.
#[expect(clippy::cast_precision_loss, reason = "91 columns")]
fn azimuth_rad(column: usize) -> f64 {
    (90.0 + GRID_AZIMUTH_STEP_DEG * column as f64).to_radians()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::radio::{ElementKind, Position, RadioElement, Response, Soil, Termination};
    use crate::units::{Diameter, Frequency, Length};

    fn element(x: f64, y: f64, kind: ElementKind) -> RadioElement {
        RadioElement { position: Position { forward_m: x, right_m: -y }, kind }
    }

    fn layouts() -> Vec<(f64, Vec<RadioElement>)> {
        let post = ElementKind::ShortVertical { height: Length::from_mm(6_000) };
        let wire = ElementKind::LowWire {
            length: Length::from_mm(176_000),
            height: Length::from_mm(3_000),
            diameter: Diameter::from_um(1_600),
            termination: Termination::Matched,
        };
        let three = |y: f64| [0.0, 21.336, 42.672].map(|x| element(x, y, post));
        let pair = |y: f64| [element(0.0, y, wire), element(18.288, y + 4.572, wire)];
        vec![
            (1.83, three(0.0).to_vec()),
            (1.83, [three(0.0), three(121.92)].concat()),
            (3.65, [three(0.0), three(121.92)].concat()),
            (7.1, three(0.0).to_vec()),
            (1.83, pair(0.0).to_vec()),
            (1.83, [pair(0.0), pair(121.92)].concat()),
            (7.1, [pair(0.0), pair(121.92)].concat()),
        ]
    }

    /// Weights with phases from the golden angle: no symmetry to help.
    fn weights(count: usize, draw: u32) -> Vec<Complex64> {
        (0..count).zip(0_u32..).map(|(_, i)| Complex64::cis(2.399_963 * f64::from(draw * 7 + i))).collect()
    }

    #[test]
    fn the_quick_search_finds_the_strongest_point() {
        let mut scratch = Scratch::default();
        let (mut missed, mut worst) = (0, 0.0_f64);
        for (mhz, elements) in layouts() {
            let response =
                Response::new(&elements, Soil::AVERAGE, Frequency::from_mhz(mhz)).expect("a legal array");
            for draw in 0..100 {
                let weights = weights(elements.len(), draw);
                let quick = response.rear().strongest_quick(&weights, &mut scratch);
                let exact = response.rear().strongest(&weights).power;
                assert!(quick <= exact * (1.0 + 1e-12), "{quick} is above {exact}");
                let short_db = 10.0 * (exact / quick).log10();
                worst = worst.max(short_db);
                missed += i32::from(short_db > 1e-9);
            }
        }
        assert!(missed <= 7 && worst < 0.05, "{missed} of 700 missed, by {worst} dB at most");
    }
}
