//! Buying what is cut from lengths: a cut plan decides what to buy.

use std::collections::BTreeMap;

use rust_decimal::Decimal;

use super::code;
use super::demand::{Lengths, packs_for};
use super::model::{Bill, PartCutPlan, Unpriced};
use super::offer::{Kind, Market, Priced, blank_line, fill_line, unit_price, unpriced};
use crate::catalogue::{Part, Unit};
use crate::cutting::{self, CutJob, CutPlan, ReelSource, StockLength};
use crate::problem::{Problem, Problems};
use crate::units::Length;

/// Buys a part that is cut into pieces, and keeps its cut plan.
pub(super) fn buy_lengths(bill: &mut Bill, market: &Market<'_>, need: &Lengths, problems: &mut Problems) {
    let total: Length = need.pieces.iter().map(|piece| piece.cut).sum();
    let Some(part) = market.part(&need.part) else {
        bill.unpriced.push(Unpriced {
            part: need.part.id().to_owned(),
            quantity: total.decimal_metres(),
            unit: "m".to_owned(),
            why: "the catalogue has no part for this".to_owned(),
        });
        return;
    };
    if need.pieces.is_empty() {
        return;
    }
    let offers = market.offers(part, problems);
    let plan = planned(market, need, part, &offers);
    if !plan.unplaced.is_empty() && offers.iter().any(|priced| priced.price.is_some()) {
        problems.push(too_long(part, &plan, &offers));
    }
    add_lines(bill, market, need, part, &offers, &plan, total);
    for group in &plan.split_groups {
        bill.hints.push(format!(
            "group {group} of `{}` does not fit on one length: its pieces come from several, so compare them with each other before use",
            part.id
        ));
    }
    hint_cheaper(bill, market, part);
    bill.cut_plans.push(PartCutPlan { part: part.id.clone(), description: part.description.clone(), plan });
}

/// Names a part of the same role and impedance that costs less a metre; never takes it, for lengths would change with it.
fn hint_cheaper(bill: &mut Bill, market: &Market<'_>, part: &Part) {
    let z0 = |part: &Part| market.catalogue.cables.get(&part.id).and_then(|cable| cable.z0_ohm);
    let same = |other: &&Part| {
        other.role == part.role
            && other.id != part.id
            && z0(other) == z0(part)
            && other.attribute("conductors") == part.attribute("conductors")
            && other.attribute("kind") == part.attribute("kind")
    };
    let Some(own) = unit_price(market, part) else { return };
    let others = market.catalogue.parts.values().filter(same);
    let priced = others.filter_map(|other| unit_price(market, other).map(|price| (price, other)));
    let Some((price, other)) =
        priced.filter(|(price, _)| *price < own).min_by_key(|(price, other)| (*price, &other.id))
    else {
        return;
    };
    let currency = &market.project.currency;
    bill.hints.push(format!(
        "`{}` ({}) costs from {currency} {} a metre, `{}` from {currency} {}: naming it changes velocity factor, loss and lengths",
        other.id,
        other.description,
        price.round_dp(3).normalize(),
        part.id,
        own.round_dp(3).normalize()
    ));
}

/// Plans with plain offers first; price breaks that so many reels reach are then allowed as well.
fn planned(market: &Market<'_>, need: &Lengths, part: &Part, offers: &[Priced<'_>]) -> CutPlan {
    let plain: Vec<&Priced<'_>> = offers.iter().filter(|priced| priced.kind == Kind::Plain).collect();
    let first = cutting::plan(&job(market, need, part, &plain));
    let bought = |priced: &Priced<'_>| {
        let same_pack = |reel: &&cutting::CutReel| {
            Some(reel.length) == Length::from_decimal_metres_nearest(priced.offer.pack)
        };
        first.reels.iter().filter(same_pack).count() as u64
    };
    let reached: Vec<&Priced<'_>> = offers
        .iter()
        .filter(|priced| priced.kind == Kind::Plain || bought(priced) >= priced.offer.min_packs)
        .collect();
    if reached.len() == plain.len() { first } else { cutting::plan(&job(market, need, part, &reached)) }
}

fn job(market: &Market<'_>, need: &Lengths, part: &Part, offers: &[&Priced<'_>]) -> CutJob {
    let practice = &market.project.practice;
    let on_hand =
        need.on_hand.iter().map(|(name, length)| StockLength::OnHand { name: name.clone(), length: *length });
    let priced_first = offers.iter().any(|priced| priced.price.is_some());
    let usable = offers.iter().filter(|priced| !priced_first || priced.price.is_some());
    let stock = on_hand.chain(usable.filter_map(|priced| stock_of(part, priced))).collect();
    CutJob {
        part: part.id.clone(),
        pieces: need.pieces.clone(),
        stock,
        loss_per_cut: practice.loss_per_cut,
        keep_at_least: practice.keep_at_least,
    }
}

/// A pack of up to one metre is cable by the metre, a larger one a reel.
fn stock_of(part: &Part, priced: &Priced<'_>) -> Option<StockLength> {
    let offer = priced.offer;
    if part.unit != Unit::Metre {
        return None;
    }
    let length = Length::from_decimal_metres_nearest(offer.pack).filter(|length| *length > Length::ZERO)?;
    let id = offer.id.clone();
    Some(if offer.pack <= Decimal::ONE {
        StockLength::Metre {
            offer: id,
            price: priced.price,
            step: length,
            least_steps: offer.min_packs,
            most_steps: offer.available,
        }
    } else {
        StockLength::Reel {
            offer: id,
            length,
            price: priced.price,
            available: offer.available,
            least: offer.min_packs,
        }
    })
}

fn too_long(part: &Part, plan: &CutPlan, offers: &[Priced<'_>]) -> Problem {
    let labels: Vec<String> =
        plan.unplaced.iter().map(|piece| format!("{} ({})", piece.label, piece.cut)).collect();
    let longest = offers.iter().map(|priced| priced.offer.pack).max().unwrap_or_default();
    let message =
        format!("no length of `{}` that can be had is long enough for {}", part.id, labels.join(", "));
    let help = format!(
        "the longest pack is {} m; add a longer offer, choose another part, or move the hub",
        longest.normalize()
    );
    Problem::warning(code::PIECE_TOO_LONG, Some(part.place.clone()), message, help)
}

fn add_lines(
    bill: &mut Bill,
    market: &Market<'_>,
    need: &Lengths,
    part: &Part,
    offers: &[Priced<'_>],
    plan: &CutPlan,
    total: Length,
) {
    let currency = &market.project.currency;
    let from_stock: Length = cut_from(plan, |source| matches!(source, ReelSource::OnHand(_)));
    let unplaced: Length = plan.unplaced.iter().map(|piece| piece.cut).sum();
    let mut packs = packs_by_offer(plan, offers);
    top_up_for_waste(&mut packs, need, offers, total, from_stock);
    let mut on_hand = from_stock;
    let mut first_reason = need.reason.clone();
    for (offer, count) in packs {
        let Some(priced) = offers.iter().find(|priced| priced.offer.id == offer) else { continue };
        let cut = cut_from(plan, |source| *source == ReelSource::Bought(offer.clone()));
        let needed = (cut + on_hand).decimal_metres();
        let reason = std::mem::take(&mut first_reason);
        let mut line = blank_line(part, &need.roles, needed, on_hand.decimal_metres(), reason);
        fill_line(&mut line, priced, count, market);
        if priced.price.is_none() {
            bill.unpriced.push(unpriced(part, line.bought, "its offers have no price"));
        }
        bill.lines.push(line);
        on_hand = Length::ZERO;
    }
    if on_hand > Length::ZERO {
        let metres = on_hand.decimal_metres();
        let mut line = blank_line(part, &need.roles, metres, metres, std::mem::take(&mut first_reason));
        line.amount = Some(crate::units::Money::ZERO.rounded(currency));
        bill.lines.push(line);
    }
    if unplaced > Length::ZERO {
        let why = if offers.is_empty() {
            "the catalogue has no offer for this part"
        } else {
            "no length that can be had is long enough"
        };
        bill.unpriced.push(unpriced(part, unplaced.decimal_metres(), why));
        let metres = unplaced.decimal_metres();
        bill.lines.push(blank_line(part, &need.roles, metres, Decimal::ZERO, first_reason));
    }
}

fn cut_from(plan: &CutPlan, wanted: impl Fn(&ReelSource) -> bool) -> Length {
    let reels = plan.reels.iter().filter(|reel| wanted(&reel.source));
    reels.flat_map(|reel| &reel.cuts).map(|cut| cut.cut).sum()
}

fn packs_by_offer(plan: &CutPlan, offers: &[Priced<'_>]) -> BTreeMap<String, u64> {
    let mut packs = BTreeMap::new();
    for reel in &plan.reels {
        if let ReelSource::Bought(offer) = &reel.source
            && let Some(priced) = offers.iter().find(|priced| priced.offer.id == *offer)
        {
            let count = packs_for(reel.length.decimal_metres(), priced.offer.pack);
            *packs.entry(offer.clone()).or_insert(0) += count;
        }
    }
    packs
}

/// Waste that the project asks for on top of the plan: more packs of the same offer until there is enough.
fn top_up_for_waste(
    packs: &mut BTreeMap<String, u64>,
    need: &Lengths,
    offers: &[Priced<'_>],
    total: Length,
    from_stock: Length,
) {
    let wanted = total.decimal_metres() * (Decimal::ONE + need.waste.ratio()) - from_stock.decimal_metres();
    let pack_of = |id: &String| offers.iter().find(|priced| priced.offer.id == *id).map(|p| p.offer.pack);
    let bought: Decimal =
        packs.iter().filter_map(|(id, count)| pack_of(id).map(|pack| pack * Decimal::from(*count))).sum();
    if let Some((id, count)) = packs.iter_mut().next()
        && let Some(pack) = pack_of(id)
    {
        *count += packs_for(wanted - bought, pack);
    }
}
