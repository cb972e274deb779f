//! The patterns as one page to print: plots, tables, and what the figures rest on.

use serde::Serialize;
use tera::{Context, Tera};

use super::View;
use super::sheet;
use super::table;
use super::words::{self, Trust};
use crate::radio::CutPoint;
use crate::reception::{ArrayReport, DirectionReport, Figures, FrequencyReport};
use crate::report::Table;
use crate::report::drawing::polar::{self, Curve, Plot};
use crate::report::sheet::Align;

/// The page's name in the template engine; the ending switches its escaping on.
const NAME: &str = "pattern.html";
const TEMPLATE: &str = include_str!("../../../templates/pattern.html");

/// What the template prints.
#[derive(Serialize)]
struct Page {
    title: String,
    title_css: String,
    hash: String,
    date: String,
    basis: &'static str,
    answer: Vec<String>,
    arrays: Vec<Section>,
    notes: Vec<String>,
}

/// One array of one option.
#[derive(Serialize)]
struct Section {
    heading: String,
    plots: Vec<Drawing>,
    tables: Vec<PageTable>,
}

#[derive(Serialize)]
struct Drawing {
    svg: String,
    caption: String,
}

#[derive(Serialize)]
struct PageTable {
    title: String,
    heads: Vec<Cell>,
    rows: Vec<Vec<Cell>>,
}

#[derive(Serialize)]
struct Cell {
    text: String,
    class: &'static str,
}

/// The page as HTML, complete in itself.
///
/// # Errors
/// When the template cannot be rendered.
pub fn page(view: &View<'_>) -> Result<String, tera::Error> {
    let mut tera = Tera::new();
    tera.add_raw_templates([(NAME, TEMPLATE)])?;
    let mut context = Context::new();
    context.insert("page", &contents(view));
    tera.render(NAME, &context)
}

fn contents(view: &View<'_>) -> Page {
    let mut answer = Vec::new();
    let mut arrays = Vec::new();
    for (option, reports) in view.options {
        for report in reports {
            answer.extend(sheet::answer(view, option, report).iter().map(|line| words::minus(line)));
            let number = arrays.len() + 1;
            arrays.push(section(view, option, report, number));
        }
    }
    Page {
        title: view.project.title.clone(),
        title_css: css(&view.project.title),
        hash: view.hash.to_owned(),
        date: view.project.estimated.to_string(),
        basis: words::basis(view.weighting),
        answer,
        arrays,
        notes: sheet::notes(view).iter().skip(1).map(|line| words::minus(line)).collect(),
    }
}

fn section(view: &View<'_>, option: &str, report: &ArrayReport, number: usize) -> Section {
    let heading = if option.is_empty() || option == report.array {
        report.array.clone()
    } else {
        format!("{} (option {option})", report.array)
    };
    let directions = report.directions.iter().enumerate();
    let plots = directions
        .flat_map(|(n, direction)| plots(&report.array, direction, &format!("a{number}d{}", n + 1)))
        .collect();
    let tables = table::tables(report, view.delays.get(&report.array));
    Section { heading, plots, tables: tables.into_iter().map(page_table).collect() }
}

/// Azimuth and elevation of one direction, a curve a band.
fn plots(array: &str, direction: &DirectionReport, prefix: &str) -> Vec<Drawing> {
    let known: Vec<(&FrequencyReport, &Figures)> = direction
        .frequencies
        .iter()
        .filter_map(|report| report.figures.as_ref().ok().map(|figures| (report, figures)))
        .collect();
    let mut drawings = Vec::new();
    for (n, part) in known.chunks(polar::CURVES).enumerate() {
        let number = if n == 0 { String::new() } else { format!("p{}", n + 1) };
        let draw = |kind: &str,
                    draw: fn(&Plot<'_>) -> String,
                    title: &str,
                    line: &str,
                    name: &dyn Fn(&Figures) -> String,
                    points: fn(&Figures) -> &[CutPoint]| {
            let names: Vec<String> = part
                .iter()
                .map(|(report, figures)| format!("{}{}", report.frequency, name(figures)))
                .collect();
            let curves: Vec<Curve<'_>> = part
                .iter()
                .zip(&names)
                .map(|((_, figures), name)| Curve {
                    name,
                    wanted: direction.bearing,
                    points: points(figures),
                })
                .collect();
            let prefix = format!("{kind}-{prefix}{number}");
            let lines = [array.to_owned(), line.to_owned()];
            draw(&Plot { prefix: &prefix, title, lines: &lines, curves: &curves })
        };
        let peak = |figures: &Figures| {
            let elevation = Trust::of(figures).whole(figures.report.directivity.peak_elevation_deg);
            format!(" at {elevation}° up")
        };
        let none = |_: &Figures| String::new();
        drawings.push(Drawing {
            svg: draw("az", polar::azimuth, "Level by azimuth", "at the elevation of its peak", &peak, |f| {
                &f.azimuth
            }),
            caption: format!("{array} towards {} true, seen from above.", direction.bearing),
        });
        let line = format!("along {}", direction.bearing);
        drawings.push(Drawing {
            svg: draw("el", polar::elevation, "Level by elevation", &line, &none, |f| &f.elevation),
            caption: format!(
                "The same seen from the side: ahead towards {}, behind the other way.",
                direction.bearing
            ),
        });
    }
    drawings
}

fn page_table(table: Table) -> PageTable {
    let class = |n: usize| match table.columns.get(n).map(|column| column.align) {
        Some(Align::Right) => "n",
        Some(Align::Left) | None => "",
    };
    let cells = |row: &[String]| -> Vec<Cell> {
        row.iter().enumerate().map(|(n, text)| Cell { text: words::minus(text), class: class(n) }).collect()
    };
    let heads: Vec<String> = table.columns.iter().map(|column| column.head.clone()).collect();
    PageTable {
        heads: cells(&heads),
        rows: table.rows.iter().map(|row| cells(row)).collect(),
        title: table.title,
    }
}

/// Text made safe inside a CSS string in double quotes.
fn css(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '\\' => out.push_str("\\5c "),
            '"' => out.push_str("\\22 "),
            '<' => out.push_str("\\3c "),
            c if c.is_control() => out.push(' '),
            c => out.push(c),
        }
    }
    out
}
