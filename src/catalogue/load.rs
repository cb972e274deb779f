//! A user's catalogue over the built-in one, and what the files say about each other.

use std::collections::{BTreeMap, BTreeSet};

use crate::problem::{Place, Problems, nearest};
use crate::units::Money;

use super::code;
use super::model::{Catalogue, Offer, Source};
use super::read::{CatalogueFile, Draft, Lost, draft};
use super::report::{Fixes, Report};

/// A catalogue that is ready for use when `problems` has no error.
#[derive(Clone, Debug, Default)]
pub struct Loaded {
    /// The base with the files laid over it.
    pub catalogue: Catalogue,
    /// Everything that is wrong with the files, by place.
    pub problems: Problems,
    /// What was put right silently.
    pub fixes: Fixes,
}

/// Reads files, lays them over `base` and checks what they say about each other.
///
/// `base` is [`super::built_in()`], or an empty catalogue where the files are to stand alone.
pub fn load(base: Catalogue, files: &[CatalogueFile], source: Source) -> Loaded {
    let Draft { catalogue: mut given, mut report, prerequisites, lost } = draft(files, source, &base);
    offer_ids(&given, &base, &mut report);
    let known: BTreeSet<String> = base.parts.keys().chain(given.parts.keys()).cloned().collect();
    restore_zeros(&mut given, &known, &mut report);
    references(&given, &known, &lost, &mut report);
    breaks(&given, &mut report);
    let catalogue = overlay(base, given);
    for (task, before, place) in prerequisites {
        if !catalogue.labour.contains_key(&before) {
            let message = format!("{task} comes after \"{before}\", which is no task");
            report.warning(code::UNKNOWN_TASK, place, message, "it is passed over; correct or remove it");
        }
    }
    let (problems, fixes) = report.finish();
    Loaded { catalogue, problems, fixes }
}

/// Lays a user's catalogue over another one.
///
/// A part, cable, task or terrain row replaces the one of the same id; the offers of a part replace all offers that
/// the base has for it.
#[must_use]
pub fn overlay(base: Catalogue, user: Catalogue) -> Catalogue {
    let mut merged = base;
    let offered: BTreeSet<&String> = user.offers.values().map(|offer| &offer.part).collect();
    merged.offers.retain(|_, offer| !offered.contains(&offer.part));
    merged.parts.extend(user.parts);
    merged.offers.extend(user.offers);
    merged.cables.extend(user.cables);
    merged.labour.extend(user.labour);
    merged.terrain.extend(user.terrain);
    merged
}

/// An offer id that the base uses for another part would push that offer out.
fn offer_ids(given: &Catalogue, base: &Catalogue, report: &mut Report) {
    let offered: BTreeSet<&String> = given.offers.values().map(|offer| &offer.part).collect();
    for offer in given.offers.values() {
        let other = base.offers.get(&offer.id).filter(|other| !offered.contains(&other.part));
        if let Some(other) = other {
            let message = format!("the offer id \"{}\" belongs to {} already", offer.id, other.part);
            report.error(code::DUPLICATE_ID, offer.place.clone(), message, "give the offer an id of its own");
        }
    }
}

/// The known id that differs by leading zeros only, as spreadsheets drop them.
fn without_zeros<'k>(id: &str, known: &'k BTreeSet<String>) -> Option<&'k String> {
    let bare = id.trim_start_matches('0');
    let is_number = |text: &str| !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
    let same = |other: &&String| is_number(other) && other.trim_start_matches('0') == bare;
    if is_number(id) && !known.contains(id) { known.iter().find(same) } else { None }
}

fn restore_zeros(given: &mut Catalogue, known: &BTreeSet<String>, report: &mut Report) {
    let mut say = |id: &str, meant: &str, place: &Place| {
        let message = format!("\"{id}\" was taken for the part \"{meant}\": leading zeros were lost");
        report.warning(code::LEADING_ZEROS, place.clone(), message, "start ids with a letter");
    };
    for offer in given.offers.values_mut() {
        if let Some(meant) = without_zeros(&offer.part, known) {
            say(&offer.part, meant, &offer.place);
            offer.part.clone_from(meant);
        }
    }
    let cables = std::mem::take(&mut given.cables);
    for (id, mut cable) in cables {
        if let Some(meant) = without_zeros(&id, known) {
            say(&id, meant, &cable.place);
            cable.part.clone_from(meant);
        }
        given.cables.insert(cable.part.clone(), cable);
    }
}

fn references(given: &Catalogue, known: &BTreeSet<String>, lost: &Lost, report: &mut Report) {
    let is_unknown = |id: &String| !known.contains(id) && !lost.may_hold(id);
    let help = |id: &str| match nearest(id, known.iter().map(String::as_str)) {
        Some(near) => format!("did you mean `{near}`? or add its row to parts.csv"),
        None => "add its row to parts.csv".to_owned(),
    };
    for offer in given.offers.values().filter(|offer| is_unknown(&offer.part)) {
        let message = format!("the offer \"{}\" is of an unknown part \"{}\"", offer.id, offer.part);
        report.error(code::UNKNOWN_PART, offer.place.clone(), message, help(&offer.part));
    }
    for cable in given.cables.values().filter(|cable| is_unknown(&cable.part)) {
        let message = format!("the cable data are of an unknown part \"{}\"", cable.part);
        report.error(code::UNKNOWN_PART, cable.place.clone(), message, help(&cable.part));
    }
    for part in given.parts.values() {
        for alternate in part.alternates.iter().filter(|id| is_unknown(id)) {
            let message = format!("the alternate \"{alternate}\" of \"{}\" is an unknown part", part.id);
            report.warning(code::UNKNOWN_ALTERNATE, part.place.clone(), message, help(alternate));
        }
    }
}

/// Price breaks of one part, pack and supplier: more packs must not cost more each, and the rows ascend.
fn breaks(given: &Catalogue, report: &mut Report) {
    let mut lists = BTreeMap::<_, Vec<&Offer>>::new();
    // A limited number is a special offer beside the list; a pack of nothing has been reported.
    let listed = |offer: &&Offer| offer.available.is_none() && !offer.pack.is_zero();
    for offer in given.offers.values().filter(listed) {
        let key = (&offer.part, offer.pack, &offer.supplier, &offer.currency);
        lists.entry(key).or_default().push(offer);
    }
    for list in lists.values_mut() {
        list.sort_by_key(|offer| (offer.place.file.clone(), offer.place.line));
        for pair in list.windows(2) {
            break_pair(pair[0], pair[1], report);
        }
    }
}

fn break_pair(first: &Offer, second: &Offer, report: &mut Report) {
    if second.min_packs <= first.min_packs {
        let message = format!(
            "the price break \"{}\" (min_packs {}) stands after \"{}\" (min_packs {})",
            second.id, second.min_packs, first.id, first.min_packs
        );
        let help = "sort the rows of a part by min_packs, each once (or give them different suppliers)";
        report.error(code::BREAK_ORDER, second.place.clone(), message, help);
    } else if let (Some(one), Some(more)) = (first.price, second.price)
        && more > one
        && one > Money::ZERO
    {
        let message = format!(
            "the price break \"{}\" costs {more} a pack, more than {one} of \"{}\"",
            second.id, first.id
        );
        report.error(
            code::BREAK_ORDER,
            second.place.clone(),
            message,
            "a larger order is not dearer; check both prices",
        );
    }
}
