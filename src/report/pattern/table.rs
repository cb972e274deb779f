//! The tables of one array: rows are figures, columns directions and bands.

use rust_decimal::prelude::ToPrimitive;

use super::words::{self, Trust};
use super::{Delay, normalised};
use crate::radio::DelayPoint;
use crate::reception::{ArrayReport, DirectionReport, Figures, FrequencyReport};
use crate::report::Table;

/// Columns that a page holds beside the names of the rows.
const COLUMNS: usize = 3;

/// One direction at one band.
#[derive(Clone, Copy)]
struct Column<'a> {
    direction: &'a DirectionReport,
    report: &'a FrequencyReport,
}

/// One row: its name and how its cells come about.
type Row = (&'static str, fn(Column<'_>, &Figures) -> String);

const ROWS: &[Row] = &[
    ("directivity RDF at the peak, dB", |_, f| number(f, f.report.directivity.rdf_db)),
    ("peak stands at elevation, °", |_, f| Trust::of(f).whole(f.report.directivity.peak_elevation_deg)),
    ("RDF at 5° elevation, dB", |_, f| rdf_at(f, 0)),
    ("RDF at 10°, dB", |_, f| rdf_at(f, 1)),
    ("RDF at 20°, dB", |_, f| rdf_at(f, 2)),
    ("RDF at 30°, dB", |_, f| rdf_at(f, 3)),
    ("RDF at 45°, dB", |_, f| rdf_at(f, 4)),
    ("front-to-back at the peak, dB", |_, f| {
        Trust::of(f).front_to_back(f.report.directivity.front_to_back_db)
    }),
    ("worst rear lobe, dB", |_, f| number(f, f.report.directivity.worst_rear.level_db)),
    ("worst rear lobe comes from", |c, f| words::worst_rear_place(c.direction.bearing, f)),
    ("beam at half power, °", |_, f| Trust::of(f).whole(f.report.directivity.beamwidth_deg)),
    ("signal over one element, dB", |_, f| number(f, f.report.directivity.gain_rel_db)),
    ("RDF with errors, P10 / P50 / P90", |_, f| Trust::of(f).quantiles(&f.report.spread.rdf_db)),
    ("worst rear with errors, P10 / P50 / P90", |_, f| {
        Trust::of(f).quantiles(&f.report.spread.worst_rear_db)
    }),
    ("highest RDF of these elements, dB", |_, f| number(f, f.report.bound.rdf_db)),
    ("highest RDF that can be built, dB", |_, f| number(f, f.report.buildable.rdf_db)),
    ("noise from outside Fa, dB", |_, f| noise(f, |n| format!("{:.1}", n.external.db()))),
    ("receiver raises the floor by, dB", |_, f| noise(f, |n| format!("{:.1}", n.degradation.db()))),
    ("the same with a hub amplifier, dB", |_, f| {
        noise(f, |n| n.with_amplifier.map_or_else(nothing, |db| format!("{:.1}", db.db())))
    }),
    ("amplifier needed", |_, f| noise(f, |n| words::amplifier(n).to_owned())),
    ("within the limits of the method", |_, f| {
        if f.report.validity.valid { "yes".to_owned() } else { "no".to_owned() }
    }),
];

fn number(figures: &Figures, value: f64) -> String {
    Trust::of(figures).number(value)
}

/// `place` counts [`crate::radio::REPORTED_ELEVATIONS_DEG`].
fn rdf_at(figures: &Figures, place: usize) -> String {
    figures.report.directivity.at.get(place).map_or_else(nothing, |at| number(figures, at.rdf_db))
}

fn noise(figures: &Figures, cell: impl Fn(&crate::reception::Noise) -> String) -> String {
    figures.noise.as_ref().map_or_else(nothing, cell)
}

fn nothing() -> String {
    "–".to_owned()
}

/// Every table of one array: figures, weights, and what the delay buys.
pub(super) fn tables(report: &ArrayReport, delay: Option<&Delay>) -> Vec<Table> {
    let mut columns = Vec::new();
    for direction in &report.directions {
        columns.extend(direction.frequencies.iter().map(|report| Column { direction, report }));
    }
    let several = report.directions.len() > 1;
    let towards = match report.directions.as_slice() {
        [only] => format!(" towards {} true", only.bearing),
        _ => String::new(),
    };
    let heads =
        |columns: &[Column<'_>]| -> Vec<String> { columns.iter().map(|c| head(*c, several)).collect() };
    // four columns are two and two, not three and one
    let share = columns.len().div_ceil(columns.len().div_ceil(COLUMNS).max(1)).max(1);
    let parts: Vec<&[Column<'_>]> = columns.chunks(share).collect();
    let title = |what: String, n: usize| match parts.len() {
        1 => what,
        all => format!("{what}, {} of {all}", n + 1),
    };
    let mut tables = Vec::new();
    for (n, part) in parts.iter().enumerate() {
        let title = title(format!("{}: what it hears{towards}", report.array), n);
        tables.push(figures(title, &heads(part), part));
    }
    for (n, part) in parts.iter().enumerate().filter(|(_, part)| part[0].report.names.len() > 1) {
        let title = title(format!("{}: weights of the elements", report.array), n);
        tables.push(weights(title, &heads(part), part));
    }
    tables.extend(delay.and_then(|delay| delays(&report.array, delay, columns.first()?.report)));
    tables
}

fn head(column: Column<'_>, several: bool) -> String {
    if several {
        format!("#{} {}", column.direction.bearing, column.report.frequency)
    } else {
        format!("#{}", column.report.frequency)
    }
}

fn empty(title: String, first: &str, heads: &[String]) -> Table {
    let heads: Vec<&str> = std::iter::once(first).chain(heads.iter().map(String::as_str)).collect();
    Table::new(title, &heads)
}

fn figures(title: String, heads: &[String], columns: &[Column<'_>]) -> Table {
    let mut table = empty(title, "figure", heads);
    for (name, cell) in ROWS {
        let cells = columns.iter().map(|column| match &column.report.figures {
            Ok(figures) => cell(*column, figures),
            Err(_) => nothing(),
        });
        table.rows.push(std::iter::once((*name).to_owned()).chain(cells).collect());
    }
    table
}

fn weights(title: String, heads: &[String], columns: &[Column<'_>]) -> Table {
    let mut table = empty(title, "element", heads);
    let Some(first) = columns.first() else { return table };
    let weights: Vec<_> = columns.iter().map(|column| normalised(&column.report.weights)).collect();
    for (n, name) in first.report.names.iter().enumerate() {
        let cells = weights.iter().map(|weights| match weights.get(n) {
            Some((amplitude, Some(phase))) => format!("{amplitude:.3} ∠ {:.1}°", super::rounded(*phase, 1)),
            Some((_, None)) => "idle".to_owned(),
            None => nothing(),
        });
        table.rows.push(std::iter::once(name.clone()).chain(cells).collect());
    }
    table
}

/// What a longer or shorter delay line would buy and cost; the curve's tenths, its best points and the one chosen.
/// The curve is made with nothing lost, at the design frequency.
fn delays(array: &str, choice: &Delay, design: &FrequencyReport) -> Option<Table> {
    let curve = &choice.curve;
    let heads = ["delay over step", "#RDF, dB", "#worst rear, dB", "#signal, dB", "remark"];
    let mut table = Table::new(
        format!("{array}: what the delay line buys and costs at {}, as designed", design.frequency),
        &heads,
    );
    let trust = design.figures.as_ref().map_or(Trust::Outside, Trust::of);
    let chosen = choice.ratio.to_f64()?;
    let near = |a: f64, b: f64| (a - b).abs() < 0.004;
    let remark = |point: &DelayPoint| {
        let mut remarks = Vec::new();
        if near(point.ratio, chosen) {
            remarks.push("this design");
        }
        if near(point.ratio, curve.best_rear.ratio) {
            remarks.push("quietest to the rear");
        }
        if near(point.ratio, curve.best_rdf.ratio) {
            remarks.push("sharpest");
        }
        remarks.join(", ")
    };
    for point in &curve.points {
        let remark = remark(point);
        let tenth = near((point.ratio * 10.0).round() / 10.0, point.ratio);
        if tenth || !remark.is_empty() {
            let one = |value: f64| trust.number(value);
            table.rows.push(vec![
                format!("{:.2}", point.ratio),
                one(point.rdf_db),
                one(point.worst_rear_db),
                one(point.gain_rel_db),
                remark,
            ]);
        }
    }
    Some(table)
}
