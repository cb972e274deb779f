//! Gauge, material, resistance, mass, strength.

use arraywright::physics::wire::{
    CladCentre, Gauge, Material, area_m2, mass_kg_per_m, rated_strength, resistance_at_temperature,
    resistance_ohm_per_m,
};

use crate::harness::{Answer, Answers, Check, answers, computed, walk};

/// 1000 ft in metres.
const KFT: f64 = 304.8;
const LB_KG: f64 = 0.453_592_37;
const LBF_N: f64 = 4.448_221_615_260_5;

#[test]
fn wire() {
    walk("wire", &[], answer);
}

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "wire-awg-aught" => {
            let diameter = Gauge::parse(check.text("awg")).ok()?.diameter_m();
            assert_eq!(Gauge::parse("0000"), Gauge::parse(check.text("awg")));
            Some(computed([("diameter", diameter / 0.0254), ("diameter_mm", diameter * 1e3)]))
        }
        "wire-awg-step3" => {
            let area = |name| Some(Gauge::new(check.whole(name))?.area_m2());
            Some(computed([("area_ratio", area("awg_b")? / area("awg_a")?)]))
        }
        "wire-ccs-resistivity" => Some(clad_grades()),
        _ if id.starts_with("wire-awg") => drawn(check, Material::AnnealedCopper),
        _ if id.starts_with("wire-alu-") => drawn(check, Material::Aluminium),
        _ if id.starts_with("wire-table-") => printed_row(check),
        _ if id.starts_with("wire-ccs-awg") => clad_wire(check),
        _ if id.starts_with("wire-ccs21-") => {
            let wire = CladCentre::of_diameter(check.number("diameter") * 0.0254)?;
            Some(answers([
                ("max_resistance", Answer::Tabulated(wire.max_resistance_ohm_per_m * KFT)),
                ("ratio_to_copper", Answer::Computed(wire.ratio_to_copper())),
            ]))
        }
        _ if id.starts_with("wire-copper-temper-") => tempers(check),
        _ if id.starts_with("wire-iec60228-") => {
            let diameter = (4.0 * check.number("nominal_area") * 1e-6 / std::f64::consts::PI).sqrt();
            Some(computed([(
                "max_resistance",
                1e3 * resistance_ohm_per_m(Material::AnnealedCopper, diameter),
            )]))
        }
        _ if id.starts_with("wire-temp-copper-") => {
            let alpha = check.number("alpha20");
            assert!((alpha - Material::AnnealedCopper.temperature_coefficient_per_k()).abs() < 1e-12);
            Some(computed([("ratio_to_20C", resistance_at_temperature(alpha, check.number("temperature")))]))
        }
        _ => None,
    }
}

/// A solid wire by its formulas.
fn drawn(check: &Check, material: Material) -> Option<Answers> {
    let gauge = Gauge::new(check.whole("awg"))?;
    let diameter = gauge.diameter_m();
    let resistance = resistance_ohm_per_m(material, diameter);
    Some(computed([
        ("diameter", diameter * 1e3),
        ("area", area_m2(diameter) * 1e6),
        ("resistance", resistance * 1e3),
        ("resistance_per_kft", resistance * KFT),
        ("mass", 1e3 * mass_kg_per_m(material.density_kg_per_m3(), diameter)),
    ]))
}

/// A row of a printed table, in inches and circular mils.
fn printed_row(check: &Check) -> Option<Answers> {
    let gauge = Gauge::new(check.whole("awg"))?;
    let resistance = resistance_ohm_per_m(Material::AnnealedCopper, gauge.diameter_m());
    Some(computed([
        ("diameter", gauge.diameter_m() / 0.0254),
        ("area", gauge.circular_mils()),
        ("resistance_per_kft", resistance * KFT),
    ]))
}

fn clad_wire(check: &Check) -> Option<Answers> {
    let gauge = Gauge::new(check.whole("awg"))?;
    let resistance = |material| Answer::Computed(KFT * resistance_ohm_per_m(material, gauge.diameter_m()));
    let strength = |material| Some(Answer::Tabulated(rated_strength(gauge, material)?.newtons() / LBF_N));
    let density = Material::CopperCladSteel40.density_kg_per_m3();
    Some(answers([
        ("resistance_40pct", resistance(Material::CopperCladSteel40)),
        ("resistance_30pct", resistance(Material::CopperCladSteel30)),
        ("mass", Answer::Computed(KFT / LB_KG * mass_kg_per_m(density, gauge.diameter_m()))),
        ("breaking_load_40pct", strength(Material::CopperCladSteel40)?),
        ("breaking_load_30pct", strength(Material::CopperCladSteel30)?),
    ]))
}

fn clad_grades() -> Answers {
    let (forty, thirty) = (Material::CopperCladSteel40, Material::CopperCladSteel30);
    answers([
        ("resistivity_40pct", Answer::Tabulated(1e6 * forty.resistivity_ohm_m())),
        ("resistivity_30pct", Answer::Tabulated(1e6 * thirty.resistivity_ohm_m())),
        ("iacs_40pct", Answer::Computed(forty.percent_iacs())),
        ("iacs_30pct", Answer::Computed(thirty.percent_iacs())),
    ])
}

fn tempers(check: &Check) -> Option<Answers> {
    let gauge = Gauge::new(check.whole("awg"))?;
    let resistance = |material| Answer::Computed(KFT * resistance_ohm_per_m(material, gauge.diameter_m()));
    let strength = |material| Some(Answer::Tabulated(rated_strength(gauge, material)?.newtons() / LBF_N));
    Some(answers([
        ("strength_hard", strength(Material::HardDrawnCopper)?),
        ("strength_medium_hard", strength(Material::MediumHardCopper)?),
        ("strength_soft", strength(Material::AnnealedCopper)?),
        ("resistance_hard", resistance(Material::HardDrawnCopper)),
        ("resistance_medium_hard", resistance(Material::MediumHardCopper)),
        ("resistance_soft", resistance(Material::AnnealedCopper)),
    ]))
}
