//! A cutting job and its plan.

use crate::units::{Length, Money};

/// One job: the pieces of one part, and what they may be cut from.
#[derive(Clone, Debug)]
pub struct CutJob {
    /// The part.
    pub part: String,
    /// What must be cut.
    pub pieces: Vec<CutPiece>,
    /// What it may be cut from.
    pub stock: Vec<StockLength>,
    /// Lost at each cut.
    pub loss_per_cut: Length,
    /// Offcuts shorter than this are scrap.
    pub keep_at_least: Length,
}

/// One piece to cut.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct CutPiece {
    /// Its label.
    pub label: String,
    /// Its cut length.
    pub cut: Length,
    /// All pieces of one group come from one length; empty for none.
    pub group: String,
}

/// Something to cut from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum StockLength {
    /// A reel or offcut that the owner has.
    OnHand {
        /// Its name on the sheets.
        name: String,
        /// Its length.
        length: Length,
    },
    /// A reel that can be bought.
    Reel {
        /// The offer.
        offer: String,
        /// Its length.
        length: Length,
        /// Its price; none when unpriced.
        price: Option<Money>,
        /// How many can be had; none is any number.
        available: Option<u64>,
        /// Fewest in an order.
        least: u64,
    },
    /// Cable by the metre: one continuous length an order.
    Metre {
        /// The offer.
        offer: String,
        /// The price of one step.
        price: Option<Money>,
        /// Lengths are whole multiples of this.
        step: Length,
        /// Fewest steps of an order.
        least_steps: u64,
        /// Most steps of an order.
        most_steps: Option<u64>,
    },
}

/// Which pieces come out of which length.
#[derive(Clone, Debug, Default)]
pub struct CutPlan {
    /// Every length that is cut, on-hand ones first.
    pub reels: Vec<CutReel>,
    /// Pieces that fit nothing.
    pub unplaced: Vec<CutPiece>,
    /// Groups that no single length can hold, so that their pieces come from several.
    pub split_groups: Vec<String>,
}

/// One length that is cut.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct CutReel {
    /// Where it comes from.
    pub source: ReelSource,
    /// Its length.
    pub length: Length,
    /// The cuts from the free end.
    pub cuts: Vec<Cut>,
    /// What is left.
    pub left: Length,
}

/// Where a reel comes from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ReelSource {
    /// The owner's.
    OnHand(String),
    /// Bought as this offer.
    Bought(String),
}

/// One cut.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Cut {
    /// The piece.
    pub label: String,
    /// Its cut length.
    pub cut: Length,
    /// Mark on the reel where it begins.
    pub from: Length,
    /// Mark on the reel where it ends.
    pub to: Length,
}
