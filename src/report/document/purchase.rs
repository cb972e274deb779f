//! What to buy, by supplier: packs, not net quantities.

use std::collections::BTreeMap;

use rust_decimal::Decimal;
use serde::Serialize;

use super::{Input, OptionInput, show};
use crate::cutting::{CutReel, ReelSource};
use crate::pricing::{Bill, BillLine, PartCutPlan};
use crate::units::{Currency, Money};

/// The purchase list of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    unpriced: Vec<Missing>,
    suppliers: Vec<Supplier>,
    shed: Vec<ShedRow>,
    reels: Vec<Reel>,
    currency: String,
    invented: bool,
}

/// A part without a price.
#[derive(Debug, Serialize)]
pub(super) struct Missing {
    part: String,
    description: String,
    quantity: String,
    why: String,
}

#[derive(Debug, Serialize)]
struct Supplier {
    name: String,
    lines: Vec<Row>,
    amount: String,
    complete: bool,
    longest_lead: Option<u32>,
}

#[derive(Debug, Serialize)]
struct Row {
    part: String,
    offer: String,
    description: String,
    needed: String,
    on_hand: String,
    packs: String,
    pack: String,
    bought: String,
    left: String,
    pack_price: String,
    amount: String,
    priced_on: String,
    lead_days: String,
    substitutes: String,
}

#[derive(Debug, Serialize)]
struct ShedRow {
    part: String,
    description: String,
    needed: String,
    on_hand: String,
}

#[derive(Debug, Serialize)]
struct Reel {
    part: String,
    name: String,
    length: String,
    pieces: String,
    left: String,
}

/// The view of one option's purchase list.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let currency = &input.project.currency;
    View {
        unpriced: missing(input, option),
        suppliers: suppliers(option.bill, currency),
        shed: option.bill.lines.iter().filter(|line| line.on_hand > Decimal::ZERO).map(shed_row).collect(),
        reels: reels(option),
        currency: currency.to_string(),
        invented: option.bill.lines.iter().any(|line| show::is_invented(line, input.catalogue)),
    }
}

/// The parts without a price.
pub(super) fn missing(input: &Input<'_>, option: &OptionInput<'_>) -> Vec<Missing> {
    let words = |part: &str| input.catalogue.parts.get(part).map_or("–", |part| part.description.as_str());
    let rows = option.bill.unpriced.iter().map(|unpriced| Missing {
        part: unpriced.part.clone(),
        description: words(&unpriced.part).to_owned(),
        quantity: show::quantity(unpriced.quantity, &unpriced.unit),
        why: unpriced.why.clone(),
    });
    rows.collect()
}

/// What is bought, by supplier slot; offers without a slot come last.
fn suppliers(bill: &Bill, currency: &Currency) -> Vec<Supplier> {
    let mut slots: BTreeMap<(bool, &str), Vec<&BillLine>> = BTreeMap::new();
    for line in bill.lines.iter().filter(|line| line.offer.is_some() && line.packs > 0) {
        slots.entry((line.supplier.is_empty(), line.supplier.as_str())).or_default().push(line);
    }
    slots
        .into_iter()
        .map(|((_, name), lines)| Supplier {
            name: name.to_owned(),
            amount: show::money(lines.iter().filter_map(|line| line.amount).sum::<Money>(), currency),
            complete: lines.iter().all(|line| line.amount.is_some()),
            longest_lead: lines.iter().filter_map(|line| line.lead_days).max(),
            lines: lines.into_iter().map(|line| row(line, &bill.cut_plans, currency)).collect(),
        })
        .collect()
}

fn row(line: &BillLine, plans: &[PartCutPlan], currency: &Currency) -> Row {
    let price = |money: Option<Money>| {
        money.map_or_else(|| "unpriced".to_owned(), |money| show::money(money, currency))
    };
    Row {
        part: line.part.clone(),
        offer: line.offer.clone().unwrap_or_default(),
        description: line.description.clone(),
        needed: show::quantity(line.needed, &line.unit),
        on_hand: if line.on_hand > Decimal::ZERO {
            show::quantity(line.on_hand, &line.unit)
        } else {
            String::new()
        },
        packs: line.packs.to_string(),
        pack: show::quantity(line.pack, &line.unit),
        bought: show::quantity(line.bought, &line.unit),
        left: show::left(line, plans),
        pack_price: price(line.pack_price),
        amount: price(line.amount),
        priced_on: show::or_dash(&line.priced_on),
        lead_days: line.lead_days.map_or_else(|| "–".to_owned(), |days| days.to_string()),
        substitutes: line.alternates.join(", "),
    }
}

fn shed_row(line: &BillLine) -> ShedRow {
    ShedRow {
        part: line.part.clone(),
        description: line.description.clone(),
        needed: show::quantity(line.needed, &line.unit),
        on_hand: show::quantity(line.on_hand, &line.unit),
    }
}

fn reels(option: &OptionInput<'_>) -> Vec<Reel> {
    let mut rows = Vec::new();
    for plan in &option.bill.cut_plans {
        for (n, reel) in plan.plan.reels.iter().enumerate() {
            rows.push(Reel {
                part: plan.part.clone(),
                name: reel_name(n + 1, reel),
                length: show::metres(reel.length),
                pieces: show::names(show::sorted(reel.cuts.iter().map(|cut| cut.label.as_str()))),
                left: show::metres(reel.left),
            });
        }
    }
    rows
}

/// "reel 2, bought as coax75-305": the name that purchase and cut list share.
pub(super) fn reel_name(number: usize, reel: &CutReel) -> String {
    match &reel.source {
        ReelSource::Bought(offer) => format!("reel {number}, bought as {offer}"),
        ReelSource::OnHand(name) => format!("reel {number}, from the shed: {name}"),
    }
}
