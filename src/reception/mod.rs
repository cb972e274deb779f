//! What an expanded array hears: from plan and feed tree to the inputs of `radio`, and back to people's questions.
//!
//! The weights come from the same feed tree that the bill counts, so parts list and pattern cannot disagree.

pub mod element;
pub mod noise;
pub mod report;
pub mod tolerance;
pub mod weight;

pub use element::{Ends, elements, soil};
pub use noise::{Noise, NoiseSite};
pub use report::{
    ArrayReport, DirectionReport, Figures, FrequencyReport, Subject, Weighting, delay_curve, report,
    report_noise, weights,
};
pub use tolerance::{Trim, TrimBasis, level_limit_db, tolerances, trim};
pub use weight::{LineFigures, built, complex, designed, line_figures, path_loss_db};
