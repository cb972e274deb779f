//! What holds wires up: posts or trees, insulators, backstays, boxes at the ends.

use super::ArrayDesign;
use super::tally::{Tally, Want};
use crate::plan::layout::Support;
use crate::plan::{Fixture, LineRole, Point};
use crate::project::Supports;

/// Counts the fixtures of wires, point by point.
pub(super) fn take_off(tally: &mut Tally<'_>, array: &ArrayDesign) {
    let z0 = coax_impedance(array);
    for point in &array.plan.layout.points {
        for fixture in &point.fixtures {
            match fixture {
                Fixture::WireEnd(support) => end(tally, point, *support),
                Fixture::WirePost(support) => post(tally, point, *support, &array.bay_reason),
                Fixture::WireFeedBox => {
                    let want = Want::any().with("element", "wire").with("z_ohm", z0.clone());
                    tally.add("feed-box", &want, &point.name, 1, "feed box at the feed point of a wire");
                    surge(tally, point);
                }
                Fixture::TerminationBox => {
                    let why =
                        format!("termination box at the far end of a wire: {}", array.termination_reason);
                    tally.add("termination-box", &Want::any(), &point.name, 1, &why);
                    surge(tally, point);
                }
                Fixture::Earth(_) | Fixture::Mast(_) | Fixture::HubBox(_) | Fixture::StationEntry => {}
            }
        }
    }
}

/// The impedance of the branch cable in ohms, as the catalogue writes it.
pub(super) fn coax_impedance(array: &ArrayDesign) -> String {
    let cable = array.plan.feed.legs.first().and_then(|leg| leg.branch);
    line_impedance(array, cable.map_or(LineRole::Main, |line| array.plan.feed.line(line).role))
}

/// The impedance of the cable that lines of a role are cut from, ohms, as attributes write it.
pub(super) fn line_impedance(array: &ArrayDesign, role: LineRole) -> String {
    let data = array.cables.of(role).data.as_ref();
    data.and_then(|cable| cable.z0_ohm).map_or_else(|| "75".to_owned(), |z0| z0.normalize().to_string())
}

fn surge(tally: &mut Tally<'_>, point: &Point) {
    let why = "surge device across the wire's end, inside the box";
    tally.add("surge-device", &Want::any(), &point.name, 1, why);
}

/// A post that is high enough.
fn post_for(support: Support) -> Want {
    Want::any().at_least("height", support.height.decimal_metres())
}

fn end(tally: &mut Tally<'_>, point: &Point, support: Support) {
    match support.kind {
        Supports::Posts => {
            tally.add("end-support", &post_for(support), &point.name, 1, "post at the end of a wire");
            let why = "end posts take the wire's tension";
            tally.add("backstay", &Want::any(), &point.name, 1, why);
        }
        Supports::Trees => {
            let why = "tree at the end of a wire, with pulley and weight";
            tally.add("tree-support", &Want::any(), &point.name, 1, why);
        }
    }
    tally.add("end-insulator", &Want::any(), &point.name, 1, "insulator at the end of a wire");
}

fn post(tally: &mut Tally<'_>, point: &Point, support: Support, bay_reason: &str) {
    match support.kind {
        Supports::Posts => {
            let why = format!("post between bays ({bay_reason})");
            tally.add("mid-support", &post_for(support), &point.name, 1, &why);
        }
        Supports::Trees => {
            let why = format!("tree between bays, with slip tie ({bay_reason})");
            tally.add("tree-support", &Want::any(), &point.name, 1, &why);
        }
    }
    tally.add("mid-insulator", &Want::any(), &point.name, 1, "insulator at a support between bays");
}
