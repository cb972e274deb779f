//! Makes the choices, in order: bays, cables, delay, amplifier, balance; then measures.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use super::{
    ArrayDesign, Design, amplifier, balance, bay, code, delay, direction, land, termination, unused,
};
use crate::arrays::{self, Context, HubAmplifier, LineCost, Names};
use crate::catalogue::Catalogue;
use crate::plan::{Allowances, Cables, LineRole, check_impedance, choose_cables, measure};
use crate::problem::{Problem, Problems};
use crate::project::{ArraySpec, Combining, Project, Terrain};
use crate::reception::{self, Weighting};
use crate::units::ElectricalLength;

/// A design with what was noticed on the way.
#[derive(Clone, Debug)]
pub struct Settled {
    /// The designs in option order; empty when there are errors.
    pub designs: Vec<Design>,
    /// Errors and warnings.
    pub problems: Problems,
}

/// What every array of a project shares.
struct Bench<'a> {
    project: &'a Project,
    catalogue: &'a Catalogue,
    route_factor: Decimal,
}

/// Settles every option of a project.
pub fn settle(project: &Project, catalogue: &Catalogue) -> Settled {
    let mut problems = unused::notes(project);
    let mut designs = Vec::new();
    let route_factor = route_factor_on(project, catalogue).unwrap_or_else(|| {
        problems.push(no_terrain_row(project.site.terrain));
        Decimal::ONE
    });
    let bench = Bench { project, catalogue, route_factor };
    for option in project.options() {
        let mut names = Names::default();
        let specs = project.arrays_of(&option).into_iter();
        let arrays = specs.map(|spec| settle_array(&bench, spec, &mut names, &mut problems)).collect();
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
    bench: &Bench<'_>,
    spec: &ArraySpec,
    names: &mut Names,
    problems: &mut Problems,
) -> ArrayDesign {
    let project = bench.project;
    let cables = choose_cables(spec, bench.catalogue, project.frequency, problems);
    let (max_bay, bay_reason) = bay::longest(project, bench.catalogue, spec);
    let mut context = Context {
        design: project.frequency,
        receiver: project.site.receiver,
        max_bay,
        wire_diameter: bay::wire_diameter(bench.catalogue),
        branch_cost: line_cost(bench.catalogue, &cables, LineRole::Branch, LineRole::Run),
        main_cost: line_cost(bench.catalogue, &cables, outer_legs(spec), LineRole::Main),
        amplifier: HubAmplifier::Absent,
        balance: None,
    };
    let sketch = arrays::expand(spec, Decimal::ONE, &context, &mut Names::default());
    let ratio = delay::choose(project, spec, &sketch.layout);
    direction::check(project, spec, ratio, problems);
    let far_end = termination::choose(project, bench.catalogue, spec, &sketch.layout, problems);
    let draw = |context: &Context, names: &mut Names, cables: Cables| {
        let plan = arrays::expand(spec, ratio, context, names);
        let allowances = Allowances { practice: &project.practice, route_factor: bench.route_factor };
        let lengths = measure(&plan.layout, &plan.feed, &allowances, |role| cables.of(role).velocity);
        ArrayDesign {
            spec: spec.clone(),
            tolerances: vec![None; lengths.len()],
            trims: vec![None; lengths.len()],
            plan,
            lengths,
            cables,
            ratio,
            bay_reason: bay_reason.clone(),
            amplifier_reason: String::new(),
            soil: reception::soil(project.site.ground),
            ends: far_end.ends,
            termination_reason: far_end.reason.clone(),
            noise: amplifier::noise_site(project, bench.catalogue),
        }
    };
    let bare = draw(&context, &mut Names::default(), cables.clone());
    context.balance = balance::needed(project, &bare);
    let (fitted, amplifier_reason) = amplifier::decide(project, &bare);
    context.amplifier = fitted;
    let mut design = draw(&context, names, cables);
    design.amplifier_reason = amplifier_reason;
    make_exact(project, &mut design);
    check_impedance(spec, &design.cables, &design.plan.feed, problems);
    land::check(project, spec, &design.plan, problems);
    trim_spread(bench, &design, problems);
    design
}

/// The lines that arrive at the outermost hub.
fn outer_legs(spec: &ArraySpec) -> LineRole {
    let cells = spec.endfire.is_some() && spec.broadside.is_some();
    if cells && spec.feed.combining == Combining::ByCell { LineRole::Run } else { LineRole::Branch }
}

/// What a metre costs on either side of a hub, by the lowest price of a metre; alike where a price is missing.
fn line_cost(catalogue: &Catalogue, cables: &Cables, leg: LineRole, onward: LineRole) -> LineCost {
    let price = |role: LineRole| {
        let offers = catalogue.offers_of(cables.of(role).part.id());
        offers
            .filter_map(|offer| offer.price.map(|price| price.amount() / offer.pack))
            .min()
            .and_then(|p| p.to_f64())
    };
    match (price(leg), price(onward)) {
        (Some(leg), Some(onward)) => LineCost { leg, onward },
        (Some(_) | None, Some(_) | None) => LineCost { leg: 1.0, onward: 1.0 },
    }
}

/// Tolerances and test frequencies of the lines that must be exact.
fn make_exact(project: &Project, design: &mut ArrayDesign) {
    let reject = design.spec.endfire.is_some().then_some(design.spec.feed.reject);
    let tolerances = reception::tolerances(&design.subject(Weighting::Built), project.frequency, reject);
    design.trims = tolerances
        .iter()
        .zip(&design.plan.feed.lines)
        .zip(&design.lengths)
        .map(|((tolerance, line), length)| {
            tolerance.as_ref()?;
            let cable = design.cables.of(line.role);
            reception::trim(length.electrical(line, cable.velocity), cable, project.frequency)
        })
        .collect();
    design.tolerances = tolerances;
}

/// The trim allowance must cover the cable's own spread of velocity factor and 1 % more.
fn trim_spread(bench: &Bench<'_>, design: &ArrayDesign, problems: &mut Problems) {
    let lines = &design.plan.feed.lines;
    let has_delay = lines.iter().any(|line| line.delay > ElectricalLength::ZERO);
    let cable = &design.cables.of(LineRole::Delay).part;
    let part = bench.catalogue.parts.get(cable.id());
    let spread = part.and_then(|part| part.number("vf_tol")).and_then(|spread| spread.to_f64());
    let ratio = bench.project.practice.trim_ratio;
    let Some(spread) = spread.filter(|_| has_delay) else { return };
    if ratio.to_f64().is_some_and(|ratio| ratio < spread + 0.01 - 1e-9) {
        let message = format!(
            "delay lines of {} are cut {} % long, but `{}` may differ by {:.1} % from its velocity factor",
            design.plan.name,
            (ratio * Decimal::ONE_HUNDRED).normalize(),
            cable.id(),
            spread * 100.0
        );
        let help = format!(
            "measure the reel before any delay is cut, or give [practice] trim-ratio = {:.3}",
            spread + 0.01
        );
        problems.push(Problem::warning(code::TRIM_TIGHT, design.spec.places.name.clone(), message, help));
    }
}
