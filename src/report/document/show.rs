//! Numbers as the sheets print them.

use rust_decimal::Decimal;

use crate::catalogue::{Catalogue, Source};
use crate::cutting::ReelSource;
use crate::pricing::{BillLine, PartCutPlan};
use crate::takeoff::PieceRole;
use crate::units::{Angle, Bearing, Currency, Length, Money, VelocityFactor};

/// Metres without unit: two decimals, three where the millimetre matters.
pub(super) fn metres(length: Length) -> String {
    let places = if length.mm() % 10 == 0 { 2 } else { 3 };
    format!("{:.places$}", length.decimal_metres())
}

/// Metres of a tape: two decimals.
pub(super) fn tape(metres: f64) -> String {
    let text = format!("{metres:.2}");
    if text == "-0.00" { "0.00".to_owned() } else { text }
}

/// A quantity with its unit; plain number for things counted by the piece.
pub(super) fn quantity(value: Decimal, unit: &str) -> String {
    let value = value.normalize();
    if unit.is_empty() || unit == "each" { value.to_string() } else { format!("{value} {unit}") }
}

/// A velocity factor to four decimals: nobody measures a fifth.
pub(super) fn velocity(factor: VelocityFactor) -> String {
    factor.ratio().round_dp(4).normalize().to_string()
}

/// Money rounded to the currency's minor unit, without its code.
pub(super) fn money(value: Money, currency: &Currency) -> String {
    value.rounded(currency).to_string()
}

/// A bearing by the compass: true less declination.
pub(super) fn compass(bearing: Bearing, declination: Option<Angle>) -> Option<String> {
    declination.map(|east| degrees(Bearing::from_degrees(bearing.degrees() - east.degrees())))
}

/// Degrees without sign: "031.5".
pub(super) fn degrees(bearing: Bearing) -> String {
    // 359.96 would print as 360.0.
    let tenths = (bearing.degrees() * 10.0).round().rem_euclid(3_600.0);
    format!("{:05.1}", tenths / 10.0)
}

/// "W1-P1 to W1-P7, W2-P1": runs of three or more numbers are drawn together.
pub(super) fn names<'a>(list: impl IntoIterator<Item = &'a str>) -> String {
    let list: Vec<&str> = list.into_iter().collect();
    let mut out: Vec<String> = Vec::new();
    let mut at = 0;
    while at < list.len() {
        let mut end = at;
        while end + 1 < list.len() && follows(list[end], list[end + 1]) {
            end += 1;
        }
        if end - at >= 2 {
            out.push(format!("{} to {}", list[at], list[end]));
        } else {
            out.extend(list[at..=end].iter().map(|name| (*name).to_owned()));
        }
        at = end + 1;
    }
    out.join(", ")
}

fn follows(one: &str, next: &str) -> bool {
    let (Some((stem, n)), Some((other, m))) = (numbered(one), numbered(next)) else { return false };
    stem == other && n.checked_add(1) == Some(m)
}

fn numbered(name: &str) -> Option<(&str, u32)> {
    let stem = name.trim_end_matches(|c: char| c.is_ascii_digit());
    name[stem.len()..].parse().ok().map(|n| (stem, n))
}

/// Names with their numbers in counting order: "V1-R2" before "V1-R10".
pub(super) fn sorted<'a>(list: impl IntoIterator<Item = &'a str>) -> Vec<&'a str> {
    let mut list: Vec<&str> = list.into_iter().collect();
    list.sort_by_cached_key(|name| chunks(name));
    list
}

/// A name cut into text and numbers.
fn chunks(name: &str) -> Vec<(String, u64)> {
    let pieces = name.split_inclusive(|c: char| !c.is_ascii_digit());
    let mut out: Vec<(String, u64)> = Vec::new();
    for piece in pieces {
        let digits = piece.len() - piece.trim_start_matches(|c: char| c.is_ascii_digit()).len();
        out.push((String::new(), piece[..digits].parse().unwrap_or(0)));
        out.push((piece[digits..].to_owned(), 0));
    }
    out
}

/// The word of a role as a sheet prints it.
pub(super) fn role(role: PieceRole) -> String {
    role.word().replace('-', " ")
}

/// What is left of what is bought: of cut goods what the cutting plan leaves, because the saw takes its share.
pub(super) fn left(line: &BillLine, plans: &[PartCutPlan]) -> String {
    let Some(plan) = plans.iter().find(|plan| plan.part == line.part) else {
        return quantity(line.left, &line.unit);
    };
    let bought = plan.plan.reels.iter().filter(|reel| matches!(reel.source, ReelSource::Bought(_)));
    let left: Length = bought.map(|reel| reel.left).sum();
    format!("{} m", metres(left))
}

/// The text, or a dash where there is none.
pub(super) fn or_dash(text: &str) -> String {
    if text.is_empty() { "–".to_owned() } else { text.to_owned() }
}

/// "1 post", "3 posts".
pub(super) fn count(n: usize, one: &str, many: &str) -> String {
    if n == 1 { format!("1 {one}") } else { format!("{n} {many}") }
}

/// Whether a priced line rests on an offer of the shipped catalogue, whose prices are invented.
pub(super) fn is_invented(line: &BillLine, catalogue: &Catalogue) -> bool {
    let offer = line.offer.as_ref().and_then(|id| catalogue.offers.get(id));
    line.pack_price.is_some() && offer.is_some_and(|offer| offer.source == Source::BuiltIn)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn runs_of_names_are_drawn_together() {
        assert_eq!(names(["W1-P1", "W1-P2", "W1-P3", "W2-P1", "W2-P2"]), "W1-P1 to W1-P3, W2-P1, W2-P2");
        assert_eq!(names(["RX"]), "RX");
    }

    #[test]
    fn names_are_counted_not_spelt() {
        assert_eq!(
            names(sorted(["V1-R1", "V1-R10", "V1-R2", "V1-R3", "V1-R9"])),
            "V1-R1 to V1-R3, V1-R9, V1-R10"
        );
        assert_eq!(sorted(["D10", "D2", "C-M1", "B1"]), ["B1", "C-M1", "D2", "D10"]);
    }

    #[test]
    fn bearings_stay_below_a_full_turn() {
        assert_eq!(degrees(Bearing::from_degrees(359.97)), "000.0");
        assert_eq!(compass(Bearing::from_degrees(3.0), Some(Angle::from_degrees(7.2))).unwrap(), "355.8");
    }

    #[test]
    fn lengths_keep_the_millimetre_only_where_it_says_something() {
        assert_eq!([metres(Length::from_mm(68_700)), metres(Length::from_mm(14_106))], ["68.70", "14.106"]);
    }
}
