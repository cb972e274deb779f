//! The delay of an end-fire stage: given, or found.

use rust_decimal::Decimal;
use rust_decimal::prelude::{FromPrimitive, ToPrimitive};

use super::ArrayDesign;
use crate::arrays;
use crate::plan::Layout;
use crate::project::{ArraySpec, DelayRatio, EndfireStage, Phasing, Project};
use crate::radio::DelayCurve;
use crate::reception::{self, Ends};

/// The delay that an array's end-fire stage asks for; nothing where the weights are given or there is no such stage.
fn asked(spec: &ArraySpec) -> Option<DelayRatio> {
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

/// Finds the ratio, searching 0.4 to 1.0 at the design frequency with matched terminations and nothing lost.
///
/// `layout` may come from any ratio: the delay moves nothing.
pub(super) fn choose(project: &Project, spec: &ArraySpec, layout: &Layout) -> Decimal {
    let found = |pick: fn(&DelayCurve) -> f64| {
        let ratio = curve(project, spec, layout).as_ref().map(pick).and_then(Decimal::from_f64);
        ratio.map_or(Decimal::ONE, |ratio| ratio.round_dp(2).normalize())
    };
    match asked(spec) {
        None => Decimal::ONE,
        Some(DelayRatio::Ratio(ratio)) => ratio,
        Some(DelayRatio::BestRear) => found(|curve| curve.best_rear.ratio),
        Some(DelayRatio::BestRdf) => found(|curve| curve.best_rdf.ratio),
    }
}

/// What each ratio from 0.4 to 1.0 would give; nothing for an array without such a delay.
fn curve(project: &Project, spec: &ArraySpec, layout: &Layout) -> Option<DelayCurve> {
    asked(spec)?;
    let frequency = project.frequency;
    let weights_at = |ratio: f64| {
        let ratio = Decimal::from_f64(ratio).unwrap_or(Decimal::ONE).round_dp(4);
        reception::complex(&arrays::design_weights(spec, ratio, frequency), frequency)
    };
    reception::delay_curve(layout, reception::soil(project.site.ground), Ends::Matched, frequency, weights_at)
        .ok()
}

/// The delay curve of a settled array at the design frequency; nothing for an array without such a delay.
pub fn delay_curve(project: &Project, array: &ArrayDesign) -> Option<DelayCurve> {
    curve(project, &array.spec, &array.plan.layout)
}

/// What "best-rear" and "best-rdf" would give beside the ratio used; nothing without a curve.
pub fn best_in_words(project: &Project, array: &ArrayDesign) -> Option<String> {
    let curve = delay_curve(project, array)?;
    let ratio = array.ratio.to_f64()?;
    let here =
        curve.points.iter().min_by(|a, b| (a.ratio - ratio).abs().total_cmp(&(b.ratio - ratio).abs()))?;
    let (rear, rdf) = (&curve.best_rear, &curve.best_rdf);
    Some(format!(
        "{}: delay {} gives RDF {:.1} dB, worst rear lobe {:.1} dB; \"best-rear\" would be {:.2} (RDF {:.1} dB, rear {:.1} dB, \
         as good within {:.2} to {:.2}), \"best-rdf\" {:.2} (RDF {:.1} dB, rear {:.1} dB)",
        array.plan.name,
        array.ratio.normalize(),
        here.rdf_db,
        here.worst_rear_db,
        rear.ratio,
        rear.rdf_db,
        rear.worst_rear_db,
        curve.rear_plateau.from_ratio,
        curve.rear_plateau.to_ratio,
        rdf.ratio,
        rdf.rdf_db,
        rdf.worst_rear_db
    ))
}
