//! Schemes and given weights, turned into delays, inverters, pads and hybrids.

use rust_decimal::Decimal;
use rust_decimal::prelude::{FromPrimitive, ToPrimitive};

use super::stage::Recipe;
use crate::plan::{DesignWeight, Polarity};
use crate::project::{Phasing, Scheme, Weight};
use crate::units::{ElectricalLength, Frequency, Length};

/// The weights of some roles, front to rear, and the recipe that makes them.
#[derive(Clone, Debug)]
pub struct Phased {
    /// One a role.
    pub weights: Vec<DesignWeight>,
    /// How they are made.
    pub recipe: Recipe,
}

/// Below this a pad is not worth its box (house rule).
const LEAST_PAD_DB: f64 = 0.5;

/// The front and the rear row of a pair, `step` apart along the beam.
///
/// Crossfire: rear inverted and delayed by ratio × step, so the two copies of a wave from the rear meet and cancel.
/// In-phase: front delayed by ratio × step. Half-wave: front delayed by λ/2 − ratio × step at the design frequency.
pub fn pair(phasing: &Phasing, step: Length, step_name: &str, ratio: Decimal, design: Frequency) -> Phased {
    let scheme = match phasing {
        Phasing::Weights(weights) => return given(weights, design),
        Phasing::Scheme { scheme, .. } => *scheme,
    };
    let product = ElectricalLength::from_metres(step.decimal_metres() * ratio);
    let words = format!("{step_name} {step} × {}{}", ratio.normalize(), null_in_words(ratio));
    match scheme {
        Scheme::Crossfire => {
            let rear = Recipe::inverted(Recipe::delayed(Recipe::Seat(1), product, words));
            Phased {
                weights: vec![DesignWeight::UNIT, weight(1.0, Polarity::Inverted, product)],
                recipe: Recipe::Combine(vec![Recipe::Seat(0), rear]),
            }
        }
        Scheme::InPhase => front_delayed(product, format!("{step_name} {step} × {}", ratio.normalize())),
        Scheme::HalfWave => {
            let half = design.half_wave();
            let delay = ElectricalLength::from_metres(half.decimal_metres() - product.decimal_metres());
            let words =
                format!("half a wave at {design} {half} − {step_name} {step} × {}", ratio.normalize());
            front_delayed(delay, words)
        }
    }
}

fn front_delayed(delay: ElectricalLength, words: String) -> Phased {
    Phased {
        weights: vec![weight(1.0, Polarity::Upright, delay), DesignWeight::UNIT],
        recipe: Recipe::Combine(vec![Recipe::delayed(Recipe::Seat(0), delay, words), Recipe::Seat(1)]),
    }
}

/// Front, middle and rear of three in line: weights 1 : −2 : 1 with delays 0, d, 2d, two crossfire pairs in cascade.
///
/// The outer two meet first, through 3 dB pads, so that they arrive at half the middle's amplitude.
pub fn three(phasing: &Phasing, step: Length, ratio: Decimal, design: Frequency) -> Phased {
    if let Phasing::Weights(weights) = phasing {
        return given(weights, design);
    }
    let d = ElectricalLength::from_metres(step.decimal_metres() * ratio);
    let twice = ElectricalLength::from_metres(step.decimal_metres() * ratio * Decimal::TWO);
    let words =
        |times: &str| format!("{times}spacing {step} × {}{}", ratio.normalize(), null_in_words(ratio));
    let pad = |of| Recipe::Pad {
        db: 3.0,
        why: "outer elements at half the amplitude of the middle one (1 : 2 : 1)".to_owned(),
        of: Box::new(of),
    };
    let rear = Recipe::delayed(Recipe::Seat(2), twice, words("2 × "));
    let outer = Recipe::Combine(vec![pad(Recipe::Seat(0)), pad(rear)]);
    let middle = Recipe::inverted(Recipe::delayed(Recipe::Seat(1), d, words("")));
    Phased {
        weights: vec![
            DesignWeight::UNIT,
            weight(2.0, Polarity::Inverted, d),
            weight(1.0, Polarity::Upright, twice),
        ],
        recipe: Recipe::Combine(vec![outer, middle]),
    }
}

/// Given amplitudes and phases: one combining tree, pads for the weaker legs, and for the phases the choice of
/// undelayed leg and inverters with the least total delay (ties: fewer inverters, then file order).
pub fn given(weights: &[Weight], design: Frequency) -> Phased {
    let plan = least_delays(weights);
    let largest = weights.iter().map(amplitude).fold(0.0, f64::max);
    let wavelength = design.wavelength_m();
    let mut design_weights = Vec::new();
    let mut legs = Vec::new();
    for (n, (given, leg)) in weights.iter().zip(&plan).enumerate() {
        let metres = leg.delay_degrees / 360.0 * wavelength;
        let delay = ElectricalLength::from_metres(Decimal::from_f64(metres).unwrap_or_default());
        design_weights.push(weight(amplitude(given), leg.polarity, delay));
        let words = format!("{:.2}° at {design}", leg.delay_degrees);
        let mut recipe = Recipe::delayed(Recipe::Seat(n), delay, words);
        if leg.polarity == Polarity::Inverted {
            recipe = Recipe::inverted(recipe);
        }
        legs.push(padded(recipe, largest, amplitude(given)));
    }
    Phased { weights: design_weights, recipe: Recipe::combined(legs) }
}

fn padded(of: Recipe, largest: f64, own: f64) -> Recipe {
    if own <= 0.0 {
        return of;
    }
    let db = 20.0 * libm::log10(largest / own);
    if db < LEAST_PAD_DB {
        return of;
    }
    let why = format!("amplitude {own} against the largest {largest}");
    Recipe::Pad { db, why, of: Box::new(of) }
}

fn amplitude(weight: &Weight) -> f64 {
    weight.amplitude.to_f64().unwrap_or_default()
}

fn weight(amplitude: f64, polarity: Polarity, delay: ElectricalLength) -> DesignWeight {
    DesignWeight { amplitude, polarity, delay }
}

#[derive(Clone, Copy, Debug, PartialEq)]
struct LegPhase {
    polarity: Polarity,
    delay_degrees: f64,
}

fn least_delays(weights: &[Weight]) -> Vec<LegPhase> {
    let mut best: Option<(f64, usize, Vec<LegPhase>)> = None;
    for reference in weights {
        let legs: Vec<LegPhase> = weights.iter().map(|w| leg_phase(reference, w)).collect();
        let total: f64 = legs.iter().map(|leg| leg.delay_degrees).sum();
        let inverters = legs.iter().filter(|leg| leg.polarity == Polarity::Inverted).count();
        let better = best.as_ref().is_none_or(|(least, count, _)| {
            total < least - 1e-9 || ((total - least).abs() <= 1e-9 && inverters < *count)
        });
        if better {
            best = Some((total, inverters, legs));
        }
    }
    best.map(|(_, _, legs)| legs).unwrap_or_default()
}

/// The shorter of the two ways to the wanted phase lag behind the reference: with an inverter or without.
fn leg_phase(reference: &Weight, own: &Weight) -> LegPhase {
    let lag = turn(reference.phase.degrees() - own.phase.degrees());
    let inverted = turn(lag - 180.0);
    if inverted < lag {
        LegPhase { polarity: Polarity::Inverted, delay_degrees: inverted }
    } else {
        LegPhase { polarity: Polarity::Upright, delay_degrees: lag }
    }
}

/// Into 0 … 360; a hair below a full turn is no turn at all.
fn turn(degrees: f64) -> f64 {
    let turned = degrees.rem_euclid(360.0);
    if turned > 360.0 - 1e-7 { 0.0 } else { turned }
}

/// Where the rear null of a crossfire pair stands: arccos of the ratio.
fn null_in_words(ratio: Decimal) -> String {
    match ratio.to_f64() {
        Some(r) if r > 0.0 && r < 1.0 => {
            format!(" (rear null at {:.0}° elevation)", libm::acos(r).to_degrees())
        }
        Some(r) if (r - 1.0).abs() < 1e-12 => " (rear null on the horizon)".to_owned(),
        _ => String::new(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::units::Angle;

    fn given_weight(amplitude: i64, degrees: f64) -> Weight {
        Weight { amplitude: Decimal::from(amplitude), phase: Angle::from_degrees(degrees) }
    }

    #[test]
    fn a_crossfire_pair_written_as_weights_is_one_inverter_and_one_delay_in_the_rear() {
        let weights = [given_weight(1, 0.0), given_weight(1, 180.0 - 40.0)];
        let legs = least_delays(&weights);
        assert_eq!(legs[0], LegPhase { polarity: Polarity::Upright, delay_degrees: 0.0 });
        assert_eq!(legs[1].polarity, Polarity::Inverted);
        assert!((legs[1].delay_degrees - 40.0).abs() < 1e-9);
    }

    #[test]
    fn equal_weights_need_nothing() {
        let legs = least_delays(&[given_weight(1, 30.0), given_weight(1, 30.0)]);
        assert!(legs.iter().all(|leg| leg.delay_degrees < 1e-9 && leg.polarity == Polarity::Upright));
    }
}
