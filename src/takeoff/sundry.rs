//! Small things that get forgotten: sealing of joints, labels, markers, staples.

use rust_decimal::Decimal;

use super::Scene;
use super::model::{Piece, PieceRole};
use super::tally::{Tally, Want};
use crate::units::Length;

/// One marker flag for so much cable on the ground (common practice, no source).
const MARKER_EACH: Length = Length::from_mm(10_000);
/// One staple or peg for so much coax on grass (common practice, no source).
const COAX_STAPLE_EACH: Length = Length::from_mm(1_500);
/// One staple for so much radial on turf (common practice, no source).
const RADIAL_STAPLE_EACH: Length = Length::from_mm(500);

/// Counts from the pieces taken off so far.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>) {
    seal_joints(tally);
    label_cables(tally);
    let surface = scene.project.practice.burial_depth == Length::ZERO;
    let laid: Vec<Piece> = tally.pieces().iter().filter(|piece| is_laid(piece)).cloned().collect();
    for piece in &laid {
        let routed = piece.routed.unwrap_or_default();
        let marks = routed.steps_of(MARKER_EACH);
        tally.add("marker", &Want::any(), "", marks, "one for each 10 m of cable route");
        if surface {
            let staples = routed.steps_of(COAX_STAPLE_EACH);
            tally.add("consumable", &kind("peg"), "", staples, "one for each 1.5 m of cable on the surface");
        }
    }
    let radials: Vec<Length> =
        tally.pieces().iter().filter(|p| p.role == PieceRole::Radial).map(|p| p.cut).collect();
    for length in radials {
        let staples = length.steps_of(RADIAL_STAPLE_EACH);
        tally.add("consumable", &kind("staple"), "", staples, "one for each 0.5 m of radial");
    }
}

fn kind(kind: &str) -> Want {
    Want::any().with("kind", kind)
}

/// Lines that lie on the ground by themselves; control cable lies with the main.
fn is_laid(piece: &Piece) -> bool {
    match piece.role {
        PieceRole::Branch | PieceRole::Run | PieceRole::Main => true,
        PieceRole::AntennaWire
        | PieceRole::Delay
        | PieceRole::Control
        | PieceRole::Radial
        | PieceRole::BondWire => false,
    }
}

/// Every plug mated outdoors is sealed.
fn seal_joints(tally: &mut Tally<'_>) {
    let coax: Vec<(String, String)> = tally
        .pieces()
        .iter()
        .filter(|piece| piece.role.is_coax())
        .map(|piece| (piece.from.clone(), piece.to.clone()))
        .collect();
    for place in coax.into_iter().flat_map(|(from, to)| [from, to]).filter(|place| place != "RX") {
        let why = "seals a plug mated outdoors";
        tally.add("consumable", &kind("sealing-tape"), &place, Decimal::new(25, 2), why);
        tally.add("consumable", &kind("cover-tape"), &place, Decimal::new(4, 1), why);
        tally.add("consumable", &kind("uv-tie"), &place, 1, why);
    }
}

fn label_cables(tally: &mut Tally<'_>) {
    let cables = tally.pieces().iter().filter(|p| p.role.is_coax() || p.role == PieceRole::Control).count();
    let boxes = tally.count("feed-box") + tally.count("termination-box") + tally.count("hub-box");
    tally.add(
        "consumable",
        &kind("label"),
        "",
        Decimal::from(2 * cables),
        "two labels a cable, one at each end",
    );
    tally.add("consumable", &kind("label"), "", boxes, "one label a box");
    tally.add("consumable", &kind("label"), "", 1, "one label for the entry panel");
}
