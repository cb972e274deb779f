//! The stages of an array: at most one end-fire, at most one broadside.

use std::ops::RangeInclusive;

use rust_decimal::Decimal;

use super::code;
use super::element::{Element, ElementKind};
use super::model::{ArrayPoint, BroadsideSpec, CustomSpec, EchelonSpec, EndfireSpec, EndfireStage};
use super::phasing::{self, Rows};
use super::site::{Bands, in_range, in_waves};
use super::table::Table;
use super::value::Value;
use crate::units::{Angle, Length};

const ENDFIRE_STAGES: [&str; 5] = ["echelon", "endfire", "square", "ring", "custom"];

/// Reads the end-fire stage. `None`: there is none, or it is already reported.
pub(super) fn endfire(array: &Table<'_>, element: &Element, bands: Option<Bands>) -> Option<EndfireStage> {
    let found: Vec<Value<'_>> = ENDFIRE_STAGES.iter().filter_map(|key| array.take(key)).collect();
    if let [first, second, ..] = found.as_slice() {
        let message = format!(
            "an array has one end-fire stage, but here are `{}` and `{}`",
            first.name(),
            second.name()
        );
        array.desk.error(code::SEVERAL_STAGES, Some(second.key_at), message, "keep one of them");
    }
    let mut stage = None;
    for value in &found {
        check_fit(value, element.kind);
        let Some(table) = value.table() else { continue };
        stage = match value.name() {
            "echelon" => echelon(&table, element, bands).map(EndfireStage::Echelon),
            "endfire" => verticals(&table, bands).map(EndfireStage::Endfire),
            "custom" => custom(&table).map(EndfireStage::Custom),
            "square" => square(value, &table),
            _ => ring(value, &table),
        };
        table.finish();
    }
    stage
}

/// Whether any end-fire stage stands in the array.
pub(super) fn has_endfire(array: &Table<'_>) -> bool {
    ENDFIRE_STAGES.iter().any(|key| array.has(key))
}

fn check_fit(value: &Value<'_>, kind: Option<ElementKind>) {
    let stage = value.name();
    let Some(kind) = kind else { return };
    match (stage, kind) {
        ("echelon", ElementKind::Vertical) => value.desk.error(
            code::STAGE_NEEDS_WIRES,
            Some(value.key_at),
            "`echelon` staggers wires, but this array's element is a vertical",
            "use `endfire = { spacing = \"60 ft\" }` for verticals",
        ),
        ("endfire" | "square" | "ring", ElementKind::Wire) => value.desk.error(
            code::STAGE_NEEDS_VERTICALS,
            Some(value.key_at),
            format!("`{stage}` places verticals, but this array's element is a wire"),
            "use `echelon = { stagger = \"60 ft\" }` for wires",
        ),
        _ => {}
    }
}

fn not_built(value: &Value<'_>, what: &str, built: &str) {
    let message = format!("{what} is not built by this version");
    value.desk.error(code::NOT_IN_THIS_VERSION, Some(value.key_at), message, format!("built: {built}"));
}

fn two_way(table: &Table<'_>) {
    if let Some(value) = table.take("two-way")
        && value.truth() == Some(true)
    {
        not_built(
            &value,
            "switching between two directions",
            "arrays of one direction; write one [[array]] for each",
        );
    }
}

fn echelon(table: &Table<'_>, element: &Element, bands: Option<Bands>) -> Option<EchelonSpec> {
    let stagger = table.need("stagger", "stagger = \"60 ft\"", Value::positive_length);
    let height = element.height.unwrap_or(Length::from_mm(2_500));
    let default = (height * 2).max(Length::from_mm(5_000));
    let why = "twice the wire height, at least 5 m; front wire to the right";
    let offset = table.or("offset", default, why, Value::length);
    if let Some(value) = table.take("offset")
        && offset.abs() < Length::from_mm(1_000)
    {
        let message = format!("the wires are {} apart sideways and couple closely", offset.abs());
        value.desk.warning(
            code::OFFSET_SMALL,
            value.at,
            message,
            "usual: twice the wire height, at least 5 m",
        );
    }
    two_way(table);
    let rows = Rows {
        count: 2,
        kind: ElementKind::Wire,
        step_key: "stagger",
        step: stagger,
        default: (Decimal::new(94, 2), "crossfire of wires: the rear null meets 20° elevation"),
    };
    let phasing = phasing::read(table, &rows, bands);
    Some(EchelonSpec { stagger: stagger?, offset, phasing })
}

fn verticals(table: &Table<'_>, bands: Option<Bands>) -> Option<EndfireSpec> {
    let count = table.or("count", 2, "a pair", |v| v.count(2..=3)) as usize;
    let spacing = table.need("spacing", "spacing = \"60 ft\"", Value::positive_length);
    two_way(table);
    let rows = Rows {
        count,
        kind: ElementKind::Vertical,
        step_key: "spacing",
        step: spacing,
        default: (Decimal::new(50, 2), "crossfire of verticals: sharper and quieter to the rear"),
    };
    let phasing = phasing::read(table, &rows, bands);
    Some(EndfireSpec { count, spacing: spacing?, phasing })
}

fn square(value: &Value<'_>, table: &Table<'_>) -> Option<EndfireStage> {
    table.need("side", "side = \"24.4 m\"", Value::positive_length);
    table.get("delay", phasing::delay);
    not_built(value, "`square`", "`echelon`, `endfire`, `custom` and `broadside`");
    None
}

fn ring(value: &Value<'_>, table: &Table<'_>) -> Option<EndfireStage> {
    const PAIRS: &[(&str, ())] = &[("nearest", ()), ("wide", ())];
    table.need("elements", "elements = 6", |v| v.count(4..=64));
    table.need("radius", "radius = \"18 m\"", Value::positive_length);
    table.get("pairs", |v| v.choice(PAIRS));
    table.get("delay", phasing::delay);
    not_built(value, "`ring`", "`echelon`, `endfire`, `custom` and `broadside`");
    None
}

fn custom(table: &Table<'_>) -> Option<CustomSpec> {
    let positions =
        table.need("positions", "positions = [{ forward = \"0 m\", right = \"0 m\" }, …]", |list| {
            let positions: Vec<Option<ArrayPoint>> =
                list.items("{ forward = \"0 m\", right = \"0 m\" }, …")?.iter().map(array_point).collect();
            let positions: Vec<ArrayPoint> = positions.into_iter().collect::<Option<_>>()?;
            check_positions(list, &positions);
            Some(positions)
        });
    let weights = table.need("weights", "weights = [{ amplitude = 1.0, phase = \"0 deg\" }, …]", |list| {
        let weights = phasing::weights(list)?;
        if let Some(positions) = &positions {
            phasing::check_count(list, weights.len(), positions.len());
        }
        Some(weights)
    });
    Some(CustomSpec { positions: positions?, weights: weights? })
}

fn check_positions(list: &Value<'_>, positions: &[ArrayPoint]) {
    if positions.is_empty() {
        let message = "`positions` lists no place";
        list.refuse::<()>(code::COUNT_OUT_OF_RANGE, message, "give one place an element");
    }
    for (n, position) in positions.iter().enumerate() {
        if let Some(first) = positions[..n].iter().position(|other| other == position) {
            let message = format!("positions {} and {} are the same place", first + 1, n + 1);
            list.refuse::<()>(code::SAME_POSITION, message, "each element has its own place");
        }
    }
}

/// `{ forward, right }`.
pub(super) fn array_point(value: &Value<'_>) -> Option<ArrayPoint> {
    let table = value.table_like("{ forward = \"0 m\", right = \"0 m\" }")?;
    let forward = table.need("forward", "forward = \"0 m\"", Value::length);
    let right = table.need("right", "right = \"0 m\"", Value::length);
    table.finish();
    Some(ArrayPoint { forward: forward?, right: right? })
}

/// Reads the broadside stage. `None`: there is none, or it is already reported.
pub(super) fn broadside(array: &Table<'_>, bands: Option<Bands>) -> Option<BroadsideSpec> {
    const COUNT: RangeInclusive<u32> = 2..=64;
    let table = array.take("broadside")?.table()?;
    let count = table.or("count", 2, "a pair", |v| v.count(COUNT)) as usize;
    if let Some(value) = table.take("count")
        && count > 8
    {
        let message = format!("{count} side by side: the row is long, and hard to keep equal");
        value.desk.warning(code::ROW_LONG, value.at, message, "usual: 2 to 8");
    }
    let spacing = table.need("spacing", "spacing = \"400 ft\"", Value::positive_length);
    if let (Some(spacing), Some(bands), Some(value)) = (spacing, bands, table.take("spacing")) {
        check_spacing(&value, spacing, bands);
    }
    let steer = table.or("steer", Angle::default(), "the beam is not turned", |v| {
        let steer = v.quantity("deg", Angle::parse)?;
        in_range(v, steer, 60.0)
    });
    if let Some(value) = table.take("delay") {
        let message = "a broadside row has no delay: its legs are equal";
        let help =
            "to turn the beam use steer = \"10 deg\"; an end-fire delay belongs into `echelon` or `endfire`";
        value.desk.error(code::BROADSIDE_DELAY, Some(value.key_at), message, help);
    }
    table.finish();
    Some(BroadsideSpec { count, spacing: spacing?, steer })
}

fn check_spacing(value: &Value<'_>, spacing: Length, bands: Bands) {
    let (low, high) = (in_waves(spacing, bands.lowest), in_waves(spacing, bands.highest));
    if low < 0.25 {
        let message = format!("{spacing} is {low:.2} wavelengths at {}: little is gained", bands.lowest);
        value.desk.warning(code::SPACING_NARROW, value.at, message, "usual: 0.25 wavelengths or more");
    }
    if high > 1.0 {
        let message = format!("{spacing} is {high:.2} wavelengths at {}: side lobes grow", bands.highest);
        value.desk.warning(code::SPACING_WIDE, value.at, message, "usual: up to about 0.9 wavelengths");
    }
}
