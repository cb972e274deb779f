//! One table of the project file: keys are taken by name, and what nobody took is a problem.

use std::cell::RefCell;
use std::fmt;

use toml::Spanned;
use toml::de::{DeString, DeTable, DeValue};

use super::code;
use super::desk::Desk;
use super::value::Value;
use crate::problem::nearest;

/// A table, or the place where an absent one would stand.
pub(super) struct Table<'a> {
    /// Where problems go.
    pub(super) desk: &'a Desk<'a>,
    path: String,
    at: Option<usize>,
    entries: Option<&'a DeTable<'a>>,
    known: RefCell<Vec<&'static str>>,
}

impl<'a> Table<'a> {
    /// The whole file.
    pub(super) fn root(desk: &'a Desk<'a>, entries: &'a DeTable<'a>) -> Self {
        Self { desk, path: String::new(), at: None, entries: Some(entries), known: RefCell::default() }
    }

    /// A table that stands as a value.
    pub(super) fn new(desk: &'a Desk<'a>, path: String, at: usize, entries: &'a DeTable<'a>) -> Self {
        Self { desk, path, at: Some(at), entries: Some(entries), known: RefCell::default() }
    }

    /// Calls this table by another name in assumptions.
    pub(super) fn renamed(self, path: String) -> Self {
        Self { path, ..self }
    }

    /// Its first byte, if it is there.
    pub(super) fn at(&self) -> Option<usize> {
        self.at
    }

    /// Whether the key stands in the file.
    pub(super) fn has(&self, key: &str) -> bool {
        self.entries.is_some_and(|entries| entries.get(key).is_some())
    }

    /// The name of a key in assumptions.
    pub(super) fn path_of(&self, key: &str) -> String {
        if self.path.is_empty() { key.to_owned() } else { format!("{}.{key}", self.path) }
    }

    /// The value of a key, if it stands there. From then on the key is known.
    pub(super) fn take(&self, key: &'static str) -> Option<Value<'a>> {
        if !self.known.borrow().contains(&key) {
            self.known.borrow_mut().push(key);
        }
        let (name, value) = self.entries?.get_key_value(key)?;
        Some(Value {
            desk: self.desk,
            path: self.path_of(key),
            key: Some(key.to_owned()),
            key_at: name.span().start,
            at: value.span().start,
            raw: value.get_ref(),
        })
    }

    /// Every key with its value, for tables whose keys are the user's own.
    pub(super) fn entries(&self) -> Vec<Value<'a>> {
        let value = |(name, value): (&'a Spanned<DeString<'a>>, &'a Spanned<DeValue<'a>>)| Value {
            desk: self.desk,
            path: self.path_of(name.get_ref()),
            key: Some(name.get_ref().clone().into_owned()),
            key_at: name.span().start,
            at: value.span().start,
            raw: value.get_ref(),
        };
        self.entries.into_iter().flatten().map(value).collect()
    }

    /// Reads a key that may be absent. `None`: absent, or already reported.
    pub(super) fn get<T>(&self, key: &'static str, read: impl FnOnce(&Value<'a>) -> Option<T>) -> Option<T> {
        read(&self.take(key)?)
    }

    /// Reads a key that must be there; `example` is a line that would do. `None`: already reported.
    pub(super) fn need<T>(
        &self,
        key: &'static str,
        example: &str,
        read: impl FnOnce(&Value<'a>) -> Option<T>,
    ) -> Option<T> {
        if let Some(value) = self.take(key) {
            return read(&value);
        }
        self.missing(key, example);
        None
    }

    /// Writes down that `key` is absent.
    pub(super) fn missing(&self, key: &str, example: &str) {
        let table = if self.entries.is_none() { format!("[{}] ", self.path) } else { String::new() };
        let message = format!("{table}`{key}` is missing");
        self.desk.missing(key, self.at, message, format!("add a line such as: {example}"));
    }

    /// Reads a key with a default, which is listed as an assumption when it is used.
    pub(super) fn or<T: fmt::Display>(
        &self,
        key: &'static str,
        default: T,
        why: &str,
        read: impl FnOnce(&Value<'a>) -> Option<T>,
    ) -> T {
        let said = default.to_string();
        self.or_said(key, default, &said, why, read)
    }

    /// The same, with the default put in the words of `said`.
    pub(super) fn or_said<T>(
        &self,
        key: &'static str,
        default: T,
        said: &str,
        why: &str,
        read: impl FnOnce(&Value<'a>) -> Option<T>,
    ) -> T {
        if let Some(value) = self.take(key) {
            return read(&value).unwrap_or(default);
        }
        self.desk.assume(self.path_of(key), said, why);
        default
    }

    /// Reads a key whose absence means that a later stage decides, in the words of `instead`.
    pub(super) fn or_later<T>(
        &self,
        key: &'static str,
        instead: &str,
        why: &str,
        read: impl FnOnce(&Value<'a>) -> Option<T>,
    ) -> Option<T> {
        if let Some(value) = self.take(key) {
            return read(&value);
        }
        self.desk.assume(self.path_of(key), instead, why);
        None
    }

    /// The table under a key; an absent one is empty.
    pub(super) fn section(&self, key: &'static str) -> Self {
        let absent = || Self {
            desk: self.desk,
            path: self.path_of(key),
            at: self.at,
            entries: None,
            known: RefCell::default(),
        };
        self.take(key).and_then(|value| value.table()).unwrap_or_else(absent)
    }

    /// The tables of a list of tables, such as every `[[array]]`.
    pub(super) fn list(&self, key: &'static str) -> Vec<Self> {
        let Some(value) = self.take(key) else { return Vec::new() };
        if let DeValue::Table(entries) = value.raw {
            let message = format!("`[{key}]` is a list and takes two brackets");
            self.desk.error(code::SINGLE_BRACKETS, Some(value.key_at), message, format!("write [[{key}]]"));
            return vec![Self::new(self.desk, value.path, value.key_at, entries)];
        }
        let items = value.items("{ … }").unwrap_or_default();
        items.iter().filter_map(Value::table).collect()
    }

    /// Reports every key that nobody took.
    pub(super) fn finish(&self) {
        self.finish_with(&[]);
    }

    /// Reports every key that nobody took; `hints` are keys that belong elsewhere, each with its place.
    pub(super) fn finish_with(&self, hints: &[(&str, &str)]) {
        let known = self.known.borrow();
        for (name, _) in self.entries.into_iter().flatten() {
            let key = name.get_ref().as_ref();
            if known.contains(&key) {
                continue;
            }
            let hint = hints.iter().find(|(wrong, _)| *wrong == key).map(|(_, right)| *right);
            let help = match (hint, nearest(key, known.iter().copied())) {
                (Some(right), _) => format!("did you mean `{right}`?"),
                (None, Some(near)) => format!("did you mean `{near}`?"),
                (None, None) => format!("known here: {}", known.join(", ")),
            };
            let message = if self.path.is_empty() {
                format!("`{key}` is not a section of a project file")
            } else {
                format!("`{key}` is not known in `{}`", self.path)
            };
            self.desk.error(code::UNKNOWN_KEY, Some(name.span().start), message, help);
        }
    }
}
