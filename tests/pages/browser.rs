//! The rendered pages in Chromium, on A4 and Letter, and under the eyes of a validator.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::Command;

use crate::sample::{Sample, demos, format, hostile};

/// Where the pages are left for people to look at.
fn folder() -> PathBuf {
    Path::new(env!("CARGO_TARGET_TMPDIR")).join("pages")
}

fn checker() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/browser")
}

/// Writes every HTML page flat, so that one run of the checker sees all.
fn write_pages() -> Vec<PathBuf> {
    let folder = folder();
    let _ = fs::remove_dir_all(&folder);
    fs::create_dir_all(&folder).expect("a folder for the pages");
    let mut samples: Vec<(String, Sample)> =
        demos().into_iter().map(|d| (d.clone(), Sample::demo(&d))).collect();
    samples.push(("hostile".to_owned(), hostile()));
    let mut paths = Vec::new();
    for (sample, rendered) in samples.into_iter().map(|(name, sample)| (name, sample.render())) {
        for (name, text) in format(&rendered, "html") {
            let path = folder.join(format!("{sample}--{}", name.replace('/', "--")));
            fs::write(&path, text).expect("a page written");
            paths.push(path);
        }
    }
    paths
}

fn runs(program: &str, argument: &str) -> bool {
    Command::new(program).arg(argument).output().is_ok_and(|out| out.status.success())
}

/// What is missing for the checks; empty when all is there.
fn missing() -> Vec<&'static str> {
    let chromium = std::env::var("CHROMIUM").unwrap_or_else(|_| "chromium".to_owned());
    let mut missing = Vec::new();
    for (there, what) in [
        (runs(&chromium, "--version"), "chromium"),
        (runs("node", "--version"), "node"),
        (runs("java", "-version"), "java"),
        (runs("pdftotext", "-v"), "pdftotext"),
        (checker().join("node_modules").is_dir(), "npm ci --ignore-scripts --prefix tests/browser"),
    ] {
        if !there {
            missing.push(what);
        }
    }
    missing
}

/// Says what was skipped; on the build machine nothing may be skipped.
#[expect(clippy::print_stdout, reason = "a skipped check must be seen")]
fn skip(missing: &[&str]) {
    assert!(std::env::var_os("CI").is_none(), "missing on the build machine: {}", missing.join(", "));
    println!("skipped the checks of printed pages; missing: {}", missing.join(", "));
}

#[test]
fn pages_print_whole_and_read_well() {
    let pages = write_pages();
    let missing = missing();
    if !missing.is_empty() {
        return skip(&missing);
    }
    let out =
        Command::new("node").arg(checker().join("check.mjs")).arg(folder()).output().expect("node runs");
    let said = String::from_utf8_lossy(&out.stdout).into_owned() + &String::from_utf8_lossy(&out.stderr);
    assert!(out.status.success(), "{said}");
    assert!(said.contains(&format!("{} pages clean", pages.len())), "{said}");
}

#[test]
fn pages_are_valid_html() {
    let missing = missing();
    if !missing.is_empty() {
        return skip(&missing);
    }
    let jar = checker().join("node_modules/vnu-jar/build/dist/vnu.jar");
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).join("valid");
    fs::create_dir_all(&folder).expect("a folder for the pages");
    let mut pages = Vec::new();
    for (name, text) in format(&hostile().render(), "html") {
        let path = folder.join(name);
        fs::write(&path, text).expect("a page written");
        pages.push(path);
    }
    let out = Command::new("java").arg("-jar").arg(jar).args(["--format", "gnu"]).args(pages).output();
    let out = out.expect("java runs");
    assert!(out.status.success(), "{}", String::from_utf8_lossy(&out.stderr));
}
