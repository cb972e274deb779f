//! Changing single cells of a user's file and leaving every other byte as it is.

use std::collections::BTreeMap;
use std::fmt;

use super::read::{CatalogueFile, base_name};
use super::report::Report;
use super::table::{self, Schema, Table};
use super::{cable, labour, offer, part};

/// A new value of one cell.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct CellEdit {
    /// The line of the row, as in the place of what was read from it.
    pub line: usize,
    /// The column.
    pub column: String,
    /// What shall stand there.
    pub value: String,
}

/// Why a file was not changed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum NoEdit {
    /// It is none of the five files.
    File(String),
    /// It cannot be taken apart.
    Unreadable(String),
    /// It has no such column.
    Column(String),
    /// No row begins in that line.
    Row(usize),
}

impl fmt::Display for NoEdit {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::File(name) => write!(out, "{name} is no file of a catalogue"),
            Self::Unreadable(name) => write!(out, "{name} cannot be changed before it is repaired and UTF-8"),
            Self::Column(name) => write!(out, "the file has no column `{name}`"),
            Self::Row(line) => write!(out, "no row begins in line {line}"),
        }
    }
}

impl std::error::Error for NoEdit {}

/// The bytes of a file with some cells changed and rows added at the end; everything else stays byte for byte.
///
/// Values are quoted where the file's separator asks for it. They are written as given: no guard is put in front of
/// text that looks like a formula, because this is the user's own file.
///
/// # Errors
/// When the file, a column or a row is not there.
pub fn edited(
    file: &CatalogueFile,
    edits: &[CellEdit],
    added: &[BTreeMap<String, String>],
) -> Result<Vec<u8>, NoEdit> {
    let unreadable = || NoEdit::Unreadable(file.name.clone());
    let schema = schema(&file.name).ok_or_else(|| NoEdit::File(file.name.clone()))?;
    let bytes = &file.bytes;
    let mark = if bytes.starts_with(b"\xEF\xBB\xBF") { 3 } else { 0 };
    let text = std::str::from_utf8(&bytes[mark..]).map_err(|_| unreadable())?;
    let table = table::read(&file.name, text, schema, &mut Report::default()).ok_or_else(unreadable)?;
    let mut changes = Vec::new();
    for edit in edits {
        let column = table.column(&edit.column).ok_or_else(|| NoEdit::Column(edit.column.clone()))?;
        let row = table.rows.iter().find(|row| row.line == edit.line);
        let cell = row.and_then(|row| row.cells.get(column)).ok_or(NoEdit::Row(edit.line))?;
        changes.push((cell.span.clone(), quoted(&edit.value, table.separator)));
    }
    changes.sort_by_key(|(span, _)| std::cmp::Reverse(span.start));
    let mut changed = text.to_owned();
    for (span, value) in changes {
        changed.replace_range(span, &value);
    }
    append(&mut changed, &table, added)?;
    Ok([&bytes[..mark], changed.as_bytes()].concat())
}

fn schema(name: &str) -> Option<&'static Schema> {
    const ALL: [&Schema; 5] =
        [&part::SCHEMA, &offer::SCHEMA, &cable::SCHEMA, &labour::TASKS, &labour::TERRAIN];
    ALL.into_iter().find(|schema| schema.file == base_name(name))
}

fn append(text: &mut String, table: &Table, added: &[BTreeMap<String, String>]) -> Result<(), NoEdit> {
    let end = if text.contains("\r\n") {
        "\r\n"
    } else if text.contains('\n') || !text.contains('\r') {
        "\n"
    } else {
        "\r"
    };
    for row in added {
        let mut cells = vec![String::new(); table.width];
        for (name, value) in row {
            let column = table.column(name).ok_or_else(|| NoEdit::Column(name.clone()))?;
            cells[column] = quoted(value, table.separator);
        }
        if !text.ends_with(['\n', '\r']) {
            text.push_str(end);
        }
        text.push_str(&cells.join(&table.separator.to_string()));
        text.push_str(end);
    }
    Ok(())
}

fn quoted(value: &str, separator: char) -> String {
    if value.contains([separator, '"', '\n', '\r']) || value.trim() != value {
        format!("\"{}\"", value.replace('"', "\"\""))
    } else {
        value.to_owned()
    }
}
