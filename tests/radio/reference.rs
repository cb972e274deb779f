//! Ground, low wires as lines and array geometry against tests/reference/radio-values.toml (provenance and citation
//! stand beside every entry there).

use std::collections::BTreeMap;

use arraywright::radio::{
    LineTerms, Position, RadioElement, Response, Soil, line_terms, penetration_depth_m,
    perfect_ground_impedance_ohm, reflection, turned_to, two_wire_impedance_ohm, wave_tilt,
};
use arraywright::units::{
    Angle, Conductivity, Diameter, ElectricalLength, Frequency, Length, VelocityFactor,
};
use num_complex::Complex64;
use rust_decimal::Decimal;
use serde::Deserialize;

use crate::pattern_cases::Differences;
use crate::support::{equal, vertical};

#[derive(Deserialize)]
struct File {
    check: Vec<Check>,
}

#[derive(Deserialize)]
struct Check {
    id: String,
    inputs: Vec<Quantity>,
    expected: Vec<Expected>,
}

#[derive(Deserialize)]
struct Quantity {
    name: String,
    value: f64,
    unit: String,
}

#[derive(Deserialize)]
struct Expected {
    name: String,
    value: f64,
    tol_rel: Option<f64>,
    tol_abs: Option<f64>,
}

impl Check {
    /// An input in its own unit.
    fn input(&self, name: &str) -> f64 {
        self.inputs
            .iter()
            .find(|input| input.name == name)
            .unwrap_or_else(|| panic!("{}: {name}", self.id))
            .value
    }

    /// An input length in metres without rounding.
    fn metres(&self, name: &str) -> f64 {
        let input = self.inputs.iter().find(|input| input.name == name).expect("a length");
        match input.unit.as_str() {
            "m" => input.value,
            "ft" => input.value * 0.3048,
            "in" => input.value * 0.0254,
            unit => panic!("{}: unit {unit}", self.id),
        }
    }

    fn has(&self, name: &str) -> bool {
        self.inputs.iter().any(|input| input.name == name)
    }

    fn length(&self, name: &str) -> Length {
        let input = self.inputs.iter().find(|input| input.name == name).expect("a length");
        Length::parse(&format!("{} {}", input.value, input.unit)).expect("a length with its unit")
    }

    fn diameter(&self) -> Diameter {
        let input = self.inputs.iter().find(|input| input.name == "diameter").expect("a diameter");
        Diameter::parse(&format!("{} {}", input.value, input.unit)).expect("a diameter with its unit")
    }

    fn frequency(&self) -> Frequency {
        Frequency::from_mhz(self.input("frequency") / 1e6)
    }

    fn soil(&self) -> Soil {
        Soil::Real {
            conductivity: Conductivity::new(self.input("sigma") * 1000.0),
            permittivity: self.input("er"),
        }
    }
}

fn checks() -> Vec<Check> {
    let file: File =
        toml::from_str(include_str!("../reference/radio-values.toml")).expect("the table parses");
    file.check
}

#[test]
fn every_entry_is_met() {
    let mut differences = Differences::default();
    let mut rows = 0;
    for check in checks() {
        let found = figures(&check);
        for wanted in &check.expected {
            let value =
                *found.get(wanted.name.as_str()).unwrap_or_else(|| panic!("{}: {}", check.id, wanted.name));
            let tolerance =
                wanted.tol_abs.unwrap_or_else(|| wanted.tol_rel.expect("a tolerance") * wanted.value.abs());
            differences.check(&format!("{} {}", check.id, wanted.name), value, wanted.value, tolerance);
            rows += 1;
        }
    }
    assert!(rows > 60, "only {rows} rows");
    differences.none();
}

/// The figures that an entry asks for, by name.
fn figures(check: &Check) -> BTreeMap<&'static str, f64> {
    let id = check.id.as_str();
    if id.starts_with("ground-fresnel") || id == "ground-brewster-lossless" {
        fresnel(check)
    } else if id.starts_with("ground-") {
        soil(check)
    } else if id.starts_with("lowwire-carson") || id.starts_with("lowwire-with") {
        lossy_line(check)
    } else if id.starts_with("lowwire-") {
        lossless_line(check)
    } else {
        geometry(check)
    }
}

/// The size of the vertical reflection at an elevation in degrees.
fn rv(n2: Complex64, elevation_deg: f64) -> f64 {
    reflection(Some(n2), (90.0 - elevation_deg).to_radians()).vertical.norm()
}

/// The elevation of its minimum by golden-section search between 0.01 and 60°.
fn pseudo_brewster_deg(n2: Complex64) -> f64 {
    let golden = f64::midpoint(5_f64.sqrt(), -1.0);
    let (mut low, mut high) = (0.01, 60.0);
    for _ in 0..100 {
        let (a, b) = (high - golden * (high - low), low + golden * (high - low));
        if rv(n2, a) < rv(n2, b) { high = b } else { low = a }
    }
    f64::midpoint(low, high)
}

fn soil(check: &Check) -> BTreeMap<&'static str, f64> {
    let (soil, frequency) = (check.soil(), check.frequency());
    let n2 = soil.index_squared(frequency).expect("real soil");
    let (depth, tilt) =
        (penetration_depth_m(soil, frequency).expect("real"), wave_tilt(soil, frequency).expect("real"));
    let brewster = pseudo_brewster_deg(n2);
    BTreeMap::from([
        ("eps_im", -n2.im),
        ("skin_depth", depth),
        ("attenuation", 20.0 / std::f64::consts::LN_10 / depth),
        ("pseudo_brewster_elevation", brewster),
        ("rv_min", rv(n2, brewster)),
        ("wave_tilt_abs", tilt.norm()),
        ("wave_tilt_phase", tilt.arg().to_degrees()),
        ("n_re", n2.sqrt().re),
    ])
}

fn fresnel(check: &Check) -> BTreeMap<&'static str, f64> {
    let frequency = if check.has("frequency") { check.frequency() } else { Frequency::from_mhz(1.0) };
    let n2 = check.soil().index_squared(frequency).expect("real soil");
    if !check.has("elevation") {
        let brewster = (1.0 / n2.re.sqrt()).atan().to_degrees();
        return BTreeMap::from([("brewster_elevation", brewster), ("rv_abs", rv(n2, brewster))]);
    }
    let found = reflection(Some(n2), (90.0 - check.input("elevation")).to_radians());
    BTreeMap::from([
        ("rv_abs", found.vertical.norm()),
        ("rv_phase", found.vertical.arg().to_degrees()),
        ("rh_abs", found.horizontal.norm()),
        ("rh_phase", found.horizontal.arg().to_degrees()),
        ("rv_re", found.vertical.re),
        ("rh_re", found.horizontal.re),
    ])
}

/// The exact forms; the decimal-logarithm forms of the table are the rounded ones, 138 for 138.06 and 276 for 276.1.
fn lossless_line(check: &Check) -> BTreeMap<&'static str, f64> {
    let diameter = check.diameter();
    let wide = check.metres("diameter");
    if check.has("spacing") {
        let spacing = check.length("spacing");
        let rounded = 276.0 * (2.0 * check.metres("spacing") / wide).log10();
        return BTreeMap::from([
            ("z0_exact", two_wire_impedance_ohm(spacing, diameter)),
            ("z0_log10", rounded),
        ]);
    }
    let height = check.length("height");
    let exact = perfect_ground_impedance_ohm(height, diameter);
    let rounded = 138.0 * (4.0 * check.metres("height") / wide).log10();
    assert!((exact / rounded - 1.0).abs() < 5e-4, "{}: {exact} against {rounded}", check.id);
    let mixed = rounded - 138.0 * 12_f64.log10();
    BTreeMap::from([
        ("z0_exact", exact),
        ("z0_log10", rounded),
        ("z0_correct", rounded),
        ("z0_wrong_mixed_units", mixed),
    ])
}

/// The line over soil with the table's own integral in place of the logarithmic form, which must lie close to it.
fn lossy_line(check: &Check) -> BTreeMap<&'static str, f64> {
    let frequency = check.frequency();
    let permittivity = if check.has("er") { check.input("er") } else { 1.0 };
    let soil = Soil::Real { conductivity: Conductivity::new(check.input("sigma") * 1000.0), permittivity };
    let (height, radius) = (check.input("height"), check.input("diameter") / 2.0);
    let terms = line_terms(frequency, soil.index_squared(frequency), height, radius);
    let part = |name: &str| check.expected.iter().find(|row| row.name == name).expect("the integral").value;
    let integral = Complex64::new(part("integral_re"), part("integral_im"));
    let logarithmic = terms.earth_impedance / 2.0;
    assert!((logarithmic / integral - 1.0).norm() < 0.03, "{}: {logarithmic} against {integral}", check.id);
    let exact = LineTerms {
        geometry: terms.geometry,
        earth_impedance: 2.0 * integral,
        earth_potential: Complex64::ZERO,
        conductor: Complex64::ZERO,
    };
    let line = exact.constants(frequency);
    let quadrature = earth_integral(frequency, soil, height);
    BTreeMap::from([
        ("integral_re", quadrature.re),
        ("integral_im", quadrature.im),
        ("z0_re", line.impedance.re),
        ("z0_im", line.impedance.im),
        ("attenuation", line.attenuation_db_per_100m()),
        ("vf", line.velocity_factor(frequency)),
    ])
}

/// J = ∫ e^{−2hx}/(x + √(x² + q²)) dx with q² = k²(1 − n²), by the substitution 2hx = u² and Simpson's rule.
fn earth_integral(frequency: Frequency, soil: Soil, height_m: f64) -> Complex64 {
    const INTERVALS: u32 = 4000;
    let n2 = soil.index_squared(frequency).expect("real soil");
    let scaled = (1.0 - n2) * frequency.wavenumber().powi(2) * 4.0 * height_m * height_m;
    let step = 40_f64.sqrt() / f64::from(INTERVALS);
    (0..=INTERVALS)
        .map(|i| {
            let u = f64::from(i) * step;
            let weight = match (i, i % 2) {
                (0 | INTERVALS, _) => 1.0,
                (_, 1) => 4.0,
                _ => 2.0,
            };
            weight * step / 3.0 * 2.0 * u * (-u * u).exp() / (u * u + (u.powi(4) + scaled).sqrt())
        })
        .sum()
}

fn apart(a: &RadioElement, b: &RadioElement) -> f64 {
    (a.position.forward_m - b.position.forward_m).hypot(a.position.right_m - b.position.right_m)
}

fn geometry(check: &Check) -> BTreeMap<&'static str, f64> {
    match check.id.as_str() {
        "array-endfire-phase" => {
            let spacing =
                ElectricalLength::from_metres(Decimal::try_from(check.input("spacing")).expect("decimal"));
            let horizon = spacing.degrees(check.frequency());
            let raised = horizon * check.input("elevation").to_radians().cos();
            BTreeMap::from([("spacing_phase_horizon", horizon), ("spacing_phase_at_elevation", raised)])
        }
        "array-broadside-null" => BTreeMap::from([("null_azimuth_off_boresight", broadside_null_deg(check))]),
        "array-echelon-delay" => {
            let delay =
                ElectricalLength::from_metres(Decimal::try_from(check.input("stagger")).expect("decimal"));
            let vf =
                VelocityFactor::new(Decimal::try_from(check.input("vf")).expect("decimal")).expect("below 1");
            let physical = delay.physical(vf).metres();
            BTreeMap::from([("phase", delay.degrees(check.frequency())), ("line_length", physical)])
        }
        "array-echelon-coordinates" => {
            let second = vertical(check.input("stagger"), -check.input("lateral"), 6.0);
            // seen from a heading of north, the array that looks at the bearing is turned anticlockwise by it
            let seen = turned_to(&[second], Angle::from_degrees(-check.input("bearing")))[0];
            let Position { forward_m: north, right_m: east } = seen.position;
            BTreeMap::from([("east", east), ("north", north), ("separation", east.hypot(north))])
        }
        _ => ring(check),
    }
}

/// Chords between elements of a ring, made by turning one element about the centre.
fn ring(check: &Check) -> BTreeMap<&'static str, f64> {
    let count = check.input("elements");
    let first = [vertical(check.input("radius"), 0.0, 6.0)];
    let step = 360.0 / count;
    let after = |steps: f64| turned_to(&first, Angle::from_degrees(-step * steps))[0];
    BTreeMap::from([
        ("step_angle", step),
        ("neighbour_chord", apart(&first[0], &after(1.0))),
        ("opposite_distance", apart(&first[0], &after(count / 2.0))),
        ("widest_chord", apart(&first[0], &after((count / 2.0).floor()))),
    ])
}

/// The first azimuth without signal of two verticals abreast, by bisection on the sign of the combined field.
fn broadside_null_deg(check: &Check) -> f64 {
    let half = check.input("spacing") / 2.0;
    let elements = [vertical(0.0, -half, 6.0), vertical(0.0, half, 6.0)];
    let response = Response::new(&elements, Soil::Perfect, check.frequency()).expect("a legal array");
    let alone = response.power(&[Complex64::ONE, Complex64::ZERO], 0.0, 0.0);
    let signal = |azimuth: f64| {
        let fields = response.fields(azimuth, 0.0);
        (fields[0].theta * (fields[0].theta + fields[1].theta).conj()).re / alone - 1.0
    };
    let power = |azimuth: f64| response.power(&equal(2), azimuth, 0.0) / alone;
    let (mut low, mut high) = (0.0, 90.0);
    // Re(E₁ (E₁ + E₂)*)/|E₁|² − 1 = cos of the phase between the two, −1 at the null: follow its derivative's sign
    for _ in 0..200 {
        let (a, b) = (low + (high - low) / 3.0, high - (high - low) / 3.0);
        if signal(a) < signal(b) { high = b } else { low = a }
    }
    assert!(power(low) < 1e-12, "no null at {low}");
    low
}
