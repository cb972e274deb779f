//! Choosing offers: the cheapest total for what is needed, price breaks by packs, never up to a break in silence.

use rust_decimal::Decimal;

use super::code;
use super::demand::{Counted, packs_for};
use super::model::{Bill, BillLine, Unpriced};
use crate::catalogue::{Catalogue, Offer, Part, PartChoice};
use crate::problem::{Problem, Problems};
use crate::project::Project;
use crate::units::{Currency, Money};

/// The offers, with prices in the project's currency.
pub(super) struct Market<'a> {
    pub(super) project: &'a Project,
    pub(super) catalogue: &'a Catalogue,
}

/// An offer with its price in the project's currency.
#[derive(Clone)]
pub(super) struct Priced<'a> {
    pub(super) offer: &'a Offer,
    pub(super) price: Option<Money>,
    pub(super) kind: Kind,
}

/// Whether an offer stands by itself or is the price break of another.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Kind {
    /// Its `min_packs` is what must be ordered.
    Plain,
    /// Only for orders of at least `min_packs`.
    Break,
}

impl<'a> Market<'a> {
    pub(super) fn new(project: &'a Project, catalogue: &'a Catalogue) -> Self {
        Self { project, catalogue }
    }

    /// The part behind a choice.
    pub(super) fn part(&self, choice: &PartChoice) -> Option<&'a Part> {
        match choice {
            PartChoice::Part(id) => self.catalogue.parts.get(id),
            PartChoice::Missing(_) => None,
        }
    }

    /// The offers of a part by id, with prices converted; an offer in a currency without a rate is a problem.
    pub(super) fn offers(&self, part: &'a Part, problems: &mut Problems) -> Vec<Priced<'a>> {
        let offers: Vec<&Offer> = self.catalogue.offers_of(&part.id).collect();
        let smallest = |offer: &Offer| {
            let same = offers.iter().filter(|o| o.pack == offer.pack && o.supplier == offer.supplier);
            same.map(|o| o.min_packs).min()
        };
        offers
            .iter()
            .filter_map(|offer| {
                let kind = if smallest(offer).is_some_and(|least| offer.min_packs > least) {
                    Kind::Break
                } else {
                    Kind::Plain
                };
                let price = match offer.price {
                    None => None,
                    Some(price) => Some(self.converted(offer, price, problems)?),
                };
                Some(Priced { offer, price, kind })
            })
            .collect()
    }

    fn converted(&self, offer: &Offer, price: Money, problems: &mut Problems) -> Option<Money> {
        let own: &Currency = &self.project.currency;
        if offer.currency == *own {
            return Some(price);
        }
        let rate = self.project.prices.exchange.iter().find(|exchange| exchange.from == offer.currency);
        if rate.is_none() {
            let message = format!(
                "the offer `{}` is priced in {}, the project counts in {own}, and there is no rate between them",
                offer.id, offer.currency
            );
            let help = format!(
                "give [prices] exchange = [{{ from = \"{0}\", rate = \"…\", on = {1} }}], which serves every offer in {0}, or price them in {own}",
                offer.currency, self.project.estimated
            );
            // One missing rate is one mistake, however many offers it concerns.
            let said = problems.sorted().iter().any(|p| p.code == code::MIXED_CURRENCY && p.help == help);
            if said {
                return None;
            }
            problems.push(Problem::error(code::MIXED_CURRENCY, Some(offer.place.clone()), message, help));
        }
        rate.map(|exchange| price.times(exchange.rate))
    }
}

/// What buying one offer comes to.
struct Purchase<'a> {
    priced: Priced<'a>,
    packs: u64,
    total: Money,
}

/// Buys a counted part.
pub(super) fn buy_counted(bill: &mut Bill, market: &Market<'_>, need: &Counted, problems: &mut Problems) {
    let missing = (need.gross - need.on_hand).max(Decimal::ZERO);
    let Some(part) = market.part(&need.part) else {
        bill.unpriced.push(Unpriced {
            part: need.part.id().to_owned(),
            quantity: missing,
            unit: "each".to_owned(),
            why: "the catalogue has no part for this".to_owned(),
        });
        bill.lines.push(line_without_part(need));
        return;
    };
    let offers = market.offers(part, problems);
    let mut line = blank_line(part, &need.roles, need.gross, need.on_hand, need.reason.clone());
    if missing.is_zero() {
        line.amount = Some(Money::ZERO.rounded(&market.project.currency));
        line.left = need.on_hand - need.gross;
        bill.lines.push(line);
        return;
    }
    let ranked = ranked(&offers, missing);
    let Some(purchase) = ranked.first() else {
        buy_mixed(bill, market, part, need, missing, &offers);
        return;
    };
    if let Some((first, second)) = cheaper_pair(&offers, missing, purchase.total) {
        buy_pair(bill, market, part, need, (&first, &second));
        return;
    }
    hint_break(bill, &offers, purchase, missing, market);
    fill_line(&mut line, &purchase.priced, purchase.packs, market);
    if let Some(second) = ranked.get(1) {
        let total = second.total.rounded(&market.project.currency);
        line.reason.push(format!("next best: {} × `{}` = {total}", second.packs, second.priced.offer.id));
    }
    bill.lines.push(line);
}

/// Some packs of one offer with the rest from another, where that costs less than `alone`.
fn cheaper_pair<'a>(
    offers: &[Priced<'a>],
    missing: Decimal,
    alone: Money,
) -> Option<(Purchase<'a>, Purchase<'a>)> {
    let mut best: Option<(Purchase<'a>, Purchase<'a>)> = None;
    for priced in offers.iter().filter(|priced| priced.kind == Kind::Plain) {
        let Some(price) = priced.price else { continue };
        let most = packs_for(missing, priced.offer.pack)
            .saturating_sub(1)
            .min(priced.offer.available.unwrap_or(u64::MAX));
        for packs in priced.offer.min_packs..=most {
            let rest = missing - priced.offer.pack * Decimal::from(packs);
            let others: Vec<Priced<'a>> =
                offers.iter().filter(|other| other.offer.id != priced.offer.id).cloned().collect();
            let Some(second) = ranked(&others, rest).into_iter().next() else { continue };
            let first = Purchase { priced: priced.clone(), packs, total: price.times(Decimal::from(packs)) };
            let least = best.as_ref().map_or(alone, |(a, b)| a.total + b.total);
            if first.total + second.total < least {
                best = Some((first, second));
            }
        }
    }
    best
}

/// Two lines: what the first purchase delivers, and the rest.
fn buy_pair(
    bill: &mut Bill,
    market: &Market<'_>,
    part: &Part,
    need: &Counted,
    (first, second): (&Purchase<'_>, &Purchase<'_>),
) {
    let delivered = first.priced.offer.pack * Decimal::from(first.packs);
    let mut line = blank_line(part, &need.roles, delivered + need.on_hand, need.on_hand, need.reason.clone());
    fill_line(&mut line, &first.priced, first.packs, market);
    bill.lines.push(line);
    let rest = need.gross - need.on_hand - delivered;
    let why = format!("the rest, {} {}, costs less this way", rest.normalize(), part.unit.word());
    let mut line = blank_line(part, &need.roles, rest, Decimal::ZERO, vec![why]);
    fill_line(&mut line, &second.priced, second.packs, market);
    bill.lines.push(line);
}

/// The ways to have `missing` units from one offer, cheapest first, ties by id.
fn ranked<'a>(offers: &[Priced<'a>], missing: Decimal) -> Vec<Purchase<'a>> {
    let mut purchases: Vec<Purchase<'a>> = offers
        .iter()
        .filter_map(|priced| {
            let price = priced.price?;
            let packs = packs_for(missing, priced.offer.pack);
            let packs = match priced.kind {
                Kind::Break if packs < priced.offer.min_packs => return None,
                Kind::Break => packs,
                Kind::Plain => packs.max(priced.offer.min_packs),
            };
            if priced.offer.available.is_some_and(|available| packs > available) {
                return None;
            }
            Some(Purchase { priced: priced.clone(), packs, total: price.times(Decimal::from(packs)) })
        })
        .collect();
    purchases.sort_by(|a, b| (a.total, &a.priced.offer.id).cmp(&(b.total, &b.priced.offer.id)));
    purchases
}

/// No single offer has enough: the cheapest a unit first, as far as each goes.
fn buy_mixed(
    bill: &mut Bill,
    market: &Market<'_>,
    part: &Part,
    need: &Counted,
    missing: Decimal,
    offers: &[Priced<'_>],
) {
    let mut usable: Vec<&Priced<'_>> =
        offers.iter().filter(|priced| priced.price.is_some() && priced.kind == Kind::Plain).collect();
    usable.sort_by_key(|priced| {
        (priced.price.map(|p| p.amount() / priced.offer.pack), priced.offer.id.clone())
    });
    let mut left = missing;
    let mut on_hand = need.on_hand;
    for priced in usable {
        let packs = packs_for(left, priced.offer.pack).min(priced.offer.available.unwrap_or(u64::MAX));
        if packs == 0 || packs < priced.offer.min_packs {
            continue;
        }
        let bought = priced.offer.pack * Decimal::from(packs);
        let share = bought.min(left) + on_hand;
        let mut line = blank_line(part, &need.roles, share, on_hand, need.reason.clone());
        fill_line(&mut line, priced, packs, market);
        bill.lines.push(line);
        on_hand = Decimal::ZERO;
        left = (left - bought).max(Decimal::ZERO);
        if left.is_zero() {
            return;
        }
    }
    let why = if offers.is_empty() {
        "the catalogue has no offer for this part"
    } else if offers.iter().all(|priced| priced.price.is_none()) {
        "its offers have no price"
    } else {
        "its offers do not have enough"
    };
    bill.unpriced.push(unpriced(part, left, why));
    bill.lines.push(blank_line(part, &need.roles, left + on_hand, on_hand, need.reason.clone()));
}

/// An entry of the unpriced list.
pub(super) fn unpriced(part: &Part, quantity: Decimal, why: &str) -> Unpriced {
    Unpriced { part: part.id.clone(), quantity, unit: part.unit.word().to_owned(), why: why.to_owned() }
}

/// Says when buying up to the next price break costs less in all.
fn hint_break(
    bill: &mut Bill,
    offers: &[Priced<'_>],
    chosen: &Purchase<'_>,
    missing: Decimal,
    market: &Market<'_>,
) {
    for priced in offers.iter().filter(|priced| priced.kind == Kind::Break) {
        let (Some(price), packs) = (priced.price, priced.offer.min_packs) else { continue };
        let enough = priced.offer.pack * Decimal::from(packs) >= missing;
        let total = price.times(Decimal::from(packs));
        if enough && total < chosen.total {
            let currency = &market.project.currency;
            bill.hints.push(format!(
                "{}: {packs} packs of `{}` cost {currency} {}, less than the {} packs that are needed ({currency} {})",
                priced.offer.part,
                priced.offer.id,
                total.rounded(currency),
                chosen.packs,
                chosen.total.rounded(currency)
            ));
        }
    }
}

fn line_without_part(need: &Counted) -> BillLine {
    BillLine {
        part: need.part.id().to_owned(),
        description: "no part in the catalogue".to_owned(),
        roles: need.roles.clone(),
        offer: None,
        needed: need.gross,
        on_hand: need.on_hand,
        bought: Decimal::ZERO,
        packs: 0,
        pack: Decimal::ONE,
        left: Decimal::ZERO,
        unit: "each".to_owned(),
        pack_price: None,
        amount: None,
        supplier: String::new(),
        priced_on: String::new(),
        lead_days: None,
        tax_class: "goods".to_owned(),
        weight_kg: Decimal::ZERO,
        ship_group: String::new(),
        alternates: Vec::new(),
        price_source: String::new(),
        reason: need.reason.clone(),
    }
}

/// A line with the part's data and nothing bought yet.
pub(super) fn blank_line(
    part: &Part,
    roles: &[String],
    needed: Decimal,
    on_hand: Decimal,
    reason: Vec<String>,
) -> BillLine {
    let mut roles = roles.to_vec();
    roles.sort();
    roles.dedup();
    BillLine {
        part: part.id.clone(),
        description: part.description.clone(),
        roles,
        offer: None,
        needed,
        on_hand,
        bought: Decimal::ZERO,
        packs: 0,
        pack: Decimal::ONE,
        left: Decimal::ZERO,
        unit: part.unit.word().to_owned(),
        pack_price: None,
        amount: None,
        supplier: String::new(),
        priced_on: String::new(),
        lead_days: None,
        tax_class: part.tax_class.clone(),
        weight_kg: Decimal::ZERO,
        ship_group: String::new(),
        alternates: part.alternates.clone(),
        price_source: String::new(),
        reason,
    }
}

/// Puts a purchase on its line.
pub(super) fn fill_line(line: &mut BillLine, priced: &Priced<'_>, packs: u64, market: &Market<'_>) {
    let offer = priced.offer;
    let currency = &market.project.currency;
    let count = Decimal::from(packs);
    line.offer = Some(offer.id.clone());
    line.packs = packs;
    line.pack = offer.pack;
    line.bought = offer.pack * count;
    line.left = line.bought + line.on_hand - line.needed;
    line.pack_price = priced.price;
    line.amount = priced.price.map(|price| price.times(count).rounded(currency));
    line.supplier.clone_from(&offer.supplier);
    line.priced_on = offer.priced_on.map_or_else(String::new, |date| date.to_string());
    line.lead_days = offer.lead_days;
    line.ship_group.clone_from(&offer.ship_group);
    line.price_source = format!("{}:{}", offer.place.file, offer.place.line);
    let weight = market.catalogue.parts.get(&line.part).and_then(|part| part.weight_kg);
    line.weight_kg = weight.unwrap_or_default() * line.bought;
    if let Some(price) = priced.price {
        line.reason.push(format!(
            "{packs} × {} {} at {currency} {} = {currency} {} ({})",
            offer.pack.normalize(),
            line.unit,
            price.amount().normalize(),
            price.times(count).rounded(currency),
            line.price_source
        ));
    }
}

/// The lowest price of one unit of a part, in the project's currency; nothing when no offer has a usable price.
pub(super) fn unit_price(market: &Market<'_>, part: &Part) -> Option<Decimal> {
    let mut ignored = Problems::default();
    let offers = market.offers(part, &mut ignored);
    let per_unit =
        offers.iter().filter_map(|priced| priced.price.map(|price| price.amount() / priced.offer.pack));
    per_unit.min()
}
