//! The array without its weights: what every element hears, from everywhere that matters.

use std::f64::consts::PI;
use std::sync::OnceLock;

use num_complex::Complex64;

use super::element::{ElementKind, RadioElement, Termination};
use super::error::RadioError;
use super::ground::Soil;
use super::quotient::{Correlation, Quotient, combine};
use super::rear::RearGrid;
use super::scan::Scanner;
use crate::units::Frequency;

/// Directions of the pattern grid in elevation: 0 to 90°, one a degree.
pub(super) const GRID_ROWS: usize = 91;
/// The step of the pattern grid in azimuth, in degrees.
pub(super) const GRID_AZIMUTH_STEP_DEG: f64 = 2.0;

/// The far field of one element or of the array, both polarisations.
///
/// Verticals: metres for a unit base current; wires: amperes times metres for one volt behind the matched receiver.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Field {
    /// In the vertical plane.
    pub theta: Complex64,
    /// Parallel to the ground.
    pub phi: Complex64,
}

impl Field {
    pub(super) fn times(self, factor: Complex64) -> Self {
        Self { theta: self.theta * factor, phi: self.phi * factor }
    }

    /// `|E_θ|² + |E_φ|²`.
    pub fn power(self) -> f64 {
        self.theta.norm_sqr() + self.phi.norm_sqr()
    }
}

/// What every element of an array hears at one frequency over one soil; weights come later.
///
/// Everything that the weights do not change is computed once: the matrix of the sky average, the forward column, and (on
/// first use) the rear half of the pattern grid.
#[derive(Debug)]
pub struct Response {
    pub(super) scanner: Scanner,
    elements: Vec<RadioElement>,
    soil: Soil,
    correlation: Correlation,
    /// Fields towards azimuth 0, a row of elements for every degree from the zenith down.
    forward: Vec<Complex64>,
    one_element_peak: f64,
    rear: OnceLock<RearGrid>,
}

impl Response {
    /// Prepares an array.
    ///
    /// # Errors
    /// When there is no element, a dimension, the frequency or a soil constant is not positive and finite, or a conductor is
    /// thicker than it is high.
    pub fn new(elements: &[RadioElement], soil: Soil, frequency: Frequency) -> Result<Self, RadioError> {
        check(elements, soil, frequency)?;
        let scanner = Scanner::new(elements, soil, frequency);
        let forward = forward_column(&scanner);
        let alone = forward_column(&Scanner::new(&elements[..1], soil, frequency));
        let one_element_peak = alone.iter().map(Complex64::norm_sqr).fold(0.0, f64::max);
        let correlation = Correlation::of(&scanner, extent_wavelengths(elements, frequency)).finite()?;
        let elements = elements.to_vec();
        Ok(Self { scanner, elements, soil, correlation, forward, one_element_peak, rear: OnceLock::new() })
    }

    /// The elements.
    pub fn elements(&self) -> &[RadioElement] {
        &self.elements
    }

    /// The soil.
    pub const fn soil(&self) -> Soil {
        self.soil
    }

    /// The frequency.
    pub const fn frequency(&self) -> Frequency {
        self.scanner.frequency
    }

    /// The matrix of the sky average.
    pub const fn correlation(&self) -> &Correlation {
        &self.correlation
    }

    /// Checks that there is one usable weight an element.
    ///
    /// # Errors
    /// When the count differs, all weights are zero, or one is not a number.
    pub fn check_weights(&self, weights: &[Complex64]) -> Result<(), RadioError> {
        let elements = self.elements.len();
        if weights.len() != elements {
            return Err(RadioError::WeightCount { elements, weights: weights.len() });
        }
        let power: f64 = weights.iter().map(Complex64::norm_sqr).sum();
        if power.is_finite() && power > 0.0 { Ok(()) } else { Err(RadioError::UnusableWeights) }
    }

    /// The fields of all elements from a clockwise azimuth off the wanted direction and an elevation, in degrees.
    pub fn fields(&self, azimuth_deg: f64, elevation_deg: f64) -> Vec<Field> {
        let azimuth = (azimuth_deg + 180.0).rem_euclid(360.0) - 180.0;
        let theta = (90.0 - elevation_deg).to_radians();
        let mut fields = Vec::new();
        self.scanner.scan(&[theta], &[azimuth.abs().to_radians()], |_, _, left, right| {
            fields = if azimuth > 0.0 { right.to_vec() } else { left.to_vec() };
        });
        fields
    }

    /// The power that the weighted array hears from a clockwise azimuth and an elevation, in degrees.
    pub fn power(&self, weights: &[Complex64], azimuth_deg: f64, elevation_deg: f64) -> f64 {
        total(&self.fields(azimuth_deg, elevation_deg), weights).power()
    }

    /// The directivity quotient at one elevation in the wanted direction, for many weights.
    pub fn quotient(&self, elevation_deg: f64) -> Quotient {
        let towards = self.fields(0.0, elevation_deg).iter().map(|field| field.theta).collect();
        Quotient::new(self.correlation.clone(), towards)
    }

    /// The power towards azimuth 0, `row` degrees from the zenith.
    pub(super) fn forward_power(&self, weights: &[Complex64], row: usize) -> f64 {
        let count = self.elements.len();
        combine(&self.forward[row * count..(row + 1) * count], weights).norm_sqr()
    }

    /// Element fields towards azimuth 0, `row` degrees from the zenith.
    pub(super) fn forward_fields(&self, row: usize) -> &[Complex64] {
        let count = self.elements.len();
        &self.forward[row * count..(row + 1) * count]
    }

    /// The strongest forward power of the first element alone.
    pub(super) const fn one_element_peak(&self) -> f64 {
        self.one_element_peak
    }

    /// The rear half of the pattern grid.
    pub(super) fn rear(&self) -> &RearGrid {
        self.rear.get_or_init(|| RearGrid::new(&self.scanner, self.extent()))
    }

    /// The greatest distance between two points of the array in wavelengths.
    pub fn extent(&self) -> f64 {
        extent_wavelengths(&self.elements, self.scanner.frequency)
    }
}

/// The weighted sum of the elements' fields.
pub(super) fn total(fields: &[Field], weights: &[Complex64]) -> Field {
    fields.iter().zip(weights).fold(Field::default(), |sum, (field, weight)| {
        let part = field.times(*weight);
        Field { theta: sum.theta + part.theta, phi: sum.phi + part.phi }
    })
}

/// Fields towards azimuth 0 for every degree from the zenith down; parallel wires have no horizontal field there.
fn forward_column(scanner: &Scanner) -> Vec<Complex64> {
    let mut column = Vec::with_capacity(GRID_ROWS * scanner.elements());
    scanner.scan(&grid_thetas(), &[0.0], |_, _, fields, _| {
        column.extend(fields.iter().map(|field| field.theta));
    });
    column
}

/// The zenith angles of the pattern grid in radians.
#[expect(clippy::cast_precision_loss, reason = "91 rows")]
pub(super) fn grid_thetas() -> Vec<f64> {
    (0..GRID_ROWS).map(|row| row as f64 * (PI / 2.0) / (GRID_ROWS - 1) as f64).collect()
}

/// The greatest distance between two points of the array in wavelengths, far ends of wires included.
pub(super) fn extent_wavelengths(elements: &[RadioElement], frequency: Frequency) -> f64 {
    let mut points = Vec::new();
    for element in elements {
        let (x, y) = (element.position.x(), element.position.y());
        points.push((x, y));
        match &element.kind {
            ElementKind::ShortVertical { .. } => {}
            ElementKind::LowWire { length, .. } | ElementKind::TwoWayWire { length, .. } => {
                points.push((x + length.metres(), y));
            }
        }
    }
    let mut greatest: f64 = 0.0;
    for (index, a) in points.iter().enumerate() {
        for b in &points[index + 1..] {
            greatest = greatest.max((a.0 - b.0).hypot(a.1 - b.1));
        }
    }
    greatest / frequency.wavelength_m()
}

/// Checks that every input is usable.
pub(super) fn check(elements: &[RadioElement], soil: Soil, frequency: Frequency) -> Result<(), RadioError> {
    if elements.is_empty() {
        return Err(RadioError::NoElement);
    }
    let positive = |element, what, value: f64| {
        if value.is_finite() && value > 0.0 { Ok(()) } else { Err(RadioError::NotPositive { element, what }) }
    };
    positive(None, "frequency", frequency.mhz())?;
    match soil {
        Soil::Perfect => {}
        Soil::Real { conductivity, permittivity } => {
            positive(None, "conductivity of the soil", conductivity.ms_per_m())?;
            positive(None, "permittivity of the soil", permittivity)?;
        }
    }
    for (index, element) in elements.iter().enumerate() {
        let own = |what, value| positive(Some(index), what, value);
        if !(element.position.forward_m.is_finite() && element.position.right_m.is_finite()) {
            return Err(RadioError::NotPositive { element: Some(index), what: "position" });
        }
        match &element.kind {
            ElementKind::ShortVertical { height } => own("height", height.metres())?,
            ElementKind::LowWire { length, height, diameter, termination } => {
                own("length", length.metres())?;
                own("height", height.metres())?;
                own("diameter", diameter.metres())?;
                own("height over the diameter", height.metres() - diameter.metres())?;
                match termination {
                    Termination::Matched => {}
                    Termination::Reflection(value) => own("reflection", 1.0 - value.abs())?,
                    Termination::Total(resistance) => own("termination", resistance.ohms())?,
                }
            }
            ElementKind::TwoWayWire { length, height, diameter, spacing, path: _ } => {
                own("length", length.metres())?;
                own("height", height.metres())?;
                own("diameter", diameter.metres())?;
                own("spacing", spacing.metres())?;
                own("height over the spacing", height.metres() - spacing.metres().max(diameter.metres()))?;
            }
        }
    }
    Ok(())
}
