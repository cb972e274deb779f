//! Options side by side.

use rust_decimal::Decimal;
use serde_json::{Value, json};

use super::OptionResult;
use super::machine::{document, number};
use super::parts::{coax_cut, cut_of};
use super::sheet::{Sheet, Table};
use crate::plan::PointKind;
use crate::project::Project;
use crate::takeoff::PieceRole;

/// Margin of the land around posts, wires and boxes, metres (common practice, no source).
const MARGIN_M: f64 = 5.0;

/// One row: a name, a unit and a value for each option.
#[derive(Clone, Debug)]
pub struct Row {
    /// What it is.
    pub name: String,
    /// Its unit.
    pub unit: String,
    /// One value an option.
    pub values: Vec<Cell>,
}

/// One value.
#[derive(Clone, Debug, PartialEq)]
pub enum Cell {
    /// A number.
    Number(Decimal),
    /// Money, exact text.
    Money(String),
    /// Not computed.
    None,
}

impl Cell {
    fn json(&self) -> Value {
        match self {
            Self::Number(value) => number(*value),
            Self::Money(text) => json!(text),
            Self::None => Value::Null,
        }
    }

    fn text(&self) -> String {
        match self {
            Self::Number(value) => value.normalize().to_string(),
            Self::Money(text) => text.clone(),
            Self::None => "–".to_owned(),
        }
    }
}

/// The land that an option takes: length along the first heading, width, both with the margin.
pub fn land(result: &OptionResult) -> (Decimal, Decimal) {
    let Some(first) = result.design.arrays.first() else { return (Decimal::ZERO, Decimal::ZERO) };
    let frame = first.plan.layout.frame;
    let (mut low, mut high) = ([f64::MAX; 2], [f64::MIN; 2]);
    let layouts = result.design.arrays.iter().map(|array| &array.plan.layout);
    for point in layouts.flat_map(|layout| &layout.points).filter(|point| point.kind != PointKind::Receiver) {
        let at = frame.to_array(point.site);
        for (axis, value) in [at.forward_m(), at.right_m()].into_iter().enumerate() {
            low[axis] = low[axis].min(value);
            high[axis] = high[axis].max(value);
        }
    }
    let side = |axis: usize| {
        let metres = high[axis] - low[axis] + 2.0 * MARGIN_M;
        Decimal::from_f64_retain(metres).unwrap_or_default().round_dp(1)
    };
    (side(0), side(1))
}

/// Every row that bill, takeoff and layout can fill.
pub fn rows(project: &Project, results: &[OptionResult]) -> Vec<Row> {
    let mut rows = money_rows(project, results);
    rows.extend(quantity_rows(results));
    rows
}

fn money_rows(project: &Project, results: &[OptionResult]) -> Vec<Row> {
    let currency = project.currency.code();
    let row = |name: &str, value: &dyn Fn(&OptionResult) -> String| Row {
        name: name.to_owned(),
        unit: currency.to_owned(),
        values: results.iter().map(|result| Cell::Money(value(result))).collect(),
    };
    vec![
        row("materials", &|r| r.bill.materials.to_string()),
        row("freight", &|r| r.bill.freight.to_string()),
        row("tax", &|r| r.bill.tax.to_string()),
        row("contingency", &|r| r.bill.contingency.to_string()),
        row("total without labour", &|r| r.bill.total.to_string()),
    ]
}

fn quantity_rows(results: &[OptionResult]) -> Vec<Row> {
    let row = |name: &str, unit: &str, value: &dyn Fn(&OptionResult) -> Decimal| Row {
        name: name.to_owned(),
        unit: unit.to_owned(),
        values: results.iter().map(|result| Cell::Number(value(result))).collect(),
    };
    let item = |role: &'static str| move |r: &OptionResult| r.takeoff.count(role);
    let outdoors = |r: &OptionResult| {
        let coax = r.takeoff.pieces.iter().filter(|piece| piece.role.is_coax());
        let ends = coax.flat_map(|piece| [&piece.from, &piece.to]).filter(|end| *end != "RX");
        Decimal::from(ends.count())
    };
    let elements = |r: &OptionResult| {
        Decimal::from(r.design.arrays.iter().map(|array| array.plan.layout.elements.len()).sum::<usize>())
    };
    let wire = |r: &OptionResult| cut_of(r, PieceRole::AntennaWire).decimal_metres();
    let earth =
        |r: &OptionResult| (cut_of(r, PieceRole::Radial) + cut_of(r, PieceRole::BondWire)).decimal_metres();
    let posts = |r: &OptionResult| r.takeoff.count("end-support") + r.takeoff.count("mid-support");
    let hybrids = |r: &OptionResult| r.takeoff.count("hybrid-2way") + r.takeoff.count("hybrid-3way");
    let delays = |r: &OptionResult| Decimal::from(r.takeoff.pieces_of(PieceRole::Delay).count());
    vec![
        row("elements", "", &elements),
        row("land, length with margin", "m", &|r| land(r).0),
        row("land, width with margin", "m", &|r| land(r).1),
        row("land, area with margin", "m²", &|r| (land(r).0 * land(r).1).round_dp(1)),
        row("coax to cut", "m", &|r| coax_cut(r).decimal_metres()),
        row("antenna wire to cut", "m", &wire),
        row("radial and bonding wire", "m", &earth),
        row("posts", "", &posts),
        row("masts", "", &item("mast")),
        row("ground rods", "", &item("ground-rod")),
        row("hub boxes", "", &item("hub-box")),
        row("hybrids", "", &hybrids),
        row("inverters", "", &item("inverter")),
        row("delay lines", "", &delays),
        row("plugs", "", &item("plug")),
        row("joints outdoors", "", &outdoors),
        row("unpriced parts", "", &|r| Decimal::from(r.bill.unpriced.len())),
    ]
}

/// The `compare` document.
pub fn document_of(hash: &str, project: &Project, results: &[OptionResult], rows: &[Row]) -> Value {
    let options: Vec<&str> = results.iter().map(|result| result.design.option.as_str()).collect();
    let rows: Vec<Value> = rows
        .iter()
        .map(|row| {
            let values: Vec<Value> = row.values.iter().map(Cell::json).collect();
            json!({ "name": row.name, "unit": row.unit, "values": values })
        })
        .collect();
    let body = vec![("options", json!(options)), ("rows", json!(rows)), ("flips", json!([]))];
    document("compare", hash, Some(project), body)
}

/// The comparison for people: who is cheaper and by how much, then the table.
pub fn sheet(project: &Project, results: &[OptionResult], rows: &[Row]) -> Sheet {
    let mut sheet = Sheet { answer: answer(project, results), ..Sheet::default() };
    let heads: Vec<String> = ["what", "unit"]
        .iter()
        .map(|s| (*s).to_owned())
        .chain(results.iter().map(|r| format!("#{}", r.name())))
        .collect();
    let heads: Vec<&str> = heads.iter().map(String::as_str).collect();
    let mut table = Table::new("side by side", &heads);
    for row in rows {
        let cells = row.values.iter().map(Cell::text);
        table.rows.push([row.name.clone(), row.unit.clone()].into_iter().chain(cells).collect());
    }
    sheet.tables.push(table);
    sheet.notes.push(super::estimate::NO_LABOUR.to_owned());
    sheet
}

fn answer(project: &Project, results: &[OptionResult]) -> Vec<String> {
    let currency = &project.currency;
    let incomplete: Vec<&OptionResult> = results.iter().filter(|r| !r.bill.unpriced.is_empty()).collect();
    if !incomplete.is_empty() {
        let names: Vec<&str> = incomplete.iter().map(|r| r.name()).collect();
        return vec![format!(
            "no answer yet: parts of {} are unpriced, so totals are incomplete",
            names.join(" and ")
        )];
    }
    let mut ranked: Vec<&OptionResult> = results.iter().collect();
    ranked.sort_by_key(|result| result.bill.total);
    match ranked.as_slice() {
        [] => Vec::new(),
        [only] => vec![format!("only one option: {} costs {currency} {}", only.name(), only.bill.total)],
        [first, second, ..] if first.bill.total == second.bill.total => {
            vec![format!(
                "{} and {} cost the same: {currency} {}",
                first.name(),
                second.name(),
                first.bill.total
            )]
        }
        [first, rest @ ..] => {
            let others: Vec<String> =
                rest.iter().map(|r| format!("{currency} {} for {}", r.bill.total, r.name())).collect();
            let mut lines = vec![format!(
                "{} is cheaper: {currency} {} against {}, labour not counted",
                first.name(),
                first.bill.total,
                others.join(", ")
            )];
            let ((a, b), (c, d)) = (land(first), land(rest[0]));
            let hectares = |area: Decimal| (area / Decimal::from(10_000)).round_dp(2);
            lines.push(format!(
                "{} takes {} ha, {} takes {} ha",
                first.name(),
                hectares(a * b),
                rest[0].name(),
                hectares(c * d)
            ));
            lines
        }
    }
}
