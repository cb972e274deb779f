//! The whole road as a user takes it: the program started on each demo, from its first instruction to files on disk.

use std::path::Path;
use std::process::{Command, Stdio};

fn main() {
    divan::main();
}

const DEMOS: [&str; 3] = ["two-ways-north-west", "vertical-cells", "echelon-row-from-stock"];

fn run(demo: &str, arguments: &[&str]) {
    let project = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-projects").join(demo);
    let status = Command::new(env!("CARGO_BIN_EXE_arraywright"))
        .arg(arguments[0])
        .arg(project)
        .args(&arguments[1..])
        .stdout(Stdio::null())
        .stderr(Stdio::null())
        .status();
    assert!(status.is_ok_and(|status| status.success()));
}

#[divan::bench(args = DEMOS, sample_count = 20)]
fn work_order(demo: &str) {
    let folder = tempfile::tempdir().expect("a temporary folder");
    run(demo, &["workorder", "-o", folder.path().to_str().expect("a plain path")]);
}

#[divan::bench(args = DEMOS, sample_count = 20)]
fn parts(demo: &str) {
    run(demo, &["parts", "--format", "json"]);
}

#[divan::bench(args = DEMOS, sample_count = 20)]
fn compare(demo: &str) {
    run(demo, &["compare", "--format", "json"]);
}
