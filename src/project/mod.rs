//! Text to a checked project: what the file says, what is legal, and how to say what is wrong.

mod allowance;
mod array;
mod assumption;
pub mod code;
mod currency;
mod desk;
mod element;
mod feed;
mod labour;
mod choice;
pub mod model;
mod on_hand;
mod phasing;
mod polygon;
pub mod practice;
mod prices;
mod read;
pub mod role;
mod site;
mod stage;
mod table;
mod value;

pub use model::*;
pub use practice::{HubArresters, Joint, Practice};
pub use read::read;
