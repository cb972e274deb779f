//! Matched loss of cable: models, and the interpolation of catalogue points that refuses to guess.

use std::fmt;

use super::DB_PER_NEPER;
use crate::units::{Decibel, Frequency, Length};

/// Feet in 100 m over 100: decibels per 100 ft times this are decibels per 100 m.
const FEET_PER_METRE: f64 = 1.0 / 0.3048;

/// Loss by length.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd)]
pub struct LossRate {
    db_per_100m: f64,
}

impl LossRate {
    /// Decibels per 100 m.
    pub const fn from_db_per_100m(db_per_100m: f64) -> Self {
        Self { db_per_100m }
    }

    /// Decibels per 100 ft.
    pub fn from_db_per_100ft(db_per_100ft: f64) -> Self {
        Self { db_per_100m: db_per_100ft * FEET_PER_METRE }
    }

    /// Nepers a metre.
    pub fn from_nepers_per_m(nepers_per_m: f64) -> Self {
        Self { db_per_100m: 100.0 * DB_PER_NEPER * nepers_per_m }
    }

    /// Decibels per 100 m.
    pub const fn db_per_100m(self) -> f64 {
        self.db_per_100m
    }

    /// Decibels per 100 ft.
    pub fn db_per_100ft(self) -> f64 {
        self.db_per_100m / FEET_PER_METRE
    }

    /// Nepers a metre.
    pub fn nepers_per_m(self) -> f64 {
        self.db_per_100m / (100.0 * DB_PER_NEPER)
    }

    /// The loss of a length.
    pub fn over(self, length: Length) -> Decibel {
        Decibel::new(self.db_per_100m * length.metres() / 100.0)
    }
}

/// Why a loss cannot be said.
#[derive(Clone, Debug, PartialEq)]
pub enum LossError {
    /// No points, or too few for the model.
    TooFewPoints,
    /// A frequency or a loss that is not above zero.
    NotPositive {
        /// The frequency of the point.
        frequency: Frequency,
    },
    /// Two points at one frequency.
    Repeated {
        /// That frequency.
        frequency: Frequency,
    },
    /// The wanted frequency is below the lowest point; no law is trusted to reach down there.
    BelowLowest {
        /// The wanted frequency.
        wanted: Frequency,
        /// The lowest frequency with a figure.
        lowest: Frequency,
    },
    /// The wanted frequency is above the highest point.
    AboveHighest {
        /// The wanted frequency.
        wanted: Frequency,
        /// The highest frequency with a figure.
        highest: Frequency,
    },
}

impl fmt::Display for LossError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::TooFewPoints => out.write_str("too few loss points"),
            Self::NotPositive { frequency } => {
                write!(out, "the loss point at {frequency} needs a frequency and a loss above zero")
            }
            Self::Repeated { frequency } => write!(out, "two loss points at {frequency}"),
            Self::BelowLowest { lowest, .. } => {
                write!(out, "no loss figure below {lowest} for this cable; measured value needed")
            }
            Self::AboveHighest { highest, .. } => {
                write!(out, "no loss figure above {highest} for this cable; measured value needed")
            }
        }
    }
}

impl std::error::Error for LossError {}

/// Points of a cable's loss, by rising frequency.
#[derive(Clone, Debug, PartialEq)]
pub struct LossPoints {
    points: Vec<(Frequency, LossRate)>,
}

impl LossPoints {
    /// Points in any order.
    ///
    /// # Errors
    /// When there are none, when a frequency or loss is not above zero, or when a frequency occurs twice.
    pub fn new(mut points: Vec<(Frequency, LossRate)>) -> Result<Self, LossError> {
        check_positive(&points)?;
        points.sort_by_key(|(frequency, _)| *frequency);
        match points.windows(2).find(|pair| pair[0].0 == pair[1].0) {
            Some(pair) => Err(LossError::Repeated { frequency: pair[0].0 }),
            None => Ok(Self { points }),
        }
    }

    /// The loss at a frequency, on a straight line between neighbouring points in log loss over log frequency.
    ///
    /// # Errors
    /// Below the lowest and above the highest point. The square-root law of solid copper is wrong by a factor of three
    /// for thinly copper-clad steel at the low bands, so nothing is carried on beyond the points.
    pub fn at(&self, frequency: Frequency) -> Result<LossRate, LossError> {
        let (Some(low), Some(high)) = (self.points.first(), self.points.last()) else {
            return Err(LossError::TooFewPoints);
        };
        if frequency < low.0 {
            return Err(LossError::BelowLowest { wanted: frequency, lowest: low.0 });
        }
        if frequency > high.0 {
            return Err(LossError::AboveHighest { wanted: frequency, highest: high.0 });
        }
        let above = self.points.partition_point(|point| point.0 < frequency);
        let upper = self.points[above];
        if upper.0 == frequency || above == 0 {
            return Ok(upper.1);
        }
        let lower = self.points[above - 1];
        let share = (frequency.mhz() / lower.0.mhz()).ln() / (upper.0.mhz() / lower.0.mhz()).ln();
        let ratio = upper.1.db_per_100m / lower.1.db_per_100m;
        Ok(LossRate::from_db_per_100m(lower.1.db_per_100m * ratio.powf(share)))
    }

    /// The points by rising frequency.
    pub fn points(&self) -> &[(Frequency, LossRate)] {
        &self.points
    }
}

/// Conductor and dielectric loss: k1 √f + k2 f, f in MHz, loss in dB/100 m.
///
/// Holds for a solid or thickly clad copper centre with both conductors several skin depths thick; wrong below 20 to
/// 30 MHz for copper-clad-steel centres (usual two-term model, e.g. "The ARRL Antenna Book", from memory).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoTermLoss {
    /// Conductor term in dB per 100 m per √MHz.
    pub k1: f64,
    /// Dielectric term in dB per 100 m per MHz.
    pub k2: f64,
}

/// Whether a fit had to hold one term at zero.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Clamped {
    /// Both terms are free.
    Neither,
    /// The conductor term came out negative and is zero.
    Conductor,
    /// The dielectric term came out negative (rounded data) and is zero.
    Dielectric,
}

impl TwoTermLoss {
    /// The model through two points, terms of either sign.
    ///
    /// # Errors
    /// When a frequency or loss is not above zero or both are at one frequency.
    pub fn through(a: (Frequency, LossRate), b: (Frequency, LossRate)) -> Result<Self, LossError> {
        check_positive(&[a, b])?;
        if a.0 == b.0 {
            return Err(LossError::Repeated { frequency: a.0 });
        }
        let (f1, f2) = (a.0.mhz(), b.0.mhz());
        let (a1, a2) = (a.1.db_per_100m, b.1.db_per_100m);
        let determinant = f1.sqrt() * f2 - f2.sqrt() * f1;
        Ok(Self {
            k1: (a1 * f2 - a2 * f1) / determinant,
            k2: (f1.sqrt() * a2 - f2.sqrt() * a1) / determinant,
        })
    }

    /// Least squares of the relative deviations with both terms at least zero, and which term was held there.
    ///
    /// # Errors
    /// When there are fewer than two points, or a frequency or loss is not above zero, or a frequency occurs twice.
    pub fn fit(points: &LossPoints) -> Result<(Self, Clamped), LossError> {
        if points.points.len() < 2 {
            return Err(LossError::TooFewPoints);
        }
        let rows = points
            .points
            .iter()
            .map(|(f, loss)| (f.mhz().sqrt() / loss.db_per_100m, f.mhz() / loss.db_per_100m));
        let mut sums = [0.0; 5];
        for (root, linear) in rows {
            let terms = [root * root, root * linear, linear * linear, root, linear];
            for (sum, term) in sums.iter_mut().zip(terms) {
                *sum += term;
            }
        }
        let [rr, rl, ll, r, l] = sums;
        let determinant = rr * ll - rl * rl;
        let free = Self { k1: (r * ll - rl * l) / determinant, k2: (rr * l - rl * r) / determinant };
        Ok(if free.k2 < 0.0 {
            (Self { k1: r / rr, k2: 0.0 }, Clamped::Dielectric)
        } else if free.k1 < 0.0 {
            (Self { k1: 0.0, k2: l / ll }, Clamped::Conductor)
        } else {
            (free, Clamped::Neither)
        })
    }

    /// The loss at a frequency.
    pub fn at(self, frequency: Frequency) -> LossRate {
        let mhz = frequency.mhz();
        LossRate::from_db_per_100m(self.k1 * mhz.sqrt() + self.k2 * mhz)
    }
}

/// Loss as a power of frequency: a f^b, f in MHz, loss in dB/100 m. For cables whose centre is thinly clad.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PowerLoss {
    /// Loss at 1 MHz in dB per 100 m.
    pub at_1_mhz: f64,
    /// Exponent.
    pub exponent: f64,
}

impl PowerLoss {
    /// The loss at a frequency.
    pub fn at(self, frequency: Frequency) -> LossRate {
        LossRate::from_db_per_100m(self.at_1_mhz * frequency.mhz().powf(self.exponent))
    }
}

fn check_positive(points: &[(Frequency, LossRate)]) -> Result<(), LossError> {
    if points.is_empty() {
        return Err(LossError::TooFewPoints);
    }
    let legal = |point: &(Frequency, LossRate)| {
        point.0.hz() > 0 && point.1.db_per_100m.is_finite() && point.1.db_per_100m > 0.0
    };
    match points.iter().find(|point| !legal(point)) {
        Some(point) => Err(LossError::NotPositive { frequency: point.0 }),
        None => Ok(()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn mhz(mhz: f64) -> Frequency {
        Frequency::from_mhz(mhz)
    }

    fn points(list: &[(f64, f64)]) -> LossPoints {
        let list = list.iter().map(|(f, db)| (mhz(*f), LossRate::from_db_per_100m(*db)));
        LossPoints::new(list.collect()).unwrap()
    }

    #[test]
    fn below_the_lowest_point_nothing_is_said() {
        let refusal = points(&[(30.0, 8.1), (150.0, 18.5)]).at(mhz(1.83)).unwrap_err();
        assert_eq!(refusal.to_string(), "no loss figure below 30 MHz for this cable; measured value needed");
        assert!(matches!(points(&[(1.8, 1.0)]).at(mhz(7.0)), Err(LossError::AboveHighest { .. })));
    }

    #[test]
    fn points_themselves_come_back_and_order_does_not_matter() {
        let cable = points(&[(7.0, 3.3), (1.8, 1.6), (3.6, 2.3)]);
        for (frequency, loss) in cable.points().to_vec() {
            assert_eq!(cable.at(frequency), Ok(loss));
        }
        let middle = cable.at(mhz((1.8f64 * 3.6).sqrt())).unwrap().db_per_100m();
        assert!((middle - (1.6f64 * 2.3).sqrt()).abs() < 1e-6);
    }

    #[test]
    fn wrong_points_are_refused() {
        let point = |f: f64, db: f64| (mhz(f), LossRate::from_db_per_100m(db));
        assert_eq!(LossPoints::new(vec![]), Err(LossError::TooFewPoints));
        assert!(matches!(LossPoints::new(vec![point(0.0, 1.0)]), Err(LossError::NotPositive { .. })));
        assert!(matches!(LossPoints::new(vec![point(1.8, -1.0)]), Err(LossError::NotPositive { .. })));
        assert!(matches!(
            LossPoints::new(vec![point(1.8, 1.0), point(1.8, 2.0)]),
            Err(LossError::Repeated { .. })
        ));
    }

    #[test]
    fn a_fit_finds_the_model_that_made_the_points_and_says_when_it_clamps() {
        let truth = TwoTermLoss { k1: 0.6, k2: 0.01 };
        let made = [1.0, 10.0, 100.0, 400.0].map(|f| (f, truth.at(mhz(f)).db_per_100m()));
        let (model, clamped) = TwoTermLoss::fit(&points(&made)).unwrap();
        assert!((model.k1 - 0.6).abs() < 1e-9 && (model.k2 - 0.01).abs() < 1e-9);
        assert_eq!(clamped, Clamped::Neither);
        let bent = [1.0, 10.0, 100.0].map(|f: f64| (f, 0.6 * f.powf(0.45)));
        assert_eq!(TwoTermLoss::fit(&points(&bent)).unwrap().1, Clamped::Dielectric);
        let steep = [1.0, 10.0, 100.0].map(|f: f64| (f, 0.6 * f.powf(1.1)));
        assert_eq!(TwoTermLoss::fit(&points(&steep)).unwrap().1, Clamped::Conductor);
    }
}
