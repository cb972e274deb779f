//! What a stage says of itself: where its seats are, which weight each has, and how they are joined.
//!
//! A new family is one file that returns a [`Stage`]; everything after it reads points and feed-tree nodes.

use rust_decimal::Decimal;

use crate::plan::{DesignWeight, Position};
use crate::units::ElectricalLength;

/// A rule that repeats a group in space and joins the copies.
#[derive(Clone, Debug)]
pub struct Stage {
    /// The copies, in the order that they are numbered.
    pub seats: Vec<Seat>,
    /// How they are joined, receiver side first.
    pub recipe: Recipe,
    /// Whether the stage must listen forward more than backward.
    pub directive: Directive,
}

/// Whether a stage has a front and a rear.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Directive {
    /// An end-fire stage: it must hear the front better than the rear. The number is the least forward array factor
    /// over the sum of amplitudes, below which the stage is unusable, in hundredths.
    Forward(u32),
    /// Given positions and weights: only a warning when it hears the rear better.
    Advised,
    /// A broadside row: the same both ways.
    Both,
}

/// One copy of the group inside a stage.
#[derive(Clone, Debug)]
pub struct Seat {
    /// The role it plays: front, middle, rear, or its place in a row.
    pub role: String,
    /// From the centre of the stage.
    pub at: Position,
    /// The weight it is meant to have.
    pub weight: DesignWeight,
}

/// How the seats of a stage are joined, as a small tree over seat numbers.
#[derive(Clone, Debug)]
pub enum Recipe {
    /// The signal of one seat.
    Seat(usize),
    /// Through a delay line.
    Delay {
        /// Its electrical length.
        electrical: ElectricalLength,
        /// How that came about.
        reason: String,
        /// What is delayed.
        of: Box<Recipe>,
    },
    /// Through an inverter.
    Invert(Box<Recipe>),
    /// Through a pad.
    Pad {
        /// Its loss.
        db: f64,
        /// Why it is there.
        why: String,
        /// What is attenuated.
        of: Box<Recipe>,
    },
    /// An in-phase hybrid.
    Combine(Vec<Recipe>),
}

impl Recipe {
    /// `of` through a delay; itself when there is nothing to delay.
    pub fn delayed(of: Self, electrical: ElectricalLength, reason: String) -> Self {
        if electrical.decimal_metres() <= Decimal::ZERO {
            return of;
        }
        Self::Delay { electrical, reason, of: Box::new(of) }
    }

    /// `of` through an inverter.
    pub fn inverted(of: Self) -> Self {
        Self::Invert(Box::new(of))
    }

    /// Puts a pad into the one leg of a pair that has no delay; anything else stays as it is.
    #[must_use]
    pub fn balanced(self, db: f64, why: &str) -> Self {
        let Self::Combine(mut legs) = self else { return self };
        if legs.len() == 2 && legs[0].is_delayed() != legs[1].is_delayed() {
            let plain = usize::from(legs[0].is_delayed());
            let of = Box::new(legs.remove(plain));
            legs.insert(plain, Self::Pad { db, why: why.to_owned(), of });
        }
        Self::Combine(legs)
    }

    fn is_delayed(&self) -> bool {
        match self {
            Self::Seat(_) => false,
            Self::Delay { .. } => true,
            Self::Invert(of) | Self::Pad { of, .. } => of.is_delayed(),
            Self::Combine(of) => of.iter().any(Self::is_delayed),
        }
    }

    /// Equal in-phase combining of any number of inputs: 3-way hybrids nearest the elements, then 2-way ones, which
    /// takes the fewest boxes. A number that is not 2^a·3^b ends in one combiner that nobody builds; the takeoff says so.
    pub fn combined(mut inputs: Vec<Self>) -> Self {
        while inputs.len() > 3 {
            let ways = match inputs.len() {
                n if n % 3 == 0 => 3,
                n if n % 2 == 0 => 2,
                _ => break,
            };
            let mut level = Vec::new();
            let mut rest = inputs.into_iter().peekable();
            while rest.peek().is_some() {
                level.push(Self::Combine(rest.by_ref().take(ways).collect()));
            }
            inputs = level;
        }
        if inputs.len() == 1 { inputs.swap_remove(0) } else { Self::Combine(inputs) }
    }
}
