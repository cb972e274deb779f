//! Elements of a layout as `radio` wants them.

use rust_decimal::prelude::ToPrimitive;

use crate::plan::{ElementKind, Layout, WireElement};
use crate::project::{self, Ground};
use crate::radio::{self, RadioElement, Soil};
use crate::units::Resistance;

/// How the far ends of wires are taken.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ends {
    /// No reflection, whatever the project says.
    Matched,
    /// As built: the given resistor plus the earth set's resistance; a computed one from `resistor`.
    AsBuilt {
        /// Resistance of one earth set.
        earth: Resistance,
        /// The computed resistor.
        resistor: Resistance,
    },
}

/// The elements of a layout, in its order.
pub fn elements(layout: &Layout, ends: Ends) -> Vec<RadioElement> {
    layout
        .elements
        .iter()
        .map(|element| RadioElement {
            position: radio::Position { forward_m: element.at.forward_m(), right_m: element.at.right_m() },
            kind: match &element.kind {
                ElementKind::Vertical(foot) => radio::ElementKind::ShortVertical { height: foot.height },
                ElementKind::Wire(wire) => low_wire(wire, ends),
            },
        })
        .collect()
}

fn low_wire(wire: &WireElement, ends: Ends) -> radio::ElementKind {
    radio::ElementKind::LowWire {
        length: wire.length,
        height: wire.height,
        diameter: wire.diameter,
        termination: termination(wire.termination, ends),
    }
}

fn termination(given: project::Termination, ends: Ends) -> radio::Termination {
    let total = |resistor: Option<Resistance>| match ends {
        Ends::Matched => radio::Termination::Matched,
        Ends::AsBuilt { earth, resistor: computed } => {
            let ohms = resistor.unwrap_or(computed).ohms() + earth.ohms();
            radio::Termination::Total(Resistance::new(ohms))
        }
    };
    match given {
        project::Termination::Computed => total(None),
        project::Termination::Resistor(resistor) => total(Some(resistor)),
        project::Termination::Matched => radio::Termination::Matched,
        project::Termination::Reflection(reflection) => {
            radio::Termination::Reflection(reflection.to_f64().unwrap_or_default())
        }
    }
}

/// The ground constants of a site (standard grounds: 1, 5 and 20 mS/m with permittivity 5, 13 and 20).
pub fn soil(ground: Ground) -> Soil {
    match ground {
        Ground::Perfect => Soil::Perfect,
        Ground::Good => Soil::GOOD,
        Ground::Average => Soil::AVERAGE,
        Ground::Poor => Soil::POOR,
        Ground::Given { conductivity, permittivity } => {
            Soil::Real { conductivity, permittivity: permittivity.to_f64().unwrap_or(1.0) }
        }
    }
}
