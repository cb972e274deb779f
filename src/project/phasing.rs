//! How the rows of an end-fire stage are phased, and which steps and delays make sense.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;
use toml::de::DeValue;

use super::code;
use super::element::ElementKind;
use super::model::{DelayRatio, Phasing, Scheme, Weight};
use super::site::{Bands, in_waves};
use super::table::Table;
use super::value::Value;
use crate::units::{Angle, Length};

/// The rows of one end-fire stage.
pub(super) struct Rows<'k> {
    /// Elements in line.
    pub(super) count: usize,
    /// What they are made of.
    pub(super) kind: ElementKind,
    /// The key of the step along the beam.
    pub(super) step_key: &'static str,
    /// The step, if it could be read.
    pub(super) step: Option<Length>,
    /// The default ratio of crossfire, and why.
    pub(super) default: (Decimal, &'k str),
}

/// Reads `scheme`, `delay` and, where the stage takes them, `weights`.
pub(super) fn read(table: &Table<'_>, rows: &Rows<'_>, bands: Option<Bands>) -> Phasing {
    if rows.step_key == "spacing"
        && let Some(list) = table.take("weights")
    {
        return given(table, &list, rows.count);
    }
    let scheme = table.or("scheme", Scheme::Crossfire, "no scheme given", |v| v.choice(Scheme::CHOICES));
    if rows.count == 3
        && scheme != Scheme::Crossfire
        && let Some(value) = table.take("scheme")
    {
        let message = format!("three in line are phased crossfire only, not \"{scheme}\"");
        value.refuse::<()>(code::THREE_IN_LINE_SCHEME, message, "leave `scheme` out, or set count = 2");
    }
    let (ratio, why) = match scheme {
        Scheme::Crossfire => rows.default,
        Scheme::InPhase => (Decimal::ONE, "in-phase: the delay is the step"),
        Scheme::HalfWave => (Decimal::new(94, 2), "half-wave: half a wave less 0.94 of the step"),
    };
    let delay = table.or_said("delay", DelayRatio::Ratio(ratio), &ratio.to_string(), why, delay);
    check_ratio(table, rows, scheme, delay);
    if let (Some(step), Some(bands), Some(at)) = (rows.step, bands, table.take(rows.step_key)) {
        check_step(&at, step, scheme, delay, bands);
    }
    if let (Scheme::HalfWave, Some(bands), Some(at)) = (scheme, bands, table.take("scheme"))
        && bands.lowest != bands.highest
    {
        let message =
            format!("a half-wave delay is right at {} only, but this project has more bands", bands.design);
        let help = "`crossfire` keeps its rear null on every band";
        at.desk.warning(code::HALF_WAVE_ONE_BAND, at.at, message, help);
    }
    Phasing::Scheme { scheme, delay }
}

/// Reads `delay`: a ratio above zero, or what to search for.
pub(super) fn delay(value: &Value<'_>) -> Option<DelayRatio> {
    const WORDS: &[(&str, DelayRatio)] = &[
        ("best", DelayRatio::BestRear),
        ("best-rear", DelayRatio::BestRear),
        ("best-rdf", DelayRatio::BestRdf),
    ];
    if let DeValue::String(text) = value.raw
        && text.trim().starts_with(char::is_alphabetic)
    {
        return value.choice(WORDS);
    }
    if let DeValue::String(text) = value.raw
        && text.trim().ends_with(['m', 't'])
    {
        let message = "`delay` is the line's electrical length over the step, not a length";
        let help = "write a ratio such as delay = 0.94, or delay = \"best\"";
        return value.refuse(code::WRONG_TYPE, message, help);
    }
    let ratio = value.ratio()?;
    if ratio > Decimal::ZERO {
        return Some(DelayRatio::Ratio(ratio));
    }
    let message = format!("a delay of {ratio} steps would turn the beam round");
    value.refuse(code::DELAY_NOT_POSITIVE, message, "write a ratio above 0, usually 0.4 to 1.0")
}

fn check_ratio(table: &Table<'_>, rows: &Rows<'_>, scheme: Scheme, delay: DelayRatio) {
    let (Some(value), DelayRatio::Ratio(ratio)) = (table.take("delay"), delay) else { return };
    let unusual = ratio < Decimal::new(4, 1) || ratio > Decimal::ONE;
    let short = ratio < Decimal::new(9, 1) && rows.kind == ElementKind::Wire && scheme == Scheme::Crossfire;
    if unusual {
        let message = format!("nothing improves with a delay of {ratio} steps");
        let help = "0.4 to 1.0 is normal; above 1.0 there is no rear null, below 0.4 the signal is lost";
        value.desk.warning(code::DELAY_UNUSUAL, value.at, message, help);
    } else if short {
        let message =
            format!("a delay of {ratio} steps is short for wires: it gives up signal and rear null");
        let help = "0.90 to 1.00 is usual; less gains a few tenths of a dB of directivity";
        value.desk.warning(code::DELAY_SHORT_FOR_WIRES, value.at, message, help);
    }
}

/// The forward signal of a crossfire pair is 2 sin(k (s + d) / 2): nothing at s + d = λ.
fn check_step(at: &Value<'_>, step: Length, scheme: Scheme, delay: DelayRatio, bands: Bands) {
    let ratio = match delay {
        DelayRatio::Ratio(ratio) => ratio.to_f64().unwrap_or(1.0),
        DelayRatio::BestRear | DelayRatio::BestRdf => 1.0,
    };
    let (high, low) = match scheme {
        Scheme::Crossfire => (bands.highest, bands.lowest),
        Scheme::HalfWave => (bands.design, bands.design),
        Scheme::InPhase => return,
    };
    let (long, short) = (in_waves(step, high), in_waves(step, low));
    let half_wave = Length::from_metres_nearest(high.wavelength_m() / 2.0);
    if scheme == Scheme::HalfWave && long * ratio >= 0.5 {
        let message = format!("half a wave less {ratio} × {step} leaves no delay line at {high}");
        at.refuse::<()>(code::HALF_WAVE_TOO_LONG, message, format!("keep `{}` below {half_wave}", at.name()));
    } else if long >= 0.5 || long * (1.0 + ratio) >= 1.0 {
        let message = format!("{step} is {long:.2} wavelengths at {high}: the wanted signal cancels");
        let help = format!("keep `{}` well below half a wave ({half_wave}), best below 0.40", at.name());
        at.refuse::<()>(code::STEP_TOO_LONG, message, help);
    } else if long > 0.40 {
        let message = format!("{step} is {long:.2} wavelengths at {high}: little signal is left");
        at.desk.warning(
            code::STEP_LONG,
            at.at,
            message,
            "usual: 0.40 wavelengths or less at the highest band",
        );
    }
    if short < 0.03 {
        let message = format!("{step} is {short:.3} wavelengths at {low}: very little signal is left");
        at.desk.warning(
            code::STEP_SHORT,
            at.at,
            message,
            "usual: 0.03 wavelengths or more at the lowest band",
        );
    }
}

fn given(table: &Table<'_>, list: &Value<'_>, count: usize) -> Phasing {
    for key in ["scheme", "delay"] {
        if let Some(value) = table.take(key) {
            let message = format!("`weights` are given, so `{key}` has nothing to say");
            value.desk.error(code::WEIGHTS_AND_SCHEME, Some(value.key_at), message, "keep one of the two");
        }
    }
    let weights = weights(list);
    if let Some(weights) = &weights {
        check_count(list, weights.len(), count);
    }
    Phasing::Weights(weights.unwrap_or_default())
}

/// Refuses more or fewer weights than elements.
pub(super) fn check_count(list: &Value<'_>, weights: usize, elements: usize) {
    if weights != elements {
        let message = format!("{weights} weights for {elements} elements");
        list.refuse::<()>(code::WEIGHT_COUNT, message, "give one weight for each element, in the same order");
    }
}

/// Reads `weights = [{ amplitude, phase }, …]`; `None`: already reported.
pub(super) fn weights(list: &Value<'_>) -> Option<Vec<Weight>> {
    let weights: Vec<Option<Weight>> =
        list.items("{ amplitude = 1.0, phase = \"0 deg\" }, …")?.iter().map(weight).collect();
    weights.into_iter().collect()
}

fn weight(item: &Value<'_>) -> Option<Weight> {
    let table = item.table()?;
    let amplitude = table.need("amplitude", "amplitude = 1.0", |v| {
        let amplitude = v.ratio_from_zero()?;
        if amplitude > Decimal::ZERO {
            return Some(amplitude);
        }
        let message = "a weight of amplitude 0 means that the element is not connected";
        v.refuse(code::WEIGHT_ZERO, message, "leave that element out, or give it a weight")
    });
    let phase = table.need("phase", "phase = \"0 deg\"", |v| {
        let phase = v.quantity("deg", Angle::parse)?;
        super::site::in_range(v, phase, 720.0)
    });
    table.finish();
    Some(Weight { amplitude: amplitude?, phase: phase? })
}
