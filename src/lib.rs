//! From the sketch of a low-band receive antenna array to its parts, prices, cut list and work order.
//!
//! ```text
//! project text ─project─▶ Project ─arrays─▶ Layout + FeedTree ─design─▶ Design (choices made, lines measured)
//!                                                │                          │
//!                                                └──reception──▶ radio      ▼
//!    CSV files ─catalogue─▶ Catalogue ─────────────────────────▶ takeoff ─▶ cutting ─▶ pricing ─▶ report
//!                                                               (every item and piece with its reason)
//! ```
//!
//! Data flows one way: a module uses only modules above it in this list, and each stage is a pure function of its
//! inputs. Only `cli` knows files, the terminal and the command line.

pub mod units;
pub mod physics;
pub mod problem;
pub mod radio;
pub mod catalogue;
pub mod project;
pub mod plan;
pub mod arrays;
pub mod reception;
pub mod design;
pub mod takeoff;
pub mod cutting;
pub mod pricing;
pub mod report;
pub mod cli;
