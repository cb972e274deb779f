//! The pad that balances the loss of a delay line, where that loss alone would spoil the null.

use super::ArrayDesign;
use crate::arrays::Balance;
use crate::project::{ArraySpec, EndfireStage, Project};
use crate::reception::{self, Weighting};

/// The pad for the undelayed leg of a pair, or nothing where the wanted rear rejection is kept without it.
///
/// Three in line never need one: losses 1 : a : a² keep the double null.
pub(super) fn needed(project: &Project, design: &ArrayDesign) -> Option<Balance> {
    if !is_pair(&design.spec) {
        return None;
    }
    let subject = design.subject(Weighting::Built);
    let state = design.plan.feed.switch.states.first()?;
    let weights = reception::weights(&subject, state, project.frequency);
    let (front, rear) = (weights.first()?.norm(), weights.get(1)?.norm());
    let loss = (20.0 * libm::log10(front / rear)).abs();
    let reject = design.spec.feed.reject;
    let limit = reception::level_limit_db(&design.subject(Weighting::Ideal), project.frequency, reject)?;
    if loss <= limit {
        return None;
    }
    let tenths = (loss * 10.0).round() / 10.0;
    let why = format!(
        "the delay line loses {loss:.2} dB, more than the {limit:.2} dB that keep {reject} of rear rejection: the other leg is made equal"
    );
    Some(Balance { db: tenths, why })
}

fn is_pair(spec: &ArraySpec) -> bool {
    match &spec.endfire {
        Some(EndfireStage::Echelon(_)) => true,
        Some(EndfireStage::Endfire(stage)) => stage.count == 2,
        Some(EndfireStage::Custom(_)) | None => false,
    }
}
