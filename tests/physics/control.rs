//! Control cable.

use arraywright::physics::control::Loop;
use arraywright::physics::wire::{Gauge, Material, resistance_ohm_per_m, resistance_over_copper};
use arraywright::units::{Resistance, Voltage};

use crate::harness::{Answers, Check, computed, walk};

#[test]
fn control_cable() {
    walk("control cable", &[], answer);
}

fn cable(check: &Check) -> Loop {
    Loop {
        conductor_ohm_per_m: check.number("resistance_per_m"),
        length_m: if check.has("length") { check.number("length") } else { 0.0 },
        pairs: if check.has("pairs_in_parallel") { check.count("pairs_in_parallel") } else { 1 },
        supply: Voltage::new(check.number("supply")),
        load: Resistance::new(check.number("load_resistance")),
    }
}

fn answer(check: &Check) -> Option<Answers> {
    match check.id.as_str() {
        "control-24-1pair" | "control-24-2pair" | "control-22-4relays" => {
            let cable = cable(check);
            Some(computed([
                ("loop_resistance", cable.resistance().ohms()),
                ("load_voltage", cable.load_voltage().volts()),
                ("current", cable.current().milliamperes()),
                ("drop_percent", cable.drop_percent()),
            ]))
        }
        "control-pull-in" => {
            let longest = cable(check).longest_m(Voltage::new(check.number("minimum_voltage")));
            Some(computed([("max_length", longest)]))
        }
        // Nominal 24 AWG copper must lie under the limit.
        "control-tia-loop" => {
            let per_metre = resistance_ohm_per_m(Material::AnnealedCopper, Gauge::new(24)?.diameter_m());
            Some(computed([("conductor_max", per_metre * check.number("length"))]))
        }
        "control-copper-clad-aluminium" => {
            Some(computed([("resistance_ratio", resistance_over_copper(check.number("conductivity")))]))
        }
        _ => None,
    }
}
