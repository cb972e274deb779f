//! Writing CSV that a spreadsheet opens without running anything in it.

/// A cell to be written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ExportCell {
    /// Text, guarded when a spreadsheet would take it for a formula.
    Text(String),
    /// A number, date or id in its final form, written as it is.
    Plain(String),
}

/// Rows as CSV with `\n` line ends.
///
/// A text cell that starts like a formula (`=`, `+`, `-`, `@`, tab, carriage return) gets an apostrophe in front and
/// is quoted (CSV injection, weakness class CWE-1236). Reading takes the apostrophe off again.
pub fn export<'a>(rows: impl IntoIterator<Item = &'a [ExportCell]>) -> String {
    let mut out = String::new();
    for row in rows {
        let cells: Vec<String> = row.iter().map(written).collect();
        // A row of one empty cell would otherwise be a blank line.
        let is_blank = matches!(&cells[..], [only] if only.is_empty());
        out.push_str(if is_blank { "\"\"" } else { "" });
        out.push_str(&cells.join(","));
        out.push('\n');
    }
    out
}

fn written(cell: &ExportCell) -> String {
    match cell {
        ExportCell::Text(text) if starts_like_formula(text) => quoted(&format!("'{text}"), Quotes::Always),
        ExportCell::Text(text) | ExportCell::Plain(text) => quoted(text, Quotes::WhereNeeded),
    }
}

#[derive(Clone, Copy, PartialEq, Eq)]
enum Quotes {
    Always,
    WhereNeeded,
}

fn quoted(text: &str, quotes: Quotes) -> String {
    let needed = text.contains([',', ';', '\t', '"', '\n', '\r']) || text.trim() != text;
    if needed || quotes == Quotes::Always {
        format!("\"{}\"", text.replace('"', "\"\""))
    } else {
        text.to_owned()
    }
}

/// Whether a spreadsheet might run this text. Apostrophes already in front are passed over, so that guarding and
/// reading undo each other.
fn starts_like_formula(text: &str) -> bool {
    text.trim_start_matches('\'').starts_with(['=', '+', '-', '@', '\t', '\r'])
}

/// Text as it was before it was guarded.
pub(super) fn unguarded(text: &str) -> &str {
    match text.strip_prefix('\'') {
        Some(rest) if starts_like_formula(rest) => rest,
        _ => text,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn line(cells: &[ExportCell]) -> String {
        export([cells])
    }

    #[test]
    fn formulas_in_text_are_guarded_and_numbers_are_not() {
        let cells = [ExportCell::Text("=1+1".to_owned()), ExportCell::Plain("-3".to_owned())];
        assert_eq!(line(&cells), "\"'=1+1\",-3\n");
        assert_eq!(line(&[ExportCell::Text("'=1".to_owned())]), "\"''=1\"\n");
        assert_eq!(line(&[ExportCell::Text(String::new())]), "\"\"\n");
        assert_eq!(line(&[ExportCell::Text("'tis".to_owned())]), "'tis\n");
        assert_eq!(line(&[ExportCell::Text("a \"b\", c".to_owned())]), "\"a \"\"b\"\", c\"\n");
    }

    #[test]
    fn guarding_comes_off_again() {
        assert_eq!(unguarded("'=1+1"), "=1+1");
        assert_eq!(unguarded("''=1"), "'=1");
        assert_eq!(unguarded("'tis"), "'tis");
    }
}
