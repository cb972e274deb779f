//! The weight that an element is meant to have, before anything is bought.

use crate::units::{ElectricalLength, Frequency};

/// The weight that an element is meant to have, before cables and boxes add their losses.
///
/// As a complex number: amplitude × polarity × e^(−jkd) × e^(j phase), d the electrical length of the delay.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct DesignWeight {
    /// Relative amplitude.
    pub amplitude: f64,
    /// Upright or inverted.
    pub polarity: Polarity,
    /// Electrical length of the delay in the leg.
    pub delay: ElectricalLength,
}

impl DesignWeight {
    /// Amplitude 1, upright, no delay.
    pub const UNIT: Self =
        Self { amplitude: 1.0, polarity: Polarity::Upright, delay: ElectricalLength::ZERO };

    /// The weight of a seat within a seat: amplitudes and polarities multiply, delays add.
    #[must_use]
    pub fn within(self, outer: Self) -> Self {
        let delay = self.delay.decimal_metres() + outer.delay.decimal_metres();
        Self {
            amplitude: self.amplitude * outer.amplitude,
            polarity: self.polarity.times(outer.polarity),
            delay: ElectricalLength::from_metres(delay),
        }
    }

    /// Its phase at `frequency` in radians, receive convention e^(−jkd).
    pub fn phase(self, frequency: Frequency) -> f64 {
        let inversion = match self.polarity {
            Polarity::Upright => 0.0,
            Polarity::Inverted => std::f64::consts::PI,
        };
        inversion - frequency.wavenumber() * self.delay.metres()
    }
}

/// Whether a leg is inverted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Polarity {
    /// As it comes.
    Upright,
    /// Through an inverter.
    Inverted,
}

impl Polarity {
    /// Two inversions cancel.
    #[must_use]
    pub fn times(self, other: Self) -> Self {
        if self == other { Self::Upright } else { Self::Inverted }
    }
}
