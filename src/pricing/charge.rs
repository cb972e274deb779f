//! Freight, tax, contingency and the total.

use std::collections::BTreeMap;

use rust_decimal::Decimal;

use super::model::{Bill, BillLine, Charge};
use crate::project::{Freight, Project};
use crate::units::{Money, Percent};

/// Adds freight, tax and contingency to a bill whose lines stand, and sums it up.
///
/// Freight and each tax class are rounded to minor units; the total is the sum of what is printed, so paper adds up.
pub(super) fn add(bill: &mut Bill, project: &Project) {
    let currency = &project.currency;
    bill.freight_lines = freight(bill, project);
    bill.freight = sum(&bill.freight_lines).rounded(currency);
    bill.tax_lines = tax(bill, project);
    bill.tax = sum(&bill.tax_lines).rounded(currency);
    let direct = bill.materials + bill.freight;
    bill.contingency = direct.times(project.prices.contingency.ratio()).rounded(currency);
    bill.total = (direct + bill.tax + bill.contingency).rounded(currency);
}

fn sum(charges: &[Charge]) -> Money {
    charges.iter().map(|charge| charge.amount).sum()
}

/// One line for every freight rule that something bought falls under.
fn freight(bill: &Bill, project: &Project) -> Vec<Charge> {
    let mut charges = Vec::new();
    for (key, rule) in &project.prices.freight {
        let shipped: Vec<&BillLine> = bill
            .lines
            .iter()
            .filter(|line| line.packs > 0 && (line.supplier == *key || line.ship_group == *key))
            .collect();
        if shipped.is_empty() {
            continue;
        }
        let (amount, reason) = charge_for(&shipped, *rule, project);
        charges.push(Charge { name: key.clone(), amount: amount.rounded(&project.currency), reason });
    }
    charges
}

fn charge_for(shipped: &[&BillLine], rule: Freight, project: &Project) -> (Money, String) {
    let goods: Money = shipped.iter().filter_map(|line| line.amount).sum();
    let free = project.prices.freight_free_over.filter(|limit| goods >= *limit);
    match (rule, free) {
        (_, Some(limit)) => (Money::ZERO, format!("free: goods for {goods} reach {limit}")),
        (Freight::Flat(flat), None) => (flat, "once an order".to_owned()),
        (Freight::PerKilogram(rate), None) => {
            let weight: Decimal = shipped.iter().map(|line| line.weight_kg).sum();
            (rate.times(weight), format!("{} kg × {rate} per kg", weight.normalize()))
        }
    }
}

/// One line a class: rate × sum of the class, rounded once.
fn tax(bill: &Bill, project: &Project) -> Vec<Charge> {
    let mut base: BTreeMap<&str, Money> = BTreeMap::new();
    for line in &bill.lines {
        *base.entry(line.tax_class.as_str()).or_default() += line.amount.unwrap_or_default();
    }
    let freight_class = if project.prices.tax.contains_key("freight") { "freight" } else { "goods" };
    *base.entry(freight_class).or_default() += bill.freight;
    let rate_of = |class: &str| rate(project, class);
    base.into_iter()
        .filter_map(|(class, base)| {
            let rate = rate_of(class)?;
            let amount = base.times(rate.ratio()).rounded(&project.currency);
            Some(Charge { name: class.to_owned(), amount, reason: format!("{rate} of {base}") })
        })
        .filter(|charge| charge.amount != Money::ZERO)
        .collect()
}

/// The rate of a class; a class without a rate of its own is taxed as goods.
fn rate(project: &Project, class: &str) -> Option<Percent> {
    project.prices.tax.get(class).or_else(|| project.prices.tax.get("goods")).copied()
}
