//! The sheets of a work order, and the head that each repeats.

use serde::Serialize;

use crate::report::running_head::running_head;

use super::{Input, OptionInput};

/// One sheet.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Sheet {
    /// What to print, in which order.
    Index,
    /// Read first, signed.
    Safety,
    /// What to buy.
    Purchase,
    /// How to cut.
    Cuts,
    /// Strips for cables and boxes.
    Labels,
    /// The site at one scale.
    Plan,
    /// Where every stake goes.
    Stakes,
    /// What to do, in which order.
    Build,
    /// What it costs.
    Estimate,
    /// What it hears.
    Pattern,
}

impl Sheet {
    /// Every sheet in printing order.
    pub const ALL: [Self; 10] = [
        Self::Index,
        Self::Safety,
        Self::Purchase,
        Self::Cuts,
        Self::Labels,
        Self::Plan,
        Self::Stakes,
        Self::Build,
        Self::Estimate,
        Self::Pattern,
    ];

    /// Its file name without extension.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Index => "index",
            Self::Safety => "safety",
            Self::Purchase => "purchase",
            Self::Cuts => "cuts",
            Self::Labels => "labels",
            Self::Plan => "plan",
            Self::Stakes => "stakes",
            Self::Build => "build",
            Self::Estimate => "estimate",
            Self::Pattern => "pattern",
        }
    }

    /// Its title.
    pub const fn title(self) -> &'static str {
        match self {
            Self::Index => "Work order",
            Self::Safety => "Safety sheet",
            Self::Purchase => "Purchase list",
            Self::Cuts => "Cut list",
            Self::Labels => "Labels",
            Self::Plan => "Site plan",
            Self::Stakes => "Stake-out",
            Self::Build => "Build sheet",
            Self::Estimate => "Estimate of materials",
            Self::Pattern => "What the arrays hear",
        }
    }

    /// How the paper lies.
    pub const fn paper(self) -> Paper {
        match self {
            Self::Purchase | Self::Plan => Paper::Landscape,
            Self::Index
            | Self::Safety
            | Self::Cuts
            | Self::Labels
            | Self::Stakes
            | Self::Build
            | Self::Estimate
            | Self::Pattern => Paper::Portrait,
        }
    }

    /// Who takes it along.
    pub(super) const fn reader(self) -> &'static str {
        match self {
            Self::Index => "crew leader",
            Self::Safety => "everyone on site, signed, before any other sheet",
            Self::Purchase => "whoever orders",
            Self::Cuts => "bench",
            Self::Labels => "bench; print at 100 %",
            Self::Stakes => "survey crew",
            Self::Plan | Self::Build => "every crew",
            Self::Estimate => "owner",
            Self::Pattern => "owner, and whoever tests the array",
        }
    }
}

/// How the paper lies.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Paper {
    /// Upright.
    Portrait,
    /// On its long side.
    Landscape,
}

/// What every sheet repeats.
#[derive(Clone, Debug, Serialize)]
pub(super) struct Head {
    /// The project's title.
    pub(super) project: String,
    /// The same, short enough for the running head.
    pub(super) running: String,
    /// The sheet's title.
    pub(super) title: String,
    /// The sheet's name, which is also its code.
    pub(super) name: String,
    /// The option; empty when the file has none.
    pub(super) option: String,
    /// Coordinates of the datum; empty when not given.
    pub(super) site: String,
    /// Hash of all inputs.
    pub(super) hash: String,
    /// The project's date.
    pub(super) date: String,
    /// Which units the sheet uses.
    pub(super) units: String,
    /// The program's version.
    pub(super) version: String,
    /// How the paper lies.
    pub(super) paper: Paper,
}

impl Head {
    /// The head of one option's sheet.
    pub(super) fn new(input: &Input<'_>, option: &OptionInput<'_>, sheet: Sheet) -> Self {
        let head = Self::whole(input);
        Self {
            title: sheet.title().to_owned(),
            name: sheet.name().to_owned(),
            option: option.design.option.clone(),
            paper: sheet.paper(),
            ..head
        }
    }

    /// The head of the index over all options.
    pub(super) fn whole(input: &Input<'_>) -> Self {
        let project = input.project;
        let site = project.site.coordinates.map(|(latitude, longitude)| {
            format!("datum {}, {} (WGS 84)", latitude.normalize(), longitude.normalize())
        });
        Self {
            running: running_head(&project.title),
            project: project.title.clone(),
            title: "Options".to_owned(),
            name: "index".to_owned(),
            option: String::new(),
            site: site.unwrap_or_default(),
            hash: input.hash.to_owned(),
            date: project.estimated.to_string(),
            units: "metres, degrees true".to_owned(),
            version: input.version.to_owned(),
            paper: Paper::Portrait,
        }
    }
}
