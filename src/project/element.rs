//! The element of an array: `element.wire`, `element.vertical` and those that are planned.

use rust_decimal::Decimal;
use toml::de::DeValue;

use super::code;
use super::model::{ElementSpec, Supports, Termination, VerticalKind, VerticalSpec, WireSpec};
use super::site::{Bands, in_waves};
use super::table::Table;
use super::value::Value;
use crate::problem::Place;
use crate::units::{Diameter, Length, Resistance};

/// What kind of element the stages of this array repeat.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum ElementKind {
    Wire,
    Vertical,
}

/// An element as far as it could be read.
pub(super) struct Element {
    /// Its kind, when exactly one is named.
    pub(super) kind: Option<ElementKind>,
    /// `None`: already reported.
    pub(super) spec: Option<ElementSpec>,
    pub(super) place: Option<Place>,
    /// The height of a wire, for the default offset of an echelon.
    pub(super) height: Option<Length>,
}

/// Above this nothing stands that this program knows.
const HIGHEST: Length = Length::from_mm(60_000);

/// Reads the element of an array.
pub(super) fn read(array: &Table<'_>, bands: Option<Bands>) -> Element {
    let place = array.take("element").map(|value| value.place());
    let example = "{ wire = { length = \"176 m\" } }";
    if let Some(value) = array.take("element")
        && !matches!(value.raw, DeValue::Table(_))
    {
        value.table_like(example);
        return Element { kind: None, spec: None, place, height: None };
    }
    let table = array.section("element");
    let found: Vec<Value<'_>> =
        ["wire", "two-way-wire", "vertical"].iter().filter_map(|key| table.take(key)).collect();
    if found.is_empty() {
        let example = "element.wire = { length = \"176 m\" } or element.vertical = { height = \"6 m\" }";
        array.desk.error(code::NO_ELEMENT, array.at(), "this array has no element", format!("add {example}"));
    }
    if let [_, second, ..] = found.as_slice() {
        let message = "an array has one kind of element, but here are several";
        let help = "keep one; write a second [[array]] for the other";
        array.desk.error(code::SEVERAL_ELEMENTS, Some(second.key_at), message, help);
    }
    let mut element = Element { kind: None, spec: None, place, height: None };
    let single = found.len() == 1;
    for value in &found {
        let vertical = value.name() == "vertical";
        element.kind = single.then_some(if vertical { ElementKind::Vertical } else { ElementKind::Wire });
        let Some(inner) = value.table() else { continue };
        element.spec = match value.name() {
            "wire" => read_wire(&inner, bands).map(ElementSpec::Wire),
            "vertical" => read_vertical(&inner).map(ElementSpec::Vertical),
            _ => two_way_wire(value, &inner, bands),
        };
        if let Some(ElementSpec::Wire(wire)) = &element.spec {
            element.height = Some(wire.height);
        }
    }
    table.finish();
    element
}

fn two_way_wire(value: &Value<'_>, table: &Table<'_>, bands: Option<Bands>) -> Option<ElementSpec> {
    wire_without_termination(table, bands);
    table.get("wire-spacing", Value::positive_length);
    table.finish();
    let message = "two-way wires are not built by this version";
    value.desk.error(code::NOT_IN_THIS_VERSION, Some(value.key_at), message, "built: `wire` and `vertical`");
    None
}

fn read_wire(table: &Table<'_>, bands: Option<Bands>) -> Option<WireSpec> {
    let wire = wire_without_termination(table, bands);
    let computed = "computed from the wire and its earth";
    let termination = table
        .or_later("termination", computed, "no termination given", termination)
        .unwrap_or(Termination::Computed);
    table.finish();
    Some(WireSpec { termination, ..wire? })
}

fn wire_without_termination(table: &Table<'_>, bands: Option<Bands>) -> Option<WireSpec> {
    let length = table.need("length", "length = \"176 m\"", Value::positive_length);
    if let (Some(length), Some(bands), Some(value)) = (length, bands, table.take("length")) {
        check_length(&value, length, bands);
    }
    let height = table.or("height", Length::from_mm(2_500), "usual height of a low wire", height);
    let diameter = table.or_later("diameter", "the wire part's", "no diameter given", |v| {
        v.positive("mm", Diameter::from_um(0), Diameter::parse)
    });
    let supports =
        table.or("supports", Supports::Posts, "no supports given", |v| v.choice(Supports::CHOICES));
    Some(WireSpec { length: length?, height, diameter, supports, termination: Termination::Computed })
}

fn check_length(value: &Value<'_>, length: Length, bands: Bands) {
    let (low, high) = (in_waves(length, bands.lowest), in_waves(length, bands.highest));
    if low < 0.4 {
        let message = format!("{length} is {low:.2} wavelengths at {}: weak directivity", bands.lowest);
        value.desk.warning(code::WIRE_SHORT, value.at, message, "usual: 0.4 wavelengths or more");
    }
    if high > 4.0 {
        let message = format!(
            "{length} is {high:.1} wavelengths at {}: a narrow beam, and loss at high angles",
            bands.highest
        );
        value.desk.warning(code::WIRE_LONG, value.at, message, "usual: 4 wavelengths or less");
    }
}

fn height(value: &Value<'_>) -> Option<Length> {
    let height = value.positive_length()?;
    if height <= HIGHEST {
        return Some(height);
    }
    let message = format!("no element of these arrays is {height} high");
    value.refuse(code::IMPOSSIBLE_HEIGHT, message, format!("accepted: up to {HIGHEST}; check the unit"))
}

fn termination(value: &Value<'_>) -> Option<Termination> {
    if let DeValue::Table(_) = value.raw {
        let table = value.table()?;
        let reflection = table.need("reflection", "reflection = 0.3", |v| {
            let ratio = v.ratio()?;
            if ratio.abs() <= Decimal::ONE {
                return Some(ratio);
            }
            let message = format!("a reflection of {ratio} would return more than arrives");
            v.refuse(code::RATIO_RANGE, message, "accepted: -1 to 1")
        });
        table.finish();
        return reflection.map(Termination::Reflection);
    }
    let word = value.raw.as_str().map(str::trim);
    if word == Some("matched") {
        return Some(Termination::Matched);
    }
    if let Some(word) = word
        && (word.is_empty() || word.starts_with(char::is_alphabetic))
    {
        let message = format!("`termination` cannot be \"{}\"", word.escape_debug());
        let help = "accepted: a resistor such as \"450 ohm\", \"matched\", or { reflection = 0.3 }";
        return value.refuse(code::BAD_TERMINATION, message, help);
    }
    value.positive("ohm", Resistance::new(0.0), Resistance::parse).map(Termination::Resistor)
}

fn read_vertical(table: &Table<'_>) -> Option<VerticalSpec> {
    let height = table.need("height", "height = \"6 m\"", height);
    let active = table.or("active", true, "no kind given; amplifier at the element", Value::truth);
    table.finish();
    let kind = if active { VerticalKind::Active } else { VerticalKind::Passive };
    Some(VerticalSpec { height: height?, kind })
}
