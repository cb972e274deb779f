//! A design to its physical inventory: items and pieces, each with its reason.
//!
//! Two walks: over the points of the layout, and over the nodes and lines of the feed tree. Neither asks which family
//! they came from.

mod coax;
pub mod control;
mod earth;
pub mod hub;
pub mod model;
mod spare;
pub mod station;
mod sundry;
mod support;
mod tally;
mod vertical;
mod wire;

pub use model::{Item, Piece, PieceElectrical, PieceRole, Reason, Takeoff};

use crate::catalogue::Catalogue;
use crate::design::{ArrayDesign, Design};
use crate::project::Project;
use tally::Tally;

/// What every part of the takeoff may look at.
pub(crate) struct Scene<'a> {
    project: &'a Project,
    catalogue: &'a Catalogue,
    design: &'a Design,
}

/// Takes off one option.
pub fn take_off(project: &Project, catalogue: &Catalogue, design: &Design) -> Takeoff {
    let scene = Scene { project, catalogue, design };
    let mut tally = Tally::new(catalogue);
    for (index, array) in design.arrays.iter().enumerate() {
        take_off_array(&mut tally, &scene, index, array);
    }
    station::take_off(&mut tally, &scene);
    sundry::take_off(&mut tally, &scene);
    spare::add(&mut tally, project);
    tally.finish()
}

fn take_off_array(tally: &mut Tally<'_>, scene: &Scene<'_>, index: usize, array: &ArrayDesign) {
    wire::take_off(tally, scene, array);
    vertical::take_off(tally, array);
    support::take_off(tally, array);
    earth::take_off(tally, scene, array);
    coax::take_off(tally, scene, index, array);
    hub::take_off(tally, array);
    control::take_off(tally, scene, array);
}
