//! One bad project for each problem code, with the exact words that a person gets.
//!
//! `tests/problems/project/<code>.toml` is read, with `<code>.csv` as the stock on hand when there is one, and
//! compared with `<code>.expected`. `SNAPSHOTS=overwrite` writes the latter anew.

use std::collections::BTreeSet;
use std::fs;

use arraywright::project::{self, code};

use crate::support::{codes, one_wire, shown, tests_folder};

const FOLDER: &str = "problems/project";

/// The names in the fixture folder that end in `ending`, without it.
fn fixtures(ending: &str) -> BTreeSet<String> {
    let entries = fs::read_dir(tests_folder(FOLDER)).expect("the fixture folder");
    let names = entries.filter_map(|entry| entry.ok()?.file_name().into_string().ok());
    names.filter_map(|name| name.strip_suffix(ending).map(str::to_owned)).collect()
}

#[test]
fn every_problem_code_has_a_fixture() {
    let codes: BTreeSet<String> = code::ALL.iter().map(ToString::to_string).collect();
    assert_eq!(codes.len(), code::ALL.len(), "two codes of one name");
    assert_eq!(fixtures(".toml"), codes);
    assert_eq!(fixtures(".expected"), codes);
}

#[test]
fn problems_are_worded_as_expected() {
    let mut different = Vec::new();
    for name in fixtures(".toml") {
        let read = |ending: &str| fs::read_to_string(tests_folder(FOLDER).join(format!("{name}{ending}")));
        let (file, csv) = (format!("{name}.toml"), read(".csv").ok());
        let stock = csv.as_deref().map(|text| ("on-hand.csv", text));
        let (project, problems) = project::read(&file, &read(".toml").unwrap(), stock);
        assert_eq!(project.is_none(), problems.has_errors(), "{name}");
        assert!(problems.sorted().iter().any(|problem| problem.code.0 == name), "{name} is not reported");
        let now = shown(&problems);
        if std::env::var("SNAPSHOTS").is_ok_and(|wish| wish == "overwrite") {
            fs::write(tests_folder(FOLDER).join(format!("{name}.expected")), &now).unwrap();
        } else if read(".expected").ok().as_deref() != Some(&now) {
            different.push(format!("--- {name}\n{now}"));
        }
    }
    assert!(different.is_empty(), "{}", different.join("\n"));
}

#[test]
fn ten_mistakes_are_reported_in_one_pass() {
    let text = r#"[project]
title = "Ten mistakes"
currency = "eur"
estimated = "2026-10-01"
frequency = 1.83

[site]
terain = "open"
receiver = { east = "0 m" }

[[array]]
name = "west"
heading = "270"
element.wire = { length = "176,0 m", height = 2.5 }
echelon = { stagger = 60 ft }
broadside = { spacing = "400 feet", delay = 0.94 }
"#;
    let found: BTreeSet<&str> = codes(text).into_iter().collect();
    let expected = [
        "bad-currency",
        "bad-date",
        "bare-number",
        "unknown-key",
        "missing-key",
        "no-unit",
        "decimal-comma",
        "syntax",
        "unknown-unit",
        "broadside-delay",
    ];
    assert_eq!(found, BTreeSet::from(expected));
    assert_eq!(codes(text).len(), 11, "two bare numbers, one of each of the others");
}

#[test]
fn what_a_broken_line_said_is_not_missed_again() {
    assert_eq!(codes(&one_wire("").replace("\"270 deg\"", "270 deg")), ["syntax"]);
    assert_eq!(codes(&one_wire("").replace("{ length = \"176 m\" }", "{ length = 176 m }")), ["syntax"]);
}

#[test]
fn lines_and_columns_count_characters() {
    let text = one_wire("").replace("\"One wire\"", "\"Südfeld → Küste\"\nalso = [\"3,5 MHz\"] # Übung");
    let (_, problems) = project::read("field.toml", &text, None);
    let place = problems.sorted()[0].place.clone().unwrap();
    assert_eq!((place.line, place.column), (3, 9));
}

#[test]
fn rows_of_the_stock_table_are_reported_at_their_place() {
    let csv = "part,quantity,length\nplug,4,\nreel,,\"12,5\"\n,3,\nrope,1,2\nbox,2.5,\nwire,,-4 m\n";
    let (_, problems) = project::read("field.toml", &one_wire(""), Some(("on-hand.csv", csv)));
    let found = problems.sorted().into_iter().map(|problem| {
        let place = problem.place.as_ref().unwrap();
        (problem.code.0, place.line, place.column)
    });
    let expected = [
        ("decimal-comma", 3, 8),
        ("missing-key", 4, 1),
        ("quantity-or-length", 5, 1),
        ("not-whole", 6, 5),
        ("not-positive", 7, 7),
    ];
    assert_eq!(found.collect::<Vec<_>>(), expected);
}
