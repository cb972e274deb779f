//! The safety sheet: the usual cautions, with what this site adds.

use serde::Serialize;

use super::{Input, OptionInput, show};
use crate::plan::Fixture;
use crate::project::Supports;

/// The safety sheet of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    tallest: String,
    clear_of_lines: String,
    trees: bool,
    keep_outs: Vec<String>,
    crossings: Vec<String>,
}

/// The view of one option's safety sheet.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let fixtures = || {
        let layouts = option.design.arrays.iter().map(|array| &array.plan.layout);
        layouts.flat_map(|layout| &layout.points).flat_map(|point| &point.fixtures)
    };
    let masts = fixtures().filter_map(|fixture| match fixture {
        Fixture::Mast(foot) => Some(foot.height),
        Fixture::WireEnd(_)
        | Fixture::WirePost(_)
        | Fixture::WireFeedBox
        | Fixture::TerminationBox
        | Fixture::Earth(_)
        | Fixture::HubBox(_)
        | Fixture::StationEntry => None,
    });
    let tallest = masts.max();
    let trees = fixtures().any(|fixture| {
        matches!(fixture, Fixture::WireEnd(support) | Fixture::WirePost(support) if support.kind == Supports::Trees)
    });
    View {
        tallest: tallest.map(|height| height.to_string()).unwrap_or_default(),
        clear_of_lines: tallest.map(|height| show::tape(height.metres() * 1.5)).unwrap_or_default(),
        trees,
        keep_outs: input.project.keep_out.iter().map(|area| area.name.clone()).collect(),
        crossings: input
            .project
            .crossings
            .iter()
            .map(|crossing| format!("{}, {} wide", crossing.kind, crossing.width))
            .collect(),
    }
}
