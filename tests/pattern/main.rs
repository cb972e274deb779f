//! The `pattern` answer from project text to JSON, sheet and page.
//!
//! Reference values: tests/reference/pattern-cases.toml, whose head states their source.

mod built;
mod cases;
mod page;
mod shape;
mod support;
