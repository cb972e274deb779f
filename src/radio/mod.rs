//! What an array hears: patterns, directivity, bounds and tolerances of low-band receive arrays.
//!
//! Pure functions over plain inputs; nothing here knows a project, a part or a feed tree. The method needs no
//! matrix solve of antenna currents: every element has a pattern in closed form over real ground (short vertical,
//! terminated low wire, or one wire of a coupled pair), the output is the weighted sum of the elements, and the
//! average over the sky is a quadratic form of the weights.
//!
//! Conventions: x points forward (the wanted direction), y to the left, z up; azimuth φ runs anticlockwise from x
//! inside formulas and *clockwise* in everything shown to people. Time factor e^{+jωt}; a wave from the unit vector
//! r has phase e^{+jk r·p} at point p, so an element nearer the source leads. θ is the angle from the zenith.
//!
//! ```
//! use arraywright::radio::{self, Array, ElementKind, Position, RadioElement, Soil};
//! use arraywright::units::{Frequency, Length};
//!
//! let frequency = Frequency::from_mhz(1.83);
//! let kind = ElementKind::ShortVertical { height: Length::from_mm(6_000) };
//! let at = |forward_m| RadioElement { position: Position { forward_m, right_m: 0.0 }, kind };
//! // rear element inverted and delayed by half the spacing, front element direct
//! let weights = vec![-radio::delay_factor(frequency, 9.15), 1.0.into()];
//! let array = Array { elements: vec![at(-9.15), at(9.15)], weights };
//! let report = radio::report(&array, Soil::AVERAGE, frequency, &radio::ErrorSize::default())?;
//! assert!((report.directivity.rdf_db - 9.93).abs() < 0.05);
//! # Ok::<(), radio::RadioError>(())
//! ```

mod cluster;
mod coupled;
mod delay;
mod directivity;
mod element;
mod error;
mod gain;
mod ground;
mod line;
mod low_wire;
mod monte_carlo;
mod pattern;
mod plain;
mod quotient;
mod rear;
mod report;
mod response;
mod scan;
mod sphere;
mod tolerance;
mod two_way;
mod validity;
mod vertical;

pub use cluster::{COUPLING_DISTANCE_M, Grouping, Uncovered, group};
pub use delay::{DelayCurve, DelayPoint, Plateau, delay_curve};
pub use directivity::{AtElevation, Directivity, REPORTED_ELEVATIONS_DEG, WorstRear, directivity};
pub use element::{
    Array, ElementKind, Position, RadioElement, ReturnPath, Termination, delay_factor, turned_to, weight,
};
pub use error::RadioError;
pub use gain::{average_gain, average_over_one_element, realised_gain_dbi};
pub use ground::{Reflection, Soil, penetration_depth_m, reflection, wave_tilt};
pub use line::{
    LineConstants, LineTerms, PairConstants, line_terms, pair_constants, perfect_ground_impedance_ohm,
    two_wire_impedance_ohm,
};
pub use low_wire::reflection_coefficient;
pub use monte_carlo::{ErrorSize, Quantiles, Sampling, Spread, monte_carlo};
pub use pattern::{CutPoint, azimuth_cut, elevation_cut};
pub use plain::plain_rdf_db;
pub use quotient::{Bound, Correlation, Quotient};
pub use report::{PatternReport, report, report_of};
pub use response::{Field, Response};
pub use sphere::SphereRule;
pub use tolerance::{
    ElementError, RandomErrors, SingleErrorLimit, line_error_m, pair_null_floor_db, random_errors,
    single_error_limit,
};
pub use two_way::balanced_return;
pub use validity::{FRONT_TO_BACK_CEILING_DB, Validity, validity};
pub use vertical::vertical_field;
