//! Array factors of two elements in line, and how errors spoil their null.

use super::voltage_db;
use crate::units::{Angle, Decibel, ElectricalLength, Frequency};

/// Two equal elements in line and the line that delays one of them, as lengths of free space.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct InlinePair {
    /// Distance between the elements along the wanted direction, in metres.
    pub spacing_m: f64,
    /// Electrical length of the delay line.
    pub delay: ElectricalLength,
    /// Frequency.
    pub frequency: Frequency,
}

impl InlinePair {
    fn half_phase(self, path_m: f64) -> f64 {
        self.frequency.wavenumber() * path_m / 2.0
    }

    /// Phase of the spacing, 360 s/λ.
    pub fn spacing_phase(self) -> Angle {
        Angle::from_radians(self.frequency.wavenumber() * self.spacing_m)
    }

    /// Crossfire: the rear element is inverted and delayed. 2|sin(k(s c + d)/2)|, with c the cosine between the arrival
    /// and the wanted direction (1 forward on the horizon, −1 rearward). The null rearward for d = s holds at every
    /// frequency.
    pub fn crossfire(self, cosine: f64) -> f64 {
        2.0 * self.half_phase(self.spacing_m * cosine + self.delay.metres()).sin().abs()
    }

    /// In phase: the front element is delayed, nothing is inverted. 2|cos(k(s c − d)/2)|.
    pub fn in_phase(self, cosine: f64) -> f64 {
        2.0 * self.half_phase(self.spacing_m * cosine - self.delay.metres()).cos().abs()
    }

    /// The mistake: the front element is inverted and delayed, so the null points forward. 2|sin(k(s c − d)/2)|.
    pub fn reversed(self, cosine: f64) -> f64 {
        2.0 * self.half_phase(self.spacing_m * cosine - self.delay.metres()).sin().abs()
    }

    /// Elevation of the crossfire null behind the array, where s cos ψ = d; `None` when the delay is longer than the
    /// spacing.
    pub fn null_elevation(self) -> Option<Angle> {
        let cosine = self.delay.metres() / self.spacing_m;
        (0.0..=1.0).contains(&cosine).then(|| Angle::from_radians(cosine.acos()))
    }

    /// The delay in metres, without an inverter in the **front** leg, that works like the crossfire at this frequency
    /// alone: half a wavelength less d.
    pub fn equivalent_front_delay_m(self) -> f64 {
        self.frequency.wavelength_m() / 2.0 - self.delay.metres()
    }

    /// Forward over rearward response of a crossfire with d = s whose rear leg is wrong in size and in length:
    /// 20 log10(2 sin ks / √(ε² + (kΔ)²)), ε = 10^(dB/20) − 1. For errors small against one; infinite without any.
    pub fn front_to_back(self, amplitude_error: Decibel, length_error_m: f64) -> Decibel {
        let epsilon = 10f64.powf(amplitude_error.db() / 20.0) - 1.0;
        let phase = self.frequency.wavenumber() * length_error_m;
        let forward = 2.0 * self.spacing_phase().radians().sin().abs();
        Decibel::new(voltage_db(forward / epsilon.hypot(phase)))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use num_complex::Complex64;
    use rust_decimal::Decimal;

    fn pair() -> InlinePair {
        let delay = ElectricalLength::from_metres(Decimal::new(172, 1));
        InlinePair { spacing_m: 18.3, delay, frequency: Frequency::from_hz(1_830_000) }
    }

    #[test]
    fn factors_are_the_phasor_sums_that_they_stand_for() {
        let pair = pair();
        let k = pair.frequency.wavenumber();
        let lag = Complex64::from_polar(1.0, -k * pair.delay.metres());
        for cosine in [-1.0, -0.4, 0.0, 0.3, 0.94, 1.0] {
            // A wave from the wanted direction reaches the front element first: the front leads by k s c.
            let front = Complex64::from_polar(1.0, k * pair.spacing_m * cosine);
            assert!((pair.crossfire(cosine) - (front - lag).norm()).abs() < 1e-12);
            assert!((pair.in_phase(cosine) - (front * lag + 1.0).norm()).abs() < 1e-12);
            assert!((pair.reversed(cosine) - (Complex64::from(1.0) - front * lag).norm()).abs() < 1e-12);
        }
    }

    #[test]
    fn the_null_stands_where_it_is_said_to_stand() {
        let elevation = pair().null_elevation().unwrap();
        assert!(pair().crossfire(-elevation.radians().cos()) < 1e-12);
        let long = InlinePair { spacing_m: 15.0, ..pair() };
        assert_eq!(long.null_elevation(), None);
    }

    #[test]
    fn front_to_back_agrees_with_the_phasor_sum() {
        let delay = ElectricalLength::from_metres(Decimal::new(183, 1));
        let pair = InlinePair { delay, ..pair() };
        let k = pair.frequency.wavenumber();
        let wrong = Complex64::from_polar(10f64.powf(0.1 / 20.0), -k * (18.3 + 0.1));
        let response = |cosine: f64| (Complex64::from_polar(1.0, k * 18.3 * cosine) - wrong).norm();
        let exact = 20.0 * (response(1.0) / response(-1.0)).log10();
        assert!((pair.front_to_back(Decibel::new(0.1), 0.1).db() - exact).abs() < 0.1);
    }
}
