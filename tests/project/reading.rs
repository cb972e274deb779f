//! Legal files, and what they mean.

use arraywright::project::{
    self, DelayRatio, EchelonSpec, EndfireStage, Freight, HubPlace, Phasing, Scheme, Stock, Termination,
};
use arraywright::units::{Length, Money, Percent};
use chrono::NaiveDate;
use rust_decimal::Decimal;

use crate::support::{codes, one_wire, project, shown, text_of};

fn echelon(project: &project::Project) -> &EchelonSpec {
    match &project.arrays[0].endfire {
        Some(EndfireStage::Echelon(echelon)) => echelon,
        other => panic!("{other:?}"),
    }
}

#[test]
fn the_worked_vectors_of_this_version_read() {
    for name in ["V01", "V02", "V03", "V04", "V05", "V06", "V07", "V08"] {
        let project = project(&text_of(&format!("vectors/{name}.toml")));
        assert_eq!(project.title, name);
        assert_eq!(project.practice.route_factor, Some(Decimal::new(105, 2)), "{name}");
        assert_eq!(project.arrays.len(), 1, "{name}");
    }
    let v03 = project(&text_of("vectors/V03.toml"));
    let HubPlace::At(hub) = v03.arrays[0].feed.hub else { panic!("no place for the hub") };
    assert_eq!((hub.forward, hub.right), (Length::ZERO, Length::from_mm(-41_000)));
}

#[test]
fn the_other_worked_vectors_are_only_not_built_yet() {
    for name in ["V09", "V10", "V11", "V12", "V13"] {
        let codes = codes(&text_of(&format!("vectors/{name}.toml")));
        assert_eq!(codes, ["not-in-this-version"], "{name}");
    }
}

/// The example that README and design show.
const EXAMPLE: &str = r#"
[project]
title          = "Example: two ways to hear the north-west"
currency       = "EUR"
estimated      = 2026-10-01            # the day prices are judged against
frequency      = "1.83 MHz"            # design frequency
also           = ["3.55 MHz"]          # other bands the array must serve
receiver-noise = "12 dB"

[site]
latitude    = 57.21
longitude   = 21.64
ground      = "average"
soil        = "120 ohm m"
terrain     = "light-wood"
noise       = "quiet-rural"
receiver    = { east = "-140 m", north = "35 m" }

[[array]]
name        = "nw-broadside"
option      = "broadside"
heading     = "310 deg"
centre      = { east = "0 m", north = "0 m" }
element.wire      = { length = "176 m", height = "2.5 m" }
broadside   = { spacing = "400 ft" }

[[array]]
name        = "nw-echelon"
option      = "echelon"
heading     = "310 deg"
element.wire      = { length = "176 m", height = "2.5 m" }
echelon     = { stagger = "60 ft", offset = "15 ft" }
"#;

#[test]
fn the_example_reads_and_lists_the_defaults_it_uses() {
    let project = project(EXAMPLE);
    assert_eq!(project.options(), ["broadside", "echelon"]);
    assert_eq!(project.estimated, NaiveDate::from_ymd_opt(2026, 10, 1).unwrap());
    assert_eq!(project.site.coordinates, Some((Decimal::new(5721, 2), Decimal::new(2164, 2))));
    let row = project.arrays[0].broadside.as_ref().unwrap();
    assert_eq!((row.count, row.spacing), (2, Length::from_mm(121_920)));
    let assumed = |key: &str| {
        let found = project.assumptions.iter().find(|assumption| assumption.key == key);
        found.map(|assumption| assumption.value.as_str())
    };
    assert_eq!(assumed("array.nw-echelon.echelon.delay"), Some("0.94"));
    assert_eq!(assumed("array.nw-broadside.broadside.count"), Some("2"));
    assert_eq!(assumed("practice.riser"), Some("1.0 m"));
    assert_eq!(assumed("prices.contingency"), Some("10 %"));
    assert_eq!(assumed("labour.hours-per-day"), Some("5"));
    assert_eq!(assumed("site.terrain"), None, "given");
    assert_eq!(assumed("practice.vertical-rods"), None, "there is no vertical");
    assert_eq!(assumed("array.nw-echelon.feed.array-hub"), None, "there is one hub only");
}

#[test]
fn the_example_is_warned_of_its_width_on_the_second_band() {
    assert_eq!(codes(EXAMPLE), ["spacing-wide"], "400 ft is 1.44 waves at 3.55 MHz");
}

#[test]
fn feet_and_metres_give_the_same_millimetres() {
    let stage = |stagger: &str, offset: &str| {
        let stage = format!("echelon = {{ stagger = \"{stagger}\", offset = \"{offset}\" }}");
        let project = project(&one_wire(&stage));
        (echelon(&project).stagger, echelon(&project).offset)
    };
    assert_eq!(stage("60 ft", "15 ft"), stage("18.288 m", "4572 mm"));
    assert_eq!(stage("7 ft 6 in", "15 ft").0, Length::from_mm(2_286));
}

#[test]
fn inline_tables_and_sub_tables_mean_the_same() {
    let inline = one_wire("echelon = { stagger = \"60 ft\", delay = 0.95 }\nfeed = { hub = \"best\" }");
    let tables =
        one_wire("[array.echelon]\nstagger = \"60 ft\"\ndelay = 0.95\n\n[array.feed]\nhub = \"best\"");
    let (inline, tables) = (project(&inline), project(&tables));
    assert_eq!(format!("{:?}", inline.arrays[0].endfire), format!("{:?}", tables.arrays[0].endfire));
    assert_eq!(inline.arrays[0].feed.hub, tables.arrays[0].feed.hub);
    assert_eq!(inline.assumptions, tables.assumptions);
}

#[test]
fn ratios_are_the_decimals_that_were_written() {
    let read = |ratio: &str| {
        project(&one_wire(&format!("[practice]\nroute-factor = {ratio}"))).practice.route_factor
    };
    assert_eq!(read("1.05"), Some(Decimal::new(105, 2)));
    assert_eq!(read("1.0500000000000000444"), Some("1.0500000000000000444".parse().unwrap()));
    assert_eq!(read("2"), Some(Decimal::TWO));
    assert_eq!(project(&one_wire("[practice]\nspares = { plug = 1_000 }")).practice.spares["plug"], 1_000);
    let product = Decimal::from(150) * read("1.05").unwrap();
    assert_eq!(product, Decimal::new(1575, 1), "150 m × 1.05 is 157.5 m exactly");
}

#[test]
fn defaults_of_a_stage_follow_its_scheme_and_its_wires() {
    let phasing = |more: &str| {
        let project = project(&one_wire(&format!("echelon = {{ stagger = \"60 ft\"{more} }}")));
        let echelon = echelon(&project);
        let Phasing::Scheme { scheme, delay: DelayRatio::Ratio(ratio) } = echelon.phasing else {
            panic!("{:?}", echelon.phasing)
        };
        (scheme, ratio, echelon.offset)
    };
    let offset = Length::from_mm(5_000);
    assert_eq!(phasing(""), (Scheme::Crossfire, Decimal::new(94, 2), offset));
    assert_eq!(phasing(", scheme = \"in-phase\""), (Scheme::InPhase, Decimal::ONE, offset));
    assert_eq!(phasing(", scheme = \"half-wave\""), (Scheme::HalfWave, Decimal::new(94, 2), offset));
    let high =
        one_wire("echelon = { stagger = \"60 ft\" }").replace("\"176 m\"", "\"176 m\", height = \"4 m\"");
    assert_eq!(echelon(&project(&high)).offset, Length::from_mm(8_000), "twice the height");
}

#[test]
fn terminations_take_three_forms() {
    let termination = |text: &str| {
        let text = one_wire("").replace("\"176 m\"", &format!("\"176 m\", termination = {text}"));
        match project(&text).arrays[0].element.clone() {
            project::ElementSpec::Wire(wire) => wire.termination,
            project::ElementSpec::Vertical(_) => panic!("a vertical"),
        }
    };
    assert!(
        matches!(termination("\"450 ohm\""), Termination::Resistor(r) if (r.ohms() - 450.0).abs() < 1e-9)
    );
    assert_eq!(termination("\"matched\""), Termination::Matched);
    assert_eq!(termination("{ reflection = 0.3 }"), Termination::Reflection(Decimal::new(3, 1)));
}

#[test]
fn prices_and_labour_read_as_written() {
    let text = one_wire(
        r#"
[prices]
tax = { goods = "21 %", labour = "0 %" }
freight = { S1 = "15.00", heavy = "0.40 per kg", free-over = "500.00" }
contingency = "10 %"
exchange = [{ from = "USD", rate = "0.92", on = 2026-09-30 }]
oldest-price = "104 weeks"

[labour]
crew = 3
rate = "18 EUR"
start = 2026-10-10
travel = { people = 3, trips = 2, hours = 1.5, money = "12.00" }
"#,
    );
    let project = project(&text);
    let prices = &project.prices;
    assert_eq!(prices.tax["goods"], Percent::from_ratio(Decimal::new(21, 2)));
    assert_eq!(prices.tax["labour"], Percent::default());
    assert_eq!(prices.freight["heavy"], Freight::PerKilogram(Money::new(Decimal::new(40, 2))));
    assert_eq!(prices.freight.len(), 2, "free-over is no supplier");
    assert_eq!(prices.freight_free_over, Some(Money::new(Decimal::from(500))));
    assert_eq!(prices.oldest_price_days, 728);
    assert_eq!(prices.exchange[0].rate, Decimal::new(92, 2));
    assert_eq!(project.labour.rate, Money::new(Decimal::from(18)));
    assert_eq!(project.labour.travel.as_ref().unwrap().hours, Decimal::new(15, 1));
}

#[test]
fn one_tax_rate_is_that_of_goods_which_all_others_follow() {
    let project = project(&one_wire("[prices]\ntax = \"21 %\""));
    let rates: Vec<_> =
        project.prices.tax.iter().map(|(class, rate)| (class.as_str(), rate.ratio())).collect();
    assert_eq!(rates, [("goods", Decimal::new(21, 2))]);
}

#[test]
fn stock_on_hand_comes_from_the_file_and_from_the_table_beside_it() {
    let text = one_wire("[[on-hand]]\npart = \"plug-f\"\nquantity = 12");
    let csv = "\u{feff}note,part,length,shelf,quantity\nhalf reel,coax75-gel,73.5,A,\n,rope,60 ft,B,\n,mast,,C,3\n,,,,\n";
    let (project, problems) = project::read("field.toml", &text, Some(("on-hand.csv", csv)));
    let stock = project.unwrap_or_else(|| panic!("{}", shown(&problems))).on_hand;
    assert_eq!(
        stock.iter().map(|entry| entry.part.as_str()).collect::<Vec<_>>(),
        ["plug-f", "coax75-gel", "rope", "mast"]
    );
    assert_eq!(stock[0].stock, Stock::Count(12));
    assert_eq!(stock[1].stock, Stock::Length(Length::from_mm(73_500)));
    assert_eq!(stock[2].stock, Stock::Length(Length::from_mm(18_288)));
    assert_eq!(stock[1].note, "half reel");
    assert_eq!(stock[3].place.as_ref().map(|place| (place.line, place.column)), Some((4, 2)));
}

#[test]
fn the_rest_of_the_site_is_read() {
    let text = one_wire(
        r#"
[[keep-out]]
name = "pond"
polygon = [{ east = "0 m", north = "0 m" }, { east = "30 m", north = "0 m" }, { east = "0 m", north = "20 m" }]

[[crossing]]
kind = "gate"
width = "4 m"
at = { east = "10 m", north = "5 m" }

[[existing]]
role = "mast"

[[existing]]
label = "B1"
quantity = 1
"#,
    );
    let text = text.replace("[site]", "[site]\ndeclination = \"-3.5 deg\"\nprofile = \"profile.csv\"");
    let project = project(&text);
    assert_eq!(project.keep_out[0].polygon.len(), 3);
    assert_eq!(project.crossings[0].width, Length::from_mm(4_000));
    assert_eq!(project.existing.len(), 2);
    assert!((project.site.declination.unwrap().degrees() + 3.5).abs() < 1e-9);
}

#[test]
fn a_merged_delay_is_of_the_branch_part() {
    let text = one_wire(
        "echelon = { stagger = \"60 ft\" }\nfeed = { delay-style = \"merged\", branch = \"coax75-gel\" }",
    );
    let project = project(&text);
    assert_eq!(project.arrays[0].feed.delay.as_deref(), Some("coax75-gel"));
}
