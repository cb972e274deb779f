//! How exact each line must be, and at which frequency a finished one proves right.

use std::collections::BTreeMap;

use num_complex::Complex64;

use super::element;
use super::report::{Subject, seen_from, weights};
use crate::catalogue::{Cable, VelocityData};
use crate::physics::velocity::{FarEnd, VelocityPoints, test_frequency};
use crate::plan::{CablePart, FeedTree, LineId, LineRole, Node, RoleId};
use crate::radio::{self, Response};
use crate::units::{Decibel, ElectricalLength, Frequency, Length};

/// Never printed above 0.5 % of the length, 0.2 % inside a match group (common practice, no source).
const ALONE: f64 = 0.005;
const IN_GROUP: f64 = 0.002;

/// The largest single length error of every line that keeps the wanted rear rejection, physical, rounded down to the
/// millimetre; `None` for lines that need not be exact.
///
/// `directive` says whether the array has a rear to keep quiet; a pure row has only the cap.
pub fn tolerances(
    subject: &Subject<'_>,
    frequency: Frequency,
    reject: Option<Decibel>,
) -> Vec<Option<Length>> {
    let phase = reject.map(|reject| phase_limits(subject, frequency, reject)).unwrap_or_default();
    let feed = &subject.plan.feed;
    (0..feed.lines.len())
        .map(|index| {
            let line = &feed.lines[index];
            if line.role != LineRole::Delay && line.match_group.is_empty() {
                return None;
            }
            let share = if line.match_group.is_empty() { ALONE } else { IN_GROUP };
            let cap = share * subject.lengths[index].finished.metres();
            let velocity = subject.cables.of(line.role).velocity;
            let limit =
                phase.get(&LineId(index)).map(|degrees| radio::line_error_m(frequency, *degrees, velocity));
            Some(floor_mm(limit.map_or(cap, |limit| limit.min(cap))))
        })
        .collect()
}

fn floor_mm(metres: f64) -> Length {
    Length::from_metres_nearest((metres * 1000.0).floor() / 1000.0)
}

/// For each line, the smallest phase limit of the elements that play through it alone; lines that carry several elements
/// alike (runs of a row) do not move a null and have none.
fn phase_limits(subject: &Subject<'_>, frequency: Frequency, reject: Decibel) -> BTreeMap<LineId, f64> {
    let mut limits = BTreeMap::new();
    let feed = &subject.plan.feed;
    for state in &feed.switch.states {
        let elements = seen_from(subject, state);
        let weights: Vec<Complex64> = weights(subject, state, frequency);
        let Ok(response) = Response::new(&elements, subject.soil, frequency) else { continue };
        if response.check_weights(&weights).is_err() {
            continue;
        }
        for (leg, role) in state.roles.iter().enumerate() {
            let Some(role) = role else { continue };
            let limit = radio::single_error_limit(&response, &weights, leg, reject.db()).phase_deg;
            let own = feed.legs[leg].branch.into_iter();
            for line in own.chain(delays_of(feed, *role)) {
                let entry = limits.entry(line).or_insert(limit);
                *entry = entry.min(limit);
            }
        }
    }
    limits
}

/// The delay lines between a role and the receiver.
fn delays_of(feed: &FeedTree, role: RoleId) -> Vec<LineId> {
    let mut path = Vec::new();
    find(feed, &feed.root, role, &mut path);
    path
}

fn find(feed: &FeedTree, node: &Node, role: RoleId, path: &mut Vec<LineId>) -> bool {
    if matches!(node, Node::Role(own) if *own == role) {
        return true;
    }
    if !node.inputs().iter().any(|input| find(feed, input, role, path)) {
        return false;
    }
    if let Node::Line { line, .. } = node
        && feed.line(*line).role == LineRole::Delay
    {
        path.push(*line);
    }
    true
}

/// The frequency at which a finished line proves right.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Trim {
    /// Far end open: first resistance dip, a quarter wave.
    pub open: Frequency,
    /// Far end shorted: first resistance dip, half a wave.
    pub shorted: Frequency,
    /// Whether the velocity factor at the test frequency is known.
    pub basis: TrimBasis,
}

/// On what a test frequency rests.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TrimBasis {
    /// The catalogue has velocity points: the factor of the test frequency was used.
    Points,
    /// One number at every frequency: the test frequency may be 0.6 % off.
    OneNumber,
}

/// Test frequencies of a line with this electrical length at the design frequency, by `physics::velocity`.
pub fn trim(electrical: ElectricalLength, cable: &CablePart, design: Frequency) -> Option<Trim> {
    let listed = cable.data.as_ref().and_then(Cable::velocity);
    let velocity = listed.unwrap_or_else(|| VelocityPoints::constant(cable.velocity));
    let dip = |far_end| test_frequency(electrical, far_end, design, &velocity).map(|test| test.frequency);
    let points = cable.data.as_ref().is_some_and(
        |data| matches!(&data.velocity_factor, VelocityData::Points(points) if points.len() > 1),
    );
    Some(Trim {
        open: dip(FarEnd::Open)?,
        shorted: dip(FarEnd::Shorted)?,
        basis: if points { TrimBasis::Points } else { TrimBasis::OneNumber },
    })
}

/// The level error that one element may have while the wanted rear rejection is kept, the smallest of all elements.
pub fn level_limit_db(subject: &Subject<'_>, frequency: Frequency, reject: Decibel) -> Option<f64> {
    let state = subject.plan.feed.switch.states.first()?;
    let elements = element::elements(&subject.plan.layout, subject.ends);
    let response = Response::new(&elements, subject.soil, frequency).ok()?;
    let weights = weights(subject, state, frequency);
    response.check_weights(&weights).ok()?;
    (0..weights.len())
        .map(|leg| radio::single_error_limit(&response, &weights, leg, reject.db()).amplitude_db)
        .min_by(f64::total_cmp)
}
