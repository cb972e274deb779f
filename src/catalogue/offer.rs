//! Rows of `offers.csv`.

use std::collections::BTreeMap;

use chrono::NaiveDate;
use rust_decimal::Decimal;

use crate::units::{Currency, Money};

use super::model::{Offer, Source, Unit};
use super::number::{Grouping, NumberRule};
use super::part::{Counted, metres};
use super::row::{Case, Least, RowReader};
use super::table::{Need, Schema, Table};
use super::{code, currency, number};

pub(super) const SCHEMA: Schema = Schema {
    file: "offers.csv",
    columns: &[
        ("part", Need::Needed),
        ("offer", Need::Needed),
        ("pack", Need::Needed),
        ("price", Need::Needed),
        ("currency", Need::Needed),
        ("priced_on", Need::Optional),
        ("min_packs", Need::Optional),
        ("available", Need::Optional),
        ("supplier", Need::Optional),
        ("lead_days", Need::Optional),
        ("ship_group", Need::Optional),
        ("note", Need::Optional),
    ],
};

const COUNT: NumberRule<'static> = NumberRule { units: &[], grouping: Grouping::Possible };
const DAYS: NumberRule<'static> = NumberRule { units: &["d", "days", "day"], grouping: Grouping::Absurd };

/// How parts are counted, as far as the files at hand and the catalogue below them say.
pub(super) type Units = BTreeMap<String, (Unit, Counted)>;

/// The currency codes that a file uses, most used first, for messages.
pub(super) fn codes_used(table: &Table) -> String {
    let Some(index) = table.column("currency") else { return String::new() };
    let mut counts = BTreeMap::<&str, usize>::new();
    for cell in table.rows.iter().filter_map(|row| row.cells.get(index)) {
        let text = cell.text.trim();
        if currency::is_code(text) {
            *counts.entry(text).or_default() += 1;
        }
    }
    let mut list: Vec<(&str, usize)> = counts.into_iter().collect();
    list.sort_by_key(|(text, count)| (std::cmp::Reverse(*count), *text));
    list.into_iter().map(|(text, _)| text).collect::<Vec<_>>().join(", ")
}

/// Reads a row; `None` when its ids or its currency cannot be used.
pub(super) fn read(row: &mut RowReader<'_>, source: Source, units: &Units, codes: &str) -> Option<Offer> {
    let part = row.id("part", Case::Lower);
    let id = row.id("offer", Case::Lower);
    let pack = pack(row, part.as_deref().and_then(|part| units.get(part).copied()));
    let currency = currency(row, codes);
    let price = price(row, currency.as_ref());
    let priced_on: Option<NaiveDate> = row.date("priced_on");
    let min_packs = row.whole("min_packs", COUNT, Least::AboveZero).unwrap_or(1);
    let available = row.whole("available", COUNT, Least::Zero);
    let lead_days = row.whole("lead_days", DAYS, Least::Zero).and_then(|days| u32::try_from(days).ok());
    let note = row.text("note");
    if price.is_some_and(|price| price == Money::ZERO) && !note.to_lowercase().contains("free") {
        row.warning(
            "price",
            code::ZERO_PRICE,
            "is 0: free?",
            "leave it blank when the price is not known, or say free in the note",
        );
    }
    Some(Offer {
        id: id?,
        part: part?,
        pack,
        price,
        currency: currency?,
        priced_on,
        min_packs,
        available,
        supplier: row.text("supplier"),
        lead_days,
        ship_group: row.text("ship_group"),
        note,
        place: row.row_place(),
        source,
    })
}

fn pack(row: &mut RowReader<'_>, unit: Option<(Unit, Counted)>) -> Decimal {
    let units: &[&str] = match unit {
        Some((Unit::Metre, Counted::InItsUnit)) => &["m"],
        Some((Unit::Metre, Counted::InFeet)) => &["ft", "'"],
        Some((Unit::Kilogram, _)) => &["kg"],
        Some((Unit::Litre, _)) => &["l"],
        Some((Unit::Each, _)) => &["each", "pcs"],
        None => &[],
    };
    let rule = NumberRule { units, grouping: Grouping::Possible };
    let pack = row.needed_number("pack", rule, Least::AboveZero).unwrap_or_default();
    match unit {
        Some((_, Counted::InFeet)) => metres(pack),
        _ => pack,
    }
}

fn currency(row: &mut RowReader<'_>, codes: &str) -> Option<Currency> {
    let word = row.needed_word("currency");
    if word.is_empty() {
        return None;
    }
    let found = Currency::new(&word).filter(|_| currency::is_code(&word));
    if found.is_none() {
        let used = if codes.is_empty() { String::new() } else { format!("; this file uses {codes}") };
        let help = match currency::meant_by(&word)[..] {
            [one] => format!("write {one}{used}"),
            _ => format!("write a code of ISO 4217 such as EUR{used}"),
        };
        row.error("currency", code::CURRENCY, &format!("is \"{word}\", not a currency code"), help);
    }
    found
}

/// The price of one pack; blank is unpriced.
fn price(row: &mut RowReader<'_>, currency: Option<&Currency>) -> Option<Money> {
    let text = row.trimmed("price");
    if text.is_empty() {
        return None;
    }
    let plain = number::plain_signs(&text);
    let (sign, amount) = currency::split(&plain);
    if !sign.is_empty() {
        let meant = currency::meant_by(sign);
        let own = currency.map(Currency::code).unwrap_or_default();
        if !own.is_empty() && !meant.contains(&own) {
            let message = format!("is \"{text}\", but the currency of the row is {own}");
            row.error("price", code::CURRENCY_CONTRADICTS, &message, "correct one of the two");
            return None;
        }
        let message = format!("is \"{text}\" with a currency sign, which was dropped");
        row.warning("price", code::CURRENCY_IN_PRICE, &message, format!("write \"{amount}\""));
    }
    let from = if sign.is_empty() { text.as_str() } else { amount };
    // In a currency of three decimals `1.250` is an everyday price.
    let grouping = match currency.map(Currency::decimals) {
        Some(3) => Grouping::Absurd,
        _ => Grouping::Possible,
    };
    row.number_in("price", from, NumberRule { units: &[], grouping }, Least::Zero).map(Money::new)
}
