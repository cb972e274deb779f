//! A part that was chosen, or the name of what is missing.

/// A part, or the reason why there is none.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum PartChoice {
    /// A part of the catalogue.
    Part(String),
    /// The catalogue has no part of this role; it stays unpriced under this name.
    Missing(String),
}

impl PartChoice {
    /// The part's id, or the name it goes by without one.
    pub fn id(&self) -> &str {
        match self {
            Self::Part(id) | Self::Missing(id) => id,
        }
    }
}
