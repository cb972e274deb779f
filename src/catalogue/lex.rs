//! Text to rows and cells, each with its place; knows quotes and line ends, nothing of columns.

use std::ops::Range;

/// One cell as written, without its quotes.
#[derive(Clone, Debug)]
pub(super) struct Cell {
    pub(super) text: String,
    /// Line of its first character, from 1.
    pub(super) line: usize,
    /// Column of its first character, from 1.
    pub(super) column: usize,
    pub(super) quoted: bool,
    /// Its bytes in the text that was taken apart, quotes included.
    pub(super) span: Range<usize>,
}

/// One row of cells.
#[derive(Clone, Debug)]
pub(super) struct Row {
    /// Line of its first character, from 1.
    pub(super) line: usize,
    /// The text of that line.
    pub(super) excerpt: String,
    pub(super) cells: Vec<Cell>,
}

impl Row {
    pub(super) fn is_blank(&self) -> bool {
        self.cells.iter().all(|cell| cell.text.trim().is_empty())
    }
}

/// What is wrong with the quotes of a row.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum QuoteFault {
    /// It never closes, or in another row.
    Open,
    /// Text follows the closing quote.
    TextAfter,
}

/// All rows of a file.
#[derive(Debug, Default)]
pub(super) struct Rows {
    pub(super) list: Vec<Row>,
    /// Faults with line, column and excerpt of the place where the quote opened.
    pub(super) faults: Vec<(QuoteFault, usize, usize, String)>,
    /// Whether a lone carriage return ended a line.
    pub(super) lone_returns: bool,
}

struct Cursor<'a> {
    text: &'a str,
    at: usize,
    line: usize,
    line_start: usize,
    /// Column of the next character, from 1.
    column: usize,
}

impl<'a> Cursor<'a> {
    fn rest(&self) -> &'a str {
        &self.text[self.at..]
    }

    fn peek(&self) -> Option<char> {
        self.rest().chars().next()
    }

    /// Steps over one character, keeping count of lines.
    fn step(&mut self) -> Option<char> {
        let c = self.peek()?;
        self.at += c.len_utf8();
        self.column += 1;
        if c == '\n' || (c == '\r' && self.peek() != Some('\n')) {
            self.line += 1;
            self.line_start = self.at;
            self.column = 1;
        }
        Some(c)
    }

    /// Steps over `length` bytes that hold no line end.
    fn skip(&mut self, length: usize) -> &'a str {
        let skipped = &self.rest()[..length];
        self.at += length;
        self.column += skipped.chars().count();
        skipped
    }

    fn excerpt(&self) -> String {
        let line = self.text[self.line_start..].split(['\n', '\r']).next().unwrap_or_default().trim();
        if line.chars().count() > 100 {
            line.chars().take(99).chain(['…']).collect()
        } else {
            line.to_owned()
        }
    }
}

/// Splits text into rows at `separator`.
pub(super) fn rows(text: &str, separator: char) -> Rows {
    let mut found = Rows::default();
    let mut cursor = Cursor { text, at: 0, line: 1, line_start: 0, column: 1 };
    while cursor.at < text.len() {
        row(&mut cursor, separator, &mut found);
    }
    found
}

fn row(cursor: &mut Cursor<'_>, separator: char, found: &mut Rows) {
    let mut row = Row { line: cursor.line, excerpt: cursor.excerpt(), cells: Vec::new() };
    loop {
        let (at, line, line_start, column) = (cursor.at, cursor.line, cursor.line_start, cursor.column);
        let cell = match cell(cursor, separator) {
            Ok(cell) => cell,
            Err(fault) => {
                // The rest of the line is lost, the following lines are read as rows of their own.
                *cursor = Cursor { text: cursor.text, at, line, line_start, column };
                found.faults.push((fault, line, column, cursor.excerpt()));
                let rest = cursor.rest();
                cursor.skip(rest.find(['\n', '\r']).unwrap_or(rest.len()));
                line_end(cursor, found);
                return;
            }
        };
        row.cells.push(cell);
        if cursor.peek() == Some(separator) {
            cursor.step();
        } else {
            line_end(cursor, found);
            found.list.push(row);
            return;
        }
    }
}

fn line_end(cursor: &mut Cursor<'_>, found: &mut Rows) {
    if cursor.peek() == Some('\r') {
        cursor.step();
        found.lone_returns |= cursor.peek() != Some('\n');
    }
    if cursor.peek() == Some('\n') {
        cursor.step();
    }
}

/// One cell; the cursor then stands at a separator, a line end or the end.
fn cell(cursor: &mut Cursor<'_>, separator: char) -> Result<Cell, QuoteFault> {
    let (at, line, column) = (cursor.at, cursor.line, cursor.column);
    let is_end = |c: char| c == separator || c == '\n' || c == '\r';
    let lead = cursor.rest().len() - cursor.rest().trim_start_matches(' ').len();
    if !cursor.rest()[lead..].starts_with('"') {
        let end = cursor.rest().find(is_end).unwrap_or(cursor.rest().len());
        let text = cursor.skip(end).to_owned();
        return Ok(Cell { text, line, column, quoted: false, span: at..cursor.at });
    }
    cursor.skip(lead + 1);
    let text = quoted(cursor).ok_or(QuoteFault::Open)?;
    while cursor.peek().is_some_and(|c| c == ' ') {
        cursor.step();
    }
    match cursor.peek() {
        // A quote that closes in a later line in the middle of a cell is most likely the opening one of that cell.
        Some(c) if !is_end(c) && cursor.line > line => Err(QuoteFault::Open),
        Some(c) if !is_end(c) => Err(QuoteFault::TextAfter),
        _ => Ok(Cell { text, line, column, quoted: true, span: at..cursor.at }),
    }
}

/// The text up to the closing quote, doubled quotes taken as one; `None` when it never closes.
fn quoted(cursor: &mut Cursor<'_>) -> Option<String> {
    let mut text = String::new();
    loop {
        let c = cursor.step()?;
        if c != '"' {
            text.push(c);
        } else if cursor.peek() == Some('"') {
            cursor.step();
            text.push('"');
        } else {
            return Some(text);
        }
    }
}
