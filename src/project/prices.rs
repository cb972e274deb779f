//! `[prices]`: tax, freight, contingency, exchange rates and how old a price may be.

use std::collections::BTreeMap;

use rust_decimal::Decimal;
use toml::de::DeValue;

use super::code;
use super::currency;
use super::model::{Exchange, Freight, Prices};
use super::table::Table;
use super::value::Value;
use crate::units::{Currency, Money, Percent, UnitError, parse_decimal};

/// Reads `[prices]`.
pub(super) fn read(table: &Table<'_>, currency: Option<&Currency>) -> Prices {
    let no_tax = "no rate given; prices are taken as final";
    let no_freight = "no charges given";
    let tax = table.or_said("tax", BTreeMap::new(), "none", no_tax, |v| Some(tax(v)));
    let (freight, freight_free_over) =
        table.or_said("freight", Default::default(), "none", no_freight, |v| Some(freight(v, currency)));
    let ten_percent = Percent::from_ratio(Decimal::new(10, 2));
    let prices = Prices {
        tax,
        freight,
        freight_free_over,
        contingency: table.or(
            "contingency",
            ten_percent,
            "money for the unknown, on direct cost",
            Value::percent,
        ),
        exchange: table.get("exchange", |v| Some(exchange(v, currency))).unwrap_or_default(),
        oldest_price_days: oldest_price(table),
    };
    table.finish();
    prices
}

fn oldest_price(table: &Table<'_>) -> i64 {
    table.or_said("oldest-price", 730, "730 days", "older prices are errors", |value| {
        let days = value.quantity("days", parse_days)?;
        if days > 0 { Some(days) } else { value.not_positive() }
    })
}

fn parse_days(text: &str) -> Result<i64, UnitError> {
    const WANTED: &str = "a time such as \"730 days\"";
    let text = text.trim();
    let number = text.trim_end_matches(char::is_alphabetic);
    let unit = &text[number.len()..];
    if number.trim().is_empty() {
        return Err(UnitError::NotANumber { given: text.to_owned(), wanted: WANTED });
    }
    let days = match unit {
        "day" | "days" => 1,
        "week" | "weeks" => 7,
        "" => return Err(UnitError::NoUnit { given: text.to_owned(), wanted: WANTED }),
        _ => {
            let near = unit.starts_with(['d', 'D']).then(|| "days".to_owned());
            let accepted = "`days`, `weeks`".to_owned();
            return Err(UnitError::UnknownUnit { unit: unit.to_owned(), accepted, near });
        }
    };
    let value = parse_decimal(number.trim(), WANTED)?;
    let whole = i64::try_from(value.trunc()).ok().and_then(|value| value.checked_mul(days));
    match whole {
        Some(whole) if whole.abs() <= 100_000 => Ok(whole),
        _ => Err(UnitError::TooLarge { given: text.to_owned() }),
    }
}

/// One rate for everything, kept as that of goods (the class of all that has no rate of its own), or rates by class.
fn tax(value: &Value<'_>) -> BTreeMap<String, Percent> {
    if !matches!(value.raw, DeValue::Table(_)) {
        return value.percent().map(|rate| ("goods".to_owned(), rate)).into_iter().collect();
    }
    let Some(table) = value.table() else { return BTreeMap::new() };
    table.entries().iter().filter_map(|rate| Some((rate.name().to_owned(), rate.percent()?))).collect()
}

fn freight(value: &Value<'_>, currency: Option<&Currency>) -> (BTreeMap<String, Freight>, Option<Money>) {
    let DeValue::Table(_) = value.raw else {
        let message = "`freight` is given by supplier or ship group";
        let help = "write freight = { S1 = \"15.00\", heavy = \"0.40 per kg\", free-over = \"500.00\" }";
        return value.refuse(code::WRONG_TYPE, message, help).unwrap_or_default();
    };
    let Some(table) = value.table() else { return Default::default() };
    let free_over = table.get("free-over", |v| v.money(currency));
    let charges = table.entries().into_iter().filter(|charge| charge.name() != "free-over");
    let charges =
        charges.filter_map(|charge| Some((charge.name().to_owned(), charge_of(&charge, currency)?)));
    (charges.collect(), free_over)
}

fn charge_of(value: &Value<'_>, currency: Option<&Currency>) -> Option<Freight> {
    if let DeValue::String(text) = value.raw
        && let Some((money, unit)) = text.split_once(" per ")
    {
        if unit.trim() != "kg" {
            let message = format!("freight cannot be counted per {}", unit.trim().escape_debug());
            let help = "accepted: an amount an order, \"15.00\", or \"0.40 per kg\"";
            return value.refuse(code::UNKNOWN_UNIT, message, help);
        }
        return value.money_text(money.trim(), currency).map(Freight::PerKilogram);
    }
    value.money(currency).map(Freight::Flat)
}

fn exchange(list: &Value<'_>, currency: Option<&Currency>) -> Vec<Exchange> {
    let mut rates: Vec<Exchange> = Vec::new();
    for item in list.items("{ from = \"USD\", rate = \"0.92\", on = 2026-09-30 }").unwrap_or_default() {
        let Some(table) = item.table() else { continue };
        let from = table.need("from", "from = \"USD\"", currency::read);
        let rate = table.need("rate", "rate = \"0.92\"", exchange_rate);
        let on = table.need("on", "on = 2026-09-30", Value::date);
        table.finish();
        if let (Some(from), Some(value)) = (&from, table.take("from")) {
            if Some(from) == currency {
                let message = format!("{from} is the project's own currency and needs no rate");
                value.refuse::<()>(code::EXCHANGE_INTO_ITSELF, message, "delete this entry");
            } else if rates.iter().any(|known| known.from == *from) {
                let message = format!("two rates are given for {from}");
                value.refuse::<()>(code::EXCHANGE_TWICE, message, "keep one of them");
            }
        }
        if let (Some(from), Some(rate), Some(on)) = (from, rate, on) {
            rates.push(Exchange { from, rate, on });
        }
    }
    rates
}

/// A rate in quotes, as money is, or bare.
fn exchange_rate(value: &Value<'_>) -> Option<Decimal> {
    let rate = if value.raw.is_str() {
        value.quantity("", |text| parse_decimal(text.trim(), "a rate such as \"0.92\""))?
    } else {
        value.ratio()?
    };
    if rate > Decimal::ZERO { Some(rate) } else { value.not_positive() }
}
