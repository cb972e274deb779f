//! Coax lines: pieces, plugs, barrels, chokes.

use super::model::{Piece, PieceElectrical, PieceRole, Reason};
use super::tally::{Tally, Want};
use super::{ArrayDesign, Scene};
use crate::plan::{CablePart, Connection, Line, LineId, LineRole, chokes_on};

/// Every line of the feed tree is one piece with two plugs.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>, index: usize, array: &ArrayDesign) {
    for (n, line) in array.plan.feed.lines.iter().enumerate() {
        let cable = array.cables.of(line.role);
        let piece = piece(scene, array, index, LineId(n));
        add_plugs(tally, array, line, cable);
        add_chokes(tally, array, line);
        if line.connection == Connection::InLine {
            add_barrel(tally, array, line, cable);
        }
        tally.push(piece);
    }
}

/// The piece role of a line.
pub(super) const fn piece_role(role: LineRole) -> PieceRole {
    match role {
        LineRole::Branch => PieceRole::Branch,
        LineRole::Run => PieceRole::Run,
        LineRole::Delay => PieceRole::Delay,
        LineRole::Main => PieceRole::Main,
    }
}

fn piece(scene: &Scene<'_>, array: &ArrayDesign, index: usize, id: LineId) -> Piece {
    let (line, length) = (array.plan.feed.line(id), &array.lengths[id.0]);
    let layout = &array.plan.layout;
    let laid = line.role != LineRole::Delay;
    let grouped = laid && !line.match_group.is_empty();
    let name = |id| layout.point(id).name.clone();
    Piece {
        label: line.label.clone(),
        role: piece_role(line.role),
        part: array.cables.of(line.role).part.clone(),
        from: name(line.termini.from),
        to: name(line.termini.to),
        straight: laid.then_some(length.straight),
        routed: laid.then_some(length.routed),
        finished: length.finished,
        cut: length.cut,
        coiled: grouped.then_some(length.coiled),
        match_group: line.match_group.clone(),
        conductors: None,
        electrical: Some(electrical(scene, array, id)),
        serves: line.serves.clone(),
        line: Some((index, id)),
        reason: Reason::steps(length.steps.clone()),
    }
}

fn electrical(scene: &Scene<'_>, array: &ArrayDesign, id: LineId) -> PieceElectrical {
    let line = array.plan.feed.line(id);
    let cable = array.cables.of(line.role);
    PieceElectrical {
        length: array.lengths[id.0].electrical(line, cable.velocity),
        velocity_factor: cable.velocity,
        frequency: scene.project.frequency,
        trim: array.trims[id.0],
        tolerance: array.tolerances[id.0],
    }
}

fn connector(cable: &CablePart) -> Want {
    cable.series.iter().fold(family(cable, "plug"), |want, series| want.with("series", series.clone()))
}

/// The connector family of a cable, as the attribute `key`.
fn family(cable: &CablePart, key: &'static str) -> Want {
    cable.plug.iter().fold(Want::any(), |want, plug| want.with(key, plug.clone()))
}

fn impedance(cable: &CablePart) -> Want {
    let z0 = cable.data.as_ref().and_then(|data| data.z0_ohm);
    z0.iter().fold(Want::any(), |want, z0| want.with("z_ohm", z0.normalize().to_string()))
}

fn add_plugs(tally: &mut Tally<'_>, array: &ArrayDesign, line: &Line, cable: &CablePart) {
    let layout = &array.plan.layout;
    for end in [line.termini.from, line.termini.to] {
        let place = &layout.point(end).name;
        tally.add("plug", &connector(cable), place, 1, "a plug at each end of a coax piece");
    }
}

fn add_barrel(tally: &mut Tally<'_>, array: &ArrayDesign, line: &Line, cable: &CablePart) {
    let place = &array.plan.layout.point(line.termini.from).name;
    let leg = array.cables.of(LineRole::Branch);
    if leg.plug == cable.plug || leg.plug.is_none() || cable.plug.is_none() {
        tally.add("barrel", &family(cable, "plug"), place, 1, "joins a delay line to its leg, in line");
    } else {
        let want = cable.plug.iter().fold(family(leg, "from"), |want, plug| want.with("to", plug.clone()));
        tally.add("adaptor", &want, place, 1, "joins a delay line to a leg of another connector family");
    }
}

fn add_chokes(tally: &mut Tally<'_>, array: &ArrayDesign, line: &Line) {
    let layout = &array.plan.layout;
    let name = |id| &layout.point(id).name;
    let want = impedance(array.cables.of(line.role));
    let one = |tally: &mut Tally<'_>, place: &str, why: &str| {
        tally.add("choke", &want, place, 1, why);
    };
    match chokes_on(line.role) {
        0 => {}
        1 if line.role == LineRole::Branch => {
            one(tally, name(line.termini.from), "common-mode choke of a branch, in the element box");
        }
        1 => one(tally, name(line.termini.from), "common-mode choke of a run"),
        _ => {
            one(tally, name(line.termini.from), "common-mode choke at the field end of a main line");
            one(tally, name(line.termini.to), "common-mode choke at the entry panel");
        }
    }
}
