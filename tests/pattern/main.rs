//! The `pattern` answer from project text to JSON, sheet and page.
//!
//! Reference values: tests/reference/pattern-cases.toml, whose head states their source.

mod built;
mod cases;
mod page;
#[path = "../reference/pattern_cases.rs"]
mod pattern_cases;
mod shape;
mod support;
