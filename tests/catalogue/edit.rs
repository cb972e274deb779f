//! A user's file is changed cell by cell; the rest stays byte for byte.

use std::collections::BTreeMap;

use arraywright::catalogue::{CatalogueFile, CellEdit, NoEdit, edited};

use crate::support::{file, over_built_in};

fn price(line: usize, value: &str) -> CellEdit {
    CellEdit { line, column: "price".to_owned(), value: value.to_owned() }
}

fn text(file: &CatalogueFile, edits: &[CellEdit]) -> String {
    String::from_utf8(edited(file, edits, &[]).unwrap()).unwrap()
}

const OFFERS: &str = "\u{FEFF}sep=;\r\nshelf;part;offer; pack;price;currency\r\n\r\n\
    \"B;4\";plug-f-6; a ;\"25\";22,00;EUR\r\n;plug-f-11;b;10;\"24,00\";EUR\r\n";

#[test]
fn only_the_cells_named_change() {
    let given = file("my/offers.csv", OFFERS);
    assert_eq!(text(&given, &[]), OFFERS);
    let expected = OFFERS.replace("22,00", "23,50").replace("\"24,00\"", "\"a;b\"");
    assert_eq!(text(&given, &[price(5, "a;b"), price(4, "23,50")]), expected);
}

#[test]
fn the_line_of_an_offer_finds_its_row() {
    let given = "part,offer,pack,price,currency\nplug-f-6,\"a\",25,,EUR\nplug-f-11,b,10,,EUR\n";
    let loaded = over_built_in(&[("offers.csv", given)]);
    let line = loaded.catalogue.offers["b"].place.line;
    let expected = given.replace("b,10,,", "b,10,19.00,");
    assert_eq!(text(&file("offers.csv", given), &[price(line, "19.00")]), expected);
}

#[test]
fn rows_are_added_by_column_name_in_the_files_own_manner() {
    let given = file("offers.csv", OFFERS.trim_end());
    let row = [("part", "barrel-f"), ("offer", "c"), ("pack", "10"), ("price", "9,00"), ("currency", "EUR")];
    let row: BTreeMap<String, String> = row.map(|(name, value)| (name.to_owned(), value.to_owned())).into();
    let changed = edited(&given, &[], &[row]).unwrap();
    assert_eq!(String::from_utf8(changed).unwrap(), format!("{OFFERS};barrel-f;c;10;9,00;EUR\r\n"));
}

#[test]
fn what_is_not_there_cannot_be_changed() {
    let given = file("offers.csv", OFFERS);
    assert_eq!(edited(&given, &[price(9, "1")], &[]), Err(NoEdit::Row(9)));
    let edit = CellEdit { line: 4, column: "colour".to_owned(), value: String::new() };
    assert_eq!(edited(&given, &[edit], &[]), Err(NoEdit::Column("colour".to_owned())));
    assert_eq!(edited(&file("x.csv", OFFERS), &[], &[]), Err(NoEdit::File("x.csv".to_owned())));
}
