//! What the program does, by what its users do with it.

mod architecture;
mod commands;
mod laws;
mod money;
mod sameness;
mod support;
mod vectors;
