//! Worked examples.

use std::collections::{BTreeMap, BTreeSet};

use arraywright::physics::control::SharedReturn;
use arraywright::physics::earth::Rod;
use arraywright::physics::earth_set::{rod_factor, set_resistance};
use arraywright::physics::line::wire_over_ground;
use arraywright::physics::noise::{SiteNoise, Stage, cascade_factor, degradation};
use arraywright::physics::phasing::InlinePair;
use arraywright::physics::sag::{Span, bays, extra_length_m, longest_bay_m};
use arraywright::physics::transformer::{impedance_ratio, turns_ratio};
use arraywright::physics::velocity::{FarEnd, VelocityPoints, delay_s, test_frequency};
use arraywright::physics::wire::weight_n_per_m;
use arraywright::units::{
    Current, Decibel, Diameter, ElectricalLength, Force, Frequency, Length, Resistance, Resistivity,
    VelocityFactor, Voltage,
};
use rust_decimal::Decimal;
use rust_decimal::prelude::FromPrimitive;
use serde::Deserialize;

const SCALARS: &str = include_str!("../reference/worked-scalars.toml");

#[derive(Deserialize)]
struct Scalars {
    scalar: Vec<Scalar>,
}

#[derive(Deserialize)]
struct Scalar {
    id: String,
    rel_tol: f64,
    input: BTreeMap<String, f64>,
    expect: BTreeMap<String, f64>,
}

impl Scalar {
    fn get(&self, name: &str) -> f64 {
        *self.input.get(name).unwrap_or_else(|| panic!("{}: no input {name}", self.id))
    }
}

type Results = BTreeMap<&'static str, f64>;

#[test]
#[expect(clippy::print_stdout, reason = "the count belongs in the test's output")]
fn worked_scalars() {
    let scalars = toml::from_str::<Scalars>(SCALARS).expect("the worked examples can be read").scalar;
    let mut compared = 0;
    for scalar in &scalars {
        let results = results(scalar);
        let known: BTreeSet<&str> = results.keys().copied().collect();
        let wanted: BTreeSet<&str> = scalar.expect.keys().map(String::as_str).collect();
        assert_eq!(known, wanted, "{}", scalar.id);
        for (name, wanted) in &scalar.expect {
            let got = results[name.as_str()];
            let allowed = if wanted.abs() > 0.0 { scalar.rel_tol * wanted.abs() } else { 1e-9 };
            assert!((got - wanted).abs() <= allowed, "{} {name}: {got} instead of {wanted}", scalar.id);
            compared += 1;
        }
    }
    println!("worked scalars: {} examples, {compared} values computed", scalars.len());
    assert_eq!(scalars.len(), 8);
}

fn results(scalar: &Scalar) -> Results {
    match scalar.id.as_str() {
        "S01" => longest_bay(scalar),
        "S02" => rods(scalar),
        "S03" => delay_line(scalar),
        "S04" => surge_impedance(scalar),
        "S05" => control_drop(scalar),
        "S06" => noise_budget(scalar),
        "S10" => array_factor(scalar),
        "S11" => front_to_back(scalar),
        other => panic!("no formula for {other}"),
    }
}

fn electrical(metres: f64) -> ElectricalLength {
    ElectricalLength::from_metres(Decimal::from_f64(metres).expect("a finite length"))
}

fn longest_bay(given: &Scalar) -> Results {
    let weight = weight_n_per_m(given.get("density_kg_m3"), given.get("wire_diameter_mm") / 1e3);
    let tension = Force::new(given.get("tension_n"));
    let longest = longest_bay_m(weight, tension, given.get("sag_m"));
    let count = bays(given.get("span_m"), longest);
    let bay = given.get("span_m") / f64::from(count);
    let sag = Span { weight_n_per_m: weight, length_m: bay, tension }.parabola_sag_m();
    Results::from([
        ("weight_n_per_m", weight),
        ("max_bay_m", longest),
        ("bays", f64::from(count)),
        ("bay_m", bay),
        ("sag_at_bay_m", sag),
        ("extra_length_per_bay_m", extra_length_m(bay, sag)),
    ])
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "small positive numbers")]
fn rods(given: &Scalar) -> Results {
    let rod = Rod {
        length: Length::from_metres_nearest(given.get("length_m")),
        diameter: Diameter::from_um((given.get("diameter_mm") * 1e3).round() as i64),
    };
    let count = given.get("rods") as u32;
    assert!((rod_factor(count).expect("tabulated") - given.get("factor")).abs() < 1e-12);
    let one = rod.resistance(Resistivity::new(given.get("rho_ohm_m")));
    let set = set_resistance(one, count).expect("tabulated");
    Results::from([("one_rod_ohm", one.ohms()), ("set_ohm", set.ohms())])
}

fn delay_line(given: &Scalar) -> Results {
    let metres = given.get("electrical_m");
    let frequency = |factor: i64, end| {
        let factor = VelocityFactor::new(Decimal::new(factor, 2)).expect("between 0 and 1");
        let velocity = VelocityPoints::constant(factor);
        let found = test_frequency(electrical(metres), end, Frequency::from_hz(1_830_000), &velocity);
        found.expect("a line with length").frequency.mhz()
    };
    let open = frequency(66, FarEnd::Open);
    assert!((open - frequency(85, FarEnd::Open)).abs() < 1e-12, "the velocity factor drops out");
    Results::from([
        ("open_quarter_wave_mhz", open),
        ("shorted_half_wave_mhz", frequency(66, FarEnd::Shorted)),
        ("delay_ns", delay_s(metres, 1.0) * 1e9),
    ])
}

fn surge_impedance(given: &Scalar) -> Results {
    let z0 = wire_over_ground(given.get("height_m"), given.get("diameter_mm") / 1e3);
    let coax = Resistance::new(given.get("coax_ohm"));
    Results::from([
        ("z0_ohm", z0.ohms()),
        ("ratio", impedance_ratio(z0, coax)),
        ("turns_ratio", turns_ratio(z0, coax)),
    ])
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "a small count")]
fn control_drop(given: &Scalar) -> Results {
    let conductor = given.get("ohm_per_1000ft") / 304.8 * given.get("length_m");
    let cable = SharedReturn {
        conductor: Resistance::new(conductor),
        relay: Current::new(given.get("relay_ma")),
        relays_on: given.get("relays") as u32,
        supply: Voltage::new(given.get("supply_v")),
    };
    Results::from([
        ("conductor_ohm", conductor),
        ("feed_drop_v", cable.feed_drop().volts()),
        ("return_drop_v", cable.return_drop().volts()),
        ("coil_v", cable.coil_voltage().volts()),
    ])
}

fn noise_budget(given: &Scalar) -> Results {
    let db = |name: &str| Decibel::new(given.get(name));
    let site = SiteNoise::QuietRural.median(Frequency::from_hz(1_830_000));
    assert!((site.db() - given.get("fa_db")).abs() < 1e-3, "a quiet rural site at 1.83 MHz");
    let rest = [Stage::passive(db("line_loss_db")), Stage::receiver(db("receiver_nf_db"))];
    let amplifier = Stage { noise_figure: db("preamp_nf_db"), gain: db("preamp_gain_db") };
    let with = [amplifier, rest[0], rest[1]];
    let cost =
        |stages: &[Stage]| degradation(db("fa_db"), db("average_gain_db"), cascade_factor(stages)).db();
    Results::from([("degradation_without_db", cost(&rest)), ("degradation_with_db", cost(&with))])
}

fn array_factor(given: &Scalar) -> Results {
    let spacing = given.get("s_m");
    let frequency = Frequency::from_mhz(given.get("f_mhz"));
    let pair = InlinePair { spacing_m: spacing, delay: electrical(spacing), frequency };
    let raised = InlinePair { delay: electrical(0.94 * spacing), ..pair };
    let (crossfire, in_phase) = (pair.crossfire(1.0), pair.in_phase(1.0));
    Results::from([
        ("ks_deg", pair.spacing_phase().degrees()),
        ("crossfire_forward", crossfire),
        ("crossfire_rear", pair.crossfire(-1.0)),
        ("inphase_forward", in_phase),
        ("inphase_rear", pair.in_phase(-1.0)),
        ("trap_forward", pair.reversed(1.0)),
        ("crossfire_vs_inphase_db", 20.0 * (crossfire / in_phase).log10()),
        (
            "null_elevation_deg_for_d_0_94s",
            raised.null_elevation().expect("a delay below the spacing").degrees(),
        ),
        ("equivalent_front_delay_m", pair.equivalent_front_delay_m()),
    ])
}

fn front_to_back(given: &Scalar) -> Results {
    let spacing = given.get("s_m");
    let frequency = Frequency::from_mhz(given.get("f_mhz"));
    let pair = InlinePair { spacing_m: spacing, delay: electrical(spacing), frequency };
    let with = |db: f64, metres: f64| pair.front_to_back(Decibel::new(db), metres).db();
    Results::from([
        ("fb_0_1db_0_10m", with(0.1, 0.10)),
        ("fb_0_5db_0_366m", with(0.5, 0.366)),
        ("fb_1db_0_366m", with(1.0, 0.366)),
    ])
}
