//! The sheets as a printer and a browser meet them: escaping, complete sets, and, where the machine has them, Chromium,
//! Node and Java to check every page on A4 and Letter.

mod browser;
mod sample;
mod text;
