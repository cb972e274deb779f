//! One `[[array]]`: name, direction, element, stages and feed.

use super::code;
use super::element;
use super::feed;
use super::model::{ArrayPlaces, ArraySpec, SitePoint};
use super::site::{Bands, site_point};
use super::stage;
use super::table::Table;
use super::value::Value;
use crate::units::{Angle, Bearing, Length};

/// Reads one array; `None`: already reported.
pub(super) fn read(table: Table<'_>, bands: Option<Bands>) -> Option<ArraySpec> {
    let name = table.need("name", "name = \"north-west\"", Value::name_text);
    let table = match &name {
        Some(name) => table.renamed(format!("array.{name}")),
        None => table,
    };
    let option = table.get("option", Value::name_text);
    let heading = table.need("heading", "heading = \"310 deg\"", heading);
    let datum = SitePoint { east: Length::ZERO, north: Length::ZERO };
    let centre = table.or_said("centre", datum, "east 0 m, north 0 m", "no place given", site_point);
    let element = element::read(&table, bands);
    let endfire = stage::endfire(&table, &element, bands);
    let broadside = stage::broadside(&table, bands);
    let (feed, feed_places) = feed::read(&table);
    let place_of = |key| table.take(key).map(|value: Value<'_>| value.place());
    let places = ArrayPlaces {
        name: place_of("name"),
        element: element.place,
        endfire: ["echelon", "endfire", "custom"].into_iter().find_map(place_of),
        broadside: place_of("broadside"),
        feed: feed_places,
    };
    table.finish_with(&MISPLACED);
    Some(ArraySpec {
        name: name?,
        option,
        heading: heading?,
        centre,
        element: element.spec?,
        endfire,
        broadside,
        feed,
        places,
    })
}

/// Keys that are easily written one level too high.
const MISPLACED: [(&str, &str); 14] = [
    ("wire", "element.wire"),
    ("two-way-wire", "element.two-way-wire"),
    ("vertical", "element.vertical"),
    ("length", "element.wire = { length = … }"),
    ("height", "element.wire = { height = … }"),
    ("hub", "feed.hub"),
    ("array-hub", "feed.array-hub"),
    ("combining", "feed.combining"),
    ("branch", "feed.branch"),
    ("main", "feed.main"),
    ("amplifier", "feed.amplifier"),
    ("spacing", "broadside = { spacing = … }"),
    ("stagger", "echelon = { stagger = … }"),
    ("center", "centre"),
];

fn heading(value: &Value<'_>) -> Option<Bearing> {
    let angle = value.quantity("deg", Angle::parse)?;
    if (-180.0..=360.0).contains(&angle.degrees()) {
        return Some(Bearing::from_degrees(angle.degrees()));
    }
    let message = format!("a heading cannot be {angle}");
    value.refuse(code::ANGLE_RANGE, message, "accepted: \"0 deg\" to \"360 deg\", clockwise from true north")
}

/// Reports arrays of one name, and options that differ in capital letters only.
pub(super) fn check_names(tables: &[Table<'_>]) {
    let mut names: Vec<(String, String)> = Vec::new();
    let mut options: Vec<String> = Vec::new();
    for table in tables {
        if let Some(value) = table.take("name")
            && let toml::de::DeValue::String(text) = value.raw
        {
            let (given, lower) = (text.trim().to_owned(), text.trim().to_lowercase());
            match names.iter().find(|(_, other)| *other == lower) {
                Some((first, _)) => {
                    let message = format!("two arrays are called \"{first}\"");
                    let message = if *first == given { message } else { format!("{message} (\"{given}\")") };
                    value.refuse::<()>(code::DUPLICATE_ARRAY, message, "give each array its own name");
                }
                None => names.push((given, lower)),
            }
        }
        if let Some(value) = table.take("option")
            && let toml::de::DeValue::String(text) = value.raw
        {
            let given = text.trim().to_owned();
            let twin = options.iter().find(|o| o.to_lowercase() == given.to_lowercase() && **o != given);
            if let Some(twin) = twin {
                let message =
                    format!("the options \"{twin}\" and \"{given}\" differ in capital letters only");
                value.refuse::<()>(code::OPTION_CASE, message, "write both alike, or choose another name");
            } else {
                options.push(given);
            }
        }
    }
}
