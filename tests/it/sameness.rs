//! Same input, same bytes: whatever the locale, the time zone, the working folder.

use std::collections::BTreeMap;
use std::path::Path;

use crate::support::{demos, program};

fn output(demo: &Path, command: &[&str], locale: &str, zone: &str, folder: &Path) -> Vec<u8> {
    let mut run = program();
    run.arg(command[0]).arg(demo).args(&command[1..]);
    run.env("LC_ALL", locale).env("LANG", locale).env("TZ", zone).current_dir(folder);
    run.output().unwrap().stdout
}

#[test]
fn two_runs_give_identical_bytes_in_any_locale_zone_and_folder() {
    let elsewhere = tempfile::tempdir().unwrap();
    let here = std::env::current_dir().unwrap();
    for demo in demos() {
        for command in [
            &["parts", "--format", "json"][..],
            &["estimate", "--format", "json"],
            &["estimate"],
            &["compare", "--format", "md"],
            &["check", "--format", "csv"],
        ] {
            let first = output(&demo, command, "C", "UTC", &here);
            let second = output(&demo, command, "de_DE.UTF-8", "Pacific/Auckland", elsewhere.path());
            assert!(!first.is_empty());
            assert_eq!(first, second, "{command:?} on {}", demo.display());
        }
    }
}

fn work_order(demo: &Path, zone: &str) -> BTreeMap<String, Vec<u8>> {
    let folder = tempfile::tempdir().unwrap();
    let status = program()
        .arg("workorder")
        .arg(demo)
        .arg("-o")
        .arg(folder.path())
        .env("TZ", zone)
        .current_dir(folder.path())
        .output()
        .unwrap()
        .status;
    assert!(status.success());
    let mut files = BTreeMap::new();
    collect(folder.path(), folder.path(), &mut files);
    files
}

fn collect(root: &Path, folder: &Path, files: &mut BTreeMap<String, Vec<u8>>) {
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            collect(root, &path, files);
        } else {
            let name = path.strip_prefix(root).unwrap().to_str().unwrap().to_owned();
            files.insert(name, std::fs::read(&path).unwrap());
        }
    }
}

#[test]
fn work_orders_are_the_same_bytes_every_time() {
    for demo in demos() {
        let first = work_order(&demo, "UTC");
        assert!(first.len() >= 6, "{:?}", first.keys());
        assert_eq!(first, work_order(&demo, "Asia/Tokyo"), "{}", demo.display());
    }
}
