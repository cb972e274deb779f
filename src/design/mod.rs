//! A settled design: the composition with every choice made that depends on parts, land or radio.
//!
//! Best delays are found, the hub amplifier is decided, cables are chosen, and every line has its lengths, tolerance and
//! test frequency. Everything after this module reads a [`Design`] and makes no choice of its own.

mod amplifier;
mod balance;
mod bay;
pub mod code;
mod delay;
mod direction;
mod earth;
mod hybrid;
mod land;
mod settle;
mod termination;
mod unused;

use rust_decimal::Decimal;

pub use delay::{best_in_words, delay_curve};
pub use earth::{EarthSize, earth_size, longest_radial, rod_length, set_ohms};
pub use hybrid::check_hybrids;
pub use settle::{Settled, settle};

use crate::plan::{ArrayPlan, Cables, LineLength};
use crate::project::ArraySpec;
use crate::radio::Soil;
use crate::reception::{Ends, NoiseSite, Subject, Trim, Weighting};
use crate::units::Length;

/// One option, settled.
#[derive(Clone, Debug)]
pub struct Design {
    /// The option's name; empty when the file has none.
    pub option: String,
    /// Its arrays in file order.
    pub arrays: Vec<ArrayDesign>,
    /// Routed over straight length on this terrain.
    pub route_factor: Decimal,
}

/// One array, settled.
#[derive(Clone, Debug)]
pub struct ArrayDesign {
    /// What the project says.
    pub spec: ArraySpec,
    /// Where everything stands and how it is joined.
    pub plan: ArrayPlan,
    /// The lengths of `plan.feed.lines`, in the same order.
    pub lengths: Vec<LineLength>,
    /// How exact each of them must be; nothing for lines that need not be.
    pub tolerances: Vec<Option<Length>>,
    /// The test frequencies of lines that must be exact.
    pub trims: Vec<Option<Trim>>,
    /// The cables chosen.
    pub cables: Cables,
    /// The delay line's electrical length over the row step, given or found.
    pub ratio: Decimal,
    /// How the longest bay came about.
    pub bay_reason: String,
    /// Why the hub has or has not an amplifier.
    pub amplifier_reason: String,
    /// The ground constants.
    pub soil: Soil,
    /// How the far ends of wires are built.
    pub ends: Ends,
    /// What stands in the termination boxes, and why; empty without wires.
    pub termination_reason: String,
    /// External noise and what the catalogue has against it.
    pub noise: NoiseSite,
}

impl Design {
    /// The array that this option is judged by: its first own one, for an array of every option tells none apart; else its
    /// first.
    pub fn judged(&self) -> usize {
        self.arrays.iter().position(|array| array.spec.option.is_some()).unwrap_or_default()
    }
}

impl ArrayDesign {
    /// This array as a subject of a pattern report.
    pub fn subject(&self, weighting: Weighting) -> Subject<'_> {
        let ends = match weighting {
            Weighting::Ideal => Ends::Matched,
            Weighting::Built => self.ends,
        };
        Subject {
            plan: &self.plan,
            lengths: &self.lengths,
            cables: &self.cables,
            soil: self.soil,
            ends,
            weighting,
            noise: &self.noise,
        }
    }
}
