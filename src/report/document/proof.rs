//! How a coax piece is proved right before its second plug is fitted, and which pieces must be equal.

use std::collections::BTreeMap;

use serde::Serialize;

use super::show;
use crate::reception::{Trim, TrimBasis};
use crate::takeoff::{Piece, PieceElectrical};
use crate::units::{Frequency, Length};

/// What one piece must measure.
#[derive(Debug, Serialize)]
pub(super) struct Proof {
    label: String,
    group: String,
    electrical: String,
    degrees: String,
    velocity_factor: String,
    /// First resistance dip, far end open; a dash where nothing was computed.
    pub(super) trim: String,
    shorted: String,
    /// Whether the velocity factor at the test frequency is only assumed.
    pub(super) is_rough: bool,
    /// Largest error, in metres and where a dip is known in kilohertz; a dash where nothing was computed.
    pub(super) tolerance: String,
}

/// Pieces that must agree.
#[derive(Debug, Serialize)]
pub(super) struct Group {
    letter: String,
    part: String,
    members: Vec<Member>,
    reasons: Vec<String>,
}

#[derive(Debug, Serialize)]
struct Member {
    label: String,
    serves: String,
    finished: String,
    coiled: String,
}

/// The proofs of the coax pieces among `pieces`.
pub(super) fn proofs(pieces: &[&Piece]) -> Vec<Proof> {
    pieces.iter().filter_map(|piece| piece.electrical.as_ref().map(|e| proof(piece, e))).collect()
}

fn proof(piece: &Piece, electrical: &PieceElectrical) -> Proof {
    let dip = |of: fn(Trim) -> Frequency| {
        electrical.trim.map_or_else(|| "–".to_owned(), |trim| format!("{:.3}", of(trim).mhz()))
    };
    Proof {
        label: piece.label.clone(),
        group: show::or_dash(&piece.match_group),
        electrical: format!("{:.3}", electrical.length.metres()),
        degrees: format!("{:.1}", electrical.length.degrees(electrical.frequency)),
        velocity_factor: show::velocity(electrical.velocity_factor),
        trim: dip(|trim| trim.open),
        shorted: dip(|trim| trim.shorted),
        is_rough: electrical.trim.is_some_and(|trim| trim.basis == TrimBasis::OneNumber),
        tolerance: electrical.tolerance.map_or_else(|| "–".to_owned(), |t| tolerance(piece, electrical, t)),
    }
}

/// "± 0.07 m, ± 22 kHz": a piece that is longer by a share has its dip lower by the same share.
fn tolerance(piece: &Piece, electrical: &PieceElectrical, length: Length) -> String {
    let metres = format!("± {} m", show::metres(length));
    match electrical.trim {
        Some(trim) if piece.finished > Length::ZERO => {
            let khz = trim.open.mhz() * 1_000.0 * length.metres() / piece.finished.metres();
            format!("{metres}, ± {khz:.1} kHz")
        }
        Some(_) | None => metres,
    }
}

/// The groups of equal pieces in order of their letters.
pub(super) fn groups(pieces: &[Piece]) -> Vec<Group> {
    let mut found: BTreeMap<(usize, &str, &str), Vec<&Piece>> = BTreeMap::new();
    for piece in pieces.iter().filter(|piece| !piece.match_group.is_empty()) {
        let letter = piece.match_group.as_str();
        found.entry((letter.len(), letter, piece.role.word())).or_default().push(piece);
    }
    let groups = found.into_iter().filter(|(_, members)| members.len() > 1);
    groups
        .map(|((_, letter, role), members)| Group {
            letter: letter.to_owned(),
            part: format!("{}, {}", role.replace('-', " "), members[0].part.id()),
            reasons: reasons(&members),
            members: members.into_iter().map(member).collect(),
        })
        .collect()
}

fn member(piece: &Piece) -> Member {
    Member {
        label: piece.label.clone(),
        serves: show::or_dash(&piece.serves),
        finished: show::metres(piece.finished),
        coiled: piece.coiled.map_or_else(|| "–".to_owned(), show::metres),
    }
}

/// The arithmetic behind the members, each way of getting there once.
fn reasons(members: &[&Piece]) -> Vec<String> {
    let mut lines: Vec<(String, Vec<&str>)> = Vec::new();
    for piece in members {
        let reason = piece.reason.to_string();
        match lines.iter_mut().find(|(known, _)| *known == reason) {
            Some((_, labels)) => labels.push(&piece.label),
            None => lines.push((reason, vec![&piece.label])),
        }
    }
    lines.into_iter().map(|(reason, labels)| format!("{}: {reason}", show::names(labels))).collect()
}
