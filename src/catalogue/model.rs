//! A catalogue in memory: parts, their offers, cable data, task hours and terrain multipliers.

use std::collections::BTreeMap;

use chrono::NaiveDate;
use rust_decimal::Decimal;

use crate::problem::Place;
use crate::units::{Currency, Diameter, Force, Frequency, Length, Money, VelocityFactor};

/// Everything that can be bought, and what it is.
#[derive(Clone, Debug, Default)]
pub struct Catalogue {
    /// Parts by id.
    pub parts: BTreeMap<String, Part>,
    /// Offers by id.
    pub offers: BTreeMap<String, Offer>,
    /// Cable and wire data by part id.
    pub cables: BTreeMap<String, Cable>,
    /// Tasks by id.
    pub labour: BTreeMap<String, Task>,
    /// Terrain classes by name.
    pub terrain: BTreeMap<String, TerrainRow>,
}

/// What a thing is: one row of `parts.csv`.
#[derive(Clone, Debug)]
pub struct Part {
    /// Its id.
    pub id: String,
    /// The catalogue role: `cable`, `wire`, `radial-wire`, `control-cable`, or an item role.
    pub role: String,
    /// What a helper would call it.
    pub description: String,
    /// The unit it is counted in.
    pub unit: Unit,
    /// `key=value` attributes.
    pub attributes: BTreeMap<String, String>,
    /// Tax class; `goods` when blank.
    pub tax_class: String,
    /// Weight of one unit in kilograms.
    pub weight_kg: Option<Decimal>,
    /// Parts that may stand in for it, in order.
    pub alternates: Vec<String>,
    /// Hired by the day, never bought.
    pub hire: bool,
    /// A note.
    pub note: String,
    /// Where its row stands.
    pub place: Place,
    /// Whether the row comes from the built-in copy.
    pub source: Source,
}

/// Where a row comes from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Source {
    /// The copy compiled into the program, with invented prices.
    BuiltIn,
    /// The user's own files.
    User,
}

/// The unit that a part is counted in.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unit {
    /// Pieces.
    Each,
    /// Metres.
    Metre,
    /// Kilograms.
    Kilogram,
    /// Litres.
    Litre,
}

impl Unit {
    /// The word in the catalogue.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Each => "each",
            Self::Metre => "m",
            Self::Kilogram => "kg",
            Self::Litre => "l",
        }
    }
}

/// One thing that can go in a basket: one row of `offers.csv`.
#[derive(Clone, Debug)]
pub struct Offer {
    /// Its id.
    pub id: String,
    /// The part it delivers.
    pub part: String,
    /// Units of the part in one pack.
    pub pack: Decimal,
    /// The price of one pack without tax; `None` is unpriced.
    pub price: Option<Money>,
    /// The currency of the price.
    pub currency: Currency,
    /// The day of the price.
    pub priced_on: Option<NaiveDate>,
    /// Fewest packs in an order.
    pub min_packs: u64,
    /// Packs that can be had; `None` is any number.
    pub available: Option<u64>,
    /// Supplier slot such as S1.
    pub supplier: String,
    /// Calendar days to delivery.
    pub lead_days: Option<u32>,
    /// Freight group.
    pub ship_group: String,
    /// A note.
    pub note: String,
    /// Where its row stands.
    pub place: Place,
    /// Whether the row comes from the built-in copy.
    pub source: Source,
}

/// Electrical and mechanical data of a cable or wire: one row of `cables.csv`.
#[derive(Clone, Debug)]
pub struct Cable {
    /// The part.
    pub part: String,
    /// Characteristic impedance in ohms.
    pub z0_ohm: Option<Decimal>,
    /// One velocity factor, or points.
    pub velocity_factor: VelocityData,
    /// Loss points: frequency and dB per 100 m, ascending.
    pub loss: Vec<(Frequency, Decimal)>,
    /// Conductor material in words.
    pub conductor: String,
    /// Outer diameter of a cable, wire diameter of a wire.
    pub diameter: Option<Diameter>,
    /// Mass in kilograms a kilometre.
    pub mass_kg_per_km: Option<Decimal>,
    /// Breaking load.
    pub breaking: Option<Force>,
    /// A note.
    pub note: String,
    /// Where its row stands.
    pub place: Place,
}

/// The velocity factor as the catalogue has it.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub enum VelocityData {
    /// Not given.
    #[default]
    None,
    /// One number, used at every frequency.
    One(VelocityFactor),
    /// Points, ascending in frequency.
    Points(Vec<(Frequency, VelocityFactor)>),
}

/// Hours of a task: one row of `labour.csv`.
#[derive(Clone, Debug)]
pub struct Task {
    /// Its id.
    pub id: String,
    /// What is done.
    pub what: String,
    /// The unit it is counted in.
    pub unit: String,
    /// Person-hours a unit: low, likely, high.
    pub hours: [Decimal; 3],
    /// Terrain multiplier column: walk, dig, rod, clear, tree or none.
    pub terrain: String,
    /// Fewest people.
    pub crew_min: u32,
    /// Skill needed.
    pub skill: String,
    /// Tools needed.
    pub tools: String,
    /// Weather letters.
    pub weather: String,
    /// Tasks that come first.
    pub after: String,
    /// Whether it gets quicker with repetition.
    pub learns: bool,
    /// A note.
    pub note: String,
}

/// Multipliers of a terrain class: one row of `terrain.csv`.
#[derive(Clone, Debug)]
pub struct TerrainRow {
    /// The class.
    pub class: String,
    /// Multipliers by column: walk, dig, rod, clear, tree.
    pub factors: BTreeMap<String, Decimal>,
    /// Routed over straight length.
    pub route_factor: Decimal,
}

impl Catalogue {
    /// The part for a catalogue role when the project names none: the row with `default=yes`, the user's before the
    /// built-in one, then the first by part id. Never the cheapest, which would change lengths when a price changes.
    pub fn default_part(&self, role: &str) -> Option<&Part> {
        self.default_part_with(role, |_| true)
    }

    /// As [`Self::default_part`], among the parts of the role that `fits` accepts.
    pub fn default_part_with(&self, role: &str, fits: impl Fn(&Part) -> bool) -> Option<&Part> {
        let candidates: Vec<&Part> =
            self.parts.values().filter(|part| part.role == role && fits(part)).collect();
        let named = |part: &&&Part| part.attribute("default") == Some("yes");
        let own = candidates.iter().filter(named).find(|part| part.source == Source::User);
        own.or_else(|| candidates.iter().find(named)).or(candidates.first()).copied()
    }

    /// The offers of a part by id.
    pub fn offers_of<'a>(&'a self, part: &'a str) -> impl Iterator<Item = &'a Offer> + 'a {
        self.offers.values().filter(move |offer| offer.part == part)
    }
}

impl Part {
    /// The value of an attribute.
    pub fn attribute(&self, key: &str) -> Option<&str> {
        self.attributes.get(key).map(String::as_str)
    }

    /// The number in an attribute, if it is one.
    pub fn number(&self, key: &str) -> Option<Decimal> {
        self.attribute(key).and_then(|text| Decimal::from_str_exact(text).ok())
    }

    /// The length in an attribute, in metres when it is a bare number.
    pub fn length(&self, key: &str) -> Option<Length> {
        self.number(key).and_then(Length::from_decimal_metres_nearest)
    }
}
