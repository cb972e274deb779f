//! Whatever a hand does to a file: reading ends, and there is a project exactly when there is no error.

use arraywright::project;
use proptest::prelude::*;

use crate::support::{shown, text_of};

/// A legal file that uses every section.
fn everything() -> String {
    text_of("problems/everything.toml")
}

/// What a tired or hasty hand types.
const SNIPPETS: [&str; 40] = [
    "\"",
    "'",
    "{",
    "}",
    "[",
    "]",
    "[[",
    "]]",
    "=",
    ",",
    "\n",
    "#",
    "\\",
    "\"\"\"",
    "nan",
    "inf",
    "-inf",
    "-1",
    "0",
    "1e400",
    "0x1f",
    "1_000",
    "99999999999999999999999999999999",
    "0.000000000000000000000000000000001",
    "2026-02-30",
    "1979-05-27T07:32:00Z",
    "07:32:00",
    "true",
    "\"60\"",
    "\"-60 ft\"",
    "\"1 parsec\"",
    "\"1,5 m\"",
    "\"999999 km\"",
    "\"0 m\"",
    "ä",
    "\u{0}",
    "\u{feff}",
    "\r",
    "two-way = true",
    "weights = []",
];

#[test]
fn the_file_with_everything_is_legal() {
    let (project, problems) = project::read("everything.toml", &everything(), None);
    assert!(project.is_some() && problems.is_empty(), "{}", shown(&problems));
}

/// One change at a place between 0 and 1.
#[derive(Clone, Debug)]
enum Change {
    Insert(f64, usize),
    Delete(f64, usize),
    ReplaceValue(f64, usize),
    DeleteLine(f64),
    DoubleLine(f64),
    SwapLines(f64, f64),
}

fn change() -> impl Strategy<Value = Change> {
    let at = || 0.0..1.0_f64;
    let snippet = || 0..SNIPPETS.len();
    prop_oneof![
        (at(), snippet()).prop_map(|(at, n)| Change::Insert(at, n)),
        (at(), 1..12_usize).prop_map(|(at, n)| Change::Delete(at, n)),
        (at(), snippet()).prop_map(|(at, n)| Change::ReplaceValue(at, n)),
        at().prop_map(Change::DeleteLine),
        at().prop_map(Change::DoubleLine),
        (at(), at()).prop_map(|(a, b)| Change::SwapLines(a, b)),
    ]
}

#[expect(
    clippy::cast_possible_truncation,
    clippy::cast_sign_loss,
    clippy::cast_precision_loss,
    reason = "small counts"
)]
fn pick(at: f64, count: usize) -> usize {
    ((at * count as f64) as usize).min(count.saturating_sub(1))
}

fn apply(text: &str, change: &Change) -> String {
    let mut chars: Vec<char> = text.chars().collect();
    let mut lines: Vec<String> = text.split('\n').map(str::to_owned).collect();
    let count = lines.len();
    match change {
        Change::Insert(at, n) => {
            let at = pick(*at, chars.len());
            chars.splice(at..at, SNIPPETS[*n].chars());
            return chars.into_iter().collect();
        }
        Change::Delete(at, n) => {
            let at = pick(*at, chars.len());
            chars.drain(at..(at + n).min(chars.len()));
            return chars.into_iter().collect();
        }
        Change::ReplaceValue(at, n) => {
            let line = &mut lines[pick(*at, count)];
            if let Some((key, _)) = line.rsplit_once('=') {
                *line = format!("{key}= {}{}", SNIPPETS[*n], if line.ends_with('}') { " }" } else { "" });
            }
        }
        Change::DeleteLine(at) => drop(lines.remove(pick(*at, count))),
        Change::DoubleLine(at) => lines.insert(pick(*at, count), lines[pick(*at, count)].clone()),
        Change::SwapLines(a, b) => lines.swap(pick(*a, count), pick(*b, count)),
    }
    lines.join("\n")
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 1_000, failure_persistence: None, rng_seed: proptest::test_runner::RngSeed::Fixed(1), ..ProptestConfig::default() })]

    #[test]
    fn no_change_makes_reading_fail_silently(changes in prop::collection::vec(change(), 1..5)) {
        let text = changes.iter().fold(everything(), |text, change| apply(&text, change));
        let (project, problems) = project::read("field.toml", &text, None);
        prop_assert_eq!(project.is_none(), problems.has_errors(), "{}", shown(&problems));
    }

    #[test]
    fn any_text_is_read_to_its_end(text in ".{0,200}", csv in "(part|quantity|length|,|;|\"|\n|[0-9.]{1,3}|m| ){0,30}") {
        let (project, problems) = project::read("field.toml", &text, Some(("on-hand.csv", &csv)));
        prop_assert_eq!(project.is_none(), problems.has_errors());
    }
}
