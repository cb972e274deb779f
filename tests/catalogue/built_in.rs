//! The compiled-in catalogue is complete, clean and matches the tables that it was typed from.

use std::time::Instant;

use arraywright::catalogue::{
    Source, built_in, built_in_loaded, built_in_texts, health, load, part_roles, read,
};
use rust_decimal::Decimal;

use crate::support::{file, printed};

#[test]
fn it_reads_without_a_single_remark() {
    let loaded = built_in_loaded();
    assert_eq!(printed(&loaded.problems), "");
    assert_eq!(loaded.fixes.to_string(), "");
    assert_eq!(printed(&health(&loaded.catalogue)), "");
}

#[test]
fn every_row_of_the_texts_arrives() {
    let catalogue = built_in();
    let rows = built_in_texts().map(|(_, text)| text.lines().count() - 1);
    let read = [
        catalogue.parts.len(),
        catalogue.offers.len(),
        catalogue.cables.len(),
        catalogue.labour.len(),
        catalogue.terrain.len(),
    ];
    assert_eq!(read, rows);
    assert_eq!((read[3], read[4]), (49, 5), "tasks T01 to T49 and five terrain classes");
}

#[test]
fn every_role_has_a_part_and_every_part_an_offer() {
    let catalogue = built_in();
    for role in &part_roles().collect::<Vec<_>>() {
        assert!(catalogue.default_part(role).is_some(), "no part plays {role}");
    }
    for part in catalogue.parts.values() {
        assert!(catalogue.offers_of(&part.id).next().is_some(), "nothing offers {}", part.id);
        assert_eq!(part.source, Source::BuiltIn);
    }
    for offer in catalogue.offers.values() {
        assert_eq!(offer.currency.code(), "EUR");
        assert!(offer.price.is_some() && offer.priced_on.is_some(), "{}", offer.id);
    }
}

#[test]
fn boxes_come_with_enough_sockets_smallest_first() {
    let catalogue = built_in();
    for (needed, part) in [(3, "hub-03"), (4, "hub-05"), (7, "hub-08"), (12, "hub-12"), (20, "hub-24")] {
        let fits = |ways: Option<Decimal>| ways.is_some_and(|ways| ways >= Decimal::from(needed));
        let found = catalogue.default_part_with("hub-box", |part| fits(part.number("ways"))).unwrap();
        assert_eq!(found.id, part);
    }
}

/// Hours and multipliers that the tables of common practice (no source) give, spot by spot.
#[test]
fn hours_and_multipliers_are_those_of_the_tables() {
    let catalogue = built_in();
    let hours = |task: &str| catalogue.labour[task].hours.map(|hours| hours.to_string());
    assert_eq!(hours("T15"), ["0.05", "0.2", "1.5"]);
    assert_eq!(hours("T37"), ["2", "5", "12"]);
    assert_eq!(catalogue.labour["T15"].terrain, "rod");
    assert_eq!(catalogue.labour["T20"].crew_min, 4);
    assert!(catalogue.labour["T16"].learns && !catalogue.labour["T15"].learns);
    assert_eq!(catalogue.labour["T17"].after, "T09/T19 T15");
    assert_eq!(catalogue.terrain["dense-bush"].factors["clear"].to_string(), "4.0");
    assert_eq!(catalogue.terrain["light-wood"].route_factor.to_string(), "1.15");
}

/// Person-hours of a worked example in open field: 7 mid posts, 2 end posts, 9 insulators, 184 m of wire, one
/// tie-off, 4 earth rods make 3.53 low, 6.94 likely, 22.22 high (rounded).
#[test]
fn a_worked_example_adds_up() {
    let catalogue = built_in();
    let counts = [("T07", 7), ("T09", 2), ("T11", 9), ("T12", 184), ("T13", 1), ("T15", 4)];
    let sum = |index: usize| -> Decimal {
        counts.iter().map(|(task, count)| catalogue.labour[*task].hours[index] * Decimal::from(*count)).sum()
    };
    let rounded = [0, 1, 2].map(|index| sum(index).round_dp(2).normalize().to_string());
    assert_eq!(rounded, ["3.53", "6.94", "22.22"]);
}

#[test]
fn it_is_read_in_a_blink() {
    let files = built_in_texts().map(|(name, text)| file(name, text));
    let start = Instant::now();
    let (catalogue, _, _) = read(&files, Source::BuiltIn);
    let loaded = load(catalogue, &files, Source::User);
    assert!(!loaded.problems.has_errors());
    // 20 ms is the aim of an optimised build; an unoptimised one on a busy machine gets far more room.
    assert!(start.elapsed().as_millis() < 2_000, "{:?}", start.elapsed());
}
