//! SVG from data: millimetres on paper, black on white, every text escaped.

pub mod cut_strip;
mod ground;
pub mod label_sheet;
mod place;
mod plan_key;
mod sign;
pub mod site_plan;
mod svg;
