//! The ground: its refractive index and what it reflects.

use std::f64::consts::PI;

use num_complex::Complex64;

use crate::units::{Conductivity, Frequency, SPEED_OF_LIGHT_M_PER_S};

/// Permeability of free space in H/m, in the classical value 4π·10⁻⁷.
pub(super) const MU0: f64 = 4e-7 * PI;
/// Permittivity of free space in F/m.
pub(super) const EPS0: f64 = 1.0 / (MU0 * SPEED_OF_LIGHT_M_PER_S * SPEED_OF_LIGHT_M_PER_S);
/// Wave impedance of free space in ohms.
pub(super) const ETA0: f64 = MU0 * SPEED_OF_LIGHT_M_PER_S;

/// Uniform soil under the array.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Soil {
    /// A perfect conductor.
    Perfect,
    /// Real soil.
    Real {
        /// Conductivity.
        conductivity: Conductivity,
        /// Relative permittivity.
        permittivity: f64,
    },
}

impl Soil {
    /// 1 mS/m, 5 (common practice).
    pub const POOR: Self = Self::Real { conductivity: Conductivity::new(1.0), permittivity: 5.0 };
    /// 5 mS/m, 13 (common practice).
    pub const AVERAGE: Self = Self::Real { conductivity: Conductivity::new(5.0), permittivity: 13.0 };
    /// 20 mS/m, 20 (common practice).
    pub const GOOD: Self = Self::Real { conductivity: Conductivity::new(20.0), permittivity: 20.0 };

    /// The square of the complex refractive index, n² = ε − jσ/(2πf ε₀); `None` for a perfect conductor.
    pub fn index_squared(self, frequency: Frequency) -> Option<Complex64> {
        match self {
            Self::Perfect => None,
            Self::Real { conductivity, permittivity } => {
                let sigma = conductivity.ms_per_m() * 1e-3;
                Some(Complex64::new(permittivity, -sigma / (2.0 * PI * frequency.mhz() * 1e6 * EPS0)))
            }
        }
    }
}

/// The plane-wave reflection coefficients of flat ground.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reflection {
    /// Of the field in the plane of incidence; +1 over a perfect conductor.
    pub vertical: Complex64,
    /// Of the field parallel to the ground; −1 over a perfect conductor.
    pub horizontal: Complex64,
}

/// Fresnel's coefficients for a wave at the angle `theta` (radians) from the zenith.
///
/// Source: any text on antennas over ground, such as Jordan and Balmain, "Electromagnetic Waves and Radiating
/// Systems", 1968 (from memory). Flat uniform ground, any angle up to 90°.
pub fn reflection(index_squared: Option<Complex64>, theta: f64) -> Reflection {
    let Some(n2) = index_squared else {
        return Reflection { vertical: Complex64::ONE, horizontal: -Complex64::ONE };
    };
    let (sin, cos) = theta.sin_cos();
    let root = (n2 - sin * sin).sqrt();
    Reflection { vertical: (n2 * cos - root) / (n2 * cos + root), horizontal: (cos - root) / (cos + root) }
}

/// The depth in metres at which a plane wave in the soil has fallen to 1/e; `None` for a perfect conductor.
pub fn penetration_depth_m(soil: Soil, frequency: Frequency) -> Option<f64> {
    let n2 = soil.index_squared(frequency)?;
    Some(1.0 / (Complex64::I * frequency.wavenumber() * n2.sqrt()).re)
}

/// Horizontal over vertical electric field of a wave along the ground, √(n² − 1)/n²: what a low wire lives on.
///
/// `None` over a perfect conductor, where there is none.
pub fn wave_tilt(soil: Soil, frequency: Frequency) -> Option<Complex64> {
    let n2 = soil.index_squared(frequency)?;
    Some((n2 - 1.0).sqrt() / n2)
}
