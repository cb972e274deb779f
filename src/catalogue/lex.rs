//! Text to rows and cells, each with its place; knows quotes and line ends, nothing of columns.

/// One cell as written, without its quotes.
#[derive(Clone, Debug)]
pub(super) struct Cell {
    pub(super) text: String,
    /// Line of its first character, from 1.
    pub(super) line: usize,
    /// Column of its first character, from 1.
    pub(super) column: usize,
    pub(super) quoted: bool,
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
    /// The file ends inside the quotes.
    Open,
    /// Text follows the closing quote.
    TextAfter,
}

/// All rows of a file.
#[derive(Debug, Default)]
pub(super) struct Rows {
    pub(super) rows: Vec<Row>,
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
}

impl<'a> Cursor<'a> {
    fn rest(&self) -> &'a str {
        &self.text[self.at..]
    }

    fn peek(&self) -> Option<char> {
        self.rest().chars().next()
    }

    fn column(&self) -> usize {
        self.text[self.line_start..self.at].chars().count() + 1
    }

    /// Steps over one character, keeping count of lines.
    fn step(&mut self) -> Option<char> {
        let c = self.peek()?;
        self.at += c.len_utf8();
        if c == '\n' || (c == '\r' && self.peek() != Some('\n')) {
            self.line += 1;
            self.line_start = self.at;
        }
        Some(c)
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
    let mut cursor = Cursor { text, at: 0, line: 1, line_start: 0 };
    while cursor.at < text.len() {
        row(&mut cursor, separator, &mut found);
    }
    found
}

fn row(cursor: &mut Cursor<'_>, separator: char, found: &mut Rows) {
    let mut row = Row { line: cursor.line, excerpt: cursor.excerpt(), cells: Vec::new() };
    loop {
        let start = (cursor.at, cursor.line, cursor.line_start, cursor.column(), cursor.excerpt());
        let cell = match cell(cursor, separator) {
            Ok(cell) => cell,
            Err(fault) => {
                let (at, line, line_start, column, excerpt) = start;
                found.faults.push((fault, line, column, excerpt));
                // The rest of the line is lost, the following lines are read as rows of their own.
                (cursor.at, cursor.line, cursor.line_start) = (at, line, line_start);
                while !matches!(cursor.peek(), None | Some('\n' | '\r')) {
                    cursor.step();
                }
                line_end(cursor, found);
                return;
            }
        };
        row.cells.push(cell);
        if cursor.peek() == Some(separator) {
            cursor.step();
        } else {
            line_end(cursor, found);
            found.rows.push(row);
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
    let (line, column) = (cursor.line, cursor.column());
    let is_end = |c: char| c == separator || c == '\n' || c == '\r';
    let lead = cursor.rest().len() - cursor.rest().trim_start_matches(' ').len();
    if !cursor.rest()[lead..].starts_with('"') {
        let end = cursor.rest().find(is_end).unwrap_or(cursor.rest().len());
        let text = cursor.rest()[..end].to_owned();
        cursor.at += end;
        return Ok(Cell { text, line, column, quoted: false });
    }
    cursor.at += lead + 1;
    let text = quoted(cursor).ok_or(QuoteFault::Open)?;
    while cursor.peek().is_some_and(|c| c == ' ') {
        cursor.step();
    }
    match cursor.peek() {
        Some(c) if !is_end(c) => Err(QuoteFault::TextAfter),
        _ => Ok(Cell { text, line, column, quoted: true }),
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
