//! What the land says to a layout: paths under wires, keep-out areas, radials that would touch.

use super::code;
use crate::plan::layout::Shelter;
use crate::plan::{ArrayPlan, Fixture, Point, PointKind, SitePosition, Span};
use crate::problem::{Problem, Problems};
use crate::project::{ArraySpec, Crossing, CrossingKind, KeepOut, Project};
use crate::units::Length;

/// Clearance over footpaths and gates, more over tracks (common practice, no source; local rules first).
const CLEARANCE: Length = Length::from_mm(3_000);

/// Checks one array against the land.
pub(super) fn check(project: &Project, spec: &ArraySpec, plan: &ArrayPlan, problems: &mut Problems) {
    for crossing in &project.crossings {
        for span in &plan.layout.spans {
            under_wire(project, plan, crossing, span, problems);
        }
    }
    for area in &project.keep_out {
        inside(spec, plan, area, problems);
    }
    radials(project, spec, plan, problems);
    hubs(spec, plan, problems);
}

fn under_wire(
    project: &Project,
    plan: &ArrayPlan,
    crossing: &Crossing,
    span: &Span,
    problems: &mut Problems,
) {
    let clearance = span.height - project.practice.max_sag;
    let low = match crossing.kind {
        CrossingKind::Road | CrossingKind::Path | CrossingKind::Gate => clearance < CLEARANCE,
        CrossingKind::Ditch => false,
    };
    let (from, to) = (plan.layout.point(span.from).site, plan.layout.point(span.to).site);
    let near = distance_to_segment(crossing.at.into(), from, to) <= crossing.width.metres() / 2.0;
    if low && near {
        let wire = &plan.layout.elements[span.element.0].name;
        let message = format!(
            "{wire} of {} hangs {clearance} above a {} (height {} less sag {})",
            plan.name, crossing.kind, span.height, project.practice.max_sag
        );
        let help = format!(
            "raise the wire: {CLEARANCE} over paths and gates, more over tracks; local rules come first"
        );
        problems.push(Problem::warning(code::LOW_CROSSING, crossing.place.clone(), message, help));
    }
}

fn distance_to_segment(point: SitePosition, from: SitePosition, to: SitePosition) -> f64 {
    let (de, dn) = (to.east_m() - from.east_m(), to.north_m() - from.north_m());
    let (pe, pn) = (point.east_m() - from.east_m(), point.north_m() - from.north_m());
    let along = ((pe * de + pn * dn) / (de * de + dn * dn)).clamp(0.0, 1.0);
    let (e, n) = (pe - along * de, pn - along * dn);
    (e * e + n * n).sqrt()
}

fn inside(spec: &ArraySpec, plan: &ArrayPlan, area: &KeepOut, problems: &mut Problems) {
    let corners: Vec<SitePosition> = area.polygon.iter().map(|corner| (*corner).into()).collect();
    let points = plan.layout.points.iter().filter(|point| point.kind != PointKind::Receiver);
    let names: Vec<&str> =
        points.filter(|point| contains(&corners, point.site)).map(|point| point.name.as_str()).collect();
    if !names.is_empty() {
        let message =
            format!("{} of {} stand inside the keep-out area \"{}\"", names.join(", "), plan.name, area.name);
        let help = "move the array's centre, turn it, or choose another hub place";
        problems.push(Problem::warning(code::IN_KEEP_OUT, spec.places.name.clone(), message, help));
    }
}

/// Crossing-number test.
fn contains(corners: &[SitePosition], point: SitePosition) -> bool {
    let mut inside = false;
    for (n, a) in corners.iter().enumerate() {
        let b = &corners[(n + 1) % corners.len()];
        let straddles = (a.north_m() > point.north_m()) != (b.north_m() > point.north_m());
        if straddles {
            let share = (point.north_m() - a.north_m()) / (b.north_m() - a.north_m());
            let east = a.east_m() + share * (b.east_m() - a.east_m());
            inside ^= point.east_m() < east;
        }
    }
    inside
}

/// Given radials that reach more than 0.45 of the way to the next element's earth.
fn radials(project: &Project, spec: &ArraySpec, plan: &ArrayPlan, problems: &mut Problems) {
    use crate::plan::EarthUse;
    for point in &plan.layout.points {
        for fixture in &point.fixtures {
            let Fixture::Earth(set) = fixture else { continue };
            let (given, key) = match set.serves {
                EarthUse::WireEnd => (project.practice.radial_length, "radial-length"),
                EarthUse::Vertical => (project.practice.vertical_radial_length, "vertical-radial-length"),
            };
            let (Some(given), Some(apart)) = (given, set.nearest_other) else { continue };
            if given.mm() * 100 > apart.mm() * 45 {
                let message = format!(
                    "radials of {given} reach too far: the next element's earth is only {apart} away in {}",
                    plan.name
                );
                let help = format!(
                    "radials of different earth sets must not touch: leave `{key}` out, or shorten it"
                );
                problems.push(Problem::warning(code::RADIALS_TOUCH, spec.places.name.clone(), message, help));
                return;
            }
        }
    }
}

/// A hub's surge rod stands at least this far from every antenna earth (common practice, no source).
const ROD_DISTANCE_M: f64 = 5.0;

/// Hubs outdoors whose surge rod cannot stand beside them.
fn hubs(spec: &ArraySpec, plan: &ArrayPlan, problems: &mut Problems) {
    let has = |point: &&Point, wanted: fn(&Fixture) -> bool| point.fixtures.iter().any(wanted);
    let earths: Vec<&Point> =
        plan.layout.points.iter().filter(|p| has(p, |f| matches!(f, Fixture::Earth(_)))).collect();
    let outdoors = |fixture: &Fixture| *fixture == Fixture::HubBox(Shelter::Outdoors);
    let mut near = Vec::new();
    for hub in plan.layout.points.iter().filter(|p| has(p, outdoors)) {
        let nearest =
            earths.iter().min_by(|a, b| hub.at.distance_m(a.at).total_cmp(&hub.at.distance_m(b.at)));
        let Some(earth) = nearest else { continue };
        let metres = hub.at.distance_m(earth.at);
        if metres < ROD_DISTANCE_M {
            near.push(format!("{} is {metres:.1} m from {}", hub.name, earth.name));
        }
    }
    if !near.is_empty() {
        let place = spec.places.feed.get("hub").cloned().or_else(|| spec.places.name.clone());
        let message = format!("{}: the hub's surge rod wants 5 m from every antenna earth", near.join(", "));
        let help = "move the hub with `hub = { forward, right }` in [array.feed], or drive its rod 5 m away, clear of the radials";
        problems.push(Problem::warning(code::HUB_NEAR_EARTH, place, message, help));
    }
}
