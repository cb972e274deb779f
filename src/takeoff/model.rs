//! What a takeoff says: counted items and measured pieces, each with its reason.

use std::collections::BTreeMap;
use std::fmt;

use rust_decimal::Decimal;

use crate::catalogue::PartChoice;
use crate::plan::LineId;
use crate::reception::{Trim, TrimBasis};
use crate::units::{ElectricalLength, Frequency, Length, VelocityFactor};

/// Everything that one option needs, net, with waste and spares beside it.
#[derive(Clone, Debug, Default)]
pub struct Takeoff {
    /// Counted things, by role, then by part.
    pub items: Vec<Item>,
    /// Lengths of wire, coax and control cable to be cut.
    pub pieces: Vec<Piece>,
}

impl Takeoff {
    /// How many of a role the option needs, net.
    pub fn count(&self, role: &str) -> Decimal {
        self.items.iter().filter(|item| item.role == role).map(|item| item.quantity).sum()
    }

    /// The pieces of a role.
    pub fn pieces_of(&self, role: PieceRole) -> impl Iterator<Item = &Piece> {
        self.pieces.iter().filter(move |piece| piece.role == role)
    }
}

/// One counted thing.
#[derive(Clone, Debug)]
pub struct Item {
    /// The item role.
    pub role: String,
    /// The part that serves it.
    pub part: PartChoice,
    /// A short label, unique in the option.
    pub label: String,
    /// How many stand where: point name to count. Empty for things that stand nowhere (tools, spares).
    pub places: BTreeMap<String, Decimal>,
    /// How many, net.
    pub quantity: Decimal,
    /// The unit of the quantity.
    pub unit: String,
    /// Expected loss, beside the net.
    pub waste: Decimal,
    /// Extra units on purpose, beside the net.
    pub spare: Decimal,
    /// How the quantity came about.
    pub reason: Reason,
}

impl Item {
    /// Net, waste and spares together: what must be had.
    pub fn gross(&self) -> Decimal {
        self.quantity + self.waste + self.spare
    }

    /// "W1-F 2, W1-T 2": where the things stand.
    pub fn places_in_words(&self) -> String {
        let words = self.places.iter().map(|(place, count)| match count.normalize() {
            count if count == Decimal::ONE => place.clone(),
            count => format!("{place} {count}"),
        });
        words.collect::<Vec<_>>().join(", ")
    }
}

/// What a piece is for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum PieceRole {
    /// An antenna wire.
    AntennaWire,
    /// Element to hub.
    Branch,
    /// Hub to hub.
    Run,
    /// A delay line.
    Delay,
    /// To the receiver.
    Main,
    /// Control cable.
    Control,
    /// A radial.
    Radial,
    /// Between rods, and from the entry to the building's electrodes.
    BondWire,
}

impl PieceRole {
    /// Every piece role.
    pub const ALL: [Self; 8] = [
        Self::AntennaWire,
        Self::Branch,
        Self::Run,
        Self::Delay,
        Self::Main,
        Self::Control,
        Self::Radial,
        Self::BondWire,
    ];

    /// The word in outputs.
    pub const fn word(self) -> &'static str {
        match self {
            Self::AntennaWire => "antenna-wire",
            Self::Branch => "branch",
            Self::Run => "run",
            Self::Delay => "delay",
            Self::Main => "main",
            Self::Control => "control",
            Self::Radial => "radial",
            Self::BondWire => "bond-wire",
        }
    }

    /// The part role that serves it.
    pub const fn part_role(self) -> &'static str {
        match self {
            Self::AntennaWire => "wire",
            Self::Branch | Self::Run | Self::Delay | Self::Main => "cable",
            Self::Control => "control-cable",
            Self::Radial | Self::BondWire => "radial-wire",
        }
    }

    /// Whether it is a coax line, with a plug at each end.
    pub const fn is_coax(self) -> bool {
        match self {
            Self::Branch | Self::Run | Self::Delay | Self::Main => true,
            Self::AntennaWire | Self::Control | Self::Radial | Self::BondWire => false,
        }
    }
}

impl fmt::Display for PieceRole {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(self.word())
    }
}

/// One length to be cut.
#[derive(Clone, Debug)]
pub struct Piece {
    /// B1, D1, W1 …
    pub label: String,
    /// What it is for.
    pub role: PieceRole,
    /// The part it is cut from.
    pub part: PartChoice,
    /// The point at one end.
    pub from: String,
    /// The point at the other end.
    pub to: String,
    /// Plan distance.
    pub straight: Option<Length>,
    /// As laid.
    pub routed: Option<Length>,
    /// Plug to plug, or end to end.
    pub finished: Length,
    /// To be cut.
    pub cut: Length,
    /// Coiled at the hub because its group is equal.
    pub coiled: Option<Length>,
    /// Letter of the group that must agree; empty for a piece by itself.
    pub match_group: String,
    /// Conductors of a control cable.
    pub conductors: Option<u32>,
    /// The electrical side of a coax line.
    pub electrical: Option<PieceElectrical>,
    /// What plays through it.
    pub serves: String,
    /// The array and line it belongs to, for coax.
    pub line: Option<(usize, LineId)>,
    /// How the length came about.
    pub reason: Reason,
}

/// The electrical side of a coax line.
#[derive(Clone, Debug, PartialEq)]
pub struct PieceElectrical {
    /// Electrical length of the finished piece.
    pub length: ElectricalLength,
    /// Velocity factor at the design frequency.
    pub velocity_factor: VelocityFactor,
    /// The design frequency.
    pub frequency: Frequency,
    /// The frequencies at which the finished piece proves right.
    pub trim: Option<Trim>,
    /// The largest length error that keeps the wanted rear rejection, physical.
    pub tolerance: Option<Length>,
}

impl PieceElectrical {
    /// How a finished piece is proved right: "open far end, first dip at 4.357 MHz ± 22 kHz (± 7 cm)"; nothing for a piece
    /// that need not be exact.
    pub fn proof(&self) -> Option<String> {
        let (trim, tolerance) = (self.trim?, self.tolerance?);
        let physical = self.length.metres() * self.velocity_factor.value();
        let kilohertz = trim.open.mhz() * 1000.0 * tolerance.metres() / physical;
        let basis = match trim.basis {
            TrimBasis::Points => "with the velocity factor of the test frequency",
            TrimBasis::OneNumber => {
                "± 0.6 % more, for the catalogue has one velocity factor for all frequencies"
            }
        };
        Some(format!(
            "open far end, first dip at {:.3} MHz ± {kilohertz:.0} kHz (± {:.1} cm), {basis}",
            trim.open.mhz(),
            tolerance.metres() * 100.0
        ))
    }
}

/// How a number came about, one step a line.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Reason {
    /// The steps in order.
    pub steps: Vec<String>,
}

impl Reason {
    /// One step.
    pub fn one(step: impl Into<String>) -> Self {
        Self { steps: vec![step.into()] }
    }

    /// Several steps.
    pub fn steps(steps: Vec<String>) -> Self {
        Self { steps }
    }
}

impl fmt::Display for Reason {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(&self.steps.join("; "))
    }
}
