//! CSV files that people edit in a spreadsheet, to a checked catalogue.

mod choice;
pub mod model;

pub use choice::PartChoice;
pub use model::*;
