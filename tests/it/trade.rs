//! Facts of the trade that count parts (common practice, no source): `tests/reference/trade.toml`.

use serde_json::Value;

use crate::support::{ProjectTest, repository};

fn fact(id: &str) -> toml::Value {
    let text = std::fs::read_to_string(repository("tests/reference/trade.toml")).unwrap();
    let facts: toml::Table = toml::from_str(&text).unwrap();
    let all = facts["fact"].as_array().unwrap();
    all.iter().find(|fact| fact["id"].as_str() == Some(id)).unwrap()["expect"].clone()
}

fn parts(element: &str, stages: &str) -> Value {
    let text = format!(
        "[project]\ntitle = \"Trade\"\ncurrency = \"EUR\"\nestimated = 2026-03-01\nfrequency = \"1.83 MHz\"\n\
         [site]\nreceiver = {{ east = \"0 m\", north = \"-150 m\" }}\n\
         [[array]]\nname = \"a\"\nheading = \"0 deg\"\nelement.{element}\n{stages}"
    );
    ProjectTest::new(&text).run(&["parts", "--format", "json"]).exits(0).json()["options"][0].clone()
}

fn count(parts: &Value, role: &str) -> i64 {
    let items = parts["items"].as_array().unwrap();
    items.iter().filter(|item| item["role"] == role).map(|item| item["quantity"].as_i64().unwrap()).sum()
}

/// The fact is told of two directions; a switch adds relays and control cable, no coax, so one direction must hold it too.
#[test]
fn a_pair_of_three_element_cells_takes_over_a_thousand_feet_of_coax() {
    let expect = fact("cell-pair-parts");
    let parts = parts(
        "vertical = { height = \"6 m\", active = true }",
        "endfire = { count = 3, spacing = \"70 ft\" }\nbroadside = { spacing = \"400 ft\" }\n",
    );
    let coax: f64 = parts["pieces"]
        .as_array()
        .unwrap()
        .iter()
        .filter(|piece| ["branch", "run", "delay", "main"].contains(&piece["role"].as_str().unwrap()))
        .map(|piece| piece["cut_m"].as_f64().unwrap())
        .sum();
    let least = f64::from(i32::try_from(expect["coax_ft_more_than"].as_integer().unwrap()).unwrap());
    assert!(coax / 0.3048 > least, "{} ft", coax / 0.3048);
    assert_eq!(count(&parts, "amplifier"), expect["amplifiers"].as_integer().unwrap());
    let branches =
        parts["pieces"].as_array().unwrap().iter().filter(|piece| piece["role"] == "branch").count();
    assert_eq!(branches, 6);
    let cells = expect["hubs_with_delay_lines"].as_integer().unwrap();
    assert_eq!(count(&parts, "hub-box"), cells + 1, "a hub a cell and one for the array");
    assert_eq!(count(&parts, "choke"), 6 + 2 + 2, "six branches, two runs, two on the main");
}

#[test]
fn two_echelon_pairs_take_four_feed_boxes_and_four_terminations() {
    let expect = fact("four-wire-parts");
    let parts = parts(
        "wire = { length = \"176 m\" }",
        "echelon = { stagger = \"60 ft\" }\nbroadside = { spacing = \"400 ft\" }\n",
    );
    assert_eq!(count(&parts, "feed-box"), expect["feed_boxes"].as_integer().unwrap());
    assert_eq!(count(&parts, "termination-box"), expect["terminations"].as_integer().unwrap());
    assert_eq!(count(&parts, "ground-rod"), 16, "two rods at each of eight wire ends in average soil");
}

/// A hub amplifier sits between the last combiner and the main line: its current comes along the main line and no further.
/// With bias tees it takes two of them, one at each end. Active verticals stand beyond the runs, and theirs goes on.
/// Source: worked by hand from where the amplifier sits.
#[test]
fn the_current_of_a_hub_amplifier_stops_at_the_hub() {
    let stages = "echelon = { stagger = \"60 ft\" }\nbroadside = { spacing = \"400 ft\" }\n";
    let wires = |feed: &str| {
        let stages = format!("{stages}[array.feed]\namplifier = \"hub\"\n{feed}");
        parts("wire = { length = \"176 m\" }", &stages)
    };
    let controls = |parts: &Value| {
        let pieces = parts["pieces"].as_array().unwrap();
        let control = pieces.iter().filter(|piece| piece["role"] == "control");
        control.map(|piece| piece["label"].as_str().unwrap().to_owned()).collect::<Vec<_>>()
    };
    let by_cable = wires("");
    assert_eq!(controls(&by_cable), ["C-M1"]);
    assert_eq!(count(&by_cable, "bias-tee"), 0);
    let by_coax = wires("power = \"main\"\n");
    assert_eq!(controls(&by_coax), [""; 0]);
    assert_eq!(count(&by_coax, "bias-tee"), 2);
    let active = parts(
        "vertical = { height = \"6 m\", active = true }",
        "endfire = { spacing = \"60 ft\" }\nbroadside = { spacing = \"400 ft\" }\n",
    );
    let mut labels = controls(&active);
    labels.sort();
    assert_eq!(labels, ["C-M1", "C-R1", "C-R2"]);
}

fn ids(parts: &Value, role: &str) -> Vec<String> {
    let items = parts["items"].as_array().unwrap();
    items
        .iter()
        .filter(|item| item["role"] == role)
        .map(|item| item["part"].as_str().unwrap().to_owned())
        .collect()
}

/// A 50-ohm array is 50 ohm to the entry. Source: worked by hand, an arrester or bias tee of 75 ohm in a 50-ohm line reflects.
#[test]
fn what_stands_in_a_line_has_its_impedance() {
    let feed = "[array.feed]\nbranch = \"coax50-58\"\ndelay = \"coax50-58\"\nmain = \"coax50-58\"\n";
    let stages = format!("endfire = {{ spacing = \"60 ft\" }}\n{feed}");
    let parts = parts("vertical = { height = \"6 m\", active = true }", &stages);
    assert_eq!(ids(&parts, "coax-arrester"), ["arrester-coax-50"]);
    assert_eq!(ids(&parts, "bias-tee"), ["bias-tee-50"]);
}

/// Every mast of the catalogue can be guyed from it: 12 m takes √(8.4² + 7.2²) + 1 = 12.1 m. Source: worked by hand.
#[test]
fn every_mast_of_the_catalogue_has_guys_that_reach() {
    for height in ["8 m", "10 m", "12 m"] {
        let parts = parts(&format!("vertical = {{ height = \"{height}\", active = false }}"), "");
        let guys = ids(&parts, "guy");
        assert!(guys.iter().all(|id| id.starts_with("guy-") && !id.contains("length")), "{height}: {guys:?}");
        assert_eq!(count(&parts, "guy"), 3, "{height}");
    }
}
