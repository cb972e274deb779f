//! What can be read but looks wrong: odd unit prices, cables without data, roles without a default.

use std::collections::{BTreeMap, BTreeSet};

use rust_decimal::Decimal;

use crate::problem::{Problem, Problems};

use super::code;
use super::model::{Catalogue, Offer, Part, VelocityData};
use super::role::wants_default;

/// A unit price beyond this many times the median of its role, or below its inverse, is odd (common practice, no
/// source).
const ODD_RATIO: Decimal = Decimal::from_parts(8, 0, 0, false, 0);
/// Fewest offers that make a median worth having.
const FEWEST: usize = 3;

/// Looks over a whole catalogue; every finding is a warning.
pub fn health(catalogue: &Catalogue) -> Problems {
    let mut problems = Problems::default();
    unit_prices(catalogue, &mut problems);
    for part in catalogue.parts.values() {
        part_data(part, catalogue, &mut problems);
    }
    defaults(catalogue, &mut problems);
    problems
}

fn warn(problems: &mut Problems, part: &Part, code: crate::problem::Code, message: String, help: &str) {
    problems.push(Problem::warning(code, Some(part.place.clone()), message, help));
}

/// What may fairly be compared: one role, unit, kind and currency, bought or hired.
fn comparable(part: &Part, offer: &Offer) -> Option<(String, String, String, bool)> {
    let kind = part.attribute("kind").unwrap_or_default();
    let needs_kind = !wants_default(&part.role);
    (!needs_kind || !kind.is_empty()).then(|| {
        let role = format!("{} {kind}", part.role).trim().to_owned();
        (role, part.unit.word().to_owned(), offer.currency.code().to_owned(), part.hire)
    })
}

fn unit_prices(catalogue: &Catalogue, problems: &mut Problems) {
    let mut groups = BTreeMap::<_, Vec<(Decimal, &Offer, &Part)>>::new();
    for offer in catalogue.offers.values() {
        let Some(part) = catalogue.parts.get(&offer.part) else { continue };
        let unit_price = offer.price.and_then(|price| price.amount().checked_div(offer.pack));
        let Some(unit_price) = unit_price.filter(|price| *price > Decimal::ZERO) else { continue };
        if let Some(key) = comparable(part, offer) {
            groups.entry(key).or_default().push((unit_price, offer, part));
        }
    }
    for list in groups.values_mut().filter(|list| list.len() >= FEWEST) {
        list.sort_by(|a, b| (a.0, &a.1.id).cmp(&(b.0, &b.1.id)));
        for index in 0..list.len() {
            odd_price(index, list, problems);
        }
    }
}

/// Judges one offer against the others of its group.
fn odd_price(index: usize, list: &[(Decimal, &Offer, &Part)], problems: &mut Problems) {
    let (price, offer, part) = list[index];
    let median = median(list);
    if price <= median.saturating_mul(ODD_RATIO) && price.saturating_mul(ODD_RATIO) >= median {
        return;
    }
    let others: Vec<Decimal> =
        list.iter().enumerate().filter(|(at, _)| *at != index).map(|(_, row)| row.0).collect();
    let show = |value: Option<&Decimal>| value.copied().unwrap_or_default().round_dp(2).normalize();
    let pack = offer.pack.normalize();
    let message = format!(
        "\"{}\" costs {} {} per {} after its pack of {pack}; others of role {} cost {} to {}",
        offer.id,
        price.round_dp(4).normalize(),
        offer.currency,
        part.unit.word(),
        part.role,
        show(others.first()),
        show(others.last()),
    );
    let asked = offer.price.map(|price| price.to_string()).unwrap_or_default();
    let help = format!("is {asked} the price of one pack of {pack}?");
    problems.push(Problem::warning(code::UNIT_PRICE_ODD, Some(offer.place.clone()), message, help));
}

/// The middle value of a sorted list, the lower one of two.
fn median(list: &[(Decimal, &Offer, &Part)]) -> Decimal {
    list.get((list.len().max(1) - 1) / 2).map(|row| row.0).unwrap_or_default()
}

fn part_data(part: &Part, catalogue: &Catalogue, problems: &mut Problems) {
    let id = &part.id;
    if part.role == "cable" {
        let cable = catalogue.cables.get(id);
        let has_velocity = cable.is_some_and(|cable| match &cable.velocity_factor {
            VelocityData::None => false,
            VelocityData::One(_) => true,
            VelocityData::Points(points) => !points.is_empty(),
        });
        if !has_velocity {
            let awg = part.attribute("awg").map(|awg| format!(" has awg={awg} and")).unwrap_or_default();
            let message = format!("the coax \"{id}\"{awg} has no velocity factor");
            let help = "add its row to cables.csv; if the rows were sorted in part, undo that";
            warn(problems, part, code::CABLE_WITHOUT_VF, message, help);
        }
        if cable.is_none_or(|cable| cable.loss.is_empty()) {
            let message = format!("the coax \"{id}\" has no loss points");
            warn(problems, part, code::CABLE_WITHOUT_LOSS, message, "add loss_db_per_100m to cables.csv");
        }
    }
    if part.role == "control-cable" && part.number("conductors").is_none() {
        let message = format!("the control cable \"{id}\" does not say how many conductors it has");
        warn(
            problems,
            part,
            code::WITHOUT_CONDUCTORS,
            message,
            "add conductors=4 or the like to its attributes",
        );
    }
    if part.role.starts_with("relay-") && part.attribute("contact") != Some("gold") {
        let message = format!("the relay \"{id}\" has no gold contacts");
        let help = "other contacts film over at receive levels; add contact=gold if it has them";
        warn(problems, part, code::CONTACT_NOT_GOLD, message, help);
    }
    if catalogue.offers_of(id).next().is_none() {
        let message = format!("nothing offers \"{id}\"");
        warn(
            problems,
            part,
            code::WITHOUT_OFFER,
            message,
            "add a row to offers.csv, with a blank price if need be",
        );
    }
}

/// A role with two parts or more and no default falls back to the first id, which may not be what is meant.
fn defaults(catalogue: &Catalogue, problems: &mut Problems) {
    let with: BTreeSet<&str> = catalogue
        .parts
        .values()
        .filter(|part| part.attribute("default") == Some("yes"))
        .map(|part| part.role.as_str())
        .collect();
    let mut first = BTreeMap::<&str, Vec<&Part>>::new();
    for part in catalogue.parts.values().filter(|part| wants_default(&part.role)) {
        first.entry(&part.role).or_default().push(part);
    }
    for (role, parts) in first {
        if let ([part, _, ..], false) = (&parts[..], with.contains(role)) {
            let message = format!("the role {role} has {} parts and no default", parts.len());
            let help =
                format!("\"{}\" is taken; add default=yes to the attributes of the one meant", part.id);
            warn(problems, part, code::MISSING_DEFAULT, message, &help);
        }
    }
}
