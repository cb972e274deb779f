//! What a project file may say, and what is said when it says something else.

mod law;
mod problem;
mod reading;
mod support;
