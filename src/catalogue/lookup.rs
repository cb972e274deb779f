//! Velocity factor and loss of a cable at a frequency, by the interpolations of `physics`.

use rust_decimal::prelude::ToPrimitive;

use crate::physics::loss::{LossError, LossPoints, LossRate};
use crate::physics::velocity::VelocityPoints;
use crate::units::{Frequency, VelocityFactor};

use super::model::{Cable, VelocityData};

impl Cable {
    /// The velocity factor over frequency, if the catalogue has one: one number at every frequency, or points.
    pub fn velocity(&self) -> Option<VelocityPoints> {
        match &self.velocity_factor {
            VelocityData::None => None,
            VelocityData::One(factor) => Some(VelocityPoints::constant(*factor)),
            VelocityData::Points(points) => VelocityPoints::new(points.clone()).ok(),
        }
    }

    /// The velocity factor at a frequency, if the catalogue has one, points interpolated to six decimals.
    pub fn velocity_at(&self, frequency: Frequency) -> Option<VelocityFactor> {
        match &self.velocity_factor {
            VelocityData::One(factor) => Some(*factor),
            VelocityData::None | VelocityData::Points(_) => {
                self.velocity().map(|points| points.at(frequency))
            }
        }
    }

    /// The matched loss in dB per 100 m at a frequency, log-log between the points of the catalogue.
    ///
    /// # Errors
    /// Outside the points, because a square-root law fails there for copper-clad steel at low frequencies, and for
    /// a cable without points.
    pub fn loss_db_per_100m(&self, frequency: Frequency) -> Result<f64, LossError> {
        let rate = |db: &rust_decimal::Decimal| LossRate::from_db_per_100m(db.to_f64().unwrap_or_default());
        let points = self.loss.iter().map(|(frequency, db)| (*frequency, rate(db))).collect();
        LossPoints::new(points)?.at(frequency).map(LossRate::db_per_100m)
    }
}
