//! Where every stake goes: from the datum, from the stake before, and the diagonals that prove it.

use serde::Serialize;

use super::{Input, OptionInput, show};
use crate::plan::{Fixture, Layout, Point, PointKind, SitePosition};
use crate::units::Bearing;

/// The stake-out of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    has_compass: bool,
    declination: String,
    datum: String,
    arrays: Vec<ArrayStakes>,
    checks: Vec<Check>,
    count: usize,
}

#[derive(Debug, Serialize)]
struct ArrayStakes {
    name: String,
    heading: String,
    compass: String,
    rows: Vec<Row>,
}

#[derive(Debug, Serialize)]
struct Row {
    name: String,
    what: String,
    /// Another stake on the same place; empty where there is none.
    same: String,
    east: String,
    north: String,
    datum: Leg,
    previous: Leg,
    previous_name: String,
}

/// A distance with its bearing.
#[derive(Debug, Serialize)]
struct Leg {
    metres: String,
    bearing: String,
    compass: String,
}

#[derive(Debug, Serialize)]
struct Check {
    from: String,
    to: String,
    metres: String,
    within: String,
}

/// The view of one option's stake-out.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let declination = input.project.site.declination;
    let mut seen: Vec<&str> = Vec::new();
    let mut arrays = Vec::new();
    for array in &option.design.arrays {
        let layout = &array.plan.layout;
        let mut rows = Vec::new();
        let mut previous: Option<&Point> = None;
        let (here, away): (Vec<&Point>, Vec<&Point>) = walk(layout).into_iter().partition(|p| on_datum(p));
        for point in here.into_iter().chain(away) {
            if seen.contains(&point.name.as_str()) {
                continue;
            }
            seen.push(&point.name);
            rows.push(row(input, point, previous, same_place(layout, point)));
            previous = Some(point);
        }
        arrays.push(ArrayStakes {
            name: array.spec.name.clone(),
            heading: show::degrees(layout.heading),
            compass: show::compass(layout.heading, declination).unwrap_or_default(),
            rows,
        });
    }
    View {
        has_compass: declination.is_some(),
        declination: declination.map(|east| format!("{:+.1}", east.degrees())).unwrap_or_default(),
        datum: datum(option),
        count: seen.len(),
        checks: option.design.arrays.iter().flat_map(|array| checks(&array.plan.layout)).collect(),
        arrays,
    }
}

/// The points in the order of a walk: one wire out, the next one back, then the hubs, the receiver last.
fn walk(layout: &Layout) -> Vec<&Point> {
    let mut groups: Vec<(&str, Vec<&Point>)> = Vec::new();
    for point in layout.points.iter().filter(|point| point.kind != PointKind::Receiver) {
        let stem = point.name.split('-').next().unwrap_or_default();
        match groups.iter_mut().find(|(known, _)| *known == stem) {
            Some((_, points)) => points.push(point),
            None => groups.push((stem, vec![point])),
        }
    }
    let there_and_back = groups.into_iter().enumerate().flat_map(|(n, (_, mut points))| {
        if n % 2 == 1 {
            points.reverse();
        }
        points
    });
    there_and_back.chain(layout.points.iter().filter(|point| point.kind == PointKind::Receiver)).collect()
}

/// Whether a stake stands on the datum itself: then it is the first to be set.
fn on_datum(point: &Point) -> bool {
    point.site.distance_m(SitePosition::default()) < 0.005
}

/// The stake that stands on the datum, if one does.
fn datum(option: &OptionInput<'_>) -> String {
    let mut points = option.design.arrays.iter().flat_map(|array| &array.plan.layout.points);
    let here = points.find(|point| on_datum(point));
    here.map(|point| point.name.clone()).unwrap_or_default()
}

/// The name of an element's stake that a hub shares.
fn same_place(layout: &Layout, point: &Point) -> String {
    let shared = layout.points.iter().find(|other| {
        point.kind == PointKind::Hub
            && other.kind != PointKind::Hub
            && point.site.distance_m(other.site) < 0.005
    });
    shared.map(|other| other.name.clone()).unwrap_or_default()
}

fn row(input: &Input<'_>, point: &Point, previous: Option<&Point>, same: String) -> Row {
    Row {
        name: point.name.clone(),
        what: what(point),
        same,
        east: show::tape(point.site.east_m()),
        north: show::tape(point.site.north_m()),
        datum: leg(input, SitePosition::default(), point.site),
        previous: leg(input, previous.map_or_else(SitePosition::default, |p| p.site), point.site),
        previous_name: previous.map_or_else(|| "datum".to_owned(), |p| p.name.clone()),
    }
}

fn leg(input: &Input<'_>, from: SitePosition, to: SitePosition) -> Leg {
    let metres = from.distance_m(to);
    if metres < 0.005 {
        // There is no bearing to where one stands.
        return Leg { metres: "0.00".to_owned(), bearing: "–".to_owned(), compass: "–".to_owned() };
    }
    let bearing: Bearing = from.bearing_to(to);
    Leg {
        metres: show::tape(metres),
        bearing: show::degrees(bearing),
        compass: show::compass(bearing, input.project.site.declination).unwrap_or_default(),
    }
}

/// What stands on a point, in a few words.
fn what(point: &Point) -> String {
    let mast = point.fixtures.iter().find_map(|fixture| match fixture {
        Fixture::Mast(foot) => Some(format!("vertical, {}", foot.height)),
        Fixture::WireEnd(_)
        | Fixture::WirePost(_)
        | Fixture::WireFeedBox
        | Fixture::TerminationBox
        | Fixture::Earth(_)
        | Fixture::HubBox(_)
        | Fixture::StationEntry => None,
    });
    mast.unwrap_or_else(|| point.kind.word().to_owned())
}

/// Distances that prove the layout: between the elements, and crosswise from feed point to far end.
fn checks(layout: &Layout) -> Vec<Check> {
    let mut rows = Vec::new();
    let elements = &layout.elements;
    let feed = |n: usize| layout.point(elements[n].feed_point);
    for a in 0..elements.len() {
        for b in a + 1..elements.len() {
            // Up to six elements every pair, beyond that neighbours and opposites.
            if elements.len() <= 6 || b - a == 1 || b - a == elements.len() / 2 || b - a == elements.len() - 1
            {
                rows.push(check(feed(a), feed(b)));
            }
        }
    }
    let far = |n: usize| {
        let span = layout.spans.iter().find(|span| span.element.0 == n);
        span.map(|span| layout.point(span.to))
    };
    for n in 0..elements.len().saturating_sub(1) {
        if let (Some(here), Some(there)) = (far(n), far(n + 1)) {
            rows.push(check(here, there));
            rows.push(check(feed(n), there));
            rows.push(check(feed(n + 1), here));
        }
    }
    let hubs = layout.points.iter().filter(|point| point.kind == PointKind::Hub);
    for hub in hubs.take(4) {
        rows.extend(around(hub, &elements.iter().map(|e| layout.point(e.feed_point)).collect::<Vec<_>>()));
    }
    rows
}

/// From a hub to the elements round it: the nearest, and those not half as far again; a far one proves nothing more.
fn around(hub: &Point, feeds: &[&Point]) -> Vec<Check> {
    let metres = |feed: &Point| hub.site.distance_m(feed.site);
    let apart: Vec<&Point> = feeds.iter().copied().filter(|feed| metres(feed) >= 0.05).collect();
    let nearest = apart.iter().map(|feed| metres(feed)).fold(f64::INFINITY, f64::min);
    apart
        .into_iter()
        .filter(|feed| metres(feed) <= 1.5 * nearest)
        .take(8)
        .map(|feed| check(hub, feed))
        .collect()
}

/// Within 0.2 % of the distance, at least 0.05 m (common practice, no source).
fn check(a: &Point, b: &Point) -> Check {
    let metres = a.site.distance_m(b.site);
    Check {
        from: a.name.clone(),
        to: b.name.clone(),
        metres: show::tape(metres),
        within: show::tape((metres * 0.002).max(0.05)),
    }
}
