//! Takeoff and catalogue to a priced bill: net, waste and spares, less stock on hand, up to whole packs, times price.

mod charge;
mod demand;
mod length;
pub mod model;
mod offer;

pub use model::*;

use std::collections::BTreeSet;

use crate::catalogue::Catalogue;
use crate::problem::{Problem, Problems};
use crate::project::Project;
use crate::takeoff::Takeoff;
use crate::units::Money;

/// Codes of problems found while pricing.
pub mod code {
    crate::problem_codes! {
        /// A price stands in a currency without a dated rate.
        MIXED_CURRENCY = "mixed-currency";
        /// An on-hand entry names a part that the catalogue does not have.
        UNKNOWN_ON_HAND = "unknown-on-hand";
        /// An existing thing names a label or role that this project does not need.
        UNKNOWN_EXISTING = "unknown-existing";
        /// Freight is given for a supplier or ship group that no offer has.
        UNKNOWN_FREIGHT = "unknown-freight";
        /// A piece is longer than anything it could be cut from.
        PIECE_TOO_LONG = "piece-too-long";
    }
}

/// Prices one option.
///
/// The bill is complete only when `unpriced` is empty and the problems hold no error.
pub fn price(project: &Project, catalogue: &Catalogue, takeoff: &Takeoff) -> (Bill, Problems) {
    let mut problems = Problems::default();
    let demand = demand::gather(project, catalogue, takeoff);
    check_stock(project, catalogue, takeoff, &mut problems);
    check_freight(project, catalogue, &mut problems);
    let market = offer::Market::new(project, catalogue);
    let mut bill = Bill::default();
    for need in &demand {
        match need {
            demand::Need::Counted(counted) => offer::buy_counted(&mut bill, &market, counted, &mut problems),
            demand::Need::Lengths(lengths) => length::buy_lengths(&mut bill, &market, lengths, &mut problems),
        }
    }
    let amounts = bill.lines.iter().filter_map(|line| line.amount);
    bill.materials = amounts.sum::<Money>().rounded(&project.currency);
    charge::add(&mut bill, project);
    (bill, problems)
}

/// A charge that nothing can fall under is a slip of the pen, and would be left out of the total in silence.
fn check_freight(project: &Project, catalogue: &Catalogue, problems: &mut Problems) {
    let offers = || catalogue.offers.values();
    let known: BTreeSet<&str> = offers()
        .flat_map(|offer| [offer.supplier.as_str(), offer.ship_group.as_str()])
        .filter(|name| !name.is_empty())
        .collect();
    for key in project.prices.freight.keys().filter(|key| !known.contains(key.as_str())) {
        let listed = known.iter().copied().collect::<Vec<_>>().join(", ");
        let help = match crate::problem::nearest(key, known.iter().copied()) {
            Some(near) => format!("did you mean `{near}`? the catalogue has: {listed}"),
            None => format!("the catalogue has: {listed}"),
        };
        let message =
            format!("freight: no offer has the supplier or ship group `{key}`, so nothing is charged for it");
        problems.push(Problem::warning(code::UNKNOWN_FREIGHT, None, message, help));
    }
}

/// What the owner has or what stands already must be something that exists.
fn check_stock(project: &Project, catalogue: &Catalogue, takeoff: &Takeoff, problems: &mut Problems) {
    for entry in &project.on_hand {
        if !catalogue.parts.contains_key(&entry.part) {
            let known = catalogue.parts.keys().map(String::as_str);
            let help = match crate::problem::nearest(&entry.part, known) {
                Some(near) => format!("did you mean `{near}`?"),
                None => "name a part of the catalogue (`catalog check` lists its files)".to_owned(),
            };
            let message = format!("on hand: the catalogue has no part `{}`", entry.part);
            problems.push(Problem::error(code::UNKNOWN_ON_HAND, entry.place.clone(), message, help));
        }
    }
    for existing in &project.existing {
        if !demand::is_needed(&existing.what, takeoff) {
            let message =
                format!("existing: nothing in this project is called `{}`", demand::name(&existing.what));
            let help = "give the label or the role of something that `parts` lists".to_owned();
            problems.push(Problem::warning(code::UNKNOWN_EXISTING, existing.place.clone(), message, help));
        }
    }
}
