//! What the catalogue tests share.

use arraywright::catalogue::{CatalogueFile, Loaded, Source, built_in, load};
use arraywright::problem::Problems;

/// A file made of text.
pub(crate) fn file(name: &str, text: &str) -> CatalogueFile {
    CatalogueFile { name: name.to_owned(), bytes: text.as_bytes().to_vec() }
}

/// Files of a user, laid over the built-in catalogue.
pub(crate) fn over_built_in(files: &[(&str, &str)]) -> Loaded {
    let files: Vec<CatalogueFile> = files.iter().map(|(name, text)| file(name, text)).collect();
    load(built_in(), &files, Source::User)
}

/// The codes of all problems in order.
pub(crate) fn codes(problems: &Problems) -> Vec<&'static str> {
    problems.sorted().into_iter().map(|problem| problem.code.0).collect()
}

/// All problems as printed.
pub(crate) fn printed(problems: &Problems) -> String {
    problems.sorted().into_iter().map(|problem| format!("{problem}\n")).collect::<Vec<_>>().join("\n")
}
