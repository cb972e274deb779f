//! Matched attenuators in any impedance.

use crate::units::{Decibel, Resistance};

/// A symmetrical T pad: two series arms and one shunt arm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TeePad {
    /// Each of the two series resistors.
    pub series: Resistance,
    /// The shunt resistor.
    pub shunt: Resistance,
}

/// A symmetrical pi pad: two shunt arms and one series arm.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PiPad {
    /// Each of the two shunt resistors.
    pub shunt: Resistance,
    /// The series resistor.
    pub series: Resistance,
}

/// The T pad of `loss` in `z0`: series Z0 (k−1)/(k+1), shunt 2 Z0 k/(k²−1), k = 10^(loss/20) (closed form of the
/// matched T section). `None` unless the loss is above 0.
pub fn tee(loss: Decibel, z0: Resistance) -> Option<TeePad> {
    let k = voltage_ratio(loss)?;
    Some(TeePad {
        series: Resistance::new(z0.ohms() * (k - 1.0) / (k + 1.0)),
        shunt: Resistance::new(2.0 * z0.ohms() * k / (k * k - 1.0)),
    })
}

/// The pi pad of `loss` in `z0`: shunt Z0 (k+1)/(k−1), series Z0 (k²−1)/(2k), k = 10^(loss/20). `None` unless the loss
/// is above 0.
pub fn pi(loss: Decibel, z0: Resistance) -> Option<PiPad> {
    let k = voltage_ratio(loss)?;
    Some(PiPad {
        shunt: Resistance::new(z0.ohms() * (k + 1.0) / (k - 1.0)),
        series: Resistance::new(z0.ohms() * (k * k - 1.0) / (2.0 * k)),
    })
}

fn voltage_ratio(loss: Decibel) -> Option<f64> {
    (loss.db() > 0.0 && loss.db().is_finite()).then(|| 10f64.powf(loss.db() / 20.0))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn parallel(a: f64, b: f64) -> f64 {
        a * b / (a + b)
    }

    #[test]
    fn every_pad_is_matched_and_has_its_loss() {
        for z0 in [50.0, 75.0, 100.0] {
            for db in [0.2, 1.0, 3.0, 6.0, 10.0, 20.0] {
                let pad = tee(Decibel::new(db), Resistance::new(z0)).unwrap();
                let (series, shunt) = (pad.series.ohms(), pad.shunt.ohms());
                let middle = parallel(shunt, series + z0);
                assert!((series + middle - z0).abs() < 1e-9);
                let out = middle / (series + middle) * z0 / (series + z0);
                assert!((20.0 * out.log10() + db).abs() < 1e-9);

                let pad = pi(Decibel::new(db), Resistance::new(z0)).unwrap();
                let (series, shunt) = (pad.series.ohms(), pad.shunt.ohms());
                let end = parallel(shunt, z0);
                assert!((parallel(shunt, series + end) - z0).abs() < 1e-9);
                assert!((20.0 * (end / (series + end)).log10() + db).abs() < 1e-9);
            }
        }
    }

    #[test]
    fn the_well_known_ten_decibel_pad() {
        // Printed in every attenuator table for 50 ohms: T 25.97 and 35.14, pi 96.25 and 71.15 (from memory).
        let t = tee(Decibel::new(10.0), Resistance::new(50.0)).unwrap();
        assert!((t.series.ohms() - 25.97).abs() < 0.005 && (t.shunt.ohms() - 35.14).abs() < 0.005);
        let p = pi(Decibel::new(10.0), Resistance::new(50.0)).unwrap();
        assert!((p.shunt.ohms() - 96.25).abs() < 0.005 && (p.series.ohms() - 71.15).abs() < 0.005);
        assert_eq!(tee(Decibel::new(0.0), Resistance::new(50.0)), None);
    }
}
