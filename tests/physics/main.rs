//! The formulas of `physics` against values from outside: printed tables, standards, published examples, libraries.
//!
//! Every entry of `tests/reference/physics-values.toml` is computed from its inputs and compared by its own tolerance. An
//! entry or a row that a topic does not know fails the test; what is outside the program's job is listed with its reason.
//! `cargo test --test physics -- --nocapture` prints how many values were compared.

mod coax;
mod control;
mod earthing;
mod harness;
mod matching;
mod noise;
mod sag;
mod scalar;
mod skin;
mod wire;
