//! Coaxial line: impedance, delay, loss, exact constants, wrong loads.

use std::f64::consts::TAU;

use arraywright::physics::coax::{
    IdealCoax, LossyCoax, impedance_from_capacitance, velocity_from_capacitance,
};
use arraywright::physics::line::loaded_line;
use arraywright::physics::loss::{LossPoints, LossRate, PowerLoss, TwoTermLoss};
use arraywright::physics::skin::{Conductor, clad_wire, round_wire};
use arraywright::physics::velocity::{
    delay_s, length_of_phase_m, phase_of_length, phase_with_true_factor, wavelength_m,
};
use arraywright::units::{Angle, Frequency, Length, Resistance};

use crate::harness::{Answer, Answers, Check, answers, computed, entry, walk};
use crate::skin::clad;

const CATALOGUE_FIGURE: &str =
    "a catalogue figure of one cable type: data that a catalogue supplies, not a formula";
const MODEL_INPUT: &str = "one of the two points that the model goes through";

const OUTSIDE: [(&str, &str); 4] = [
    ("coax-loss-published-rg-8", CATALOGUE_FIGURE),
    ("coax-loss-published-rg-58", CATALOGUE_FIGURE),
    ("coax-loss-published-rg-59", CATALOGUE_FIGURE),
    ("coax-loss-published-rg-213", CATALOGUE_FIGURE),
];

/// Fit to a measured sample of quad-shield cable with a copper-clad-steel centre, 0.0285 f^0.1506 dB/m (1–30 MHz), as
/// the entries cite it.
const MEASURED_CLAD: PowerLoss = PowerLoss { at_1_mhz: 2.85, exponent: 0.1506 };

#[test]
fn coax() {
    walk("coax", &OUTSIDE, answer);
}

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "coax-z0-from-c-vf" => {
            let capacitance = check.number("capacitance") * 1e-12 / 0.3048;
            let z0 = impedance_from_capacitance(check.number("velocity") / 100.0, capacitance);
            Some(computed([("z0", z0.ohms())]))
        }
        "coax-z0-published-example" => Some(dimensions(check, "inner_radius", "outer_inner_radius")),
        "coax-wavelength-1.8" => Some(wavelengths(check)),
        "coax-cut-tolerance" => Some(cutting(check)),
        "coax-halfwave-published" => Some(delay(check)),
        "coax-loss-published-rg-6" => Some(series_6()),
        "coax-loss-model-rg-6" => Some(model_rg6(check)),
        "coax-loss-rg58-max" => {
            let model = low_model(&entry("coax-loss-model-rg-58"));
            Some(computed([("rg58_max", model.at(check.frequency()).db_per_100ft())]))
        }
        "coax-ccs-field-report" => Some(field_report(check)),
        "coax-loss-units" => {
            let rate = LossRate::from_db_per_100ft(check.number("loss"));
            Some(computed([("loss_metric", rate.db_per_100m()), ("neper_per_m", rate.nepers_per_m())]))
        }
        _ if id.starts_with("coax-z0-") => Some(dimensions(check, "inner_diameter", "outer_inner_diameter")),
        _ if id.starts_with("coax-delay-") => Some(delay(check)),
        _ if id.starts_with("coax-loss-model-") => Some(model_low(check)),
        _ if id.starts_with("coax-jis-") => Some(standard_cable(check)),
        _ if id.starts_with("coax-ccs-measured-") => Some(measured(check)),
        _ if id.starts_with("coax-exact-") => Some(exact(check)),
        _ if id.starts_with("coax-mismatch-") => Some(wrong_load(check)),
        _ => None,
    }
}

fn dimensions(check: &Check, inner: &str, outer: &str) -> Answers {
    // Only the ratio of the two counts, so radii do as well as diameters.
    let coax = IdealCoax {
        inner_diameter_m: check.number(inner) / 1e3,
        outer_diameter_m: check.number(outer) / 1e3,
        permittivity: check.number("er"),
    };
    computed([
        ("z0", coax.impedance().ohms()),
        ("vf", coax.velocity_factor()),
        ("capacitance", coax.capacitance_f_per_m() * 1e12),
        ("inductance", coax.inductance_h_per_m() * 1e9),
    ])
}

fn delay(check: &Check) -> Answers {
    let (vf, f) = (check.number("vf"), check.frequency());
    let length = length_of_phase_m(Angle::from_degrees(check.number("phase")), vf, f);
    computed([
        ("length", length),
        ("length_ft", length / 0.3048),
        ("deg_per_m", phase_of_length(1.0, vf, f).degrees()),
        ("delay", delay_s(length, vf) * 1e9),
    ])
}

fn wavelengths(check: &Check) -> Answers {
    let (vf, f) = (check.number("vf"), check.frequency());
    computed([
        ("wavelength", f.wavelength_m()),
        ("wavelength_cable", wavelength_m(vf, f)),
        ("quarter_wave_cable", length_of_phase_m(Angle::from_degrees(90.0), vf, f)),
    ])
}

fn cutting(check: &Check) -> Answers {
    let (vf, f) = (check.number("vf"), check.frequency());
    let planned = Angle::from_degrees(check.number("line_phase"));
    computed([
        ("phase_error_cut", phase_of_length(check.number("cut_error"), vf, f).degrees()),
        ("phase_with_true_vf", phase_with_true_factor(planned, vf, check.number("vf_true")).degrees()),
    ])
}

fn feet(db_per_100ft: f64) -> LossRate {
    LossRate::from_db_per_100ft(db_per_100ft)
}

fn mhz(mhz: f64) -> Frequency {
    Frequency::from_mhz(mhz)
}

/// The model through losses at 30 and 150 MHz.
fn low_model(check: &Check) -> TwoTermLoss {
    let point = |f: f64, name: &str| (mhz(f), feet(check.number(name)));
    TwoTermLoss::through(point(30.0, "loss_30MHz"), point(150.0, "loss_150MHz")).expect("two good points")
}

fn model_low(check: &Check) -> Answers {
    let model = low_model(check);
    computed([
        ("k1", model.k1 * 0.3048),
        ("k2", model.k2 * 0.3048),
        ("loss_10MHz", model.at(mhz(10.0)).db_per_100ft()),
        ("loss_1.8MHz", model.at(mhz(1.8)).db_per_100ft()),
        ("loss_1.8MHz_metric", model.at(mhz(1.8)).db_per_100m()),
    ])
}

fn rg6_model(check: &Check) -> TwoTermLoss {
    let a = (mhz(check.number("frequency_a")), feet(check.number("loss_a")));
    let b = (mhz(check.number("frequency_b")), feet(check.number("loss_b")));
    TwoTermLoss::through(a, b).expect("two good points")
}

fn model_rg6(check: &Check) -> Answers {
    let model = rg6_model(check);
    computed([
        ("k1", model.k1 * 0.3048),
        ("k2", model.k2 * 0.3048),
        ("loss_57MHz", model.at(mhz(57.0)).db_per_100ft()),
        ("loss_213MHz", model.at(mhz(213.0)).db_per_100ft()),
        ("loss_1.8MHz_if_solid_copper", model.at(mhz(1.8)).db_per_100m()),
    ])
}

/// Published losses at television channels 2 (54–60 MHz) and 13 (210–216 MHz), foretold from those at 950 and 2150 MHz.
fn series_6() -> Answers {
    let model = rg6_model(&entry("coax-loss-model-rg-6"));
    answers([
        ("loss_950MHz", Answer::Outside(MODEL_INPUT)),
        ("loss_2150MHz", Answer::Outside(MODEL_INPUT)),
        ("loss_channel_2", Answer::Computed(model.at(mhz(57.0)).db_per_100ft())),
        ("loss_channel_13", Answer::Computed(model.at(mhz(213.0)).db_per_100ft())),
    ])
}

fn standard_cable(check: &Check) -> Answers {
    let z0 = Resistance::new(check.number("z0"));
    let vf = velocity_from_capacitance(z0, check.number("capacitance") * 1e-12);
    answers([
        ("loss_1MHz", Answer::Outside(CATALOGUE_FIGURE)),
        ("loss_10MHz", Answer::Outside(CATALOGUE_FIGURE)),
        ("loss_200MHz", Answer::Outside(CATALOGUE_FIGURE)),
        ("vf_from_z0_and_c", Answer::Computed(vf)),
    ])
}

/// The ends of the band by the power law; between them by interpolation of the two, which must be the same law.
fn measured(check: &Check) -> Answers {
    let f = check.frequency_mhz();
    let ends = [1.8, 7.1].map(|end| (mhz(end), MEASURED_CLAD.at(mhz(end))));
    let points = LossPoints::new(ends.to_vec()).expect("two good points");
    let loss =
        if ends.iter().any(|end| end.0 == f) { MEASURED_CLAD.at(f) } else { points.at(f).expect("inside") };
    computed([("loss", loss.db_per_100m())])
}

/// 500 m at about 2 MHz, foretold from the measured sample of another cable of the kind.
fn field_report(check: &Check) -> Answers {
    let rate = MEASURED_CLAD.at(mhz(2.0));
    let loss = rate.over(Length::from_metres_nearest(check.number("length")));
    computed([("loss", loss.db()), ("per_100m", rate.db_per_100m())])
}

fn exact(check: &Check) -> Answers {
    let (inner, f) = (check.number("inner_diameter") / 1e3, check.frequency());
    let resistivity = check.number(if check.has("resistivity") { "resistivity" } else { "resistivity_clad" });
    let metal = Conductor { resistivity_ohm_m: resistivity, permeability: 1.0 };
    let coax = LossyCoax {
        shape: IdealCoax {
            inner_diameter_m: inner,
            outer_diameter_m: check.number("outer_inner_diameter") / 1e3,
            permittivity: check.number("er"),
        },
        loss_tangent: if check.has("loss_tangent") { check.number("loss_tangent") } else { 0.0 },
        outer: metal,
    };
    let solid = coax.constants(round_wire(metal, inner / 2.0, f), f);
    let constants = if check.has("clad_thickness") {
        coax.constants(clad_wire(&clad(check, inner / 2.0), f), f)
    } else {
        solid
    };
    let line = constants.line;
    computed([
        ("vf", line.velocity_factor(f)),
        ("vf_over_vf_infinite", line.velocity_factor(f) / coax.shape.velocity_factor()),
        ("loss", line.loss().db_per_100m()),
        ("loss_ratio_to_solid", line.gamma.re / solid.line.gamma.re),
        ("z0_re", line.impedance.re),
        ("z0_im", line.impedance.im),
        ("r", constants.series.re),
        ("l_total", constants.series.im / (TAU * f.mhz() * 1e6) * 1e9),
    ])
}

fn wrong_load(check: &Check) -> Answers {
    let ohms = |name| Resistance::new(check.number(name));
    let length = check.number("electrical_length");
    let transfer = loaded_line(ohms("z0"), ohms("z_load"), Angle::from_degrees(length));
    computed([
        ("phase", transfer.phase.degrees()),
        ("phase_error", transfer.phase.degrees() + length),
        ("magnitude", transfer.magnitude),
    ])
}
