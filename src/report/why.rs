//! Where a number came from.

use super::OptionResult;
use super::sheet::Sheet;
use crate::pricing::BillLine;
use crate::takeoff::{Item, Piece, PieceElectrical};

/// What the results say of a label, role, part or offer; nothing when none of them has it.
pub fn explain(results: &[OptionResult], label: &str) -> Option<Sheet> {
    let mut sheet = Sheet::default();
    for result in results {
        let before = sheet.answer.len();
        let wanted = |own: &str| own.eq_ignore_ascii_case(label);
        for piece in result.takeoff.pieces.iter().filter(|piece| wanted(&piece.label)) {
            explain_piece(&mut sheet, piece);
        }
        for item in &result.takeoff.items {
            if wanted(&item.label) || wanted(&item.role) {
                explain_item(&mut sheet, item);
            }
        }
        for line in &result.bill.lines {
            if wanted(&line.part) || line.offer.as_deref().is_some_and(wanted) {
                explain_line(&mut sheet, line);
            }
        }
        if sheet.answer.len() > before && !result.design.option.is_empty() {
            sheet.answer.insert(before, format!("{}:", result.design.option));
        }
    }
    (!sheet.answer.is_empty()).then_some(sheet)
}

/// Every label, role and part that can be asked about.
pub fn known(results: &[OptionResult]) -> Vec<String> {
    let mut all: Vec<String> = Vec::new();
    for result in results {
        all.extend(result.takeoff.pieces.iter().map(|piece| piece.label.clone()));
        all.extend(result.takeoff.items.iter().flat_map(|item| [item.label.clone(), item.role.clone()]));
        all.extend(result.bill.lines.iter().map(|line| line.part.clone()));
    }
    all.sort();
    all.dedup();
    all
}

fn explain_piece(sheet: &mut Sheet, piece: &Piece) {
    let serves = if piece.serves.is_empty() { String::new() } else { format!(", {}", piece.serves) };
    sheet.answer.push(format!(
        "{}  {}{serves}, {} to {}: finished {}, cut {}, of {}",
        piece.label,
        piece.role,
        piece.from,
        piece.to,
        piece.finished,
        piece.cut,
        piece.part.id()
    ));
    sheet.answer.extend(piece.reason.steps.iter().map(|step| format!("    {step}")));
    if let Some(electrical) = &piece.electrical {
        sheet.answer.push(format!(
            "    electrical {} = {:.2}° at {}",
            electrical.length,
            electrical.length.degrees(electrical.frequency),
            electrical.frequency
        ));
    }
    if let Some(words) = piece.electrical.as_ref().and_then(PieceElectrical::proof) {
        sheet.answer.push(format!("    right when: {words}"));
    }
    if !piece.match_group.is_empty() {
        sheet.answer.push(format!("    must agree with the other pieces of group {}", piece.match_group));
    }
}

fn explain_item(sheet: &mut Sheet, item: &Item) {
    let places = item.places_in_words();
    let at = if places.is_empty() { String::new() } else { format!(" at {places}") };
    sheet.answer.push(format!(
        "{}  {} {} of {}{at}",
        item.label,
        item.quantity.normalize(),
        item.unit,
        item.part.id()
    ));
    sheet.answer.extend(item.reason.steps.iter().map(|step| format!("    {step}")));
}

fn explain_line(sheet: &mut Sheet, line: &BillLine) {
    let amount = line.amount.map_or_else(|| "unpriced".to_owned(), |amount| amount.to_string());
    sheet.answer.push(format!(
        "{}  {}: needed {} {}, from stock {}, bought {}, left over {}, amount {amount}",
        line.part,
        line.description,
        line.needed.normalize(),
        line.unit,
        line.on_hand.normalize(),
        line.bought.normalize(),
        line.left.normalize(),
    ));
    sheet.answer.extend(line.reason.iter().map(|step| format!("    {step}")));
}
