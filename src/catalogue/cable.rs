//! Rows of `cables.csv`.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use crate::units::{Diameter, Force, Frequency, VelocityFactor};

use super::code;
use super::model::{Cable, VelocityData};
use super::number::{self, Grouping, NumberRule};
use super::row::{Case, Least, RowReader};
use super::table::{Need, Schema};

pub(super) const SCHEMA: Schema = Schema {
    file: "cables.csv",
    columns: &[
        ("part", Need::Needed),
        ("z0_ohm", Need::Optional),
        ("velocity_factor", Need::Optional),
        ("loss_db_per_100m", Need::Optional),
        ("conductor", Need::Optional),
        ("diameter_mm", Need::Optional),
        ("mass_kg_per_km", Need::Optional),
        ("breaking_n", Need::Optional),
        ("note", Need::Optional),
    ],
};

const OHM: NumberRule<'static> = NumberRule { units: &["ohm", "Ω", "ohms"], grouping: Grouping::Absurd };
const MM: NumberRule<'static> = NumberRule { units: &["mm"], grouping: Grouping::Absurd };
const MASS: NumberRule<'static> = NumberRule { units: &["kg/km"], grouping: Grouping::Possible };
const NEWTON: NumberRule<'static> = NumberRule { units: &["N"], grouping: Grouping::Possible };
const RATIO: NumberRule<'static> = NumberRule { units: &[], grouping: Grouping::Absurd };

/// Reads a row; `None` when it has no usable id.
pub(super) fn read(row: &mut RowReader<'_>) -> Option<Cable> {
    let part = row.id("part", Case::Lower);
    let diameter = row.number("diameter_mm", MM, Least::AboveZero);
    let diameter = diameter.and_then(|mm| mm.saturating_mul(Decimal::ONE_THOUSAND).round().to_i64());
    let breaking = row.number("breaking_n", NEWTON, Least::AboveZero);
    Some(Cable {
        z0_ohm: row.number("z0_ohm", OHM, Least::AboveZero),
        velocity_factor: velocity(row),
        loss: points(row, "loss_db_per_100m", "dB"),
        conductor: row.text("conductor"),
        diameter: diameter.map(Diameter::from_um),
        mass_kg_per_km: row.number("mass_kg_per_km", MASS, Least::AboveZero),
        breaking: breaking.and_then(|newtons| newtons.to_f64()).map(Force::new),
        note: row.text("note"),
        place: row.row_place(),
        // Last, so that a bad id does not hide what else is wrong.
        part: part?,
    })
}

fn velocity(row: &mut RowReader<'_>) -> VelocityData {
    const NAME: &str = "velocity_factor";
    let text = row.trimmed(NAME);
    if text.is_empty() {
        return VelocityData::None;
    }
    if !text.contains(':') {
        let ratio = row.number(NAME, RATIO, Least::AboveZero);
        return ratio.and_then(|ratio| factor(row, ratio)).map_or(VelocityData::None, VelocityData::One);
    }
    let mut list = Vec::new();
    for (frequency, ratio) in points(row, NAME, "factor") {
        if let Some(factor) = factor(row, ratio) {
            list.push((frequency, factor));
        }
    }
    VelocityData::Points(list)
}

fn factor(row: &mut RowReader<'_>, ratio: Decimal) -> Option<VelocityFactor> {
    let found = VelocityFactor::new(ratio);
    if found.is_none() && ratio > Decimal::TWO && ratio <= Decimal::ONE_HUNDRED {
        let meant = (ratio / Decimal::ONE_HUNDRED).normalize();
        let message = format!("is {ratio}: a velocity factor in percent");
        row.error("velocity_factor", code::VF_PERCENT, &message, format!("VF {ratio}? write {meant}"));
    } else if found.is_none() {
        let message = format!("is {ratio}: nothing on a cable is faster than light");
        row.error(
            "velocity_factor",
            code::VF_RANGE,
            &message,
            "a velocity factor lies above 0 and at most at 1",
        );
    }
    found
}

/// `MHz:value` pairs, ascending; empty when blank or wrong, which is then reported.
fn points(row: &mut RowReader<'_>, name: &str, what: &str) -> Vec<(Frequency, Decimal)> {
    let text = row.trimmed(name);
    if let Some(remark) = number::formula(&text) {
        row.error(name, remark.code, &remark.message, remark.help);
        return Vec::new();
    }
    let pairs: Vec<&str> = text.split_whitespace().collect();
    let has_point = |mhz: &str| mhz.contains(['.', ',']);
    let is_time = |pair: &&str| {
        pair.matches(':').count() > 1 || pair.eq_ignore_ascii_case("am") || pair.eq_ignore_ascii_case("pm")
    };
    let is_lone_time =
        matches!(pairs[..], [pair] if pair.split_once(':').is_some_and(|(mhz, _)| !has_point(mhz)));
    if is_lone_time || pairs.iter().any(is_time) {
        let remark = number::changed(&text);
        let help = format!("{}; one pair alone as 1.80:3.10", remark.help);
        row.error(name, remark.code, &remark.message, help);
        return Vec::new();
    }
    let mut list: Vec<(Frequency, Decimal)> = Vec::new();
    for pair in pairs {
        let Some((mhz, value)) =
            pair.split_once(':').filter(|(mhz, value)| !mhz.is_empty() && !value.is_empty())
        else {
            let message = format!("has \"{pair}\", which is not MHz:{what}");
            row.error(
                name,
                code::BAD_POINTS,
                &message,
                format!("write MHz:{what} pairs parted by spaces, such as 1.80:3.10"),
            );
            return Vec::new();
        };
        let mhz = row.number_in(name, mhz, RATIO, Least::AboveZero);
        let value = row.number_in(name, value, RATIO, Least::AboveZero);
        let (Some(mhz), Some(value)) = (mhz, value) else { return Vec::new() };
        let hz = mhz.saturating_mul(Decimal::from(1_000_000)).round().to_u64().unwrap_or(u64::MAX);
        let frequency = Frequency::from_hz(hz);
        if list.last().is_some_and(|(before, _)| *before >= frequency) {
            let message =
                format!("has {mhz} MHz after {} MHz", list[list.len() - 1].0.decimal_mhz().normalize());
            row.error(
                name,
                code::POINTS_ORDER,
                &message,
                "put the points in ascending order, each frequency once",
            );
            return Vec::new();
        }
        list.push((frequency, value));
    }
    list
}
