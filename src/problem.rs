//! What is wrong, where, and what would be right: one shape for project files, catalogues and plans.

use std::fmt;

/// A stable short name of one kind of problem, such as `unknown-key`.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Code(pub &'static str);

impl fmt::Display for Code {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(self.0)
    }
}

/// Defines problem codes together with the list of all of them, so that a test can ask each for its fixture.
#[macro_export]
macro_rules! problem_codes {
    ($($(#[$doc:meta])* $name:ident = $text:literal;)+) => {
        $($(#[$doc])* pub const $name: $crate::problem::Code = $crate::problem::Code($text);)+
        /// Every code of this module, in the order of the source.
        pub const ALL: &[$crate::problem::Code] = &[$($name),+];
    };
}

/// How bad a problem is.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Severity {
    /// Nothing can be built from this.
    Error,
    /// It can be built, but probably not as meant.
    Warning,
    /// Something that the reader should know.
    Note,
}

impl fmt::Display for Severity {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(match self {
            Self::Error => "error",
            Self::Warning => "warning",
            Self::Note => "note",
        })
    }
}

/// A place in a text file, lines and columns counted from 1.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Place {
    /// The file's name as the user gave it.
    pub file: String,
    /// The line, from 1.
    pub line: usize,
    /// The column in characters, from 1.
    pub column: usize,
    /// The text of that line, shortened if very long.
    pub excerpt: String,
}

impl Place {
    /// The place of byte `offset` in `text`.
    pub fn in_text(file: &str, text: &str, offset: usize) -> Self {
        let mut offset = offset.min(text.len());
        while !text.is_char_boundary(offset) {
            offset -= 1;
        }
        let before = &text[..offset];
        let line_start = before.rfind('\n').map_or(0, |at| at + 1);
        let line_text = text[line_start..].lines().next().unwrap_or_default();
        Self {
            file: file.to_owned(),
            line: before.matches('\n').count() + 1,
            column: text[line_start..offset].chars().count() + 1,
            excerpt: shortened(line_text.trim()),
        }
    }
}

fn shortened(line: &str) -> String {
    const LONGEST: usize = 100;
    if line.chars().count() <= LONGEST {
        line.to_owned()
    } else {
        line.chars().take(LONGEST - 1).chain(['…']).collect()
    }
}

/// One thing that is wrong.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Problem {
    /// Its stable name.
    pub code: Code,
    /// How bad it is.
    pub severity: Severity,
    /// Where it stands, when it stands anywhere.
    pub place: Option<Place>,
    /// What is wrong, one line without a full stop.
    pub message: String,
    /// What would be right; may be empty.
    pub help: String,
}

impl Problem {
    /// An error.
    pub fn error(
        code: Code,
        place: Option<Place>,
        message: impl Into<String>,
        help: impl Into<String>,
    ) -> Self {
        Self { code, severity: Severity::Error, place, message: message.into(), help: help.into() }
    }

    /// Something that the reader should know.
    pub fn note(
        code: Code,
        place: Option<Place>,
        message: impl Into<String>,
        help: impl Into<String>,
    ) -> Self {
        Self { code, severity: Severity::Note, place, message: message.into(), help: help.into() }
    }

    /// A warning.
    pub fn warning(
        code: Code,
        place: Option<Place>,
        message: impl Into<String>,
        help: impl Into<String>,
    ) -> Self {
        Self { code, severity: Severity::Warning, place, message: message.into(), help: help.into() }
    }
}

impl fmt::Display for Problem {
    /// Two or three lines: what, where, what would be right.
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{}[{}]: {}", self.severity, self.code, self.message)?;
        if let Some(place) = &self.place {
            write!(out, "\n  {}:{}:{}", place.file, place.line, place.column)?;
            if !place.excerpt.is_empty() {
                write!(out, "  {}", place.excerpt)?;
            }
        }
        if !self.help.is_empty() {
            write!(out, "\n  {}", self.help)?;
        }
        Ok(())
    }
}

/// Problems found in one pass, sorted by place when shown.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Problems {
    list: Vec<Problem>,
}

impl Problems {
    /// Adds one.
    pub fn push(&mut self, problem: Problem) {
        self.list.push(problem);
    }

    /// Adds all of another list.
    pub fn extend(&mut self, other: Self) {
        self.list.extend(other.list);
    }

    /// Whether any of them is an error.
    pub fn has_errors(&self) -> bool {
        self.list.iter().any(|problem| problem.severity == Severity::Error)
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.list.is_empty()
    }

    /// Each problem once, however often it was met.
    #[must_use]
    pub fn deduplicated(self) -> Self {
        let mut kept: Vec<Problem> = Vec::new();
        for problem in self.list {
            if !kept.contains(&problem) {
                kept.push(problem);
            }
        }
        Self { list: kept }
    }

    /// The same problems, those in files of these names placed in `folder`.
    #[must_use]
    pub fn in_folder(mut self, folder: &str, files: &[&str]) -> Self {
        for place in self.list.iter_mut().filter_map(|problem| problem.place.as_mut()) {
            if files.contains(&place.file.as_str()) {
                place.file = format!("{folder}/{}", place.file);
            }
        }
        self
    }

    /// All of them by file, line and column, errors before warnings at one place; those without a place last.
    pub fn sorted(&self) -> Vec<&Problem> {
        let mut all: Vec<&Problem> = self.list.iter().collect();
        all.sort_by_key(|problem| {
            let place = problem.place.as_ref().map(|p| (p.file.clone(), p.line, p.column));
            (place.is_none(), place, problem.severity, problem.code)
        });
        all
    }
}

/// The nearest of `known` to `given`, if one is near enough to be meant.
pub fn nearest<'a>(given: &str, known: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    let lower = given.to_lowercase().replace('_', "-");
    known
        .into_iter()
        .map(|name| (strsim::jaro_winkler(&lower, name), name))
        .filter(|(likeness, _)| *likeness > 0.82)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, name)| name)
}
