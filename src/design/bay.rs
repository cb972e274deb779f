//! The longest bay of a wire between supports.

use rust_decimal::prelude::ToPrimitive;

use crate::catalogue::{Cable, Catalogue};
use crate::physics::GRAVITY;
use crate::physics::sag::longest_bay_m;
use crate::project::{ArraySpec, ElementSpec, Project};
use crate::units::{Diameter, Length};

/// The data of the default wire part.
fn wire_data(catalogue: &Catalogue) -> Option<&Cable> {
    catalogue.default_part("wire").and_then(|part| catalogue.cables.get(&part.id))
}

/// The diameter of the default wire part; 1.6 mm when the catalogue does not say.
pub(super) fn wire_diameter(catalogue: &Catalogue) -> Diameter {
    wire_data(catalogue).and_then(|cable| cable.diameter).unwrap_or(Diameter::from_um(1_600))
}

/// Longest bay and the words for it. The weight is the wire part's, else copper of 8960 kg/m³.
pub(super) fn longest(project: &Project, catalogue: &Catalogue, spec: &ArraySpec) -> (Length, String) {
    const COPPER_KG_PER_M3: f64 = 8_960.0;
    if let Some(bay) = project.practice.max_bay {
        return (bay, format!("longest bay {bay} as given"));
    }
    let own = match &spec.element {
        ElementSpec::Wire(wire) => wire.diameter,
        ElementSpec::Vertical(_) => None,
    };
    let listed = wire_data(catalogue).filter(|_| own.is_none());
    let listed = listed.and_then(|cable| cable.mass_kg_per_km).and_then(|mass| mass.to_f64());
    let radius = own.unwrap_or_else(|| wire_diameter(catalogue)).metres() / 2.0;
    let solid = std::f64::consts::PI * radius * radius * COPPER_KG_PER_M3;
    let weight = listed.map_or(solid, |kg_per_km| kg_per_km / 1000.0) * GRAVITY;
    let tension = project.practice.wire_tension;
    let sag = project.practice.max_sag;
    let metres = longest_bay_m(weight, tension, sag.metres());
    let bay = Length::from_mm(Length::from_metres_nearest(metres).mm().max(1));
    (bay, format!("longest bay √(8 × {tension} × {sag} sag / {weight:.3} N/m) = {bay}"))
}
