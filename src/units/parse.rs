//! Strict reading of numbers with units: every refusal says why and what would be right.

use std::fmt;

use rust_decimal::Decimal;

/// Why a quantity could not be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum UnitError {
    /// A number stands there without its unit.
    NoUnit {
        /// The text as written.
        given: String,
        /// What would be accepted.
        wanted: &'static str,
    },
    /// A comma where the decimal point belongs.
    DecimalComma {
        /// The text as written.
        given: String,
    },
    /// The unit is not one of those that this quantity takes.
    UnknownUnit {
        /// The unit as written.
        unit: String,
        /// The units that are accepted.
        accepted: String,
        /// The nearest accepted unit, if one is near.
        near: Option<String>,
    },
    /// No number can be read.
    NotANumber {
        /// The text as written.
        given: String,
        /// What would be accepted.
        wanted: &'static str,
    },
    /// "nan", "inf" and the like.
    NotFinite {
        /// The text as written.
        given: String,
    },
    /// A number beyond anything that fits on a site.
    TooLarge {
        /// The text as written.
        given: String,
    },
}

impl fmt::Display for UnitError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoUnit { given, .. } => write!(out, "\"{given}\" has no unit"),
            Self::DecimalComma { given } => write!(out, "\"{given}\" has a decimal comma"),
            Self::UnknownUnit { unit, .. } => write!(out, "the unit `{unit}` is not known here"),
            Self::NotANumber { given, .. } => write!(out, "\"{given}\" cannot be read"),
            Self::NotFinite { given } => write!(out, "\"{given}\" is not a finite number"),
            Self::TooLarge { given } => {
                write!(out, "\"{given}\" is larger than anything that fits on a site")
            }
        }
    }
}

impl std::error::Error for UnitError {}

impl UnitError {
    /// What would be right, in one sentence.
    pub fn help(&self) -> String {
        match self {
            Self::NoUnit { wanted, .. } | Self::NotANumber { wanted, .. } => format!("write {wanted}"),
            Self::DecimalComma { given } => {
                format!("decimals take a point: write \"{}\"", given.replacen(',', ".", 1))
            }
            Self::UnknownUnit { accepted, near: Some(near), .. } => {
                format!("did you mean `{near}`? accepted: {accepted}")
            }
            Self::UnknownUnit { accepted, near: None, .. } => format!("accepted: {accepted}"),
            Self::NotFinite { .. } => "write a number in digits".to_owned(),
            Self::TooLarge { .. } => "check the number and its unit".to_owned(),
        }
    }
}

/// A percentage as a decimal ratio: "21 %" is 0.21.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Default)]
pub struct Percent {
    ratio: Decimal,
}

impl Percent {
    /// A ratio: 0.21 for 21 %.
    pub const fn from_ratio(ratio: Decimal) -> Self {
        Self { ratio }
    }

    /// The decimal ratio.
    pub const fn ratio(self) -> Decimal {
        self.ratio
    }
}

impl fmt::Display for Percent {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{} %", (self.ratio * Decimal::ONE_HUNDRED).normalize())
    }
}

/// Reads "21 %" or "21%".
///
/// # Errors
/// When the percent sign or the number is missing.
pub fn parse_percent(text: &str) -> Result<Percent, UnitError> {
    const UNITS: [(&str, Decimal); 1] = [("%", Decimal::ONE)];
    let hundredths = split_quantity(text, &UNITS, "a percentage such as \"21 %\"")?;
    Ok(Percent { ratio: hundredths / Decimal::ONE_HUNDRED })
}

/// Reads a plain decimal number: digits, one point, an optional sign; no exponent, no separators.
///
/// # Errors
/// When it is anything else.
pub fn parse_decimal(text: &str, wanted: &'static str) -> Result<Decimal, UnitError> {
    let trimmed = text.trim();
    let bare = trimmed.trim_start_matches(['-', '+']).to_ascii_lowercase();
    if matches!(bare.as_str(), "nan" | "inf" | "infinity") {
        return Err(UnitError::NotFinite { given: text.to_owned() });
    }
    if is_decimal_comma(trimmed) {
        return Err(UnitError::DecimalComma { given: text.to_owned() });
    }
    let plain = !bare.is_empty()
        && bare.bytes().all(|b| b.is_ascii_digit() || b == b'.')
        && bare.bytes().any(|b| b.is_ascii_digit());
    match Decimal::from_str_exact(trimmed.trim_start_matches('+')) {
        Ok(value) if plain => Ok(value),
        Err(rust_decimal::Error::ExceedsMaximumPossibleValue) => {
            Err(UnitError::TooLarge { given: text.to_owned() })
        }
        _ => Err(UnitError::NotANumber { given: text.to_owned(), wanted }),
    }
}

fn is_decimal_comma(number: &str) -> bool {
    number.split_once(',').is_some_and(|(whole, part)| {
        whole.trim_start_matches('-').bytes().all(|b| b.is_ascii_digit())
            && !part.is_empty()
            && part.bytes().all(|b| b.is_ascii_digit())
    })
}

/// Reads one or more "number unit" pairs and returns their sum in the base that `units` scale to.
pub(super) fn split_quantity(
    text: &str,
    units: &[(&str, Decimal)],
    wanted: &'static str,
) -> Result<Decimal, UnitError> {
    let mut rest = text.trim();
    let mut sum = Decimal::ZERO;
    let mut negative = false;
    let mut first = true;
    while !rest.is_empty() || first {
        let (number, unit, tail) = next_pair(rest);
        if number.is_empty() {
            return Err(no_number(text, wanted));
        }
        if is_decimal_comma(number) {
            return Err(UnitError::DecimalComma { given: text.to_owned() });
        }
        let value = parse_decimal(number, wanted)
            .map_err(|_| UnitError::NotANumber { given: text.to_owned(), wanted })?;
        if unit.is_empty() {
            return Err(UnitError::NoUnit { given: text.to_owned(), wanted });
        }
        let scale = units.iter().find(|(name, _)| *name == unit).map(|(_, scale)| *scale);
        let Some(scale) = scale else { return Err(unknown_unit(unit, units)) };
        negative |= first && value.is_sign_negative();
        if !first && value.is_sign_negative() {
            return Err(UnitError::NotANumber { given: text.to_owned(), wanted });
        }
        let part = value.abs().checked_mul(scale);
        let total = part.and_then(|part| sum.checked_add(part));
        sum = total.ok_or_else(|| UnitError::TooLarge { given: text.to_owned() })?;
        rest = tail;
        first = false;
    }
    Ok(if negative { -sum } else { sum })
}

/// Splits off the next number, its unit and what follows.
fn next_pair(text: &str) -> (&str, &str, &str) {
    let is_number = |c: char| c.is_ascii_digit() || matches!(c, '.' | ',' | '-' | '+' | '_');
    let end = text.find(|c| !is_number(c)).unwrap_or(text.len());
    let (number, rest) = text.split_at(end);
    let rest = rest.trim_start();
    let end = rest.find(|c: char| c.is_ascii_digit()).unwrap_or(rest.len());
    let (unit, tail) = rest.split_at(end);
    (number, unit.trim(), tail)
}

fn no_number(text: &str, wanted: &'static str) -> UnitError {
    let lower = text.trim().trim_start_matches(['-', '+']).to_ascii_lowercase();
    if lower.starts_with("nan") || lower.starts_with("inf") {
        UnitError::NotFinite { given: text.to_owned() }
    } else {
        UnitError::NotANumber { given: text.to_owned(), wanted }
    }
}

fn unknown_unit(unit: &str, units: &[(&str, Decimal)]) -> UnitError {
    let lower = unit.to_lowercase();
    let near = match lower.as_str() {
        "'" | "feet" | "foot" => Some("ft"),
        "\"" | "inch" | "inches" => Some("in"),
        "meter" | "metre" | "meters" | "metres" => Some("m"),
        "degree" | "degrees" | "°" => Some("deg"),
        "ohms" | "ω" | "Ω" => Some("ohm"),
        other => units.iter().map(|(name, _)| *name).find(|name| name.eq_ignore_ascii_case(other)),
    };
    let accepted = units.iter().map(|(name, _)| format!("`{name}`")).collect::<Vec<_>>().join(", ");
    let near = near.filter(|near| units.iter().any(|(name, _)| name == near)).map(str::to_owned);
    UnitError::UnknownUnit { unit: unit.to_owned(), accepted, near }
}

#[cfg(test)]
mod tests {
    use super::super::Length;
    use super::*;

    #[test]
    fn a_decimal_comma_is_named() {
        let error = Length::parse("2,5 m").unwrap_err();
        assert_eq!(error, UnitError::DecimalComma { given: "2,5 m".to_owned() });
        assert_eq!(error.help(), "decimals take a point: write \"2.5 m\"");
    }

    #[test]
    fn refusals_say_what_is_wrong() {
        assert!(matches!(Length::parse("18.3"), Err(UnitError::NoUnit { .. })));
        assert!(matches!(Length::parse("18.3 MHz"), Err(UnitError::UnknownUnit { .. })));
        assert!(matches!(Length::parse("nan m"), Err(UnitError::NotFinite { .. })));
        assert!(matches!(Length::parse("1e3 m"), Err(UnitError::UnknownUnit { .. })));
        assert!(matches!(Length::parse(""), Err(UnitError::NotANumber { .. })));
        assert!(matches!(Length::parse("1.2.3 m"), Err(UnitError::NotANumber { .. })));
        assert!(matches!(Length::parse("99999999999 km"), Err(UnitError::TooLarge { .. })));
    }

    #[test]
    fn percentages_need_their_sign() {
        assert_eq!(parse_percent("21 %").unwrap().ratio(), Decimal::new(21, 2));
        assert!(parse_percent("0.21").is_err());
    }
}
