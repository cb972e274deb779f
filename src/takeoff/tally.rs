//! Where the parts of the takeoff put what they count.

use std::cmp::Reverse;
use std::collections::BTreeMap;

use rust_decimal::Decimal;

use super::model::{Item, Piece, Reason, Takeoff};
use crate::catalogue::{Catalogue, Part, PartChoice};

/// One reason to have some of a thing at one place.
#[derive(Clone, Debug)]
struct Contribution {
    place: String,
    quantity: Decimal,
    why: String,
}

/// Collects contributions and turns them into items.
pub(super) struct Tally<'a> {
    catalogue: &'a Catalogue,
    found: BTreeMap<Key, Vec<Contribution>>,
    pieces: Vec<Piece>,
    waste: BTreeMap<Key, (Decimal, String)>,
    spare: BTreeMap<Key, (Decimal, String)>,
}

/// A role and the part that serves it.
pub(super) type Key = (String, PartChoice);

/// Which part of a role is wanted. A part that does not say is taken to fit, after those that do.
#[derive(Clone, Debug, Default)]
pub(super) struct Want {
    equal: Vec<(&'static str, String)>,
    at_least: Vec<(&'static str, Decimal)>,
}

impl Want {
    /// Any part of the role.
    pub(super) fn any() -> Self {
        Self::default()
    }

    /// A part with this attribute.
    pub(super) fn with(mut self, key: &'static str, value: impl Into<String>) -> Self {
        self.equal.push((key, value.into()));
        self
    }

    /// A part with at least this much of an attribute; the least that is enough is taken.
    pub(super) fn at_least(mut self, key: &'static str, value: Decimal) -> Self {
        self.at_least.push((key, value));
        self
    }

    fn fits(&self, part: &Part) -> bool {
        let equal = |(key, value): &(&str, String)| part.attribute(key).is_none_or(|own| same(own, value));
        let enough = |(key, value): &(&str, Decimal)| part.number(key).is_none_or(|own| own >= *value);
        self.equal.iter().all(equal) && self.at_least.iter().all(enough)
    }

    /// Parts that say what was asked come first, then the least that is enough, then the default, then by id.
    fn rank(&self, part: &Part) -> (Reverse<usize>, Vec<Decimal>, bool, String) {
        let said = self.equal.iter().filter(|(key, _)| part.attribute(key).is_some()).count()
            + self.at_least.iter().filter(|(key, _)| part.number(key).is_some()).count();
        let amounts = self.at_least.iter().filter_map(|(key, _)| part.number(key)).collect();
        let other = part.attribute("default") != Some("yes");
        (Reverse(said), amounts, other, part.id.clone())
    }

    /// The name of what is missing: the role with what was wanted of it.
    fn name(&self, role: &str) -> String {
        let equal = self.equal.iter().map(|(_, value)| value.clone());
        let amounts = self.at_least.iter().map(|(key, value)| format!("{key}-{}", value.normalize()));
        equal.chain(amounts).fold(role.to_owned(), |name, word| format!("{name}-{word}"))
    }
}

/// Equal as numbers where both are numbers, else as text.
fn same(own: &str, value: &str) -> bool {
    match (Decimal::from_str_exact(own), Decimal::from_str_exact(value)) {
        (Ok(a), Ok(b)) => a == b,
        _ => own == value,
    }
}

impl<'a> Tally<'a> {
    pub(super) fn new(catalogue: &'a Catalogue) -> Self {
        let (found, waste, spare) = (BTreeMap::new(), BTreeMap::new(), BTreeMap::new());
        Self { catalogue, found, pieces: Vec::new(), waste, spare }
    }

    /// Counts `quantity` of a role at a place.
    pub(super) fn add(
        &mut self,
        role: &str,
        want: &Want,
        place: &str,
        quantity: impl Into<Decimal>,
        why: &str,
    ) {
        let part = self.choose(role, want);
        self.add_part(role, part, place, quantity, why);
    }

    /// Counts `quantity` of a chosen part at a place.
    pub(super) fn add_part(
        &mut self,
        role: &str,
        part: PartChoice,
        place: &str,
        quantity: impl Into<Decimal>,
        why: &str,
    ) {
        let quantity = quantity.into();
        if quantity <= Decimal::ZERO {
            return;
        }
        let contribution = Contribution { place: place.to_owned(), quantity, why: why.to_owned() };
        self.found.entry((role.to_owned(), part)).or_default().push(contribution);
    }

    /// The part of a role that fits best; never the cheapest, which would change when a price changes.
    pub(super) fn choose(&self, role: &str, want: &Want) -> PartChoice {
        let fitting = self.catalogue.parts.values().filter(|part| part.role == role && want.fits(part));
        match fitting.min_by_key(|part| want.rank(part)) {
            Some(part) => PartChoice::Part(part.id.clone()),
            None => PartChoice::Missing(want.name(role)),
        }
    }

    /// An attribute of a chosen part.
    pub(super) fn attribute(&self, part: &PartChoice, key: &str) -> Option<&str> {
        self.catalogue.parts.get(part.id())?.attribute(key)
    }

    pub(super) fn push(&mut self, piece: Piece) {
        self.pieces.push(piece);
    }

    pub(super) fn pieces(&self) -> &[Piece] {
        &self.pieces
    }

    /// How many of a role there are so far.
    pub(super) fn count(&self, role: &str) -> Decimal {
        let of_role = self.found.iter().filter(|((own, _), _)| own == role);
        of_role.flat_map(|(_, list)| list).map(|contribution| contribution.quantity).sum()
    }

    /// Every role with each of its parts, and how many there are.
    pub(super) fn totals(&self) -> Vec<(Key, Decimal)> {
        let sum = |list: &[Contribution]| list.iter().map(|contribution| contribution.quantity).sum();
        self.found.iter().map(|(key, list)| (key.clone(), sum(list))).collect()
    }

    /// Sets the waste of a role's part, with its rule.
    pub(super) fn set_waste(&mut self, key: &Key, quantity: Decimal, rule: String) {
        self.waste.insert(key.clone(), (quantity, rule));
    }

    /// Sets the spares of a role's part, with their rule.
    pub(super) fn set_spare(&mut self, key: &Key, quantity: Decimal, rule: String) {
        self.spare.insert(key.clone(), (quantity, rule));
    }

    pub(super) fn finish(self) -> Takeoff {
        let parts_of = |role: &String| self.found.keys().filter(|(own, _)| own == role).count();
        let items = self
            .found
            .iter()
            .map(|(key, contributions)| {
                let (role, part) = key;
                let label = if parts_of(role) > 1 { format!("{role}/{}", part.id()) } else { role.clone() };
                self.item(key, label, contributions)
            })
            .collect();
        Takeoff { items, pieces: self.pieces }
    }

    fn item(&self, key: &Key, label: String, contributions: &[Contribution]) -> Item {
        let (role, part) = key;
        let unit = match part {
            PartChoice::Part(id) => self.catalogue.parts.get(id).map_or("each", |part| part.unit.word()),
            PartChoice::Missing(_) => "each",
        };
        let mut places: BTreeMap<String, Decimal> = BTreeMap::new();
        for contribution in contributions.iter().filter(|c| !c.place.is_empty()) {
            *places.entry(contribution.place.clone()).or_default() += contribution.quantity;
        }
        let mut steps = reasons(contributions);
        let mut beside = |map: &BTreeMap<Key, (Decimal, String)>| match map.get(key) {
            Some((quantity, rule)) if *quantity > Decimal::ZERO => {
                steps.push(format!("+ {} {rule}", quantity.normalize()));
                *quantity
            }
            Some(_) | None => Decimal::ZERO,
        };
        let waste = beside(&self.waste);
        let spare = beside(&self.spare);
        Item {
            role: role.clone(),
            part: part.clone(),
            label,
            places,
            quantity: contributions.iter().map(|c| c.quantity).sum(),
            unit: unit.to_owned(),
            waste,
            spare,
            reason: Reason::steps(steps),
        }
    }
}

/// "4 places × 2: rods of one earth set", one line a reason, in the order of first mention.
fn reasons(contributions: &[Contribution]) -> Vec<String> {
    let mut groups: Vec<(&str, Decimal, usize)> = Vec::new();
    for c in contributions {
        match groups.iter_mut().find(|(why, each, _)| *why == c.why && *each == c.quantity) {
            Some(group) => group.2 += 1,
            None => groups.push((&c.why, c.quantity, 1)),
        }
    }
    groups
        .into_iter()
        .map(|(why, each, count)| match count {
            1 => format!("{}: {why}", each.normalize()),
            _ => format!(
                "{count} × {} = {}: {why}",
                each.normalize(),
                (each * Decimal::from(count)).normalize()
            ),
        })
        .collect()
}
