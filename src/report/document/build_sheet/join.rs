//! What is joined inside each hub, told by the labels on its cables.

use crate::plan::{FeedTree, HubId, Layout, LineRole, Node, RoleId};

/// One sentence a hub, such as "H1: B1 front + (B2 rear → D1 → inverter)": the signal runs with the arrows, a plus is a
/// hybrid, the innermost brackets are joined first.
pub(super) fn joined(tree: &FeedTree, layout: &Layout) -> Vec<String> {
    let mut tops = Vec::new();
    collect(tree, &tree.root, true, &mut tops);
    tops.sort_by_key(|node| hub_of(node).map(|hub| hub.0));
    tops.iter()
        .filter_map(|node| {
            let hub = &tree.hubs[hub_of(node)?.0];
            Some(format!("{}: {}", layout.point(hub.point).name, words(tree, node)))
        })
        .collect()
}

/// The outermost node of every hub: what stands behind the main line and behind every run.
fn collect<'a>(tree: &FeedTree, node: &'a Node, outermost: bool, tops: &mut Vec<&'a Node>) {
    if let Node::Line { line, input } = node
        && leaves_the_hub(tree.line(*line).role)
    {
        return collect(tree, input, true, tops);
    }
    if outermost {
        tops.push(node);
    }
    for input in node.inputs() {
        collect(tree, input, false, tops);
    }
}

fn leaves_the_hub(role: LineRole) -> bool {
    match role {
        LineRole::Branch | LineRole::Run | LineRole::Main => true,
        LineRole::Delay => false,
    }
}

fn hub_of(node: &Node) -> Option<HubId> {
    match node {
        Node::Role(_) => None,
        Node::Line { input, .. } => hub_of(input),
        Node::Inverter { hub, .. }
        | Node::Pad { hub, .. }
        | Node::Amplifier { hub, .. }
        | Node::Combine { hub, .. } => Some(*hub),
    }
}

fn words(tree: &FeedTree, node: &Node) -> String {
    match node {
        Node::Role(role) => leg(tree, *role),
        Node::Line { line, input } => {
            let line = tree.line(*line);
            if leaves_the_hub(line.role) { line.label.clone() } else { after(tree, input, &line.label) }
        }
        Node::Inverter { input, .. } => after(tree, input, "inverter"),
        Node::Pad { db, input, .. } => after(tree, input, &format!("pad {db:.1} dB")),
        Node::Amplifier { input, .. } => after(tree, input, "amplifier"),
        Node::Combine { inputs, .. } => {
            let parts: Vec<String> = inputs
                .iter()
                .map(|input| words(tree, input))
                .map(|part| if part.contains('→') || part.contains('+') { format!("({part})") } else { part })
                .collect();
            parts.join(" + ")
        }
    }
}

fn after(tree: &FeedTree, input: &Node, what: &str) -> String {
    let before = words(tree, input);
    match input {
        Node::Combine { .. } => format!("({before}) → {what}"),
        Node::Role(_)
        | Node::Line { .. }
        | Node::Inverter { .. }
        | Node::Pad { .. }
        | Node::Amplifier { .. } => {
            format!("{before} → {what}")
        }
    }
}

/// "B2 rear": the branch that plays a role in the first direction.
fn leg(tree: &FeedTree, role: RoleId) -> String {
    let name = &tree.roles[role.0];
    let state = tree.switch.states.first();
    let leg = state.and_then(|state| state.roles.iter().position(|played| *played == Some(role)));
    let branch = leg.and_then(|leg| tree.legs[leg].branch).map(|line| &tree.line(line).label);
    branch.map_or_else(|| name.clone(), |label| format!("{label} {name}"))
}
