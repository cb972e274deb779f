//! `[array.feed]`: how an array is fed, and which ways exclude each other.

use std::collections::BTreeMap;

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
    let why = "no place given; the centre of the group's feed points";
    table.or_said(key, HubPlace::Centre, "centre", why, |value| {
        if value.raw.is_table() { stage::array_point(value).map(HubPlace::At) } else { value.choice(WORDS) }
    })
}

/// What in a feed excludes what.
fn check(array: &Table<'_>, table: &Table<'_>, feed: &FeedSpec) {
    let (rows, cells) = (stage::has_endfire(array), array.has("broadside"));
    let by_row = feed.combining == Combining::ByRow;
    let home = feed.join == Join::Receiver;
    let merged = feed.delay_style == DelayStyle::Merged;
    let mut wrong: Vec<(&'static str, Clash)> = Vec::new();
    if !rows && !cells {
        wrong.extend([("hub", NO_HUB), ("join", NOTHING_TO_JOIN)]);
    } else if home && (rows != cells || by_row) {
        wrong.push(("hub", ONLY_HUB_AT_RECEIVER));
    }
    if by_row {
        wrong.push(("array-hub", ONE_HUB));
    } else if !(rows && cells) {
        wrong.push(("array-hub", NO_CELLS));
    } else if home {
        wrong.push(("array-hub", ARRAY_HUB_AT_RECEIVER));
    }
    if by_row && !(rows && cells) {
        wrong.push(("combining", NO_ROWS));
    }
    if merged && by_row {
        wrong.push(("delay-style", ONE_DELAY));
    }
    if merged && two_parts(feed) {
        wrong.push(("delay", TWO_PARTS));
    }
    for (key, clash) in wrong {
        let stands = key != "join" || home;
        if let (Some(value), true) = (table.take(key), stands) {
            table.desk.error(clash.code, Some(value.key_at), clash.message, clash.help);
        }
    }
}

/// Two ways of feeding that exclude each other.
struct Clash {
    code: Code,
    message: &'static str,
    help: &'static str,
}

const NO_HUB: Clash = Clash {
    code: code::HUB_WITHOUT_STAGE,
    message: "one element alone has no hub: its line goes to the receiver",
    help: "leave `hub` out, or add a stage",
};
const NOTHING_TO_JOIN: Clash = Clash {
    code: code::JOIN_WITHOUT_STAGE,
    message: "one element alone has nothing to join at the receiver",
    help: "leave `join` out, or add a stage",
};
const ONLY_HUB_AT_RECEIVER: Clash = Clash {
    code: code::HUB_AT_RECEIVER,
    message: "join = \"receiver\" puts the only hub of this array at the receiver",
    help: "leave `hub` out",
};
const ONE_HUB: Clash = Clash {
    code: code::ARRAY_HUB_BY_ROW,
    message: "combining = \"by-row\" has one hub only",
    help: "move it with `hub`, and leave `array-hub` out",
};
const NO_CELLS: Clash = Clash {
    code: code::ARRAY_HUB_WITHOUT_CELLS,
    message: "an array hub joins cells, but this array is not a broadside of end-fire cells",
    help: "use `hub`, or give the array both stages",
};
const ARRAY_HUB_AT_RECEIVER: Clash = Clash {
    code: code::HUB_AT_RECEIVER,
    message: "join = \"receiver\" puts the array hub at the receiver",
    help: "leave `array-hub` out",
};
const NO_ROWS: Clash = Clash {
    code: code::BY_ROW_WITHOUT_ROWS,
    message: "combining by row needs an end-fire stage and a broadside stage",
    help: "leave `combining` out, or give the array both stages",
};
const ONE_DELAY: Clash = Clash {
    code: code::MERGED_BY_ROW,
    message: "by row one delay serves all cells, so it cannot be part of a leg",
    help: "choose delay-style = \"separate\" or combining = \"by-cell\"",
};
const TWO_PARTS: Clash = Clash {
    code: code::MERGED_TWO_PARTS,
    message: "a merged delay is one piece with its branch, so both are of one part",
    help: "name the same part in `branch` and `delay`, or choose delay-style = \"separate\"",
};

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
