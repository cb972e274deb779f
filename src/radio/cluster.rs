//! Which wires stand so close that they must be solved together.

use super::element::{ElementKind, RadioElement};
use super::low_wire::WireSpec;

/// Wires nearer to each other than this are coupled, in metres.
pub const COUPLING_DISTANCE_M: f64 = 50.0;

/// Two wires nearer sideways than this stand in one line and cannot be solved as a pair, in metres.
const LEAST_OFFSET_M: f64 = 0.1;

/// Elements sorted into coupled pairs and elements that are taken alone.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Grouping {
    /// Coupled wires as (rear, front), by place in the list of elements.
    pub pairs: Vec<(usize, usize)>,
    /// Elements taken alone.
    pub lone: Vec<usize>,
    /// Wires that do couple but are taken alone, because the method does not cover them.
    pub uncovered: Vec<Uncovered>,
}

/// A cluster of wires that couple in a way the method does not cover.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Uncovered {
    /// Its elements, by place in the list.
    pub elements: Vec<usize>,
    /// What about it is not covered.
    pub why: &'static str,
}

/// The wire behind an element, or `None` for a vertical.
///
/// A two-way wire behaves as one conductor of radius √(aD), the geometric mean of wire radius and spacing.
pub(super) fn wire_spec(kind: &ElementKind) -> Option<WireSpec> {
    use super::element::Termination;
    match kind {
        ElementKind::ShortVertical { .. } => None,
        ElementKind::LowWire { length, height, diameter, termination } => Some(WireSpec {
            length: length.metres(),
            height: height.metres(),
            radius: diameter.metres() / 2.0,
            termination: *termination,
        }),
        ElementKind::TwoWayWire { length, height, diameter, spacing, path: _ } => Some(WireSpec {
            length: length.metres(),
            height: height.metres(),
            radius: (diameter.metres() / 2.0 * spacing.metres()).sqrt(),
            termination: Termination::Matched,
        }),
    }
}

/// Distance between two parallel wires seen from above, in metres.
fn distance_m(a: (&RadioElement, &WireSpec), b: (&RadioElement, &WireSpec)) -> f64 {
    let (rear, front) = if a.0.position.x() <= b.0.position.x() { (a, b) } else { (b, a) };
    let gap = (front.0.position.x() - rear.0.position.x() - rear.1.length).max(0.0);
    gap.hypot(front.0.position.y() - rear.0.position.y())
}

/// Sorts the elements into coupled pairs, elements alone, and clusters that are not covered.
///
/// Covered is a cluster of exactly two wires of equal length, height and diameter whose stagger is less than their length.
pub fn group(elements: &[RadioElement]) -> Grouping {
    let wires: Vec<Option<WireSpec>> = elements.iter().map(|element| wire_spec(&element.kind)).collect();
    let mut grouping = Grouping::default();
    for cluster in clusters(elements, &wires) {
        match pair(elements, &wires, &cluster) {
            Ok(Some(pair)) => grouping.pairs.push(pair),
            Ok(None) => grouping.lone.extend(&cluster),
            Err(why) => {
                grouping.lone.extend(&cluster);
                grouping.uncovered.push(Uncovered { elements: cluster, why });
            }
        }
    }
    grouping
}

/// Elements joined by any chain of short distances, in order of their first member.
fn clusters(elements: &[RadioElement], wires: &[Option<WireSpec>]) -> Vec<Vec<usize>> {
    let near = |i: usize, j: usize| match (&wires[i], &wires[j]) {
        (Some(a), Some(b)) => distance_m((&elements[i], a), (&elements[j], b)) < COUPLING_DISTANCE_M,
        (None, _) | (_, None) => false,
    };
    let mut left: Vec<usize> = (0..elements.len()).rev().collect();
    let mut found = Vec::new();
    while let Some(first) = left.pop() {
        let mut cluster = vec![first];
        let mut next = 0;
        while next < cluster.len() {
            let member = cluster[next];
            let joined: Vec<usize> = left.iter().copied().filter(|&other| near(member, other)).collect();
            left.retain(|other| !joined.contains(other));
            cluster.extend(joined);
            next += 1;
        }
        cluster.sort_unstable();
        found.push(cluster);
    }
    found
}

/// The cluster as a (rear, front) pair, `None` for a single element, or why it is not covered.
fn pair(
    elements: &[RadioElement],
    wires: &[Option<WireSpec>],
    cluster: &[usize],
) -> Result<Option<(usize, usize)>, &'static str> {
    let &[first, second] = cluster else {
        let why = "three or more wires stand within 50 m of each other";
        return if cluster.len() > 2 { Err(why) } else { Ok(None) };
    };
    let (Some(a), Some(b)) = (&wires[first], &wires[second]) else { return Ok(None) };
    let same = |x: f64, y: f64| (x - y).abs() <= 1e-9 * x.abs();
    if !(same(a.height, b.height) && same(a.length, b.length) && same(a.radius, b.radius)) {
        return Err("two wires within 50 m of each other differ in length, height or diameter");
    }
    let stagger = elements[second].position.x() - elements[first].position.x();
    if stagger.abs() >= a.length {
        return Err("the stagger of two wires within 50 m of each other is not less than their length");
    }
    if (elements[second].position.y() - elements[first].position.y()).abs() < LEAST_OFFSET_M {
        return Err("two wires stand in one line and overlap");
    }
    Ok(Some(if stagger < 0.0 { (second, first) } else { (first, second) }))
}
