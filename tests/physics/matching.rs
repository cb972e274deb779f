//! Transformers, reflection, combiners, chokes.

use arraywright::physics::combiner::{
    amplitude_error_null, dead_input_change, hybrid, phase_error_loss, phase_error_null, unequal_wilkinson,
    wilkinson, wilkinson_response,
};
use arraywright::physics::line::input_impedance;
use arraywright::physics::matching::{Reflection, choke_reduction, shunted};
use arraywright::physics::transformer::{InductanceIndex, best_turns, impedance_ratio, turns_ratio};
use arraywright::physics::velocity::length_of_phase_m;
use arraywright::units::{Angle, Decibel, Resistance};
use num_complex::Complex64;

use crate::harness::{Answers, Check, computed, walk};

#[test]
fn matching() {
    walk("matching", &[], answer);
}

fn ohms(check: &Check, name: &str) -> Resistance {
    Resistance::new(check.number(name))
}

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "match-integer-turns-450-75" => whole_turns(check),
        "match-al-units" => {
            let index = InductanceIndex::from_uh_per_turn2(check.number("inductance_index"));
            Some(computed([
                ("nH_per_turn2", index.nh_per_turn2()),
                ("uH_per_100_turns", index.uh_per_100_turns()),
                ("mH_per_1000_turns", index.mh_per_1000_turns()),
            ]))
        }
        "match-winding-reactance" => {
            let index = InductanceIndex::from_nh_per_turn2(check.number("a_l"));
            let turns = check.count("turns");
            let reactance = index.reactance_ohm(turns, check.frequency());
            Some(computed([("inductance", index.inductance_h(turns) * 1e6), ("reactance", reactance)]))
        }
        "match-shunt-l-effect" => {
            let z = shunted(Complex64::from(check.number("z")), check.number("x_shunt"));
            Some(reflection(Reflection::of(z, ohms(check, "z"))))
        }
        "match-rl-20" => {
            let given = Decibel::new(check.number("return_loss"));
            Some(reflection(Reflection::from_return_loss(given)))
        }
        "match-input-z-complex" => {
            let load = Complex64::new(check.number("z_load_re"), check.number("z_load_im"));
            let length = Angle::from_degrees(check.number("electrical_length"));
            let z = input_impedance(ohms(check, "z0"), load, length);
            Some(computed([("z_in_re", z.re), ("z_in_im", z.im)]))
        }
        "match-choke" => {
            let choke = Complex64::from(check.number("z_choke_r"));
            let path = Complex64::from(check.number("z_path"));
            Some(computed([("current_reduction", choke_reduction(choke, path).db())]))
        }
        _ if id.starts_with("match-turns-") => {
            let (high, low) = (ohms(check, "z_high"), ohms(check, "z_low"));
            let ratio = impedance_ratio(high, low);
            Some(computed([("impedance_ratio", ratio), ("turns_ratio", turns_ratio(high, low))]))
        }
        _ if id.starts_with("match-vswr-") => {
            let load = Complex64::from(check.number("z_load"));
            Some(reflection(Reflection::of(load, ohms(check, "z0"))))
        }
        _ => combiners(check),
    }
}

fn combiners(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "match-magic-t" => Some(hybrid_parts(check)),
        "match-null-amplitude" => {
            let error = Decibel::new(check.number("amplitude_error"));
            Some(computed([("null_depth", amplitude_error_null(error).db())]))
        }
        "match-combiner-noise" => {
            let change = dead_input_change(check.count("inputs"), check.count("dead_inputs"));
            Some(computed([("signal_change", change.db())]))
        }
        _ if id.starts_with("match-wilkinson-") => dividers(check),
        _ if id.starts_with("match-combine-phase-") => {
            let error = Angle::from_degrees(check.number("phase_error"));
            Some(computed([
                ("loss", phase_error_loss(error).db()),
                ("null_depth_when_opposed", phase_error_null(error).db()),
            ]))
        }
        _ => None,
    }
}

fn reflection(reflection: Reflection) -> Answers {
    computed([
        ("gamma_abs", reflection.magnitude()),
        ("vswr", reflection.swr()),
        ("return_loss", reflection.return_loss().db()),
        ("mismatch_loss", reflection.mismatch_loss().db()),
    ])
}

fn whole_turns(check: &Check) -> Option<Answers> {
    let (high, low) = (ohms(check, "z_high"), ohms(check, "z_low"));
    let best = best_turns(high, low, check.count("max_low_turns"))?;
    Some(computed([
        ("low_turns", f64::from(best.low)),
        ("high_turns", f64::from(best.high)),
        ("transformed_low_to_high", best.transformed.ohms()),
        ("vswr", best.swr),
    ]))
}

fn hybrid_parts(check: &Check) -> Answers {
    let parts = hybrid(ohms(check, "z0_inputs"));
    computed([
        ("sum_port", parts.sum_port.ohms()),
        ("difference_resistor", parts.balancing_resistor.ohms()),
        ("step_up_impedance_ratio", parts.step_up_impedance_ratio),
        ("step_up_turns_ratio", parts.step_up_turns_ratio),
    ])
}

fn dividers(check: &Check) -> Option<Answers> {
    if check.has("frequency_ratio") {
        let response = wilkinson_response(check.number("frequency_ratio"))?;
        return Some(computed([
            ("s21", response.transmission.db()),
            ("isolation", response.isolation.db()),
            ("return_loss_sum", response.sum_return_loss.db()),
            ("return_loss_branch", response.branch_return_loss.db()),
        ]));
    }
    let z0 = ohms(check, "z0");
    if check.has("power_ratio_k2") {
        let parts = unequal_wilkinson(z0, check.number("power_ratio_k2"));
        assert!(
            (parts.strong_line.ohms() - parts.weak_line.ohms()).abs() < 1e-9,
            "an equal split has equal lines"
        );
        return Some(computed([("line_z0", parts.strong_line.ohms()), ("resistor", parts.resistor.ohms())]));
    }
    let parts = wilkinson(z0, check.count("ways"));
    let mut answers = computed([
        ("line_z0", parts.line.ohms()),
        ("star_resistor", parts.star_resistor.ohms()),
        ("split_loss", parts.split_loss.db()),
    ]);
    if let Some(resistor) = parts.between_resistor {
        let quarter = Angle::from_degrees(90.0);
        let length = length_of_phase_m(quarter, check.number("vf"), check.frequency());
        answers.extend(computed([("resistor", resistor.ohms()), ("line_length", length)]));
    }
    Some(answers)
}
