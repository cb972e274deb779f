//! Short verticals: mast, base, box, amplifier or coil, guys.

use super::ArrayDesign;
use super::tally::{Tally, Want};
use crate::plan::{Fixture, MastFoot, Point};
use crate::project::VerticalKind;
use crate::units::Length;

/// Verticals above this are guyed (common practice, no source).
const GUYED_ABOVE: Length = Length::from_mm(6_000);

/// Counts what stands at every vertical.
pub(super) fn take_off(tally: &mut Tally<'_>, array: &ArrayDesign) {
    let z0 = super::support::coax_impedance(array);
    for point in &array.plan.layout.points {
        for fixture in &point.fixtures {
            if let Fixture::Mast(foot) = fixture {
                mast(tally, point, *foot, &z0);
            }
        }
    }
}

fn mast(tally: &mut Tally<'_>, point: &Point, foot: MastFoot, z0: &str) {
    let place = &point.name;
    let why = format!("one vertical, set to {} (the least mast that reaches it)", foot.height);
    tally.add("mast", &Want::any().at_least("height", foot.height.decimal_metres()), place, 1, &why);
    tally.add("base-mount", &Want::any(), place, 1, "insulated base of a vertical");
    let boxed = Want::any().with("element", "vertical").with("z_ohm", z0);
    tally.add("feed-box", &boxed, place, 1, "box at the base of a vertical");
    tally.add("surge-device", &Want::any(), place, 1, "surge device across the base of a vertical");
    match foot.kind {
        VerticalKind::Active => {
            let why = "high-impedance amplifier at an active vertical";
            tally.add("amplifier", &Want::any().with("element", "vertical"), place, 1, why);
        }
        VerticalKind::Passive => {
            let why = "coil and swamping resistor of a passive vertical";
            tally.add("loading-coil", &Want::any(), place, 1, why);
        }
    }
    if foot.height > GUYED_ABOVE {
        let why = format!("verticals above {GUYED_ABOVE} have three guys of {}", guy_length(foot.height));
        let want = Want::any().at_least("length", guy_length(foot.height).decimal_metres());
        tally.add("guy", &want, place, 3, &why);
        tally.add("guy-anchor", &Want::any(), place, 3, "an anchor for each guy");
    }
}

/// √((0.7 h)² + (0.6 h)²) + 1 m, up to 0.1 m (common practice, no source).
fn guy_length(height: Length) -> Length {
    let h = height.metres();
    let slope = ((0.7 * h).powi(2) + (0.6 * h).powi(2)).sqrt() + 1.0;
    Length::from_metres_nearest(slope).up_to(Length::from_mm(100))
}
