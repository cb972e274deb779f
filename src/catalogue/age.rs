//! How old the prices are, judged against the day of the estimate.

use chrono::{Days, NaiveDate};

use crate::problem::{Problem, Problems};

use super::code;
use super::model::{Catalogue, Offer, Source};

/// Prices older than this many days are worth a warning (common practice, no source).
pub const FRESH_DAYS: u64 = 180;

/// Judges the day of every price of the user against the day of the estimate.
///
/// Older than [`FRESH_DAYS`] is a warning, older than `oldest_days` (the project's `oldest-price`) an error; a price
/// from after the estimate, or without a date, is a warning. Built-in prices are invented and never judged.
pub fn age(catalogue: &Catalogue, estimated: NaiveDate, oldest_days: u64) -> Problems {
    let mut problems = Problems::default();
    let priced =
        catalogue.offers.values().filter(|offer| offer.source == Source::User && offer.price.is_some());
    priced
        .filter_map(|offer| judge(offer, estimated, oldest_days))
        .for_each(|problem| problems.push(problem));
    problems
}

fn judge(offer: &Offer, estimated: NaiveDate, oldest_days: u64) -> Option<Problem> {
    let place = Some(offer.place.clone());
    let id = &offer.id;
    let Some(day) = offer.priced_on else {
        let message = format!("the price of \"{id}\" has no date");
        return Some(Problem::warning(code::PRICE_UNDATED, place, message, "fill in priced_on"));
    };
    if day > estimated {
        let message = format!("the price of \"{id}\" is of {day}, after the estimate of {estimated}");
        let help = "set `estimated` of the project to the day of the estimate";
        return Some(Problem::warning(code::PRICE_AFTER_ESTIMATE, place, message, help));
    }
    let days = estimated.signed_duration_since(day).num_days();
    let message = format!("the price of \"{id}\" is of {day}, {days} days before the estimate");
    if is_older(day, estimated, oldest_days) {
        let help = format!("ask again; prices up to {oldest_days} days old are allowed (`oldest-price`)");
        Some(Problem::error(code::PRICE_TOO_OLD, place, message, help))
    } else if is_older(day, estimated, FRESH_DAYS) {
        Some(Problem::warning(code::PRICE_OLD, place, message, "ask again before you order"))
    } else {
        None
    }
}

fn is_older(day: NaiveDate, estimated: NaiveDate, days: u64) -> bool {
    day.checked_add_days(Days::new(days)).is_some_and(|limit| limit < estimated)
}
