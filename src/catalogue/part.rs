//! Rows of `parts.csv`.

use std::collections::BTreeMap;

use rust_decimal::Decimal;

use crate::problem::nearest;

use super::model::{Part, Source, Unit};
use super::number::{Grouping, NumberRule, Remark};
use super::role::part_roles;
use super::row::{Case, Least, RowReader, id_fault};
use super::table::{Need, Schema};
use super::{code, number};

pub(super) const SCHEMA: Schema = Schema {
    file: "parts.csv",
    columns: &[
        ("part", Need::Needed),
        ("role", Need::Needed),
        ("description", Need::Needed),
        ("unit", Need::Needed),
        ("attributes", Need::Optional),
        ("tax_class", Need::Optional),
        ("weight_kg", Need::Optional),
        ("alternates", Need::Optional),
        ("hire", Need::Optional),
        ("note", Need::Optional),
    ],
};

/// Attributes that other stages calculate with.
const NUMBERS: &[&str] = &[
    "vf_tol",
    "awg",
    "conductors",
    "ohm_per_km",
    "turns",
    "mu",
    "power_w",
    "states",
    "coil_v",
    "coil_ma",
    "nf_db",
    "gain_db",
    "length",
    "height",
    "diameter_mm",
    "ways",
    "sockets",
    "z_ohm",
    "db",
    "current_ma",
    "voltage_v",
    "bits",
    "lines",
];

const WEIGHT: NumberRule<'static> = NumberRule { units: &["kg"], grouping: Grouping::Absurd };
const ATTRIBUTE: NumberRule<'static> = NumberRule { units: &[], grouping: Grouping::Absurd };
const METRES_PER_FOOT: Decimal = Decimal::from_parts(3048, 0, 0, false, 4);

/// How a part's pack is counted, when that differs from its unit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Counted {
    InItsUnit,
    /// The catalogue counts feet, the program metres.
    InFeet,
}

/// Metres for a count of feet, exactly.
pub(super) fn metres(feet: Decimal) -> Decimal {
    feet.saturating_mul(METRES_PER_FOOT).normalize()
}

/// Reads a row; `None` when it has no usable id. Whatever else is wrong is reported and left at its default.
pub(super) fn read(row: &mut RowReader<'_>, source: Source) -> Option<(Part, Counted)> {
    let id = row.id("part", Case::Lower);
    let role = role(row);
    let description = row.text("description");
    if description.is_empty() {
        row.needed_word("description");
    }
    let (unit, counted) = unit(row);
    let mut weight_kg = row.number("weight_kg", WEIGHT, Least::Zero);
    if counted == Counted::InFeet {
        weight_kg = weight_kg.and_then(|weight| weight.checked_div(METRES_PER_FOOT));
    }
    let tax_class = Some(row.word("tax_class")).filter(|class| !class.is_empty());
    let part = Part {
        role,
        description,
        unit,
        attributes: attributes(row),
        tax_class: tax_class.unwrap_or_else(|| "goods".to_owned()),
        weight_kg,
        alternates: alternates(row),
        hire: row.yes_no("hire"),
        note: row.text("note"),
        place: row.row_place(),
        source,
        // Last, so that a bad id does not hide what else is wrong.
        id: id?,
    };
    Some((part, counted))
}

fn role(row: &mut RowReader<'_>) -> String {
    let word = row.needed_word("role").to_lowercase();
    if !word.is_empty() && !part_roles().any(|role| role == word) {
        let help = match nearest(&word, part_roles()) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("the roles are {}", part_roles().collect::<Vec<_>>().join(", ")),
        };
        row.error("role", code::UNKNOWN_ROLE, &format!("is \"{word}\", which is no role"), help);
    }
    word
}

fn unit(row: &mut RowReader<'_>) -> (Unit, Counted) {
    let word = row.needed_word("unit").to_lowercase();
    match word.as_str() {
        "each" | "" => (Unit::Each, Counted::InItsUnit),
        "m" => (Unit::Metre, Counted::InItsUnit),
        "kg" => (Unit::Kilogram, Counted::InItsUnit),
        "l" => (Unit::Litre, Counted::InItsUnit),
        "ft" => {
            let message = "is \"ft\": packs and weight were converted to metres";
            row.warning(
                "unit",
                code::UNIT_CONVERTED,
                message,
                "prices are unchanged; the program counts in m",
            );
            (Unit::Metre, Counted::InFeet)
        }
        other => {
            let message = format!("is \"{other}\", which nothing is counted in");
            row.error("unit", code::UNKNOWN_UNIT, &message, "use each, m, kg or l (ft is converted)");
            (Unit::Each, Counted::InItsUnit)
        }
    }
}

fn alternates(row: &mut RowReader<'_>) -> Vec<String> {
    let words = row.word("alternates").to_lowercase();
    let mut ids = Vec::new();
    for word in words.split_whitespace() {
        match id_fault(word) {
            Some(Remark { code, message, help }) => row.error("alternates", code, &message, help),
            None => ids.push(word.to_owned()),
        }
    }
    ids
}

fn attributes(row: &mut RowReader<'_>) -> BTreeMap<String, String> {
    let text = row.word("attributes");
    let mut found = BTreeMap::new();
    if let Some(Remark { code, message, help }) = number::formula(&text) {
        row.error("attributes", code, &message, help);
        return found;
    }
    for pair in text.split_whitespace() {
        let Some((key, value)) = pair.split_once('=').filter(|(key, value)| is_key(key) && !value.is_empty())
        else {
            let message = format!("has \"{pair}\", which is not key=value");
            row.error(
                "attributes",
                code::BAD_ATTRIBUTE,
                &message,
                "write key=value key=value, parted by spaces",
            );
            continue;
        };
        if value.contains(';') || value.ends_with(',') {
            let message = format!("has \"{pair}\", where another sign than a space parts the pairs");
            row.error(
                "attributes",
                code::BAD_ATTRIBUTE,
                &message,
                "write key=value key=value, parted by spaces",
            );
            continue;
        }
        let Some(value) = attribute_value(row, key, value) else { continue };
        if found.insert(key.to_owned(), value).is_some() {
            let message = format!("names `{key}` twice");
            row.error("attributes", code::BAD_ATTRIBUTE, &message, "remove one of them");
        }
    }
    found
}

fn is_key(key: &str) -> bool {
    key.starts_with(|c: char| c.is_ascii_lowercase())
        && key.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit() || b == b'_')
}

/// The value as it is kept: numbers in plain digits, `default` as yes or no.
fn attribute_value(row: &mut RowReader<'_>, key: &str, value: &str) -> Option<String> {
    if key == "default" {
        return Some(if matches!(value.to_lowercase().as_str(), "yes" | "true" | "x" | "1" | "ja") {
            "yes".to_owned()
        } else {
            "no".to_owned()
        });
    }
    if !NUMBERS.contains(&key) {
        return Some(value.to_owned());
    }
    // A gain below zero and the like is fair; only the size is read here.
    let size = value.strip_prefix('-').unwrap_or(value);
    let sign = &value[..value.len() - size.len()];
    let read = row.number_in("attributes", size, ATTRIBUTE, Least::Zero)?;
    if key == "vf_tol" && read >= Decimal::ONE {
        let ratio = (read / Decimal::ONE_HUNDRED).normalize();
        let message = format!("has vf_tol={read}, a spread of the velocity factor in percent");
        row.error("attributes", code::VF_PERCENT, &message, format!("write vf_tol={ratio}"));
        return None;
    }
    Some(format!("{sign}{read}"))
}
