//! What to print in which order, with what is missing on top.

use std::collections::BTreeSet;

use serde::Serialize;

use super::sheet::{Paper, Sheet};
use super::{Input, OptionInput, purchase, show};
use crate::radio::FRONT_TO_BACK_CEILING_DB;
use crate::reception::ArrayReport;
use crate::report::compare::{decibel_costs, tenths};
use crate::units::{Frequency, Money};

/// The index of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    unpriced: Vec<purchase::Missing>,
    unplaced: Vec<String>,
    arrays: Vec<ArrayRow>,
    sheets: Vec<SheetRow>,
    frequencies: String,
    totals: Vec<Total>,
}

#[derive(Debug, Serialize)]
struct ArrayRow {
    name: String,
    listens: String,
    elements: String,
    places: String,
    hears: String,
}

#[derive(Debug, Serialize)]
struct Total {
    name: String,
    value: String,
}

#[derive(Debug, Serialize)]
struct SheetRow {
    number: usize,
    name: &'static str,
    title: &'static str,
    reader: &'static str,
    paper: Paper,
}

/// The index over all options.
#[derive(Debug, Serialize)]
pub(super) struct WholeView {
    options: Vec<OptionRow>,
    currency: String,
    frequency: String,
    complete: bool,
}

#[derive(Debug, Serialize)]
struct OptionRow {
    name: String,
    folder: String,
    arrays: String,
    total: String,
    unpriced: usize,
    hears: String,
    decibel_cost: String,
}

/// The view of one option's index.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>, reports: &[ArrayReport]) -> View {
    let sheets = Sheet::ALL.into_iter().filter(|sheet| *sheet != Sheet::Index).enumerate();
    let pieces = option.takeoff.pieces.len();
    let points = option.design.arrays.iter().flat_map(|array| &array.plan.layout.points);
    let posts = points.map(|point| point.name.as_str()).collect::<BTreeSet<_>>().len();
    let currency = &input.project.currency;
    View {
        unpriced: purchase::missing(input, option),
        unplaced: super::cuts::unplaced(option),
        arrays: arrays(input, option, reports),
        sheets: sheets.map(|(n, sheet)| sheet_row(n + 1, sheet)).collect(),
        frequencies: frequencies(input),
        totals: vec![
            total("pieces to cut", pieces.to_string()),
            total("points in the field", posts.to_string()),
            total(
                &format!("materials with freight, tax and contingency, {currency}"),
                at_least(option, show::money(option.bill.total, currency)),
            ),
        ],
    }
}

fn total(name: &str, value: String) -> Total {
    Total { name: name.to_owned(), value }
}

fn at_least(option: &OptionInput<'_>, total: String) -> String {
    if option.bill.unpriced.is_empty() { total } else { format!("more than {total}") }
}

fn sheet_row(number: usize, sheet: Sheet) -> SheetRow {
    let (name, title) = (sheet.name(), sheet.title());
    SheetRow { number, name, title, reader: sheet.reader(), paper: sheet.paper() }
}

/// "1.83 MHz, also 3.55 MHz".
pub(super) fn frequencies(input: &Input<'_>) -> String {
    let also: Vec<String> = input.project.also.iter().map(ToString::to_string).collect();
    let design = input.project.frequency.to_string();
    if also.is_empty() { design } else { format!("{design}, also {}", also.join(", ")) }
}

fn arrays(input: &Input<'_>, option: &OptionInput<'_>, reports: &[ArrayReport]) -> Vec<ArrayRow> {
    let rows = option.design.arrays.iter().zip(reports).map(|(array, report)| {
        let layout = &array.plan.layout;
        let names: Vec<&str> = layout.elements.iter().map(|element| element.name.as_str()).collect();
        let bearings: Vec<String> =
            array.plan.feed.switch.states.iter().map(|state| show::degrees(state.bearing)).collect();
        ArrayRow {
            name: array.spec.name.clone(),
            listens: bearings.join(", "),
            elements: names.len().to_string(),
            places: show::names(names),
            hears: hears(report, input.project.frequency),
        }
    });
    rows.collect()
}

/// "RDF 12.0 dB at 29° elevation, worst rear −14.4 dB, front to back 22 dB, beam 68°": the first direction at the design
/// frequency.
fn hears(report: &ArrayReport, frequency: Frequency) -> String {
    let Some(figures) = report.first_figures(frequency) else { return "not computed".to_owned() };
    let d = &figures.report.directivity;
    let back = if d.front_to_back_db > FRONT_TO_BACK_CEILING_DB {
        format!("> {FRONT_TO_BACK_CEILING_DB}")
    } else {
        format!("{:.0}", d.front_to_back_db)
    };
    let limits = if figures.report.validity.valid { "" } else { "; outside the limits of the method" };
    format!(
        "RDF {:.1} dB at {:.0}° elevation, worst rear lobe {:.1} dB, front to back {back} dB, beam {:.0}°{limits}",
        d.rdf_db, d.peak_elevation_deg, d.worst_rear.level_db, d.beamwidth_deg
    )
}

/// The view of the index over all options, each judged by its own first array.
pub(super) fn whole(input: &Input<'_>, folders: &[String], heard: &[Vec<ArrayReport>]) -> WholeView {
    let (currency, frequency) = (&input.project.currency, input.project.frequency);
    let judged: Vec<Option<&ArrayReport>> = input
        .options
        .iter()
        .zip(heard)
        .map(|(option, reports)| reports.get(option.design.judged()))
        .collect();
    let rdf: Vec<_> = judged
        .iter()
        .map(|report| Some(tenths((*report)?.first_figures(frequency)?.report.directivity.rdf_db)))
        .collect();
    let totals: Vec<Money> = input.options.iter().map(|option| option.bill.total).collect();
    let costs = decibel_costs(&totals, &rdf);
    let rows = input.options.iter().zip(folders).zip(judged.iter().zip(&costs));
    let rows = rows.map(|((option, folder), (report, cost))| OptionRow {
        name: option.design.option.clone(),
        folder: if folder.is_empty() { String::new() } else { format!("{folder}/") },
        arrays: option.design.arrays.iter().map(|a| a.spec.name.as_str()).collect::<Vec<_>>().join(", "),
        total: at_least(option, show::money(option.bill.total, currency)),
        unpriced: option.bill.unpriced.len(),
        hears: report.map_or_else(|| "not computed".to_owned(), |report| hears(report, frequency)),
        decibel_cost: cost.map_or_else(|| "–".to_owned(), |cost| show::money(cost, currency)),
    });
    WholeView {
        options: rows.collect(),
        currency: currency.to_string(),
        frequency: frequency.to_string(),
        complete: input.options.iter().all(|option| option.bill.unpriced.is_empty()),
    }
}
