//! arraywright
pub mod catalogue;
pub mod problem;
pub mod project;
pub mod units;
