//! `[array.feed]`: how an array is fed, and which ways exclude each other.

use std::collections::BTreeMap;

use toml::de::DeValue;

use super::code;
use super::model::{AmplifierChoice, Combining, DelayStyle, FeedSpec, HubPlace, Join, Power};
use super::stage;
use super::table::Table;
use super::value::Value;
use crate::problem::{Code, Place};
use crate::units::Decibel;

const KEYS: [&str; 13] = [
    "hub",
    "array-hub",
    "delay-style",
    "combining",
    "join",
    "branch",
    "delay",
    "run",
    "main",
    "control",
    "amplifier",
    "power",
    "reject",
];

/// Reads `[array.feed]` of `array`, and the places of its keys.
pub(super) fn read(array: &Table<'_>) -> (FeedSpec, BTreeMap<String, Place>) {
    let table = array.section("feed");
    let feed = spec(&table);
    let places = KEYS.iter().filter(|key| table.has(key));
    let places = places.filter_map(|key| Some(((*key).to_owned(), table.take(key)?.place()))).collect();
    check(array, &table, &feed);
    table.finish();
    (one_part_when_merged(&table, feed), places)
}

fn spec(table: &Table<'_>) -> FeedSpec {
    let part = |key: &'static str| {
        let instead = "the catalogue's default";
        table.or_later(key, instead, "no part named", Value::part)
    };
    FeedSpec {
        hub: hub(table, "hub"),
        array_hub: hub(table, "array-hub"),
        delay_style: table.or(
            "delay-style",
            DelayStyle::Separate,
            "a piece that can be measured and replaced",
            |v| v.choice(DelayStyle::CHOICES),
        ),
        combining: table
            .or("combining", Combining::ByCell, "each cell has its hub", |v| v.choice(Combining::CHOICES)),
        join: table.or("join", Join::Hub, "one line comes home", |v| v.choice(Join::CHOICES)),
        branch: part("branch"),
        delay: part("delay"),
        run: part("run"),
        main: part("main"),
        control: part("control"),
        amplifier: table.or(
            "amplifier",
            AmplifierChoice::Auto,
            "fitted if the noise budget asks for it",
            |v| v.choice(AmplifierChoice::CHOICES),
        ),
        power: table.or("power", Power::Control, "a pair of the control cable", |v| v.choice(Power::CHOICES)),
        reject: table.or(
            "reject",
            Decibel::new(20.0),
            "usual wanted rear rejection (common practice)",
            |v| v.positive("dB", Decibel::new(0.0), Decibel::parse),
        ),
    }
}

fn hub(table: &Table<'_>, key: &'static str) -> HubPlace {
    const WORDS: &[(&str, HubPlace)] = &[("centre", HubPlace::Centre), ("best", HubPlace::Best)];
    let Some(value) = table.take(key) else {
        table.desk.assume(
            table.path_of(key),
            "centre",
            "no place given; the centre of the group's feed points",
        );
        return HubPlace::Centre;
    };
    let place = match value.raw {
        DeValue::Table(_) => stage::array_point(&value).map(HubPlace::At),
        _ => value.choice(WORDS),
    };
    place.unwrap_or(HubPlace::Centre)
}

/// What in a feed excludes what.
fn check(array: &Table<'_>, table: &Table<'_>, feed: &FeedSpec) {
    let (rows, cells) = (stage::has_endfire(array), array.has("broadside"));
    let by_row = feed.combining == Combining::ByRow;
    let home = feed.join == Join::Receiver;
    let complain = |key: &'static str, wrong: bool, code: Code, message: &str, help: &str| {
        if let (true, Some(value)) = (wrong, table.take(key)) {
            value.desk.error(code, Some(value.key_at), message, help);
        }
    };
    complain(
        "hub",
        !rows && !cells,
        code::HUB_WITHOUT_STAGE,
        "one element alone has no hub: its line goes to the receiver",
        "leave `hub` out, or add a stage",
    );
    complain(
        "array-hub",
        by_row,
        code::ARRAY_HUB_BY_ROW,
        "combining = \"by-row\" has one hub only",
        "move it with `hub`, and leave `array-hub` out",
    );
    complain(
        "array-hub",
        !by_row && !(rows && cells),
        code::ARRAY_HUB_WITHOUT_CELLS,
        "an array hub joins cells, but this array is not a broadside of end-fire cells",
        "use `hub`, or give the array both stages",
    );
    complain(
        "array-hub",
        home && rows && cells && !by_row,
        code::HUB_AT_RECEIVER,
        "join = \"receiver\" puts the array hub at the receiver",
        "leave `array-hub` out",
    );
    complain(
        "hub",
        home && (rows != cells),
        code::HUB_AT_RECEIVER,
        "join = \"receiver\" puts the only hub of this array at the receiver",
        "leave `hub` out",
    );
    complain(
        "join",
        home && !rows && !cells,
        code::JOIN_WITHOUT_STAGE,
        "one element alone has nothing to join at the receiver",
        "leave `join` out, or add a stage",
    );
    complain(
        "join",
        home && by_row,
        code::BY_ROW_AT_RECEIVER,
        "combining = \"by-row\" has one hub in the field, so no group's line comes home",
        "choose one: join = \"hub\" or combining = \"by-cell\"",
    );
    complain(
        "combining",
        by_row && !(rows && cells),
        code::BY_ROW_WITHOUT_ROWS,
        "combining by row needs an end-fire stage and a broadside stage",
        "leave `combining` out, or give the array both stages",
    );
    complain(
        "delay-style",
        feed.delay_style == DelayStyle::Merged && by_row,
        code::MERGED_BY_ROW,
        "by row one delay serves all cells, so it cannot be part of a leg",
        "choose delay-style = \"separate\" or combining = \"by-cell\"",
    );
    complain(
        "delay",
        feed.delay_style == DelayStyle::Merged && two_parts(feed),
        code::MERGED_TWO_PARTS,
        "a merged delay is one piece with its branch, so both are of one part",
        "name the same part in `branch` and `delay`, or choose delay-style = \"separate\"",
    );
}

fn two_parts(feed: &FeedSpec) -> bool {
    matches!((&feed.branch, &feed.delay), (Some(branch), Some(delay)) if branch != delay)
}

/// With merged delays the part named for one serves the other too.
fn one_part_when_merged(table: &Table<'_>, mut feed: FeedSpec) -> FeedSpec {
    if feed.delay_style == DelayStyle::Merged {
        let one = feed.branch.clone().or(feed.delay.clone());
        if let (Some(part), true) = (&one, feed.branch.is_none() || feed.delay.is_none()) {
            let key = if feed.branch.is_none() { "branch" } else { "delay" };
            table.desk.assume_instead(
                &table.path_of(key),
                part,
                "a merged delay is one piece with its branch",
            );
        }
        feed.branch.clone_from(&one);
        feed.delay = one;
    }
    feed
}
