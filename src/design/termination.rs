//! The resistor at the far end of a wire.

use super::code;
use super::earth::{earth_size, set_ohms};
use crate::catalogue::Catalogue;
use crate::physics::preferred::nearest_e24;
use crate::plan::{EarthSet, EarthUse, ElementKind, Layout};
use crate::problem::{Problem, Problems};
use crate::project::{ArraySpec, Project, Termination};
use crate::radio;
use crate::reception::{self, Ends};
use crate::units::Resistance;

/// Above this an earth set is too poor for a steady termination (common practice, no source).
const POOR_EARTH_OHMS: f64 = 150.0;

/// How the far ends of an array's wires are built, and the words for it.
pub(super) struct Choice {
    pub(super) ends: Ends,
    pub(super) reason: String,
}

/// R = nearest E24 value to Re Z0 − R of the earth set; given terminations are taken as they are.
pub(super) fn choose(
    project: &Project,
    catalogue: &Catalogue,
    spec: &ArraySpec,
    layout: &Layout,
    problems: &mut Problems,
) -> Choice {
    let wire = layout.elements.iter().find_map(|element| match &element.kind {
        ElementKind::Wire(wire) => Some(wire),
        ElementKind::Vertical(_) => None,
    });
    let Some(wire) = wire else { return Choice { ends: Ends::Matched, reason: String::new() } };
    let size = earth_size(project, EarthSet { serves: EarthUse::WireEnd, nearest_other: None });
    let earth = set_ohms(project, catalogue, size.rods).unwrap_or_default();
    warn_poor(project, catalogue, spec, (size.rods, earth), problems);
    let soil = reception::soil(project.site.ground);
    let (height, radius) = (wire.height.metres(), wire.diameter.metres() / 2.0);
    let terms = radio::line_terms(project.frequency, soil.index_squared(project.frequency), height, radius);
    let z0 = terms.constants(project.frequency).impedance.re;
    let computed = nearest_e24(Resistance::new(z0 - earth.ohms())).unwrap_or_default();
    warn_mismatch(spec, wire.termination, z0, earth, problems);
    let reason = match wire.termination {
        Termination::Computed => format!(
            "{computed}, the E24 value nearest to the wire's {z0:.1} ohm less {:.1} ohm of its earth set ({} rods; half or double with the season)",
            earth.ohms(),
            size.rods
        ),
        Termination::Resistor(given) => {
            format!(
                "{given} as given, plus {:.1} ohm of its earth set, against the wire's {z0:.1} ohm",
                earth.ohms()
            )
        }
        Termination::Matched => {
            format!("taken as without reflection: {z0:.1} ohm in all, earth set included")
        }
        Termination::Reflection(reflection) => {
            let r = reflection.to_string().parse().unwrap_or(0.0);
            let total = z0 * (1.0 - r) / (1.0 + r);
            format!("{total:.0} ohm in all, earth set included, for the reflection of {reflection} as given")
        }
    };
    Choice { ends: Ends::AsBuilt { earth, resistor: computed }, reason }
}

/// A given resistor whose reflection, earth included, spoils the rear (|Γ| above 0.3, beyond what the method was compared
/// for).
fn warn_mismatch(
    spec: &ArraySpec,
    termination: Termination,
    z0: f64,
    earth: Resistance,
    problems: &mut Problems,
) {
    const MUCH: f64 = 0.3;
    let Termination::Resistor(given) = termination else { return };
    let total = given.ohms() + earth.ohms();
    let reflection = (z0 - total) / (z0 + total);
    if reflection.abs() > MUCH {
        let message = format!(
            "the termination of {given} with {:.0} ohm of earth reflects {:.0} % of the current: the wire is {z0:.0} ohm",
            earth.ohms(),
            100.0 * reflection.abs()
        );
        let help =
            "leave `termination` out to have it computed; front-to-back depends on it, directivity hardly";
        problems.push(Problem::warning(
            code::TERMINATION_MISMATCH,
            spec.places.element.clone(),
            message,
            help,
        ));
    }
}

fn warn_poor(
    project: &Project,
    catalogue: &Catalogue,
    spec: &ArraySpec,
    (rods, earth): (u32, Resistance),
    problems: &mut Problems,
) {
    if earth.ohms() <= POOR_EARTH_OHMS {
        return;
    }
    let enough = (rods + 1..=24)
        .find(|rods| set_ohms(project, catalogue, *rods).is_some_and(|set| set.ohms() <= POOR_EARTH_OHMS));
    let message = format!(
        "the earth set of {rods} rods at each wire end of {} comes to about {:.0} ohm, more than {POOR_EARTH_OHMS} ohm",
        spec.name,
        earth.ohms()
    );
    let help = match enough {
        Some(rods) => {
            format!("{rods} rods a set would reach it (`rods-per-set`); radials steady the earth as well")
        }
        None => "no practical number of rods reaches it: rely on radials".to_owned(),
    };
    problems.push(Problem::warning(code::POOR_EARTH, spec.places.name.clone(), message, help));
}
