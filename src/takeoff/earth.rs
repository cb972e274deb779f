//! Earth sets: rods, clamps, bonds between rods, radials.

use super::model::{Piece, PieceRole, Reason};
use super::tally::{Tally, Want};
use super::{ArrayDesign, Scene};
use crate::catalogue::Catalogue;
use crate::plan::{EarthSet, EarthUse, Fixture, Point};
use crate::project::Project;
use crate::units::{Length, Resistivity};

/// Soil class by resistivity; a boundary belongs to the wetter class (ranges from memory of standard tables).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum SoilClass {
    /// Up to 100 ohm m.
    Wet,
    /// Up to 300 ohm m.
    Average,
    /// Up to 1000 ohm m.
    Sand,
    /// Above.
    Rock,
}

impl SoilClass {
    /// The class of a resistivity; average when none is given.
    pub fn of(soil: Option<Resistivity>) -> Self {
        match soil.map(Resistivity::ohm_metres) {
            None => Self::Average,
            Some(rho) if rho <= 100.0 => Self::Wet,
            Some(rho) if rho <= 300.0 => Self::Average,
            Some(rho) if rho <= 1_000.0 => Self::Sand,
            Some(_) => Self::Rock,
        }
    }

    const fn word(self) -> &'static str {
        match self {
            Self::Wet => "wet soil",
            Self::Average => "average soil",
            Self::Sand => "sand",
            Self::Rock => "rock",
        }
    }

    /// Rods, radials and radial length of a set (common practice, no source).
    const fn set(self, serves: EarthUse) -> (u32, u32, Length) {
        let (rods, radials, metres) = match (self, serves) {
            (Self::Wet, EarthUse::WireEnd) => (1, 2, 10),
            (Self::Average, EarthUse::WireEnd) => (2, 4, 15),
            (Self::Sand, EarthUse::WireEnd) => (3, 6, 15),
            (Self::Rock, EarthUse::WireEnd) => (2, 8, 20),
            (Self::Wet, EarthUse::Vertical) => (1, 4, 8),
            (Self::Average, EarthUse::Vertical) => (1, 8, 10),
            (Self::Sand, EarthUse::Vertical) => (1, 16, 10),
            (Self::Rock, EarthUse::Vertical) => (1, 16, 15),
        };
        (rods, radials, Length::from_mm(metres * 1_000))
    }
}

/// What one earth set consists of, and why.
#[derive(Clone, Debug)]
pub struct EarthSize {
    /// Rods.
    pub rods: u32,
    /// Radials.
    pub radials: u32,
    /// Length of each radial.
    pub radial_length: Length,
    rods_why: String,
    radials_why: String,
}

/// The size of an earth set on this land.
pub fn earth_size(project: &Project, set: EarthSet) -> EarthSize {
    let practice = &project.practice;
    let class = SoilClass::of(project.site.soil);
    let (rods, radials, length) = class.set(set.serves);
    let (given_rods, given_radials, given_length, who) = match set.serves {
        EarthUse::WireEnd => {
            (practice.rods_per_set, practice.radials_per_set, practice.radial_length, "a wire's end")
        }
        EarthUse::Vertical => {
            (practice.vertical_rods, practice.vertical_radials, practice.vertical_radial_length, "a vertical")
        }
    };
    let how = |given: bool| if given { "as given".to_owned() } else { class.word().to_owned() };
    let (radial_length, shortened) = match (given_length, longest_radial(set)) {
        (Some(given), _) => (given, String::new()),
        (None, Some(longest)) if longest < length => {
            let apart = set.nearest_other.unwrap_or_default();
            (longest, format!(", shortened to 0.45 × {apart} so that sets do not touch"))
        }
        (None, _) => (length, String::new()),
    };
    EarthSize {
        rods: given_rods.unwrap_or(rods),
        radials: given_radials.unwrap_or(radials),
        radial_length,
        rods_why: format!("rods of the earth set at {who} ({})", how(given_rods.is_some())),
        radials_why: format!(
            "radial of the earth set at {who} ({}{shortened})",
            how(given_radials.is_some())
        ),
    }
}

/// 0.45 of the distance to the next element's earth, rounded down to 0.1 m.
pub fn longest_radial(set: EarthSet) -> Option<Length> {
    let apart = set.nearest_other?;
    Some(Length::from_mm(apart.mm() * 45 / 100 / 100 * 100))
}

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

/// The default ground rod's length; 1.2 m when the catalogue does not say.
pub fn rod_length(catalogue: &Catalogue) -> Length {
    let rod = catalogue.default_part("ground-rod");
    rod.and_then(|part| part.length("length")).unwrap_or(Length::from_mm(1_200))
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
