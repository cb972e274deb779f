//! JSON in the pinned shapes: lengths in metres as numbers, money as text, what is not computed null.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;
use serde_json::{Map, Value, json};

use super::OptionResult;
use crate::problem::{Problem, Problems};
use crate::project::{Assumption, Project};
use crate::takeoff::{Item, Piece};
use crate::units::{Length, Money};

/// The envelope of every document: schema, hash, currency, then its own keys.
pub fn document(name: &str, hash: &str, project: Option<&Project>, body: Vec<(&str, Value)>) -> Value {
    let mut map = Map::new();
    map.insert("schema".to_owned(), json!(format!("arraywright/{name}/1")));
    map.insert("hash".to_owned(), json!(hash));
    if let Some(project) = project {
        map.insert("currency".to_owned(), json!(project.currency.code()));
    }
    for (key, value) in body {
        map.insert(key.to_owned(), value);
    }
    Value::Object(map)
}

/// Metres as a number.
pub fn metres(length: Length) -> Value {
    number(length.decimal_metres())
}

fn optional_metres(length: Option<Length>) -> Value {
    length.map_or(Value::Null, metres)
}

/// A decimal as a JSON number: whole ones without a point.
pub fn number(value: Decimal) -> Value {
    match value.normalize() {
        whole if whole.scale() == 0 => whole.to_i64().map_or(Value::Null, |n| json!(n)),
        fraction => fraction.to_f64().map_or(Value::Null, |n| json!(n)),
    }
}

/// Money as text.
pub fn money(amount: Money) -> Value {
    json!(amount.to_string())
}

/// The `check` document.
pub fn check(hash: &str, problems: &Problems, assumptions: &[Assumption]) -> Value {
    let problems: Vec<Value> = problems.sorted().into_iter().map(problem).collect();
    document("check", hash, None, vec![("problems", json!(problems)), ("assumptions", assumed(assumptions))])
}

fn problem(problem: &Problem) -> Value {
    let place = problem.place.as_ref();
    json!({
        "code": problem.code.0,
        "severity": problem.severity.to_string(),
        "file": place.map(|place| place.file.clone()),
        "line": place.map(|place| place.line),
        "column": place.map(|place| place.column),
        "message": problem.message,
        "help": problem.help,
    })
}

/// The assumption list.
pub fn assumed(assumptions: &[Assumption]) -> Value {
    let list = assumptions.iter().map(|a| json!({ "key": a.key, "value": a.value, "why": a.why }));
    Value::Array(list.collect())
}

/// The `parts` document.
pub fn parts(hash: &str, project: &Project, results: &[OptionResult]) -> Value {
    let options = results.iter().map(|result| {
        let items: Vec<Value> = result.takeoff.items.iter().map(item).collect();
        let pieces: Vec<Value> = result.takeoff.pieces.iter().map(piece).collect();
        json!({ "option": result.design.option, "items": items, "pieces": pieces })
    });
    document("parts", hash, Some(project), vec![("options", Value::Array(options.collect()))])
}

fn item(item: &Item) -> Value {
    json!({
        "role": item.role,
        "part": item.part.id(),
        "label": item.label,
        "where": item.places_in_words(),
        "quantity": number(item.quantity),
        "unit": item.unit,
        "waste": number(item.waste),
        "spare": number(item.spare),
        "reason": item.reason.to_string(),
    })
}

fn piece(piece: &Piece) -> Value {
    let electrical = piece.electrical.as_ref();
    let degrees = electrical.map(|e| rounded(e.length.degrees(e.frequency), 4));
    let trim = electrical.and_then(|e| e.trim).map(|trim| rounded(trim.open.mhz(), 6));
    json!({
        "label": piece.label,
        "role": piece.role.word(),
        "part": piece.part.id(),
        "from": piece.from,
        "to": piece.to,
        "straight_m": optional_metres(piece.straight),
        "routed_m": optional_metres(piece.routed),
        "finished_m": metres(piece.finished),
        "cut_m": metres(piece.cut),
        "coiled_m": optional_metres(piece.coiled),
        "tolerance_m": electrical.and_then(|e| e.tolerance).map_or(Value::Null, metres),
        "electrical_deg": degrees,
        "velocity_factor": electrical.map_or(Value::Null, |e| number(e.velocity_factor.ratio())),
        "trim_mhz": trim,
        "match_group": if piece.match_group.is_empty() { Value::Null } else { json!(piece.match_group) },
        "conductors": piece.conductors,
        "reason": piece.reason.to_string(),
    })
}

/// A float to so many decimals, for figures that mean no more.
pub fn rounded(value: f64, places: i32) -> f64 {
    let scale = 10_f64.powi(places);
    let rounded = (value * scale).round() / scale;
    if rounded == 0.0 { 0.0 } else { rounded }
}
