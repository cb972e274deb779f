//! The short vertical over ground.

use num_complex::Complex64;

use super::ground::{Reflection, reflection};
use super::sphere::gauss_legendre;
use crate::units::{Frequency, Length};

/// Points along the height; six give full precision up to an eighth of a wavelength.
const HEIGHT_POINTS: usize = 6;

/// A vertical prepared for one frequency: heights, currents times weights.
#[derive(Clone, Debug)]
pub(super) struct Vertical {
    wavenumber: f64,
    samples: Vec<(f64, f64)>,
}

impl Vertical {
    /// Current sin k(H−z)/sin kH along the height, relative to the base.
    pub(super) fn new(wavenumber: f64, height_m: f64) -> Self {
        let base = (wavenumber * height_m).sin();
        let samples = gauss_legendre(HEIGHT_POINTS)
            .into_iter()
            .map(|(u, w)| {
                let z = u * height_m;
                (z, w * height_m * (wavenumber * (height_m - z)).sin() / base)
            })
            .collect();
        Self { wavenumber, samples }
    }

    /// The vertically polarised field at the angle with this sine and cosine from the zenith.
    pub(super) fn field(&self, sin: f64, cos: f64, ground: Reflection) -> Complex64 {
        let sum: Complex64 = self
            .samples
            .iter()
            .map(|&(z, current)| {
                let up = Complex64::cis(self.wavenumber * z * cos);
                current * (up + ground.vertical * up.conj())
            })
            .sum();
        -sin * sum
    }
}

/// The field in metres (unit base current) of a base-fed vertical at `theta` radians from the zenith.
///
/// `E = −sin θ ∫ I(z) [e^{jkz cos θ} + R_v e^{−jkz cos θ}] dz` with I(z) = sin k(H−z)/sin kH. Mutual coupling is left out:
/// exact for voltage probes. Heights up to λ/8. Source: the image principle with Fresnel's coefficients, as
/// [`reflection`].
pub fn vertical_field(
    frequency: Frequency,
    index_squared: Option<Complex64>,
    height: Length,
    theta: f64,
) -> Complex64 {
    let (sin, cos) = theta.sin_cos();
    Vertical::new(frequency.wavenumber(), height.metres()).field(sin, cos, reflection(index_squared, theta))
}
