//! Dates: YYYY-MM-DD and nothing else, because every other form has been misread by someone.

use chrono::{Days, NaiveDate};

use super::code;
use super::number::{self, Remark};

/// Reads YYYY-MM-DD; says what a spreadsheet made of it otherwise.
pub(super) fn read(text: &str) -> Result<NaiveDate, Remark> {
    if let Some(remark) = number::formula(text) {
        return Err(remark);
    }
    let is_iso = text.len() == 10 && text.is_ascii() && text.as_bytes()[4] == b'-';
    if let (true, Ok(day)) = (is_iso, NaiveDate::parse_from_str(text, "%Y-%m-%d")) {
        return Ok(day);
    }
    if let Some(remark) = serial(text) {
        return Err(remark);
    }
    let parts: Vec<&str> = text.split(['/', '-', '.', ' ', ',']).filter(|part| !part.is_empty()).collect();
    let readings = match parts[..] {
        [a, b, c] => readings(a, b, c),
        _ => Vec::new(),
    };
    Err(match readings[..] {
        [first, second] if first != second => {
            let spoken = |day: NaiveDate| day.format("%-d %B %Y").to_string();
            let message = format!("is \"{text}\": {} or {}?", spoken(first), spoken(second));
            Remark::new(code::DATE_AMBIGUOUS, message, format!("write {first} or {second}"))
        }
        [day, ..] => {
            let message = format!("is \"{text}\", a date in another form");
            Remark::new(code::DATE_FORMAT, message, format!("if it means {day}, write that"))
        }
        [] => {
            let message = format!("is \"{text}\", not a date");
            Remark::new(code::DATE_FORMAT, message, "write YYYY-MM-DD, such as 2026-03-02")
        }
    })
}

/// The day number that spreadsheets count from 1899-12-30.
fn serial(text: &str) -> Option<Remark> {
    let number: u64 = text.parse().ok().filter(|number| (20_000..80_000).contains(number))?;
    let day = NaiveDate::from_ymd_opt(1899, 12, 30)?.checked_add_days(Days::new(number))?;
    let message = format!("is \"{text}\", which looks like a spreadsheet day number ({day})");
    Some(Remark::new(code::DATE_SERIAL, message, format!("if it means {day}, write that")))
}

/// Every day that three parts can mean, earliest reading order first.
fn readings(a: &str, b: &str, c: &str) -> Vec<NaiveDate> {
    let year = |part: &str| match (part.parse::<i32>(), part.len()) {
        (Ok(year), 4) => Some(year),
        (Ok(year), 2) => Some(2000 + year),
        _ => None,
    };
    let month = |part: &str| number::month(part).or_else(|| part.parse().ok());
    let day = |part: &str| part.parse::<u32>().ok();
    let date = |y: &str, m: &str, d: &str| NaiveDate::from_ymd_opt(year(y)?, month(m)?, day(d)?);
    let candidates = if a.len() == 4 { [date(a, b, c), None] } else { [date(c, b, a), date(c, a, b)] };
    let mut found: Vec<NaiveDate> = candidates.into_iter().flatten().collect();
    found.dedup();
    found
}

#[cfg(test)]
mod tests {
    use super::read;

    #[test]
    fn only_one_form_is_read() {
        assert_eq!(read("2026-03-02").unwrap().to_string(), "2026-03-02");
        for (text, code) in [
            ("02/03/2026", "csv-date-ambiguous"),
            ("25/03/2026", "csv-date-format"),
            ("3-Feb-26", "csv-date-format"),
            ("46083", "csv-date-serial"),
            ("2026/03/02", "csv-date-format"),
            ("2026-02-30", "csv-date-format"),
            ("soon", "csv-date-format"),
            ("=TODAY()", "csv-formula"),
        ] {
            assert_eq!(read(text).unwrap_err().code.0, code, "{text}");
        }
    }

    #[test]
    fn a_day_number_is_named_as_its_date() {
        assert!(read("46083").unwrap_err().message.contains("2026-03-02"));
    }
}
