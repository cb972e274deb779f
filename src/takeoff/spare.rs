//! Waste and spares by role, beside the net quantities.

use rust_decimal::{Decimal, RoundingStrategy};

use super::tally::Tally;
use crate::project::Project;

/// Applies the shop's waste and spares, else common practice (no source).
///
/// Given spares of a role go to its first part.
pub(super) fn add(tally: &mut Tally<'_>, project: &Project) {
    let mut previous = String::new();
    for (key, net) in tally.totals() {
        let role = key.0.as_str();
        let (waste, rule) = match project.practice.waste.get(role) {
            Some(given) => ((net * given.ratio()).ceil(), format!("waste, {given} as given")),
            None => default_waste(role, tally.attribute(&key.1, "kind"), net),
        };
        tally.set_waste(&key, waste, rule);
        let (spare, rule) = match project.practice.spares.get(role) {
            Some(_) if previous == role => (Decimal::ZERO, String::new()),
            Some(given) => (Decimal::from(*given), "spare, as given".to_owned()),
            None => default_spare(role, net),
        };
        tally.set_spare(&key, spare, rule);
        previous = key.0;
    }
}

/// Connectors 5 %, at least 2; labels 20 %, staples, pegs, ties and lugs 10 %, tape and other small consumables 15 %.
fn default_waste(role: &str, kind: Option<&str>, net: Decimal) -> (Decimal, String) {
    let percent = |percent: i64| (net * Decimal::new(percent, 2), format!("waste, {percent} %"));
    match (role, kind) {
        ("plug", _) => {
            let five = (net * Decimal::new(5, 2)).ceil();
            (five.max(Decimal::TWO), "waste, 5 % but at least 2 (mis-crimps)".to_owned())
        }
        ("consumable", Some("sealing-tape" | "cover-tape")) => {
            let (metres, rule) = percent(15);
            (metres.round_dp_with_strategy(2, RoundingStrategy::AwayFromZero), rule)
        }
        ("consumable", Some("label")) => whole(percent(20)),
        ("consumable", Some("staple" | "peg" | "uv-tie" | "lug")) => whole(percent(10)),
        ("consumable", _) => whole(percent(15)),
        _ => (Decimal::ZERO, String::new()),
    }
}

fn whole((quantity, rule): (Decimal, String)) -> (Decimal, String) {
    (quantity.ceil(), rule)
}

/// Plugs 10 % but at least 4, one surge device for four but at least 1, one barrel, one hybrid, one termination box for
/// four, one relay for six.
fn default_spare(role: &str, net: Decimal) -> (Decimal, String) {
    let one_for = |n: i64| (net / Decimal::from(n)).floor();
    match role {
        "plug" => {
            let tenth = (net * Decimal::new(1, 1)).ceil();
            (tenth.max(Decimal::from(4)), "spare, 10 % but at least 4".to_owned())
        }
        "surge-device" => (one_for(4).max(Decimal::ONE), "spare, 1 for 4 but at least 1".to_owned()),
        "termination-box" => (one_for(4), "spare, 1 for 4".to_owned()),
        "relay-spdt" | "relay-dpdt" => (one_for(6), "spare, 1 for 6".to_owned()),
        "barrel" | "hybrid-2way" | "hybrid-3way" => (Decimal::ONE, "spare, 1 a site".to_owned()),
        _ => (Decimal::ZERO, String::new()),
    }
}
