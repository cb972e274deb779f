//! `[practice]`: reads every allowance over its default.

use std::collections::BTreeMap;

use rust_decimal::Decimal;
use toml::de::DeValue;

use super::code;
use super::practice::{HubArresters, Joint, Practice};
use super::role::{self, JOINT_ROLES};
use super::table::Table;
use super::value::Value;
use crate::units::{Currency, Force, Length, Money, Voltage};

const COMMON: &str = "common practice";
const MOST_PIECES: u32 = 1_000;

/// Reads `[practice]`.
pub(super) fn read(table: &Table<'_>, currency: Option<&Currency>) -> Practice {
    let practice = Practice {
        route_factor: table.or_later("route-factor", "the terrain's", "no factor given", route_factor),
        trim_ratio: table.or("trim-ratio", Practice::default().trim_ratio, COMMON, below_one),
        wire_slack: table.or_later("wire-slack", "0.01, on trees 0.03", COMMON, below_one),
        control_supply: table.or("control-supply", Voltage::new(12.0), COMMON, |v| {
            v.positive("V", Voltage::new(0.0), Voltage::parse)
        }),
        hub_arresters: hub_arresters(table),
        joint: table.get("joint", |v| Some(joint(&v.table()?, currency))).unwrap_or_default(),
        waste: by_role(table, "waste", Value::percent),
        spares: by_role(table, "spares", |v| v.count(0..=10_000)),
        ..earth(table, supports(table, lengths(table)))
    };
    table.finish();
    practice
}

fn lengths(table: &Table<'_>) -> Practice {
    let default = Practice::default();
    let length = |key, default| table.or(key, default, COMMON, Value::allowance);
    let step = |key, default| table.or(key, default, COMMON, Value::positive_length);
    Practice {
        riser: length("riser", default.riser),
        service_loop: length("service-loop", default.service_loop),
        drip_loop: length("drip-loop", default.drip_loop),
        burial_depth: table.or("burial-depth", Length::ZERO, "cable lies on the surface", Value::allowance),
        strip: length("strip", default.strip),
        round_up: step("round-up", default.round_up),
        trim_least: length("trim-least", default.trim_least),
        wire_tail: length("wire-tail", default.wire_tail),
        wire_round_up: step("wire-round-up", default.wire_round_up),
        choke_coax: table.or("choke-coax", Length::ZERO, "chokes do not use up the line", Value::allowance),
        loss_per_cut: length("loss-per-cut", default.loss_per_cut),
        keep_at_least: length("keep-at-least", default.keep_at_least),
        ..default
    }
}

fn supports(table: &Table<'_>, so_far: Practice) -> Practice {
    let bay = "from wire tension and sag";
    Practice {
        max_bay: table.or_later("max-bay", bay, "no bay given", Value::positive_length),
        wire_tension: table.or("wire-tension", so_far.wire_tension, COMMON, |v| {
            v.positive("N", Force::new(0.0), Force::parse)
        }),
        max_sag: table.or("max-sag", so_far.max_sag, COMMON, Value::positive_length),
        ..so_far
    }
}

fn earth(table: &Table<'_>, so_far: Practice) -> Practice {
    let by_soil = "by soil";
    let count = |key| table.or_later(key, by_soil, "none given", |v| v.count(0..=MOST_PIECES));
    let length = |key| table.or_later(key, by_soil, "none given", Value::positive_length);
    Practice {
        rods_per_set: count("rods-per-set"),
        rod_spacing: table.or_later("rod-spacing", "a rod's length", "none given", Value::positive_length),
        radials_per_set: count("radials-per-set"),
        radial_length: length("radial-length"),
        vertical_rods: count("vertical-rods"),
        vertical_radials: count("vertical-radials"),
        vertical_radial_length: length("vertical-radial-length"),
        ..so_far
    }
}

fn route_factor(value: &Value<'_>) -> Option<Decimal> {
    let ratio = value.ratio()?;
    if ratio >= Decimal::ONE && ratio <= Decimal::TEN {
        return Some(ratio);
    }
    let message = format!("a route factor of {ratio} is no way over the ground");
    value.refuse(code::RATIO_RANGE, message, "accepted: 1 (straight) to 10; usual 1.05 to 1.25")
}

fn below_one(value: &Value<'_>) -> Option<Decimal> {
    let ratio = value.ratio_from_zero()?;
    if ratio < Decimal::ONE {
        return Some(ratio);
    }
    let message = format!("`{}` is a share of a length and cannot be {ratio}", value.name());
    value.refuse(code::RATIO_RANGE, message, "accepted: 0 to below 1; 2 % is 0.02")
}

fn hub_arresters(table: &Table<'_>) -> HubArresters {
    let bought = table.or("hub-arresters", false, "advised only", Value::truth);
    if bought { HubArresters::Bought } else { HubArresters::Advised }
}

fn joint(table: &Table<'_>, currency: Option<&Currency>) -> Joint {
    let length = |key| table.or(key, Length::ZERO, "none given", Value::allowance);
    let joint = Joint {
        price: table.or("price", Money::ZERO, "none given", |v| v.money(currency)),
        step: length("step"),
        least: length("least"),
        extra: length("extra"),
        allowed: table.need("allowed", "allowed = [\"main\"]", joint_roles).unwrap_or_default(),
    };
    table.finish();
    joint
}

fn joint_roles(list: &Value<'_>) -> Option<Vec<String>> {
    let mut roles: Vec<String> = Vec::new();
    for item in list.items("\"main\"")? {
        let Some(role) = item.text() else { continue };
        if JOINT_ROLES.contains(&role) {
            if !roles.iter().any(|known| known == role) {
                roles.push(role.to_owned());
            }
        } else if role::check(&item, role) {
            let message = format!("pieces of the role `{role}` are never joined");
            let help = format!("joints are allowed in: {}", JOINT_ROLES.join(", "));
            item.refuse::<()>(code::JOINT_ROLE, message, help);
        }
    }
    Some(roles)
}

fn by_role<'a, T>(
    table: &Table<'a>,
    key: &'static str,
    read: impl Fn(&Value<'a>) -> Option<T>,
) -> BTreeMap<String, T> {
    let Some(value) = table.take(key) else {
        table.desk.assume(table.path_of(key), "by role, as usual", COMMON);
        return BTreeMap::new();
    };
    let DeValue::Table(_) = value.raw else {
        let example = if key == "waste" { "antenna-wire = \"3 %\"" } else { "plug = 4" };
        let message = format!("`{key}` is given by role");
        return value
            .refuse(code::WRONG_TYPE, message, format!("write {key} = {{ {example} }}"))
            .unwrap_or_default();
    };
    let Some(inner) = value.table() else { return BTreeMap::new() };
    let entries = inner.entries().into_iter().filter(|entry| role::check(entry, entry.name()));
    entries.filter_map(|entry| Some((entry.name().to_owned(), read(&entry)?))).collect()
}
