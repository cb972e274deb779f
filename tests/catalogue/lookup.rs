//! Velocity factor, loss, age of prices, health.

use approx::assert_relative_eq;
use arraywright::catalogue::{Cable, age, built_in, health};
use arraywright::physics::loss::LossError;
use arraywright::units::Frequency;
use chrono::NaiveDate;

use crate::support::{codes, over_built_in};

fn cable(row: &str) -> Cable {
    let text = format!("part,velocity_factor,loss_db_per_100m\ncoax75-foam,{row}\n");
    let loaded = over_built_in(&[("cables.csv", &text)]);
    assert!(loaded.problems.is_empty(), "{:?}", loaded.problems);
    loaded.catalogue.cables["coax75-foam"].clone()
}

fn mhz(text: &str) -> Frequency {
    Frequency::parse(&format!("{text} MHz")).unwrap()
}

#[test]
fn one_velocity_factor_holds_everywhere() {
    let cable = cable("0.82,");
    assert_eq!(cable.velocity_at(mhz("0.1")).unwrap().to_string(), "0.82");
    assert_eq!(cable.velocity_at(mhz("50")).unwrap().to_string(), "0.82");
}

#[test]
fn velocity_points_are_joined_over_log_frequency_and_held_outside() {
    let cable = cable("1:0.80 4:0.82 16:0.83,");
    assert_eq!(cable.velocity_at(mhz("0.5")).unwrap().to_string(), "0.8");
    assert_eq!(cable.velocity_at(mhz("4")).unwrap().to_string(), "0.82");
    // Half way on the log scale: 2 MHz between 1 and 4, 8 MHz between 4 and 16.
    assert_eq!(cable.velocity_at(mhz("2")).unwrap().to_string(), "0.81");
    assert_eq!(cable.velocity_at(mhz("8")).unwrap().to_string(), "0.825");
    assert_eq!(cable.velocity_at(mhz("30")).unwrap().to_string(), "0.83");
}

/// Series-6 foam with a solid copper centre: 0.8141 at 1.83 MHz and 0.8193 at 4.1 MHz, ratio 1.006, by the exact line
/// constants with a thick copper shield (skin effect in round conductors). The catalogue's points come within 0.0005.
#[test]
fn the_built_in_copper_cable_slows_at_low_frequencies() {
    let catalogue = built_in();
    let at = |text| catalogue.cables["coax75-foam"].velocity_at(mhz(text)).unwrap().value();
    assert!((at("1.83") - 0.8141).abs() < 0.0005);
    assert!((at("4.1") - 0.8193).abs() < 0.0005);
}

#[test]
fn loss_is_log_log_between_points() {
    let cable = cable("0.82,1:1 4:2 16:8");
    assert_relative_eq!(cable.loss_db_per_100m(mhz("1")).unwrap(), 1.0);
    assert_relative_eq!(cable.loss_db_per_100m(mhz("2")).unwrap(), 2.0_f64.sqrt(), max_relative = 1e-12);
    assert_relative_eq!(cable.loss_db_per_100m(mhz("8")).unwrap(), 4.0, max_relative = 1e-12);
    assert_relative_eq!(cable.loss_db_per_100m(mhz("16")).unwrap(), 8.0);
}

#[test]
fn loss_outside_the_points_is_refused() {
    let points = cable("0.82,1.8:3.1 10:4");
    let below = points.loss_db_per_100m(mhz("0.5")).unwrap_err();
    assert_eq!(below.to_string(), "no loss figure below 1.8 MHz for this cable; measured value needed");
    let above = points.loss_db_per_100m(mhz("14")).unwrap_err();
    assert_eq!(above.to_string(), "no loss figure above 10 MHz for this cable; measured value needed");
    assert_eq!(cable("0.82,").loss_db_per_100m(mhz("2")), Err(LossError::TooFewPoints));
}

#[test]
fn prices_age_by_the_day_of_the_estimate() {
    let text = "part,offer,pack,price,currency,priced_on\n\
        coax75-foam,a,305,128.00,EUR,2026-04-04\ncoax75-foam,b,100,48.00,EUR,2026-04-03\n\
        coax75-gel,c,305,88.00,EUR,2024-10-01\ncoax75-gel,d,100,34.00,EUR,2024-09-30\n\
        coax75-ccs,e,305,62.00,EUR,2026-10-01\ncoax75-ccs,f,100,25.00,EUR,2026-10-02\n\
        coax75-11,g,305,268.00,EUR,\ncoax75-11,h,100,,EUR,\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    let estimated = NaiveDate::from_ymd_opt(2026, 10, 1).unwrap();
    let found = age(&loaded.catalogue, estimated, 730);
    // 2026-04-04 is 180 days before and fresh; 2024-10-01 is 730 days before and allowed.
    let expected = [
        "csv-price-old",
        "csv-price-old",
        "csv-price-too-old",
        "csv-price-after-estimate",
        "csv-price-undated",
    ];
    assert_eq!(codes(&found), expected);
}

#[test]
fn built_in_prices_are_never_judged_by_age() {
    let far = NaiveDate::from_ymd_opt(2040, 1, 1).unwrap();
    assert!(age(&built_in(), far, 730).is_empty());
}

#[test]
fn a_price_per_metre_in_a_reel_row_is_noticed() {
    let text = "part,offer,pack,price,currency,priced_on\ncoax75-foam,per-metre,305,0.29,EUR,2026-09-01\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    assert_eq!(codes(&health(&loaded.catalogue)), ["csv-unit-price-odd"]);
}
