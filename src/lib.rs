//! arraywright
pub mod arrays;
pub mod catalogue;
pub mod cutting;
pub mod design;
pub mod plan;
pub mod pricing;
pub mod problem;
pub mod project;
pub mod radio;
pub mod takeoff;
pub mod units;
