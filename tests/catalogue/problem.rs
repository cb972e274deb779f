//! One broken catalogue for every problem code, with its exact message.
//!
//! A folder of `tests/problems/catalogue` is named like the code and holds the broken files and `expected.txt`. Files
//! ending in `.repeat` stand for large ones: each line is a count, a bar and the text to repeat. `SNAPSHOTS=overwrite`
//! writes `expected.txt` anew; read the difference before you commit it.

use std::collections::BTreeSet;
use std::fmt::Write as _;
use std::fs;
use std::path::{Path, PathBuf};

use arraywright::catalogue::{CatalogueFile, Source, age, built_in, code, health, load};
use chrono::NaiveDate;

use crate::support::printed;

fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/problems/catalogue")
}

fn folders() -> BTreeSet<String> {
    let entries = fs::read_dir(root()).unwrap().map(|entry| entry.unwrap());
    let folders = entries.filter(|entry| entry.path().is_dir());
    folders.map(|entry| entry.file_name().into_string().unwrap()).collect()
}

#[test]
fn every_code_has_a_fixture_and_every_fixture_a_code() {
    let codes: BTreeSet<String> = code::ALL.iter().map(|code| code.0.to_owned()).collect();
    assert_eq!(codes.len(), code::ALL.len(), "a code stands twice");
    assert_eq!(folders(), codes);
}

fn repeated(text: &str) -> Vec<u8> {
    let mut out = String::new();
    for (number, line) in text.lines().enumerate() {
        let (count, piece) = line.split_once('|').unwrap();
        for index in 0..count.parse::<usize>().unwrap() {
            out.push_str(&piece.replace("\\n", "\n").replace("{n}", &format!("{number}-{index}")));
        }
    }
    out.into_bytes()
}

fn files(folder: &Path) -> Vec<CatalogueFile> {
    let mut paths: Vec<PathBuf> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    paths.sort();
    let mut files = Vec::new();
    for path in paths {
        let name = path.file_name().unwrap().to_str().unwrap().to_owned();
        let bytes = fs::read(&path).unwrap();
        if let Some(name) = name.strip_suffix(".repeat") {
            let bytes = repeated(std::str::from_utf8(&bytes).unwrap());
            files.push(CatalogueFile { name: name.to_owned(), bytes });
        } else if name != "expected.txt" {
            files.push(CatalogueFile { name, bytes });
        }
    }
    files
}

/// What a user would see: the problems of reading, then of age and health when there are no errors.
fn shown(folder: &Path) -> String {
    let loaded = load(built_in(), &files(folder), Source::User);
    let mut problems = loaded.problems;
    if !problems.has_errors() {
        let estimated = NaiveDate::from_ymd_opt(2026, 10, 1).unwrap();
        problems.extend(age(&loaded.catalogue, estimated, 730));
        problems.extend(health(&loaded.catalogue));
    }
    let mut text = printed(&problems);
    if !loaded.fixes.is_empty() {
        let _ = write!(text, "\n{}\n", loaded.fixes);
    }
    text
}

#[test]
fn every_fixture_gives_its_exact_message() {
    let overwrite = std::env::var("SNAPSHOTS").is_ok_and(|mode| mode == "overwrite");
    for name in folders() {
        let folder = root().join(&name);
        let shown = shown(&folder);
        assert!(shown.contains(&format!("[{name}]")), "{name} does not appear in:\n{shown}");
        let path = folder.join("expected.txt");
        if overwrite {
            fs::write(&path, &shown).unwrap();
        }
        let expected = fs::read_to_string(&path).unwrap_or_default();
        assert_eq!(shown, expected, "{name}");
    }
}
