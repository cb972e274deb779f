//! One value of the project file, and the kinds of values that keys take.

#![expect(
    clippy::wildcard_enum_match_arm,
    reason = "the kinds of TOML values are not our enum: all others are wrong"
)]

use std::ops::RangeInclusive;

use chrono::NaiveDate;
use rust_decimal::Decimal;
use toml::de::DeValue;

use super::code;
use super::desk::Desk;
use super::table::Table;
use crate::problem::{Code, Place, nearest};
use crate::units::{Currency, Length, Money, Percent, UnitError, parse_decimal, parse_percent};

/// A value with its place. Every reader returns `None` after it has written down what is wrong.
pub(super) struct Value<'a> {
    pub(super) desk: &'a Desk<'a>,
    pub(super) path: String,
    /// The key, or `None` for an item of a list.
    pub(super) key: Option<String>,
    pub(super) key_at: usize,
    pub(super) at: usize,
    pub(super) raw: &'a DeValue<'a>,
}

impl<'a> Value<'a> {
    /// Writes down an error at this value.
    pub(super) fn refuse<T>(
        &self,
        code: Code,
        message: impl Into<String>,
        help: impl Into<String>,
    ) -> Option<T> {
        self.desk.error(code, Some(self.at), message, help);
        None
    }

    /// Where the key stands.
    pub(super) fn place(&self) -> Place {
        self.desk.place(Some(self.key_at))
    }

    /// How messages call it: the key, or the list it stands in.
    pub(super) fn name(&self) -> &str {
        self.key.as_deref().or_else(|| self.path.rsplit('.').next()).unwrap_or_default()
    }

    /// The form that would be right: `key = value`, or the value alone in a list.
    fn right(&self, value: &str) -> String {
        match &self.key {
            Some(key) => format!("write {key} = {value}"),
            None => format!("write {value}"),
        }
    }

    fn wrong_type<T>(&self, wanted: &str, example: &str) -> Option<T> {
        let message = format!("`{}` takes {wanted}, not {}", self.name(), kind(self.raw));
        self.refuse(code::WRONG_TYPE, message, self.right(example))
    }

    /// Text in quotes, not empty.
    pub(super) fn text(&self) -> Option<&'a str> {
        let DeValue::String(text) = self.raw else { return self.wrong_type("text in quotes", "\"…\"") };
        let text = text.trim();
        if text.is_empty() {
            return self.refuse(
                code::BAD_NAME,
                format!("`{}` is empty", self.name()),
                "write something, or leave the line out",
            );
        }
        Some(text)
    }

    /// A name: letters, digits, space, `-`, `_` and `.`, at most 40.
    pub(super) fn name_text(&self) -> Option<String> {
        let text = self.text()?;
        let legal = |c: char| c.is_alphanumeric() || matches!(c, ' ' | '-' | '_' | '.');
        if let Some(bad) = text.chars().find(|c| !legal(*c)) {
            let message = format!("the name \"{}\" contains `{}`", text.escape_debug(), bad.escape_debug());
            return self.refuse(
                code::BAD_NAME,
                message,
                "names take letters, digits, space, `-`, `_` and `.`; they become labels and file names",
            );
        }
        if text.chars().count() > 40 || !text.chars().any(char::is_alphanumeric) {
            return self.refuse(
                code::BAD_NAME,
                format!("\"{text}\" cannot serve as a name"),
                "names have 1 to 40 characters and at least one letter or digit",
            );
        }
        Some(text.to_owned())
    }

    /// A part id: one word.
    pub(super) fn part(&self) -> Option<String> {
        let text = self.text()?;
        if text.contains(|c: char| c.is_whitespace() || c.is_control() || matches!(c, ',' | ';' | '"')) {
            return self.refuse(
                code::BAD_NAME,
                format!("\"{}\" cannot be a part id", text.escape_debug()),
                "a part id is one word, as in the column `part` of parts.csv",
            );
        }
        Some(text.to_owned())
    }

    /// One of some words.
    pub(super) fn choice<T: Copy>(&self, choices: &[(&'static str, T)]) -> Option<T> {
        let words = || choices.iter().map(|(word, _)| *word);
        let list = words().map(|word| format!("\"{word}\"")).collect::<Vec<_>>().join(", ");
        let DeValue::String(text) = self.raw else {
            return self.wrong_type(&format!("one of {list}"), &list);
        };
        if let Some((_, choice)) = choices.iter().find(|(word, _)| *word == text.trim()) {
            return Some(*choice);
        }
        let help = match nearest(text.trim(), words()) {
            Some(near) => format!("did you mean \"{near}\"? accepted: {list}"),
            None => format!("accepted: {list}"),
        };
        let message = format!("`{}` cannot be \"{}\"", self.name(), text.escape_debug());
        self.refuse(code::UNKNOWN_CHOICE, message, help)
    }

    /// true or false.
    pub(super) fn truth(&self) -> Option<bool> {
        match self.raw {
            DeValue::Boolean(truth) => Some(*truth),
            _ => self.wrong_type("true or false, without quotes", "true"),
        }
    }

    /// A dimension in quotes, read by `parse`; `unit` is the one that an example shows.
    pub(super) fn quantity<T>(
        &self,
        unit: &str,
        parse: impl FnOnce(&str) -> Result<T, UnitError>,
    ) -> Option<T> {
        let bare = match self.raw {
            DeValue::String(text) => return parse(text).map_err(|error| self.unit_error(&error)).ok(),
            DeValue::Integer(number) => number.as_str(),
            DeValue::Float(number) => number.as_str(),
            _ => return self.wrong_type("a dimension in quotes", &format!("\"1 {unit}\"")),
        };
        let digits = bare.bytes().any(|b| b.is_ascii_digit());
        let bare = if digits { bare } else { "1" };
        let bare = if unit == "%" { in_percent(bare) } else { bare.to_owned() };
        let message = format!("`{}` is a dimension and needs its unit, in quotes", self.name());
        self.refuse(code::BARE_NUMBER, message, self.right(&format!("\"{bare} {unit}\"")))
    }

    fn unit_error(&self, error: &UnitError) {
        let code = code::of_unit_error(error);
        self.desk.error(code, Some(self.at), format!("`{}`: {error}", self.name()), error.help());
    }

    /// A quantity that must be above zero.
    pub(super) fn positive<T: PartialOrd + Copy>(
        &self,
        unit: &str,
        zero: T,
        parse: impl FnOnce(&str) -> Result<T, UnitError>,
    ) -> Option<T> {
        let value = self.quantity(unit, parse)?;
        if value > zero { Some(value) } else { self.not_positive() }
    }

    /// Writes down that this value must be above zero.
    pub(super) fn not_positive<T>(&self) -> Option<T> {
        let message = format!("`{}` must be more than zero", self.name());
        self.refuse(code::NOT_POSITIVE, message, "check the number and its sign")
    }

    /// Writes down that this value must not be below zero.
    pub(super) fn negative<T>(&self) -> Option<T> {
        let message = format!("`{}` must not be less than zero", self.name());
        self.refuse(code::NEGATIVE, message, "zero means none of it; check the sign")
    }

    /// Any length, negative ones too.
    pub(super) fn length(&self) -> Option<Length> {
        self.quantity("m", Length::parse)
    }

    /// A length above zero.
    pub(super) fn positive_length(&self) -> Option<Length> {
        self.positive("m", Length::ZERO, Length::parse)
    }

    /// A length of zero or more.
    pub(super) fn allowance(&self) -> Option<Length> {
        let length = self.length()?;
        if length >= Length::ZERO { Some(length) } else { self.negative() }
    }

    /// A bare number, exactly as written.
    pub(super) fn ratio(&self) -> Option<Decimal> {
        let text = match self.raw {
            DeValue::Integer(number) if number.radix() == 10 => number.as_str(),
            DeValue::Float(number) => number.as_str(),
            DeValue::String(text) => return self.quoted_number(text),
            _ => return self.wrong_type("a bare number", "1.05"),
        };
        parse_decimal(text, "the number in plain digits").map_err(|error| self.unit_error(&error)).ok()
    }

    fn quoted_number<T>(&self, text: &str) -> Option<T> {
        let message = format!("`{}` is a bare number, without quotes and without a unit", self.name());
        let number = parse_decimal(text, "").map_or_else(|_| "2".to_owned(), |number| number.to_string());
        self.refuse(code::QUOTED_NUMBER, message, self.right(&number))
    }

    /// A bare number of zero or more.
    pub(super) fn ratio_from_zero(&self) -> Option<Decimal> {
        let ratio = self.ratio()?;
        if ratio >= Decimal::ZERO { Some(ratio) } else { self.negative() }
    }

    /// A whole bare number in `range`.
    pub(super) fn count(&self, range: RangeInclusive<u32>) -> Option<u32> {
        let number = self.ratio()?;
        if number.fract() != Decimal::ZERO {
            let message = format!("`{}` counts whole ones, but this is {number}", self.name());
            return self.refuse(code::NOT_WHOLE, message, "write a whole number");
        }
        match u32::try_from(number) {
            Ok(count) if range.contains(&count) => Some(count),
            _ => {
                let message = format!("`{}` cannot be {}", self.name(), number.normalize());
                let help = format!("accepted: {} to {}", range.start(), range.end());
                self.refuse(code::COUNT_OUT_OF_RANGE, message, help)
            }
        }
    }

    /// A date, without quotes and without a time.
    pub(super) fn date(&self) -> Option<NaiveDate> {
        let right = || format!("{}, without quotes", self.right("2026-10-01"));
        let found = match self.raw {
            DeValue::Datetime(found) if found.time.is_none() => found.date,
            DeValue::Datetime(_) => None,
            DeValue::String(text) => {
                let message = format!("`{}` is a date, but \"{text}\" is text", self.name());
                return self.refuse(code::BAD_DATE, message, right());
            }
            _ => return self.wrong_type("a date", "2026-10-01"),
        };
        let date = found.and_then(|d| NaiveDate::from_ymd_opt(d.year.into(), d.month.into(), d.day.into()));
        if date.is_none() {
            let message = format!("`{}` takes a day of the calendar, without a time", self.name());
            return self.refuse(code::BAD_DATE, message, right());
        }
        date
    }

    /// "21 %", from 0 to 100.
    pub(super) fn percent(&self) -> Option<Percent> {
        let percent = self.quantity("%", parse_percent)?;
        if percent.ratio() < Decimal::ZERO || percent.ratio() > Decimal::ONE {
            let message = format!("`{}` cannot be {percent}", self.name());
            return self.refuse(code::PERCENT_RANGE, message, "accepted: 0 % to 100 %");
        }
        Some(percent)
    }

    /// Money as text, "15.00" or "15.00 EUR", zero or more; `currency` is the project's, if that was readable.
    pub(super) fn money(&self, currency: Option<&Currency>) -> Option<Money> {
        let text = match self.raw {
            DeValue::String(text) => text.trim(),
            DeValue::Integer(number) => return self.bare_money(number.as_str()),
            DeValue::Float(number) => return self.bare_money(number.as_str()),
            _ => return self.wrong_type("money in quotes", "\"15.00\""),
        };
        self.money_text(text, currency)
    }

    /// The same, from text that was already taken out of its value.
    pub(super) fn money_text(&self, text: &str, currency: Option<&Currency>) -> Option<Money> {
        let number = text.trim_end_matches(char::is_alphabetic);
        let unit = &text[number.len()..];
        if let Some(currency) = currency
            && !unit.is_empty()
            && unit != currency.code()
            && !number.trim().is_empty()
        {
            let message = format!("`{}` is in {unit}, but this project counts in {currency}", self.name());
            let help = format!("write the amount in {currency}, or change [project] currency");
            return self.refuse(code::WRONG_CURRENCY, message, help);
        }
        let amount = parse_decimal(number.trim(), "an amount such as \"15.00\"");
        let amount = amount.map_err(|error| self.unit_error(&error)).ok()?;
        if amount < Decimal::ZERO { self.negative() } else { Some(Money::new(amount)) }
    }

    fn bare_money<T>(&self, number: &str) -> Option<T> {
        let message = format!("`{}` is money and stands in quotes, so that it stays exact", self.name());
        self.refuse(code::BARE_MONEY, message, self.right(&format!("\"{number}\"")))
    }

    /// The table that stands here.
    pub(super) fn table(&self) -> Option<Table<'a>> {
        match self.raw {
            DeValue::Table(entries) => Some(Table::new(self.desk, self.path.clone(), self.start(), entries)),
            _ => self.wrong_type("a table of keys", "{ key = … }"),
        }
    }

    /// The same, where `example` shows what would do.
    pub(super) fn table_like(&self, example: &str) -> Option<Table<'a>> {
        match self.raw {
            DeValue::Table(_) => self.table(),
            _ => self.wrong_type("a table of keys", example),
        }
    }

    /// Where a table is said to begin: its key, or itself in a list.
    fn start(&self) -> usize {
        if self.key.is_some() { self.key_at } else { self.at }
    }

    /// The items of the list that stands here; `example` shows one.
    pub(super) fn items(&self, example: &str) -> Option<Vec<Self>> {
        let DeValue::Array(items) = self.raw else {
            return self.wrong_type("a list", &format!("[{example}]"));
        };
        let item = |item: &'a toml::Spanned<DeValue<'a>>| Self {
            desk: self.desk,
            path: self.path.clone(),
            key: None,
            key_at: item.span().start,
            at: item.span().start,
            raw: item.get_ref(),
        };
        Some(items.iter().map(item).collect())
    }
}

/// What a value is, for a person.
fn kind(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "text",
        DeValue::Integer(_) | DeValue::Float(_) => "a bare number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}

/// A bare share such as 0.21 is meant as 21 %; other numbers stand as they are.
fn in_percent(bare: &str) -> String {
    let share = bare.parse::<Decimal>().ok().filter(|n| *n > Decimal::ZERO && *n < Decimal::ONE);
    share.map_or_else(|| bare.to_owned(), |share| (share * Decimal::ONE_HUNDRED).normalize().to_string())
}
