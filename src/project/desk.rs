//! Where reading keeps what it finds: problems with their places, and the defaults that were used.

use std::cell::RefCell;
use std::collections::BTreeMap;

use super::code;
use super::model::Assumption;
use crate::problem::{Code, Place, Problem, Problems};

/// One file being read.
pub(super) struct Desk<'a> {
    file: &'a str,
    text: &'a str,
    /// Lines with a syntax error, and their text: what is missing there is not missed twice.
    broken: BTreeMap<usize, String>,
    problems: RefCell<Problems>,
    assumptions: RefCell<Vec<Assumption>>,
}

impl<'a> Desk<'a> {
    /// A desk for `text`, with its syntax errors already written down.
    pub(super) fn new(file: &'a str, text: &'a str, syntax: &[toml::de::Error]) -> Self {
        let mut desk = Self {
            file,
            text,
            broken: BTreeMap::new(),
            problems: RefCell::default(),
            assumptions: RefCell::default(),
        };
        for error in syntax {
            desk.syntax_error(error);
        }
        desk
    }

    /// The place of a byte of the text; without one, the beginning of the file.
    pub(super) fn place(&self, at: Option<usize>) -> Place {
        match at {
            Some(at) => Place::in_text(self.file, self.text, at),
            None => Place { file: self.file.to_owned(), line: 1, column: 1, excerpt: String::new() },
        }
    }

    /// Writes down an error at byte `at`.
    pub(super) fn error(
        &self,
        code: Code,
        at: Option<usize>,
        message: impl Into<String>,
        help: impl Into<String>,
    ) {
        let place = self.place(at);
        let follows_from_syntax = at.is_some() && self.broken.contains_key(&place.line);
        if !follows_from_syntax {
            self.problems.borrow_mut().push(Problem::error(code, Some(place), message, help));
        }
    }

    /// Writes down a warning at byte `at`.
    pub(super) fn warning(&self, code: Code, at: usize, message: impl Into<String>, help: impl Into<String>) {
        let place = Some(self.place(Some(at)));
        self.problems.borrow_mut().push(Problem::warning(code, place, message, help));
    }

    /// Writes down that a needed key is absent from the table at byte `at`.
    pub(super) fn missing(&self, key: &str, at: Option<usize>, message: String, help: String) {
        if !self.broken.values().any(|line| line.contains(key)) {
            let problem = Problem::error(code::MISSING_KEY, Some(self.place(at)), message, help);
            self.problems.borrow_mut().push(problem);
        }
    }

    /// Writes down a default that was used.
    pub(super) fn assume(&self, key: String, value: impl Into<String>, why: impl Into<String>) {
        let assumption = Assumption { key, value: value.into(), why: why.into() };
        self.assumptions.borrow_mut().push(assumption);
    }

    /// Takes back the assumptions of keys that turned out not to matter.
    pub(super) fn forget(&self, does_not_matter: impl Fn(&str) -> bool) {
        self.assumptions.borrow_mut().retain(|assumption| !does_not_matter(&assumption.key));
    }

    /// Replaces a default by a better one that another key decided.
    pub(super) fn assume_instead(&self, key: &str, value: &str, why: &str) {
        self.forget(|known| known == key);
        self.assume(key.to_owned(), value, why);
    }

    /// Adds problems found in another file.
    pub(super) fn extend(&self, problems: Problems) {
        self.problems.borrow_mut().extend(problems);
    }

    /// Whether an error stands on the desk.
    pub(super) fn has_errors(&self) -> bool {
        self.problems.borrow().has_errors()
    }

    /// Whether the text mentions `word`, in a table or in a broken line.
    pub(super) fn mentions(&self, word: &str) -> bool {
        self.text.contains(word)
    }

    /// What was found.
    pub(super) fn clear(self) -> (Problems, Vec<Assumption>) {
        (self.problems.into_inner(), self.assumptions.into_inner())
    }

    fn syntax_error(&mut self, error: &toml::de::Error) {
        let place = self.place(Some(error.span().map_or(self.text.len(), |span| span.start)));
        let line = self.text.lines().nth(place.line.saturating_sub(1)).unwrap_or_default().to_owned();
        let first_of_line = self.broken.insert(place.line, line.clone()).is_none();
        if !first_of_line {
            return;
        }
        let message = error.message().trim().to_owned();
        let problem = if message.contains("duplicate key") {
            let help = "keep one of them and delete the other";
            Problem::error(code::DUPLICATE_KEY, Some(place), "this key stands twice in one table", help)
        } else {
            Problem::error(code::SYNTAX, Some(place), format!("this is not TOML: {message}"), hint(&line))
        };
        self.problems.borrow_mut().push(problem);
    }
}

/// What the writer of a broken line probably meant.
fn hint(line: &str) -> String {
    let Some((key, value)) = line.split_once('=') else {
        return "a line is `key = value`, or `[section]`".to_owned();
    };
    let (key, value) = (key.trim(), value.split('#').next().unwrap_or_default().trim());
    let bare = !value.is_empty() && !value.contains(['"', '\'', '{', '[', '=', ',']);
    if value.contains(['“', '”', '„', '‘', '’', '«']) {
        "quotes are the straight ones: \"…\"".to_owned()
    } else if bare {
        format!("text and dimensions stand in quotes: {key} = \"{value}\"")
    } else if value.matches('"').count() % 2 == 1 {
        "a quote is not closed".to_owned()
    } else if value.contains('{') && !value.contains('}') {
        "a brace is not closed, or the table runs over several lines".to_owned()
    } else {
        "every value is text in quotes, a number, a date, true or false, a list [ ] or a table { }".to_owned()
    }
}
