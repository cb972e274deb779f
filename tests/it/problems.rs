//! Problems that need more than the file: one project a code, each with its exact words.

use std::collections::BTreeSet;
use std::path::Path;

use crate::support::{program, repository};

/// The codes of stages after reading.
fn codes() -> BTreeSet<&'static str> {
    let all = [
        arraywright::plan::cable::code::ALL,
        arraywright::design::code::ALL,
        arraywright::pricing::code::ALL,
    ];
    all.iter().flat_map(|list| list.iter()).map(|code| code.0).collect()
}

fn fixtures() -> BTreeSet<String> {
    let entries = std::fs::read_dir(repository("tests/problems/plan")).unwrap();
    entries.map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect()
}

fn said_about(folder: &Path) -> String {
    let extra = std::fs::read_to_string(folder.join("arguments")).unwrap_or_default();
    let ran =
        program().args(["check", "project.toml"]).args(extra.split_whitespace()).current_dir(folder).output();
    String::from_utf8(ran.unwrap().stderr).unwrap()
}

#[test]
fn every_problem_code_has_a_fixture() {
    let wanted: BTreeSet<String> = codes().into_iter().map(str::to_owned).collect();
    assert_eq!(fixtures(), wanted);
}

/// `SNAPSHOTS=overwrite` writes the words anew.
#[test]
fn every_problem_is_said_in_its_exact_words() {
    let renew = std::env::var("SNAPSHOTS").is_ok_and(|mode| mode == "overwrite");
    for code in fixtures() {
        let folder = repository("tests/problems/plan").join(&code);
        let said = said_about(&folder);
        assert!(said.contains(&format!("[{code}]")), "{code} is not said:\n{said}");
        let expected = folder.join("expected.txt");
        if renew {
            std::fs::write(&expected, &said).unwrap();
        } else {
            let wanted = std::fs::read_to_string(&expected).unwrap();
            assert_eq!(said, wanted, "{code}");
        }
    }
}
