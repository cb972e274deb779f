//! One CSV file as a table: its separator, its header, its rows by column name.

use crate::problem::{Place, nearest};

use super::code;
use super::lex::{self, Cell, QuoteFault, Row, Rows};
use super::report::{Fix, Report};

/// The columns of one of the five files.
pub(super) struct Schema {
    /// The file's name.
    pub(super) file: &'static str,
    /// Its columns and whether they are needed.
    pub(super) columns: &'static [(&'static str, Need)],
}

/// Whether a column must be there.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Need {
    Needed,
    Optional,
}

/// A file that was taken apart.
pub(super) struct Table {
    pub(super) file: String,
    pub(super) separator: char,
    pub(super) rows: Vec<Row>,
    /// Number of cells of the header, blank ones included.
    pub(super) width: usize,
    /// Rows that could not be taken apart, so that nothing else is said about them.
    pub(super) lost: Vec<Row>,
    /// Whether quotes swallowed rows of which nothing is known.
    pub(super) swallowed: bool,
    /// Position of each known column.
    columns: Vec<(&'static str, usize)>,
}

const SEPARATORS: [char; 3] = [',', ';', '\t'];
const HEADER_SEARCH: usize = 10;
const LARGEST_CELL: usize = 64 * 1024;

/// Takes a text apart; `None` when no header can be found, which is then reported.
pub(super) fn read(file: &str, whole: &str, schema: &Schema, report: &mut Report) -> Option<Table> {
    let (text, named) = separator_line(whole);
    let offset = usize::from(named.is_some());
    if named.is_some() {
        report.fixes.add(file, Fix::SeparatorLine);
    }
    let separator = named.unwrap_or_else(|| detect(text, schema));
    let mut found = lex::rows(text, separator);
    shift(&mut found, offset, whole.len() - text.len());
    if found.lone_returns {
        report.fixes.add(file, Fix::LineEnds);
    }
    let swallowed = !found.faults.is_empty();
    quotes(file, &found, report);
    let (blank, rows): (Vec<Row>, Vec<Row>) = found.list.into_iter().partition(Row::is_blank);
    for _ in blank {
        report.fixes.add(file, Fix::BlankRow);
    }
    let mut rows = rows.into_iter();
    let Some(first) = rows.next() else {
        let place = Place { file: file.to_owned(), line: 1, column: 1, excerpt: String::new() };
        report.error(code::EMPTY_FILE, place, format!("{file} is empty"), "start from the template");
        return None;
    };
    let rows: Vec<Row> = rows.collect();
    let mut table = Table {
        file: file.to_owned(),
        separator,
        rows: Vec::new(),
        width: first.cells.len(),
        lost: Vec::new(),
        swallowed,
        columns: Vec::new(),
    };
    if let Some(hint) = misplaced_header(&first, &rows, schema) {
        let message = "header row not found: the first row must be column names".to_owned();
        report.error(code::HEADER_NOT_FOUND, table.row_place(&first), message, hint);
        return None;
    }
    if separator != ',' {
        let sign = if separator == ';' { "`;`" } else { "tabs" };
        let message = format!("this file uses {sign} between columns");
        report.warning(
            code::SEPARATOR,
            table.row_place(&first),
            message,
            "it is read so; `,` is the usual sign",
        );
    }
    let width = header(&mut table, &first, schema, report);
    table.rows = rows;
    body(&mut table, width, first.cells.len(), report);
    Some(table)
}

/// The separator that a first line `sep=;` names, and the text after it.
fn separator_line(text: &str) -> (&str, Option<char>) {
    let line = text.split(['\n', '\r']).next().unwrap_or_default();
    let sign = line.trim().strip_prefix("sep=").and_then(|rest| rest.chars().next());
    match sign.filter(|sign| SEPARATORS.contains(sign)) {
        Some(sign) => {
            let rest = &text[line.len()..];
            let rest = rest.strip_prefix("\r\n").or_else(|| rest.strip_prefix(['\n', '\r'])).unwrap_or(rest);
            (rest, Some(sign))
        }
        None => (text, None),
    }
}

/// Counts lines and bytes from the beginning of the file again.
fn shift(found: &mut Rows, lines: usize, bytes: usize) {
    for row in &mut found.list {
        row.line += lines;
        for cell in &mut row.cells {
            cell.line += lines;
            cell.span = cell.span.start + bytes..cell.span.end + bytes;
        }
    }
    found.faults.iter_mut().for_each(|fault| fault.1 += lines);
}

/// The separator under which the first lines show the most known column names.
fn detect(text: &str, schema: &Schema) -> char {
    let score = |separator: char| {
        let lines = text.split(['\n', '\r']).take(HEADER_SEARCH * 2);
        lines
            .map(|line| line.split(separator).filter(|name| is_known(name, schema)).count())
            .max()
            .unwrap_or(0)
    };
    let mut best = (score(','), ',');
    for separator in [';', '\t'] {
        if score(separator) > best.0 {
            best = (score(separator), separator);
        }
    }
    best.1
}

/// A column name without the differences that do not matter.
fn plain_name(name: &str) -> String {
    name.trim().trim_matches('"').trim().to_lowercase().replace([' ', '-', '\u{A0}'], "_")
}

fn is_known(name: &str, schema: &Schema) -> bool {
    let plain = plain_name(name);
    schema.columns.iter().any(|(known, _)| *known == plain)
}

fn known_names(row: &Row, schema: &Schema) -> usize {
    row.cells.iter().filter(|cell| is_known(&cell.text, schema)).count()
}

/// What to say when the first row is not the header; `None` when it is.
fn misplaced_header(first: &Row, rows: &[Row], schema: &Schema) -> Option<String> {
    let here = known_names(first, schema);
    let better = rows.iter().take(HEADER_SEARCH).find(|row| known_names(row, schema) > here.max(1));
    match better {
        Some(row) => Some(format!("row {} looks like it: delete what stands above it", row.line)),
        None if here == 0 => {
            let names: Vec<&str> = schema.columns.iter().map(|(name, _)| *name).collect();
            Some(format!("the columns of {} are {}", schema.file, names.join(", ")))
        }
        None => None,
    }
}

fn quotes(file: &str, found: &Rows, report: &mut Report) {
    for (fault, line, column, excerpt) in &found.faults {
        let (line, column, excerpt) = (*line, *column, excerpt.clone());
        let place = Place { file: file.to_owned(), line, column, excerpt };
        match fault {
            QuoteFault::Open => {
                let message = format!("the quote opened in line {line} never closes");
                report.error(
                    code::OPEN_QUOTE,
                    place,
                    message,
                    "close it, or double it where it means inches",
                );
            }
            QuoteFault::TextAfter => {
                let message = format!("text follows the quoted cell that opened in line {line}");
                let help = "a closing quote stands before a separator; double the quotes inside the cell";
                report.error(code::TEXT_AFTER_QUOTE, place, message, help);
            }
        }
    }
}

/// Finds the columns; returns the number of columns that the header names.
fn header(table: &mut Table, first: &Row, schema: &Schema, report: &mut Report) -> usize {
    let blank = |cell: &Cell| cell.text.trim().is_empty();
    let width = first.cells.iter().rposition(|cell| !blank(cell)).map_or(0, |at| at + 1);
    let mut unknown = Vec::new();
    for (index, cell) in first.cells.iter().take(width).enumerate() {
        let plain = plain_name(&cell.text);
        let known = schema.columns.iter().map(|(name, _)| *name).find(|name| *name == plain);
        let Some(name) = known else {
            if !plain.is_empty() {
                unknown.push((index, plain));
            }
            continue;
        };
        let place = table.cell_place(first, index);
        if table.columns.iter().any(|(other, _)| *other == name) {
            let message = format!("the column `{name}` stands in the header twice");
            report.error(code::DUPLICATE_COLUMN, place, message, "delete or rename one of them");
            continue;
        }
        if cell.text.trim() != name {
            let message = format!("the column \"{}\" was read as `{name}`", cell.text.trim());
            report.warning(code::HEADER_SPELLING, place, message, format!("write `{name}`"));
        }
        table.columns.push((name, index));
    }
    missing(table, first, schema, &mut unknown, report);
    for (index, name) in unknown {
        unknown_column(table, first, (index, &name), schema, report);
    }
    width
}

/// Reports needed columns that are missing and takes their likeliest names out of `unknown`.
fn missing(
    table: &Table,
    first: &Row,
    schema: &Schema,
    unknown: &mut Vec<(usize, String)>,
    report: &mut Report,
) {
    for (name, need) in schema.columns {
        if *need == Need::Optional || table.columns.iter().any(|(found, _)| found == name) {
            continue;
        }
        // A needed column is looked for among the unknown names, each of which can be meant once.
        let near = unknown.iter().position(|(_, other)| nearest(other, [*name]).is_some());
        let message = format!("the needed column `{name}` is missing");
        let (place, help) = match near.map(|at| unknown.remove(at)) {
            Some((index, other)) => {
                (table.cell_place(first, index), format!("is \"{other}\" meant? rename it to `{name}`"))
            }
            None => (table.row_place(first), format!("add it: {} needs {}", schema.file, needed(schema))),
        };
        report.error(code::MISSING_COLUMN, place, message, help);
    }
}

fn needed(schema: &Schema) -> String {
    let needed = schema.columns.iter().filter(|(_, need)| *need == Need::Needed);
    needed.map(|(name, _)| *name).collect::<Vec<_>>().join(", ")
}

fn unknown_column(
    table: &Table,
    first: &Row,
    (index, name): (usize, &str),
    schema: &Schema,
    report: &mut Report,
) {
    let place = table.cell_place(first, index);
    if name.starts_with("loss") && schema.columns.iter().any(|(known, _)| *known == "loss_db_per_100m") {
        let message = format!("the column \"{name}\" does not say dB per 100 m");
        let help = "convert to dB per 100 m (dB per 100 ft x 3.281) and name it `loss_db_per_100m`";
        report.error(code::LOSS_UNIT, place, message, help);
        return;
    }
    let free = schema.columns.iter().map(|(known, _)| *known);
    let free = free.filter(|known| !table.columns.iter().any(|(found, _)| found == known));
    let help = match nearest(name, free) {
        Some(near) => format!("is `{near}` meant?"),
        None => "it is kept and not read".to_owned(),
    };
    report.warning(code::UNKNOWN_COLUMN, place, format!("the column \"{name}\" is not known"), help);
}

/// Drops empty cells beyond `width`, the last named of `written` columns; reports rows of the wrong width and cells that are too large.
fn body(table: &mut Table, width: usize, written: usize, report: &mut Report) {
    let rows = std::mem::take(&mut table.rows);
    for mut row in rows {
        let is_padded = row.cells.len() > width
            && row.cells[width..].iter().all(|cell| cell.text.trim().is_empty())
            && (row.cells.len() <= written || split_number(&row, table).is_none());
        if is_padded {
            row.cells.truncate(width);
            report.fixes.add(&table.file, Fix::BlankColumn);
        }
        if let Some(index) = row.cells.iter().position(|cell| cell.text.len() > LARGEST_CELL) {
            let message = format!("column {} holds more than 64 KiB", letter(index));
            let help = "is a quote missing further up?";
            report.error(code::CELL_TOO_LARGE, table.cell_place(&row, index), message, help);
            table.lost.push(row);
        } else if row.cells.len() == width {
            table.rows.push(row);
        } else {
            let given = row.cells.len();
            let fields = if given == 1 { "field" } else { "fields" };
            let message = format!("the row has {given} {fields}, the header has {width}");
            report.error(code::FIELD_COUNT, table.row_place(&row), message, field_help(&row, width, table));
            table.lost.push(row);
        }
    }
}

/// Two neighbouring cells that look like the halves of a number with a decimal comma, those of the price first.
fn split_number<'r>(row: &'r Row, table: &Table) -> Option<(&'r str, &'r str)> {
    let digits = |text: &str| !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
    let pair = |index: usize| {
        let (whole, part) = (row.cells.get(index)?.text.trim(), row.cells.get(index + 1)?.text.trim());
        // Two digits behind the comma are money; one digit is more likely a count.
        (table.separator == ',' && digits(whole) && digits(part) && part.len() == 2).then_some((whole, part))
    };
    table.column("price").and_then(pair).or_else(|| (0..row.cells.len()).find_map(pair))
}

fn field_help(row: &Row, width: usize, table: &Table) -> String {
    match split_number(row, table) {
        Some((whole, part)) if row.cells.len() > width => {
            format!("decimal comma? write {whole}.{part} instead of {whole},{part}")
        }
        _ if row.cells.len() > width => "a cell that contains the separator needs quotes".to_owned(),
        _ => "blank cells need their separators too".to_owned(),
    }
}

impl Table {
    /// Where a column stands, if the file has it.
    pub(super) fn column(&self, name: &str) -> Option<usize> {
        self.columns.iter().find(|(known, _)| *known == name).map(|(_, index)| *index)
    }

    /// The beginning of a row.
    pub(super) fn row_place(&self, row: &Row) -> Place {
        Place { file: self.file.clone(), line: row.line, column: 1, excerpt: row.excerpt.clone() }
    }

    /// The beginning of a cell.
    pub(super) fn cell_place(&self, row: &Row, index: usize) -> Place {
        let (line, column) = row.cells.get(index).map_or((row.line, 1), |cell| (cell.line, cell.column));
        Place { file: self.file.clone(), line, column, excerpt: row.excerpt.clone() }
    }
}

/// The letter of a spreadsheet column, counted from 0: A, B … Z, AA.
pub(super) fn letter(index: usize) -> String {
    let mut rest = index + 1;
    let mut letters = Vec::new();
    while rest > 0 {
        rest -= 1;
        let digit = u8::try_from(rest % 26).unwrap_or_default();
        letters.insert(0, char::from(b'A' + digit));
        rest /= 26;
    }
    letters.into_iter().collect()
}

#[cfg(test)]
mod tests {
    #[test]
    fn columns_have_the_letters_of_a_spreadsheet() {
        assert_eq!(super::letter(0), "A");
        assert_eq!(super::letter(25), "Z");
        assert_eq!(super::letter(26), "AA");
        assert_eq!(super::letter(701), "ZZ");
    }
}
