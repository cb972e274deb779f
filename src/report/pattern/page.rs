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
use crate::report::running_head::{css_string, running_head};
use crate::report::sheet::Align;

/// The page's name in the template engine; the ending switches its escaping on.
const NAME: &str = "pattern.html";
const TEMPLATE: &str = include_str!("../../../templates/pattern.html");

/// More curves than this in one plot cannot be followed.
const CURVES: usize = 3;

/// What the template prints.
#[derive(Serialize)]
struct Page {
    title: String,
    title_css: String,
    hash: String,
    date: String,
    basis: &'static str,
    answers: Vec<PageAnswer>,
    arrays: Vec<Section>,
    notes: Vec<String>,
}

/// The answer on one array.
#[derive(Serialize)]
struct PageAnswer {
    headlines: Vec<String>,
    meaning: Vec<String>,
    warning: Option<String>,
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

/// Everything that the page prints, ready for its template.
pub(in crate::report) fn contents(view: &View<'_>) -> impl Serialize + use<> {
    let mut answers = Vec::new();
    let mut arrays = Vec::new();
    for (option, reports) in view.options {
        for report in reports {
            let name = sheet::name(view, option, report);
            let sheet::Answer { headlines, meaning, warning } = sheet::answer(&name, report);
            answers.push(PageAnswer {
                headlines,
                meaning: sentences(&meaning),
                warning: warning.as_deref().map(sentence),
            });
            arrays.push(section(view, name, report, arrays.len() + 1));
        }
    }
    Page {
        title: view.project.title.clone(),
        title_css: css_string(&running_head(&view.project.title)),
        hash: view.hash.to_owned(),
        date: view.project.estimated.to_string(),
        basis: words::basis(view.weighting),
        answers,
        arrays,
        notes: sentences(&sheet::notes(view)[1..]),
    }
}

/// Our own lines of the terminal as sentences of a page.
fn sentences(lines: &[String]) -> Vec<String> {
    lines.iter().map(|line| sentence(line)).collect()
}

fn sentence(line: &str) -> String {
    let text = words::minus(line);
    let mut letters = text.chars();
    let first = letters.next().map(|c| c.to_uppercase().to_string()).unwrap_or_default();
    format!("{first}{}.", letters.as_str())
}

fn section(view: &View<'_>, heading: String, report: &ArrayReport, number: usize) -> Section {
    let directions = report.directions.iter().enumerate();
    let plots = directions
        .flat_map(|(n, direction)| plots(&report.array, direction, &format!("a{number}d{}", n + 1)))
        .collect();
    let tables = table::tables(report, view.delays.get(&report.array));
    Section { heading, plots, tables: tables.into_iter().map(page_table).collect() }
}

/// The bands of one direction that have figures.
type Known<'a> = [(&'a FrequencyReport, &'a Figures)];

/// Azimuth and elevation of one direction, a curve a band.
fn plots(array: &str, direction: &DirectionReport, prefix: &str) -> Vec<Drawing> {
    let known: Vec<(&FrequencyReport, &Figures)> = direction
        .frequencies
        .iter()
        .filter_map(|report| report.figures.as_ref().ok().map(|figures| (report, figures)))
        .collect();
    let parts = known.chunks(CURVES).enumerate();
    parts
        .flat_map(|(n, part)| {
            let prefix = if n == 0 { prefix.to_owned() } else { format!("{prefix}p{}", n + 1) };
            [azimuth(array, direction, part, &prefix), elevation(array, direction, part, &prefix)]
        })
        .collect()
}

fn azimuth(array: &str, direction: &DirectionReport, known: &Known<'_>, prefix: &str) -> Drawing {
    let name = |(report, figures): &(&FrequencyReport, &Figures)| {
        let peak = Trust::of(figures).whole(figures.report.directivity.peak_elevation_deg);
        format!("{}, {peak}° up", report.frequency)
    };
    let names: Vec<String> = known.iter().map(name).collect();
    let curves: Vec<Curve<'_>> =
        known.iter().zip(&names).map(|((_, f), name)| curve(direction, name, &f.azimuth)).collect();
    let lines = [array.to_owned(), "each band at its peak".to_owned()];
    let prefix = format!("az-{prefix}");
    Drawing {
        svg: polar::azimuth(&Plot {
            prefix: &prefix,
            title: "Level by azimuth",
            lines: &lines,
            curves: &curves,
        }),
        caption: format!("{array} towards {} true from above, {}.", direction.bearing, bands(known)),
    }
}

fn elevation(array: &str, direction: &DirectionReport, known: &Known<'_>, prefix: &str) -> Drawing {
    let names: Vec<String> = known.iter().map(|(report, _)| report.frequency.to_string()).collect();
    let curves: Vec<Curve<'_>> =
        known.iter().zip(&names).map(|((_, f), name)| curve(direction, name, &f.elevation)).collect();
    let lines = [array.to_owned(), format!("along {} true", direction.bearing)];
    let prefix = format!("el-{prefix}");
    Drawing {
        svg: polar::elevation(&Plot {
            prefix: &prefix,
            title: "Level by elevation",
            lines: &lines,
            curves: &curves,
        }),
        caption: format!(
            "{array} from the side, {}: towards {} on the right, behind on the left.",
            bands(known),
            direction.bearing
        ),
    }
}

/// The bands of a plot in words.
fn bands(known: &Known<'_>) -> String {
    let bands: Vec<String> = known.iter().map(|(report, _)| report.frequency.to_string()).collect();
    bands.join(", ")
}

fn curve<'a>(direction: &DirectionReport, name: &'a str, points: &'a [CutPoint]) -> Curve<'a> {
    Curve { name, wanted: direction.bearing, points }
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
