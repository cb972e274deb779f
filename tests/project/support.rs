//! Files beside the tests, and short ways to read a project.

use std::fs;
use std::path::PathBuf;

use arraywright::problem::{Problem, Problems};
use arraywright::project::{self, Project};

/// A path under `tests/`.
pub(crate) fn tests_folder(name: &str) -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests").join(name)
}

/// The text of a file under `tests/`.
pub(crate) fn text_of(name: &str) -> String {
    let path = tests_folder(name);
    fs::read_to_string(&path).unwrap_or_else(|error| panic!("{}: {error}", path.display()))
}

/// The project of a text that has no errors.
pub(crate) fn project(text: &str) -> Project {
    let (project, problems) = project::read("field.toml", text, None);
    project.unwrap_or_else(|| panic!("{}", shown(&problems)))
}

/// The codes of a text's problems, by place.
pub(crate) fn codes(text: &str) -> Vec<&'static str> {
    let (_, problems) = project::read("field.toml", text, None);
    problems.sorted().iter().map(|problem: &&Problem| problem.code.0).collect()
}

/// All problems as a person sees them.
pub(crate) fn shown(problems: &Problems) -> String {
    let shown: Vec<String> = problems.sorted().iter().map(ToString::to_string).collect();
    format!("{}\n", shown.join("\n\n"))
}

/// A project of one wire; `more` is added at the end.
pub(crate) fn one_wire(more: &str) -> String {
    format!(
        r#"[project]
title = "One wire"
currency = "EUR"
estimated = 2026-10-01
frequency = "1.83 MHz"

[site]
receiver = {{ east = "0 m", north = "-150 m" }}

[[array]]
name = "west"
heading = "270 deg"
element.wire = {{ length = "176 m" }}
{more}
"#
    )
}
