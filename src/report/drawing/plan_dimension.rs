//! Lengths on the plan: every wire along itself, neighbours outside the array.

use super::board::{Board, angle, apart, centroid, normal};
use super::place::{Point as Paper, Rect};
use super::svg::{Anchor, Type};
use crate::design::Design;
use crate::plan::{ArrayPlan, SitePosition};
use crate::units::Length;

/// The length of every wire along it, and the distance between neighbours outside the array.
pub(super) fn draw_dimensions(board: &mut Board, design: &Design) {
    let kind = Type::plain(3.2).at(Anchor::Middle).haloed();
    for plan in design.arrays.iter().map(|array| &array.plan) {
        let middle = board.ground.paper(centroid(plan));
        for span in &plan.layout.spans {
            let name = &plan.layout.elements[span.element.0].name;
            let (a, b) = (plan.layout.point(span.from).site, plan.layout.point(span.to).site);
            let (a, b) = (board.ground.paper(a), board.ground.paper(b));
            let at = (a.0 + 0.62 * (b.0 - a.0), a.1 + 0.62 * (b.1 - a.1));
            let words = format!("{name}: {}", span.length);
            if kind.width(&words) < apart(a, b) {
                let (nx, ny) = normal(a, b);
                let outward = (at.0 - middle.0) * nx + (at.1 - middle.1) * ny;
                // Outside the array, and above a wire that is its middle.
                let below = if outward.abs() < 0.5 { false } else { outward * ny > 0.0 };
                let lift = if below { -1.2 - 0.75 * kind.size } else { 1.2 };
                board.svg.turned_text(at, angle(a, b), lift, kind, &words);
            }
        }
        neighbours(board, plan, middle);
    }
}

/// The distance of elements that are neighbours, each length once.
fn neighbours(board: &mut Board, plan: &ArrayPlan, middle: Paper) {
    let places: Vec<SitePosition> =
        plan.layout.elements.iter().map(|element| plan.layout.point(element.feed_point).site).collect();
    let mut drawn: Vec<Length> = Vec::new();
    for (n, a) in places.iter().enumerate() {
        for b in places.iter().skip(n + 1) {
            let length = Length::from_metres_nearest(a.distance_m(*b));
            // Neighbours have nobody between them, nearer to both than they are to each other.
            let between =
                |c: &SitePosition| a.distance_m(*c).max(b.distance_m(*c)) < a.distance_m(*b) - 0.001;
            if !drawn.contains(&length) && !places.iter().any(between) && dimension(board, *a, *b, middle) {
                drawn.push(length);
            }
        }
    }
}

/// A dimension line 9 mm off, on the side away from `middle`; says whether there was room for it.
fn dimension(board: &mut Board, from: SitePosition, to: SitePosition, middle: Paper) -> bool {
    let (a, b) = (board.ground.paper(from), board.ground.paper(to));
    let words = Length::from_metres_nearest(from.distance_m(to)).to_string();
    let kind = Type::plain(3.2).at(Anchor::Middle).haloed();
    if apart(a, b) < kind.width(&words) + 2.0 {
        return false;
    }
    let (nx, ny) = normal(a, b);
    let half = (f64::midpoint(a.0, b.0), f64::midpoint(a.1, b.1));
    let outward = if (half.0 - middle.0) * nx + (half.1 - middle.1) * ny < 0.0 { -9.0 } else { 9.0 };
    let off = |p: Paper, by: f64| (p.0 + nx * by, p.1 + ny * by);
    let (c, d) = (off(a, outward), off(b, outward));
    if !board.area.holds(Rect::about(c, 1.0, 1.0)) || !board.area.holds(Rect::about(d, 1.0, 1.0)) {
        return false;
    }
    for (start, end) in [(a, c), (b, d)] {
        let (ux, uy) = (nx * outward.signum(), ny * outward.signum());
        board.svg.line(
            (start.0 + 4.0 * ux, start.1 + 4.0 * uy),
            (end.0 + 1.2 * ux, end.1 + 1.2 * uy),
            0.13,
            "",
        );
        board.svg.line((end.0 - 0.9, end.1 + 0.9), (end.0 + 0.9, end.1 - 0.9), 0.35, "");
    }
    board.svg.line(c, d, 0.18, "");
    board.taken.line(c, d);
    let at = (f64::midpoint(c.0, d.0), f64::midpoint(c.1, d.1));
    board.svg.turned_text(at, angle(c, d), 1.0, kind, &words);
    board.taken.rect(Rect::about(at, 5.0, 5.0));
    true
}
