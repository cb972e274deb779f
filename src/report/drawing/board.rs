//! A drawing board: what is drawn, what is taken, how the site lies on it.

use super::ground::Ground;
use super::place::{Label, Point as Paper, Rect, Taken};
use super::plan_key::Stroke;
use super::svg::{Svg, Type};
use crate::plan::{ArrayPlan, PointKind, SitePosition};

/// What is drawn, what is taken, how the site lies on paper.
pub(super) struct Board {
    pub(super) svg: Svg,
    pub(super) taken: Taken,
    pub(super) ground: Ground,
    pub(super) area: Rect,
}

impl Board {
    /// A line of the plan, as far as it lies on the board.
    pub(super) fn line(&mut self, stroke: Stroke, a: Paper, b: Paper) {
        if let Some((a, b)) = self.area.clip(a, b) {
            stroke.draw(&mut self.svg, a, b);
            self.taken.line(a, b);
        }
    }

    /// Lines of text near a thing, with a line to it when they stand far off.
    pub(super) fn label(&mut self, at: Paper, nearest: f64, kind: Type, lines: &[&str]) {
        let Some(label) = self.taken.text(at, nearest, kind, lines) else { return };
        if label.far {
            // From the rim of the thing, not from its middle.
            let end = (label.at.0, label.at.1 - 0.35 * kind.size);
            let share = (nearest - 1.2).max(0.0) / apart(at, end).max(nearest);
            let start = (at.0 + share * (end.0 - at.0), at.1 + share * (end.1 - at.1));
            self.svg.line(start, end, 0.13, "");
        }
        self.write(label, kind, lines);
    }

    /// A text that belongs to no single place: in a corner that is free, or at least free of signs and texts.
    pub(super) fn corner_note(&mut self, kind: Type, text: &str) {
        let (wide, high) = (kind.width(text), kind.leading());
        let (right, low) = (self.area.right - wide - 1.5, self.area.bottom - high - 1.0);
        let (left, top) = (self.area.left + 1.5, self.area.top + 1.0);
        let rows = |at: f64| [at, if at > top { at - high } else { at + high }];
        let corners = [left, right]
            .into_iter()
            .flat_map(|x| [rows(low), rows(top)].into_iter().flatten().map(move |y| (x, y)));
        let rect = |(x, y): Paper| Rect { left: x, top: y, right: x + wide, bottom: y + high };
        let all: Vec<Rect> = corners.map(rect).collect();
        let free = all.iter().find(|rect| self.taken.is_free(**rect));
        let clear = || all.iter().find(|rect| self.taken.clear_of_rects(**rect));
        if let Some(rect) = free.or_else(clear) {
            self.taken.rect(*rect);
            self.svg.text((rect.left, rect.bottom - 0.25 * kind.size), kind.haloed(), text);
        }
    }

    fn write(&mut self, label: Label, kind: Type, lines: &[&str]) {
        let mut at = label.at;
        for line in lines {
            self.svg.text(at, kind.at(label.anchor).haloed(), line);
            at.1 += kind.leading();
        }
    }
}

/// The unit vector to the right of a line on paper; nothing to the right of a point.
pub(super) fn normal(a: Paper, b: Paper) -> Paper {
    let (dx, dy) = (b.0 - a.0, b.1 - a.1);
    let length = (dx * dx + dy * dy).sqrt();
    if length > 0.0 { (-dy / length, dx / length) } else { (0.0, 0.0) }
}

/// The distance of two points on paper.
pub(super) fn apart(a: Paper, b: Paper) -> f64 {
    ((b.0 - a.0).powi(2) + (b.1 - a.1).powi(2)).sqrt()
}

/// The angle of a line on paper, degrees clockwise from the right.
pub(super) fn angle(a: Paper, b: Paper) -> f64 {
    libm::atan2(b.1 - a.1, b.0 - a.0).to_degrees()
}

/// The middle of everything but the receiver.
pub(super) fn centroid(plan: &ArrayPlan) -> SitePosition {
    let places: Vec<_> = plan
        .layout
        .points
        .iter()
        .filter(|point| point.kind != PointKind::Receiver)
        .map(|point| point.at)
        .collect();
    plan.layout.frame.to_site(crate::plan::Position::mean(&places))
}
