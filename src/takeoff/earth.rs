//! Earth sets: rods, clamps, bonds between rods, radials.

use super::model::{Piece, PieceRole, Reason};
use super::tally::{Tally, Want};
use super::{ArrayDesign, Scene};
use crate::design::{EarthSize, earth_size, rod_length};
use crate::plan::{EarthSet, Fixture, Point};
use crate::units::Length;

/// Counts every earth set.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>, array: &ArrayDesign) {
    for point in &array.plan.layout.points {
        for fixture in &point.fixtures {
            if let Fixture::Earth(set) = fixture {
                one_set(tally, scene, point, *set);
            }
        }
    }
}

fn one_set(tally: &mut Tally<'_>, scene: &Scene<'_>, point: &Point, set: EarthSet) {
    let size = earth_size(scene.project, set);
    tally.add("ground-rod", &Want::any(), &point.name, size.rods, &size.rods_why);
    tally.add("rod-clamp", &Want::any(), &point.name, size.rods, "a clamp for each rod");
    for n in 1..=size.radials {
        let label = format!("{}-R{n}", point.name);
        tally.push(radial(tally, point, label, &size));
    }
    let lug = Want::any().with("kind", "lug");
    tally.add("consumable", &lug, &point.name, size.radials, "a clamped lug for each radial");
    if size.rods > 1 {
        tally.push(bond(tally, scene, point, size.rods));
    }
}

fn radial(tally: &Tally<'_>, point: &Point, label: String, size: &EarthSize) -> Piece {
    let length = size.radial_length;
    plain_piece(
        label,
        PieceRole::Radial,
        tally.choose("radial-wire", &Want::any()),
        (&point.name, "outward"),
        length,
        Reason::one(format!("{length}: {}", size.radials_why)),
    )
}

/// Bonding wire = rod spacing × (rods − 1) + 0.5 m (common practice, no source).
fn bond(tally: &Tally<'_>, scene: &Scene<'_>, point: &Point, rods: u32) -> Piece {
    let (spacing, how) = match scene.project.practice.rod_spacing {
        Some(given) => (given, "as given"),
        None => (rod_length(scene.catalogue), "a rod's length"),
    };
    let gaps = i64::from(rods) - 1;
    let length = spacing * gaps + Length::from_mm(500);
    let why = format!("{gaps} × {spacing} between rods ({how}) + 0.5 m = {length}");
    plain_piece(
        format!("{}-E", point.name),
        PieceRole::BondWire,
        tally.choose("radial-wire", &Want::any()),
        (&point.name, &point.name),
        length,
        Reason::one(why),
    )
}

/// A length of wire that is cut as it is.
pub(super) fn plain_piece(
    label: String,
    role: PieceRole,
    part: crate::catalogue::PartChoice,
    ends: (&str, &str),
    length: Length,
    reason: Reason,
) -> Piece {
    Piece {
        label,
        role,
        part,
        from: ends.0.to_owned(),
        to: ends.1.to_owned(),
        straight: Some(length),
        routed: Some(length),
        finished: length,
        cut: length,
        coiled: None,
        match_group: String::new(),
        conductors: None,
        electrical: None,
        serves: String::new(),
        line: None,
        reason,
    }
}
