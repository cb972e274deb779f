//! What is needed, for people.

use super::OptionResult;
use super::sheet::{Sheet, Table};
use crate::takeoff::{Piece, PieceRole};
use crate::units::Length;

/// The parts of every option: an answer line, the items, the pieces.
pub fn sheet(results: &[OptionResult]) -> Sheet {
    let mut sheet = Sheet::default();
    for result in results {
        sheet.answer.push(answer(result));
        sheet.tables.push(items(result));
        sheet.tables.push(pieces(result));
    }
    sheet
        .notes
        .push("quantities are net; waste and spares stand beside them, and are bought as well".to_owned());
    sheet.notes.push("`why FILE LABEL` shows how a quantity or length came about, step by step".to_owned());
    sheet
}

fn answer(result: &OptionResult) -> String {
    let elements = result.design.arrays.iter().map(|array| array.plan.layout.elements.len()).sum::<usize>();
    let plural = |n: usize| if n == 1 { "" } else { "s" };
    let wire = cut_of(result, PieceRole::AntennaWire);
    let wire = if wire == Length::ZERO { String::new() } else { format!("{wire} of antenna wire, ") };
    let pieces = result.takeoff.pieces.iter().filter(|piece| piece.role.is_coax()).count();
    format!(
        "{} needs {} of coax in {pieces} piece{}, {wire}{} of radial and bonding wire for {elements} element{}",
        result.name(),
        coax_cut(result),
        plural(pieces),
        cut_of(result, PieceRole::Radial) + cut_of(result, PieceRole::BondWire),
        plural(elements),
    )
}

/// Coax to cut, all roles.
pub fn coax_cut(result: &OptionResult) -> Length {
    result.takeoff.pieces.iter().filter(|piece| piece.role.is_coax()).map(|piece| piece.cut).sum()
}

/// Length to cut of one piece role.
pub fn cut_of(result: &OptionResult, role: PieceRole) -> Length {
    result.takeoff.pieces_of(role).map(|piece| piece.cut).sum()
}

fn titled(result: &OptionResult, what: &str) -> String {
    if result.design.option.is_empty() {
        what.to_owned()
    } else {
        format!("{}: {what}", result.design.option)
    }
}

fn items(result: &OptionResult) -> Table {
    let heads = ["role", "part", "#net", "#waste", "#spare", "unit", "where", "reason"];
    let mut table = Table::new(titled(result, "items"), &heads);
    for item in &result.takeoff.items {
        table.rows.push(vec![
            item.role.clone(),
            item.part.id().to_owned(),
            item.quantity.normalize().to_string(),
            blank_zero(item.waste),
            blank_zero(item.spare),
            item.unit.clone(),
            shortened(&item.places_in_words()),
            item.reason.to_string(),
        ]);
    }
    table
}

fn blank_zero(value: rust_decimal::Decimal) -> String {
    if value.is_zero() { String::new() } else { value.normalize().to_string() }
}

/// A long list of places ends in dots; the sheets and the JSON have it whole.
fn shortened(words: &str) -> String {
    const LONGEST: usize = 40;
    if words.chars().count() <= LONGEST {
        return words.to_owned();
    }
    words.chars().take(LONGEST - 1).chain(['…']).collect()
}

/// Pieces that are the same but for their label stand on one line.
fn pieces(result: &OptionResult) -> Table {
    let heads = [
        "piece",
        "role",
        "part",
        "from",
        "to",
        "#straight m",
        "#routed m",
        "#finished m",
        "#cut m",
        "group",
        "reason",
    ];
    let mut table = Table::new(titled(result, "pieces"), &heads);
    let mut rest: Vec<&Piece> = result.takeoff.pieces.iter().collect();
    rest.sort_by_key(|piece| piece.role);
    let mut previous: Option<(String, usize)> = None;
    for piece in rest {
        let shared = format!("{}{}{}{:?}", piece.role, piece.part.id(), piece.reason, piece.cut);
        if piece.role == PieceRole::Radial {
            if let Some((key, row)) = &previous
                && *key == shared
            {
                let cells: &mut Vec<String> = &mut table.rows[*row];
                cells[0] =
                    format!("{} to {}", cells[0].split(" to ").next().unwrap_or_default(), piece.label);
                continue;
            }
            previous = Some((shared, table.rows.len()));
        }
        table.rows.push(row(piece));
    }
    table
}

fn row(piece: &Piece) -> Vec<String> {
    let bare = |length: Option<Length>| length.map_or_else(String::new, in_metres);
    vec![
        piece.label.clone(),
        piece.role.word().to_owned(),
        piece.part.id().to_owned(),
        piece.from.clone(),
        piece.to.clone(),
        bare(piece.straight),
        bare(piece.routed),
        in_metres(piece.finished),
        in_metres(piece.cut),
        piece.match_group.clone(),
        piece.reason.to_string(),
    ]
}

/// Metres without the unit, for columns whose head has it.
pub fn in_metres(length: Length) -> String {
    length.to_string().trim_end_matches(" m").to_owned()
}
