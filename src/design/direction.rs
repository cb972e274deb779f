//! The reversal check, in words.

use super::code;
use crate::arrays::selfcheck::{Verdict, judge};
use crate::arrays::{self, Directive, Stage};
use crate::plan::Polarity;
use crate::problem::{Problem, Problems};
use crate::project::{ArraySpec, EndfireStage, Phasing, Project, Scheme};
use crate::units::Frequency;
use rust_decimal::Decimal;

/// Every end-fire stage must hear the front better than the rear at every band (half-wave: the design frequency).
pub(super) fn check(project: &Project, spec: &ArraySpec, ratio: Decimal, problems: &mut Problems) {
    let (Some(stage), _) = arrays::stages(spec, ratio, project.frequency) else { return };
    for frequency in bands(project, spec) {
        let (code, message) = match judge(&stage, frequency) {
            Verdict::Good => continue,
            Verdict::Weak(heard) => (
                code::WEAK_FRONT,
                format!(
                    "at {frequency} the front is heard only {:.2} times as well as the rear",
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
        let place = spec.places.endfire.clone();
        let advised = code == code::WEAK_FRONT || matches!(stage.directive, Directive::Advised);
        let build = if advised { Problem::warning } else { Problem::error };
        problems.push(build(code, place, message, in_words(&stage)));
    }
}

/// A half-wave scheme serves the design frequency only.
fn bands(project: &Project, spec: &ArraySpec) -> Vec<Frequency> {
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

fn in_words(stage: &Stage) -> String {
    let rows = stage.seats.iter().map(|seat| {
        let polarity = match seat.weight.polarity {
            Polarity::Upright => "upright",
            Polarity::Inverted => "inverted",
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
