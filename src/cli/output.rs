//! Data on stdout, words on stderr, colour only on a terminal.

use std::io::{self, Write};
use std::path::Path;

use anstyle::{AnsiColor, Style};

use super::Format;
use super::failure::Failure;
use crate::problem::{Problems, Severity};
use crate::report::Sheet;

/// Writes a result to stdout in the wanted format.
pub(super) fn result(format: Format, sheet: &Sheet, json: &serde_json::Value) -> Result<(), Failure> {
    match format {
        Format::Text => text(&sheet.to_text()),
        Format::Md => text(&sheet.to_markdown()),
        Format::Csv => text(&sheet.to_csv()),
        Format::Json => text(&json_text(json)),
    }
}

/// JSON with a line end.
pub(super) fn json_text(json: &serde_json::Value) -> String {
    format!("{json:#}\n")
}

/// Writes text to stdout; a reader that has gone away is no error.
pub(super) fn text(text: &str) -> Result<(), Failure> {
    match io::stdout().write_all(text.as_bytes()) {
        Ok(()) => Ok(()),
        Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Ok(()),
        Err(error) => Err(Failure::File(format!("cannot write the result: {error}"))),
    }
}

/// Says every problem on stderr.
pub(super) fn problems(problems: &Problems) {
    let mut stderr = anstream::stderr();
    for problem in problems.sorted() {
        let colour = match problem.severity {
            Severity::Error => AnsiColor::Red,
            Severity::Warning => AnsiColor::Yellow,
            Severity::Note => AnsiColor::Cyan,
        };
        let style = Style::new().bold().fg_color(Some(colour.into()));
        let words = problem.to_string();
        let (head, rest) = words.split_once(':').unwrap_or((words.as_str(), ""));
        // A closed stderr leaves nobody to tell.
        let _ = writeln!(stderr, "{style}{head}{style:#}:{rest}\n");
    }
}

/// Says one sentence on stderr.
pub(super) fn complaint(message: &str) {
    let _ = writeln!(anstream::stderr(), "arraywright: {message}");
}

/// Writes a file whole or not at all, through a temporary file in the same folder.
pub(super) fn write_whole(path: &Path, text: &str) -> Result<(), Failure> {
    let folder = match path.parent() {
        Some(folder) if !folder.as_os_str().is_empty() => folder,
        Some(_) | None => Path::new("."),
    };
    let failed = |error: &io::Error| Failure::file(path, "write", error);
    let mut file = tempfile::NamedTempFile::new_in(folder).map_err(|error| failed(&error))?;
    file.write_all(text.as_bytes()).map_err(|error| failed(&error))?;
    readable_by_all(&file).map_err(|error| failed(&error))?;
    file.persist(path).map_err(|error| failed(&error.error))?;
    Ok(())
}

/// Temporary files are private; a finished sheet is for everybody.
#[cfg(unix)]
fn readable_by_all(file: &tempfile::NamedTempFile) -> io::Result<()> {
    use std::os::unix::fs::PermissionsExt;
    file.as_file().set_permissions(std::fs::Permissions::from_mode(0o644))
}

#[cfg(not(unix))]
#[expect(clippy::unnecessary_wraps, reason = "the other platform's version can fail")]
fn readable_by_all(_file: &tempfile::NamedTempFile) -> io::Result<()> {
    Ok(())
}
