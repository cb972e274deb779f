//! One row, cell by cell: every reader reports what is wrong and goes on.

use chrono::NaiveDate;
use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use crate::problem::{Code, Place, Problem};

use super::lex::{Cell, Row};
use super::number::{self, NumberRule, Origin, Remark};
use super::report::{Fix, Report};
use super::table::{Table, letter};
use super::{code, date};

/// The smallest number that a column takes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Least {
    /// Nothing is a fair value.
    Zero,
    /// More than nothing.
    AboveZero,
}

/// Whether capitals in an id mean anything.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Case {
    /// Ids of parts and offers are lower case.
    Lower,
    /// Task ids stay as written.
    AsWritten,
}

/// Reads the cells of one row.
pub(super) struct RowReader<'a> {
    pub(super) table: &'a Table,
    pub(super) row: &'a Row,
    pub(super) report: &'a mut Report,
}

impl RowReader<'_> {
    /// Where a cell stands; the row's beginning when the file lacks the column.
    pub(super) fn place(&self, name: &str) -> Place {
        match self.table.column(name) {
            Some(index) => self.table.cell_place(self.row, index),
            None => self.table.row_place(self.row),
        }
    }

    pub(super) fn row_place(&self) -> Place {
        self.table.row_place(self.row)
    }

    fn subject(&self, name: &str) -> String {
        match self.table.column(name) {
            Some(index) => format!("`{name}` (column {})", letter(index)),
            None => format!("`{name}`"),
        }
    }

    /// Reports an error; `message` goes on after the name of the column.
    pub(super) fn error(&mut self, name: &str, code: Code, message: &str, help: impl Into<String>) {
        let message = format!("{} {message}", self.subject(name));
        let place = self.place(name);
        self.report.error(code, place, message, help);
    }

    /// Reports a warning; `message` goes on after the name of the column.
    pub(super) fn warning(&mut self, name: &str, code: Code, message: &str, help: impl Into<String>) {
        let message = format!("{} {message}", self.subject(name));
        let place = self.place(name);
        self.report.warning(code, place, message, help);
    }

    fn refuse(&mut self, name: &str, remark: &Remark) {
        self.error(name, remark.code, &remark.message, remark.help.as_str());
    }

    fn accept(&mut self, name: &str, remark: &Remark) {
        let message = format!("{} {}", self.subject(name), remark.message);
        let problem = Problem::warning(remark.code, Some(self.place(name)), message, remark.help.as_str());
        self.report.warning_once(name, problem);
    }

    fn fix(&mut self, fix: Fix) {
        self.report.fixes.add(&self.table.file, fix);
    }

    fn cell(&self, name: &str) -> Option<&Cell> {
        self.table.column(name).and_then(|index| self.row.cells.get(index))
    }

    /// The cell without the spaces around it; empty when the file lacks the column.
    pub(super) fn trimmed(&mut self, name: &str) -> String {
        let Some(cell) = self.cell(name) else { return String::new() };
        let trimmed = cell.text.trim();
        let (text, differs) = (trimmed.to_owned(), trimmed.len() != cell.text.len());
        if differs && !text.is_empty() {
            self.fix(Fix::Spaces);
        }
        text
    }

    /// Text that is printed and never interpreted, whatever it starts with.
    pub(super) fn text(&mut self, name: &str) -> String {
        super::export::unguarded(&self.trimmed(name)).to_owned()
    }

    /// A cell of one word or line: a line break in it is taken out and reported.
    pub(super) fn word(&mut self, name: &str) -> String {
        let text = self.trimmed(name);
        if !text.contains(['\n', '\r']) {
            return text;
        }
        let joined: String = text.split(['\n', '\r']).map(str::trim).collect();
        let message = format!("holds a line break, read as \"{joined}\"");
        self.warning(name, code::LINE_BREAK, &message, "type the cell again in one line");
        joined
    }

    fn blank(&mut self, name: &str) {
        // A file without the column has been told so once.
        if self.table.column(name).is_some() {
            self.error(name, code::BLANK_CELL, "is blank", "this cell is needed in every row");
        }
    }

    /// A word that must not be blank; empty when it is, which is then reported.
    pub(super) fn needed_word(&mut self, name: &str) -> String {
        let word = self.word(name);
        if word.is_empty() {
            self.blank(name);
        }
        word
    }

    /// An id, or `None` when it is none, which is then reported.
    pub(super) fn id(&mut self, name: &str, case: Case) -> Option<String> {
        let written = self.needed_word(name);
        if written.is_empty() {
            return None;
        }
        let id = match case {
            Case::Lower => written.to_lowercase(),
            Case::AsWritten => written.clone(),
        };
        match id_fault(&written) {
            Some(remark) => {
                self.refuse(name, &remark);
                return None;
            }
            None if id != written => self.fix(Fix::LetterCase),
            None => {}
        }
        if id.starts_with(|c: char| c.is_ascii_digit()) {
            let remark = Remark::new(
                code::ID_DIGIT_FIRST,
                format!("is \"{id}\", an id that starts with a digit"),
                "start ids with a letter, or a spreadsheet may take them for numbers",
            );
            self.accept(name, &remark);
        }
        Some(id)
    }

    fn origin(&self, name: &str) -> Origin {
        let quoted = self.cell(name).is_some_and(|cell| cell.quoted);
        Origin { separator: self.table.separator, quoted }
    }

    /// A number in a cell, or `None` when the cell is blank or wrong; the latter is reported.
    pub(super) fn number(&mut self, name: &str, rule: NumberRule<'_>, least: Least) -> Option<Decimal> {
        let text = self.trimmed(name);
        if text.is_empty() { None } else { self.number_in(name, &text, rule, least) }
    }

    /// As [`Self::number`], from text that was cut out of the cell.
    pub(super) fn number_in(
        &mut self,
        name: &str,
        text: &str,
        rule: NumberRule<'_>,
        least: Least,
    ) -> Option<Decimal> {
        let reading = number::read(text, self.origin(name), rule);
        if reading.typography {
            self.fix(Fix::Typography);
        }
        match reading.value {
            Err(remark) => {
                self.refuse(name, &remark);
                None
            }
            Ok(value) if value.is_sign_negative() && !value.is_zero() => {
                self.error(
                    name,
                    code::NEGATIVE,
                    &format!("is {value}, less than nothing"),
                    "remove the sign",
                );
                None
            }
            Ok(value) if value.is_zero() && least == Least::AboveZero => {
                self.error(name, code::ZERO, "is 0", "it must be more than 0");
                None
            }
            Ok(value) => {
                reading.accepted.iter().for_each(|remark| self.accept(name, remark));
                Some(value)
            }
        }
    }

    /// As [`Self::number`], where a blank cell is an error.
    pub(super) fn needed_number(
        &mut self,
        name: &str,
        rule: NumberRule<'_>,
        least: Least,
    ) -> Option<Decimal> {
        let is_blank = self.cell(name).is_none_or(|cell| cell.text.trim().is_empty());
        if is_blank {
            self.blank(name);
            None
        } else {
            self.number(name, rule, least)
        }
    }

    /// A whole number.
    pub(super) fn whole(&mut self, name: &str, rule: NumberRule<'_>, least: Least) -> Option<u64> {
        let value = self.number(name, rule, least)?;
        let whole = value.is_integer().then(|| value.to_u64()).flatten();
        if whole.is_none() {
            let message = format!("is {value}, not a whole number");
            self.error(name, code::NOT_WHOLE, &message, "write a whole number");
        }
        whole
    }

    /// A date as YYYY-MM-DD.
    pub(super) fn date(&mut self, name: &str) -> Option<NaiveDate> {
        let text = self.word(name);
        if text.is_empty() {
            return None;
        }
        match date::read(&text) {
            Ok(day) => Some(day),
            Err(remark) => {
                self.refuse(name, &remark);
                None
            }
        }
    }

    /// Yes or no; blank is no.
    pub(super) fn yes_no(&mut self, name: &str) -> bool {
        let word = self.word(name);
        if let Some(answer) = answer(&word) {
            return answer;
        }
        let message = format!("is \"{word}\", neither yes nor no; read as no");
        self.warning(name, code::YES_NO, &message, "write yes, or leave it blank");
        false
    }
}

/// What a word answers, if it is one of those listed.
fn answer(word: &str) -> Option<bool> {
    match word.to_lowercase().as_str() {
        "yes" | "true" | "x" | "1" | "ja" | "y" => Some(true),
        "" | "no" | "false" | "0" | "nein" | "n" | "-" => Some(false),
        _ => None,
    }
}

/// What is wrong with an id, if anything.
pub(super) fn id_fault(id: &str) -> Option<Remark> {
    if let Some(remark) = number::formula(id) {
        return Some(remark);
    }
    let lower = id.to_ascii_lowercase();
    let exponent = lower.split_once("e+").is_some_and(|(mantissa, power)| {
        mantissa.bytes().all(|b| b.is_ascii_digit() || matches!(b, b'.' | b','))
            && power.bytes().all(|b| b.is_ascii_digit())
    });
    if exponent {
        let message = format!("is \"{id}\": a spreadsheet shortened a long number");
        let help = "format the column as text and type the id again, best with a letter first";
        return Some(Remark::new(code::ID_EXPONENT, message, help));
    }
    let is_date = |parts: &[&str]| {
        let digits =
            |part: &&str| !part.is_empty() && part.len() <= 4 && part.bytes().all(|b| b.is_ascii_digit());
        let months = parts.iter().filter(|part| number::month(part).is_some()).count();
        let numbers = parts.iter().filter(|part| digits(part)).count();
        let dated = months == 1 || numbers == 3 || lower.contains('/');
        parts.len() > 1 && months + numbers == parts.len() && months <= 1 && dated
    };
    if is_date(&lower.split(['-', '/', ' ', '.']).collect::<Vec<_>>()) {
        let message = format!("is \"{id}\": a spreadsheet turned an id into a date");
        let help = "format the column as text and type the id again, with a letter first";
        return Some(Remark::new(code::ID_DATE, message, help));
    }
    let legal = |c: char| c.is_ascii_alphanumeric() || matches!(c, '.' | '_' | '-');
    let starts = lower.starts_with(|c: char| c.is_ascii_alphanumeric());
    if id.len() > 40 || !starts || !id.chars().all(legal) {
        let help = "1 to 40 of a-z, 0-9, `.`, `_` and `-`, a letter first";
        return Some(Remark::new(code::BAD_ID, format!("is \"{id}\", not an id"), help));
    }
    None
}
