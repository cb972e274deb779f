//! The lengths of every line: straight, routed, finished and cut, each with the arithmetic behind it.

use rust_decimal::Decimal;

use super::feed::{FeedTree, Line, LineId, LineRole};
use super::layout::Layout;
use crate::project::Practice;
use crate::units::{ElectricalLength, Length, VelocityFactor};

/// The lengths of one line.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct LineLength {
    /// Plan distance between its ends, nearest millimetre; nothing for a delay line.
    pub straight: Length,
    /// As laid.
    pub routed: Length,
    /// Plug to plug.
    pub finished: Length,
    /// With preparation and trim.
    pub cut: Length,
    /// What is over because the group is equal, coiled at the hub.
    pub coiled: Length,
    /// The arithmetic, one step a line.
    pub steps: Vec<String>,
}

impl LineLength {
    /// The electrical length of the finished line: a delay line's own, else finished length over velocity factor.
    pub fn electrical(&self, line: &Line, velocity: VelocityFactor) -> ElectricalLength {
        match line.role {
            LineRole::Delay => line.delay,
            LineRole::Branch | LineRole::Run | LineRole::Main => {
                ElectricalLength::from_metres(self.finished.decimal_metres() / velocity.ratio())
            }
        }
    }
}

/// What the lengths depend on besides the plan.
#[derive(Clone, Debug)]
pub struct Allowances<'a> {
    /// The shop's allowances.
    pub practice: &'a Practice,
    /// Routed over straight length on this terrain.
    pub route_factor: Decimal,
}

impl Allowances<'_> {
    /// What both ends and the burial add to a routed length.
    pub fn ends(&self) -> Length {
        let practice = self.practice;
        let end = practice.riser + practice.service_loop + practice.drip_loop + practice.burial_depth;
        end * 2
    }

    /// The way as laid.
    pub fn routed(&self, straight: Length) -> Length {
        straight.times_up(self.route_factor)
    }

    /// Slack of a buried cable (1 %, common practice, no source); none on the surface.
    pub fn burial_slack(&self, routed: Length) -> Length {
        if self.practice.burial_depth > Length::ZERO {
            routed.times_up(Decimal::new(1, 2))
        } else {
            Length::ZERO
        }
    }

    /// Finished to cut, without trim.
    pub fn cut(&self, finished: Length) -> Length {
        (finished + self.practice.strip * 2).up_to(self.practice.round_up)
    }

    /// Finished to cut of a piece that is trimmed to length.
    pub fn cut_with_trim(&self, finished: Length) -> Length {
        (finished + self.trim(finished)).up_to(self.practice.round_up)
    }

    fn trim(&self, finished: Length) -> Length {
        self.practice.trim_least.max(finished.times_up(self.practice.trim_ratio))
    }

    /// The words for what the ends add: "4.6 m ends (2 × riser 1.0 m + …)".
    pub fn ends_in_words(&self) -> String {
        let practice = self.practice;
        let burial = match practice.burial_depth {
            Length::ZERO => String::new(),
            depth => format!(" + burial {depth}"),
        };
        format!(
            "{} ends (2 × riser {} + service loop {} + drip loop {}{burial})",
            self.ends(),
            practice.riser,
            practice.service_loop,
            practice.drip_loop
        )
    }
}

/// Measures every line of a feed tree, in the order of `feed.lines`.
///
/// `velocity` gives the velocity factor of the cable chosen for a line role at the design frequency.
pub fn measure(
    layout: &Layout,
    feed: &FeedTree,
    allowances: &Allowances<'_>,
    velocity: impl Fn(LineRole) -> VelocityFactor,
) -> Vec<LineLength> {
    (0..feed.lines.len())
        .map(|index| {
            let line = &feed.lines[index];
            match line.role {
                LineRole::Delay => delay_length(line, allowances, velocity(line.role)),
                LineRole::Branch | LineRole::Run | LineRole::Main => {
                    let group = group_of(feed, LineId(index));
                    laid_length(layout, line, &group, allowances, velocity(line.role))
                }
            }
        })
        .collect()
}

/// The lines that must be equal to `id`, itself included.
fn group_of(feed: &FeedTree, id: LineId) -> Vec<&Line> {
    let line = feed.line(id);
    if line.match_group.is_empty() {
        return vec![line];
    }
    feed.lines.iter().filter(|l| l.role == line.role && l.match_group == line.match_group).collect()
}

fn delay_length(line: &Line, allowances: &Allowances<'_>, vf: VelocityFactor) -> LineLength {
    let finished = line.delay.physical(vf);
    let cut = allowances.cut_with_trim(finished);
    let steps = vec![
        format!("{} = {} electrical", line.delay_reason, line.delay),
        format!("× velocity factor {vf} = {finished}, plug to plug"),
        trim_step(allowances, finished, cut),
    ];
    LineLength { straight: Length::ZERO, routed: Length::ZERO, finished, cut, coiled: Length::ZERO, steps }
}

fn trim_step(allowances: &Allowances<'_>, finished: Length, cut: Length) -> String {
    let practice = allowances.practice;
    format!("+ trim {}, up to {} = {cut} to cut", allowances.trim(finished), practice.round_up)
}

/// Straight, routed and the unrounded reach of a line that is laid.
struct Way {
    straight: Length,
    routed: Length,
    reach: Length,
}

fn reach_of(layout: &Layout, line: &Line, allowances: &Allowances<'_>) -> Way {
    let (from, to) = (layout.point(line.termini.from), layout.point(line.termini.to));
    let straight = match line.role {
        LineRole::Main => Length::from_metres_nearest(from.site.distance_m(to.site)),
        LineRole::Branch | LineRole::Run | LineRole::Delay => {
            Length::from_metres_nearest(from.at.distance_m(to.at))
        }
    };
    let routed = allowances.routed(straight);
    let chokes = chokes_on(line.role);
    let reach = routed
        + allowances.burial_slack(routed)
        + allowances.ends()
        + allowances.practice.choke_coax * i64::from(chokes);
    Way { straight, routed, reach }
}

/// Common-mode chokes of a line: one a branch, one a run, two a main (common practice, no source).
pub fn chokes_on(role: LineRole) -> u32 {
    match role {
        LineRole::Branch | LineRole::Run => 1,
        LineRole::Main => 2,
        LineRole::Delay => 0,
    }
}

fn laid_length(
    layout: &Layout,
    line: &Line,
    group: &[&Line],
    allowances: &Allowances<'_>,
    vf: VelocityFactor,
) -> LineLength {
    let round_up = allowances.practice.round_up;
    let own = reach_of(layout, line, allowances);
    let extra = line.delay.physical(vf);
    let needs = |line: &Line| reach_of(layout, line, allowances).reach - line.delay.physical(vf);
    let base = group.iter().map(|member| needs(member)).max().unwrap_or(own.reach).up_to(round_up);
    let finished = base + extra;
    let merged = line.delay > ElectricalLength::ZERO;
    let cut = if merged { allowances.cut_with_trim(finished) } else { allowances.cut(finished) };
    let coiled = finished - if merged { own.reach } else { own.reach.up_to(round_up) };
    let mut steps = reach_steps(&own, line, allowances);
    if base > own.reach.up_to(round_up) || merged {
        steps.push(format!("every member of group {} has the base of the longest: {base}", line.match_group));
    } else {
        steps.push(format!("up to {round_up} = {finished}, plug to plug"));
    }
    if merged {
        steps.push(format!("{} = {} electrical", line.delay_reason, line.delay));
        steps.push(format!("+ {} × velocity factor {vf} = {extra}: {finished}, plug to plug", line.delay));
        steps.push(trim_step(allowances, finished, cut));
    } else {
        steps.push(format!("+ 2 × strip {}, up to {round_up} = {cut} to cut", allowances.practice.strip));
    }
    LineLength {
        straight: own.straight,
        routed: own.routed,
        finished,
        cut,
        coiled: coiled.max(Length::ZERO),
        steps,
    }
}

fn reach_steps(own: &Way, line: &Line, allowances: &Allowances<'_>) -> Vec<String> {
    let mut steps = vec![format!(
        "{} straight × route factor {} = {} routed",
        own.straight,
        allowances.route_factor.normalize(),
        own.routed
    )];
    let slack = allowances.burial_slack(own.routed);
    if slack > Length::ZERO {
        steps.push(format!("+ {slack} slack of a buried cable (1 %)"));
    }
    let choke_coax = allowances.practice.choke_coax * i64::from(chokes_on(line.role));
    if choke_coax > Length::ZERO {
        steps.push(format!("+ {choke_coax} wound into chokes"));
    }
    steps.push(format!("+ {} = {}", allowances.ends_in_words(), own.reach));
    steps
}
