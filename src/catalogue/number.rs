//! Numbers as spreadsheets leave them: exact decimals from text, never by way of a binary float.

use rust_decimal::Decimal;

use crate::problem::Code;

use super::code;

/// What a column accepts.
#[derive(Clone, Copy, Debug)]
pub(super) struct NumberRule<'a> {
    /// Units that may stand behind the number, the column's own.
    pub(super) units: &'a [&'a str],
    /// Whether a thousand of these is conceivable, so that `1.250` has two readings.
    pub(super) grouping: Grouping,
}

/// Whether numbers of a column may be large enough for thousands separators.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Grouping {
    Possible,
    Absurd,
}

/// Where the cell comes from, which decides what a comma in it may be.
#[derive(Clone, Copy, Debug)]
pub(super) struct Origin {
    pub(super) separator: char,
    pub(super) quoted: bool,
}

/// Something in a number that was accepted, or the reason why it was not.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Remark {
    pub(super) code: Code,
    /// The rest of a sentence that starts with the name of the column.
    pub(super) message: String,
    pub(super) help: String,
}

impl Remark {
    pub(super) fn new(code: Code, message: impl Into<String>, help: impl Into<String>) -> Self {
        Self { code, message: message.into(), help: help.into() }
    }
}

/// The outcome of reading a number.
pub(super) struct Reading {
    /// The value, or why there is none.
    pub(super) value: Result<Decimal, Remark>,
    /// What was accepted though it is not as it should be.
    pub(super) accepted: Vec<Remark>,
    /// Whether typographic signs were put right.
    pub(super) typography: bool,
}

const ERROR_VALUES: [&str; 9] =
    ["#REF!", "#N/A", "#VALUE!", "#NAME?", "#DIV/0!", "#NUM!", "#NULL!", "#SPILL!", "#CALC!"];

/// The remark for a formula or an error value, if `text` is one.
pub(super) fn formula(text: &str) -> Option<Remark> {
    let is_error = ERROR_VALUES.iter().any(|value| text.eq_ignore_ascii_case(value));
    (is_error || text.starts_with('=') || text.starts_with('@')).then(|| {
        let what = if is_error { "the error of a formula" } else { "a formula, not its value" };
        let help = "paste the cells as values and save again";
        Remark::new(code::FORMULA, format!("holds {what}: `{text}`"), help)
    })
}

/// The text with typographic minus signs, quotes and spaces as plain ones, and without quotes around it.
pub(super) fn plain_signs(text: &str) -> String {
    let plain = |c| match c {
        '\u{2013}' | '\u{2212}' | '\u{2010}' | '\u{2011}' => '-',
        '\u{2018}' | '\u{2019}' | '\u{2032}' => '\'',
        '\u{201C}' | '\u{201D}' => '"',
        '\u{A0}' | '\u{2009}' | '\u{202F}' | '\u{2007}' => ' ',
        other => other,
    };
    let plain: String = text.chars().map(plain).collect();
    let bare = plain.trim().trim_matches('"').trim();
    // An apostrophe in front is how spreadsheets mark a number that is kept as text.
    bare.strip_prefix('\'').unwrap_or(bare).to_owned()
}

/// The remark for a cell that a spreadsheet turned into a time, date or the like.
pub(super) fn changed(text: &str) -> Remark {
    let message = format!("is \"{text}\": a spreadsheet changed this cell");
    Remark::new(code::CELL_CHANGED, message, "format the column as text and type it again")
}

/// Whether this looks like a time or date: `2:39`, `1/2`, `3-4`, `2-Jan`.
pub(super) fn looks_changed(text: &str) -> bool {
    let lower = text.to_ascii_lowercase();
    if lower.ends_with(" am") || lower.ends_with(" pm") {
        return true;
    }
    let parts: Vec<&str> = lower.split([':', '/', '-']).collect();
    let is_digits = |part: &&str| !part.is_empty() && part.bytes().all(|b| b.is_ascii_digit());
    let is_date_part = |part: &&str| is_digits(part) || month(part).is_some();
    parts.len() >= 2 && parts.iter().all(is_date_part) && parts.iter().any(is_digits)
}

/// The number of an English month name or its first three letters.
pub(super) fn month(word: &str) -> Option<u32> {
    const MONTHS: [&str; 12] = [
        "january",
        "february",
        "march",
        "april",
        "may",
        "june",
        "july",
        "august",
        "september",
        "october",
        "november",
        "december",
    ];
    let lower = word.to_ascii_lowercase();
    let found =
        MONTHS.iter().position(|name| lower == *name || (lower.len() == 3 && name.starts_with(&lower)));
    found.and_then(|index| u32::try_from(index + 1).ok())
}

/// Reads a number that is not blank.
pub(super) fn read(raw: &str, origin: Origin, rule: NumberRule<'_>) -> Reading {
    let text = plain_signs(raw);
    let mut accepted = Vec::new();
    let value = value(&text, origin, rule, &mut accepted);
    Reading { value, accepted, typography: text != raw.trim() }
}

fn value(
    text: &str,
    origin: Origin,
    rule: NumberRule<'_>,
    accepted: &mut Vec<Remark>,
) -> Result<Decimal, Remark> {
    if let Some(remark) = formula(text) {
        return Err(remark);
    }
    if text.contains('%') {
        let help = "write a plain number such as 0.2 for 20 %";
        return Err(Remark::new(code::PERCENT, format!("is \"{text}\", a percentage"), help));
    }
    if looks_changed(text) {
        return Err(changed(text));
    }
    if is_exponent(text) {
        let help = "format the column as a plain number or text and type it again";
        return Err(Remark::new(code::EXPONENT, format!("is \"{text}\", a number with an exponent"), help));
    }
    let digits = digits_of(text, rule, accepted)?;
    let plain = separators(digits, origin, rule.grouping, accepted)?;
    // Only digits, one sign and one point are left, so that nothing but their number can be wrong.
    Decimal::from_str_exact(plain.trim_start_matches('+')).map_err(|_| {
        let message = format!("is \"{text}\": more digits than can be kept exactly");
        Remark::new(code::NUMBER_TOO_LONG, message, "at most 28 digits are kept")
    })
}

fn is_exponent(text: &str) -> bool {
    text.to_ascii_lowercase().split_once('e').is_some_and(|(mantissa, exponent)| {
        let digits = |part: &str| !part.is_empty() && part.bytes().all(|b| b.is_ascii_digit());
        digits(exponent.trim_start_matches(['+', '-']))
            && mantissa.bytes().any(|b| b.is_ascii_digit())
            && mantissa.bytes().all(|b| b.is_ascii_digit() || matches!(b, b'.' | b',' | b'+' | b'-'))
    })
}

/// The number without the unit behind it.
fn digits_of<'t>(text: &'t str, rule: NumberRule<'_>, accepted: &mut Vec<Remark>) -> Result<&'t str, Remark> {
    let is_number = |c: char| c.is_ascii_digit() || matches!(c, '.' | ',' | '+' | '-' | ' ' | '\'');
    let end = text.find(|c| !is_number(c)).unwrap_or(text.len());
    // `100'` is a hundred feet, `1'250` a thousand and a quarter.
    let end = if text[..end].ends_with('\'') { end - 1 } else { end };
    let (number, unit) = (text[..end].trim(), text[end..].trim());
    if !number.bytes().any(|b| b.is_ascii_digit()) || unit.bytes().any(|b| b.is_ascii_digit()) {
        return Err(not_a_number(text));
    }
    if unit.is_empty() {
        return Ok(number);
    }
    if rule.units.contains(&unit) {
        let message = format!("is \"{text}\" with its unit, which was dropped");
        accepted.push(Remark::new(code::UNIT_IN_CELL, message, format!("write \"{number}\"")));
        return Ok(number);
    }
    let help = match rule.units.first() {
        Some(own) => format!("this column counts in {own}: write the number alone"),
        None => "this column takes a number alone".to_owned(),
    };
    Err(Remark::new(code::MIXED_UNITS, format!("is \"{text}\", with the unit \"{unit}\""), help))
}

fn not_a_number(text: &str) -> Remark {
    Remark::new(code::NOT_A_NUMBER, format!("is \"{text}\", not a number"), "write digits and one point")
}

/// The number with one point at most and nothing else than digits and a sign.
fn separators(
    number: &str,
    origin: Origin,
    grouping: Grouping,
    accepted: &mut Vec<Remark>,
) -> Result<String, Remark> {
    let (sign, body) = match number.strip_prefix(['-', '+']) {
        Some(body) => (&number[..1], body.trim_start()),
        None => ("", number),
    };
    let decimal = body.rfind(['.', ',']).filter(|at| is_decimal_mark(body, *at));
    let (whole, part) = decimal.map_or((body, None), |at| (&body[..at], Some(&body[at + 1..])));
    let groups: Vec<&str> = whole.split(['.', ',', ' ', '\'']).collect();
    let joined = groups.concat();
    let digits_only = |s: &str| s.bytes().all(|b| b.is_ascii_digit());
    let is_legal = digits_only(&joined)
        && part.is_none_or(digits_only)
        && (groups.len() == 1 || is_grouped(whole, &groups))
        && !(joined.is_empty() && part.is_none_or(str::is_empty));
    if !is_legal {
        return Err(not_a_number(number));
    }
    let plain = part.map_or_else(|| format!("{sign}{joined}"), |part| format!("{sign}{joined}.{part}"));
    if groups.len() > 1 {
        let message = format!("is \"{number}\" with thousands separators");
        accepted.push(Remark::new(code::THOUSANDS, message, format!("write \"{plain}\"")));
        return Ok(plain);
    }
    let mark = decimal.map(|at| &body[at..=at]);
    match (mark, part) {
        (Some(mark), Some(part))
            if grouping == Grouping::Possible && has_two_readings(joined.as_str(), part) =>
        {
            let other = format!("{sign}{joined}{part}");
            let message = format!("is \"{number}\": {plain} or {other}? (`{mark}` may part thousands)");
            let trimmed = plain.trim_end_matches('0').trim_end_matches('.');
            let longer = if trimmed == plain { format!("{plain}0") } else { trimmed.to_owned() };
            Err(Remark::new(code::THOUSANDS_AMBIGUOUS, message, format!("write \"{longer}\" or \"{other}\"")))
        }
        (Some(","), Some(part)) if origin.separator != ',' || (origin.quoted && part.len() <= 3) => {
            let message = format!("is \"{number}\" with a decimal comma");
            accepted.push(Remark::new(code::DECIMAL_COMMA, message, format!("write \"{plain}\"")));
            Ok(plain)
        }
        (Some(","), _) => Err(not_a_number(number)),
        _ => Ok(plain),
    }
}

/// Whether the mark at `at`, the last of the number, is the decimal one: not when it stands there several times,
/// which only thousands separators do.
fn is_decimal_mark(body: &str, at: usize) -> bool {
    body.matches(&body[at..=at]).count() == 1
}

/// Whether the whole part is one to three digits and then groups of three, all parted by the same sign.
fn is_grouped(whole: &str, groups: &[&str]) -> bool {
    let mut signs = whole.chars().filter(|c| !c.is_ascii_digit());
    let first = signs.next();
    let same = signs.all(|sign| Some(sign) == first);
    same && (1..=3).contains(&groups[0].len()) && groups[1..].iter().all(|group| group.len() == 3)
}

/// `1.250` may be one and a quarter or one thousand two hundred and fifty; `0.250` and `1.25` may not.
fn has_two_readings(whole: &str, part: &str) -> bool {
    part.len() == 3 && (1..=3).contains(&whole.len()) && !whole.starts_with('0')
}

#[cfg(test)]
mod tests {
    use super::*;

    const COMMA: Origin = Origin { separator: ',', quoted: false };
    const QUOTED: Origin = Origin { separator: ',', quoted: true };
    const SEMICOLON: Origin = Origin { separator: ';', quoted: false };
    const PRICE: NumberRule<'static> = NumberRule { units: &["m"], grouping: Grouping::Possible };

    fn good(text: &str, origin: Origin) -> (String, Vec<&'static str>) {
        let reading = read(text, origin, PRICE);
        let codes = reading.accepted.iter().map(|remark| remark.code.0).collect();
        (reading.value.unwrap().to_string(), codes)
    }

    fn bad(text: &str, origin: Origin) -> &'static str {
        read(text, origin, PRICE).value.unwrap_err().code.0
    }

    #[test]
    fn plain_numbers_stay_exact() {
        assert_eq!(good("12345678901234567890.12", COMMA).0, "12345678901234567890.12");
        assert_eq!(good("0.10", COMMA), ("0.10".to_owned(), vec![]));
        assert_eq!(good("-3", COMMA).0, "-3");
        assert_eq!(good("+3.5", COMMA).0, "3.5");
        assert_eq!(good(".5", COMMA).0, "0.5");
        assert_eq!(good("\u{201C}31.00\u{201D}", COMMA).0, "31.00");
        assert_eq!(good("'31.00", COMMA).0, "31.00");
        assert_eq!(bad("\u{2013}3 ft", COMMA), "csv-mixed-units");
        assert_eq!(bad("123456789012345678901234567890.12", COMMA), "csv-number-too-long");
    }

    #[test]
    fn separators_of_other_countries() {
        assert_eq!(good("31,00", QUOTED), ("31.00".to_owned(), vec!["csv-decimal-comma"]));
        assert_eq!(good("31,5", SEMICOLON), ("31.5".to_owned(), vec!["csv-decimal-comma"]));
        for text in ["1,250.00", "1.250,00", "1 250,00", "1'250.00", "1\u{A0}250.00", "1\u{2019}250.00"] {
            assert_eq!(good(text, QUOTED), ("1250.00".to_owned(), vec!["csv-thousands"]), "{text}");
        }
        assert_eq!(good("1,250,000", QUOTED).0, "1250000");
        assert_eq!(bad("1,250", QUOTED), "csv-thousands-ambiguous");
        assert_eq!(bad("1.250", COMMA), "csv-thousands-ambiguous");
        assert_eq!(good("0.250", COMMA).1, Vec::<&str>::new());
        assert_eq!(bad("12,50,00", QUOTED), "csv-not-a-number");
        assert_eq!(bad("1.2.3", COMMA), "csv-not-a-number");
    }

    #[test]
    fn everything_else_is_named() {
        assert_eq!(bad("=B2*1.2", COMMA), "csv-formula");
        assert_eq!(bad("#N/A", COMMA), "csv-formula");
        assert_eq!(bad("20%", COMMA), "csv-percent");
        assert_eq!(bad("1E5", COMMA), "csv-exponent");
        assert_eq!(bad("1/2", COMMA), "csv-cell-changed");
        assert_eq!(bad("2-Jan", COMMA), "csv-cell-changed");
        assert_eq!(bad("2:39:54 AM", COMMA), "csv-cell-changed");
        assert_eq!(bad("820 ft", COMMA), "csv-mixed-units");
        assert_eq!(bad("100'", COMMA), "csv-mixed-units");
        assert_eq!(bad("abc", COMMA), "csv-not-a-number");
        assert_eq!(good("250m", COMMA), ("250".to_owned(), vec!["csv-unit-in-cell"]));
    }
}
