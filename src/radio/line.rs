//! A wire over lossy ground as a transmission line, alone and as a pair.

use std::f64::consts::TAU;

use num_complex::Complex64;

use super::ground::{ETA0, MU0};
use crate::units::{Diameter, Frequency, Length};

/// Conductivity of copper in S/m.
const COPPER: f64 = 5.8e7;

/// Propagation constant and characteristic impedance of one mode.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineConstants {
    /// Propagation constant in 1/m: attenuation in nepers, phase in radians.
    pub gamma: Complex64,
    /// Characteristic impedance in ohms.
    pub impedance: Complex64,
}

impl LineConstants {
    /// Attenuation in dB per 100 m.
    pub fn attenuation_db_per_100m(self) -> f64 {
        self.gamma.re * 2000.0 / std::f64::consts::LN_10
    }

    /// Phase velocity over the speed of light.
    pub fn velocity_factor(self, frequency: Frequency) -> f64 {
        frequency.wavenumber() / self.gamma.im
    }
}

/// The four terms that make the line constants, all without unit (series and shunt, over their common factors).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineTerms {
    /// L = ln(2h/a).
    pub geometry: f64,
    /// P, the soil's part of the series impedance.
    pub earth_impedance: Complex64,
    /// Q, the soil's part of the potential.
    pub earth_potential: Complex64,
    /// The conductor's internal impedance.
    pub conductor: Complex64,
}

impl LineTerms {
    fn series(self) -> Complex64 {
        self.geometry + self.earth_impedance + self.conductor
    }

    fn shunt(self) -> Complex64 {
        self.geometry + self.earth_potential
    }

    /// γ = jk √((L + P + z)/(L + Q)), Z₀ = (η/2π) √((L + P + z)(L + Q)), z the conductor's term.
    pub fn constants(self, frequency: Frequency) -> LineConstants {
        mode(frequency, self.series(), self.shunt())
    }
}

fn mode(frequency: Frequency, series: Complex64, shunt: Complex64) -> LineConstants {
    LineConstants {
        gamma: Complex64::I * frequency.wavenumber() * (series / shunt).sqrt(),
        impedance: ETA0 / TAU * (series * shunt).sqrt(),
    }
}

/// The soil's transverse constant q = jk √(n² − 1).
fn soil_constant(frequency: Frequency, n2: Complex64) -> Complex64 {
    Complex64::I * frequency.wavenumber() * (n2 - 1.0).sqrt()
}

/// Skin-effect impedance of a round copper wire of radius `radius_m` over jωμ₀/2π, thin-skin form.
fn conductor_term(frequency: Frequency, radius_m: f64) -> Complex64 {
    let omega = TAU * frequency.mhz() * 1e6;
    let ohm_per_m = Complex64::new(1.0, 1.0) * (omega * MU0 / (2.0 * COPPER)).sqrt() / (TAU * radius_m);
    ohm_per_m * TAU / (Complex64::I * omega * MU0)
}

/// The line terms of a copper wire of radius `radius_m` at `height_m` over ground.
///
/// P = ln(1 + 1/(qh)) by the complex image depth 1/q (Deri and others, "The complex ground return plane", 1981);
/// Q = 2/(n²+1) ln(1 + (n²+1)/(2qh)), the logarithmic form of the potential integral (Wise, "Potential coefficients
/// for ground return circuits", 1948); both from memory. Quasi-TEM: height up to a tenth of a wavelength.
pub fn line_terms(
    frequency: Frequency,
    index_squared: Option<Complex64>,
    height_m: f64,
    radius_m: f64,
) -> LineTerms {
    let (earth_impedance, earth_potential) = index_squared.map_or((Complex64::ZERO, Complex64::ZERO), |n2| {
        let qh = soil_constant(frequency, n2) * height_m;
        let sum = n2 + 1.0;
        ((1.0 + 1.0 / qh).ln(), 2.0 / sum * (1.0 + sum / (2.0 * qh)).ln())
    });
    LineTerms {
        geometry: (2.0 * height_m / radius_m).ln(),
        earth_impedance,
        earth_potential,
        conductor: conductor_term(frequency, radius_m),
    }
}

/// The modes of two equal wires side by side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PairConstants {
    /// Either wire alone.
    pub single: LineConstants,
    /// Equal currents.
    pub even: LineConstants,
    /// Opposite currents.
    pub odd: LineConstants,
}

/// The modes of two equal copper wires at `height_m`, `distance_m` apart sideways.
///
/// The mutual terms come from the same complex images as [`line_terms`]; the general multiconductor theory is in Paul,
/// "Analysis of Multiconductor Transmission Lines", 1994 (from memory). Distance well above the wire radius.
pub fn pair_constants(
    frequency: Frequency,
    index_squared: Option<Complex64>,
    height_m: f64,
    radius_m: f64,
    distance_m: f64,
) -> PairConstants {
    let terms = line_terms(frequency, index_squared, height_m, radius_m);
    let d2 = distance_m * distance_m;
    let image2 = 4.0 * height_m * height_m + d2;
    let mutual = 0.5 * (image2 / d2).ln();
    let (earth_impedance, earth_potential) = index_squared.map_or((Complex64::ZERO, Complex64::ZERO), |n2| {
        let q = soil_constant(frequency, n2);
        let sum = n2 + 1.0;
        let shifted = |depth: Complex64| 0.5 * (((2.0 * height_m + depth).powi(2) + d2) / image2).ln();
        (shifted(2.0 / q), 2.0 / sum * shifted(sum / q))
    });
    let (zm, ym) = (mutual + earth_impedance, mutual + earth_potential);
    let (z, y) = (terms.series(), terms.shunt());
    PairConstants {
        single: mode(frequency, z, y),
        even: mode(frequency, z + zm, y + ym),
        odd: mode(frequency, z - zm, y - ym),
    }
}

/// Characteristic impedance in ohms of a lossless wire over a perfect conductor: (η/2π) arcosh(2h/d).
pub fn perfect_ground_impedance_ohm(height: Length, diameter: Diameter) -> f64 {
    ETA0 / TAU * (2.0 * height.metres() / diameter.metres()).acosh()
}

/// Characteristic impedance in ohms of a lossless two-wire line in free space: (η/π) arcosh(D/d).
pub fn two_wire_impedance_ohm(spacing: Length, diameter: Diameter) -> f64 {
    ETA0 / std::f64::consts::PI * (spacing.metres() / diameter.metres()).acosh()
}
