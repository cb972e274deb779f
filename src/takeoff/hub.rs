//! Hubs: boxes and what the feed tree puts in them.

use super::ArrayDesign;
use super::tally::{Tally, Want};
use crate::plan::layout::Shelter;
use crate::plan::{Connection, Fixture, Hub, Node};

/// Counts the boxes of the hubs and the nodes of the feed tree.
pub(super) fn take_off(tally: &mut Tally<'_>, array: &ArrayDesign) {
    for hub in &array.plan.feed.hubs {
        boxed(tally, array, hub);
    }
    let z0 = super::support::coax_impedance(array);
    for node in array.plan.feed.nodes() {
        count_node(tally, array, node, &z0);
    }
}

/// Sockets of a hub's box: lines in, lines out, and two for every delay looped on it.
pub fn sockets(array: &ArrayDesign, hub: &Hub) -> usize {
    let looped = array
        .plan
        .feed
        .lines
        .iter()
        .filter(|line| line.connection == Connection::Looped && line.termini.from == hub.point);
    hub.inputs + hub.outputs + 2 * looped.count()
}

fn boxed(tally: &mut Tally<'_>, array: &ArrayDesign, hub: &Hub) {
    let point = array.plan.layout.point(hub.point);
    let sockets = sockets(array, hub);
    let why = format!("hub box with {sockets} sockets");
    let want =
        Want::any().with("z_ohm", super::support::coax_impedance(array)).at_least("ways", sockets.into());
    tally.add("hub-box", &want, &point.name, 1, &why);
    let outdoors = point.fixtures.contains(&Fixture::HubBox(Shelter::Outdoors));
    if outdoors {
        let why = "surge rod with its clamp at a hub outdoors, at least 5 m from every antenna earth, never joined to it";
        tally.add("surge-rod", &Want::any(), &point.name, 1, why);
    }
}

fn count_node(tally: &mut Tally<'_>, array: &ArrayDesign, node: &Node, z0: &str) {
    let name =
        |hub: &crate::plan::HubId| array.plan.layout.point(array.plan.feed.hubs[hub.0].point).name.clone();
    let boxed = Want::any().with("z_ohm", z0);
    match node {
        Node::Role(_) | Node::Line { .. } => {}
        Node::Inverter { hub, .. } => {
            tally.add("inverter", &boxed, &name(hub), 1, "turns one leg over before combining");
        }
        Node::Pad { hub, db, why, .. } => {
            let want = boxed.with("db", format!("{}", (db * 10.0).round() / 10.0));
            tally.add("pad", &want, &name(hub), 1, &format!("pad of {db:.1} dB: {why}"));
        }
        Node::Amplifier { hub, .. } => {
            let want = Want::any().with("element", "hub");
            let why = format!("between the last combiner and the main line: {}", array.amplifier_reason);
            tally.add("amplifier", &want, &name(hub), 1, &why);
        }
        Node::Combine { hub, inputs } => {
            let role = format!("hybrid-{}way", inputs.len());
            let why = format!("in-phase hybrid for {} inputs", inputs.len());
            tally.add(&role, &boxed, &name(hub), 1, &why);
        }
    }
}
