//! From a composition to a layout and a feed tree: one file an element or stage.
//!
//! To add a family, write one file that returns a [`Stage`] (where its seats are, which weight each has, how they are
//! joined) and name it in the one `match` of [`stages`]. Nothing after this module asks which family it came from.

pub mod broadside;
mod compose;
pub mod custom;
mod earth;
pub mod echelon;
pub mod endfire;
pub mod hub;
pub mod phasing;
pub mod selfcheck;
pub mod stage;
pub mod vertical;
pub mod wire;

use std::collections::BTreeMap;

use rust_decimal::Decimal;

pub use hub::LineCost;
pub use stage::{Directive, Recipe, Seat, Stage};

use crate::plan::{ArrayPlan, DesignWeight};
use crate::project::{ArraySpec, EndfireStage, SitePoint};
use crate::units::{Diameter, ElectricalLength, Frequency, Length};

/// What an expansion needs to know besides the array itself.
#[derive(Clone, Debug)]
pub struct Context {
    /// The design frequency.
    pub design: Frequency,
    /// Where the main feedline ends.
    pub receiver: SitePoint,
    /// Longest bay of a wire between supports.
    pub max_bay: Length,
    /// Diameter of the wire part, for wires that give none.
    pub wire_diameter: Diameter,
    /// Relative cost of lines at a cell's hub.
    pub branch_cost: LineCost,
    /// Relative cost of lines at the outermost hub.
    pub main_cost: LineCost,
    /// Whether the outermost hub has an amplifier.
    pub amplifier: HubAmplifier,
    /// A pad that balances a delay line's loss, if one is needed.
    pub balance: Option<Balance>,
}

/// A pad in the undelayed leg of a pair.
#[derive(Clone, Debug, PartialEq)]
pub struct Balance {
    /// Its loss in dB.
    pub db: f64,
    /// Why it is needed.
    pub why: String,
}

/// Whether the outermost hub has an amplifier.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HubAmplifier {
    /// Between the last combiner and the main line.
    Fitted,
    /// None.
    Absent,
}

/// Running numbers of names and match groups, shared by the arrays of one option so that every label is its own.
#[derive(Clone, Debug, Default)]
pub struct Names {
    counters: BTreeMap<String, usize>,
    groups: usize,
    delay_groups: BTreeMap<(String, ElectricalLength), String>,
}

impl Names {
    /// The next name with a prefix: W1, W2 …
    pub fn next(&mut self, prefix: &str) -> String {
        let count = self.counters.entry(prefix.to_owned()).or_default();
        *count += 1;
        format!("{prefix}{count}")
    }

    /// The next match group: A, B … Z, AA …
    pub fn next_group(&mut self) -> String {
        let mut n = self.groups;
        self.groups += 1;
        let mut letters = Vec::new();
        loop {
            letters.push(char::from(b'A' + u8::try_from(n % 26).unwrap_or_default()));
            if n < 26 {
                break;
            }
            n = n / 26 - 1;
        }
        letters.iter().rev().collect()
    }

    /// The group of an array's delay lines of one electrical length.
    fn delay_group(&mut self, array: &str, electrical: ElectricalLength) -> String {
        let key = (array.to_owned(), electrical);
        if let Some(group) = self.delay_groups.get(&key) {
            return group.clone();
        }
        let group = self.next_group();
        self.delay_groups.insert(key, group.clone());
        group
    }
}

/// The end-fire and the broadside stage of an array, as their files expand them.
///
/// `ratio` is the delay line's electrical length over the row step, already found when the project asks for the best.
pub fn stages(spec: &ArraySpec, ratio: Decimal, design: Frequency) -> (Option<Stage>, Option<Stage>) {
    let inner = spec.endfire.as_ref().map(|stage| match stage {
        EndfireStage::Echelon(spec) => echelon::expand(spec, ratio, design),
        EndfireStage::Endfire(spec) => endfire::expand(spec, ratio, design),
        EndfireStage::Custom(spec) => custom::expand(spec, design),
    });
    (inner, spec.broadside.as_ref().map(broadside::expand))
}

/// The weights that the elements are meant to have, cell by cell from the left, front to rear within a cell.
pub fn design_weights(spec: &ArraySpec, ratio: Decimal, design: Frequency) -> Vec<DesignWeight> {
    let (inner, outer) = stages(spec, ratio, design);
    let weights = |stage: Option<Stage>| match stage {
        Some(stage) => stage.seats.iter().map(|seat| seat.weight).collect(),
        None => vec![DesignWeight::UNIT],
    };
    let (seats, cells): (Vec<DesignWeight>, Vec<DesignWeight>) = (weights(inner), weights(outer));
    cells.iter().flat_map(|cell| seats.iter().map(|seat| seat.within(*cell))).collect()
}

/// Expands one array into its layout and feed tree.
pub fn expand(spec: &ArraySpec, ratio: Decimal, context: &Context, names: &mut Names) -> ArrayPlan {
    let (mut inner, outer) = stages(spec, ratio, context.design);
    if let (Some(stage), Some(balance)) = (&mut inner, &context.balance) {
        stage.recipe = stage.recipe.clone().balanced(balance.db, &balance.why);
    }
    let design = design_weights(spec, ratio, context.design);
    compose::compose(spec, inner.as_ref(), outer.as_ref(), design, context, names)
}
