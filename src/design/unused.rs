//! Keys that are read and checked, but that nothing uses in this version: said, never passed over in silence.

use super::code;
use crate::problem::{Problem, Problems};
use crate::project::Project;
use crate::units::Money;

/// A note for each such key that the project gives.
pub(super) fn notes(project: &Project) -> Problems {
    let joint = &project.practice.joint;
    let labour = &project.labour;
    let keys = [
        (project.site.profile.is_some(), "site.profile", "lengths are plan distances, as on flat ground"),
        (
            !joint.allowed.is_empty() || joint.price > Money::ZERO,
            "practice.joint",
            "no run is joined: every piece comes out of one length",
        ),
        (
            labour.rate > Money::ZERO || labour.travel.is_some() || labour.start.is_some(),
            "labour",
            "hours, travel and their cost are not counted",
        ),
    ];
    let mut notes = Problems::default();
    for (_, key, what) in keys.into_iter().filter(|(given, ..)| *given) {
        let message = format!("`{key}` is read, but not used in this version: {what}");
        notes.push(Problem::note(code::NOT_USED_YET, None, message, ""));
    }
    notes
}
