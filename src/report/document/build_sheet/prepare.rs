//! Everything before the field: permission, bench, stakes.

use rust_decimal::Decimal;

use super::join::joined;
use super::step::{Block, Hold, Reading, Scene, Step, labels, step};
use crate::report::document::show;
use crate::takeoff::PieceRole;

/// The blocks up to the stakes.
pub(super) fn blocks(scene: &Scene<'_>) -> Vec<Block> {
    vec![permission(scene), bench(scene), stakes(scene)]
}

fn permission(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let detail = "access, hazards, stock, parking; the answers go below";
    step(&mut steps, ("walk", "T01"), &[], "Walk the site".to_owned(), detail);
    let detail = "owner's consent in writing; wait for every reply of the search";
    step(
        &mut steps,
        ("permit", "T02"),
        &["walk"],
        "Ask for permission and for the buried-services search".to_owned(),
        detail,
    );
    let detail = "every person, every visit; each signs it";
    step(&mut steps, ("brief", "T47"), &["walk"], "Read the safety sheet together".to_owned(), detail);
    let crossings = scene.input.project.crossings.iter().map(|crossing| crossing.kind.to_string());
    let crossings: Vec<String> = crossings.collect();
    let mut readings = vec![
        Reading::new("overhead lines within 50 m? where, whose", "none, or the network owner has answered"),
        Reading::new(
            "electric fence? where is its energiser's earth",
            "10 m or more from every antenna earth",
        ),
        Reading::new("buried services? reference number", "all replies in, marks on the ground"),
        Reading::new(
            "transmitters on the site locked off? who holds the key",
            "locked off on every visit, until everyone has left the array",
        ),
    ];
    if !crossings.is_empty() {
        let good = "height or conduit agreed with the owner";
        readings.push(Reading::new(format!("crossings: {}", crossings.join(", ")), good));
    }
    let rule = "Nothing is dug, driven or raised before these are answered.";
    Block { title: "Permission", steps, hold: Some(Hold { rule, readings }) }
}

fn bench(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    cables(scene, &mut steps);
    boxes(scene, &mut steps);
    let detail = "one bag a stake, named like it; labels at both ends of a cable";
    step(
        &mut steps,
        ("kit", "T39"),
        &["plug-bench", "feed-bench", "hub-join"],
        "Pack for the field".to_owned(),
        detail,
    );
    Block { title: "At the bench", steps, hold: None }
}

fn cables(scene: &Scene<'_>, steps: &mut Vec<Step>) {
    let delays = scene.pieces(PieceRole::Delay);
    if !delays.is_empty() {
        let detail = "sheet cuts names the piece; if it differs, print the cut list anew";
        let what = format!("Measure the velocity factor of the reel for {}", labels(&delays));
        step(steps, ("velocity", "T31"), &[], what, detail);
    }
    let what = "Print and cut the labels".to_owned();
    step(steps, ("label", "T39"), &[], what, "sheet labels: two a cable, one a box");
    let pieces = scene.option.takeoff.pieces.len();
    let what = format!("Cut {} by the cut list", show::count(pieces, "piece", "pieces"));
    step(
        steps,
        ("cut", "T33"),
        &["velocity", "label"],
        what,
        "mark every cut before the first; label both ends at the bench",
    );
    if !delays.is_empty() {
        let what = format!("Trim {} to the electrical length", labels(&delays));
        let detail = "both plugs fitted; take off a third of the error at a time";
        step(steps, ("trim", "T32"), &["velocity", "cut"], what, detail);
    }
    let laid = scene.laid();
    if !laid.is_empty() {
        let what = format!("Fit one plug on each of {}", labels(&laid));
        step(steps, ("plug-bench", "T29"), &["cut"], what, "the other end after it is laid");
    }
}

/// What a hub box may hold, in words.
const HUB_PARTS: [(&str, &str); 5] = [
    ("hybrid-2way", "two-way hybrid"),
    ("hybrid-3way", "three-way hybrid"),
    ("inverter", "inverter"),
    ("pad", "pad"),
    ("amplifier", "amplifier"),
];

/// "1 hub box", "3 feed boxes".
pub(super) fn boxes_of(count: Decimal, kind: &str) -> String {
    if count == Decimal::ONE { format!("1 {kind} box") } else { format!("{count} {kind} boxes") }
}

/// Which feed boxes hold an amplifier.
fn amplified(scene: &Scene<'_>) -> String {
    let hubs = scene.hubs();
    let all = scene.named("amplifier");
    let away: Vec<&str> = all.into_iter().filter(|name| !hubs.iter().any(|hub| hub.name == *name)).collect();
    if away.is_empty() { String::new() } else { format!("; amplifier in {}", show::names(away)) }
}

fn boxes(scene: &Scene<'_>, steps: &mut Vec<Step>) {
    if let Some((count, places)) = scene.places("feed-box") {
        let what = format!("Build and test {}: {places}", boxes_of(count, "feed"));
        let detail = format!(
            "all wound and connected in the same sense: compare each with the first, ±\u{a0}1°{}",
            amplified(scene)
        );
        step(steps, ("feed-bench", "T34"), &[], what, detail);
    }
    if let Some((count, places)) = scene.places("termination-box") {
        let what = format!("Build and test {}: {places}", boxes_of(count, "termination"));
        let resistors = scene.terminations().join("; ");
        let detail = format!("{resistors}; read the resistor before the lid goes on");
        step(steps, ("termination-bench", "T35"), &[], what, detail);
    }
    if let Some((count, places)) = scene.places("choke") {
        let what = format!("Make {count} chokes");
        step(steps, ("choke-bench", "T38"), &[], what, format!("for {places}"));
    }
    if let Some((count, places)) = scene.places("hub-box") {
        let inside: Vec<String> = HUB_PARTS
            .into_iter()
            .filter_map(|(role, words)| scene.hub_places(role).map(|(n, at)| format!("{n} × {words} ({at})")))
            .collect();
        let what = format!("Build and test {}: {places}", boxes_of(count, "hub"));
        let detail = if inside.is_empty() { String::new() } else { format!("inside: {}", inside.join(", ")) };
        step(steps, ("hub-bench", "T36"), &[], what, detail);
        let arrays = scene.option.design.arrays.iter().map(|array| &array.plan);
        let joined: Vec<String> = arrays.flat_map(|plan| joined(&plan.feed, &plan.layout)).collect();
        // A line for each hub on paper, one cell in the text twin.
        let detail = format!(
            "the signal runs with the arrows, + is a hybrid, innermost brackets first:\n{}",
            joined.join(";\n")
        );
        let what = "Join the parts in each hub box".to_owned();
        step(steps, ("hub-join", "T36"), &["hub-bench"], what, detail);
    }
}

fn stakes(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let what = "Set the datum and the base line".to_owned();
    step(
        &mut steps,
        ("datum", "T03"),
        &["permit", "brief"],
        what,
        "sheet stakes; true bearings, not compass",
    );
    let points = scene.point_count();
    let what = format!("Drive {}", show::count(points, "stake", "stakes"));
    step(
        &mut steps,
        ("stake", "T04"),
        &["datum"],
        what,
        "each from the datum and from the stake before; tape level",
    );
    let readings = vec![
        Reading::new("check distances on sheet stakes", "all inside the limit in the last column"),
        Reading::new("the beam arrow on the ground points to the wanted side", "yes: the leader looked"),
    ];
    let rule = "No post is set before the layout is proved.";
    Block { title: "Stake out", steps, hold: Some(Hold { rule, readings }) }
}
