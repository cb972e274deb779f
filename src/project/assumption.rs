//! Which defaults matter to the arrays of a project: the others are no assumptions.

use super::model::{AmplifierChoice, ArraySpec, Combining, ElementSpec, VerticalKind};

/// Whether nothing in the project depends on the default of `key`.
pub(super) fn does_not_matter(key: &str, arrays: &[ArraySpec]) -> bool {
    if let Some(rest) = key.strip_prefix("array.") {
        return arrays.iter().any(|array| {
            let feed = rest.strip_prefix(array.name.as_str()).and_then(|rest| rest.strip_prefix(".feed."));
            feed.is_some_and(|key| !feeds(array, key))
        });
    }
    let has_wires = arrays.iter().any(|array| matches!(array.element, ElementSpec::Wire(_)));
    let has_verticals = arrays.iter().any(|array| matches!(array.element, ElementSpec::Vertical(_)));
    let has_delays = arrays.iter().any(has_delay);
    match key.strip_prefix("practice.") {
        Some("vertical-rods" | "vertical-radials" | "vertical-radial-length") => !has_verticals,
        Some(
            "wire-slack" | "wire-tail" | "wire-round-up" | "max-bay" | "wire-tension" | "max-sag"
            | "rods-per-set" | "radials-per-set" | "radial-length",
        ) => !has_wires,
        Some("trim-least" | "trim-ratio") => !has_delays,
        Some(_) | None => false,
    }
}

/// Whether a key of `[array.feed]` has an effect in this array.
fn feeds(array: &ArraySpec, key: &str) -> bool {
    let (rows, cells) = (array.endfire.is_some(), array.broadside.is_some());
    let powered = array.feed.amplifier != AmplifierChoice::None || is_active(array);
    match key {
        "hub" | "branch" | "join" => rows || cells,
        "combining" => rows && cells,
        "array-hub" | "run" => rows && cells && array.feed.combining == Combining::ByCell,
        "delay" | "delay-style" => has_delay(array),
        "control" | "power" => powered,
        _ => true,
    }
}

fn is_active(array: &ArraySpec) -> bool {
    matches!(&array.element, ElementSpec::Vertical(vertical) if vertical.kind == VerticalKind::Active)
}

fn has_delay(array: &ArraySpec) -> bool {
    let steered = array.broadside.as_ref().is_some_and(|row| row.steer.degrees().abs() > 0.0);
    array.endfire.is_some() || steered
}
