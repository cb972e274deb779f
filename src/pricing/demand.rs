//! What has to be had, part by part.

use std::collections::BTreeMap;

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use crate::catalogue::{Catalogue, PartChoice};
use crate::cutting::CutPiece;
use crate::project::{ExistingThing, Project, Stock};
use crate::takeoff::{Piece, Takeoff};
use crate::units::{Length, Percent};

/// One part that is needed.
pub(super) enum Need {
    /// By count, or by an amount that need not be one length.
    Counted(Counted),
    /// By pieces that must each come out of one length.
    Lengths(Lengths),
}

/// A part needed by count.
pub(super) struct Counted {
    pub(super) part: PartChoice,
    pub(super) roles: Vec<String>,
    pub(super) gross: Decimal,
    pub(super) on_hand: Decimal,
    pub(super) reason: Vec<String>,
}

/// A part needed in pieces.
pub(super) struct Lengths {
    pub(super) part: PartChoice,
    pub(super) roles: Vec<String>,
    pub(super) pieces: Vec<CutPiece>,
    pub(super) on_hand: Vec<(String, Length)>,
    pub(super) waste: Percent,
    pub(super) reason: Vec<String>,
}

/// Whether something of that label or role is in the takeoff.
pub(super) fn is_needed(what: &ExistingThing, takeoff: &Takeoff) -> bool {
    match what {
        ExistingThing::Label(label) => {
            takeoff.items.iter().any(|item| item.label == *label)
                || takeoff.pieces.iter().any(|piece| piece.label == *label)
        }
        ExistingThing::Role(role) => {
            takeoff.items.iter().any(|item| item.role == *role)
                || takeoff.pieces.iter().any(|piece| piece.role.word() == role)
        }
    }
}

/// The label or role as written.
pub(super) fn name(what: &ExistingThing) -> &str {
    match what {
        ExistingThing::Label(name) | ExistingThing::Role(name) => name,
    }
}

/// Gathers items and pieces by part, counted ones first, in part order.
pub(super) fn gather(project: &Project, catalogue: &Catalogue, takeoff: &Takeoff) -> Vec<Need> {
    let mut needs: Vec<Need> = counted(project, catalogue, takeoff).into_iter().map(Need::Counted).collect();
    needs.extend(lengths(project, takeoff).into_iter().map(Need::Lengths));
    needs
}

fn counted(project: &Project, catalogue: &Catalogue, takeoff: &Takeoff) -> Vec<Counted> {
    let mut by_part: BTreeMap<PartChoice, Counted> = BTreeMap::new();
    let mut standing = Standing::new(project);
    for item in &takeoff.items {
        let entry = by_part.entry(item.part.clone()).or_insert_with(|| Counted {
            part: item.part.clone(),
            roles: Vec::new(),
            gross: Decimal::ZERO,
            on_hand: Decimal::ZERO,
            reason: Vec::new(),
        });
        let stands = standing.take(&item.label, &item.role, item.quantity);
        entry.roles.push(item.role.clone());
        entry.gross += item.gross();
        entry.on_hand += stands;
        entry.reason.extend(item.reason.steps.iter().cloned());
        if stands > Decimal::ZERO {
            entry.reason.push(format!("− {} that stand already", stands.normalize()));
        }
    }
    for counted in by_part.values_mut() {
        let stock = counted_stock(project, catalogue, &counted.part);
        let taken = stock.min(counted.gross - counted.on_hand);
        if taken > Decimal::ZERO {
            counted.on_hand += taken;
            counted.reason.push(format!("− {} on hand", taken.normalize()));
        }
    }
    by_part.into_values().collect()
}

/// Counted stock; for a part in metres the sum of its lengths.
fn counted_stock(project: &Project, catalogue: &Catalogue, part: &PartChoice) -> Decimal {
    let PartChoice::Part(id) = part else { return Decimal::ZERO };
    let known = catalogue.parts.contains_key(id);
    let of_part = project.on_hand.iter().filter(|entry| known && entry.part == *id);
    of_part
        .map(|entry| match entry.stock {
            Stock::Count(count) => Decimal::from(count),
            Stock::Length(length) => length.decimal_metres(),
        })
        .sum()
}

/// What stands already and has not been taken into account yet.
struct Standing {
    labels: BTreeMap<String, Decimal>,
    roles: BTreeMap<String, Decimal>,
}

impl Standing {
    fn new(project: &Project) -> Self {
        let (mut labels, mut roles) = (BTreeMap::new(), BTreeMap::new());
        for existing in &project.existing {
            let (map, name) = match &existing.what {
                ExistingThing::Label(label) => (&mut labels, label),
                ExistingThing::Role(role) => (&mut roles, role),
            };
            *map.entry(name.clone()).or_insert(Decimal::ZERO) += existing.quantity;
        }
        Self { labels, roles }
    }

    fn take(&mut self, label: &str, role: &str, wanted: Decimal) -> Decimal {
        let mut taken = Decimal::ZERO;
        for left in [self.labels.get_mut(label), self.roles.get_mut(role)].into_iter().flatten() {
            let now = (*left).min(wanted - taken);
            *left -= now;
            taken += now;
        }
        taken
    }
}

fn lengths(project: &Project, takeoff: &Takeoff) -> Vec<Lengths> {
    let mut by_part: BTreeMap<PartChoice, Vec<&Piece>> = BTreeMap::new();
    let mut standing = Standing::new(project);
    for piece in &takeoff.pieces {
        let stands = standing.take(&piece.label, piece.role.word(), Decimal::ONE);
        let pieces = by_part.entry(piece.part.clone()).or_default();
        if stands < Decimal::ONE {
            pieces.push(piece);
        }
    }
    by_part.into_iter().map(|(part, pieces)| lengths_of(project, part, &pieces)).collect()
}

fn lengths_of(project: &Project, part: PartChoice, pieces: &[&Piece]) -> Lengths {
    let mut roles: Vec<String> = pieces.iter().map(|piece| piece.role.word().to_owned()).collect();
    roles.sort();
    roles.dedup();
    let mut reason: Vec<String> = roles.iter().map(|role| in_words(role, pieces)).collect();
    let waste = roles.iter().filter_map(|role| project.practice.waste.get(role)).max().copied();
    let total: Length = pieces.iter().map(|piece| piece.cut).sum();
    reason.extend(waste.map(|waste| with_waste(total, waste)));
    let on_hand = stock_lengths(project, &part);
    let pieces = pieces
        .iter()
        .map(|piece| CutPiece {
            label: piece.label.clone(),
            cut: piece.cut,
            group: piece.match_group.clone(),
        })
        .collect();
    Lengths { part, roles, pieces, on_hand, waste: waste.unwrap_or_default(), reason }
}

/// What waste given for goods cut from length asks for beside the cut plan, which has its own offcuts.
fn with_waste(total: Length, waste: Percent) -> String {
    let least = total.decimal_metres() * (Decimal::ONE + waste.ratio());
    format!("waste {waste} as given: {} m at least from stock and packs", least.normalize())
}

fn in_words(role: &str, pieces: &[&Piece]) -> String {
    let of_role: Vec<&&Piece> = pieces.iter().filter(|piece| piece.role.word() == role).collect();
    let total: Length = of_role.iter().map(|piece| piece.cut).sum();
    format!("{} {role}, {total} to cut", of_role.len())
}

fn stock_lengths(project: &Project, part: &PartChoice) -> Vec<(String, Length)> {
    let PartChoice::Part(id) = part else { return Vec::new() };
    let mut stock = Vec::new();
    for entry in project.on_hand.iter().filter(|entry| entry.part == *id) {
        match entry.stock {
            Stock::Length(length) => stock.push((entry.note.clone(), length)),
            Stock::Count(count) => {
                let metres = Length::from_mm(1_000) * i64::try_from(count).unwrap_or_default();
                stock.push((entry.note.clone(), metres));
            }
        }
    }
    let named = stock.into_iter().enumerate().map(|(n, (note, length))| {
        let name =
            if note.is_empty() { format!("stock {}", n + 1) } else { format!("stock {} ({note})", n + 1) };
        (name, length)
    });
    named.collect()
}

/// Whole packs that hold `amount`.
pub(super) fn packs_for(amount: Decimal, pack: Decimal) -> u64 {
    if amount <= Decimal::ZERO || pack <= Decimal::ZERO {
        return 0;
    }
    (amount / pack).ceil().to_u64().unwrap_or(u64::MAX)
}
