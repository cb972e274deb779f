//! The pattern report of one array: every direction at every frequency.

use num_complex::Complex64;

use super::element::{self, Ends};
use super::noise::{self, Noise, NoiseSite};
use super::weight::{LineFigures, built, designed, line_figures};
use crate::plan::{ArrayPlan, Cables, ElementKind, Layout, LineLength, State};
use crate::radio::{self, DelayCurve, ErrorSize, PatternReport, RadioElement, RadioError, Response, Soil};
use crate::units::{Angle, Bearing, Frequency};

/// What a report is made of: the array as planned, and the land.
#[derive(Clone, Copy, Debug)]
pub struct Subject<'a> {
    /// The array.
    pub plan: &'a ArrayPlan,
    /// The lengths of its lines.
    pub lengths: &'a [LineLength],
    /// The cables of its lines.
    pub cables: &'a Cables,
    /// The ground constants.
    pub soil: Soil,
    /// How the far ends of wires are taken.
    pub ends: Ends,
    /// Whether the weights are as designed or as built.
    pub weighting: Weighting,
    /// External noise and the receiver.
    pub noise: &'a NoiseSite,
}

/// Which weights are used.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Weighting {
    /// As designed: nothing lost.
    Ideal,
    /// Those that the parts on the list produce.
    Built,
}

/// The report of one array.
#[derive(Clone, Debug)]
pub struct ArrayReport {
    /// The array's name.
    pub array: String,
    /// One a direction.
    pub directions: Vec<DirectionReport>,
}

impl ArrayReport {
    /// The figures of the first direction at one frequency, where they can be computed.
    pub fn first_figures(&self, frequency: Frequency) -> Option<&Figures> {
        let direction = self.directions.first()?;
        direction.frequencies.iter().find(|report| report.frequency == frequency)?.figures.as_ref().ok()
    }
}

/// The report of one direction.
#[derive(Clone, Debug)]
pub struct DirectionReport {
    /// Where it listens.
    pub bearing: Bearing,
    /// One a frequency.
    pub frequencies: Vec<FrequencyReport>,
}

/// The report of one direction at one frequency.
#[derive(Clone, Debug)]
pub struct FrequencyReport {
    /// The frequency.
    pub frequency: Frequency,
    /// The elements' names, in the order of the weights.
    pub names: Vec<String>,
    /// The weights used.
    pub weights: Vec<Complex64>,
    /// The figures, or why there are none.
    pub figures: Result<Figures, RadioError>,
}

/// The figures of one direction at one frequency.
#[derive(Clone, Debug)]
pub struct Figures {
    /// Directivity, bounds, spread, validity.
    pub report: PatternReport,
    /// The noise budget, where it can be made.
    pub noise: Option<Noise>,
    /// Round the horizon at the take-off elevation, clockwise from the wanted direction, every 2°.
    pub azimuth: Vec<radio::CutPoint>,
    /// From the horizon ahead over the zenith to the horizon behind, every degree.
    pub elevation: Vec<radio::CutPoint>,
    /// What to know of a line: no loss figure.
    pub notes: Vec<String>,
}

/// Reports on an array at some frequencies.
pub fn report(subject: &Subject<'_>, frequencies: &[Frequency]) -> ArrayReport {
    let directions = subject
        .plan
        .feed
        .switch
        .states
        .iter()
        .map(|state| DirectionReport {
            bearing: state.bearing,
            frequencies: frequencies
                .iter()
                .map(|frequency| at_frequency(subject, state, *frequency))
                .collect(),
        })
        .collect();
    ArrayReport { array: subject.plan.name.clone(), directions }
}

/// The elements as seen in the direction of a state: verticals are turned, wires look along the heading.
pub fn seen_from(subject: &Subject<'_>, state: &State) -> Vec<RadioElement> {
    let elements = element::elements(&subject.plan.layout, subject.ends);
    let all_verticals =
        subject.plan.layout.elements.iter().all(|element| matches!(element.kind, ElementKind::Vertical(_)));
    let turn = state.bearing.degrees() - subject.plan.layout.heading.degrees();
    if all_verticals && turn.abs() > 1e-9 {
        radio::turned_to(&elements, Angle::from_degrees(turn))
    } else {
        elements
    }
}

/// Loss and electrical length of the subject's lines at one frequency.
fn lines_of(subject: &Subject<'_>, frequency: Frequency) -> Vec<LineFigures> {
    line_figures(&subject.plan.feed, subject.lengths, subject.cables, frequency)
}

/// The weights of the elements in a state, as designed or as built.
pub fn weights(subject: &Subject<'_>, state: &State, frequency: Frequency) -> Vec<Complex64> {
    weights_through(subject, state, frequency, &lines_of(subject, frequency))
}

fn weights_through(
    subject: &Subject<'_>,
    state: &State,
    frequency: Frequency,
    lines: &[LineFigures],
) -> Vec<Complex64> {
    match subject.weighting {
        Weighting::Ideal => designed(subject.plan, frequency),
        Weighting::Built => built(&subject.plan.feed, lines, state, frequency),
    }
}

fn at_frequency(subject: &Subject<'_>, state: &State, frequency: Frequency) -> FrequencyReport {
    let elements = seen_from(subject, state);
    let lines = lines_of(subject, frequency);
    let weights = weights_through(subject, state, frequency, &lines);
    let names = subject.plan.layout.elements.iter().map(|element| element.name.clone()).collect();
    let figures = figures(subject, elements, &weights, &lines, frequency);
    FrequencyReport { frequency, names, weights, figures }
}

fn figures(
    subject: &Subject<'_>,
    elements: Vec<RadioElement>,
    weights: &[Complex64],
    lines: &[LineFigures],
    frequency: Frequency,
) -> Result<Figures, RadioError> {
    let response = Response::new(&elements, subject.soil, frequency)?;
    response.check_weights(weights)?;
    let array = radio::Array { elements, weights: weights.to_vec() };
    let report = radio::report_of(&response, &array, &ErrorSize::default());
    let peak = report.directivity.peak_elevation_deg;
    let notes = match subject.weighting {
        Weighting::Ideal => Vec::new(),
        Weighting::Built => lossless_notes(subject, lines, frequency),
    };
    Ok(Figures {
        azimuth: radio::azimuth_cut(&response, weights, peak, 2.0),
        elevation: radio::elevation_cut(&response, weights, 1.0),
        noise: noise::budget(subject, &response, weights, lines, frequency),
        report,
        notes,
    })
}

/// A cable without a loss figure at this frequency is taken as lossless, and said to be.
fn lossless_notes(subject: &Subject<'_>, lines: &[LineFigures], frequency: Frequency) -> Vec<String> {
    let silent = subject.plan.feed.lines.iter().zip(lines).filter(|(_, figures)| figures.loss_db.is_none());
    let mut parts: Vec<&str> = silent.map(|(line, _)| subject.cables.of(line.role).part.id()).collect();
    parts.sort_unstable();
    parts.dedup();
    let note = |part: &str| {
        format!("no loss figure for `{part}` at {frequency}: taken as lossless, measured value needed")
    };
    parts.into_iter().map(note).collect()
}

/// The delay curve of an array over ratios of 0.4 to 1.0, with the weights as designed; `weights_at` gives them for a ratio.
///
/// # Errors
/// When the array cannot be computed.
pub fn delay_curve(
    layout: &Layout,
    soil: Soil,
    ends: Ends,
    frequency: Frequency,
    weights_at: impl Fn(f64) -> Vec<Complex64>,
) -> Result<DelayCurve, RadioError> {
    let response = Response::new(&element::elements(layout, ends), soil, frequency)?;
    Ok(radio::delay_curve(&response, weights_at))
}

/// The noise budgets alone, first direction, at the frequencies where one can be made.
pub fn report_noise(subject: &Subject<'_>, frequencies: &[Frequency]) -> Vec<(Frequency, Noise)> {
    let Some(state) = subject.plan.feed.switch.states.first() else { return Vec::new() };
    let elements = seen_from(subject, state);
    frequencies
        .iter()
        .filter_map(|frequency| {
            let response = Response::new(&elements, subject.soil, *frequency).ok()?;
            let lines = lines_of(subject, *frequency);
            let weights = weights_through(subject, state, *frequency, &lines);
            response.check_weights(&weights).ok()?;
            Some((*frequency, noise::budget(subject, &response, &weights, &lines, *frequency)?))
        })
        .collect()
}
