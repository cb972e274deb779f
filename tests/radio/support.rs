//! Short ways to describe arrays and to compare figures.

use arraywright::radio::{ElementKind, Position, RadioElement, Termination, delay_factor};
use arraywright::units::{Diameter, Frequency, Length};
use num_complex::Complex64;

/// 1.83 MHz.
pub(crate) fn mhz(value: f64) -> Frequency {
    Frequency::from_mhz(value)
}

/// A vertical at x forward and y to the left, as the reference tables write it.
pub(crate) fn vertical(x: f64, y: f64, height_m: f64) -> RadioElement {
    let kind = ElementKind::ShortVertical { height: Length::from_metres_nearest(height_m) };
    RadioElement { position: Position { forward_m: x, right_m: -y }, kind }
}

/// A matched wire of 1.6 mm with its feed at x forward and y to the left.
pub(crate) fn wire(x: f64, y: f64, length_m: f64, height_m: f64) -> RadioElement {
    wire_ending(x, y, length_m, height_m, Termination::Matched)
}

/// The same with another termination.
pub(crate) fn wire_ending(
    x: f64,
    y: f64,
    length_m: f64,
    height_m: f64,
    termination: Termination,
) -> RadioElement {
    let kind = ElementKind::LowWire {
        length: Length::from_metres_nearest(length_m),
        height: Length::from_metres_nearest(height_m),
        diameter: Diameter::from_um(1_600),
        termination,
    };
    RadioElement { position: Position { forward_m: x, right_m: -y }, kind }
}

/// Weights of a crossfire pair, rear then front: rear inverted and delayed.
pub(crate) fn crossfire(frequency: Frequency, delay_m: f64) -> Vec<Complex64> {
    vec![-delay_factor(frequency, delay_m), Complex64::ONE]
}

/// Equal weights.
pub(crate) fn equal(count: usize) -> Vec<Complex64> {
    vec![Complex64::ONE; count]
}
