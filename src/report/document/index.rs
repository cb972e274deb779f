//! What to print in which order, with what is missing on top.

use std::collections::BTreeSet;

use serde::Serialize;

use super::sheet::{Paper, Sheet};
use super::{Input, OptionInput, purchase, show};

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
    complete: bool,
}

#[derive(Debug, Serialize)]
struct OptionRow {
    name: String,
    folder: String,
    arrays: String,
    total: String,
    unpriced: usize,
}

/// The view of one option's index.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let sheets = Sheet::ALL.into_iter().filter(|sheet| *sheet != Sheet::Index).enumerate();
    let pieces = option.takeoff.pieces.len();
    let points = option.design.arrays.iter().flat_map(|array| &array.plan.layout.points);
    let posts = points.map(|point| point.name.as_str()).collect::<BTreeSet<_>>().len();
    let currency = &input.project.currency;
    View {
        unpriced: purchase::missing(input, option),
        unplaced: super::cuts::unplaced(option),
        arrays: arrays(option),
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

fn arrays(option: &OptionInput<'_>) -> Vec<ArrayRow> {
    let rows = option.design.arrays.iter().map(|array| {
        let layout = &array.plan.layout;
        let names: Vec<&str> = layout.elements.iter().map(|element| element.name.as_str()).collect();
        let bearings: Vec<String> =
            array.plan.feed.switch.states.iter().map(|state| show::degrees(state.bearing)).collect();
        ArrayRow {
            name: array.spec.name.clone(),
            listens: bearings.join(", "),
            elements: names.len().to_string(),
            places: show::names(names),
        }
    });
    rows.collect()
}

/// The view of the index over all options.
pub(super) fn whole(input: &Input<'_>, folders: &[String]) -> WholeView {
    let currency = &input.project.currency;
    let rows = input.options.iter().zip(folders).map(|(option, folder)| OptionRow {
        name: option.design.option.clone(),
        folder: if folder.is_empty() { String::new() } else { format!("{folder}/") },
        arrays: option.design.arrays.iter().map(|a| a.spec.name.as_str()).collect::<Vec<_>>().join(", "),
        total: at_least(option, show::money(option.bill.total, currency)),
        unpriced: option.bill.unpriced.len(),
    });
    WholeView {
        options: rows.collect(),
        currency: currency.to_string(),
        complete: input.options.iter().all(|option| option.bill.unpriced.is_empty()),
    }
}
