//! The house rules that a test can hold.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use crate::support::repository;

fn sources(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in std::fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            sources(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            found.push(path);
        }
    }
}

fn all_sources() -> Vec<PathBuf> {
    let mut found = Vec::new();
    sources(&repository("src"), &mut found);
    found.sort();
    found
}

fn module_order() -> Vec<String> {
    let text = std::fs::read_to_string(repository("src/lib.rs")).unwrap();
    let modules = text.lines().filter_map(|line| line.strip_prefix("pub mod ")?.strip_suffix(';'));
    modules.map(str::to_owned).collect()
}

fn module_of(path: &Path) -> String {
    let relative = path.strip_prefix(repository("src")).unwrap();
    let first = relative.components().next().unwrap().as_os_str().to_str().unwrap();
    first.trim_end_matches(".rs").to_owned()
}

#[test]
fn a_module_uses_only_modules_above_it() {
    let order = module_order();
    let rank: BTreeMap<&str, usize> = order.iter().enumerate().map(|(n, name)| (name.as_str(), n)).collect();
    let mut broken = Vec::new();
    for path in all_sources() {
        let own = module_of(&path);
        let Some(own_rank) = rank.get(own.as_str()) else { continue };
        let text = std::fs::read_to_string(&path).unwrap();
        for (number, line) in
            text.lines().enumerate().filter(|(_, line)| !line.trim_start().starts_with("//"))
        {
            for used in line.split("crate::").skip(1) {
                let name: String = used.chars().take_while(|c| c.is_alphanumeric() || *c == '_').collect();
                if rank.get(name.as_str()).is_some_and(|used| used > own_rank) {
                    broken.push(format!("{}:{} uses {name}", path.display(), number + 1));
                }
            }
        }
    }
    assert!(broken.is_empty(), "{}", broken.join("\n"));
}

#[test]
fn only_the_command_line_touches_files_environment_and_clock() {
    for path in all_sources() {
        if ["cli", "main"].contains(&module_of(&path).as_str()) {
            continue;
        }
        let text = std::fs::read_to_string(&path).unwrap();
        for word in
            ["std::fs", "std::env", "SystemTime", "Utc::now", "Local::now", "println!", "HashMap", "HashSet"]
        {
            assert!(!text.contains(word), "{} has {word}", path.display());
        }
    }
}

#[test]
fn files_are_short_enough_to_read() {
    for path in all_sources() {
        let text = std::fs::read_to_string(&path).unwrap();
        let code = text.split("#[cfg(test)]").next().unwrap();
        assert!(code.lines().count() <= 600, "{} has {} lines", path.display(), code.lines().count());
        assert!(text.starts_with("//!"), "{} does not open with what it is for", path.display());
    }
}

#[test]
fn money_never_meets_a_float() {
    for folder in ["src/pricing", "src/units/money.rs"] {
        let mut files = Vec::new();
        let path = repository(folder);
        if path.is_dir() {
            sources(&path, &mut files);
        } else {
            files.push(path);
        }
        for file in files {
            let text = std::fs::read_to_string(&file).unwrap();
            assert!(!text.contains("f64") && !text.contains("f32"), "{}", file.display());
        }
    }
}
