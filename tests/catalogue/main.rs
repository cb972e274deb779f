//! The catalogue as its users meet it: spreadsheets that damaged it, files laid over the built-in ones.

#![expect(clippy::unwrap_used, reason = "a test may fail by panicking")]

mod built_in;
mod edit;
mod lookup;
mod overlay;
mod problem;
mod spreadsheet;
mod support;
