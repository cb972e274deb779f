//! The way home of a reversible two-wire element.

use std::f64::consts::PI;

use num_complex::Complex64;

use super::element::{ElementKind, ReturnPath};
use super::ground::MU0;
use super::line::two_wire_impedance_ohm;
use crate::units::{Frequency, Length};

/// Conductivity of copper in S/m.
const COPPER: f64 = 5.8e7;

/// The factor `e^{−γL}` that the signal of an element takes on its way back along the pair; 1 for every other element.
///
/// γ = R/(2Z) + jk/VF, Z the pair's impedance, R the skin-effect resistance of both copper wires. Own derivation, not compared with a
/// reference. The factor is the same for every element of a direction, so it changes the signal, not the pattern.
pub fn balanced_return(frequency: Frequency, kind: &ElementKind) -> Complex64 {
    match kind {
        ElementKind::ShortVertical { .. } | ElementKind::LowWire { .. } => Complex64::ONE,
        ElementKind::TwoWayWire { length, height: _, diameter, spacing, path } => match path {
            ReturnPath::Direct => Complex64::ONE,
            ReturnPath::Balanced { velocity_factor } => {
                let surface = (PI * frequency.mhz() * 1e6 * MU0 / COPPER).sqrt();
                let ohm_per_m = 2.0 * surface / (PI * diameter.metres());
                let nepers_per_m = ohm_per_m / (2.0 * two_wire_impedance_ohm(*spacing, *diameter));
                along(*length, nepers_per_m, frequency.wavenumber() / velocity_factor.value())
            }
        },
    }
}

fn along(length: Length, nepers_per_m: f64, radians_per_m: f64) -> Complex64 {
    Complex64::from_polar((-nepers_per_m * length.metres()).exp(), -radians_per_m * length.metres())
}
