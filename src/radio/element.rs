//! The inputs: where the elements stand, what they are, and the weights that join them.

use num_complex::Complex64;

use crate::units::{Angle, Diameter, ElectricalLength, Frequency, Length, Resistance, VelocityFactor};

/// A point on the ground in metres, seen in the wanted direction.
///
/// The reference point of an element: the base of a vertical, the feed point (the rear end) of a wire.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Position {
    /// Metres towards the wanted direction (x).
    pub forward_m: f64,
    /// Metres to the right of it, seen from above (−y).
    pub right_m: f64,
}

impl Position {
    /// x, forward.
    pub(super) const fn x(self) -> f64 {
        self.forward_m
    }

    /// y, to the left.
    pub(super) const fn y(self) -> f64 {
        -self.right_m
    }
}

/// What ends a wire at its far end.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Termination {
    /// No reflection.
    Matched,
    /// A real current reflection coefficient.
    Reflection(f64),
    /// Resistor and earth electrode together.
    Total(Resistance),
}

/// How the signal of a two-way wire's direction comes home.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ReturnPath {
    /// The wave arrives at the feed box itself.
    Direct,
    /// The wave arrives at the far end and comes back along the pair as balanced mode.
    Balanced {
        /// Velocity factor of the pair as a two-wire line.
        velocity_factor: VelocityFactor,
    },
}

/// One element without its place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ElementKind {
    /// A vertical fed at its base, short against the wavelength, as a voltage probe or loaded enough not to couple.
    ShortVertical {
        /// Height above ground.
        height: Length,
    },
    /// One terminated wire along the wanted direction; the feed is the rear end.
    LowWire {
        /// Length along the ground.
        length: Length,
        /// Height above ground.
        height: Length,
        /// Diameter of the conductor.
        diameter: Diameter,
        /// What ends it in front.
        termination: Termination,
    },
    /// One direction of a reversible two-wire element; the position is the end that lies to the rear in this direction.
    TwoWayWire {
        /// Length along the ground.
        length: Length,
        /// Height above ground.
        height: Length,
        /// Diameter of each conductor.
        diameter: Diameter,
        /// Distance between the two conductors.
        spacing: Length,
        /// How the signal comes back to the feed box; it changes the signal, not the pattern.
        path: ReturnPath,
    },
}

/// An element in its place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct RadioElement {
    /// Its reference point.
    pub position: Position,
    /// What it is.
    pub kind: ElementKind,
}

/// Elements and the complex weights that the feeding gives them, in the same order.
#[derive(Clone, Debug, PartialEq)]
pub struct Array {
    /// The elements, all looking forward.
    pub elements: Vec<RadioElement>,
    /// One weight an element: amplitude, inversion and delay of its way to the output.
    pub weights: Vec<Complex64>,
}

/// The factor e^{−jkd} of a line of `metres` of free space.
pub fn delay_factor(frequency: Frequency, metres: f64) -> Complex64 {
    Complex64::cis(-frequency.wavenumber() * metres)
}

/// The weight of a leg: amplitude, a phase that it adds (an inverter adds 180°), and a delay line.
pub fn weight(frequency: Frequency, amplitude: f64, phase: Angle, delay: ElectricalLength) -> Complex64 {
    amplitude * Complex64::cis(phase.radians()) * delay_factor(frequency, delay.metres())
}

/// The same points seen in a direction `clockwise` from the present one, about the origin.
///
/// For switched arrays of verticals: a ring or a square is looked at from each direction in turn.
pub fn turned_to(elements: &[RadioElement], clockwise: Angle) -> Vec<RadioElement> {
    let (sin, cos) = clockwise.radians().sin_cos();
    elements
        .iter()
        .map(|element| {
            let Position { forward_m, right_m } = element.position;
            let position = Position {
                forward_m: forward_m * cos + right_m * sin,
                right_m: right_m * cos - forward_m * sin,
            };
            RadioElement { position, kind: element.kind }
        })
        .collect()
}
