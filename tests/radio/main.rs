//! The electrical engine against published, library-computed and method-of-moments values, and its laws.
//!
//! Every module names the source of its numbers.

mod cases;
mod handbook;
mod laws;
mod lines;
#[path = "../reference/pattern_cases.rs"]
mod pattern_cases;
mod reference;
mod signs;
mod spread;
mod support;
mod trade;
mod values;
