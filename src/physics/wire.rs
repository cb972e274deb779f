//! Round wire: gauge, material, resistance, mass, strength.

use std::f64::consts::FRAC_PI_4;
use std::fmt;

use super::GRAVITY;
use crate::units::Force;

/// Metres in a thousandth of an inch.
const METRES_PER_MIL: f64 = 25.4e-6;
/// Newtons in a pound of force, exact.
const NEWTONS_PER_LBF: f64 = 4.448_221_615_260_5;
/// Resistivity of the International Annealed Copper Standard in ohm metres (IEC 60028, from memory).
pub const ANNEALED_COPPER_OHM_M: f64 = 1.0 / 58e6;

/// An American wire gauge from 4/0 to 40.
///
/// d = 0.127 mm · 92^((36 − n)/39), with n = 0 for 1/0, −1 for 2/0, −2 for 3/0 and −3 for 4/0 (ASTM B258, from memory).
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Gauge {
    number: i32,
}

/// Why a gauge was refused.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct GaugeError {
    /// The text as written.
    pub given: String,
}

impl fmt::Display for GaugeError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "\"{}\" is not a wire gauge between 4/0 and 40", self.given)
    }
}

impl std::error::Error for GaugeError {}

impl Gauge {
    /// The gauge of a number from −3 (4/0) to 40, or `None`.
    pub fn new(number: i32) -> Option<Self> {
        (-3..=40).contains(&number).then_some(Self { number })
    }

    /// Reads "14", "AWG 14", "4/0" or "0000".
    ///
    /// # Errors
    /// When the text is no gauge between 4/0 and 40.
    pub fn parse(text: &str) -> Result<Self, GaugeError> {
        let refuse = || GaugeError { given: text.to_owned() };
        let bare = text.trim().trim_start_matches("AWG").trim();
        let number = if let Some(noughts) = bare.strip_suffix("/0") {
            1 - noughts.parse::<i32>().ok().filter(|n| (1..=4).contains(n)).ok_or_else(refuse)?
        } else if !bare.is_empty() && bare.len() <= 4 && bare.bytes().all(|b| b == b'0') {
            1 - i32::try_from(bare.len()).map_err(|_| refuse())?
        } else if bare.bytes().all(|b| b.is_ascii_digit()) && !bare.starts_with('0') {
            bare.parse().map_err(|_| refuse())?
        } else {
            return Err(refuse());
        };
        Self::new(number).ok_or_else(refuse)
    }

    /// Diameter in metres.
    pub fn diameter_m(self) -> f64 {
        0.127e-3 * 92f64.powf(f64::from(36 - self.number) / 39.0)
    }

    /// Cross-section in square metres.
    pub fn area_m2(self) -> f64 {
        area_m2(self.diameter_m())
    }

    /// Circular mils: the square of the diameter in thousandths of an inch.
    pub fn circular_mils(self) -> f64 {
        (self.diameter_m() / METRES_PER_MIL).powi(2)
    }
}

/// Cross-section in square metres of a round wire of `diameter_m`.
pub fn area_m2(diameter_m: f64) -> f64 {
    FRAC_PI_4 * diameter_m * diameter_m
}

/// What a wire is made of.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Material {
    /// Soft copper.
    AnnealedCopper,
    /// Medium-hard-drawn copper, small sizes.
    MediumHardCopper,
    /// Hard-drawn copper, small sizes.
    HardDrawnCopper,
    /// Copper-clad steel of the "40 %" grade, which is 39.21 % IACS.
    CopperCladSteel40,
    /// Copper-clad steel of the "30 %" grade, which is 29.41 % IACS.
    CopperCladSteel30,
    /// Electrical aluminium of 61 % IACS.
    Aluminium,
}

impl Material {
    /// Resistivity at 20 °C in ohm metres, for direct current; clad wire as a whole.
    ///
    /// All from memory: IEC 60028 (annealed), ASTM B1 (hard-drawn, 96.16 % IACS), ASTM B2 (medium-hard, 96.66 %),
    /// ASTM B227 (clad steel), IEC 60889 (aluminium).
    pub fn resistivity_ohm_m(self) -> f64 {
        match self {
            Self::AnnealedCopper => ANNEALED_COPPER_OHM_M,
            Self::MediumHardCopper => ANNEALED_COPPER_OHM_M / 0.9666,
            Self::HardDrawnCopper => ANNEALED_COPPER_OHM_M / 0.9616,
            Self::CopperCladSteel40 => 4.397e-8,
            Self::CopperCladSteel30 => 5.862e-8,
            Self::Aluminium => ANNEALED_COPPER_OHM_M / 0.61,
        }
    }

    /// Conductivity in per cent of the annealed copper standard.
    pub fn percent_iacs(self) -> f64 {
        100.0 * ANNEALED_COPPER_OHM_M / self.resistivity_ohm_m()
    }

    /// Density in kg/m³ (same sources as the resistivity).
    pub const fn density_kg_per_m3(self) -> f64 {
        match self {
            Self::AnnealedCopper | Self::MediumHardCopper | Self::HardDrawnCopper => 8890.0,
            Self::CopperCladSteel40 | Self::CopperCladSteel30 => 8150.0,
            Self::Aluminium => 2705.0,
        }
    }

    /// Temperature coefficient of resistance at 20 °C in 1/K (from memory; medium-hard copper taken as hard-drawn).
    pub const fn temperature_coefficient_per_k(self) -> f64 {
        match self {
            Self::AnnealedCopper => 0.003_93,
            Self::MediumHardCopper | Self::HardDrawnCopper => 0.003_81,
            Self::CopperCladSteel40 | Self::CopperCladSteel30 => 0.003_8,
            Self::Aluminium => 0.004_03,
        }
    }
}

/// Direct-current resistance at 20 °C in ohms a metre: ρ/A.
pub fn resistance_ohm_per_m(material: Material, diameter_m: f64) -> f64 {
    material.resistivity_ohm_m() / area_m2(diameter_m)
}

/// Mass in kg a metre: density times area.
pub fn mass_kg_per_m(density_kg_per_m3: f64, diameter_m: f64) -> f64 {
    density_kg_per_m3 * area_m2(diameter_m)
}

/// Weight in newtons a metre, at standard gravity.
pub fn weight_n_per_m(density_kg_per_m3: f64, diameter_m: f64) -> f64 {
    GRAVITY * mass_kg_per_m(density_kg_per_m3, diameter_m)
}

/// Resistance at `celsius` over that at 20 °C: 1 + α20 (T − 20). Holds from −50 to +100 °C (IEC 60028, from memory).
pub fn resistance_at_temperature(alpha20_per_k: f64, celsius: f64) -> f64 {
    1.0 + alpha20_per_k * (celsius - 20.0)
}

/// Resistance of a conductor of `percent_iacs` over that of annealed copper of the same size.
pub fn resistance_over_copper(percent_iacs: f64) -> f64 {
    100.0 / percent_iacs
}

/// Rated breaking loads in pounds of force, by gauge number.
///
/// Read in conductor makers' published tables: solid bare copper to ASTM B1, B2 and B3, hard-drawn copper-clad steel to
/// ASTM B227. They fall faster than the area as wire grows, so nothing is interpolated.
const RATED_STRENGTHS_LBF: [(i32, Material, f64); 10] = [
    (14, Material::HardDrawnCopper, 214.0),
    (14, Material::MediumHardCopper, 167.0),
    (14, Material::AnnealedCopper, 124.0),
    (12, Material::HardDrawnCopper, 337.0),
    (12, Material::MediumHardCopper, 261.0),
    (12, Material::AnnealedCopper, 198.0),
    (12, Material::CopperCladSteel40, 575.0),
    (12, Material::CopperCladSteel30, 625.0),
    (10, Material::CopperCladSteel40, 850.0),
    (10, Material::CopperCladSteel30, 925.0),
];

/// Rated breaking load of a solid wire, or `None` where no published row was read.
pub fn rated_strength(gauge: Gauge, material: Material) -> Option<Force> {
    let row =
        RATED_STRENGTHS_LBF.iter().find(|(number, kind, _)| *number == gauge.number && *kind == material)?;
    Some(Force::new(row.2 * NEWTONS_PER_LBF))
}

/// A copper-clad-steel wire for the centre of coax, "21 %" grade.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CladCentre {
    /// Diameter in metres.
    pub diameter_m: f64,
    /// Largest direct-current resistance at 20 °C in ohms a metre.
    pub max_resistance_ohm_per_m: f64,
    /// Least thickness of the copper in metres.
    pub min_copper_m: f64,
}

/// Diameter in inches, ohms a thousand feet, least copper in inches (ASTM B869-04, Table 1, read).
const CLAD_CENTRES: [(f64, f64, f64); 7] = [
    (0.0641, 12.249, 0.000_96),
    (0.0571, 15.472, 0.000_86),
    (0.0508, 19.521, 0.000_76),
    (0.0453, 24.608, 0.000_68),
    (0.0403, 31.024, 0.000_60),
    (0.0320, 49.150, 0.000_48),
    (0.0285, 62.107, 0.000_43),
];

impl CladCentre {
    /// The standard wire within 0.5 % of `diameter_m`, or `None`.
    pub fn of_diameter(diameter_m: f64) -> Option<Self> {
        let near = |inches: f64| (diameter_m / (inches * 0.0254) - 1.0).abs() < 0.005;
        let (inches, ohms_per_kft, copper) = CLAD_CENTRES.into_iter().find(|row| near(row.0))?;
        Some(Self {
            diameter_m: inches * 0.0254,
            max_resistance_ohm_per_m: ohms_per_kft / 304.8,
            min_copper_m: copper * 0.0254,
        })
    }

    /// The largest resistance over that of annealed copper of the same diameter.
    pub fn ratio_to_copper(self) -> f64 {
        self.max_resistance_ohm_per_m / resistance_ohm_per_m(Material::AnnealedCopper, self.diameter_m)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn gauges_read_in_every_usual_spelling() {
        let four_noughts = Gauge::new(-3).unwrap();
        assert_eq!(Gauge::parse("4/0"), Ok(four_noughts));
        assert_eq!(Gauge::parse("0000"), Ok(four_noughts));
        assert_eq!(Gauge::parse("AWG 14"), Ok(Gauge::new(14).unwrap()));
        assert_eq!(Gauge::parse("0"), Ok(Gauge::new(0).unwrap()));
        for wrong in ["", "5/0", "0/0", "00000", "41", "-1", "14.5", "99999999999"] {
            assert!(Gauge::parse(wrong).is_err(), "{wrong}");
        }
    }

    #[test]
    fn clad_centres_are_21_percent_at_the_thinnest_wire_allowed() {
        // 1 % less in diameter, to the ten-thousandth of an inch (from memory): all seven printed limits come out.
        for (inches, ohms_per_kft, _) in CLAD_CENTRES {
            let thinnest = inches - (inches * 100.0).round() / 10_000.0;
            let copper = resistance_ohm_per_m(Material::AnnealedCopper, thinnest * 0.0254) * 304.8;
            let limit = copper * resistance_over_copper(21.0);
            assert!((limit / ohms_per_kft - 1.0).abs() < 2e-4, "{inches} in: {limit} against {ohms_per_kft}");
        }
    }

    #[test]
    fn gauge_36_is_five_mils_by_definition() {
        let mils = Gauge::new(36).unwrap().circular_mils();
        assert!((mils - 25.0).abs() < 1e-9);
    }
}
