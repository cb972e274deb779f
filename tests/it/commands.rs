//! The commands as a user meets them.

use crate::support::{ProjectTest, demos, repository, run};

const FAMILIES: [&str; 8] = [
    "single-wire",
    "echelon-pair",
    "broadside-wires",
    "broadside-echelon",
    "vertical-pair",
    "inline-3",
    "cell-pair",
    "custom",
];

#[test]
fn every_start_file_can_be_built_and_priced() {
    for family in FAMILIES {
        let text = run(&["start", family]).exits(0).stdout();
        let test = ProjectTest::new(&text);
        let checked = test.run(&["check"]).exits(0);
        assert!(checked.stdout().starts_with("this can be built"), "{family}: {}", checked.stdout());
        let estimated = test.run(&["estimate"]);
        assert_eq!(estimated.code(), 0, "{family}: {}", estimated.stdout());
    }
}

#[test]
fn start_never_overwrites() {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("mine.toml");
    let arguments = ["start", "single-wire", "-o", file.to_str().unwrap()];
    let _ = run(&arguments).exits(0);
    std::fs::write(&file, "mine").unwrap();
    assert!(run(&arguments).exits(2).stderr().contains("exists already"));
    assert_eq!(std::fs::read_to_string(&file).unwrap(), "mine");
}

#[test]
fn why_shows_the_arithmetic_of_a_delay_line() {
    let project = repository("demo-projects/two-ways-north-west");
    let text = run(&["why", project.to_str().unwrap(), "D1"]).exits(0).stdout();
    for words in ["stagger 22.0 m × 0.94", "electrical", "× velocity factor", "plug to plug", "to cut"] {
        assert!(text.contains(words), "{words} missing in\n{text}");
    }
}

#[test]
fn why_of_an_unknown_label_suggests_one() {
    let project = repository("demo-projects/two-ways-north-west");
    let ran = run(&["why", project.to_str().unwrap(), "ground-rods"]).exits(2);
    assert!(ran.stderr().contains("did you mean `ground-rod`?"), "{}", ran.stderr());
}

#[test]
fn compare_says_which_is_cheaper_first() {
    let project = repository("demo-projects/two-ways-north-west");
    let text = run(&["compare", project.to_str().unwrap()]).exits(0).stdout();
    let first = text.lines().next().unwrap();
    assert!(first.contains("is cheaper: EUR "), "{first}");
    let json = run(&["compare", project.to_str().unwrap(), "--format", "json"]).exits(0).json();
    assert_eq!(json["schema"], "arraywright/compare/1");
    assert_eq!(json["options"], serde_json::json!(["broadside", "echelon"]));
    let row = |name: &str| {
        json["rows"].as_array().unwrap().iter().find(|row| row["name"] == name).unwrap()["values"].clone()
    };
    assert_eq!(row("delay lines"), serde_json::json!([0, 1]));
    assert_eq!(row("elements"), serde_json::json!([2, 2]));
}

/// Land of 176 m wires: broadside 186 × 132 = 24 552 m², echelon 204.3 × 16 = 3268.8 m². Source: worked by hand, the box of
/// posts, wires and boxes with 5 m each side.
#[test]
fn land_is_the_box_of_the_array_with_its_margin() {
    let text = r#"
[project]
title = "Land"
currency = "EUR"
estimated = 2026-03-01
frequency = "1.83 MHz"
[site]
receiver = { east = "0 m", north = "-150 m" }
[[array]]
name = "a"
option = "broadside"
heading = "37 deg"
element.wire = { length = "176 m" }
broadside = { spacing = "122 m" }
[[array]]
name = "b"
option = "echelon"
heading = "37 deg"
element.wire = { length = "176 m" }
echelon = { stagger = "18.3 m", offset = "6 m" }
"#;
    let json = ProjectTest::new(text).run(&["compare", "--format", "json"]).exits(0).json();
    let rows = json["rows"].as_array().unwrap();
    let area = rows.iter().find(|row| row["name"] == "land, area with margin").unwrap();
    assert_eq!(area["values"], serde_json::json!([24552, 3268.8]));
}

#[test]
fn exit_codes_tell_whose_fault_it_is() {
    assert_eq!(run(&["parts"]).code(), 2);
    assert_eq!(run(&["parts", "no-such-file.toml"]).code(), 3);
    let broken = ProjectTest::new("[project]\n");
    assert_eq!(broken.run(&["parts"]).code(), 1);
    let demo = demos().remove(0);
    assert_eq!(run(&["parts", demo.to_str().unwrap(), "--option", "nowhere"]).code(), 2);
}

#[test]
fn all_mistakes_of_a_file_are_reported_in_one_run() {
    let text = r#"
[project]
title = "Broken"
currency = "EUR"
estimated = 2026-03-01
frequency = "1,83 MHz"
[site]
receiver = { east = "0", north = "-150 m" }
[[array]]
name = "a"
heading = "0 deg"
element.vertical = { height = "6 m" }
echelon = { stagger = "60 ft" }
brodside = { spacing = "100 m" }
"#;
    let stderr = ProjectTest::new(text).run(&["check"]).exits(1).stderr();
    for code in ["decimal-comma", "no-unit", "stage-needs-wires", "unknown-key"] {
        assert!(stderr.contains(&format!("error[{code}]")), "{code} missing in\n{stderr}");
    }
}

#[test]
fn check_json_has_the_pinned_shape() {
    let json = ProjectTest::new("[project]\ntitel = 1\n").run(&["check", "--format", "json"]).exits(1).json();
    assert_eq!(json["schema"], "arraywright/check/1");
    assert_eq!(json["hash"].as_str().unwrap().len(), 8);
    let problem = &json["problems"][0];
    for key in ["code", "severity", "file", "line", "column", "message", "help"] {
        assert!(problem.get(key).is_some(), "{key}");
    }
}

#[test]
fn parts_and_estimate_json_have_the_pinned_shape() {
    for demo in demos() {
        let parts = run(&["parts", demo.to_str().unwrap(), "--format", "json"]).exits(0).json();
        assert_eq!(parts["schema"], "arraywright/parts/1");
        for option in parts["options"].as_array().unwrap() {
            for item in option["items"].as_array().unwrap() {
                for key in ["role", "part", "label", "where", "quantity", "unit", "waste", "spare", "reason"]
                {
                    assert!(item.get(key).is_some(), "{key}");
                }
                assert!(!item["reason"].as_str().unwrap().is_empty());
            }
            for piece in option["pieces"].as_array().unwrap() {
                for key in [
                    "label",
                    "role",
                    "part",
                    "from",
                    "to",
                    "straight_m",
                    "routed_m",
                    "finished_m",
                    "cut_m",
                    "coiled_m",
                    "tolerance_m",
                    "electrical_deg",
                    "velocity_factor",
                    "trim_mhz",
                    "match_group",
                    "conductors",
                    "reason",
                ] {
                    assert!(piece.get(key).is_some(), "{key}");
                }
            }
        }
        let estimate = run(&["estimate", demo.to_str().unwrap(), "--format", "json"]).exits(0).json();
        assert_eq!(estimate["schema"], "arraywright/estimate/1");
        assert_eq!(estimate["hash"], parts["hash"]);
        for option in estimate["options"].as_array().unwrap() {
            for key in [
                "lines",
                "materials",
                "freight",
                "tax",
                "hire",
                "labour",
                "contingency",
                "total",
                "hours",
                "crew_days",
                "assumptions",
                "unpriced",
            ] {
                assert!(option.get(key).is_some(), "{key}");
            }
        }
    }
}

#[test]
fn labels_are_unique_within_an_option() {
    for demo in demos() {
        let parts = run(&["parts", demo.to_str().unwrap(), "--format", "json"]).exits(0).json();
        for option in parts["options"].as_array().unwrap() {
            let mut labels: Vec<&str> = Vec::new();
            for list in ["items", "pieces"] {
                labels.extend(option[list].as_array().unwrap().iter().map(|i| i["label"].as_str().unwrap()));
            }
            let count = labels.len();
            labels.sort_unstable();
            labels.dedup();
            assert_eq!(labels.len(), count, "{}", demo.display());
        }
    }
}

#[test]
fn the_catalogue_template_reads_back_and_the_built_in_one_is_sound() {
    let folder = tempfile::tempdir().unwrap();
    let target = folder.path().join("parts-catalog");
    let _ = run(&["catalog", "template", "-o", target.to_str().unwrap()]).exits(0);
    let again = run(&["catalog", "template", "-o", target.to_str().unwrap()]).exits(2);
    assert!(again.stderr().contains("exists already"));
    let _ = run(&["catalog", "check", target.to_str().unwrap()]).exits(0);
    let built_in = run(&["catalog", "check"]).exits(0).stdout();
    assert!(built_in.starts_with("this catalogue is sound"), "{built_in}");
}

#[test]
fn a_broken_catalogue_is_the_users_to_mend() {
    let project = r#"
[project]
title = "One wire"
currency = "EUR"
estimated = 2026-03-01
frequency = "1.83 MHz"
[site]
receiver = { east = "0 m", north = "-150 m" }
[[array]]
name = "one"
heading = "0 deg"
element.wire = { length = "176 m" }
"#;
    let offers = "part,offer,pack,price,currency\nwire-cu16,w,500,=B2*1.2,EUR\nno-such-part,x,1,1.00,EUR\n";
    let ran = ProjectTest::new(project).with("parts-catalog/offers.csv", offers).run(&["estimate"]).exits(1);
    let stderr = ran.stderr();
    assert!(stderr.contains("offers.csv:2:"), "{stderr}");
    assert!(stderr.contains("offers.csv:3:"), "{stderr}");
    assert!(ran.stdout().is_empty());
}

/// An array of every option tells none apart: `compare` looks at the first one that is the option's own.
#[test]
fn options_are_compared_by_their_own_arrays() {
    let test = ProjectTest::new(
        r#"
[project]
title = "Shared"
currency = "EUR"
estimated = 2026-06-01
frequency = "1.83 MHz"

[site]
receiver = { east = "-140 m", north = "-60 m" }

[[array]]
name = "both"
heading = "130 deg"
centre = { east = "-300 m", north = "0 m" }
element.wire = { length = "160 m" }

[[array]]
name = "wire"
option = "one"
heading = "310 deg"
element.wire = { length = "176 m" }

[[array]]
name = "pair"
option = "two"
heading = "310 deg"
element.vertical = { height = "6 m" }
endfire = { spacing = "18.3 m" }
"#,
    );
    let heard = |option: &str, array: usize| {
        let json = test.run(&["pattern", "--option", option, "--format", "json"]).exits(0).json();
        json["options"][0]["arrays"][array]["directions"][0]["frequencies"][0]["rdf_db"].as_f64().unwrap()
    };
    let json = test.run(&["compare", "--format", "json"]).exits(0).json();
    let rows = json["rows"].as_array().unwrap();
    let shown = rows.iter().find(|row| row["name"] == "RDF at its peak at 1.83 MHz").unwrap();
    for (n, option) in ["one", "two"].into_iter().enumerate() {
        let (shown, own) = (shown["values"][n].as_f64().unwrap(), heard(option, 1));
        assert!((shown - own).abs() <= 0.051, "{option}: {shown} shown, {own} of its own array");
        assert!((shown - heard(option, 0)).abs() > 0.051, "{option} is judged by the shared array");
    }
    let text = test.run(&["compare"]).exits(0).stdout();
    assert!(text.contains("one by wire, two by pair"), "{text}");
}

#[test]
fn one_option_alone_says_nothing_of_the_others() {
    let project = repository("demo-projects/two-ways-north-west");
    let ran = run(&["check", project.to_str().unwrap(), "--option", "broadside"]).exits(0);
    assert!(ran.stdout().contains("nw-broadside"), "{}", ran.stdout());
    assert!(!ran.stdout().contains("nw-echelon"), "{}", ran.stdout());
    assert!(!ran.stderr().contains("nw-echelon"), "{}", ran.stderr());
}

#[test]
fn one_missing_rate_is_said_once() {
    let text = run(&["start", "single-wire"]).exits(0).stdout().replace("\"EUR\"", "\"USD\"");
    let ran = ProjectTest::new(&text).run(&["estimate"]).exits(1);
    assert_eq!(ran.stderr().matches("mixed-currency").count(), 1, "{}", ran.stderr());
}

#[test]
fn the_cure_of_a_bare_share_is_the_same_share_in_percent() {
    let text = run(&["start", "single-wire"]).exits(0).stdout() + "\n[prices]\ntax = 0.21\n";
    let ran = ProjectTest::new(&text).run(&["check"]).exits(1);
    assert!(ran.stderr().contains("write tax = \"21 %\""), "{}", ran.stderr());
}

#[test]
fn verticals_need_no_antenna_wire() {
    let text = run(&["start", "vertical-pair"]).exits(0).stdout();
    let answer = ProjectTest::new(&text).run(&["parts"]).exits(0).stdout();
    let first = answer.lines().next().unwrap();
    assert!(first.contains("radial and bonding wire for 2 elements"), "{first}");
    assert!(!first.contains("antenna wire"), "{first}");
}
