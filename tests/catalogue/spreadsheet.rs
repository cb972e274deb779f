//! What survives a spreadsheet: exact numbers, text that looks like a formula, many mistakes at once.

use arraywright::catalogue::{ExportCell, Fix, export};
use proptest::prelude::*;

use crate::support::{codes, over_built_in, printed};

#[test]
fn decimals_are_exact_from_text_to_money() {
    let text = "part,offer,pack,price,currency\nplug-f-6,a,0.3,12345678901234567890.12,EUR\nplug-f-11,b,25,0.10,EUR\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    assert_eq!(printed(&loaded.problems), "");
    assert_eq!(loaded.catalogue.offers["a"].price.unwrap().to_string(), "12345678901234567890.12");
    assert_eq!(loaded.catalogue.offers["a"].pack.to_string(), "0.3");
    assert_eq!(loaded.catalogue.offers["b"].price.unwrap().to_string(), "0.10");
}

#[test]
fn all_mistakes_of_all_files_are_reported_at_once() {
    let parts =
        "part,role,description,unit\ngood,plug,Plug,each\nbad id,plug,Plug,dozen\nother,plugg,Plug,each\n";
    let offers = "part,offer,pack,price,currency,priced_on\n\
        good,o1,=5*5,22.00,EURO,02/03/2026\ngood,o2,25,-3,EUR,46083\nnowhere,o3,1,1,EUR,\n";
    let loaded = over_built_in(&[("parts.csv", parts), ("offers.csv", offers)]);
    let expected = [
        "csv-formula",
        "csv-currency",
        "csv-date-ambiguous",
        "csv-negative",
        "csv-date-serial",
        "csv-unknown-part",
        "csv-bad-id",
        "csv-unknown-unit",
        "csv-unknown-role",
    ];
    assert_eq!(codes(&loaded.problems), expected);
}

#[test]
fn one_mistake_is_one_report() {
    // The row of `lost` cannot be taken apart; its offer and cable data are not blamed for that.
    let parts = "part,role,description,unit\nlost,cable,Coax, foam,m\n";
    let offers = "part,offer,pack,price,currency\nlost,o1,305,90.00,EUR\n";
    let cables = "part,velocity_factor\nlost,0.82\n";
    let loaded = over_built_in(&[("parts.csv", parts), ("offers.csv", offers), ("cables.csv", cables)]);
    assert_eq!(codes(&loaded.problems), ["csv-field-count"]);
    let loaded = over_built_in(&[("parts.csv", "a,b,c\n1,2,3\n"), ("offers.csv", offers)]);
    assert_eq!(codes(&loaded.problems), ["csv-header-not-found"]);
}

#[test]
fn three_decimals_are_everyday_money_in_some_currencies() {
    let text = "part,offer,pack,price,currency\nplug-f-6,a,25,1.250,KWD\nplug-f-11,b,25,1.250,EUR\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    assert_eq!(codes(&loaded.problems), ["csv-thousands-ambiguous"]);
    assert_eq!(loaded.catalogue.offers["a"].price.unwrap().to_string(), "1.250");
}

#[test]
fn a_file_from_a_country_with_decimal_commas_is_read() {
    let text = "sep=;\r\npart;offer;pack;price;currency\r\nplug-f-6;a;25;31,50;EUR\r\nplug-f-11;b;10;1.250,00;EUR\r\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    assert_eq!(codes(&loaded.problems), ["csv-separator", "csv-decimal-comma", "csv-thousands"]);
    assert_eq!(loaded.catalogue.offers["a"].price.unwrap().to_string(), "31.50");
    assert_eq!(loaded.catalogue.offers["b"].price.unwrap().to_string(), "1250.00");
    assert_eq!(loaded.fixes.count(Fix::SeparatorLine), 1);
}

#[test]
fn harmless_damage_is_put_right_and_counted() {
    let text = "\u{FEFF}part,offer,pack,price,currency,,\rPlug-F-6, a ,25,\u{201C}31.00,EUR,,\r,,,,,,\r"
        .replace('\u{201C}', "\u{A0}");
    let loaded = over_built_in(&[("offers.csv", &text)]);
    assert_eq!(printed(&loaded.problems), "");
    assert_eq!(loaded.catalogue.offers["a"].part, "plug-f-6");
    assert_eq!(
        loaded.fixes.to_string(),
        "offers.csv: put right: byte-order mark 1, old line ends 1, blank rows 1, blank cells at row ends 1, \
         spaces around cells 2, capitals in ids and codes 1"
    );
}

#[test]
fn repeated_warnings_of_a_column_are_one_line() {
    let text = "part;offer;pack;price;currency\nplug-f-6;a;25;31,50;EUR\nplug-f-11;b;10;24,50;EUR\nbarrel-f;c;10;9,50;EUR\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    let all = printed(&loaded.problems);
    assert!(all.contains("\"31,50\" with a decimal comma (and 2 more cells of this column)"), "{all}");
}

#[test]
fn feet_become_metres_and_are_said_so() {
    let parts = "part,role,description,unit\nmy-wire,wire,Wire by the foot,ft\n";
    let offers = "part,offer,pack,price,currency\nmy-wire,my-wire-1000,1000 ft,60.00,EUR\n";
    let loaded = over_built_in(&[("parts.csv", parts), ("offers.csv", offers)]);
    assert_eq!(codes(&loaded.problems), ["csv-unit-in-cell", "csv-unit-converted"]);
    assert_eq!(loaded.catalogue.offers["my-wire-1000"].pack.to_string(), "304.8");
}

/// One part whose description and note are given, as an exported file.
fn exported(description: &str, note: &str) -> String {
    let header = ["part", "role", "description", "unit", "note"];
    let header: Vec<ExportCell> = header.iter().map(|name| ExportCell::Plain((*name).to_owned())).collect();
    let row = [
        ExportCell::Plain("x".to_owned()),
        ExportCell::Plain("plug".to_owned()),
        ExportCell::Text(description.to_owned()),
        ExportCell::Plain("each".to_owned()),
        ExportCell::Text(note.to_owned()),
    ];
    export([&header[..], &row[..]])
}

proptest! {
    #![proptest_config(ProptestConfig { failure_persistence: None, rng_seed: proptest::test_runner::RngSeed::Fixed(1), ..ProptestConfig::default() })]

    /// Spaces at the ends of a cell are dropped by design, so the text has none.
    #[test]
    fn text_comes_back_as_it_was_exported(
        description in "[=+@'\"z-]{1,3}[a-z,;\"'\n\r=é ]{0,12}z",
        note in "\\PC{0,20}",
        lead in "[=+@\t\r'-]{0,2}",
    ) {
        let note = format!("{lead}{note}x");
        prop_assume!(!note.starts_with([' ', '\n', '\u{A0}']) && note.trim_start_matches(['\t', '\r']) == note.trim_start());
        let loaded = over_built_in(&[("parts.csv", &exported(&description, &note))]);
        prop_assert_eq!(printed(&loaded.problems), "");
        let part = &loaded.catalogue.parts["x"];
        prop_assert_eq!(&part.description, &description);
        prop_assert_eq!(&part.note, &note);
    }

    /// Whatever bytes arrive, reading ends and every problem names a file.
    #[test]
    fn no_bytes_break_the_reader(bytes in proptest::collection::vec(any::<u8>(), 0..200)) {
        let names = arraywright::catalogue::FILES;
        let files: Vec<_> = names.iter().map(|name| arraywright::catalogue::CatalogueFile {
            name: (*name).to_owned(), bytes: bytes.clone(),
        }).collect();
        let loaded = arraywright::catalogue::load(
            arraywright::catalogue::Catalogue::default(), &files, arraywright::catalogue::Source::User);
        prop_assert!(loaded.problems.sorted().iter().all(|problem| problem.place.is_some()));
    }

    /// Text near to a catalogue: legal headers with hostile cells.
    #[test]
    fn no_cells_break_the_reader(cells in proptest::collection::vec("([0-9]{0,30}|[0-9a-zEé€$%=+,.;:'\" /-]{0,8})", 9)) {
        let offers = format!("part,offer,pack,price,currency,priced_on,min_packs,available,lead_days\n{}\n", cells.join(","));
        let cables = format!("part,z0_ohm,velocity_factor,loss_db_per_100m\nplug-f-6,{}\n", cells[..3].join(","));
        let _ = over_built_in(&[("offers.csv", &offers), ("cables.csv", &cables)]);
    }
}
