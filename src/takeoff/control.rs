//! Control cable, direct current to amplifiers.

use super::model::{Piece, PieceRole, Reason};
use super::support::{coax_impedance, line_impedance};
use super::tally::{Tally, Want};
use super::{ArrayDesign, Scene};
use crate::catalogue::PartChoice;
use crate::plan::{Allowances, ElementKind, FeedTree, Line, LineRole, Node};
use crate::project::{Power, VerticalKind};
use crate::units::Length;

/// Conductors of an array's control cable: ceil(log2 directions) + return, and a pair for direct current.
pub fn conductors(array: &ArrayDesign) -> u32 {
    let directions = u32::try_from(array.plan.feed.switch.states.len()).unwrap_or(u32::MAX);
    let bits = directions.next_power_of_two().trailing_zeros();
    let control = if bits > 0 { bits + 1 } else { 0 };
    let pair = if needs_power(array) && array.spec.feed.power == Power::Control && has_field_hub(array) {
        2
    } else {
        0
    };
    control + pair
}

fn active_elements(array: &ArrayDesign) -> usize {
    let active = |kind: &ElementKind| match kind {
        ElementKind::Vertical(foot) => foot.kind == VerticalKind::Active,
        ElementKind::Wire(_) => false,
    };
    array.plan.layout.elements.iter().filter(|element| active(&element.kind)).count()
}

fn has_hub_amplifier(feed: &FeedTree) -> bool {
    feed.nodes().iter().any(|node| matches!(node, Node::Amplifier { .. }))
}

fn needs_power(array: &ArrayDesign) -> bool {
    active_elements(array) > 0 || has_hub_amplifier(&array.plan.feed)
}

/// A hub that direct current has to reach along a control cable.
fn has_field_hub(array: &ArrayDesign) -> bool {
    array.plan.feed.hubs.iter().any(|hub| hub.outputs > 0)
}

/// Whether direct current goes on along a line: every main line has it; a run only when amplifiers stand at the elements, for
/// a hub's amplifier sits at the head of its main line.
fn carries_current(array: &ArrayDesign, line: &Line) -> bool {
    match line.role {
        LineRole::Main => true,
        LineRole::Run => active_elements(array) > 0,
        LineRole::Branch | LineRole::Delay => false,
    }
}

/// Whether control cable lies beside a line: where current goes on, and along the runs to hubs that are switched.
fn has_cable_beside(array: &ArrayDesign, line: &Line) -> bool {
    let switched_run = line.role == LineRole::Run && array.plan.feed.switch.states.len() > 1;
    carries_current(array, line) || switched_run
}

/// Control pieces, supply, bias tees.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>, array: &ArrayDesign) {
    let conductors = conductors(array);
    if conductors > 0 {
        add_cables(tally, scene, array, conductors);
    }
    if array.plan.feed.switch.states.len() > 1 {
        tally.add("control-box", &Want::any(), "RX", 1, "selects the direction");
    }
    if needs_power(array) {
        let why = format!("direct current for the amplifiers of {}", array.spec.name);
        tally.add("power-supply", &Want::any(), "RX", 1, &why);
        tally.add("fuse", &Want::any(), "RX", 1, &why);
        add_bias_tees(tally, array);
    }
}

fn add_bias_tees(tally: &mut Tally<'_>, array: &ArrayDesign) {
    let layout = &array.plan.layout;
    if active_elements(array) > 0 {
        for leg in &array.plan.feed.legs {
            let place = match leg.branch {
                Some(line) => layout.point(array.plan.feed.line(line).termini.to).name.clone(),
                None => "RX".to_owned(),
            };
            let why = "feeds direct current into the leg of an active vertical";
            let want = Want::any().with("z_ohm", coax_impedance(array));
            tally.add("bias-tee", &want, &place, 1, why);
        }
    }
    if array.spec.feed.power == Power::Main {
        let fed = array.plan.feed.lines.iter().filter(|line| carries_current(array, line));
        for line in fed.filter(|_| has_field_hub(array)) {
            for end in [line.termini.from, line.termini.to] {
                let why = "direct current along a coax line: one at each end";
                let want = Want::any().with("z_ohm", line_impedance(array, line.role));
                tally.add("bias-tee", &want, &layout.point(end).name, 1, why);
            }
        }
    }
}

/// Control cable goes beside the main line and the runs that need it, with the same four lengths.
fn add_cables(tally: &mut Tally<'_>, scene: &Scene<'_>, array: &ArrayDesign, conductors: u32) {
    let allowances =
        Allowances { practice: &scene.project.practice, route_factor: scene.design.route_factor };
    let lines: Vec<&Line> =
        array.plan.feed.lines.iter().filter(|line| has_cable_beside(array, line)).collect();
    for line in lines {
        tally.push(cable_beside(tally, &allowances, array, line, conductors));
    }
    let why = format!("one a conductor of the control cable of {}, the return included", array.spec.name);
    tally.add("control-arrester", &Want::any(), "RX", conductors, &why);
}

fn cable_beside(
    tally: &Tally<'_>,
    allowances: &Allowances<'_>,
    array: &ArrayDesign,
    line: &Line,
    conductors: u32,
) -> Piece {
    let layout = &array.plan.layout;
    let (from, to) = (layout.point(line.termini.from), layout.point(line.termini.to));
    let straight = Length::from_metres_nearest(from.site.distance_m(to.site));
    let routed = allowances.routed(straight);
    let reach = routed + allowances.burial_slack(routed) + allowances.ends();
    let finished = reach.up_to(allowances.practice.round_up);
    let steps = vec![
        format!(
            "{straight} straight × route factor {} = {routed} routed",
            allowances.route_factor.normalize()
        ),
        format!(
            "+ {} = {reach}, up to {} = {finished}",
            allowances.ends_in_words(),
            allowances.practice.round_up
        ),
        format!("beside {}; {conductors} conductors", line.label),
    ];
    Piece {
        label: format!("C-{}", line.label),
        role: PieceRole::Control,
        part: control_part(tally, array, conductors),
        from: from.name.clone(),
        to: to.name.clone(),
        straight: Some(straight),
        routed: Some(routed),
        finished,
        cut: allowances.cut(finished),
        coiled: None,
        match_group: String::new(),
        conductors: Some(conductors),
        electrical: None,
        serves: "control".to_owned(),
        line: None,
        reason: Reason::steps(steps),
    }
}

/// The cable named in the project, else the least cable with enough conductors.
fn control_part(tally: &Tally<'_>, array: &ArrayDesign, conductors: u32) -> PartChoice {
    match &array.spec.feed.control {
        Some(_) => array.cables.control.clone(),
        None => tally.choose("control-cable", &Want::any().at_least("conductors", conductors.into())),
    }
}
