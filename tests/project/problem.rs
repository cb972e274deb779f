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
    let entries = fs::read_dir(tests_folder(FOLDER)).unwrap();
    let names = entries.map(|entry| entry.unwrap().file_name().into_string().unwrap());
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
