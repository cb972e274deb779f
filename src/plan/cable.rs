//! Which part serves which line.

use std::collections::BTreeSet;

use crate::catalogue::{Cable, Catalogue, Part, PartChoice, VelocityData};
use crate::problem::{Problem, Problems};
use crate::project::{ArraySpec, FeedSpec};
use crate::units::{Frequency, VelocityFactor};

use super::feed::{FeedTree, LineRole};

/// Codes of problems found while choosing cables.
pub mod code {
    crate::problem_codes! {
        /// `[array.feed]` names a part that the catalogue does not have.
        UNKNOWN_PART = "unknown-part";
        /// `[array.feed]` names a part of another role.
        WRONG_PART_ROLE = "wrong-part-role";
        /// A cable without velocity factor.
        NO_VELOCITY_FACTOR = "no-velocity-factor";
        /// Cables of different impedance in one array.
        MIXED_IMPEDANCE = "mixed-impedance";
    }
}

/// The cables of one array.
#[derive(Clone, Debug)]
pub struct Cables {
    /// For branches.
    pub branch: CablePart,
    /// For runs.
    pub run: CablePart,
    /// For delay lines.
    pub delay: CablePart,
    /// For the main line.
    pub main: CablePart,
    /// For control.
    pub control: PartChoice,
}

/// One chosen cable.
#[derive(Clone, Debug)]
pub struct CablePart {
    /// The part.
    pub part: PartChoice,
    /// Its velocity factor at the design frequency.
    pub velocity: VelocityFactor,
    /// Its data, if the catalogue has them.
    pub data: Option<Cable>,
    /// Its connector family, such as `f`.
    pub plug: Option<String>,
    /// Its series, which decides which plugs fit.
    pub series: Option<String>,
}

impl Cables {
    /// The cable of a line role.
    pub fn of(&self, role: LineRole) -> &CablePart {
        match role {
            LineRole::Branch => &self.branch,
            LineRole::Run => &self.run,
            LineRole::Delay => &self.delay,
            LineRole::Main => &self.main,
        }
    }
}

/// Chooses the cables of an array: the part named in `[array.feed]`, else the default of the role.
pub fn choose(spec: &ArraySpec, catalogue: &Catalogue, design: Frequency, problems: &mut Problems) -> Cables {
    let feed: &FeedSpec = &spec.feed;
    let mut coax = |key: &str, named: &Option<String>| {
        let part = part_for(spec, key, named.as_deref(), "cable", catalogue, problems);
        cable_part(spec, key, part, catalogue, design, problems)
    };
    let branch = coax("branch", &feed.branch);
    let run = coax("run", &feed.run);
    let delay = coax("delay", &feed.delay);
    let main = coax("main", &feed.main);
    let control = part_for(spec, "control", feed.control.as_deref(), "control-cable", catalogue, problems);
    let control = control.map_or_else(
        || PartChoice::Missing("control-cable".to_owned()),
        |part| PartChoice::Part(part.id.clone()),
    );
    Cables { branch, run, delay, main, control }
}

/// A line delays by its length only when it is matched: all lines that an array has want one impedance.
pub fn check_impedance(spec: &ArraySpec, cables: &Cables, feed: &FeedTree, problems: &mut Problems) {
    let used: BTreeSet<LineRole> = feed.lines.iter().map(|line| line.role).collect();
    let z0 = |role: &LineRole| cables.of(*role).data.as_ref().and_then(|data| data.z0_ohm);
    let known: Vec<_> = used.iter().filter_map(|role| z0(role).map(|z0| (*role, z0))).collect();
    let Some((_, first)) = known.first() else { return };
    if known.iter().all(|(_, z0)| z0 == first) {
        return;
    }
    let words = known
        .iter()
        .map(|(role, z0)| format!("{} `{}` {} ohm", role.word(), cables.of(*role).part.id(), z0.normalize()));
    let words = words.collect::<Vec<_>>().join(", ");
    let place = spec.places.feed.values().next().cloned().or_else(|| spec.places.name.clone());
    let message = format!("the lines of {} differ in impedance: {words}", spec.name);
    let help = "name cables of one impedance in [array.feed]: boxes, pads and delays are made for one";
    problems.push(Problem::warning(code::MIXED_IMPEDANCE, place, message, help));
}

fn part_for<'a>(
    spec: &ArraySpec,
    key: &str,
    named: Option<&str>,
    role: &str,
    catalogue: &'a Catalogue,
    problems: &mut Problems,
) -> Option<&'a Part> {
    let Some(id) = named else { return catalogue.default_part(role) };
    let place = spec.places.feed.get(key).cloned();
    let Some(part) = catalogue.parts.get(id) else {
        let known = catalogue.parts.values().filter(|part| part.role == role).map(|part| part.id.as_str());
        let known: Vec<&str> = known.collect();
        let help = match crate::problem::nearest(id, known.iter().copied()) {
            Some(near) => {
                format!("did you mean `{near}`? the catalogue's parts of role {role}: {}", known.join(", "))
            }
            None => format!("the catalogue's parts of role {role}: {}", known.join(", ")),
        };
        let message = format!("`{key}` names the part `{id}`, which the catalogue does not have");
        problems.push(Problem::error(code::UNKNOWN_PART, place, message, help));
        return None;
    };
    if part.role != role {
        let message = format!("`{key}` names `{id}`, which has the role {}", part.role);
        let help = format!("name a part of role {role}");
        problems.push(Problem::error(code::WRONG_PART_ROLE, place, message, help));
    }
    Some(part)
}

fn cable_part(
    spec: &ArraySpec,
    key: &str,
    part: Option<&Part>,
    catalogue: &Catalogue,
    design: Frequency,
    problems: &mut Problems,
) -> CablePart {
    let Some(part) = part else {
        let part = PartChoice::Missing("cable".to_owned());
        return CablePart { part, velocity: unit_velocity(), data: None, plug: None, series: None };
    };
    let data = catalogue.cables.get(&part.id).cloned();
    let velocity = data.as_ref().and_then(|cable| velocity_of(cable, design));
    let choice = PartChoice::Part(part.id.clone());
    let plug = part.attribute("plug").map(str::to_owned);
    let series = part.attribute("series").map(str::to_owned);
    if velocity.is_none() && part.role == "cable" {
        let place = spec.places.feed.get(key).cloned().or_else(|| spec.places.name.clone());
        let message =
            format!("the cable `{}` has no velocity factor, so no delay line can be cut from it", part.id);
        let help = "give `velocity_factor` in its row of cables.csv".to_owned();
        problems.push(Problem::error(code::NO_VELOCITY_FACTOR, place, message, help));
    }
    CablePart { part: choice, velocity: velocity.unwrap_or_else(unit_velocity), data, plug, series }
}

fn velocity_of(cable: &Cable, design: Frequency) -> Option<VelocityFactor> {
    match &cable.velocity_factor {
        VelocityData::None => None,
        VelocityData::One(_) | VelocityData::Points(_) => cable.velocity_at(design),
    }
}

fn unit_velocity() -> VelocityFactor {
    VelocityFactor::new(rust_decimal::Decimal::ONE).expect("invariant: 1 is a velocity factor")
}
