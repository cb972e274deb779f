//! CSV files that people edit in a spreadsheet, to a checked catalogue.

pub mod model;

pub use model::*;
