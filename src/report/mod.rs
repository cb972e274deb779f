//! Results to bytes: JSON as pinned, and tables as text, Markdown or CSV from one view.

pub mod compare;
pub mod document;
pub mod drawing;
pub mod estimate;
pub mod machine;
pub mod parts;
pub mod pattern;
mod running_head;
pub mod sheet;
pub mod why;

pub use sheet::{Sheet, Table};

use crate::design::Design;
use crate::pricing::Bill;
use crate::takeoff::Takeoff;

/// One option with everything that was worked out for it.
#[derive(Clone, Debug)]
pub struct OptionResult {
    /// The settled design.
    pub design: Design,
    /// What it needs.
    pub takeoff: Takeoff,
    /// What that costs.
    pub bill: Bill,
}

impl OptionResult {
    /// The option's name, or words for the only one.
    pub fn name(&self) -> &str {
        if self.design.option.is_empty() { "the array" } else { &self.design.option }
    }
}
