//! The electrical reading of a feed tree: the complex weight of every element.

use num_complex::Complex64;

use crate::plan::{
    ArrayPlan, Cables, DesignWeight, FeedTree, LineId, LineLength, LineRole, Node, RoleId, State,
};
use crate::radio::delay_factor;
use crate::units::Frequency;

/// The weights that the elements are meant to have: amplitudes, inversions and delays as designed, nothing lost.
pub fn designed(plan: &ArrayPlan, frequency: Frequency) -> Vec<Complex64> {
    complex(&plan.design, frequency)
}

/// Design weights as complex numbers.
pub fn complex(weights: &[DesignWeight], frequency: Frequency) -> Vec<Complex64> {
    weights.iter().map(|weight| Complex64::from_polar(weight.amplitude, weight.phase(frequency))).collect()
}

/// What a line does to a signal at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineFigures {
    /// Matched loss in dB; nothing when the catalogue has no figure there.
    pub loss_db: Option<f64>,
    /// Electrical length in metres of free space.
    pub electrical_m: f64,
}

/// Loss and electrical length of every line of a feed tree, in its order.
///
/// Every line is taken as matched; the velocity factor is that of the chosen cable at this frequency.
pub fn line_figures(
    feed: &FeedTree,
    lengths: &[LineLength],
    cables: &Cables,
    frequency: Frequency,
) -> Vec<LineFigures> {
    feed.lines
        .iter()
        .zip(lengths)
        .map(|(line, length)| {
            let cable = cables.of(line.role);
            let data = cable.data.as_ref();
            let velocity = data.and_then(|data| data.velocity_at(frequency)).unwrap_or(cable.velocity);
            let per_100m = data.and_then(|data| data.loss_db_per_100m(frequency).ok());
            LineFigures {
                loss_db: per_100m.map(|loss| loss * length.finished.metres() / 100.0),
                electrical_m: length.finished.metres() / velocity.value(),
            }
        })
        .collect()
}

/// The weights that the parts on the list produce in one direction: loss and phase of every line and pad up to the last
/// combiner, ideal hybrids (1/√n a port), every line matched. The main line and an amplifier behind the last combiner
/// act on all alike and are left out.
///
/// An idle leg has the weight 0.
pub fn built(feed: &FeedTree, lines: &[LineFigures], state: &State, frequency: Frequency) -> Vec<Complex64> {
    let mut roles = vec![Complex64::ZERO; feed.roles.len()];
    spread(feed, &feed.root, Complex64::ONE, lines, frequency, &mut roles);
    feed.legs
        .iter()
        .zip(&state.roles)
        .map(|(leg, role)| {
            let own = leg.branch.map_or(Complex64::ONE, |line| through(&lines[line.0], frequency));
            role.map_or(Complex64::ZERO, |RoleId(role)| own * roles[role])
        })
        .collect()
}

fn through(line: &LineFigures, frequency: Frequency) -> Complex64 {
    delay_factor(frequency, line.electrical_m) * from_db(-line.loss_db.unwrap_or_default())
}

fn from_db(db: f64) -> f64 {
    10_f64.powf(db / 20.0)
}

/// Walks from the receiver to the roles, multiplying as it goes.
fn spread(
    feed: &FeedTree,
    node: &Node,
    gain: Complex64,
    lines: &[LineFigures],
    frequency: Frequency,
    roles: &mut [Complex64],
) {
    let behind = match node {
        Node::Role(RoleId(role)) => {
            roles[*role] += gain;
            return;
        }
        Node::Line { line, .. } if is_common(feed, node, *line) => gain,
        Node::Line { line, .. } => gain * through(&lines[line.0], frequency),
        Node::Inverter { .. } => -gain,
        Node::Pad { db, .. } => gain * from_db(-db),
        Node::Amplifier { .. } => gain,
        Node::Combine { inputs, .. } => gain / ways(inputs.len()).sqrt(),
    };
    for input in node.inputs() {
        spread(feed, input, behind, lines, frequency, roles);
    }
}

/// The main line at the root carries all elements alike.
fn is_common(feed: &FeedTree, node: &Node, line: LineId) -> bool {
    std::ptr::eq(node, &raw const feed.root) && feed.line(line).role == LineRole::Main
}

#[expect(clippy::cast_precision_loss, reason = "a handful of inputs")]
fn ways(n: usize) -> f64 {
    n as f64
}

/// Loss in dB of the main line at the root; 0 when there is none, nothing when the catalogue has no figure.
pub fn path_loss_db(feed: &FeedTree, lines: &[LineFigures]) -> Option<f64> {
    match &feed.root {
        Node::Line { line, .. } => lines[line.0].loss_db,
        Node::Role(_)
        | Node::Inverter { .. }
        | Node::Pad { .. }
        | Node::Amplifier { .. }
        | Node::Combine { .. } => Some(0.0),
    }
}
