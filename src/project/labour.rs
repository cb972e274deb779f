//! `[labour]`: the crew, its hours and its rate.

use rust_decimal::Decimal;
use toml::de::DeValue;

use super::code;
use super::model::{LabourTerms, Travel};
use super::table::Table;
use super::value::Value;
use crate::units::{Currency, Money};

/// Reads `[labour]`.
pub(super) fn read(table: &Table<'_>, currency: Option<&Currency>) -> LabourTerms {
    let terms = LabourTerms {
        crew: table.or("crew", 2, "no crew given", |v| v.count(1..=100)) as usize,
        hours_per_day: table.or(
            "hours-per-day",
            Decimal::from(5),
            "productive hours of a day in the field",
            |v| {
                let hours = v.ratio()?;
                if hours > Decimal::ZERO && hours <= Decimal::from(24) {
                    return Some(hours);
                }
                let message = format!("a day cannot have {hours} productive hours");
                v.refuse(code::RATIO_RANGE, message, "accepted: above 0, up to 24; usual 5")
            },
        ),
        rate: table.or("rate", Money::ZERO, "volunteers; hours are still counted", |v| rate(v, currency)),
        start: table.get("start", Value::date),
        travel: table.get("travel", |v| travel(&v.table()?, currency)),
    };
    table.finish();
    terms
}

/// Money an hour; a bare 0 stands for volunteers.
fn rate(value: &Value<'_>, currency: Option<&Currency>) -> Option<Money> {
    if let DeValue::Integer(number) = value.raw
        && number.as_str() == "0"
    {
        return Some(Money::ZERO);
    }
    value.money(currency)
}

fn travel(table: &Table<'_>, currency: Option<&Currency>) -> Option<Travel> {
    let people = table.need("people", "people = 2", |v| v.count(0..=100));
    let trips = table.need("trips", "trips = 3", |v| v.count(0..=1_000));
    let hours = table.or("hours", Decimal::ZERO, "no hours given", Value::ratio_from_zero);
    let money = table.or("money", Money::ZERO, "no money given", |v| v.money(currency));
    table.finish();
    Some(Travel { people: people? as usize, trips: trips? as usize, hours, money })
}
