//! Earth electrodes: low-frequency resistance of rods, wires and rings. At radio frequencies the impedance of the rod
//! and of its lead comes on top.

use std::f64::consts::{PI, TAU};

use crate::units::{Diameter, Length, Resistance, Resistivity};

/// A driven vertical rod.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Rod {
    /// Length in the ground.
    pub length: Length,
    /// Diameter (the formulas want the radius; it is taken here).
    pub diameter: Diameter,
}

impl Rod {
    /// Radius in metres.
    fn radius_m(self) -> f64 {
        self.diameter.metres() / 2.0
    }

    /// ρ/(2πL), the resistance that all rod formulas scale.
    pub(super) fn scale(self, soil: Resistivity) -> f64 {
        soil.ohm_metres() / (TAU * self.length.metres())
    }

    /// Resistance of one rod: R = ρ/(2πL) (ln(4L/a) − 1), a the radius (H. B. Dwight, "Calculation of resistances to
    /// ground", 1936, from memory). For a ≪ L in uniform soil.
    pub fn resistance(self, soil: Resistivity) -> Resistance {
        let log = (4.0 * self.length.metres() / self.radius_m()).ln();
        Resistance::new(self.scale(soil) * (log - 1.0))
    }

    /// Resistance of two rods in parallel, `spacing` apart (Dwight, as above).
    ///
    /// Dwight's series for s > L is used from 1.8 L on, the one for s < L below: against the average-potential value the
    /// first is 3.5 % high at s = L and 0.03 % at 2 L, the second within 0.1 % up to 2 L.
    pub fn pair_resistance(self, soil: Resistivity, spacing: Length) -> Resistance {
        let (length, s) = (self.length.metres(), spacing.metres());
        let log = (4.0 * length / self.radius_m()).ln();
        let half = self.scale(soil) / 2.0;
        let ratio = s / length;
        if ratio > 1.8 {
            let mutual = (1.0 - ratio.powi(-2) / 3.0 + 0.4 * ratio.powi(-4)) / ratio;
            Resistance::new(half * (log - 1.0 + mutual))
        } else {
            let series = ratio / 2.0 - ratio.powi(2) / 16.0 + ratio.powi(4) / 512.0;
            Resistance::new(half * (log + (4.0 / ratio).ln() - 2.0 + series))
        }
    }

    /// Mutual resistance in ohms of two such rods `metres` apart by their average potential:
    /// ρ/(2πL) [ln((2L + √(s²+4L²))/s) + s/(2L) − √(1 + (s/2L)²)]; with the radius for s, the rod's own resistance.
    pub(super) fn mutual_ohm(self, soil: Resistivity, metres: f64) -> f64 {
        let ratio = metres / (2.0 * self.length.metres());
        let root = ratio.hypot(1.0);
        self.scale(soil) * (((1.0 + root) / ratio).ln() + ratio - root)
    }

    /// The rod's own resistance in ohms by its average potential.
    pub(super) fn own_ohm(self, soil: Resistivity) -> f64 {
        self.mutual_ohm(soil, self.radius_m())
    }
}

/// Resistance of a straight buried wire: with total length 2ℓ, depth s/2 and radius a,
/// R = ρ/(4πℓ) (ln(4ℓ/a) + ln(4ℓ/s) − 2 + s/(2ℓ) − s²/(16ℓ²) + s⁴/(512ℓ⁴)) (Dwight, as above). For a ≪ s ≪ ℓ.
pub fn buried_wire(soil: Resistivity, total: Length, diameter: Diameter, depth: Length) -> Resistance {
    let half = total.metres() / 2.0;
    let ratio = 2.0 * depth.metres() / half;
    let series = ratio / 2.0 - ratio.powi(2) / 16.0 + ratio.powi(4) / 512.0;
    let logs = (8.0 * half / diameter.metres()).ln() + (4.0 / ratio).ln();
    Resistance::new(soil.ohm_metres() / (2.0 * TAU * half) * (logs - 2.0 + series))
}

/// Resistance of a buried ring: with ring diameter D, wire diameter d and depth s/2,
/// R = ρ/(2π²D) (ln(8D/d) + ln(4D/s)) (Dwight, as above). For d ≪ s ≪ D.
pub fn buried_ring(soil: Resistivity, ring: Length, wire: Diameter, depth: Length) -> Resistance {
    let d = ring.metres();
    let logs = (8.0 * d / wire.metres()).ln() + (4.0 * d / (2.0 * depth.metres())).ln();
    Resistance::new(soil.ohm_metres() / (2.0 * PI * PI * d) * logs)
}

/// Soil resistivity from a test with four electrodes in line, `spacing` apart: ρ = 2πAR (F. Wenner, "A method of
/// measuring earth resistivity", 1915, from memory). For electrodes driven much less deep than their spacing.
pub fn four_electrode_resistivity(measured: Resistance, spacing: Length) -> Resistivity {
    Resistivity::new(TAU * spacing.metres() * measured.ohms())
}

/// Soil by its resistivity.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum SoilClass {
    /// Wet loam and clay, up to 100 Ωm.
    Wet,
    /// Average soil, above 100 up to 300 Ωm.
    Average,
    /// Sand, above 300 up to 1000 Ωm.
    Sand,
    /// Rock and dry gravel, above 1000 Ωm.
    Rock,
}

/// The class of a soil; a boundary belongs to the wetter class (usual tables, from memory).
pub fn soil_class(soil: Resistivity) -> SoilClass {
    let rho = soil.ohm_metres();
    if rho <= 100.0 {
        SoilClass::Wet
    } else if rho <= 300.0 {
        SoilClass::Average
    } else if rho <= 1000.0 {
        SoilClass::Sand
    } else {
        SoilClass::Rock
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_boundary_belongs_to_the_wetter_class() {
        let class = |rho: f64| soil_class(Resistivity::new(rho));
        assert_eq!(class(100.0), SoilClass::Wet);
        assert_eq!(class(100.1), SoilClass::Average);
        assert_eq!(class(300.0), SoilClass::Average);
        assert_eq!(class(1000.0), SoilClass::Sand);
        assert_eq!(class(1000.1), SoilClass::Rock);
    }

    #[test]
    fn the_two_series_meet_where_they_are_switched() {
        let rod = Rod { length: Length::from_mm(2400), diameter: Diameter::from_um(16_000) };
        let soil = Resistivity::new(100.0);
        let below = rod.pair_resistance(soil, Length::from_mm(4320)).ohms();
        let above = rod.pair_resistance(soil, Length::from_mm(4321)).ohms();
        assert!((below / above - 1.0).abs() < 0.001);
    }

    #[test]
    fn one_rod_by_average_potential_is_dwights_rod() {
        let rod = Rod { length: Length::from_mm(1200), diameter: Diameter::from_um(14_200) };
        let soil = Resistivity::new(100.0);
        assert!((rod.own_ohm(soil) / rod.resistance(soil).ohms() - 1.0).abs() < 0.001);
    }
}
