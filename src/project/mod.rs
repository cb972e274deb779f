//! Text to a checked project: what the file says, what is legal, and how to say what is wrong.

pub mod model;
pub mod practice;

pub use model::*;
pub use practice::{HubArresters, Joint, Practice};
