//! The noise budget: does the array need an amplifier, and what does it buy?

use num_complex::Complex64;

use super::report::Subject;
use super::weight::{LineFigures, path_loss_db};
use crate::physics::noise::{SiteNoise, Stage, cascade_factor};
use crate::plan::ElementKind;
use crate::project::{NoiseClass, VerticalKind};
use crate::radio::{self, Response};
use crate::units::{Decibel, Frequency};

/// External noise and what follows the array.
#[derive(Clone, Debug)]
pub struct NoiseSite {
    /// Man-made noise class.
    pub class: NoiseClass,
    /// The receiver's noise figure.
    pub receiver: Decibel,
    /// Noise figure and gain of a hub amplifier, if the catalogue has one.
    pub hub_amplifier: Option<Stage>,
    /// Noise figure and gain of the amplifier of an active vertical, if the catalogue has one.
    pub element_amplifier: Option<Stage>,
    /// Gain of a passive vertical's element part, if the catalogue says.
    pub passive_gain: Option<Decibel>,
}

/// The noise budget of one direction at one frequency.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Noise {
    /// External noise figure Fa.
    pub external: Decibel,
    /// How much the receiver's own noise raises the floor, without an amplifier in the hub.
    pub degradation: Decibel,
    /// The same with an amplifier in the hub; nothing when the catalogue has none.
    pub with_amplifier: Option<Decibel>,
    /// Average gain of the array with its losses.
    pub average_gain: Decibel,
}

/// Makes the budget, or nothing where the average gain is not known.
///
/// degradation = 10 lg((fa·g + f − g)/(fa·g)), g the average gain after phasing and combining, f everything behind it.
pub fn budget(
    subject: &Subject<'_>,
    response: &Response,
    weights: &[Complex64],
    lines: &[LineFigures],
    frequency: Frequency,
) -> Option<Noise> {
    let site = subject.noise;
    let external = site_noise(site.class).median(frequency);
    let main_loss = Decibel::new(path_loss_db(&subject.plan.feed, lines).unwrap_or_default());
    let behind = cascade_factor(&[Stage::passive(main_loss), Stage::receiver(site.receiver)]);
    let (gain, ahead) = average_gain(subject, response, weights)?;
    let without = degradation(external, gain, ahead, behind);
    let with = site.hub_amplifier.map(|amplifier| {
        let behind = cascade_factor(&[amplifier, Stage::passive(main_loss), Stage::receiver(site.receiver)]);
        degradation(external, gain, ahead, behind)
    });
    Some(Noise {
        external,
        degradation: without,
        with_amplifier: with,
        average_gain: Decibel::new(10.0 * gain.log10()),
    })
}

/// The man-made noise class of a site.
const fn site_noise(class: NoiseClass) -> SiteNoise {
    match class {
        NoiseClass::City => SiteNoise::City,
        NoiseClass::Residential => SiteNoise::Residential,
        NoiseClass::Rural => SiteNoise::Rural,
        NoiseClass::QuietRural => SiteNoise::QuietRural,
    }
}

fn linear(db: Decibel) -> f64 {
    10_f64.powf(db.db() / 10.0)
}

/// `ahead` is noise that the elements' own amplifiers add before combining, over the external noise at the output (0 for
/// passive ones); with it 0 this is `physics::noise::degradation`.
fn degradation(external: Decibel, gain: f64, ahead: f64, behind: f64) -> Decibel {
    let outside = linear(external) * gain;
    Decibel::new(10.0 * ((outside * (1.0 + ahead) + behind - gain) / outside).log10())
}

/// Average gain of the array with its losses, and the noise of element amplifiers over the external noise behind them.
///
/// Wires: the pattern's own. Active verticals: the array's average over one probe, times the amplifier's gain; the
/// amplifiers' noises add by power while the external noise adds by pattern. Passive verticals: the part's gain.
fn average_gain(subject: &Subject<'_>, response: &Response, weights: &[Complex64]) -> Option<(f64, f64)> {
    let first = subject.plan.layout.elements.first()?;
    match &first.kind {
        ElementKind::Wire(_) => radio::average_gain(response, weights).map(|gain| (gain, 0.0)),
        ElementKind::Vertical(foot) => {
            let over_one = radio::average_over_one_element(response, weights);
            match foot.kind {
                VerticalKind::Passive => {
                    subject.noise.passive_gain.map(|gain| (linear(gain) * over_one, 0.0))
                }
                VerticalKind::Active => {
                    let amplifier = subject.noise.element_amplifier?;
                    let own: f64 = weights.iter().map(Complex64::norm_sqr).sum();
                    let external = linear(site_noise(subject.noise.class).median(response.frequency()));
                    let added = linear(amplifier.noise_figure) - 1.0;
                    Some((linear(amplifier.gain) * over_one, added * own / (external * over_one)))
                }
            }
        }
    }
}
