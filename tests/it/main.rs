//! What the program does, by what its users do with it.

#![expect(clippy::unwrap_used, reason = "a test that cannot go on has failed")]

mod architecture;
mod commands;
mod exactness;
mod laws;
mod money;
mod problems;
mod readme;
mod sameness;
mod support;
mod trade;
mod vectors;
