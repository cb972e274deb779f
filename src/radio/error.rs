//! What makes an array impossible to compute.

use std::fmt;

/// Why an array has no pattern.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum RadioError {
    /// There is no element.
    NoElement,
    /// The number of weights differs from the number of elements.
    WeightCount {
        /// Elements given.
        elements: usize,
        /// Weights given.
        weights: usize,
    },
    /// All weights are zero, or one is not a number.
    UnusableWeights,
    /// The dimensions are so far from any antenna that the formulas have no finite value.
    NotFinite,
    /// A length, height, diameter, spacing, resistance, frequency or soil constant is not positive, or a position not
    /// finite.
    NotPositive {
        /// The place of the element in the list, from 0; `None` for soil and frequency.
        element: Option<usize>,
        /// Which quantity.
        what: &'static str,
    },
}

impl fmt::Display for RadioError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoElement => write!(out, "the array has no element"),
            Self::WeightCount { elements, weights } => {
                write!(out, "the array has {elements} elements but {weights} weights")
            }
            Self::NotFinite => write!(out, "the dimensions are outside what the formulas can compute"),
            Self::UnusableWeights => write!(out, "all weights are zero, or one is not a number"),
            Self::NotPositive { element: Some(index), what } => {
                write!(out, "the {what} of element {} is not usable", index + 1)
            }
            Self::NotPositive { element: None, what } => write!(out, "the {what} is not usable"),
        }
    }
}

impl std::error::Error for RadioError {}
