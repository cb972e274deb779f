//! The weights that the parts produce: the feed tree alone decides what is bought and what is heard.

use arraywright::catalogue;
use arraywright::design::Design;
use arraywright::plan::{LineRole, Node};
use arraywright::reception::Weighting;
use arraywright::report::pattern::{document_of, reports};
use arraywright::takeoff::{self, PieceRole};
use serde_json::Value;

use crate::support::{Settled, demos, figures};

fn demo(name: &str) -> String {
    demos().into_iter().find(|(known, _)| known == name).expect("the demo").1
}

/// Takes the first delay line out of a tree: what it carried is joined to what was behind it.
fn without_delay(node: Node, is_delay: &dyn Fn(&Node) -> bool, done: &mut bool) -> Node {
    if !*done && is_delay(&node) {
        *done = true;
        return node.inputs()[0].clone();
    }
    let mut again = |input: Node| without_delay(input, is_delay, done);
    match node {
        Node::Role(role) => Node::Role(role),
        Node::Line { line, input } => Node::Line { line, input: Box::new(again(*input)) },
        Node::Inverter { hub, input } => Node::Inverter { hub, input: Box::new(again(*input)) },
        Node::Pad { hub, db, why, input } => Node::Pad { hub, db, why, input: Box::new(again(*input)) },
        Node::Amplifier { hub, input } => Node::Amplifier { hub, input: Box::new(again(*input)) },
        Node::Combine { hub, inputs } => {
            Node::Combine { hub, inputs: inputs.into_iter().map(again).collect() }
        }
    }
}

#[test]
fn taking_a_delay_line_out_of_the_tree_changes_the_parts_and_the_weights() {
    let Settled { project, designs, options, .. } =
        Settled::new(&demo("two-ways-north-west"), Weighting::Built);
    let mut design = designs.into_iter().find(|design| design.option == "echelon").expect("the option");
    let catalogue = catalogue::built_in();
    let count =
        |design: &Design| takeoff::take_off(&project, &catalogue, design).pieces_of(PieceRole::Delay).count();
    let plugs = |design: &Design| takeoff::take_off(&project, &catalogue, design).count("plug");
    let (delays_before, plugs_before) = (count(&design), plugs(&design));
    let before = document_of("", &project, &options);

    let feed = &mut design.arrays[0].plan.feed;
    let gone = feed.lines.iter().position(|line| line.role == LineRole::Delay).expect("a delay line");
    let lines = feed.lines.clone();
    let is_delay =
        move |node: &Node| matches!(node, Node::Line { line, .. } if lines[line.0].role == LineRole::Delay);
    let mut done = false;
    feed.root = without_delay(feed.root.clone(), &is_delay, &mut done);
    assert!(done);
    // the line is the last of the list, so the numbers of the others stay
    assert!(feed.lines[gone + 1..].iter().all(|line| line.role != LineRole::Delay));
    renumber(&mut feed.root, gone);
    for leg in &mut feed.legs {
        leg.branch =
            leg.branch.map(|line| if line.0 > gone { arraywright::plan::LineId(line.0 - 1) } else { line });
    }
    feed.lines.remove(gone);
    let array = &mut design.arrays[0];
    array.lengths.remove(gone);
    array.tolerances.remove(gone);
    array.trims.remove(gone);

    assert_eq!(count(&design), delays_before - 1);
    assert!(plugs(&design) < plugs_before);
    let after = document_of("", &project, &reports(&project, &[&design], Weighting::Built));
    let phase =
        |json: &Value| figures(json, "nw-echelon")["weights"][1]["phase_deg"].as_f64().expect("a phase");
    // what is left of a rear wire that is inverted and delayed is the inversion
    assert!((phase(&after).abs() - 180.0).abs() < 1e-6, "{}", phase(&after));
    assert!((phase(&before).abs() - 180.0).abs() > 20.0, "{}", phase(&before));
    let level =
        |json: &Value| figures(json, "nw-echelon")["weights"][1]["amplitude"].as_f64().expect("a level");
    assert!((level(&after) - 1.0).abs() < 1e-6 && level(&before) < 0.999);
}

/// Lines behind the one that is gone move up by one.
fn renumber(node: &mut Node, gone: usize) {
    match node {
        Node::Role(_) => {}
        Node::Line { line, input } => {
            if line.0 > gone {
                line.0 -= 1;
            }
            renumber(input, gone);
        }
        Node::Inverter { input, .. } | Node::Pad { input, .. } | Node::Amplifier { input, .. } => {
            renumber(input, gone);
        }
        Node::Combine { inputs, .. } => inputs.iter_mut().for_each(|input| renumber(input, gone)),
    }
}

#[test]
fn ideal_and_built_differ_by_the_loss_of_the_delay_line() {
    let text = demo("two-ways-north-west");
    let (ideal, built) = (Settled::new(&text, Weighting::Ideal), Settled::new(&text, Weighting::Built));
    let design = built.designs.iter().find(|design| design.option == "echelon").expect("the option");
    let array = &design.arrays[0];
    let delay = array.plan.feed.lines.iter().position(|line| line.role == LineRole::Delay).expect("a delay");
    let cable = array.cables.of(LineRole::Delay).data.as_ref().expect("the cable's data");
    let per_100m = cable.loss_db_per_100m(built.project.frequency).expect("a loss figure");
    let loss_db = per_100m * array.lengths[delay].finished.metres() / 100.0;
    assert!(loss_db > 0.02, "{loss_db}");

    let weight = |settled: &Settled| {
        let json = settled.json();
        let weight = &figures(&json, "nw-echelon")["weights"][1];
        (weight["amplitude"].as_f64().expect("a level"), weight["phase_deg"].as_f64().expect("a phase"))
    };
    let ((ideal_level, ideal_phase), (built_level, built_phase)) = (weight(&ideal), weight(&built));
    assert!((ideal_level - 1.0).abs() < 1e-6);
    assert!((20.0 * (ideal_level / built_level).log10() - loss_db).abs() < 1e-4, "{built_level} {loss_db}");
    // the cut is to the millimetre, and the branches are equal
    assert!((ideal_phase - built_phase).abs() < 0.02, "{ideal_phase} {built_phase}");
}

#[test]
fn a_pad_is_in_the_built_weights() {
    // three in line: the outer elements pass a 3 dB pad and a second hybrid, so they come at half the middle's amplitude
    let json = Settled::new(&demo("vertical-cells"), Weighting::Built).json();
    let weights = figures(&json, "east")["weights"].as_array().expect("weights").clone();
    let level = |n: usize| weights[n]["amplitude"].as_f64().expect("a level");
    let half = 10_f64.powf(-3.0 / 20.0) / 2_f64.sqrt();
    // front undelayed, middle through one delay, rear through two: the losses of the delays are small
    assert!((level(0) / level(1) - half).abs() < 0.015, "{}", level(0) / level(1));
    assert!(level(2) < level(0));
}
