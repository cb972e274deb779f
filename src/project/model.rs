//! A project that can hold only legal values: what reading a project file gives.

use chrono::NaiveDate;
use rust_decimal::Decimal;
use std::collections::BTreeMap;

pub use super::choice::{
    AmplifierChoice, Combining, CrossingKind, DelayStyle, Join, NoiseClass, Power, Scheme, Supports, Terrain,
};
use super::practice::Practice;
use crate::problem::Place;
use crate::units::{
    Angle, Bearing, Conductivity, Currency, Decibel, Diameter, Frequency, Length, Money, Percent, Resistance,
    Resistivity,
};

/// Everything a project file says, with every default filled in.
#[derive(Clone, Debug)]
pub struct Project {
    /// What the sheets are headed with.
    pub title: String,
    /// The currency of every total.
    pub currency: Currency,
    /// The day that prices are judged against, and the date on the sheets.
    pub estimated: NaiveDate,
    /// The design frequency.
    pub frequency: Frequency,
    /// Other bands that the array must serve.
    pub also: Vec<Frequency>,
    /// The receiver's noise figure.
    pub receiver_noise: Decibel,
    /// The land.
    pub site: Site,
    /// The arrays in file order, at least one.
    pub arrays: Vec<ArraySpec>,
    /// Keep-out areas.
    pub keep_out: Vec<KeepOut>,
    /// Roads, paths, ditches and gates.
    pub crossings: Vec<Crossing>,
    /// What stands on the site already.
    pub existing: Vec<Existing>,
    /// Every allowance.
    pub practice: Practice,
    /// Tax, freight, contingency, exchange.
    pub prices: Prices,
    /// Crew and rate.
    pub labour: LabourTerms,
    /// What the owner already has, from the project file and from `on-hand.csv`.
    pub on_hand: Vec<OnHand>,
    /// Every default that was used, in the words of the assumption list.
    pub assumptions: Vec<Assumption>,
}

impl Project {
    /// The names of the options in file order; one empty name when the file has none.
    ///
    /// Arrays without an option belong to every option.
    pub fn options(&self) -> Vec<String> {
        let mut names: Vec<String> = Vec::new();
        for name in self.arrays.iter().filter_map(|array| array.option.as_ref()) {
            if !names.contains(name) {
                names.push(name.clone());
            }
        }
        if names.is_empty() { vec![String::new()] } else { names }
    }

    /// The arrays of one option in file order, those that belong to all included.
    pub fn arrays_of(&self, option: &str) -> Vec<&ArraySpec> {
        self.arrays.iter().filter(|a| a.option.as_deref().is_none_or(|name| name == option)).collect()
    }

    /// This project with the arrays of one option only, and the assumptions that belong to them.
    #[must_use]
    pub fn only(&self, option: &str) -> Self {
        let arrays: Vec<ArraySpec> = self.arrays_of(option).into_iter().cloned().collect();
        let mut assumptions = self.assumptions.clone();
        assumptions.retain(|assumption| {
            let array = self.array_behind(&assumption.key);
            array.is_none_or(|array| arrays.iter().any(|kept| kept.name == array.name))
        });
        Self { arrays, assumptions, ..self.clone() }
    }

    /// The array that the key of an assumption speaks of, such as `array.north.feed.hub`; none for keys of the project.
    pub fn array_behind(&self, key: &str) -> Option<&ArraySpec> {
        let rest = key.strip_prefix("array.")?;
        let of = |name: &str| rest.strip_prefix(name).is_some_and(|rest| rest.starts_with('.'));
        // Names may hold full stops, so the longest that fits is the one meant.
        self.arrays.iter().filter(|array| of(&array.name)).max_by_key(|array| array.name.len())
    }

    /// Every band of the project, the design frequency first.
    pub fn frequencies(&self) -> Vec<Frequency> {
        std::iter::once(self.frequency).chain(self.also.iter().copied()).collect()
    }
}

/// A default that was used because the project said nothing.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Assumption {
    /// The key it would be given by, such as `practice.riser`.
    pub key: String,
    /// The value used, with its unit.
    pub value: String,
    /// Why this value.
    pub why: String,
}

/// The land.
#[derive(Clone, Debug)]
pub struct Site {
    /// Latitude and longitude of the point east 0, north 0, degrees, WGS 84.
    pub coordinates: Option<(Decimal, Decimal)>,
    /// Ground constants for radio.
    pub ground: Ground,
    /// Soil resistivity for the earth rods.
    pub soil: Option<Resistivity>,
    /// Terrain class.
    pub terrain: Terrain,
    /// External noise class.
    pub noise: NoiseClass,
    /// Where the main feedline ends.
    pub receiver: SitePoint,
    /// Magnetic declination, east positive, if given.
    pub declination: Option<Angle>,
    /// A file of heights beside the project, if named.
    pub profile: Option<String>,
}

/// A point in the site frame: east and north of the datum.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct SitePoint {
    /// East of the datum.
    pub east: Length,
    /// North of the datum.
    pub north: Length,
}

/// A place in the frame of an array: forward along the heading, right 90° clockwise from it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct ArrayPoint {
    /// Along the heading.
    pub forward: Length,
    /// 90° clockwise from the heading.
    pub right: Length,
}

/// Ground constants.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Ground {
    /// A perfect conductor, for checks of the algebra.
    Perfect,
    /// 20 mS/m, permittivity 20.
    Good,
    /// 5 mS/m, permittivity 13.
    Average,
    /// 1 mS/m, permittivity 5.
    Poor,
    /// Given constants.
    Given {
        /// Conductivity.
        conductivity: Conductivity,
        /// Relative permittivity.
        permittivity: Decimal,
    },
}

/// One `[[array]]`: an element, optionally staged end-fire, optionally staged broadside.
#[derive(Clone, Debug)]
pub struct ArraySpec {
    /// Its name, unique in the file.
    pub name: String,
    /// The option it belongs to; `None` belongs to all.
    pub option: Option<String>,
    /// The wanted direction.
    pub heading: Bearing,
    /// The centre of the feed points in the site frame.
    pub centre: SitePoint,
    /// The element.
    pub element: ElementSpec,
    /// The end-fire stage, if any.
    pub endfire: Option<EndfireStage>,
    /// The broadside stage, if any.
    pub broadside: Option<BroadsideSpec>,
    /// How it is fed.
    pub feed: FeedSpec,
    /// Where the array begins in the file, and where its keys stand, for messages found later.
    pub places: ArrayPlaces,
}

/// Places in the project file that later stages may have to point at.
#[derive(Clone, Debug, Default)]
pub struct ArrayPlaces {
    /// The array's `name`.
    pub name: Option<Place>,
    /// The element's key.
    pub element: Option<Place>,
    /// The end-fire stage's key.
    pub endfire: Option<Place>,
    /// The broadside stage's key.
    pub broadside: Option<Place>,
    /// The `[array.feed]` keys by name, such as `branch`.
    pub feed: BTreeMap<String, Place>,
}

/// An element.
#[derive(Clone, Debug)]
pub enum ElementSpec {
    /// A terminated low wire.
    Wire(WireSpec),
    /// A short vertical.
    Vertical(VerticalSpec),
}

/// A terminated low wire; its feed point is at the rear, its termination in front.
#[derive(Clone, Debug)]
pub struct WireSpec {
    /// Span between the end supports.
    pub length: Length,
    /// Height above ground.
    pub height: Length,
    /// Wire diameter; `None` takes the wire part's.
    pub diameter: Option<Diameter>,
    /// What holds it up.
    pub supports: Supports,
    /// The far end.
    pub termination: Termination,
}

/// The far end of a wire.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Termination {
    /// The nearest standard resistor to the computed wire impedance less the earth's resistance.
    Computed,
    /// The resistor alone, its earth is added.
    Resistor(Resistance),
    /// No reflection at all.
    Matched,
    /// A given current reflection coefficient.
    Reflection(Decimal),
}

/// A short vertical.
#[derive(Clone, Debug)]
pub struct VerticalSpec {
    /// Height above ground.
    pub height: Length,
    /// With an amplifier at the element, or passive and loaded.
    pub kind: VerticalKind,
}

/// What feeds a vertical.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum VerticalKind {
    /// High-impedance amplifier at the base.
    Active,
    /// Loading coil and swamping resistor.
    Passive,
}

/// The end-fire stage of an array.
#[derive(Clone, Debug)]
pub enum EndfireStage {
    /// Two staggered wires.
    Echelon(EchelonSpec),
    /// Two or three verticals in line.
    Endfire(EndfireSpec),
    /// Positions and weights as given.
    Custom(CustomSpec),
}

/// `echelon`.
#[derive(Clone, Debug)]
pub struct EchelonSpec {
    /// Step along the beam.
    pub stagger: Length,
    /// How far the front wire stands to the right (negative: left).
    pub offset: Length,
    /// The phasing.
    pub phasing: Phasing,
}

/// `endfire`.
#[derive(Clone, Debug)]
pub struct EndfireSpec {
    /// Elements in line, 2 or 3.
    pub count: usize,
    /// Step along the beam.
    pub spacing: Length,
    /// The phasing.
    pub phasing: Phasing,
}

/// How the rows of an end-fire stage are phased.
#[derive(Clone, Debug)]
pub enum Phasing {
    /// One of the three schemes with a delay.
    Scheme {
        /// Which one.
        scheme: Scheme,
        /// The delay line's electrical length over the step.
        delay: DelayRatio,
    },
    /// Given weights, front to rear.
    Weights(Vec<Weight>),
}

/// The delay line's electrical length over the row step.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum DelayRatio {
    /// As given, or the default.
    Ratio(Decimal),
    /// Searched for the least worst rear lobe.
    BestRear,
    /// Searched for the largest directivity factor.
    BestRdf,
}

/// A given weight: amplitude and the phase that the leg adds at the design frequency (a delay is negative).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Weight {
    /// Relative amplitude, 0 or more.
    pub amplitude: Decimal,
    /// Phase.
    pub phase: Angle,
}

/// `custom`: positions and weights.
#[derive(Clone, Debug)]
pub struct CustomSpec {
    /// Positions of the reference points from the group's origin.
    pub positions: Vec<ArrayPoint>,
    /// Weights in the same order.
    pub weights: Vec<Weight>,
}

/// `broadside`.
#[derive(Clone, Debug)]
pub struct BroadsideSpec {
    /// Groups side by side, 2 or more.
    pub count: usize,
    /// Distance between neighbours.
    pub spacing: Length,
    /// Turns the beam clockwise.
    pub steer: Angle,
}

/// `[array.feed]`.
#[derive(Clone, Debug)]
pub struct FeedSpec {
    /// Where a group's legs meet.
    pub hub: HubPlace,
    /// Where the cells' runs meet.
    pub array_hub: HubPlace,
    /// Separate or merged delay.
    pub delay_style: DelayStyle,
    /// By cell or by row.
    pub combining: Combining,
    /// Hub or receiver.
    pub join: Join,
    /// Part named for branches.
    pub branch: Option<String>,
    /// Part named for delay lines.
    pub delay: Option<String>,
    /// Part named for runs.
    pub run: Option<String>,
    /// Part named for the main line.
    pub main: Option<String>,
    /// Part named for the control cable.
    pub control: Option<String>,
    /// The hub's amplifier.
    pub amplifier: AmplifierChoice,
    /// How direct current gets out.
    pub power: Power,
    /// Wanted rear rejection.
    pub reject: Decibel,
}

/// Where a hub stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HubPlace {
    /// The centre of the group's feed points.
    Centre,
    /// Where the coax costs least.
    Best,
    /// At a place from the centre of the group's feed points.
    At(ArrayPoint),
}

/// `[[keep-out]]`.
#[derive(Clone, Debug)]
pub struct KeepOut {
    /// Its name.
    pub name: String,
    /// Its corners, three or more.
    pub polygon: Vec<SitePoint>,
}

/// `[[crossing]]`.
#[derive(Clone, Debug)]
pub struct Crossing {
    /// What is crossed.
    pub kind: CrossingKind,
    /// How wide it is.
    pub width: Length,
    /// Where.
    pub at: SitePoint,
    /// Where it stands in the file.
    pub place: Option<Place>,
}

/// `[[existing]]`: a thing that stands already.
#[derive(Clone, Debug)]
pub struct Existing {
    /// The label of an item, or a role.
    pub what: ExistingThing,
    /// How many.
    pub quantity: Decimal,
    /// Where it stands in the file.
    pub place: Option<Place>,
}

/// What exists already.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ExistingThing {
    /// One labelled piece or item.
    Label(String),
    /// Any of a role.
    Role(String),
}

/// `[prices]`.
#[derive(Clone, Debug, Default)]
pub struct Prices {
    /// Tax rates by class; the class `goods` is the default of a part.
    pub tax: BTreeMap<String, Percent>,
    /// Freight by supplier slot or ship group.
    pub freight: BTreeMap<String, Freight>,
    /// Freight is free for a supplier's goods over this value.
    pub freight_free_over: Option<Money>,
    /// Contingency on direct cost.
    pub contingency: Percent,
    /// Exchange rates into the project's currency.
    pub exchange: Vec<Exchange>,
    /// Prices older than this many days are errors.
    pub oldest_price_days: i64,
}

/// One freight charge.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Freight {
    /// Once an order.
    Flat(Money),
    /// For each kilogram.
    PerKilogram(Money),
}

/// A dated exchange rate: 1 unit of `from` is `rate` of the project's currency.
#[derive(Clone, Debug)]
pub struct Exchange {
    /// The foreign currency.
    pub from: Currency,
    /// Project currency for one unit.
    pub rate: Decimal,
    /// The day of the rate.
    pub on: NaiveDate,
}

/// `[labour]`.
#[derive(Clone, Debug)]
pub struct LabourTerms {
    /// People.
    pub crew: usize,
    /// Productive hours a day.
    pub hours_per_day: Decimal,
    /// Money an hour; 0 for volunteers.
    pub rate: Money,
    /// First day.
    pub start: Option<NaiveDate>,
    /// Travel.
    pub travel: Option<Travel>,
}

/// `[labour] travel`.
#[derive(Clone, Debug)]
pub struct Travel {
    /// People travelling.
    pub people: usize,
    /// Trips.
    pub trips: usize,
    /// Hours a trip.
    pub hours: Decimal,
    /// Money a trip.
    pub money: Money,
}

/// Something the owner already has.
#[derive(Clone, Debug)]
pub struct OnHand {
    /// The part.
    pub part: String,
    /// Counted stock, or one length.
    pub stock: Stock,
    /// A note.
    pub note: String,
    /// Where it is listed.
    pub place: Option<Place>,
}

/// How stock on hand is measured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stock {
    /// So many pieces.
    Count(u64),
    /// One reel or offcut of this length.
    Length(Length),
}
