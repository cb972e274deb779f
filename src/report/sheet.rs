//! One view for people: lines first, then tables, then notes; written as text, Markdown or CSV.

use std::fmt::Write as _;

/// What a command says: the answer, then the reasons, then the detail.
#[derive(Clone, Debug, Default)]
pub struct Sheet {
    /// The answer, a sentence a line.
    pub answer: Vec<String>,
    /// The detail.
    pub tables: Vec<Table>,
    /// What the reader should know besides.
    pub notes: Vec<String>,
}

/// One table.
#[derive(Clone, Debug, Default)]
pub struct Table {
    /// Its heading.
    pub title: String,
    /// Column heads; a column whose head begins with a space-free `>` is set to the right.
    pub columns: Vec<Column>,
    /// Cells.
    pub rows: Vec<Vec<String>>,
}

/// One column.
#[derive(Clone, Debug)]
pub struct Column {
    /// Its head.
    pub head: String,
    /// Numbers stand to the right.
    pub align: Align,
}

/// Where a column's cells stand.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

impl Table {
    /// An empty table. A head that starts with `#` is a column of numbers.
    pub fn new(title: impl Into<String>, heads: &[&str]) -> Self {
        let column = |head: &&str| match head.strip_prefix('#') {
            Some(head) => Column { head: head.to_owned(), align: Align::Right },
            None => Column { head: (*head).to_owned(), align: Align::Left },
        };
        Self { title: title.into(), columns: heads.iter().map(column).collect(), rows: Vec::new() }
    }

    fn widths(&self) -> Vec<usize> {
        let width = |n: usize| {
            let cells = self.rows.iter().filter_map(|row| row.get(n)).map(|cell| cell.chars().count());
            cells.chain([self.columns[n].head.chars().count()]).max().unwrap_or_default()
        };
        (0..self.columns.len()).map(width).collect()
    }
}

impl Sheet {
    /// Plain text for a terminal or a file.
    pub fn to_text(&self) -> String {
        let mut out = String::new();
        for line in &self.answer {
            let _ = writeln!(out, "{line}");
        }
        for table in self.tables.iter().filter(|table| !table.rows.is_empty()) {
            let _ = writeln!(out, "\n{}", table.title);
            let widths = table.widths();
            let heads: Vec<String> = table.columns.iter().map(|column| column.head.clone()).collect();
            for row in std::iter::once(&heads).chain(&table.rows) {
                let _ = writeln!(out, "  {}", padded(row, &table.columns, &widths).trim_end());
            }
        }
        if !self.notes.is_empty() {
            out.push('\n');
        }
        for note in &self.notes {
            let _ = writeln!(out, "note: {note}");
        }
        out
    }

    /// Markdown with user text escaped.
    pub fn to_markdown(&self) -> String {
        let mut out = String::new();
        for line in &self.answer {
            let _ = writeln!(out, "{}\n", escape_markdown(line));
        }
        for table in self.tables.iter().filter(|table| !table.rows.is_empty()) {
            let _ = writeln!(out, "## {}\n", escape_markdown(&table.title));
            let heads: Vec<String> = table.columns.iter().map(|c| escape_markdown(&c.head)).collect();
            let _ = writeln!(out, "| {} |", heads.join(" | "));
            let rules = table.columns.iter().map(|c| if c.align == Align::Right { "---:" } else { "---" });
            let _ = writeln!(out, "| {} |", rules.collect::<Vec<_>>().join(" | "));
            for row in &table.rows {
                let cells: Vec<String> = row.iter().map(|cell| escape_markdown(cell)).collect();
                let _ = writeln!(out, "| {} |", cells.join(" | "));
            }
            out.push('\n');
        }
        for note in &self.notes {
            let _ = writeln!(out, "- {}", escape_markdown(note));
        }
        out
    }

    /// The tables as CSV, each with its title in the first column, formula-like cells made harmless.
    pub fn to_csv(&self) -> String {
        let mut out = String::new();
        for table in self.tables.iter().filter(|table| !table.rows.is_empty()) {
            let heads = table.columns.iter().map(|column| column.head.clone());
            csv_line(&mut out, &mut std::iter::once("table".to_owned()).chain(heads));
            for row in &table.rows {
                csv_line(&mut out, &mut std::iter::once(table.title.clone()).chain(row.iter().cloned()));
            }
        }
        out
    }
}

fn padded(row: &[String], columns: &[Column], widths: &[usize]) -> String {
    let cells = row.iter().zip(columns).zip(widths).map(|((cell, column), width)| {
        let space = " ".repeat(width.saturating_sub(cell.chars().count()));
        match column.align {
            Align::Left => format!("{cell}{space}"),
            Align::Right => format!("{space}{cell}"),
        }
    });
    cells.collect::<Vec<_>>().join("  ")
}

/// Makes text safe inside a Markdown paragraph or table cell.
pub fn escape_markdown(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '\\' | '|' | '`' | '*' | '_' | '#' | '[' | ']' => {
                out.push('\\');
                out.push(c);
            }
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '&' => out.push_str("&amp;"),
            '\n' | '\r' => out.push(' '),
            other => out.push(other),
        }
    }
    out
}

fn csv_line(out: &mut String, cells: &mut dyn Iterator<Item = String>) {
    let line: Vec<String> = cells.map(|cell| csv_cell(&cell)).collect();
    let _ = writeln!(out, "{}", line.join(","));
}

/// Quotes where needed; a cell that a spreadsheet would run as a formula gets an apostrophe first.
///
/// A sign followed by a digit is a number and stays one.
fn csv_cell(cell: &str) -> String {
    let mut characters = cell.chars();
    let (first, second) = (characters.next(), characters.next());
    let formula = match first {
        Some('=' | '@' | '\t' | '\r') => true,
        Some('+' | '-') => !second.is_some_and(|c| c.is_ascii_digit()),
        Some(_) | None => false,
    };
    let cell = if formula { format!("'{cell}") } else { cell.to_owned() };
    if formula || cell.contains([',', '"', '\n', '\r', ';']) {
        format!("\"{}\"", cell.replace('"', "\"\""))
    } else {
        cell
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_cell_that_a_spreadsheet_would_run_is_made_harmless() {
        assert_eq!(csv_cell("=1+1"), "\"'=1+1\"");
        assert_eq!(csv_cell("-140.0"), "-140.0");
        assert_eq!(csv_cell("- two"), "\"'- two\"");
        assert_eq!(csv_cell("a,b"), "\"a,b\"");
    }

    #[test]
    fn markdown_from_user_text_is_only_text() {
        assert_eq!(escape_markdown("<b>|x`"), "&lt;b&gt;\\|x\\`");
    }
}
