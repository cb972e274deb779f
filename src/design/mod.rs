//! A settled design: the composition with every choice made that depends on parts, land or radio.
//!
//! Best delays are found, the hub amplifier is decided, cables are chosen, and every line has its lengths. Everything
//! after this module reads a [`Design`] and makes no choice of its own.

mod settle;

use rust_decimal::Decimal;

pub use settle::{Settled, code, settle};

use crate::plan::{ArrayPlan, Cables, LineLength};
use crate::project::ArraySpec;

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
    /// The cables chosen.
    pub cables: Cables,
    /// The delay line's electrical length over the row step, and how it was found.
    pub ratio: Decimal,
    /// How the longest bay came about.
    pub bay_reason: String,
}
