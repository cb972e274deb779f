//! The page, and the command that writes it.

use std::fs;
use std::path::Path;
use std::process::{Command, Output};

use arraywright::reception::Weighting;
use arraywright::report::pattern;

use crate::support::{Settled, demos};

fn page(text: &str) -> String {
    pattern::page(&Settled::new(text, Weighting::Built).view()).expect("a page")
}

#[test]
fn every_page_holds_both_plots_of_every_direction_and_no_nan() {
    for (name, text) in demos() {
        let settled = Settled::new(&text, Weighting::Built);
        let page = pattern::page(&settled.view()).expect("a page");
        let arrays = settled.options.iter().flat_map(|(_, reports)| reports);
        let directions: usize = arrays.map(|report| report.directions.len()).sum();
        assert_eq!(page.matches("Level by azimuth: level by azimuth").count(), directions, "{name}");
        assert_eq!(page.matches("Level by elevation: level by elevation").count(), directions, "{name}");
        assert_eq!(page.matches("role=\"img\" aria-label=").count(), 2 * directions, "{name}");
        assert!(!page.contains("NaN") && !page.contains("inf"), "{name}");
        assert!(page.contains("0123abcd"), "{name}");
        for width in page.split("width=\"").skip(1).filter_map(|rest| rest.split_once("mm\"")).map(|(w, _)| w)
        {
            assert!(width.parse::<f64>().is_ok_and(|mm| mm <= 180.0), "{name}: {width}");
        }
    }
}

#[test]
fn ids_are_each_their_own() {
    let page = page(&demos()[1].1);
    let mut ids: Vec<&str> =
        page.split(" id=\"").skip(1).filter_map(|rest| rest.split_once('"')).map(|(id, _)| id).collect();
    ids.sort_unstable();
    let all = ids.len();
    ids.dedup();
    // two arrays, two plots each, two curves in every plot, and the plots themselves
    assert_eq!((ids.len(), all), (12, 12), "{ids:?}");
}

#[test]
fn a_hostile_title_stays_text() {
    // names of arrays are letters and digits by the reader's rules; the title is free text
    let hostile = demos()[1].1.replace("Heron Field", "</style><script>alert(1)</script>\\\"\\\\");
    let page = page(&hostile);
    assert!(!page.contains("<script"), "markup came through");
    assert!(page.contains("\\3c /style>\\3c script>alert(1)"), "the running head has the title");
    assert!(page.contains("\\22 \\5c : two ways"), "quotes and backslashes of the running head");
    assert!(
        page.contains("&lt;&#x2F;style&gt;&lt;script&gt;") || page.contains("&lt;/style&gt;&lt;script&gt;")
    );
    assert_eq!(page.matches("</style>").count(), 1);
}

#[test]
fn the_same_project_gives_the_same_bytes() {
    for (name, text) in demos() {
        let (one, two) = (Settled::new(&text, Weighting::Built), Settled::new(&text, Weighting::Built));
        assert_eq!(one.json().to_string(), two.json().to_string(), "{name}");
        assert_eq!(
            pattern::page(&one.view()).expect("a page"),
            pattern::page(&two.view()).expect("a page"),
            "{name}"
        );
    }
}

fn run(arguments: &[&str]) -> Output {
    let mut command = Command::new(env!("CARGO_BIN_EXE_arraywright"));
    command.current_dir(env!("CARGO_MANIFEST_DIR")).arg("pattern").args(arguments);
    command.output().expect("the program runs")
}

fn stdout(output: &Output) -> String {
    String::from_utf8(output.stdout.clone()).expect("UTF-8")
}

#[test]
fn the_command_speaks_every_format() {
    let demo = "demo-projects/two-ways-north-west";
    let text = run(&[demo, "--option", "echelon"]);
    assert!(text.status.success());
    assert!(stdout(&text).starts_with("nw-echelon at 1.83 MHz hears "), "{}", stdout(&text));
    assert!(!stdout(&text).contains("nw-broadside"));
    let json: serde_json::Value =
        serde_json::from_slice(&run(&[demo, "--format", "json"]).stdout).expect("JSON");
    assert_eq!(json["options"].as_array().map(Vec::len), Some(2));
    let csv = stdout(&run(&[demo, "--format", "csv"]));
    assert!(csv.starts_with("table,figure,1.83 MHz,3.55 MHz"), "{csv}");
    assert!(csv.contains(",-"), "levels keep the sign that a spreadsheet reads");
    assert!(stdout(&run(&[demo, "--format", "md"])).contains("| figure | 1.83 MHz | 3.55 MHz |"));
    assert_ne!(stdout(&run(&[demo, "--ideal"])), stdout(&run(&[demo])));
    assert_eq!(run(&[demo, "--option", "none"]).status.code(), Some(2));
}

#[test]
fn the_page_is_written_whole_or_not_at_all() {
    let demo = "demo-projects/vertical-cells";
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().join("out.html");
    let path = path.to_str().expect("a plain path");
    assert!(run(&[demo, "--page", path]).status.success());
    let first = fs::read(path).expect("the page");
    assert!(first.ends_with(b"</html>\n") || first.ends_with(b"</html>"));
    assert!(run(&[demo, "--page", path]).status.success());
    assert_eq!(first, fs::read(path).expect("the page"));
    let nowhere = folder.path().join("missing/out.html");
    let output = run(&[demo, "--page", nowhere.to_str().expect("a plain path")]);
    assert_eq!(output.status.code(), Some(3));
    assert!(!Path::new(&nowhere).exists());
}
