//! The station entry: arresters, surge rod, bond.

use super::Scene;
use super::earth::plain_piece;
use super::model::{PieceRole, Reason};
use super::support::line_impedance;
use super::tally::{Tally, Want};
use crate::plan::LineRole;
use crate::plan::layout::{Fixture, Shelter};
use crate::project::HubArresters;
use crate::units::Length;

/// Wire from the entry to the building's electrodes until somebody has measured it (common practice, no source).
pub const ENTRY_BOND: Length = Length::from_mm(5_000);

/// One entry a site, one coax arrester a main.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>) {
    for array in &scene.design.arrays {
        let want = Want::any().with("z_ohm", line_impedance(array, LineRole::Main));
        let mains = array.plan.feed.lines.iter().filter(|line| line.role == LineRole::Main);
        for _ in mains {
            tally.add("coax-arrester", &want, "RX", 1, "one a main line, at the entry panel");
        }
        if scene.project.practice.hub_arresters == HubArresters::Bought {
            for point in &array.plan.layout.points {
                if point.fixtures.contains(&Fixture::HubBox(Shelter::Outdoors)) {
                    let why = "on the outgoing line of a hub (practice.hub-arresters)";
                    tally.add("coax-arrester", &want, &point.name, 1, why);
                }
            }
        }
    }
    tally.add("surge-rod", &Want::any(), "RX", 1, "surge rod with its clamp at the station entry");
    let why = format!(
        "{ENTRY_BOND} from the entry to the building's electrodes: measure on site; local code and a licensed person decide"
    );
    let wire = tally.choose("radial-wire", &Want::any().with("kind", "station-bond"));
    tally.push(plain_piece(
        "RX-E".to_owned(),
        PieceRole::BondWire,
        wire,
        ("RX", "RX"),
        ENTRY_BOND,
        Reason::one(why),
    ));
}
