//! Takeoff and catalogue to a priced bill.

pub mod model;

pub use model::*;
