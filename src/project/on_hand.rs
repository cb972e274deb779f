//! What the owner already has: `[[on-hand]]` in the project file, and `on-hand.csv` beside it.

use csv::StringRecord;

use super::code;
use super::model::{OnHand, Stock};
use super::table::Table;
use super::value::Value;
use crate::problem::{Code, Place, Problem, Problems, nearest};
use crate::units::{Length, UnitError, parse_decimal};

const MOST: u32 = 1_000_000;

/// Reads one `[[on-hand]]`.
pub(super) fn read(table: &Table<'_>) -> Option<OnHand> {
    let part = table.need("part", "part = \"plug-f\"", Value::part);
    let count = table.get("quantity", |v| v.count(0..=MOST)).map(|count| Stock::Count(count.into()));
    let length = table.get("length", Value::positive_length).map(Stock::Length);
    let note = table.get("note", Value::text).unwrap_or_default().to_owned();
    table.finish();
    if table.has("quantity") == table.has("length") {
        let message = "stock on hand is counted by `quantity` or measured by `length`, one of them";
        let help = "write quantity = 4 for things, or length = \"73 m\" for one reel or offcut";
        table.desk.error(code::QUANTITY_OR_LENGTH, table.at(), message, help);
        return None;
    }
    let place = table.at().map(|at| table.desk.place(Some(at)));
    Some(OnHand { part: part?, stock: count.or(length)?, note, place })
}

/// Reads `on-hand.csv`: columns `part, quantity, length, note` in any order, others ignored.
///
/// A length is in metres, or carries its unit.
pub(super) fn read_csv(file: &str, text: &str) -> (Vec<OnHand>, Problems) {
    let mut reader =
        csv::ReaderBuilder::new().flexible(true).trim(csv::Trim::All).from_reader(text.as_bytes());
    let mut sheet = Sheet { file, text, problems: Problems::default(), columns: Columns::default() };
    let rows = match reader.headers() {
        Ok(headers) => sheet.find_columns(&headers.clone()).then(|| sheet.rows(&mut reader)),
        Err(error) => {
            sheet.refuse(
                1,
                "",
                code::BAD_CSV,
                format!("the first row cannot be read: {error}"),
                "save it as CSV, UTF-8",
            );
            None
        }
    };
    (rows.unwrap_or_default(), sheet.problems)
}

/// Where the columns stand.
#[derive(Default)]
struct Columns {
    part: usize,
    quantity: Option<usize>,
    length: Option<usize>,
    note: Option<usize>,
}

/// One table of stock while it is read.
struct Sheet<'a> {
    file: &'a str,
    text: &'a str,
    problems: Problems,
    columns: Columns,
}

impl Sheet<'_> {
    /// Writes down an error at `cell` of a line.
    fn refuse(
        &mut self,
        line: u64,
        cell: &str,
        code: Code,
        message: impl Into<String>,
        help: impl Into<String>,
    ) {
        let place = Some(self.place(line, cell));
        self.problems.push(Problem::error(code, place, message, help));
    }

    fn place(&self, line: u64, cell: &str) -> Place {
        let line = usize::try_from(line).unwrap_or(1).max(1);
        let start: usize = self.text.split_inclusive('\n').take(line - 1).map(str::len).sum();
        let written = self.text[start..].lines().next().unwrap_or_default();
        let column = if cell.is_empty() { 0 } else { written.find(cell).unwrap_or(0) };
        Place::in_text(self.file, self.text, start + column)
    }

    /// Finds the columns; false when nothing can be read.
    fn find_columns(&mut self, headers: &StringRecord) -> bool {
        const KNOWN: [&str; 4] = ["part", "quantity", "length", "note"];
        let names: Vec<String> =
            headers.iter().map(|name| name.trim_start_matches('\u{feff}').trim().to_lowercase()).collect();
        let find = |wanted: &str| names.iter().position(|name| name == wanted);
        if let (1, Some(only)) = (names.len(), names.first())
            && only.contains(';')
        {
            let help = "export it again with a comma between the columns";
            self.refuse(1, "", code::BAD_CSV, "the columns are separated by semicolons", help);
            return false;
        }
        let (quantity, length, note) = (find("quantity"), find("length"), find("note"));
        if quantity.is_none() && length.is_none() {
            let help = "the first row names the columns: part, quantity, length, note";
            self.refuse(
                1,
                "",
                code::MISSING_COLUMN,
                "there is no column `quantity` and no column `length`",
                help,
            );
        }
        let Some(part) = find("part") else {
            let near = names.iter().find(|name| nearest(name, KNOWN) == Some("part"));
            let help = match near {
                Some(near) => format!("is `{near}` meant?"),
                None => "the first row names the columns: part, quantity, length, note".to_owned(),
            };
            self.refuse(1, "", code::MISSING_COLUMN, "there is no column `part`", help);
            return false;
        };
        self.columns = Columns { part, quantity, length, note };
        quantity.is_some() || length.is_some()
    }

    fn rows(&mut self, reader: &mut csv::Reader<&[u8]>) -> Vec<OnHand> {
        let mut stock = Vec::new();
        for record in reader.records() {
            match record {
                Ok(record) => {
                    let line = record.position().map_or(1, csv::Position::line);
                    if record.iter().any(|cell| !cell.is_empty()) {
                        stock.extend(self.row(line, &record));
                    }
                }
                Err(error) => {
                    let line = error.position().map_or(1, csv::Position::line);
                    let message = format!("this row cannot be read: {error}");
                    self.refuse(line, "", code::BAD_CSV, message, "save it as CSV, UTF-8");
                }
            }
        }
        stock
    }

    fn row(&mut self, line: u64, record: &StringRecord) -> Option<OnHand> {
        let cell = |column: Option<usize>| column.and_then(|at| record.get(at)).unwrap_or_default();
        let (part, note) = (cell(Some(self.columns.part)), cell(self.columns.note));
        let (quantity, length) = (cell(self.columns.quantity), cell(self.columns.length));
        if part.is_empty() {
            self.refuse(line, "", code::MISSING_KEY, "this row names no part", "fill the column `part`");
        }
        let stock = match (quantity.is_empty(), length.is_empty()) {
            (false, true) => self.count(line, quantity),
            (true, false) => self.length(line, length),
            _ => {
                let message = "stock is counted by `quantity` or measured by `length`, one of them";
                let help = "fill one of the two columns; one row for each reel or offcut";
                self.refuse(line, "", code::QUANTITY_OR_LENGTH, message, help);
                None
            }
        };
        let place = Some(self.place(line, part));
        let (part, note) = (part.to_owned(), note.to_owned());
        if part.is_empty() { None } else { Some(OnHand { part, stock: stock?, note, place }) }
    }

    fn count(&mut self, line: u64, cell: &str) -> Option<Stock> {
        let number = match parse_decimal(cell, "a whole number") {
            Ok(number) => number.normalize(),
            Err(error) => return self.unreadable(line, cell, &error),
        };
        if number.scale() > 0 {
            let message = format!("`quantity` counts whole ones, but this is {number}");
            self.refuse(line, cell, code::NOT_WHOLE, message, "give lengths in the column `length`");
            return None;
        }
        match u32::try_from(number) {
            Ok(count) if count <= MOST => Some(Stock::Count(count.into())),
            _ => {
                let message = format!("`quantity` cannot be {number}");
                self.refuse(line, cell, code::COUNT_OUT_OF_RANGE, message, format!("accepted: 0 to {MOST}"));
                None
            }
        }
    }

    fn length(&mut self, line: u64, cell: &str) -> Option<Stock> {
        let bare = cell.bytes().all(|b| b.is_ascii_digit() || matches!(b, b'.' | b',' | b'-' | b'+'));
        let with_unit = if bare { format!("{cell} m") } else { cell.to_owned() };
        match Length::parse(&with_unit) {
            Ok(length) if length > Length::ZERO => Some(Stock::Length(length)),
            Ok(_) => {
                self.refuse(
                    line,
                    cell,
                    code::NOT_POSITIVE,
                    "`length` must be more than zero",
                    "check the number and its sign",
                );
                None
            }
            Err(error) => self.unreadable(line, cell, &error),
        }
    }

    fn unreadable<T>(&mut self, line: u64, cell: &str, error: &UnitError) -> Option<T> {
        self.refuse(line, cell, code::of_unit_error(error), error.to_string(), error.help());
        None
    }
}
