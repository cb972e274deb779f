//! The sky average as a quadratic form of the weights, and the largest directivity it allows.

use nalgebra::{DMatrix, DVector, SymmetricEigen};
use num_complex::Complex64;

use super::element::RadioElement;
use super::error::RadioError;
use super::ground::Soil;
use super::response::{check, extent_wavelengths};
use super::scan::Scanner;
use super::sphere::SphereRule;
use crate::units::Frequency;

/// Eigenvalues below this part of the largest are rounding, not directions to listen in.
const RANK_LIMIT: f64 = 1e-13;

/// The Hermitian matrix B with `B_ij = (1/4π) ∫ E_i·E_j* dΩ` over the upper half of the sky.
///
/// Noise is taken as unpolarised, equal from everywhere above the horizon, and none from below.
#[derive(Clone, Debug, PartialEq)]
pub struct Correlation {
    diagonal: Vec<f64>,
    /// Above the diagonal, row by row.
    upper: Vec<Complex64>,
}

impl Correlation {
    /// The matrix of an array, built afresh.
    ///
    /// # Errors
    /// As [`super::Response::new`].
    pub fn new(elements: &[RadioElement], soil: Soil, frequency: Frequency) -> Result<Self, RadioError> {
        check(elements, soil, frequency)?;
        let scanner = Scanner::new(elements, soil, frequency);
        Self::of(&scanner, extent_wavelengths(elements, frequency)).finite()
    }

    /// The same by a given rule in two dimensions, for comparison.
    ///
    /// # Errors
    /// As [`super::Response::new`].
    pub fn by_rule(
        elements: &[RadioElement],
        soil: Soil,
        frequency: Frequency,
        rule: SphereRule,
    ) -> Result<Self, RadioError> {
        check(elements, soil, frequency)?;
        over_sphere(&Scanner::new(elements, soil, frequency), rule).finite()
    }

    pub(super) fn of(scanner: &Scanner, extent: f64) -> Self {
        let rule = SphereRule::for_extent(extent);
        if scanner.all_vertical() { of_verticals(scanner, rule) } else { over_sphere(scanner, rule) }
    }

    /// The matrix itself when every entry is finite.
    pub(super) fn finite(self) -> Result<Self, RadioError> {
        let finite = self.diagonal.iter().all(|own| own.is_finite() && *own > 0.0)
            && self.upper.iter().all(|entry| entry.is_finite());
        if finite { Ok(self) } else { Err(RadioError::NotFinite) }
    }

    /// How many elements there are.
    pub const fn len(&self) -> usize {
        self.diagonal.len()
    }

    /// Whether there is no element.
    pub const fn is_empty(&self) -> bool {
        self.diagonal.is_empty()
    }

    /// The entry `B_ij`.
    ///
    /// # Panics
    /// When a place is beyond the number of elements.
    pub fn entry(&self, i: usize, j: usize) -> Complex64 {
        match i.cmp(&j) {
            std::cmp::Ordering::Equal => self.diagonal[i].into(),
            std::cmp::Ordering::Less => self.upper[self.place(i, j)],
            std::cmp::Ordering::Greater => self.upper[self.place(j, i)].conj(),
        }
    }

    /// The place of (i, j) with i < j in the upper triangle.
    const fn place(&self, i: usize, j: usize) -> usize {
        i * self.len() - i * (i + 1) / 2 + j - i - 1
    }

    /// The sky average wᵀ B w* of the weighted array.
    pub fn average(&self, weights: &[Complex64]) -> f64 {
        let mut upper = self.upper.iter();
        let (mut own, mut mutual) = (0.0, 0.0);
        for (i, (weight, diagonal)) in weights.iter().zip(&self.diagonal).enumerate() {
            own += weight.norm_sqr() * diagonal;
            let mut row = Complex64::ZERO;
            for (entry, other) in upper.by_ref().take(self.diagonal.len() - 1 - i).zip(&weights[i + 1..]) {
                row += entry * other.conj();
            }
            mutual += weight.re * row.re - weight.im * row.im;
        }
        own + 2.0 * mutual
    }

    /// `Σ |w_i|² B_ii`: the average if the elements had nothing in common.
    pub(super) fn independent(&self, weights: &[Complex64]) -> f64 {
        weights.iter().zip(&self.diagonal).map(|(weight, own)| weight.norm_sqr() * own).sum()
    }

    fn matrix(&self) -> DMatrix<Complex64> {
        DMatrix::from_fn(self.len(), self.len(), |i, j| self.entry(i, j))
    }
}

/// Verticals: the azimuth integral is a Bessel function, `B_ij = ½ ∫ E_i E_j* J₀(kρ √(1 − u²)) du`.
///
/// Eight points more than the rule asks for, since compact arrays subtract nearly equal entries.
fn of_verticals(scanner: &Scanner, rule: SphereRule) -> Correlation {
    let count = scanner.elements();
    let mut correlation =
        Correlation { diagonal: vec![0.0; count], upper: vec![Complex64::ZERO; count * (count - 1) / 2] };
    let origins: Vec<(f64, f64)> = (0..count).map(|index| scanner.origin(index)).collect();
    let rule = SphereRule { elevations: rule.elevations + 8, azimuths: rule.azimuths };
    for (u, weight) in rule.nodes() {
        let fields = scanner.vertical_fields(u.acos());
        let scale = scanner.wavenumber * (1.0 - u * u).sqrt();
        let mut upper = correlation.upper.iter_mut();
        for i in 0..count {
            correlation.diagonal[i] += 0.5 * weight * fields[i].norm_sqr();
            for (j, entry) in (i + 1..count).zip(upper.by_ref()) {
                let distance = (origins[i].0 - origins[j].0).hypot(origins[i].1 - origins[j].1);
                *entry += 0.5 * weight * libm::j0(scale * distance) * fields[i] * fields[j].conj();
            }
        }
    }
    correlation
}

/// Any elements: the rule in two dimensions.
#[expect(clippy::cast_precision_loss, reason = "some hundred points")]
fn over_sphere(scanner: &Scanner, rule: SphereRule) -> Correlation {
    let count = scanner.elements();
    let mut correlation =
        Correlation { diagonal: vec![0.0; count], upper: vec![Complex64::ZERO; count * (count - 1) / 2] };
    let nodes = rule.nodes();
    let thetas: Vec<f64> = nodes.iter().map(|(u, _)| u.acos()).collect();
    let half = rule.azimuths / 2;
    let phis: Vec<f64> = (0..=half).map(|m| std::f64::consts::PI * m as f64 / half as f64).collect();
    scanner.scan(&thetas, &phis, |row, column, left, right| {
        // straight ahead and straight back have no mirror image: both copies count half
        let edge = if column == 0 || column == half { 0.5 } else { 1.0 };
        let weight = 0.25 * edge * nodes[row].1 / half as f64;
        for fields in [left, right] {
            let mut upper = correlation.upper.iter_mut();
            for (i, a) in fields.iter().enumerate() {
                correlation.diagonal[i] += weight * a.power();
                let (theta, phi) = (weight * a.theta, weight * a.phi);
                for (b, entry) in fields[i + 1..].iter().zip(upper.by_ref()) {
                    *entry += theta * b.theta.conj() + phi * b.phi.conj();
                }
            }
        }
    });
    correlation
}

/// The sum of fields times weights.
pub(super) fn combine(fields: &[Complex64], weights: &[Complex64]) -> Complex64 {
    let mut sum = Complex64::ZERO;
    for (field, weight) in fields.iter().zip(weights) {
        sum += field * weight;
    }
    sum
}

/// Decibels of a power ratio.
pub(super) fn db(ratio: f64) -> f64 {
    10.0 * ratio.log10()
}

/// RDF at one elevation as a quotient of two quadratic forms: new weights cost a few dozen multiplications.
#[derive(Clone, Debug, PartialEq)]
pub struct Quotient {
    correlation: Correlation,
    towards: Vec<Complex64>,
}

/// The most directive weights under a diagonal loading, and what they give without it.
#[derive(Clone, Debug, PartialEq)]
pub struct Bound {
    /// RDF of the weights in dB, with the unloaded matrix.
    pub rdf_db: f64,
    /// The weights, largest amplitude 1, phases relative to the first element.
    pub weights: Vec<Complex64>,
}

impl Quotient {
    /// From the matrix and the elements' fields towards the wanted direction.
    pub const fn new(correlation: Correlation, towards: Vec<Complex64>) -> Self {
        Self { correlation, towards }
    }

    /// For an array that is used once: only the matrix and one direction, no pattern grid.
    ///
    /// # Errors
    /// As [`super::Response::new`].
    pub fn build(
        elements: &[RadioElement],
        soil: Soil,
        frequency: Frequency,
        elevation_deg: f64,
    ) -> Result<Self, RadioError> {
        check(elements, soil, frequency)?;
        let scanner = Scanner::new(elements, soil, frequency);
        let mut towards = Vec::new();
        scanner.scan(&[(90.0 - elevation_deg).to_radians()], &[0.0], |_, _, fields, _| {
            towards = fields.iter().map(|field| field.theta).collect();
        });
        let correlation = Correlation::of(&scanner, extent_wavelengths(elements, frequency)).finite()?;
        Ok(Self::new(correlation, towards))
    }

    /// RDF in dB: 10 lg(|wᵀv|² / wᵀBw*).
    pub fn rdf_db(&self, weights: &[Complex64]) -> f64 {
        db(combine(&self.towards, weights).norm_sqr() / self.correlation.average(weights))
    }

    /// The largest RDF with `loading` × B₁₁ added to the diagonal: w = conj((B + e B₁₁)⁻¹ v).
    ///
    /// The loading is the error variance an element; 0 gives the ideal maximum, 0.01 (0.5 dB and 5°) what can be built.
    /// Source: Cheng, "Optimization techniques for antenna arrays", 1971; Gilbert and Morgan, "Optimum design of
    /// directive antenna arrays subject to random variations", 1955 (both from memory).
    pub fn bound(&self, loading: f64) -> Bound {
        let eigen = SymmetricEigen::new(self.correlation.matrix());
        let towards = DVector::from_column_slice(&self.towards);
        let extra = loading * self.correlation.diagonal[0];
        let least = RANK_LIMIT * eigen.eigenvalues.max();
        let mut solution = DVector::zeros(self.towards.len());
        for (value, vector) in eigen.eigenvalues.iter().zip(eigen.eigenvectors.column_iter()) {
            if value + extra > least {
                solution += vector * (vector.dotc(&towards) / Complex64::from(value + extra));
            }
        }
        let weights = normalised(solution.iter().map(Complex64::conj).collect());
        Bound { rdf_db: self.rdf_db(&weights), weights }
    }
}

/// Scaled so that the largest amplitude is 1 and the first weight is real and positive.
fn normalised(weights: Vec<Complex64>) -> Vec<Complex64> {
    let largest = weights.iter().map(|weight| weight.norm()).fold(0.0, f64::max);
    let first = weights.first().map_or(0.0, |weight| weight.arg());
    let factor = Complex64::from_polar(1.0 / largest, -first);
    weights.into_iter().map(|weight| weight * factor).collect()
}
