//! Options side by side.

use rust_decimal::Decimal;
use serde_json::{Value, json};

use super::OptionResult;
use super::machine::{document, number};
use super::parts::{coax_cut, cut_of};
use super::sheet::{Sheet, Table};
use crate::plan::PointKind;
use crate::project::Project;
use crate::radio::FRONT_TO_BACK_CEILING_DB;
use crate::reception::{ArrayReport, Figures};
use crate::takeoff::PieceRole;
use crate::units::{Frequency, Money};

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
    /// A figure to one decimal.
    Figure(Decimal),
    /// Money, exact text.
    Money(String),
    /// A number above which only "more than" is honest.
    Ceiling {
        /// As computed.
        value: Decimal,
        /// What is shown is "> ceiling" when the value is above it.
        ceiling: Decimal,
    },
    /// Not computed.
    None,
}

impl Cell {
    fn json(&self) -> Value {
        match self {
            Self::Number(value) | Self::Figure(value) | Self::Ceiling { value, .. } => number(*value),
            Self::Money(text) => json!(text),
            Self::None => Value::Null,
        }
    }

    fn text(&self) -> String {
        match self {
            Self::Ceiling { value, ceiling } if value > ceiling => format!("> {ceiling}"),
            Self::Figure(value) | Self::Ceiling { value, .. } => format!("{value:.1}"),
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

/// Every row: money, what it hears, quantities. `heard` has the pattern reports of each option's arrays, in the same order.
pub fn rows(project: &Project, results: &[OptionResult], heard: &[Vec<ArrayReport>]) -> Vec<Row> {
    let mut rows = money_rows(project, results);
    rows.extend(radio_rows(project, results, heard));
    rows.extend(quantity_rows(results));
    rows
}

/// The figures of the array that an option is judged by, in its first direction at one frequency.
fn figures<'a>(
    result: &OptionResult,
    reports: &'a [ArrayReport],
    frequency: Frequency,
) -> Option<&'a Figures> {
    reports.get(result.design.judged())?.first_figures(frequency)
}

/// Directivity, rear, beamwidth and signal of the array that each option is judged by, and what a dB costs above the cheapest.
fn radio_rows(project: &Project, results: &[OptionResult], heard: &[Vec<ArrayReport>]) -> Vec<Row> {
    let mut rows = Vec::new();
    for frequency in project.frequencies() {
        let mut row = |name: &str, unit: &str, value: &dyn Fn(&Figures) -> Cell| {
            let cell = |(result, reports): (&OptionResult, &Vec<ArrayReport>)| {
                figures(result, reports, frequency).map_or(Cell::None, value)
            };
            let values = results.iter().zip(heard).map(cell).collect();
            rows.push(Row { name: format!("{name} at {frequency}"), unit: unit.to_owned(), values });
        };
        row("RDF at its peak", "dB", &|f| tenth(f.report.directivity.rdf_db));
        row("elevation of the peak", "deg", &|f| tenth(f.report.directivity.peak_elevation_deg));
        row("RDF at 20° elevation", "dB", &|f| {
            let at = f.report.directivity.at.iter().find(|at| (at.elevation_deg - 20.0).abs() < 0.5);
            at.map_or(Cell::None, |at| tenth(at.rdf_db))
        });
        row("front to back", "dB", &|f| Cell::Ceiling {
            value: tenths(f.report.directivity.front_to_back_db),
            ceiling: tenths(FRONT_TO_BACK_CEILING_DB),
        });
        row("worst rear lobe", "dB", &|f| tenth(f.report.directivity.worst_rear.level_db));
        row("beamwidth", "deg", &|f| tenth(f.report.directivity.beamwidth_deg));
        row("signal over one element", "dB", &|f| tenth(f.report.directivity.gain_rel_db));
        row("RDF that nine in ten builds reach", "dB", &|f| tenth(f.report.spread.rdf_db.p10));
    }
    rows.push(cost_per_decibel(project, results, heard));
    rows
}

pub(in crate::report) fn tenths(value: f64) -> Decimal {
    Decimal::from_f64_retain(value).unwrap_or_default().round_dp(1)
}

fn tenth(value: f64) -> Cell {
    if value.is_finite() { Cell::Figure(tenths(value)) } else { Cell::None }
}

/// Money for each dB of RDF above the cheapest option; nothing where an option hears no better.
fn cost_per_decibel(project: &Project, results: &[OptionResult], heard: &[Vec<ArrayReport>]) -> Row {
    let rdf = |n: usize| {
        let figures = figures(&results[n], &heard[n], project.frequency)?;
        Some(tenths(figures.report.directivity.rdf_db))
    };
    let totals: Vec<Money> = results.iter().map(|result| result.bill.total).collect();
    let heard: Vec<Option<Decimal>> = (0..results.len()).map(rdf).collect();
    let costs = decibel_costs(&totals, &heard);
    let cell = |cost: &Option<Money>| {
        cost.map_or(Cell::None, |cost| Cell::Money(cost.rounded(&project.currency).to_string()))
    };
    Row {
        name: format!("cost of a dB of RDF above the cheapest, at {}", project.frequency),
        unit: format!("{}/dB", project.currency),
        values: costs.iter().map(cell).collect(),
    }
}

/// For each option the money for each dB of RDF above the cheapest one; nothing for the cheapest and for those that hear no
/// better.
pub(in crate::report) fn decibel_costs(totals: &[Money], rdf: &[Option<Decimal>]) -> Vec<Option<Money>> {
    let cheapest = (0..totals.len()).min_by_key(|n| totals[*n]);
    let cost = |n: usize| {
        let base = cheapest?;
        let better = rdf[n]? - rdf[base]?;
        let dearer = totals[n] - totals[base];
        (n != base && better > Decimal::ZERO).then(|| Money::new(dearer.amount() / better))
    };
    (0..totals.len()).map(cost).collect()
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
pub fn sheet(project: &Project, results: &[OptionResult], heard: &[Vec<ArrayReport>], rows: &[Row]) -> Sheet {
    let mut sheet = Sheet { answer: answer(project, results, heard), ..Sheet::default() };
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
    if results.iter().any(|result| result.design.arrays.len() > 1) {
        let by: Vec<String> = results
            .iter()
            .filter_map(|result| Some((result.name(), result.design.arrays.get(result.design.judged())?)))
            .map(|(option, array)| format!("{option} by {}", array.plan.name))
            .collect();
        sheet.notes.push(format!(
            "of several arrays one is judged, the first that is the option's own: {}; `pattern` has them all",
            by.join(", ")
        ));
    }
    sheet.notes.push(
        "RDF takes noise as equal from all sky directions; a front to back above 25 dB is beyond any model of real ground"
            .to_owned(),
    );
    sheet.notes.push(super::estimate::NO_LABOUR.to_owned());
    sheet
}

fn answer(project: &Project, results: &[OptionResult], heard: &[Vec<ArrayReport>]) -> Vec<String> {
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
            let hectares = |result: &OptionResult| {
                let (length, width) = land(result);
                (length * width / Decimal::from(10_000)).round_dp(2)
            };
            let second = rest[0];
            lines.push(format!(
                "{} takes {} ha of land, {} takes {} ha",
                first.name(),
                hectares(first),
                second.name(),
                hectares(second)
            ));
            lines.extend(heard_in_words(project, results, heard, (first, second)));
            lines
        }
    }
}

/// "echelon hears 0.9 dB less sharply, its worst rear lobe is 7.1 dB weaker": the two cheapest options at the design frequency.
fn heard_in_words(
    project: &Project,
    results: &[OptionResult],
    heard: &[Vec<ArrayReport>],
    (first, second): (&OptionResult, &OptionResult),
) -> Option<String> {
    let of = |wanted: &OptionResult| {
        let index = results.iter().position(|result| std::ptr::eq(result, wanted))?;
        figures(wanted, &heard[index], project.frequency)
    };
    let (a, b) = (&of(first)?.report, &of(second)?.report);
    let sharper = tenths(a.directivity.rdf_db - b.directivity.rdf_db);
    let louder = tenths(a.directivity.worst_rear.level_db - b.directivity.worst_rear.level_db);
    let rdf = match sharper {
        d if d.is_zero() => "hears as sharply".to_owned(),
        d if d > Decimal::ZERO => format!("hears {d} dB more sharply (RDF)"),
        d => format!("hears {} dB less sharply (RDF)", d.abs()),
    };
    let rear = match louder {
        d if d.is_zero() => "its worst rear lobe is the same".to_owned(),
        d if d > Decimal::ZERO => format!("its worst rear lobe is {d} dB stronger"),
        d => format!("its worst rear lobe is {} dB weaker", d.abs()),
    };
    Some(format!("at {} {} {rdf}, {rear}", project.frequency, first.name()))
}
