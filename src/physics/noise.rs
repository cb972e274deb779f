//! Noise: what the world sends, what amplifiers and lossy lines add, and whether an amplifier is worth having.

use super::{BOLTZMANN, NOISE_REFERENCE_K, power_db, power_ratio};
use crate::units::{Decibel, Frequency};

/// The man-made noise of a site.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum SiteNoise {
    /// Business streets.
    City,
    /// Dwellings.
    Residential,
    /// Countryside.
    Rural,
    /// Countryside far from everything.
    QuietRural,
}

impl SiteNoise {
    /// c and d of Fa = c − d log10 f.
    const fn constants(self) -> (f64, f64) {
        match self {
            Self::City => (76.8, 27.7),
            Self::Residential => (72.5, 27.7),
            Self::Rural => (67.2, 27.7),
            Self::QuietRural => (53.6, 28.6),
        }
    }

    /// Median external noise figure in dB above k T0 b, for a lossless short vertical: Fa = c − d log10 f, f in MHz.
    ///
    /// Recommendation ITU-R P.372, constants as coded in the reference software of ITU-R Study Group 3 (read). From 0.3
    /// to 250 MHz.
    pub fn median(self, frequency: Frequency) -> Decibel {
        let (c, d) = self.constants();
        Decibel::new(c - d * frequency.mhz().log10())
    }

    /// How far the noise of one tenth of the time lies above and below the median (same source, Table 2; quiet rural
    /// takes the rural figures).
    pub const fn deciles(self) -> Deciles {
        let (upper, lower) = match self {
            Self::City => (11.0, 6.7),
            Self::Residential => (10.6, 5.3),
            Self::Rural | Self::QuietRural => (9.2, 4.6),
        };
        Deciles { upper: Decibel::new(upper), lower: Decibel::new(lower) }
    }
}

/// Deviations from a median, both positive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Deciles {
    /// Upper decile above the median.
    pub upper: Decibel,
    /// Lower decile below the median.
    pub lower: Decibel,
}

/// Galactic noise figure 52 − 23 log10 f, f in MHz (ITU-R P.372, as for `SiteNoise`).
///
/// It reaches the ground only above the F2 critical frequency: not to be shown below about 10 MHz.
pub fn galactic(frequency: Frequency) -> Decibel {
    Decibel::new(52.0 - 23.0 * frequency.mhz().log10())
}

/// Thermal noise density k T in dBm/Hz.
pub fn thermal_density_dbm_per_hz(kelvin: f64) -> f64 {
    power_db(BOLTZMANN * kelvin * 1000.0)
}

/// Noise power in dBm of a noise figure Fa in a bandwidth: Fa + 10 log10(k T0 b).
pub fn noise_power_dbm(figure: Decibel, bandwidth_hz: f64) -> f64 {
    figure.db() + thermal_density_dbm_per_hz(NOISE_REFERENCE_K) + power_db(bandwidth_hz)
}

/// The sum of powers given in dBm (or any one decibel scale).
pub fn power_sum_db(levels: &[f64]) -> f64 {
    power_db(levels.iter().map(|level| power_ratio(*level)).sum())
}

/// One stage of a chain.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stage {
    /// Noise figure.
    pub noise_figure: Decibel,
    /// Available gain, negative for loss.
    pub gain: Decibel,
}

impl Stage {
    /// A lossy line or pad at the reference temperature: its noise figure is its loss.
    pub const fn passive(loss: Decibel) -> Self {
        Self { noise_figure: loss, gain: Decibel::new(-loss.db()) }
    }

    /// A last stage whose gain does not matter.
    pub const fn receiver(noise_figure: Decibel) -> Self {
        Self { noise_figure, gain: Decibel::new(0.0) }
    }
}

/// Noise factor (linear) of stages in the order of the signal: F1 + (F2−1)/G1 + (F3−1)/(G1G2) + … (H. T. Friis, "Noise
/// figures of radio receivers", 1944, from memory). One for no stages.
pub fn cascade_factor(stages: &[Stage]) -> f64 {
    let sum = stages.iter().fold((1.0, 1.0), |(factor, gain), stage| {
        let added = (power_ratio(stage.noise_figure.db()) - 1.0) / gain;
        (factor + added, gain * power_ratio(stage.gain.db()))
    });
    sum.0
}

/// Noise figure of stages in the order of the signal.
pub fn cascade(stages: &[Stage]) -> Decibel {
    Decibel::new(power_db(cascade_factor(stages)))
}

/// Noise figure of an attenuator that is not at the reference temperature: F = 1 + (L−1) T/T0.
pub fn attenuator_figure(loss: Decibel, kelvin: f64) -> Decibel {
    Decibel::new(power_db(1.0 + (power_ratio(loss.db()) - 1.0) * kelvin / NOISE_REFERENCE_K))
}

/// A noise figure with everything in it, and what it costs against external noise alone.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SystemNoise {
    /// System noise figure.
    pub figure: Decibel,
    /// Loss of signal-to-noise ratio.
    pub snr_loss: Decibel,
}

/// System noise figure f = fa − 1 + l·fr and the loss 10 log10(f/fa), all losses at the reference temperature.
///
/// `antenna_loss` is how far the antenna's response lies below that of the lossless short vertical; `receiver` is the
/// cascade fr from its terminals on (ITU-R P.372, from memory).
pub fn system_noise(external: Decibel, antenna_loss: Decibel, receiver: Decibel) -> SystemNoise {
    let fa = power_ratio(external.db());
    let factor = fa - 1.0 + power_ratio(antenna_loss.db()) * power_ratio(receiver.db());
    SystemNoise { figure: Decibel::new(power_db(factor)), snr_loss: Decibel::new(power_db(factor / fa)) }
}

/// How much a receive array's noise floor lies above external noise alone: 10 log10((fa g + f − g)/(fa g)).
///
/// `external` is Fa; `average_gain` the gain of the array averaged over all directions, **after** phasing, combining and
/// every loss ahead of the first amplifier (at most 0 dB); `behind` the linear noise factor of everything after it. The
/// same as `system_noise` with the average gain as antenna loss, for a directive antenna in noise from everywhere.
pub fn degradation(external: Decibel, average_gain: Decibel, behind: f64) -> Decibel {
    let fa = power_ratio(external.db());
    let g = power_ratio(average_gain.db());
    Decibel::new(power_db((fa * g + behind - g) / (fa * g)))
}

/// Whether an amplifier at the hub is worth having.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum AmplifierNeed {
    /// Below 1 dB of degradation without one.
    No,
    /// From 1 to 3 dB.
    Optional,
    /// Above 3 dB.
    Yes,
}

/// The need for an amplifier by the degradation without one (common practice, no source for the limits).
pub fn amplifier_need(degradation_without: Decibel) -> AmplifierNeed {
    let db = degradation_without.db();
    if db < 1.0 {
        AmplifierNeed::No
    } else if db <= 3.0 {
        AmplifierNeed::Optional
    } else {
        AmplifierNeed::Yes
    }
}

/// Loss of signal-to-noise ratio when external noise lies `excess` above the receiver's own: 10 log10(1 + 10^(−x/10)).
pub fn snr_loss_from_excess(excess: Decibel) -> Decibel {
    Decibel::new(power_db(1.0 + power_ratio(-excess.db())))
}

/// The same from a field test: the noise rises by `rise` on connecting the antenna; −10 log10(1 − 10^(−x/10)). `None`
/// unless the noise rises.
pub fn snr_loss_from_rise(rise: Decibel) -> Option<Decibel> {
    (rise.db() > 0.0).then(|| Decibel::new(-power_db(1.0 - power_ratio(-rise.db()))))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_rise_and_the_excess_tell_the_same_story() {
        let excess = Decibel::new(10.0);
        let rise = Decibel::new(power_sum_db(&[10.0, 0.0]));
        let a = snr_loss_from_excess(excess).db();
        assert!((snr_loss_from_rise(rise).unwrap().db() - a).abs() < 1e-12);
        assert_eq!(snr_loss_from_rise(Decibel::new(0.0)), None);
    }

    #[test]
    fn degradation_is_the_system_formula_with_gain_for_loss() {
        let external = Decibel::new(46.094);
        let system = system_noise(external, Decibel::new(35.0), Decibel::new(14.0)).snr_loss.db();
        let direct = degradation(external, Decibel::new(-35.0), power_ratio(14.0)).db();
        assert!((system - direct).abs() < 1e-9);
    }

    #[test]
    fn limits_of_the_amplifier_rule() {
        let need = |db: f64| amplifier_need(Decibel::new(db));
        assert_eq!(need(0.99), AmplifierNeed::No);
        assert_eq!(need(1.0), AmplifierNeed::Optional);
        assert_eq!(need(3.0), AmplifierNeed::Optional);
        assert_eq!(need(3.01), AmplifierNeed::Yes);
    }

    #[test]
    fn loss_ahead_of_everything_adds_decibel_for_decibel() {
        let line = Stage::passive(Decibel::new(6.0));
        let rest = Stage::receiver(Decibel::new(12.0));
        assert!((cascade(&[line, rest]).db() - 18.0).abs() < 1e-12);
        assert!(cascade(&[]).db().abs() < 1e-12);
    }
}
