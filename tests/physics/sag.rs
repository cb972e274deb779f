//! Sag of wire.

use arraywright::physics::GRAVITY;
use arraywright::physics::sag::{Span, sag_after_warming_m, tension_for_sag};
use arraywright::physics::wire::{Gauge, Material, rated_strength};
use arraywright::units::Force;

use crate::harness::{Answers, Check, computed, walk};

#[test]
fn sag() {
    walk("sag", &[], answer);
}

/// The span of an entry whose forces are `newtons` times its numbers.
fn span(check: &Check, newtons: f64) -> Span {
    Span {
        weight_n_per_m: check.number("weight") * newtons,
        length_m: check.number("span"),
        tension: Force::new(check.number("horizontal_tension") * newtons),
    }
}

fn answer(check: &Check) -> Option<Answers> {
    match check.id.as_str() {
        "sag-cu14-30" | "sag-ccs12-50" | "sag-slack" => Some(level(&span(check, 1.0))),
        "sag-published" => Some(level(&span(check, GRAVITY))),
        "sag-tension-for-sag" => {
            let tension = tension_for_sag(check.number("weight"), check.number("span"), check.number("sag"));
            let strength = rated_strength(Gauge::new(14)?, Material::HardDrawnCopper)?;
            Some(computed([
                ("horizontal_tension_parabola", tension.newtons()),
                ("fraction_of_hard_drawn_strength", tension.newtons() / strength.newtons()),
            ]))
        }
        "sag-unequal" => {
            let span = span(check, 1.0);
            Some(computed([
                ("lowest_point_from_low_support", span.lowest_point_m(check.number("height_difference"))),
                ("midspan_sag_parabola", span.parabola_sag_m()),
            ]))
        }
        "sag-temperature" => {
            let (length, cold) = (check.number("span"), check.number("sag_cold"));
            let hot = sag_after_warming_m(length, cold, check.number("expansion"), check.number("rise"));
            Some(computed([("sag_hot", hot)]))
        }
        _ => None,
    }
}

fn level(span: &Span) -> Answers {
    computed([
        ("sag_parabola", span.parabola_sag_m()),
        ("sag_catenary", span.catenary_sag_m()),
        ("length_catenary", span.catenary_length_m()),
        ("length_parabola", span.parabola_length_m()),
        ("support_tension", span.support_tension().newtons()),
    ])
}
