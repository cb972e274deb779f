//! The cut list: every reel with its pieces from mark to mark.

use std::collections::BTreeSet;

use serde::Serialize;

use super::proof::{self, Group, Proof};
use super::{Input, OptionInput, labels, purchase, show};
use crate::cutting::{Cut, CutReel};
use crate::pricing::PartCutPlan;
use crate::report::drawing::cut_strip::{self, Fill, Strip, StripPiece};
use crate::takeoff::{Piece, PieceRole};
use crate::units::{ElectricalLength, Length};

/// The cut list of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    unplaced: Vec<String>,
    parts: Vec<PartView>,
    groups: Vec<Group>,
    without_reel: Vec<Loose>,
    loss_per_cut: String,
}

#[derive(Debug, Serialize)]
struct PartView {
    part: String,
    description: String,
    reels: Vec<ReelView>,
}

#[derive(Debug, Serialize)]
struct ReelView {
    name: String,
    length: String,
    svg: String,
    rows: Vec<Row>,
    left: String,
    left_is: &'static str,
    has_cables: bool,
    /// The letters of equal groups on this reel; empty without.
    groups: String,
    columns: usize,
    /// The trimmed pieces with their verb: "D1 is", "D1, D2 are"; empty without.
    delays: String,
    sample: String,
    velocity_factor: String,
    proofs: Vec<Proof>,
    has_rough_trim: bool,
    has_free_pieces: bool,
}

#[derive(Debug, Serialize)]
struct Row {
    number: usize,
    label: String,
    near_text: String,
    far_text: String,
    from: String,
    to: String,
    finished: String,
    cut: String,
    group: String,
}

/// A piece whose part is not in the catalogue or has no plan.
#[derive(Debug, Serialize)]
struct Loose {
    label: String,
    role: String,
    part: String,
    finished: String,
    cut: String,
}

/// The view of one option's cut list.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let mut number = 0;
    let parts = option.bill.cut_plans.iter().map(|plan| PartView {
        part: plan.part.clone(),
        description: plan.description.clone(),
        reels: plan
            .plan
            .reels
            .iter()
            .enumerate()
            .map(|(n, reel)| {
                number += 1;
                reel_view(input, option, reel, (n + 1, number))
            })
            .collect(),
    });
    View {
        unplaced: unplaced(option),
        parts: parts.collect(),
        groups: proof::groups(&option.takeoff.pieces),
        without_reel: without_reel(option),
        loss_per_cut: show::metres(input.project.practice.loss_per_cut),
    }
}

/// Pieces that fit nothing that can be bought, in words.
pub(super) fn unplaced(option: &OptionInput<'_>) -> Vec<String> {
    let words = |plan: &PartCutPlan| {
        let part = plan.part.clone();
        let piece = move |piece: &crate::cutting::CutPiece| {
            format!("{}: {} m of {part}", piece.label, show::metres(piece.cut))
        };
        plan.plan.unplaced.iter().map(piece).collect::<Vec<_>>()
    };
    option.bill.cut_plans.iter().flat_map(words).collect()
}

/// Pieces that no plan mentions: their part is missing from the catalogue.
fn without_reel(option: &OptionInput<'_>) -> Vec<Loose> {
    let planned = |piece: &Piece| option.bill.cut_plans.iter().any(|plan| plan.part == piece.part.id());
    let loose = option.takeoff.pieces.iter().filter(|piece| !planned(piece));
    let rows = loose.map(|piece| Loose {
        label: piece.label.clone(),
        role: show::role(piece.role),
        part: piece.part.id().to_owned(),
        finished: show::metres(piece.finished),
        cut: show::metres(piece.cut),
    });
    rows.collect()
}

fn reel_view(
    input: &Input<'_>,
    option: &OptionInput<'_>,
    reel: &CutReel,
    (of_part, of_all): (usize, usize),
) -> ReelView {
    let pieces: Vec<(&Cut, Option<&Piece>)> =
        reel.cuts.iter().map(|cut| (cut, piece_of(option, &cut.label))).collect();
    let known: Vec<&Piece> = pieces.iter().filter_map(|(_, piece)| *piece).collect();
    let (delays, free): (Vec<&Piece>, Vec<&Piece>) =
        known.iter().copied().partition(|piece| is_trimmed(option, piece));
    let has_cables = known.iter().any(|piece| labels::is_cable(piece));
    let groups: BTreeSet<&str> =
        known.iter().map(|p| p.match_group.as_str()).filter(|g| !g.is_empty()).collect();
    let delay_names = show::names(show::sorted(delays.iter().map(|piece| piece.label.as_str())));
    let proofs = proof::proofs(&known);
    let keep = reel.left >= input.project.practice.keep_at_least;
    ReelView {
        name: purchase::reel_name(of_part, reel),
        length: show::metres(reel.length),
        svg: cut_strip::draw(&strip(reel, &pieces, (of_part, of_all))),
        rows: pieces.iter().enumerate().map(|(n, (cut, piece))| row(n + 1, cut, *piece)).collect(),
        left: show::metres(reel.left),
        left_is: if keep { "keep: label it and hang it up" } else { "too short to keep" },
        has_cables,
        columns: 8 + usize::from(has_cables) + usize::from(!groups.is_empty()),
        groups: groups.into_iter().collect::<Vec<_>>().join(", "),
        sample: sample(reel, &free),
        velocity_factor: delays
            .first()
            .and_then(|piece| piece.electrical.as_ref())
            .map(|electrical| show::velocity(electrical.velocity_factor))
            .unwrap_or_default(),
        delays: match delays.len() {
            0 => String::new(),
            1 => format!("{delay_names} is"),
            _ => format!("{delay_names} are"),
        },
        has_rough_trim: proofs.iter().any(|proof| proof.is_rough),
        has_free_pieces: proofs.iter().any(|proof| proof.trim == "–" || proof.tolerance == "–"),
        proofs,
    }
}

/// What the velocity factor of a reel is measured on: a shorter sample reads too coarsely, a longer one has its first dip
/// far below the band.
fn sample(reel: &CutReel, free: &[&Piece]) -> String {
    const LEAST: Length = Length::from_mm(20_000);
    const MOST: Length = Length::from_mm(60_000);
    let long = free.iter().filter(|piece| (LEAST..=MOST).contains(&piece.cut) && piece.role.is_coax());
    match long.min_by_key(|piece| piece.cut) {
        Some(piece) => {
            format!("{} of this reel ({} m), cut before the rest", piece.label, show::metres(piece.cut))
        }
        None if reel.left >= LEAST => "20 m or more of what is left over on this reel".to_owned(),
        None => "a sample of this same reel, 20 m or more".to_owned(),
    }
}

/// A piece that is trimmed to an electrical length: a delay line, or a branch with the delay merged into it.
fn is_trimmed(option: &OptionInput<'_>, piece: &Piece) -> bool {
    let Some((array, line)) = piece.line else { return false };
    let array = option.design.arrays.get(array);
    array.is_some_and(|array| array.plan.feed.line(line).delay > ElectricalLength::ZERO)
}

/// The piece behind a label of the plan; equal pieces may carry a hyphen and a number.
fn piece_of<'a>(option: &OptionInput<'a>, label: &str) -> Option<&'a Piece> {
    let find = |label: &str| option.takeoff.pieces.iter().find(|piece| piece.label == label);
    find(label).or_else(|| find(label.rsplit_once('-')?.0))
}

fn row(number: usize, cut: &Cut, piece: Option<&Piece>) -> Row {
    let text = |from: fn(&Piece) -> (&str, &str)| {
        piece.filter(|piece| labels::is_cable(piece)).map_or_else(String::new, |piece| {
            let (this, far) = from(piece);
            labels::machine_text(piece, this, far)
        })
    };
    Row {
        number,
        label: cut.label.clone(),
        near_text: text(|piece| (&piece.from, &piece.to)),
        far_text: text(|piece| (&piece.to, &piece.from)),
        from: show::metres(cut.from),
        to: show::metres(cut.to),
        finished: piece.map_or_else(|| "–".to_owned(), |piece| show::metres(piece.finished)),
        cut: show::metres(cut.cut),
        group: show::or_dash(piece.map_or("", |piece| &piece.match_group)),
    }
}

fn strip(reel: &CutReel, pieces: &[(&Cut, Option<&Piece>)], (of_part, of_all): (usize, usize)) -> Strip {
    Strip {
        prefix: format!("r{of_all}"),
        name: format!("Reel {of_part} from its free end; the table below gives every mark"),
        length_m: reel.length.metres(),
        pieces: pieces
            .iter()
            .enumerate()
            .map(|(n, (cut, piece))| StripPiece {
                number: n + 1,
                label: cut.label.clone(),
                cut: show::metres(cut.cut),
                from_m: cut.from.metres(),
                to_m: cut.to.metres(),
                mark: show::metres(cut.to),
                fill: piece.map_or(Fill::Plain, |piece| fill(piece.role)),
            })
            .collect(),
        left_m: reel.left.metres(),
        left: show::metres(reel.left),
        length: show::metres(reel.length),
    }
}

const fn fill(role: PieceRole) -> Fill {
    match role {
        PieceRole::Branch | PieceRole::Run => Fill::Rising,
        PieceRole::Delay => Fill::Crossed,
        PieceRole::AntennaWire
        | PieceRole::Main
        | PieceRole::Control
        | PieceRole::Radial
        | PieceRole::BondWire => Fill::Plain,
    }
}
