//! What the materials cost, and what the figures rest on.

use serde::Serialize;

use super::{Input, OptionInput, purchase, show};
use crate::pricing::Charge;
use crate::units::{Currency, Money};

/// The estimate of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    unpriced: Vec<purchase::Missing>,
    invented: usize,
    priced: usize,
    currency: String,
    lines: Vec<Row>,
    charges: Vec<ChargeRow>,
    materials: String,
    freight: String,
    tax: String,
    contingency: String,
    contingency_rate: String,
    total: String,
    complete: bool,
    hints: Vec<String>,
    assumptions: Vec<AssumptionRow>,
}

#[derive(Debug, Serialize)]
struct Row {
    part: String,
    description: String,
    needed: String,
    bought: String,
    left: String,
    amount: String,
    source: String,
}

#[derive(Debug, Serialize)]
struct ChargeRow {
    kind: &'static str,
    name: String,
    reason: String,
    amount: String,
}

#[derive(Debug, Serialize)]
struct AssumptionRow {
    key: String,
    value: String,
    why: String,
}

/// The view of one option's estimate.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let (bill, currency) = (option.bill, &input.project.currency);
    let money = |amount: Money| show::money(amount, currency);
    let priced = bill.lines.iter().filter(|line| line.pack_price.is_some());
    let own = input.project.assumptions.iter().filter(|assumption| belongs(input, option, &assumption.key));
    let assumptions = own.map(|assumption| AssumptionRow {
        key: assumption.key.clone(),
        value: assumption.value.clone(),
        why: assumption.why.clone(),
    });
    View {
        unpriced: purchase::missing(input, option),
        invented: bill.lines.iter().filter(|line| show::is_invented(line, input.catalogue)).count(),
        priced: priced.count(),
        currency: currency.to_string(),
        lines: lines(option, currency),
        charges: charges("freight", &bill.freight_lines, currency)
            .chain(charges("tax", &bill.tax_lines, currency))
            .collect(),
        materials: money(bill.materials),
        freight: money(bill.freight),
        tax: money(bill.tax),
        contingency: money(bill.contingency),
        contingency_rate: input.project.prices.contingency.to_string(),
        total: money(bill.total),
        complete: bill.unpriced.is_empty(),
        hints: bill.hints.clone(),
        assumptions: assumptions.collect(),
    }
}

/// Whether an assumption concerns this option: one of an array of another option does not.
fn belongs(input: &Input<'_>, option: &OptionInput<'_>, key: &str) -> bool {
    let meant = input.project.array_behind(key);
    meant.is_none_or(|meant| option.design.arrays.iter().any(|array| array.spec.name == meant.name))
}

fn lines(option: &OptionInput<'_>, currency: &Currency) -> Vec<Row> {
    let rows = option.bill.lines.iter().map(|line| Row {
        part: line.part.clone(),
        description: line.description.clone(),
        needed: show::quantity(line.needed, &line.unit),
        bought: show::quantity(line.bought, &line.unit),
        left: show::left(line, &option.bill.cut_plans),
        amount: match line.amount {
            Some(amount) => show::money(amount, currency),
            None if line.packs == 0 && line.on_hand >= line.needed => "from the shed".to_owned(),
            None => "unpriced".to_owned(),
        },
        source: show::or_dash(&line.price_source),
    });
    rows.collect()
}

fn charges<'a>(
    kind: &'static str,
    list: &'a [Charge],
    currency: &'a Currency,
) -> impl Iterator<Item = ChargeRow> + 'a {
    list.iter().map(move |charge| ChargeRow {
        kind,
        name: charge.name.clone(),
        reason: charge.reason.clone(),
        amount: show::money(charge.amount, currency),
    })
}
