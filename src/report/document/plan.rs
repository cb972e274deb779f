//! The site plan with its distances in words.

use serde::Serialize;

use super::{Input, OptionInput, show};
use crate::plan::SitePosition;
use crate::report::drawing::site_plan::{self, ControlCable};
use crate::takeoff::PieceRole;

/// The plan of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    /// SVG of our own making; every text in it is escaped.
    svg: String,
    beams: Vec<Beam>,
    lines: Vec<LineRow>,
    has_compass: bool,
}

#[derive(Debug, Serialize)]
struct Beam {
    array: String,
    bearing: String,
    compass: String,
}

#[derive(Debug, Serialize)]
struct LineRow {
    label: String,
    what: String,
    from: String,
    to: String,
    straight: String,
    routed: String,
    finished: String,
    bearing: String,
    compass: String,
}

/// The view of one option's plan.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let control = match option.takeoff.pieces_of(PieceRole::Control).next() {
        Some(_) => ControlCable::Laid,
        None => ControlCable::Absent,
    };
    View {
        svg: site_plan::draw(input.project, option.design, control),
        beams: beams(input, option),
        lines: lines(input, option),
        has_compass: input.project.site.declination.is_some(),
    }
}

fn beams(input: &Input<'_>, option: &OptionInput<'_>) -> Vec<Beam> {
    let mut rows = Vec::new();
    for array in &option.design.arrays {
        for state in &array.plan.feed.switch.states {
            rows.push(Beam {
                array: array.spec.name.clone(),
                bearing: show::degrees(state.bearing),
                compass: show::compass(state.bearing, input.project.site.declination).unwrap_or_default(),
            });
        }
    }
    rows
}

/// Every line that is laid, with the bearing to walk from its element's end.
fn lines(input: &Input<'_>, option: &OptionInput<'_>) -> Vec<LineRow> {
    let declination = input.project.site.declination;
    let mut rows = Vec::new();
    for piece in &option.takeoff.pieces {
        let laid = match piece.role {
            PieceRole::AntennaWire
            | PieceRole::Branch
            | PieceRole::Run
            | PieceRole::Main
            | PieceRole::Control => true,
            PieceRole::Delay | PieceRole::Radial | PieceRole::BondWire => false,
        };
        let ends = place(option, &piece.from).zip(place(option, &piece.to));
        let (true, Some((from, to))) = (laid, ends) else { continue };
        let bearing = (from.distance_m(to) >= 0.005).then(|| from.bearing_to(to));
        rows.push(LineRow {
            label: piece.label.clone(),
            what: show::role(piece.role),
            from: piece.from.clone(),
            to: piece.to.clone(),
            straight: piece.straight.map(show::metres).unwrap_or_default(),
            routed: piece.routed.map(show::metres).unwrap_or_default(),
            finished: show::metres(piece.finished),
            bearing: bearing.map_or_else(|| "–".to_owned(), show::degrees),
            compass: bearing
                .map_or_else(|| Some("–".to_owned()), |at| show::compass(at, declination))
                .unwrap_or_default(),
        });
    }
    rows
}

/// Where a named point stands.
fn place(option: &OptionInput<'_>, name: &str) -> Option<SitePosition> {
    let mut points = option.design.arrays.iter().flat_map(|array| &array.plan.layout.points);
    points.find(|point| point.name == name).map(|point| point.site)
}
