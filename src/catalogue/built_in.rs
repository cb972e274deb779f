//! The catalogue that is compiled into the program; its prices are invented.

use std::sync::LazyLock;

use super::load::{Loaded, load};
use super::model::{Catalogue, Source};
use super::read::CatalogueFile;

const TEXTS: [(&str, &str); 5] = [
    ("parts.csv", include_str!("../../parts-catalog/parts.csv")),
    ("offers.csv", include_str!("../../parts-catalog/offers.csv")),
    ("cables.csv", include_str!("../../parts-catalog/cables.csv")),
    ("labour.csv", include_str!("../../parts-catalog/labour.csv")),
    ("terrain.csv", include_str!("../../parts-catalog/terrain.csv")),
];

static LOADED: LazyLock<Loaded> = LazyLock::new(|| {
    let file = |(name, text): &(&str, &str)| CatalogueFile {
        name: format!("built-in {name}").replace(' ', "/"),
        bytes: text.as_bytes().to_vec(),
    };
    let files: Vec<CatalogueFile> = TEXTS.iter().map(file).collect();
    load(Catalogue::default(), &files, Source::BuiltIn)
});

/// The built-in catalogue, parsed once a run.
pub fn built_in() -> Catalogue {
    LOADED.catalogue.clone()
}

/// The built-in catalogue together with what its own check says, which is nothing.
pub fn built_in_loaded() -> &'static Loaded {
    &LOADED
}

/// The texts of the built-in files by name.
pub fn built_in_texts() -> [(&'static str, &'static str); 5] {
    TEXTS
}
