//! How exact the cuts must be, how they are proved, and what the radio side puts on the parts list.

use serde_json::Value;

use crate::support::ProjectTest;

const CATALOGUE: [(&str, &str); 3] = [
    (
        "parts-catalog/parts.csv",
        "part,role,description,unit,attributes\none-factor,cable,Cable,m,plug=f\nlossy,cable,Cable,m,plug=f\n",
    ),
    (
        "parts-catalog/cables.csv",
        "part,z0_ohm,velocity_factor,loss_db_per_100m\none-factor,75,0.82,1.8:1.50 10:3.30\nlossy,75,0.82,1.8:6.00 10:9.00\n",
    ),
    (
        "parts-catalog/offers.csv",
        "part,offer,pack,price,currency,priced_on\none-factor,o,500,100.00,EUR,2026-02-01\nlossy,l,500,100.00,EUR,2026-02-01\n",
    ),
];

fn test(stages: &str, rest: &str) -> ProjectTest {
    let text = format!(
        "[project]\ntitle = \"Exact\"\ncurrency = \"EUR\"\nestimated = 2026-03-01\nfrequency = \"1.83 MHz\"\n\
         [site]\nreceiver = {{ east = \"0 m\", north = \"-150 m\" }}\nterrain = \"open\"\n\
         [[array]]\nname = \"a\"\nheading = \"0 deg\"\nelement.wire = {{ length = \"176 m\" }}\n{stages}\n{rest}"
    );
    CATALOGUE.iter().fold(ProjectTest::new(&text), |test, (name, text)| test.with(name, text))
}

fn parts(stages: &str, rest: &str) -> Value {
    test(stages, rest).run(&["parts", "--format", "json"]).exits(0).json()["options"][0].clone()
}

fn piece(parts: &Value, label: &str) -> Value {
    parts["pieces"].as_array().unwrap().iter().find(|piece| piece["label"] == label).unwrap().clone()
}

fn items<'a>(parts: &'a Value, role: &str) -> Vec<&'a Value> {
    parts["items"].as_array().unwrap().iter().filter(|item| item["role"] == role).collect()
}

fn near(value: &Value, wanted: f64, within: f64) {
    let value = value.as_f64().unwrap();
    assert!((value - wanted).abs() <= within, "{value}, wanted {wanted} ± {within}");
}

const FEED: &str = "[array.feed]\nbranch = \"one-factor\"\ndelay = \"one-factor\"\nmain = \"one-factor\"\n";

/// 18.3 m × 0.94 × 0.82 = 14.106 m; c/(4 × 17.202 m) = 4.357 MHz. Source: worked by hand.
#[test]
fn a_delay_line_proves_right_at_a_quarter_wave_of_its_electrical_length() {
    let parts = parts("echelon = { stagger = \"18.3 m\", offset = \"6 m\" }", FEED);
    let delay = piece(&parts, "D1");
    near(&delay["finished_m"], 14.106, 1e-9);
    near(&delay["cut_m"], 14.5, 1e-9);
    near(&delay["trim_mhz"], 299.792_458 / (4.0 * 17.202), 1e-6);
    near(&delay["electrical_deg"], 360.0 * 17.202 * 1.83 / 299.792_458, 1e-3);
    assert!(delay["match_group"].is_null(), "one delay has nobody to agree with");
}

/// With velocity points the test frequency is higher by VF(test)/VF(design): 18.3 m gives 4.122 instead of 4.0955 MHz
/// (two-conductor formula for a solid-copper foam cable, 0.8141 at 1.83 and 0.8193 at 4.1 MHz; computed, not measured).
#[test]
fn velocity_points_move_the_test_frequency() {
    let parts = parts("echelon = { stagger = \"18.3 m\", offset = \"6 m\", delay = 1.0 }", "");
    let delay = piece(&parts, "D1");
    near(&delay["velocity_factor"], 0.8141, 2e-4);
    near(&delay["trim_mhz"], 4.122, 0.002);
}

/// Never above 0.5 % of the length alone, 0.2 % inside a match group (common practice, no source).
#[test]
fn tolerances_are_capped_and_shrink_with_the_wanted_rejection() {
    let stage = "echelon = { stagger = \"18.3 m\", offset = \"6 m\" }";
    let tolerance = |reject: &str, label: &str| {
        let parts = parts(stage, &format!("{FEED}reject = \"{reject}\"\n"));
        let piece = piece(&parts, label);
        (piece["tolerance_m"].as_f64().unwrap(), piece["finished_m"].as_f64().unwrap())
    };
    let (loose, finished) = tolerance("10 dB", "D1");
    assert!(loose <= 0.005 * finished && loose > 0.0045 * finished, "{loose}");
    let (tight, _) = tolerance("60 dB", "D1");
    assert!(tight < loose, "{tight} {loose}");
    let (branch, finished) = tolerance("10 dB", "B1");
    assert!(branch <= 0.002 * finished, "{branch}");
}

/// 16 m of cable at 6 dB/100 m lose about 1 dB: enough to spoil 30 dB, not 12 dB.
#[test]
fn a_lossy_delay_is_balanced_by_a_pad_only_where_it_spoils_the_null() {
    let feed = |reject: &str| {
        FEED.replace("delay = \"one-factor\"", &format!("delay = \"lossy\"\nreject = \"{reject}\""))
    };
    let stage = "echelon = { stagger = \"18.3 m\", offset = \"6 m\" }";
    let strict = parts(stage, &feed("30 dB"));
    let pads = items(&strict, "pad");
    assert_eq!(pads.len(), 1);
    assert_eq!(pads[0]["quantity"], 1);
    let reason = pads[0]["reason"].as_str().unwrap();
    assert!(reason.contains("the delay line loses 0.8") && reason.contains("30 dB"), "{reason}");
    assert!(items(&parts(stage, &feed("12 dB")), "pad").is_empty());
}

#[test]
fn the_noise_budget_decides_the_hub_amplifier() {
    let stage = "broadside = { spacing = \"100 m\" }";
    let quiet = parts(stage, FEED);
    assert!(items(&quiet, "amplifier").is_empty());
    let text = test(stage, FEED);
    let deaf = std::fs::read_to_string(text.path().join("project.toml"))
        .unwrap()
        .replace("frequency = \"1.83 MHz\"", "frequency = \"1.83 MHz\"\nreceiver-noise = \"32 dB\"");
    let deaf = CATALOGUE.iter().fold(ProjectTest::new(&deaf), |test, (name, text)| test.with(name, text));
    let parts = deaf.run(&["parts", "--format", "json"]).exits(0).json()["options"][0].clone();
    let amplifiers = items(&parts, "amplifier");
    assert_eq!(amplifiers.len(), 1);
    assert!(amplifiers[0]["reason"].as_str().unwrap().contains("the receiver raises the floor by"));
    for (role, count) in [("power-supply", 1), ("fuse", 1), ("control-arrester", 2)] {
        assert_eq!(items(&parts, role)[0]["quantity"], count, "{role}");
    }
    let control =
        parts["pieces"].as_array().unwrap().iter().find(|piece| piece["role"] == "control").unwrap();
    assert_eq!(control["conductors"], 2, "a pair of the control cable feeds it");
}

/// 552.6 ohm of a wire 2.5 m over average ground less 84.9 ohm of two 1.2 m rods in 200 ohm m: 470 ohm of E24. Source: formulas
/// of Wise, Deri and Dwight as cited in the code, worked by an independent script.
#[test]
fn the_termination_is_the_wire_less_its_earth() {
    let parts = parts("", "");
    let reason = items(&parts, "termination-box")[0]["reason"].as_str().unwrap().to_owned();
    assert!(
        reason.contains("470 ohm") && reason.contains("552.6 ohm") && reason.contains("84.9 ohm"),
        "{reason}"
    );
}

#[test]
fn the_best_delay_is_found_and_used() {
    let ratio = |delay: &str| {
        let parts = parts(
            &format!("echelon = {{ stagger = \"18.3 m\", offset = \"6 m\", delay = \"{delay}\" }}"),
            FEED,
        );
        piece(&parts, "D1")["finished_m"].as_f64().unwrap() / (18.3 * 0.82)
    };
    let (rear, rdf) = (ratio("best-rear"), ratio("best-rdf"));
    assert!((0.4..0.75).contains(&rear), "{rear}");
    assert!(rdf < rear, "the sharpest delay is shorter than the quietest: {rdf} {rear}");
    assert!((ratio("best") - rear).abs() < 1e-9, "best is best-rear");
}
