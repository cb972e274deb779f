//! Figures of a pattern in plain words, no surer than they are.

use crate::radio::{Directivity, FRONT_TO_BACK_CEILING_DB, Quantiles};
use crate::reception::{Figures, Noise, Weighting};
use crate::units::Bearing;

use super::super::machine::rounded;

/// Below this the receiver's own noise does not matter, in dB (house rule).
const NEEDLESS_BELOW_DB: f64 = 1.0;
/// Above this it does, in dB (house rule).
const NEEDED_ABOVE_DB: f64 = 3.0;
/// One S unit in dB below 30 MHz. Source: IARU Region 1 recommendation R.1, 1981 (from memory).
const S_UNIT_DB: f64 = 6.0;

/// Whether a figure lies within the limits for which the method was compared with a reference.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Trust {
    /// Within: one decimal.
    Within,
    /// Outside: rounded, and said to be about.
    Outside,
}

impl Trust {
    /// As the engine judges its own figures.
    pub(super) fn of(figures: &Figures) -> Self {
        if figures.report.validity.valid { Self::Within } else { Self::Outside }
    }

    /// A level or an angle without its unit.
    pub(super) fn number(self, value: f64) -> String {
        match self {
            _ if !value.is_finite() => "–".to_owned(),
            Self::Within => format!("{:.1}", rounded(value, 1)),
            Self::Outside => format!("about {:.0}", rounded(value, 0)),
        }
    }

    /// Whole degrees or decibels, for figures that are never known more exactly.
    pub(super) fn whole(self, value: f64) -> String {
        match self {
            _ if !value.is_finite() => "–".to_owned(),
            Self::Within => format!("{:.0}", rounded(value, 0)),
            Self::Outside => format!("about {:.0}", rounded(value / 5.0, 0) * 5.0),
        }
    }

    /// A front-to-back ratio: whole decibels, and nothing above what is believed.
    pub(super) fn front_to_back(self, db: f64) -> String {
        if db > FRONT_TO_BACK_CEILING_DB {
            format!("> {FRONT_TO_BACK_CEILING_DB}")
        } else {
            match self {
                _ if db.is_nan() => "–".to_owned(),
                Self::Within => format!("{:.0}", rounded(db, 0)),
                Self::Outside => format!("about {:.0}", rounded(db, 0)),
            }
        }
    }

    /// P10 / P50 / P90.
    pub(super) fn quantiles(self, quantiles: &Quantiles) -> String {
        let number = |value: f64| match self {
            Self::Within => format!("{:.1}", rounded(value, 1)),
            Self::Outside => format!("{:.0}", rounded(value, 0)),
        };
        let three = [quantiles.p10, quantiles.p50, quantiles.p90].map(number).join(" / ");
        if self == Self::Within { three } else { format!("about {three}") }
    }
}

/// The first sentence on an array: the figures that decide.
///
/// `when` is the frequency, with the direction where there are several.
pub(super) fn headline(array: &str, when: &str, figures: &Figures) -> String {
    let Directivity { rdf_db, peak_elevation_deg, front_to_back_db, worst_rear, .. } =
        &figures.report.directivity;
    let trust = Trust::of(figures);
    minus(&format!(
        "{array} at {when} hears {} dB RDF at {}° elevation, front-to-back {} dB, worst rear lobe {} dB",
        trust.number(*rdf_db),
        trust.whole(*peak_elevation_deg),
        trust.front_to_back(*front_to_back_db),
        trust.number(worst_rear.level_db)
    ))
}

/// What the headline means.
pub(super) fn meaning(figures: &Figures) -> String {
    let directivity = &figures.report.directivity;
    let trust = Trust::of(figures);
    let times = 10_f64.powf(directivity.rdf_db / 10.0);
    let times = if trust == Trust::Within { format!("{times:.0}") } else { format!("about {times:.0}") };
    let rear = directivity.worst_rear.level_db;
    let behind = if rear > -3.0 {
        "somewhere behind or overhead it hears nearly as well as in front".to_owned()
    } else {
        let units = (-rear / S_UNIT_DB).max(0.0);
        format!(
            "the loudest direction behind or overhead is {} dB weaker, some {units:.1} S units",
            trust.number(-rear)
        )
    };
    let beam = if directivity.beamwidth_deg >= 359.5 {
        "it hears all round".to_owned()
    } else {
        format!("the beam is {}° wide at half power", trust.whole(directivity.beamwidth_deg))
    };
    format!(
        "that is, against noise from all round a wanted signal stands {times} times clearer than on an antenna that hears every way alike; {behind}; {beam}"
    )
}

/// Where the worst rear lobe lies, as a true bearing and an elevation.
pub(super) fn worst_rear_place(towards: Bearing, figures: &Figures) -> String {
    let lobe = &figures.report.directivity.worst_rear;
    if lobe.elevation_deg > 84.5 {
        return "overhead".to_owned();
    }
    let bearing = Bearing::from_degrees((towards.degrees() + lobe.azimuth_deg).round());
    format!("{:03.0}°, {:.0}° up", bearing.degrees(), lobe.elevation_deg)
}

/// Whether the array needs an amplifier, in a word or two.
pub(super) fn amplifier(noise: &Noise) -> &'static str {
    match noise.degradation.db() {
        db if db < NEEDLESS_BELOW_DB => "no",
        db if db <= NEEDED_ABOVE_DB => "optional",
        _ => "yes",
    }
}

/// The same as a sentence.
pub(super) fn amplifier_sentence(noise: Option<&Noise>) -> String {
    let Some(noise) = noise else {
        return "amplifier: not known, since the catalogue does not say how much signal these elements deliver"
            .to_owned();
    };
    let without = noise.degradation.db();
    let verdict = match amplifier(noise) {
        "no" => "not needed",
        "optional" => "optional",
        _ => "needed",
    };
    let with = match noise.with_amplifier {
        Some(_) | None if without < NEEDLESS_BELOW_DB => String::new(),
        Some(with) => format!(", with one in the hub by {:.1} dB", with.db()),
        None => "; the catalogue has none for a hub".to_owned(),
    };
    let by = if without < 0.05 { "less than 0.1 dB".to_owned() } else { format!("{without:.1} dB") };
    format!("amplifier: {verdict}; the receiver's own noise raises the floor by {by}{with}")
}

/// On which weights the figures rest.
pub(super) const fn basis(weighting: Weighting) -> &'static str {
    match weighting {
        Weighting::Ideal => "as designed: weights exactly as meant, nothing lost, matched terminations",
        Weighting::Built => {
            "as built: loss and phase of every line and pad on the parts list, ideal hybrids, every line matched"
        }
    }
}

/// A sign before a digit as a true minus, for sentences (tables keep the sign that spreadsheets read).
pub(super) fn minus(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    let mut before = ' ';
    let mut rest = text.chars().peekable();
    while let Some(c) = rest.next() {
        let sign = c == '-'
            && !before.is_alphanumeric()
            && before != '-'
            && rest.peek().is_some_and(char::is_ascii_digit);
        out.push(if sign { '−' } else { c });
        before = c;
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn figures_outside_the_limits_have_no_decimals() {
        assert_eq!(Trust::Within.number(11.94), "11.9");
        assert_eq!(Trust::Outside.number(11.94), "about 12");
        assert_eq!(Trust::Within.number(-0.01), "0.0");
    }

    #[test]
    fn deep_nulls_are_not_believed() {
        assert_eq!(Trust::Within.front_to_back(25.4), "> 25");
        assert_eq!(Trust::Within.front_to_back(19.4), "19");
        assert_eq!(Trust::Within.front_to_back(f64::INFINITY), "> 25");
    }

    #[test]
    fn only_a_sign_becomes_a_minus() {
        assert_eq!(minus("nw-2 at -13.9 dB, 2026-10-01"), "nw-2 at −13.9 dB, 2026-10-01");
    }
}
