//! Steps, blocks of steps, hold points, and what the takeoff says for them.

use rust_decimal::Decimal;
use serde::Serialize;

use crate::plan::{Layout, Point, PointKind};
use crate::report::document::{Input, OptionInput, show};
use crate::takeoff::{Piece, PieceRole};
use crate::units::Length;

/// Some steps under one heading, and where work stops after them.
pub(super) struct Block {
    pub(super) title: &'static str,
    pub(super) steps: Vec<Step>,
    pub(super) hold: Option<Hold>,
}

/// One step.
pub(super) struct Step {
    /// Names the step for others that need it first.
    pub(super) key: &'static str,
    /// The task in the catalogue's labour table, which knows how many people it needs.
    pub(super) task: &'static str,
    pub(super) what: String,
    pub(super) detail: String,
    pub(super) after: &'static [&'static str],
}

/// Where work stops until something is read and signed.
#[derive(Debug, Serialize)]
pub(super) struct Hold {
    pub(super) rule: &'static str,
    pub(super) readings: Vec<Reading>,
}

/// One reading of a hold point.
#[derive(Debug, Serialize)]
pub(super) struct Reading {
    pub(super) what: String,
    pub(super) good: String,
}

impl Reading {
    pub(super) fn new(what: impl Into<String>, good: impl Into<String>) -> Self {
        Self { what: what.into(), good: good.into() }
    }
}

/// Adds a step when there is something to do.
pub(super) fn step(
    steps: &mut Vec<Step>,
    (key, task): (&'static str, &'static str),
    after: &'static [&'static str],
    what: String,
    detail: impl Into<String>,
) {
    steps.push(Step { key, task, what, detail: detail.into(), after });
}

/// What the steps are derived from.
pub(super) struct Scene<'a> {
    pub(super) input: &'a Input<'a>,
    pub(super) option: &'a OptionInput<'a>,
}

impl<'a> Scene<'a> {
    /// The fewest people of a task, if the catalogue says.
    pub(super) fn people(&self, task: &str) -> String {
        let row = self.input.catalogue.labour.get(task);
        row.filter(|task| task.crew_min > 0).map(|task| task.crew_min.to_string()).unwrap_or_default()
    }

    /// How many of a role, net.
    pub(super) fn count(&self, role: &str) -> Decimal {
        self.option.takeoff.count(role).normalize()
    }

    /// How many of a role, and where they stand.
    pub(super) fn places(&self, role: &str) -> Option<(Decimal, String)> {
        let count = self.count(role);
        (count > Decimal::ZERO).then(|| (count, show::names(self.named(role))))
    }

    /// The places of a role in the order of the layout.
    pub(super) fn named(&self, role: &str) -> Vec<&'a str> {
        let items = self.option.takeoff.items.iter().filter(|item| item.role == role);
        let names: Vec<&str> = items.flat_map(|item| item.places.keys()).map(String::as_str).collect();
        self.in_layout_order(&names)
    }

    /// How many of a role stand in hub boxes, and in which.
    pub(super) fn hub_places(&self, role: &str) -> Option<(Decimal, String)> {
        let hubs: Vec<&str> = self.hubs().iter().map(|hub| hub.name.as_str()).collect();
        let items = self.option.takeoff.items.iter().filter(|item| item.role == role);
        let inside: Vec<(&str, Decimal)> = items
            .flat_map(|item| item.places.iter().map(|(name, n)| (name.as_str(), *n)))
            .filter(|(name, _)| hubs.contains(name))
            .collect();
        let names: Vec<&str> = inside.iter().map(|(name, _)| *name).collect();
        let count: Decimal = inside.iter().map(|(_, n)| *n).sum();
        (count > Decimal::ZERO).then(|| (count, show::names(self.in_layout_order(&names))))
    }

    /// What stands in the termination boxes, once a kind of wire, with the boxes when there are several kinds.
    pub(super) fn terminations(&self) -> Vec<String> {
        let arrays = self.option.design.arrays.iter().filter(|array| !array.termination_reason.is_empty());
        let mut kinds: Vec<(&str, Vec<&str>)> = Vec::new();
        for array in arrays {
            let names = array.plan.layout.points.iter().filter(|point| point.kind == PointKind::Termination);
            let names = names.map(|point| point.name.as_str());
            match kinds.iter_mut().find(|(reason, _)| *reason == array.termination_reason) {
                Some((_, known)) => known.extend(names),
                None => kinds.push((&array.termination_reason, names.collect())),
            }
        }
        let one = kinds.len() == 1;
        let words = |(reason, names): &(&str, Vec<&str>)| {
            if one {
                (*reason).to_owned()
            } else {
                format!("{}: {reason}", show::names(names.iter().copied()))
            }
        };
        kinds.iter().map(words).collect()
    }

    /// Names in the order of the layout, so that runs of posts can be drawn together.
    fn in_layout_order(&self, names: &[&str]) -> Vec<&'a str> {
        let mut ordered: Vec<&'a str> = Vec::new();
        for point in self.points() {
            let name = point.name.as_str();
            if names.contains(&name) && !ordered.contains(&name) {
                ordered.push(name);
            }
        }
        ordered
    }

    /// Every layout of the option.
    pub(super) fn layouts(&self) -> impl Iterator<Item = &'a Layout> + use<'a> {
        self.option.design.arrays.iter().map(|array| &array.plan.layout)
    }

    /// Every point of the option; a shared one comes more than once.
    pub(super) fn points(&self) -> impl Iterator<Item = &'a Point> + use<'a> {
        self.layouts().flat_map(|layout| &layout.points)
    }

    /// Points of the option, each once.
    pub(super) fn point_count(&self) -> usize {
        let mut names: Vec<&str> = self.points().map(|point| point.name.as_str()).collect();
        names.sort_unstable();
        names.dedup();
        names.len()
    }

    /// The hubs in the field.
    pub(super) fn hubs(&self) -> Vec<&'a Point> {
        self.points().filter(|point| point.kind == PointKind::Hub).collect()
    }

    /// The pieces of a role.
    pub(super) fn pieces(&self, role: PieceRole) -> Vec<&'a Piece> {
        self.option.takeoff.pieces.iter().filter(|piece| piece.role == role).collect()
    }

    /// Coax that is laid: branches, runs, mains.
    pub(super) fn laid(&self) -> Vec<&'a Piece> {
        [PieceRole::Branch, PieceRole::Run, PieceRole::Main]
            .into_iter()
            .flat_map(|r| self.pieces(r))
            .collect()
    }

    /// The depth of buried cable, if any is.
    pub(super) fn burial(&self) -> Option<Length> {
        let depth = self.input.project.practice.burial_depth;
        (depth > Length::ZERO).then_some(depth)
    }
}

/// "B1 W1-F to H1 (68.70 m), …".
pub(super) fn runs(pieces: &[&Piece]) -> String {
    let words = pieces.iter().map(|piece| {
        format!("{} from {} to {} ({} m)", piece.label, piece.from, piece.to, show::metres(piece.finished))
    });
    words.collect::<Vec<_>>().join("; ")
}

/// The labels of some pieces.
pub(super) fn labels(pieces: &[&Piece]) -> String {
    show::names(pieces.iter().map(|piece| piece.label.as_str()))
}
