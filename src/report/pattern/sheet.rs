//! The patterns for people: the answer, the figures, and where they stop being true.

use std::collections::BTreeSet;

use super::View;
use super::table;
use super::words;
use crate::radio::{ErrorSize, Sampling};
use crate::reception::{ArrayReport, DirectionReport, FrequencyReport};
use crate::report::Sheet;

/// The patterns of every array: answer lines, warnings, tables, notes.
pub fn sheet(view: &View<'_>) -> Sheet {
    let mut sheet = Sheet::default();
    for (option, reports) in view.options {
        for report in reports {
            let Answer { headlines, meaning, warning } = answer(&name(view, option, report), report);
            sheet.answer.extend([headlines, meaning].concat());
            sheet.answer.extend(warning);
            sheet.tables.extend(table::tables(report, view.delays.get(&report.array)));
        }
    }
    sheet.notes = notes(view);
    sheet
}

/// The answer on one array.
pub(super) struct Answer {
    /// One a direction at the design frequency.
    pub(super) headlines: Vec<String>,
    /// What the first of them means, and whether an amplifier is needed.
    pub(super) meaning: Vec<String>,
    /// Where the figures are not to be relied on, on any band.
    pub(super) warning: Option<String>,
}

/// The array's name, with its option where that says more.
pub(super) fn name(view: &View<'_>, option: &str, report: &ArrayReport) -> String {
    if option.is_empty() || option == report.array || view.options.len() == 1 {
        report.array.clone()
    } else {
        format!("{} (option {option})", report.array)
    }
}

/// The answer on one array.
pub(super) fn answer(name: &str, report: &ArrayReport) -> Answer {
    let mut answer = Answer { headlines: Vec::new(), meaning: Vec::new(), warning: warning(name, report) };
    let several = report.directions.len() > 1;
    for direction in &report.directions {
        let Some(first) = direction.frequencies.first() else { continue };
        let towards = if several { format!(" towards {}", direction.bearing) } else { String::new() };
        let when = format!("{}{towards}", first.frequency);
        if let Ok(figures) = &first.figures {
            answer.headlines.push(words::headline(name, &when, figures));
            if answer.meaning.is_empty() {
                answer.meaning.push(words::meaning(figures));
                answer.meaning.push(words::amplifier_sentence(figures.noise.as_ref()));
            }
        }
        answer.headlines.extend(failures(name, direction, &towards));
    }
    answer
}

/// One line for each band of a direction that has no figures.
fn failures(name: &str, direction: &DirectionReport, towards: &str) -> Vec<String> {
    let line = |report: &FrequencyReport| {
        let error = report.figures.as_ref().err()?;
        Some(format!("{name} at {}{towards} cannot be computed: {error}", report.frequency))
    };
    direction.frequencies.iter().filter_map(line).collect()
}

/// Every reason with the bands it holds for; nothing when all figures are within the limits.
fn warning(name: &str, report: &ArrayReport) -> Option<String> {
    let mut reasons: Vec<(String, Vec<String>)> = Vec::new();
    for frequency in frequencies(report) {
        let Some(reason) = reason(frequency) else { continue };
        let band = frequency.frequency.to_string();
        match reasons.iter_mut().find(|(known, _)| *known == reason) {
            Some((_, bands)) if bands.contains(&band) => {}
            Some((_, bands)) => bands.push(band),
            None => reasons.push((reason, vec![band])),
        }
    }
    let words = reasons.into_iter().map(|(reason, bands)| format!("at {} {reason}", bands.join(" and ")));
    let words = words.collect::<Vec<_>>().join("; ");
    (!words.is_empty()).then(|| {
        format!(
            "warning: {name}: {words}; the method was not shown to hold there, so these figures are rounded and only a \
             rough guide"
        )
    })
}

/// Why a band's figures are not to be relied on.
fn reason(report: &FrequencyReport) -> Option<String> {
    report.figures.as_ref().ok().and_then(|figures| figures.report.validity.why_not.clone())
}

/// What holds for all arrays.
pub(super) fn notes(view: &View<'_>) -> Vec<String> {
    let size = ErrorSize::default();
    let sampling = Sampling::default();
    let mut notes = vec![
        words::basis(view.weighting).to_owned(),
        "RDF sets the wanted direction against noise that comes equally from everywhere above the horizon; noise from \
         one direction, such as a house or a storm, can make an array look better or worse than that"
            .to_owned(),
        format!(
            "with errors: of {} draws with {} dB and {}° of random error an element (seed {}), a tenth lies below P10, half below P50, nine tenths below P90",
            sampling.draws, size.amplitude_db, size.phase_deg, sampling.seed
        ),
        "highest RDF of these elements: what the best amplitudes and phases would give at the peak elevation, however delicate; \
         that can be built: the best that still stands with errors of about 0.5 dB and 5° an element"
            .to_owned(),
        "the worst rear lobe is the loudest direction from abeam over the zenith to the rear; front-to-back is the one direction right behind, and above \
         25 dB it is not believed"
            .to_owned(),
        "amplifier: none below 1 dB, optional up to 3 dB, needed above (house rule); the receiver is the one of the project, noise from outside as ITU-R P.372"
            .to_owned(),
        "compared with a method-of-moments reference in 152 cases, RDF is within 0.3 dB for 1.8 to 10.15 MHz, wires of 0.54 to 6.4 wavelengths up to 0.10 wavelength \
         high, verticals up to an eighth, soil of 1 to 20 mS/m; front-to-back 20 dB means 17 to 24 dB"
            .to_owned(),
    ];
    let reports = || view.options.iter().flat_map(|(_, reports)| reports);
    let methods: BTreeSet<String> = reports().flat_map(methods).collect();
    notes.extend(methods);
    let besides: BTreeSet<String> = reports().flat_map(besides).collect();
    notes.extend(besides);
    notes
}

fn frequencies(report: &ArrayReport) -> impl Iterator<Item = &FrequencyReport> {
    report.directions.iter().flat_map(|direction| &direction.frequencies)
}

fn methods(report: &ArrayReport) -> Vec<String> {
    let known = frequencies(report).filter_map(|frequency| frequency.figures.as_ref().ok());
    known.map(|figures| format!("method of {}: {}", report.array, figures.report.validity.method)).collect()
}

fn besides(report: &ArrayReport) -> Vec<String> {
    let known = frequencies(report).filter_map(|frequency| frequency.figures.as_ref().ok());
    known
        .flat_map(|figures| figures.notes.iter().chain(&figures.report.validity.notes))
        .map(|note| format!("besides, on {}: {note}", report.array))
        .collect()
}
