//! Makes the choices: bays, cables, hub amplifier, delays.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use super::{ArrayDesign, Design};
use crate::arrays::{self, Context, HubAmplifier, LineCost, Names};
use crate::catalogue::Catalogue;
use crate::plan::{Allowances, choose_cables, measure};
use crate::problem::{Problem, Problems};
use crate::project::{
    AmplifierChoice, ArraySpec, DelayRatio, ElementSpec, EndfireStage, Phasing, Project, Terrain,
};
use crate::units::{Diameter, Length};

/// Codes of problems found while settling a design.
pub mod code {
    crate::problem_codes! {
        /// The catalogue lacks the site's terrain class.
        NO_TERRAIN_ROW = "no-terrain-row";
        /// The array listens backwards.
        LISTENS_BACKWARDS = "listens-backwards";
        /// The array hardly hears forward.
        HEARS_NOTHING = "hears-nothing";
        /// Forward over rear is under 1.5.
        WEAK_FRONT = "weak-front";
    }
}

/// A design with what was noticed on the way.
#[derive(Clone, Debug)]
pub struct Settled {
    /// The designs in option order; empty when there are errors.
    pub designs: Vec<Design>,
    /// Errors and warnings.
    pub problems: Problems,
}

/// Settles every option of a project.
pub fn settle(project: &Project, catalogue: &Catalogue) -> Settled {
    let mut problems = Problems::default();
    let mut designs = Vec::new();
    let mut route_factor = Decimal::ONE;
    match route_factor_on(project, catalogue) {
        Some(factor) => route_factor = factor,
        None => problems.push(no_terrain_row(project.site.terrain)),
    }
    for option in project.options() {
        let mut names = Names::default();
        let arrays = project
            .arrays_of(&option)
            .into_iter()
            .map(|spec| settle_array(project, catalogue, spec, route_factor, &mut names, &mut problems))
            .collect();
        designs.push(Design { option, arrays, route_factor });
    }
    if problems.has_errors() {
        designs.clear();
    }
    Settled { designs, problems: problems.deduplicated() }
}

fn route_factor_on(project: &Project, catalogue: &Catalogue) -> Option<Decimal> {
    let row = catalogue.terrain.get(project.site.terrain.word());
    project.practice.route_factor.or_else(|| row.map(|row| row.route_factor))
}

fn no_terrain_row(terrain: Terrain) -> Problem {
    let message = format!("terrain.csv has no row for the class `{terrain}`");
    let help = "add the row, or give `route-factor` in [practice]";
    Problem::error(code::NO_TERRAIN_ROW, None, message, help)
}

fn settle_array(
    project: &Project,
    catalogue: &Catalogue,
    spec: &ArraySpec,
    route_factor: Decimal,
    names: &mut Names,
    problems: &mut Problems,
) -> ArrayDesign {
    let cables = choose_cables(spec, catalogue, project.frequency, problems);
    let (max_bay, bay_reason) = longest_bay(project, catalogue, spec);
    let context = Context {
        design: project.frequency,
        receiver: project.site.receiver,
        max_bay,
        wire_diameter: wire_diameter(catalogue),
        branch_cost: LineCost { leg: 1.0, onward: 1.0 },
        main_cost: LineCost { leg: 1.0, onward: 1.0 },
        amplifier: hub_amplifier(spec),
    };
    let ratio = given_ratio(spec);
    check_direction(project, spec, ratio, problems);
    let plan = arrays::expand(spec, ratio, &context, names);
    let allowances = Allowances { practice: &project.practice, route_factor };
    let lengths = measure(&plan.layout, &plan.feed, &allowances, |role| cables.of(role).velocity);
    ArrayDesign { spec: spec.clone(), plan, lengths, cables, ratio, bay_reason }
}

fn hub_amplifier(spec: &ArraySpec) -> HubAmplifier {
    let has_hub = spec.endfire.is_some() || spec.broadside.is_some();
    match spec.feed.amplifier {
        AmplifierChoice::Hub if has_hub => HubAmplifier::Fitted,
        AmplifierChoice::Hub | AmplifierChoice::Auto | AmplifierChoice::None => HubAmplifier::Absent,
    }
}

fn given_ratio(spec: &ArraySpec) -> Decimal {
    match delay_of(spec) {
        Some(DelayRatio::Ratio(ratio)) => ratio,
        Some(DelayRatio::BestRear | DelayRatio::BestRdf) | None => Decimal::ONE,
    }
}

/// The delay that an array's end-fire stage asks for.
pub(super) fn delay_of(spec: &ArraySpec) -> Option<DelayRatio> {
    let phasing = match spec.endfire.as_ref()? {
        EndfireStage::Echelon(stage) => &stage.phasing,
        EndfireStage::Endfire(stage) => &stage.phasing,
        EndfireStage::Custom(_) => return None,
    };
    match phasing {
        Phasing::Scheme { delay, .. } => Some(*delay),
        Phasing::Weights(_) => None,
    }
}

/// The diameter of the default wire part; 1.6 mm when the catalogue does not say.
fn wire_diameter(catalogue: &Catalogue) -> Diameter {
    let wire = catalogue.default_part("wire").and_then(|part| catalogue.cables.get(&part.id));
    wire.and_then(|cable| cable.diameter).unwrap_or(Diameter::from_um(1_600))
}

/// Longest bay b = √(8·H·f/w): tension H, sag f, weight w a metre.
///
/// Source: parabola approximation of the catenary, from memory. The weight is the wire part's, else copper of 8960 kg/m³.
fn longest_bay(project: &Project, catalogue: &Catalogue, spec: &ArraySpec) -> (Length, String) {
    const STANDARD_GRAVITY: f64 = 9.806_65;
    const COPPER_KG_PER_M3: f64 = 8_960.0;
    if let Some(bay) = project.practice.max_bay {
        return (bay, format!("longest bay {bay} as given (practice.max-bay)"));
    }
    let own = match &spec.element {
        ElementSpec::Wire(wire) => wire.diameter,
        ElementSpec::Vertical(_) => None,
    };
    let part = catalogue.default_part("wire").and_then(|part| catalogue.cables.get(&part.id));
    let listed =
        part.filter(|_| own.is_none()).and_then(|cable| cable.mass_kg_per_km).and_then(|m| m.to_f64());
    let radius = own.unwrap_or_else(|| wire_diameter(catalogue)).metres() / 2.0;
    let solid = std::f64::consts::PI * radius * radius * COPPER_KG_PER_M3;
    let weight = listed.map_or(solid, |kg_per_km| kg_per_km / 1000.0) * STANDARD_GRAVITY;
    let tension = project.practice.wire_tension.newtons();
    let sag = project.practice.max_sag;
    let bay = (8.0 * tension * sag.metres() / weight).sqrt();
    let bay = Length::from_mm(Length::from_metres_nearest(bay).mm().max(1));
    (bay, format!("longest bay √(8 × {tension} N × sag {sag} / {weight:.3} N/m) = {bay}"))
}

/// Every end-fire stage must hear the front better than the rear at every band (half-wave: the design frequency).
fn check_direction(project: &Project, spec: &ArraySpec, ratio: Decimal, problems: &mut Problems) {
    use crate::arrays::selfcheck::{Verdict, judge};
    let (Some(stage), _) = arrays::stages(spec, ratio, project.frequency) else { return };
    let place = spec.places.endfire.clone();
    for frequency in bands_to_check(project, spec) {
        let table = || roles_in_words(&stage);
        let (code, message) = match judge(&stage, frequency) {
            Verdict::Good => continue,
            Verdict::Weak(heard) => (
                code::WEAK_FRONT,
                format!(
                    "at {frequency} the front is heard only {:.2} times the rear",
                    heard.forward / heard.backward
                ),
            ),
            Verdict::Backward(_) => (
                code::LISTENS_BACKWARDS,
                format!("at {frequency} this array hears its rear at least as well as its front"),
            ),
            Verdict::Deaf(heard) => (
                code::HEARS_NOTHING,
                format!(
                    "at {frequency} the wanted direction is down to {:.1} % of the elements together",
                    100.0 * heard.forward / heard.greatest
                ),
            ),
        };
        let advised = matches!(stage.directive, arrays::Directive::Advised);
        let problem = if code == code::WEAK_FRONT || advised {
            Problem::warning(code, place.clone(), message, table())
        } else {
            Problem::error(code, place.clone(), message, table())
        };
        problems.push(problem);
    }
}

/// The bands at which a stage must point forward: a half-wave scheme serves the design frequency only.
fn bands_to_check(project: &Project, spec: &ArraySpec) -> Vec<crate::units::Frequency> {
    use crate::project::Scheme;
    let phasing = match &spec.endfire {
        Some(EndfireStage::Echelon(stage)) => Some(&stage.phasing),
        Some(EndfireStage::Endfire(stage)) => Some(&stage.phasing),
        Some(EndfireStage::Custom(_)) | None => None,
    };
    match phasing {
        Some(Phasing::Scheme { scheme: Scheme::HalfWave, .. }) => vec![project.frequency],
        Some(Phasing::Scheme { scheme: Scheme::Crossfire | Scheme::InPhase, .. } | Phasing::Weights(_))
        | None => project.frequencies(),
    }
}

fn roles_in_words(stage: &arrays::Stage) -> String {
    let rows = stage.seats.iter().map(|seat| {
        let polarity = match seat.weight.polarity {
            crate::plan::Polarity::Upright => "upright",
            crate::plan::Polarity::Inverted => "inverted",
        };
        format!(
            "{} at {:+.1} m, amplitude {:.2}, {polarity}, delay {}",
            seat.role,
            seat.at.forward_m(),
            seat.weight.amplitude,
            seat.weight.delay
        )
    });
    format!("roles: {}", rows.collect::<Vec<_>>().join("; "))
}
