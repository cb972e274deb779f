//! Which piece comes out of which reel.
//!
//! [`plan`] is the seam: today it fills first-fit-decreasing; an exact planner replaces its body and nothing else.

mod first_fit;
pub mod model;

pub use first_fit::plan;
pub use model::*;
