//! SVG from data: millimetres on paper, black on white, every text escaped.

mod board;
pub mod cut_strip;
mod ground;
pub mod label_sheet;
mod place;
mod plan_dimension;
mod plan_key;
mod plan_land;
pub mod polar;
mod sign;
pub mod site_plan;
mod svg;
