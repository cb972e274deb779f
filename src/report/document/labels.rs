//! Label strips: two a cable, one a box.

use serde::Serialize;

use super::{Input, OptionInput, show};
use crate::plan::{Fixture, Point};
use crate::report::drawing::label_sheet::{self, LabelKind, LabelStrip, PER_SHEET};
use crate::takeoff::{Piece, PieceRole};

/// The labels of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    sheets: Vec<LabelPage>,
    rows: Vec<Row>,
    count: usize,
}

#[derive(Debug, Serialize)]
struct LabelPage {
    number: usize,
    svg: String,
}

#[derive(Debug, Serialize)]
struct Row {
    place: String,
    text: String,
    words: String,
}

/// Longest machine text that any label printer takes.
const LONGEST: usize = 24;

/// The view of one option's labels.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let strips = strips(input, option);
    let pages = strips.chunks(PER_SHEET).enumerate().map(|(n, chunk)| {
        let name = format!("label sheet {}; the table under it has every text", n + 1);
        LabelPage { number: n + 1, svg: label_sheet::draw(chunk, &name, &format!("lb{}", n + 1)) }
    });
    View {
        sheets: pages.collect(),
        count: strips.len(),
        rows: strips
            .iter()
            .map(|strip| Row {
                place: strip.id.clone(),
                text: match strip.kind {
                    LabelKind::Cable => strip.text.clone(),
                    LabelKind::FeedBox | LabelKind::Termination | LabelKind::Hub | LabelKind::Station => {
                        format!("{} {}", strip.id, strip.first)
                    }
                },
                words: format!("{}, {}", strip.first, strip.second),
            })
            .collect(),
    }
}

fn strips(input: &Input<'_>, option: &OptionInput<'_>) -> Vec<LabelStrip> {
    let mut strips = Vec::new();
    for piece in option.takeoff.pieces.iter().filter(|piece| is_cable(piece)) {
        for (this, far) in [(&piece.from, &piece.to), (&piece.to, &piece.from)] {
            strips.push(LabelStrip {
                id: piece.label.clone(),
                first: if this == far { format!("both ends {this}") } else { format!("this end {this}") },
                second: if this == far { format!("leg: {}", leg(piece)) } else { format!("far end {far}") },
                text: machine_text(piece, this, far),
                foot: format!("wrap this round · {} · {}", piece.label, input.hash),
                more: String::new(),
                kind: LabelKind::Cable,
            });
        }
    }
    let mut seen: Vec<&str> = Vec::new();
    for point in option.design.arrays.iter().flat_map(|array| &array.plan.layout.points) {
        if seen.contains(&point.name.as_str()) {
            continue;
        }
        seen.push(&point.name);
        if let Some((kind, words)) = box_at(point) {
            strips.push(LabelStrip {
                id: point.name.clone(),
                first: words.to_owned(),
                second: format!("hash {}", input.hash),
                text: "Receive antenna, low level.".to_owned(),
                more: "Do not cut, do not drive over.".to_owned(),
                foot: "call: ______________________".to_owned(),
                kind,
            });
        }
    }
    strips
}

/// Cables carry a label at each end; wires and radials do not.
pub(super) fn is_cable(piece: &Piece) -> bool {
    piece.role.is_coax() || piece.role == PieceRole::Control
}

fn box_at(point: &Point) -> Option<(LabelKind, &'static str)> {
    point.fixtures.iter().find_map(|fixture| match fixture {
        Fixture::WireFeedBox => Some((LabelKind::FeedBox, "FEED BOX")),
        Fixture::Mast(_) => Some((LabelKind::FeedBox, "VERTICAL")),
        Fixture::TerminationBox => Some((LabelKind::Termination, "TERMINATION")),
        Fixture::HubBox(_) => Some((LabelKind::Hub, "HUB BOX")),
        Fixture::StationEntry => Some((LabelKind::Station, "ENTRY PANEL")),
        Fixture::WireEnd(_) | Fixture::WirePost(_) | Fixture::Earth(_) => None,
    })
}

/// The leg that a delay line belongs to: "rear" of "rear of group 1 from the left".
fn leg(piece: &Piece) -> &str {
    piece.serves.split(" of ").next().unwrap_or_default()
}

/// "B2 W1-F>H1 68.70 A", for a delay at its hub "D1 H1 rear 14.106": id, this end, far end, finished metres, match group; plain ASCII.
pub(super) fn machine_text(piece: &Piece, this: &str, far: &str) -> String {
    let finished = show::metres(piece.finished);
    let way = if this == far { format!("{this} {}", leg(piece)) } else { format!("{this}>{far}") };
    let full = format!("{} {way} {finished} {}", piece.label, piece.match_group);
    let ends = format!("{} {way}", piece.label);
    let plain = |text: &str| -> String {
        text.trim().chars().map(|c| if c.is_ascii_graphic() || c == ' ' { c } else { '?' }).collect()
    };
    let full = plain(&full);
    if full.len() <= LONGEST { full } else { plain(&ends).chars().take(LONGEST).collect() }
}
