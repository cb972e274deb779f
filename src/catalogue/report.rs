//! Collects problems and silent fixes while files are read.

use std::collections::BTreeMap;
use std::fmt;

use crate::problem::{Code, Place, Problem, Problems, Severity};

use super::code;

/// Most errors that are shown at once.
pub const MOST_ERRORS: usize = 50;

/// Something put right without asking, because only one reading is possible.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Fix {
    /// A byte-order mark was skipped.
    ByteOrderMark,
    /// Line ends of one carriage return.
    LineEnds,
    /// A `sep=` line was skipped.
    SeparatorLine,
    /// Empty rows were skipped.
    BlankRow,
    /// Empty cells beyond the last column were dropped.
    BlankColumn,
    /// Spaces around a cell were dropped.
    Spaces,
    /// Typographic quotes, dashes or spaces in a number.
    Typography,
    /// Capitals in an id or code.
    LetterCase,
}

impl Fix {
    const fn words(self) -> &'static str {
        match self {
            Self::ByteOrderMark => "byte-order mark",
            Self::LineEnds => "old line ends",
            Self::SeparatorLine => "separator line",
            Self::BlankRow => "blank rows",
            Self::BlankColumn => "blank cells at row ends",
            Self::Spaces => "spaces around cells",
            Self::Typography => "typographic signs in numbers",
            Self::LetterCase => "capitals in ids and codes",
        }
    }
}

/// What was put right silently, counted by file.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Fixes {
    counts: BTreeMap<(String, Fix), usize>,
}

impl Fixes {
    /// How often this was put right in all files.
    pub fn count(&self, fix: Fix) -> usize {
        self.counts.iter().filter(|((_, what), _)| *what == fix).map(|(_, count)| count).sum()
    }

    /// Whether nothing was.
    pub fn is_empty(&self) -> bool {
        self.counts.is_empty()
    }

    pub(super) fn add(&mut self, file: &str, fix: Fix) {
        *self.counts.entry((file.to_owned(), fix)).or_default() += 1;
    }
}

impl fmt::Display for Fixes {
    /// One line a file: "parts.csv: put right: blank rows 2, spaces around cells 1".
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        let mut file = "";
        for ((name, fix), count) in &self.counts {
            if name == file {
                out.write_str(", ")?;
            } else {
                write!(out, "{}{name}: put right: ", if file.is_empty() { "" } else { "\n" })?;
            }
            write!(out, "{} {count}", fix.words())?;
            file = name;
        }
        Ok(())
    }
}

/// Problems and fixes in the making.
#[derive(Default)]
pub(super) struct Report {
    problems: Vec<Problem>,
    /// Position and count of warnings that are given once a column.
    repeated: BTreeMap<(String, Code, String), (usize, usize)>,
    pub(super) fixes: Fixes,
}

impl Report {
    pub(super) fn push(&mut self, problem: Problem) {
        self.problems.push(problem);
    }

    pub(super) fn error(&mut self, code: Code, place: Place, message: String, help: impl Into<String>) {
        self.push(Problem::error(code, Some(place), message, help));
    }

    pub(super) fn warning(&mut self, code: Code, place: Place, message: String, help: impl Into<String>) {
        self.push(Problem::warning(code, Some(place), message, help));
    }

    /// A warning that is shown at its first cell and counted for the rest of the column.
    pub(super) fn warning_once(&mut self, column: &str, problem: Problem) {
        let file = problem.place.as_ref().map(|place| place.file.clone()).unwrap_or_default();
        let next = self.problems.len();
        let entry = self.repeated.entry((file, problem.code, column.to_owned())).or_insert((next, 0));
        entry.1 += 1;
        if entry.1 == 1 {
            self.push(problem);
        }
    }

    /// All problems by place with at most [`MOST_ERRORS`] errors, and the fixes.
    pub(super) fn finish(mut self) -> (Problems, Fixes) {
        for (index, count) in self.repeated.into_values().filter(|(_, count)| *count > 1) {
            let others = if count == 2 { "cell" } else { "cells" };
            let more = format!(" (and {} more {others} of this column)", count - 1);
            self.problems[index].message.push_str(&more);
        }
        (capped(self.problems), self.fixes)
    }
}

/// The problems in order, errors beyond the cap counted in one line.
fn capped(problems: Vec<Problem>) -> Problems {
    let mut all = Problems::default();
    for problem in problems {
        all.push(problem);
    }
    let mut kept = Problems::default();
    let mut errors = 0;
    for problem in all.sorted() {
        errors += usize::from(problem.severity == Severity::Error);
        if problem.severity != Severity::Error || errors <= MOST_ERRORS {
            kept.push(problem.clone());
        }
    }
    if errors > MOST_ERRORS {
        let message = format!("{} more errors are not shown", errors - MOST_ERRORS);
        kept.push(Problem::error(code::TOO_MANY, None, message, "repair these first and read again"));
    }
    kept
}
