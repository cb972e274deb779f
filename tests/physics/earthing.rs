//! Earth electrodes.

use arraywright::physics::earth::{Rod, buried_ring, buried_wire, four_electrode_resistivity};
use arraywright::physics::earth_set::{array_resistance, rod_factor};
use arraywright::units::{Diameter, Length, Resistance, Resistivity};

use crate::harness::{Answer, Answers, Check, computed, walk};

const SOIL_TABLE: &str = "printed ranges of soils by name: the program takes a measured resistivity or one of its four \
                          classes and carries no such table";

const OUTSIDE: [(&str, &str); 7] = [
    ("earth-soil-ashes-cinders-brine", SOIL_TABLE),
    ("earth-soil-clay-shale-gumbo-loam", SOIL_TABLE),
    ("earth-soil-same-with-sand-gravel", SOIL_TABLE),
    ("earth-soil-gravel-sand-stones", SOIL_TABLE),
    ("earth-soil2-boggy", SOIL_TABLE),
    ("earth-soil2-silt-humus", SOIL_TABLE),
    ("earth-soil2-sand-moist", SOIL_TABLE),
];

#[test]
fn earthing() {
    walk("earthing", &OUTSIDE, answer);
}

fn metres(metres: f64) -> Length {
    Length::from_metres_nearest(metres)
}

#[expect(clippy::cast_possible_truncation, reason = "diameters are small")]
fn diameter(metres: f64) -> Diameter {
    Diameter::from_um((metres * 1e6).round() as i64)
}

fn soil(check: &Check) -> Resistivity {
    Resistivity::new(check.number("resistivity"))
}

/// The rod of an entry that gives a diameter or a radius.
fn rod(check: &Check) -> Rod {
    let across = if check.has("diameter") { check.number("diameter") } else { 2.0 * check.number("radius") };
    Rod { length: metres(check.number("length")), diameter: diameter(across) }
}

/// The handbook's rod: 10 ft by 3/4 in.
const HANDBOOK_ROD: Rod = Rod { length: Length::from_mm(3048), diameter: Diameter::from_um(19_050) };

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "earth-mil419-26rods" => perimeter(check),
        "earth-mil419-square" => {
            let spacing = check.number("spacing_over_length") * HANDBOOK_ROD.length.metres();
            let factor = square_factor(HANDBOOK_ROD, Resistivity::new(100.0), spacing)?.1;
            Some(computed([("factor_times_1_over_n", factor)]))
        }
        "earth-5x5-method-of-moments" => {
            let (resistance, factor) = square_factor(rod(check), soil(check), check.number("spacing"))?;
            Some(computed([("resistance", resistance), ("factor_times_1_over_n", factor)]))
        }
        "earth-mil419-wenner" => {
            let measured = Resistance::new(check.number("resistance"));
            let rho = four_electrode_resistivity(measured, metres(check.number("spacing"))).ohm_metres();
            Some(computed([("resistivity", rho), ("handbook_value", rho)]))
        }
        "earth-pair-published" => {
            let single = rod(check).resistance(soil(check)).ohms();
            let pair = rod(check).pair_resistance(soil(check), metres(check.number("spacing"))).ohms();
            Some(computed([("single", single), ("pair_over_single", pair / single)]))
        }
        "earth-ieee142-multipliers" => {
            let row = |n: u32| Some((format!("F_{n}"), Answer::Tabulated(rod_factor(n)?)));
            [2, 3, 4, 8, 12, 16, 20, 24].into_iter().map(row).collect()
        }
        "earth-buried-wire" => {
            let across = diameter(2.0 * check.number("radius"));
            let total = metres(check.number("total_length"));
            let resistance = buried_wire(soil(check), total, across, metres(check.number("depth")));
            Some(computed([("resistance", resistance.ohms())]))
        }
        "earth-ring" => {
            let across = diameter(check.number("wire_diameter"));
            let ring = metres(check.number("ring_diameter"));
            let resistance = buried_ring(soil(check), ring, across, metres(check.number("depth")));
            Some(computed([("resistance", resistance.ohms())]))
        }
        _ if id.starts_with("earth-two-rods-") => {
            let pair = rod(check).pair_resistance(soil(check), metres(check.number("spacing"))).ohms();
            let single = rod(check).resistance(soil(check)).ohms();
            Some(computed([("resistance", pair), ("ratio_to_single", pair / single)]))
        }
        _ if id.starts_with("earth-rod-") || id == "earth-mil419-rod" => {
            Some(computed([("resistance", rod(check).resistance(soil(check)).ohms())]))
        }
        _ => None,
    }
}

/// Five by five rods: their resistance, and the factor against a twenty-fifth of one rod.
fn square_factor(rod: Rod, soil: Resistivity, spacing_m: f64) -> Option<(f64, f64)> {
    let step = metres(spacing_m);
    let places: Vec<_> = (0..25).map(|place| (step * (place % 5), step * (place / 5))).collect();
    let together = array_resistance(rod, soil, &places)?.ohms();
    let one = array_resistance(rod, soil, &places[..1])?.ohms();
    Some((together, together / one * 25.0))
}

/// 26 rods 20 ft apart, scaled to the handbook's reading for one rod.
///
/// The handbook reads a figure that by its own words is for rods "in a straight line or around the perimeter of a site
/// whose dimensions are large", so the straight line is what is computed. Rods round its rectangle of 100 by 160 ft lie
/// closer to each other: there the method gives 1.94 ohms, a tenth above the figure.
fn perimeter(check: &Check) -> Option<Answers> {
    let step = |n: i64| Length::from_mm(6096) * n;
    let rods = i64::from(check.whole("rods"));
    let line: Vec<_> = (0..rods).map(|n| (step(n), Length::ZERO)).collect();
    let round: Vec<_> = (0..rods)
        .map(|n| match n {
            0..8 => (step(n), step(0)),
            8..13 => (step(8), step(n - 8)),
            13..21 => (step(21 - n), step(5)),
            _ => (step(0), step(26 - n)),
        })
        .collect();
    let soil = Resistivity::new(100.0);
    let one = array_resistance(HANDBOOK_ROD, soil, &line[..1])?.ohms();
    let scaled = |places: &[(Length, Length)]| {
        Some(array_resistance(HANDBOOK_ROD, soil, places)?.ohms() / one * check.number("resistance_single"))
    };
    assert!((scaled(&round)? - 1.94).abs() < 0.005);
    Some(computed([("resistance", scaled(&line)?)]))
}
