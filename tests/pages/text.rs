//! What the sheets say, without a browser.

use std::collections::BTreeMap;

use arraywright::report::document::{Sheet, TemplateError, template_names};

use crate::sample::{Sample, demos, format, hostile};

#[test]
fn every_demo_gets_every_sheet_in_both_formats() {
    for demo in demos() {
        let sample = Sample::demo(&demo);
        let files = sample.render();
        for option in sample.project.options() {
            for sheet in Sheet::ALL {
                for extension in ["html", "md"] {
                    let name = format!("{}.{extension}", sheet.name());
                    let name = if option.is_empty() { name } else { format!("{option}/{name}") };
                    let text = files.get(&name).unwrap_or_else(|| panic!("{demo}: no {name}"));
                    assert!(text.contains("7f3a91c2"), "{demo}: {name} carries no hash");
                    assert!(text.contains("2026-06-01"), "{demo}: {name} carries no date");
                }
            }
        }
        assert!(files.contains_key("index.html"), "{demo}");
    }
}

#[test]
fn the_same_input_gives_the_same_bytes() {
    assert_eq!(hostile().render(), hostile().render());
}

#[test]
fn options_do_not_mix() {
    let files = Sample::demo("two-ways-north-west").render();
    assert!(!files.contains_key("cuts.html"), "no sheet stands outside its option's folder");
    assert!(files["index.html"].contains("broadside/index.html"));
    for (name, text) in files.iter().filter(|(name, _)| name.starts_with("broadside/")) {
        assert!(!text.contains("nw-echelon"), "{name} speaks of the other option");
    }
}

#[test]
fn a_hostile_name_stays_text_in_html() {
    for (name, text) in format(&hostile().render(), "html") {
        assert!(!text.contains("<script"), "{name}");
        assert_eq!(text.matches("</style>").count(), 1, "{name}");
        assert!(!text.contains("<b>#1"), "{name}");
        assert!(!text.contains("NaN"), "{name}");
    }
}

#[test]
fn a_hostile_name_stays_text_in_markdown() {
    for (name, text) in format(&hostile().render(), "md") {
        assert!(!text.contains("<script") && !text.contains("<b>"), "{name}");
        assert!(!text.contains("| `b`") && !text.contains("[z](u)"), "{name}");
        assert_eq!(torn_row(text), None, "{name} has a row with another number of cells than its head");
    }
    for demo in demos() {
        for (name, text) in format(&Sample::demo(&demo).render(), "md") {
            assert_eq!(torn_row(text), None, "{demo}: {name}");
        }
    }
}

/// The first row of a table that has not as many cells as the table's head.
fn torn_row(text: &str) -> Option<&str> {
    let mut cells = None;
    for line in text.lines() {
        if !line.starts_with('|') {
            cells = None;
            continue;
        }
        let bars = line.replace("\\\\", "").replace("\\|", "").matches('|').count();
        if *cells.get_or_insert(bars) != bars {
            return Some(line);
        }
    }
    None
}

#[test]
fn every_piece_is_cut_once_and_labelled_at_both_ends() {
    let files = Sample::demo("vertical-cells").render();
    let cuts = &files["cuts.md"];
    let labels = &files["labels.md"];
    for label in ["B1", "B6", "D1", "R2", "M1"] {
        let row =
            |line: &&str| line.starts_with('|') && line.split('|').nth(2).is_some_and(|c| c.trim() == label);
        assert_eq!(cuts.lines().filter(row).count(), 1, "{label} stands in one row of one reel");
        let strip = |line: &&str| line.starts_with(&format!("| {label} |"));
        assert_eq!(labels.lines().filter(strip).count(), 2, "{label} has a label at each end");
    }
}

#[test]
fn the_delay_stops_the_bench_until_the_reel_is_measured() {
    let files = Sample::demo("two-ways-north-west").render();
    assert!(files["echelon/cuts.html"].contains("STOP. Measure this reel first."));
    assert!(!files["broadside/cuts.html"].contains("STOP. Measure this reel first."));
}

#[test]
fn a_branch_with_its_delay_merged_stops_the_bench_too() {
    let files = hostile().render();
    let stop = files["cuts.md"].split("Measure this reel first.** ").nth(1).expect("a hold point");
    let labels = stop.split(" is cut for").next().expect("labels");
    assert!(labels.contains("D1") && labels.contains("B4"), "{labels}");
}

#[test]
fn nothing_is_sealed_before_it_is_tested_nor_connected_before_it_is_bonded() {
    for demo in demos() {
        let files = Sample::demo(&demo).render();
        for (name, text) in files.iter().filter(|(name, _)| name.ends_with("build.md")) {
            let at = |words: &str| text.find(words).unwrap_or_else(|| panic!("{demo}: {name}: {words}"));
            assert!(at("Test before sealing") < at("Seal every joint"));
            assert!(at("before the entry is bonded") < at("to the entry panel"));
            assert!(at("No post is set before") < at("Clear and set supports"));
        }
    }
}

#[test]
fn a_prerequisite_always_comes_first() {
    let text = &hostile().render()["build.md"];
    let mut steps = 0;
    for line in text.lines().filter(|line| line.starts_with("| ☐ |")) {
        let cells: Vec<&str> = line.replace("\\|", "/").leak().split('|').map(str::trim).collect();
        let number: usize = cells[2].parse().expect("a step number");
        for after in cells[4].split(", ").filter(|after| !after.is_empty()) {
            assert!(
                after.parse::<usize>().expect("a step number") < number,
                "step {number} waits for {after}"
            );
        }
        steps += 1;
    }
    assert!(steps > 20);
}

#[test]
fn invented_prices_are_called_invented() {
    for demo in demos() {
        for (name, text) in Sample::demo(&demo).render() {
            if name.ends_with("estimate.html") || name.ends_with("purchase.md") {
                assert!(text.contains("invented round figures"), "{demo}: {name}");
            }
        }
    }
}

#[test]
fn a_stake_stands_where_trigonometry_puts_it() {
    // Broadside pair 76 m apart looking at 312°: the left feed point is 38 m from the datum at 312° − 90° = 222° true.
    let files = Sample::demo("two-ways-north-west").render();
    let row = files["broadside/stakes.md"]
        .lines()
        .find(|line| line.contains("| W1-F |"))
        .expect("a row")
        .to_owned();
    let cells: Vec<&str> = row.split('|').map(str::trim).collect();
    // sin 222° = −0.66913, cos 222° = −0.74314.
    assert_eq!(&cells[4..8], &["-25.43", "-28.24", "38.00", "222.0"]);
}

#[test]
fn a_template_of_the_same_name_takes_the_place_of_ours() {
    let sample = Sample::demo("vertical-cells");
    let own = BTreeMap::from([("safety.md".to_owned(), "own {{ head.project }}".to_owned())]);
    let files = sample.render_with(&own).expect("it renders");
    assert!(files["safety.md"].starts_with("own Sallow Common"));
}

#[test]
fn a_template_that_does_not_work_says_which_and_why() {
    let sample = Sample::demo("vertical-cells");
    let unknown = BTreeMap::from([("purchases.html".to_owned(), String::new())]);
    match sample.render_with(&unknown) {
        Err(TemplateError::Unknown { nearest, .. }) => assert_eq!(nearest, Some("purchase.html")),
        other => panic!("{:?}", other.map(|files| files.len())),
    }
    let broken = BTreeMap::from([("plan.md".to_owned(), "{{ view.nothing_like_it }}".to_owned())]);
    let error = sample.render_with(&broken).expect_err("an unknown value").to_string();
    assert!(error.contains("plan.md") && error.contains("nothing_like_it"), "{error}");
    assert!(template_names().contains(&"sheet.css"));
}

/// The bench needs the resistor's value, the field what the whole loop reads: 470 ohm and two earths of 76.4 ohm are 623 ohm.
/// Source: E24 value nearest to 552.6 − 76.4 ohm, worked by hand.
#[test]
fn the_build_sheet_has_the_value_of_the_termination() {
    let pages = Sample::demo("two-ways-north-west").render();
    let build = &pages["echelon/build.md"];
    assert!(build.contains("470 ohm, the E24 value nearest"), "{build}");
    assert!(
        build.contains("470 ohm and both earths as read above, ± 20 %; 623 if these are as computed"),
        "{build}"
    );
}

/// Which leg is inverted, padded and delayed, and which hybrid comes first. Source: three in line as 1 : −2 : 1, front and
/// delayed rear in hybrid 1 behind 3 dB pads, then the inverted, delayed middle in hybrid 2; the longer delay is the rear's.
#[test]
fn the_build_sheet_says_what_is_joined_in_each_hub() {
    let pair = &Sample::demo("two-ways-north-west").render()["echelon/build.md"];
    assert!(pair.contains("H1: B1 front + (B2 rear → D1 → inverter)"), "{pair}");
    let cells = &Sample::demo("vertical-cells").render()["build.md"];
    let cell = |n: usize, b: usize, d: usize| {
        let group = format!("of group {n} from the left");
        format!(
            "H{n}: ((B{b} front {group} → pad 3.0 dB) + (B{} rear {group} → D{d} → pad 3.0 dB)) + (B{} middle {group} → D{} → inverter)",
            b + 2,
            b + 1,
            d + 1
        )
    };
    for hub in [cell(1, 1, 1), cell(2, 4, 3), "H3: R1 + R2".to_owned()] {
        assert!(cells.contains(&hub), "{hub} missing in\n{cells}");
    }
}
