//! arraywright
pub mod units;
