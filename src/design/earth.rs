//! Earth sets: how many rods and radials, and what resistance they come to.

use rust_decimal::Decimal;
use rust_decimal::prelude::ToPrimitive;

use crate::catalogue::Catalogue;
use crate::physics::earth::{Rod, SoilClass, soil_class};
use crate::physics::earth_set::set_resistance;
use crate::plan::{EarthSet, EarthUse};
use crate::project::Project;
use crate::units::{Diameter, Length, Resistance, Resistivity};

/// Taken for average soil where the project gives no resistivity (common practice, no source).
const USUAL_SOIL: Resistivity = Resistivity::new(200.0);

/// The class of the site's soil; average when none is given.
fn soil_of(project: &Project) -> SoilClass {
    project.site.soil.map_or(SoilClass::Average, soil_class)
}

const fn soil_word(class: SoilClass) -> &'static str {
    match class {
        SoilClass::Wet => "wet soil",
        SoilClass::Average => "average soil",
        SoilClass::Sand => "sand",
        SoilClass::Rock => "rock",
    }
}

/// Rods, radials and radial length of a set by soil (common practice, no source).
const fn usual_set(class: SoilClass, serves: EarthUse) -> (u32, u32, Length) {
    let (rods, radials, metres) = match (class, serves) {
        (SoilClass::Wet, EarthUse::WireEnd) => (1, 2, 10),
        (SoilClass::Average, EarthUse::WireEnd) => (2, 4, 15),
        (SoilClass::Sand, EarthUse::WireEnd) => (3, 6, 15),
        (SoilClass::Rock, EarthUse::WireEnd) => (2, 8, 20),
        (SoilClass::Wet, EarthUse::Vertical) => (1, 4, 8),
        (SoilClass::Average, EarthUse::Vertical) => (1, 8, 10),
        (SoilClass::Sand, EarthUse::Vertical) => (1, 16, 10),
        (SoilClass::Rock, EarthUse::Vertical) => (1, 16, 15),
    };
    (rods, radials, Length::from_mm(metres * 1_000))
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
    /// Why so many rods.
    pub rods_why: String,
    /// Why so many radials, and so long.
    pub radials_why: String,
}

/// The size of an earth set on this land.
pub fn earth_size(project: &Project, set: EarthSet) -> EarthSize {
    let practice = &project.practice;
    let class = soil_of(project);
    let (rods, radials, length) = usual_set(class, set.serves);
    let (given_rods, given_radials, given_length, who) = match set.serves {
        EarthUse::WireEnd => {
            (practice.rods_per_set, practice.radials_per_set, practice.radial_length, "a wire's end")
        }
        EarthUse::Vertical => {
            (practice.vertical_rods, practice.vertical_radials, practice.vertical_radial_length, "a vertical")
        }
    };
    let how = |given: bool| if given { "as given".to_owned() } else { soil_word(class).to_owned() };
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

/// The default ground rod's length; 1.2 m when the catalogue does not say.
pub fn rod_length(catalogue: &Catalogue) -> Length {
    let rod = catalogue.default_part("ground-rod");
    rod.and_then(|part| part.length("length")).unwrap_or(Length::from_mm(1_200))
}

/// Low-frequency resistance of `rods` default rods in the site's soil; nothing without rods.
///
/// One rod by Dwight, several by the factors of IEEE Std 142, both as in `physics`. Wet or dry seasons halve or double it.
pub fn set_ohms(project: &Project, catalogue: &Catalogue, rods: u32) -> Option<Resistance> {
    let part = catalogue.default_part("ground-rod");
    let millimetres = part.and_then(|part| part.number("diameter_mm")).unwrap_or(Decimal::new(142, 1));
    let micrometres = (millimetres * Decimal::ONE_THOUSAND).to_i64()?;
    let rod = Rod { length: rod_length(catalogue), diameter: Diameter::from_um(micrometres) };
    set_resistance(rod.resistance(project.site.soil.unwrap_or(USUAL_SOIL)), rods)
}
