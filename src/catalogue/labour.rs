//! Rows of `labour.csv` and `terrain.csv`.

use std::collections::BTreeMap;

use rust_decimal::Decimal;

use crate::problem::nearest;

use super::code;
use super::model::{Task, TerrainRow};
use super::number::{Grouping, NumberRule};
use super::row::{Case, Least, RowReader};
use super::table::{Need, Schema};

pub(super) const TASKS: Schema = Schema {
    file: "labour.csv",
    columns: &[
        ("task", Need::Needed),
        ("what", Need::Needed),
        ("unit", Need::Needed),
        ("low_h", Need::Needed),
        ("likely_h", Need::Needed),
        ("high_h", Need::Needed),
        ("terrain", Need::Optional),
        ("crew_min", Need::Optional),
        ("skill", Need::Optional),
        ("tools", Need::Optional),
        ("weather", Need::Optional),
        ("after", Need::Optional),
        ("learns", Need::Optional),
        ("note", Need::Optional),
    ],
};

pub(super) const TERRAIN: Schema = Schema {
    file: "terrain.csv",
    columns: &[
        ("class", Need::Needed),
        ("walk", Need::Optional),
        ("dig", Need::Optional),
        ("rod", Need::Optional),
        ("clear", Need::Optional),
        ("tree", Need::Optional),
        ("route_factor", Need::Optional),
    ],
};

/// The multipliers that a task can name.
const MULTIPLIERS: [&str; 5] = ["walk", "dig", "rod", "clear", "tree"];
const HOURS: NumberRule<'static> = NumberRule { units: &["h"], grouping: Grouping::Absurd };
const RATIO: NumberRule<'static> = NumberRule { units: &[], grouping: Grouping::Absurd };

/// Reads a row of `labour.csv`; `None` when it has no usable id.
pub(super) fn task(row: &mut RowReader<'_>) -> Option<Task> {
    let id = row.id("task", Case::AsWritten);
    let what = row.text("what");
    if what.is_empty() {
        row.needed_word("what");
    }
    let unit = row.needed_word("unit");
    let hours = ["low_h", "likely_h", "high_h"].map(|name| row.needed_number(name, HOURS, Least::Zero));
    if let [Some(low), Some(likely), Some(high)] = hours
        && !(low <= likely && likely <= high)
    {
        let message = format!("is {low}, likely {likely}, high {high}: out of order");
        row.error("low_h", code::HOURS_ORDER, &message, "low is at most likely, likely at most high");
    }
    let crew = row.whole("crew_min", RATIO, Least::AboveZero);
    Some(Task {
        what,
        unit,
        hours: hours.map(Option::unwrap_or_default),
        terrain: multiplier(row),
        crew_min: crew.and_then(|crew| u32::try_from(crew).ok()).unwrap_or(1),
        skill: row.text("skill"),
        tools: row.text("tools"),
        weather: row.word("weather"),
        after: row.word("after"),
        learns: row.yes_no("learns"),
        note: row.text("note"),
        // Last, so that a bad id does not hide what else is wrong.
        id: id?,
    })
}

fn multiplier(row: &mut RowReader<'_>) -> String {
    let word = row.word("terrain").to_lowercase();
    if word.is_empty() || word == "none" {
        return "none".to_owned();
    }
    if !MULTIPLIERS.contains(&word.as_str()) {
        let help = match nearest(&word, MULTIPLIERS) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("use {} or none", MULTIPLIERS.join(", ")),
        };
        let message = format!("is \"{word}\", which is no column of terrain.csv");
        row.error("terrain", code::TERRAIN_WORD, &message, help);
    }
    word
}

/// The tasks that the text of `after` names: parted by spaces, alternatives by `/`.
pub(super) fn prerequisites(after: &str) -> impl Iterator<Item = &str> {
    after.split([' ', '/', ',', ';']).filter(|id| !id.is_empty())
}

/// Reads a row of `terrain.csv`; a blank multiplier is 1.
pub(super) fn terrain(row: &mut RowReader<'_>) -> Option<TerrainRow> {
    let class = row.id("class", Case::Lower);
    let mut factors = BTreeMap::new();
    for name in MULTIPLIERS {
        let factor = row.number(name, RATIO, Least::Zero).unwrap_or(Decimal::ONE);
        factors.insert(name.to_owned(), factor);
    }
    let route_factor = row.number("route_factor", RATIO, Least::AboveZero).unwrap_or(Decimal::ONE);
    Some(TerrainRow { class: class?, factors, route_factor })
}
