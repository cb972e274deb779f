//! Reads tests/reference/pattern-cases.toml and compares figures with it; tests/radio and tests/pattern both do.

use serde::Deserialize;

#[derive(Deserialize)]
struct File {
    case: Vec<Case>,
}

/// One row of the table.
#[derive(Deserialize)]
pub(crate) struct Case {
    pub(crate) id: String,
    pub(crate) frequency_mhz: f64,
    wanted_azimuth_deg: f64,
    pub(crate) stated_elevation_deg: f64,
    pub(crate) ground: Ground,
    pub(crate) verticals: Option<Verticals>,
    pub(crate) wires: Option<Wires>,
    pub(crate) reference: Figures,
    pub(crate) engine: Figures,
    pub(crate) tolerance: Tolerance,
}

/// The soil of a case.
#[derive(Deserialize)]
pub(crate) struct Ground {
    pub(crate) name: String,
    pub(crate) sigma_ms_per_m: Option<f64>,
    pub(crate) eps_r: Option<f64>,
}

/// A case of short verticals.
#[derive(Deserialize)]
pub(crate) struct Verticals {
    pub(crate) height_m: f64,
    pub(crate) elements: Vec<Placed>,
}

/// A case of low wires.
#[derive(Deserialize)]
pub(crate) struct Wires {
    pub(crate) height_m: f64,
    pub(crate) radius_m: f64,
    pub(crate) termination_reflection: f64,
    pub(crate) wire: Vec<Placed>,
}

/// One element: x forward, y to the left, and its weight and delay.
#[derive(Deserialize)]
pub(crate) struct Placed {
    pub(crate) x_m: f64,
    pub(crate) y_m: f64,
    pub(crate) length_m: Option<f64>,
    pub(crate) amp: f64,
    pub(crate) phase_deg: f64,
    pub(crate) delay_m: f64,
}

/// What a case is to give, or has given. The last three belong to a wire; only tests/radio reads them.
#[allow(dead_code, reason = "not every test binary reads every column")]
#[derive(Deserialize)]
pub(crate) struct Figures {
    pub(crate) rdf_peak_db: f64,
    pub(crate) rdf_stated_db: f64,
    pub(crate) takeoff_elevation_deg: f64,
    pub(crate) front_to_back_db: f64,
    pub(crate) front_to_back_stated_db: f64,
    pub(crate) worst_rear_db: f64,
    pub(crate) azimuth_beamwidth_deg: f64,
    pub(crate) gain_rel_db: Option<f64>,
    pub(crate) velocity_factor: Option<f64>,
    pub(crate) attenuation_db_per_100m: Option<f64>,
    pub(crate) characteristic_impedance_ohm: Option<f64>,
}

/// How far apart two sets of figures may be.
#[derive(Deserialize)]
pub(crate) struct Tolerance {
    pub(crate) rdf_db: f64,
    pub(crate) elevation_deg: f64,
    pub(crate) beamwidth_deg: f64,
    pub(crate) gain_rel_db: Option<f64>,
    pub(crate) fb_amplitude: f64,
    pub(crate) worst_rear_amplitude: f64,
}

/// What an implementation of the same method must meet.
pub(crate) const CLOSE: Tolerance = Tolerance {
    rdf_db: 0.01,
    elevation_deg: 0.1,
    beamwidth_deg: 0.1,
    gain_rel_db: Some(0.01),
    fb_amplitude: 0.002,
    worst_rear_amplitude: 0.002,
};

/// The 152 cases; every one looks straight ahead.
pub(crate) fn cases() -> Vec<Case> {
    let file: File = toml::from_str(include_str!("pattern-cases.toml")).expect("the table parses");
    for case in &file.case {
        assert!(case.wanted_azimuth_deg.abs() < 1e-9, "{} does not look ahead", case.id);
    }
    file.case
}

impl Case {
    /// The elements, whatever their kind.
    pub(crate) fn placed(&self) -> &[Placed] {
        match (&self.verticals, &self.wires) {
            (Some(verticals), None) => &verticals.elements,
            (None, Some(wires)) => &wires.wire,
            _ => panic!("case {} has verticals or wires", self.id),
        }
    }

    /// Notes every figure of `found` that lies further from `wanted` than the tolerance; ratios as amplitudes.
    pub(crate) fn compare(
        &self,
        differences: &mut Differences,
        found: &Figures,
        wanted: &Figures,
        tolerance: &Tolerance,
    ) {
        let mut check = |name: &str, value: f64, wanted: f64, tolerance: f64| {
            differences.check(&format!("{} {name}", self.id), value, wanted, tolerance);
        };
        check("RDF", found.rdf_peak_db, wanted.rdf_peak_db, tolerance.rdf_db);
        check("RDF stated", found.rdf_stated_db, wanted.rdf_stated_db, tolerance.rdf_db);
        let peak = found.takeoff_elevation_deg;
        check("take-off", peak, wanted.takeoff_elevation_deg, tolerance.elevation_deg);
        let beam = found.azimuth_beamwidth_deg;
        check("beamwidth", beam, wanted.azimuth_beamwidth_deg, tolerance.beamwidth_deg);
        if let (Some(wanted), Some(tolerance)) = (wanted.gain_rel_db, tolerance.gain_rel_db) {
            check("gain_rel", found.gain_rel_db.unwrap_or(f64::NAN), wanted, tolerance);
        }
        let backs = [
            ("front to back", found.front_to_back_db, wanted.front_to_back_db),
            ("front to back stated", found.front_to_back_stated_db, wanted.front_to_back_stated_db),
        ];
        for (name, value, wanted) in backs {
            check(name, amplitude(-value), amplitude(-wanted), tolerance.fb_amplitude);
        }
        let (rear, wanted_rear) = (amplitude(found.worst_rear_db), amplitude(wanted.worst_rear_db));
        check("worst rear", rear, wanted_rear, tolerance.worst_rear_amplitude);
    }
}

/// A level in dB as an amplitude.
fn amplitude(db: f64) -> f64 {
    10_f64.powf(db / 20.0)
}

/// Collects differences that are too large, and says them all at once.
#[derive(Default)]
pub(crate) struct Differences(Vec<String>);

impl Differences {
    /// Notes a value that lies more than `tolerance` from what is wanted.
    pub(crate) fn check(&mut self, name: &str, value: f64, wanted: f64, tolerance: f64) {
        let apart = (value - wanted).abs();
        if apart.is_nan() || apart > tolerance {
            self.0.push(format!("{name}: {value:.5}, wanted {wanted:.5} ± {tolerance}"));
        }
    }

    /// Fails when anything was noted.
    pub(crate) fn none(self) {
        assert!(self.0.is_empty(), "{} differences:\n{}", self.0.len(), self.0.join("\n"));
    }
}
