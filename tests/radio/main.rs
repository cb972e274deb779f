//! The electrical engine against published, library-computed and method-of-moments values, and its laws.
//!
//! Every module names the source of its numbers.

mod cases;
mod support;
