//! Skin effect.

use std::f64::consts::{PI, TAU};

use arraywright::physics::skin::{
    CladWire, Conductor, clad_wire, resistance_ratio, round_wire, thin_skin_ohm_per_m,
};

use crate::harness::{Answer, Answers, Check, computed, walk};

#[test]
fn skin() {
    walk("skin", &[], answer);
}

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    if id.starts_with("skin-depth-cu-") {
        let metal =
            Conductor { resistivity_ohm_m: check.number("resistivity"), permeability: check.number("mu_r") };
        Some(computed([("skin_depth", 1e6 * metal.skin_depth_m(check.frequency()))]))
    } else if id.starts_with("skin-ccs-") {
        let wire = clad(check, check.number("diameter") / 2e3);
        let z = clad_wire(&wire, check.frequency());
        let solid = round_wire(wire.cladding, wire.radius_m, check.frequency());
        Some(computed([("r_ac", z.re), ("x_internal", z.im), ("ratio_to_solid_copper", z.re / solid.re)]))
    } else if id == "skin-ratio-table" {
        let ratio = |x: f64| (format!("ratio_x{x:.0}"), Answer::Computed(resistance_ratio(x)));
        Some(check.list("x").into_iter().map(ratio).collect())
    } else if id == "skin-neher-mcgrath" {
        Some(computed([("ratio", resistance_ratio(check.number("x")))]))
    } else if check.has("diameter") && check.has("resistivity") {
        Some(solid(check))
    } else {
        None
    }
}

/// The clad wire of an entry with the given outer radius.
pub(crate) fn clad(check: &Check, radius_m: f64) -> CladWire {
    CladWire {
        core: Conductor {
            resistivity_ohm_m: check.number("resistivity_core"),
            permeability: check.number("mu_r_core"),
        },
        core_radius_m: radius_m - check.number("clad_thickness") / 1e3,
        cladding: Conductor { resistivity_ohm_m: check.number("resistivity_clad"), permeability: 1.0 },
        radius_m,
    }
}

fn solid(check: &Check) -> Answers {
    let metal = Conductor { resistivity_ohm_m: check.number("resistivity"), permeability: 1.0 };
    let radius = check.number("diameter") / 2e3;
    let f = check.frequency();
    let z = round_wire(metal, radius, f);
    let direct = metal.resistivity_ohm_m / (PI * radius * radius);
    computed([
        ("r_ac", z.re),
        ("x_internal", z.im),
        ("l_internal", z.im / (TAU * f.mhz() * 1e6) * 1e9),
        ("rac_over_rdc", z.re / direct),
        ("r_thin_skin", thin_skin_ohm_per_m(metal, radius, f)),
    ])
}
