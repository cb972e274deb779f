//! Does the hub need an amplifier?

use rust_decimal::prelude::ToPrimitive;

use super::ArrayDesign;
use crate::arrays::HubAmplifier;
use crate::catalogue::{Catalogue, Part};
use crate::physics::noise::{AmplifierNeed, Stage, amplifier_need};
use crate::project::{AmplifierChoice, Project};
use crate::reception::{self, NoiseSite, Weighting};
use crate::units::Decibel;

/// External noise, the receiver, and what the catalogue has against it.
pub(super) fn noise_site(project: &Project, catalogue: &Catalogue) -> NoiseSite {
    let amplifier = |element: &str| {
        let part =
            catalogue.default_part_with("amplifier", |part| part.attribute("element") == Some(element))?;
        Some(Stage { noise_figure: decibels(part, "nf_db")?, gain: decibels(part, "gain_db")? })
    };
    let coil = catalogue.default_part("loading-coil");
    NoiseSite {
        class: project.site.noise,
        receiver: project.receiver_noise,
        hub_amplifier: amplifier("hub"),
        element_amplifier: amplifier("vertical"),
        passive_gain: coil.and_then(|part| decibels(part, "gain_db")),
    }
}

fn decibels(part: &Part, key: &str) -> Option<Decibel> {
    part.number(key).and_then(|db| db.to_f64()).map(Decibel::new)
}

/// Decides for an array that was settled without an amplifier, and says why.
pub(super) fn decide(project: &Project, design: &ArrayDesign) -> (HubAmplifier, String) {
    let has_hub = design.plan.feed.hubs.iter().any(|hub| hub.outputs > 0);
    match design.spec.feed.amplifier {
        AmplifierChoice::None => (HubAmplifier::Absent, "no hub amplifier, as given".to_owned()),
        AmplifierChoice::Hub | AmplifierChoice::Auto if !has_hub => {
            (HubAmplifier::Absent, "no hub in the field, so no hub amplifier".to_owned())
        }
        AmplifierChoice::Hub => (HubAmplifier::Fitted, "hub amplifier as given".to_owned()),
        AmplifierChoice::Auto => automatic(project, design),
    }
}

/// The worst band decides.
fn automatic(project: &Project, design: &ArrayDesign) -> (HubAmplifier, String) {
    let report = reception::report_noise(&design.subject(Weighting::Built), &project.frequencies());
    let worst = report.into_iter().max_by(|a, b| a.1.degradation.db().total_cmp(&b.1.degradation.db()));
    let Some((frequency, noise)) = worst else {
        let why = "the noise budget cannot be made for this array, so no hub amplifier is fitted";
        return (HubAmplifier::Absent, why.to_owned());
    };
    let without = noise.degradation.db();
    let budget = format!(
        "at {frequency} external noise {:.1} dB, average gain {:.1} dB: the receiver raises the floor by {without:.2} dB",
        noise.external.db(),
        noise.average_gain.db()
    );
    match (amplifier_need(noise.degradation), noise.with_amplifier) {
        (AmplifierNeed::Yes, Some(with)) => {
            (HubAmplifier::Fitted, format!("{budget}, with a hub amplifier by {:.2} dB: fitted", with.db()))
        }
        (AmplifierNeed::Yes, None) => (
            HubAmplifier::Absent,
            format!("{budget}: an amplifier is needed, but the catalogue has none with nf_db and gain_db"),
        ),
        (AmplifierNeed::Optional, _) => {
            (HubAmplifier::Absent, format!("{budget}: an amplifier is optional, none is fitted"))
        }
        (AmplifierNeed::No, _) => (HubAmplifier::Absent, format!("{budget}: none is needed")),
    }
}
