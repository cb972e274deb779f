//! Transformers: turns, and the inductance of a winding.

use num_complex::Complex64;

use super::matching::Reflection;
use super::omega;
use crate::units::{Frequency, Resistance};

/// Impedance ratio of a transformer between two resistances.
pub fn impedance_ratio(high: Resistance, low: Resistance) -> f64 {
    high.ohms() / low.ohms()
}

/// Turns ratio √(high/low).
pub fn turns_ratio(high: Resistance, low: Resistance) -> f64 {
    impedance_ratio(high, low).sqrt()
}

/// Whole turns of a transformer and the match that they give.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct WholeTurns {
    /// Turns on the low-impedance side.
    pub low: u32,
    /// Turns on the high-impedance side.
    pub high: u32,
    /// The low impedance as seen from the high side.
    pub transformed: Resistance,
    /// Standing wave ratio there.
    pub swr: f64,
}

impl WholeTurns {
    fn new(low: u32, high: u32, from: Resistance, to: Resistance) -> Self {
        let ratio = f64::from(high) / f64::from(low);
        let transformed = Resistance::new(to.ohms() * ratio * ratio);
        let swr = Reflection::of(Complex64::from(transformed.ohms()), from).swr();
        Self { low, high, transformed, swr }
    }
}

/// The whole turns of least standing wave ratio with 1 to `max_low` turns on the low side; of equal ratios the one with
/// fewer turns. `None` when `max_low` is 0 or `high` is below `low`.
pub fn best_turns(high: Resistance, low: Resistance, max_low: u32) -> Option<WholeTurns> {
    let ideal = ideal_ratio(high, low)?;
    let choices = (1..=max_low).flat_map(|turns| candidates(turns, ideal, high, low));
    choices.fold(None, |best: Option<WholeTurns>, next| match best {
        Some(best) if best.swr <= next.swr + 1e-12 => Some(best),
        _ => Some(next),
    })
}

/// The fewest turns in all whose standing wave ratio is below `limit`, with `low_turns` at least and at most on the low
/// side. `None` when none is good enough.
pub fn fewest_turns(
    high: Resistance,
    low: Resistance,
    low_turns: std::ops::RangeInclusive<u32>,
    limit: f64,
) -> Option<WholeTurns> {
    let ideal = ideal_ratio(high, low)?;
    let highest = ideal * f64::from(*low_turns.end()) * limit;
    let all = low_turns.flat_map(|turns| {
        (turns..).take_while(move |wound| f64::from(*wound) <= highest).map(move |wound| (turns, wound))
    });
    let good =
        all.map(|(turns, wound)| WholeTurns::new(turns, wound, high, low)).filter(|found| found.swr < limit);
    good.min_by(|a, b| (a.low + a.high).cmp(&(b.low + b.high)).then(a.swr.total_cmp(&b.swr)))
}

fn ideal_ratio(high: Resistance, low: Resistance) -> Option<f64> {
    let ratio = turns_ratio(high, low);
    (ratio.is_finite() && (1.0..1e4).contains(&ratio)).then_some(ratio)
}

/// The whole turns on either side of the ideal ratio.
fn candidates(turns: u32, ideal: f64, high: Resistance, low: Resistance) -> [WholeTurns; 2] {
    #[expect(
        clippy::cast_possible_truncation,
        clippy::cast_sign_loss,
        reason = "the ratio is between 1 and 10 000"
    )]
    let below = (ideal * f64::from(turns)).floor() as u32;
    [below, below + 1].map(|wound| WholeTurns::new(turns, wound, high, low))
}

/// Inductance index of a core, `A_L`: inductance by the square of the turns.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct InductanceIndex {
    nh_per_turn2: f64,
}

impl InductanceIndex {
    /// Nanohenries a turn squared, the same number as millihenries per 1000 turns.
    pub const fn from_nh_per_turn2(nh_per_turn2: f64) -> Self {
        Self { nh_per_turn2 }
    }

    /// Microhenries per 100 turns: ten times the number of nanohenries a turn squared.
    pub fn from_uh_per_100_turns(uh_per_100_turns: f64) -> Self {
        Self { nh_per_turn2: uh_per_100_turns / 10.0 }
    }

    /// Microhenries a turn squared.
    pub fn from_uh_per_turn2(uh_per_turn2: f64) -> Self {
        Self { nh_per_turn2: uh_per_turn2 * 1000.0 }
    }

    /// Nanohenries a turn squared.
    pub const fn nh_per_turn2(self) -> f64 {
        self.nh_per_turn2
    }

    /// Microhenries per 100 turns.
    pub fn uh_per_100_turns(self) -> f64 {
        self.nh_per_turn2 * 10.0
    }

    /// Millihenries per 1000 turns.
    pub const fn mh_per_1000_turns(self) -> f64 {
        self.nh_per_turn2
    }

    /// Inductance of a winding in henries: `A_L` N². Low-frequency index; ferrite loses inductance as frequency rises.
    pub fn inductance_h(self, turns: u32) -> f64 {
        self.nh_per_turn2 * 1e-9 * f64::from(turns).powi(2)
    }

    /// Reactance of a winding in ohms.
    pub fn reactance_ohm(self, turns: u32, frequency: Frequency) -> f64 {
        omega(frequency) * self.inductance_h(turns)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ohms(ohms: f64) -> Resistance {
        Resistance::new(ohms)
    }

    #[test]
    fn fewest_turns_stay_under_the_limit() {
        let to_75 = fewest_turns(ohms(553.0), ohms(75.0), 2..=4, 1.25).unwrap();
        assert_eq!((to_75.low, to_75.high), (2, 5));
        assert!((to_75.swr - 1.18).abs() < 0.005);
        let to_50 = fewest_turns(ohms(553.0), ohms(50.0), 2..=4, 1.25).unwrap();
        assert_eq!((to_50.low, to_50.high), (2, 6));
        assert!((to_50.swr - 1.23).abs() < 0.005);
        let best = best_turns(ohms(553.0), ohms(75.0), 3).unwrap();
        assert_eq!((best.low, best.high), (3, 8));
        assert!((best.swr - 1.04).abs() < 0.005);
    }

    #[test]
    fn no_turns_when_there_is_nothing_to_choose() {
        assert_eq!(best_turns(ohms(450.0), ohms(75.0), 0), None);
        assert_eq!(best_turns(ohms(50.0), ohms(75.0), 4), None);
        assert_eq!(fewest_turns(ohms(450.0), ohms(75.0), 1..=1, 1.01), None);
    }

    #[test]
    fn two_turns_on_a_core_of_8500() {
        let core = InductanceIndex::from_nh_per_turn2(8500.0);
        let reactance = core.reactance_ohm(2, Frequency::from_hz(1_800_000));
        assert!((core.inductance_h(2) - 34e-6).abs() < 1e-12);
        assert!((reactance - 384.5).abs() < 0.1);
        assert!((InductanceIndex::from_uh_per_100_turns(85_000.0).nh_per_turn2() - 8500.0).abs() < 1e-9);
    }
}
