//! CSV files that people edit in a spreadsheet, to a checked catalogue.
//!
//! [`load()`] reads a user's files over [`built_in()`]; [`age()`] judges the days of the prices, [`health()`] what looks
//! wrong though it can be read. Nothing here opens a file or asks for today's date.

mod age;
mod built_in;
mod cable;
mod choice;
pub mod code;
mod currency;
mod date;
mod decode;
mod edit;
mod export;
mod health;
mod labour;
mod lex;
mod load;
mod lookup;
pub mod model;
mod number;
mod offer;
mod part;
mod read;
mod report;
mod role;
mod row;
mod table;
mod template;

pub use age::{FRESH_DAYS, age};
pub use built_in::{built_in, built_in_loaded, built_in_texts};
pub use choice::PartChoice;
pub use edit::{CellEdit, NoEdit, edited};
pub use export::{ExportCell, export};
pub use health::health;
pub use load::{Loaded, load, overlay};
pub use model::*;
pub use read::{CatalogueFile, FILES, read};
pub use report::{Fix, Fixes, MOST_ERRORS};
pub use role::{CUT_ROLES, ITEM_ROLES, PIECE_ROLES, part_roles, serving};
pub use template::template;
