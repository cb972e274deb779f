//! Lengths on the plan: every wire along itself, neighbours outside the array.

use super::board::{Board, angle, apart, centroid, normal};
use super::place::{Point as Paper, Rect};
use super::svg::{Anchor, Type};
use crate::design::Design;
use crate::plan::{ArrayPlan, Element, SitePosition};
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
            let at = between(a, b, 0.62);
            let words = format!("{name}: {}", span.length);
            if kind.width(&words) < apart(a, b) {
                let below = more_room_below(board, plan, (a, b), at);
                along_wire(board, (a, b), below, kind, &words);
            }
        }
        neighbours(board, plan, middle);
    }
}

fn between(a: Paper, b: Paper, share: f64) -> Paper {
    (a.0 + share * (b.0 - a.0), a.1 + share * (b.1 - a.1))
}

/// A text along a wire where nothing else is: near it before farther off, the roomier side before the other.
fn along_wire(board: &mut Board, (a, b): (Paper, Paper), below: bool, kind: Type, words: &str) {
    let (nx, ny) = normal(a, b);
    let down = if ny > 0.0 { 1.0 } else { -1.0 };
    let roomy = if below { 1.0 } else { -1.0 };
    let half = 0.5 * kind.width(words) / apart(a, b);
    let spots = [1.0, -1.0].into_iter().flat_map(|side| {
        [1.2, 2.4]
            .into_iter()
            .flat_map(move |gap| [0.62, 0.5, 0.72, 0.38].map(|share| (side * roomy, gap, share)))
    });
    // Small boxes along the middle of the text stand for it, as it is turned.
    let boxes = |(side, gap, share): (f64, f64, f64)| {
        let off = side * down * (gap + 0.375 * kind.size);
        [-1.0, -0.75, -0.5, -0.25, 0.0, 0.25, 0.5, 0.75, 1.0].map(|part| {
            let at = between(a, b, share + part * half);
            Rect::about((at.0 + off * nx, at.1 + off * ny), 1.1, 1.1)
        })
    };
    let free = |spot: &(f64, f64, f64)| boxes(*spot).into_iter().all(|rect| board.taken.is_free(rect));
    let spot = spots.clone().find(free).unwrap_or((roomy, 1.2, 0.62));
    for rect in boxes(spot) {
        board.taken.rect(rect);
    }
    let (side, gap, share) = spot;
    let lift = if side > 0.0 { -gap - 0.75 * kind.size } else { gap };
    board.svg.turned_text(between(a, b, share), angle(a, b), lift, kind, words);
}

/// Whether the nearest other wire is farther off on the lower side of a wire than on its upper side.
fn more_room_below(board: &Board, plan: &ArrayPlan, (a, b): (Paper, Paper), at: Paper) -> bool {
    let (nx, ny) = normal(a, b);
    // The normal points to the right of the wire's run, which is below when it points down the paper.
    let down = if ny > 0.0 { 1.0 } else { -1.0 };
    let (mut above, mut below) = (f64::INFINITY, f64::INFINITY);
    for span in &plan.layout.spans {
        let middle = board.ground.paper(plan.layout.point(span.from).site);
        let off = ((middle.0 - at.0) * nx + (middle.1 - at.1) * ny) * down;
        if off > 0.5 {
            below = below.min(off);
        } else if off < -0.5 {
            above = above.min(-off);
        }
    }
    below > above
}

/// The step within a cell and the spacing of each row, each length once, rear rows first.
fn neighbours(board: &mut Board, plan: &ArrayPlan, middle: Paper) {
    let elements = &plan.layout.elements;
    let mut pairs: Vec<(&Element, &Element)> = Vec::new();
    let step = elements.windows(2).map(|two| two[0].at.distance_m(two[1].at)).fold(f64::INFINITY, f64::min);
    let steps = elements.windows(2).filter(|two| two[0].at.distance_m(two[1].at) < 1.2 * step);
    pairs.extend(steps.map(|two| (&two[0], &two[1])));
    for one in elements {
        let beside = |other: &&Element| {
            (other.at.forward_m() - one.at.forward_m()).abs() < 0.01 && other.at.right_m() > one.at.right_m()
        };
        let nearest = elements.iter().filter(beside).min_by(|a, b| a.at.right_m().total_cmp(&b.at.right_m()));
        pairs.extend(nearest.map(|other| (one, other)));
    }
    pairs.sort_by(|a, b| a.0.at.forward_m().total_cmp(&b.0.at.forward_m()));
    let mut drawn: Vec<Length> = Vec::new();
    for (a, b) in pairs {
        let length = Length::from_metres_nearest(a.at.distance_m(b.at));
        let site = |element: &Element| plan.layout.point(element.feed_point).site;
        if !drawn.contains(&length) && dimension(board, site(a), site(b), middle) {
            drawn.push(length);
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
