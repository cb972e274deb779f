//! What the README shows is what the program prints.

use std::fmt::Write as _;

use crate::support::{ProjectTest, program, repository};

/// Runs every `$ arraywright …` of a console block and compares what follows; `SNAPSHOTS=overwrite` writes it anew.
#[test]
fn console_blocks_of_the_readme_are_true() {
    let path = repository("README.md");
    let text = std::fs::read_to_string(&path).unwrap();
    let mut renewed = String::new();
    let mut lines = text.lines();
    while let Some(line) = lines.next() {
        renewed.push_str(line);
        renewed.push('\n');
        if line != "```console" {
            continue;
        }
        let command = lines.next().unwrap();
        let arguments = command.strip_prefix("$ arraywright ").unwrap();
        let run = program().args(arguments.split(' ')).current_dir(repository("")).output().unwrap();
        let said = String::from_utf8(run.stdout).unwrap();
        let words = if said.is_empty() || arguments.starts_with("check") {
            String::from_utf8(run.stderr).unwrap().trim_end().to_owned() + "\n\n" + &said
        } else {
            said
        };
        let shown: Vec<&str> = words.lines().take(32).collect();
        writeln!(renewed, "{command}\n{}", shown.join("\n").trim_end()).unwrap();
        for rest in lines.by_ref() {
            if rest == "```" {
                renewed.push_str("```\n");
                break;
            }
        }
    }
    if std::env::var("SNAPSHOTS").is_ok_and(|mode| mode == "overwrite") {
        std::fs::write(&path, &renewed).unwrap();
    } else {
        assert!(
            text == renewed,
            "README.md is out of date: SNAPSHOTS=overwrite cargo test readme\n{renewed}"
        );
    }
}

#[test]
fn the_readme_shows_the_two_commands() {
    let text = std::fs::read_to_string(repository("README.md")).unwrap();
    let blocks: Vec<&str> =
        text.split("```sh\n").skip(1).map(|block| block.split("```").next().unwrap()).collect();
    assert_eq!(
        blocks,
        [
            "cargo run --release -- workorder demo-projects/two-ways-north-west -o work-order\n",
            "cargo test\n"
        ]
    );
}

#[test]
fn the_smallest_project_of_the_readme_can_be_built() {
    let text = std::fs::read_to_string(repository("README.md")).unwrap();
    let project = text.split("```toml\n").nth(1).unwrap().split("```").next().unwrap();
    let test = ProjectTest::new(project);
    assert!(test.run(&["check"]).exits(0).stdout().starts_with("this can be built"));
    let _ = test.run(&["estimate"]).exits(0);
}
