//! The site plan: true north up, everything of one option at one round scale, a detail where things stand close.

use std::collections::BTreeSet;

use super::board::{Board, apart, centroid, normal};
use super::ground::Ground;
use super::place::{Point as Paper, Rect, Taken};
use super::plan_dimension::draw_dimensions;
use super::plan_key::{Stroke, draw_key, draw_north, draw_scale_bar};
use super::plan_land::{draw_land, draw_names_of_land};
use super::sign::{self, Sign};
use super::svg::{Svg, Type, num};
use crate::design::Design;
use crate::plan::{ArrayPlan, Fixture, LineRole, Point, PointKind, SitePosition};
use crate::project::Project;
use crate::units::{Angle, Bearing, Length};

/// Which control cables run where.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ControlCable {
    /// Beside the main line and every run.
    Laid,
    /// None.
    Absent,
}

const SHEET: (f64, f64) = (250.0, 150.0);
const AREA: Rect = Rect { left: 1.0, top: 1.0, right: 184.0, bottom: 149.0 };
const COLUMN: f64 = 190.0;
/// Signs nearer than this on paper are drawn small, and once more in a detail.
const CROWDED: f64 = 9.0;

/// Draws the plan of one option, 250 × 150 mm.
pub fn draw(project: &Project, design: &Design, control: ControlCable) -> String {
    let scene = Scene::new(project, design);
    let mut svg = Svg::new(SHEET.0, SHEET.1, "sp");
    svg.hatches();
    let mut board = Board { svg, taken: Taken::new(AREA), ground: scene.ground, area: AREA };
    draw_land(&mut board, project);
    draw_lines(&mut board, design, control);
    scene.draw_signs(&mut board);
    draw_dimensions(&mut board, design);
    draw_north(&mut board.svg, &mut board.taken, AREA, project.site.declination);
    for array in &design.arrays {
        draw_beam(&mut board, &array.plan, project.site.declination);
    }
    scene.draw_names(&mut board);
    draw_line_names(&mut board, design, scene.receiver_on_plan);
    draw_names_of_land(&mut board, project);
    let mut svg = board.svg;
    let strokes = strokes_used(design, control);
    let foot = draw_key(&mut svg, COLUMN, &scene.signs_used(), &strokes);
    svg = draw_detail(svg, &scene, design, foot);
    draw_scale_bar(&mut svg, COLUMN, 141.0, &scene.ground);
    svg.finish("Site plan, true north up; every place on it stands in the table of stakes")
}

/// The points of an option, each once.
struct Scene<'a> {
    points: Vec<&'a Point>,
    ground: Ground,
    receiver_on_plan: bool,
    anchors: Vec<SitePosition>,
}

impl<'a> Scene<'a> {
    fn new(project: &Project, design: &'a Design) -> Self {
        let mut points: Vec<&Point> = Vec::new();
        for point in design.arrays.iter().flat_map(|array| &array.plan.layout.points) {
            if !points.iter().any(|known| known.name == point.name) {
                points.push(point);
            }
        }
        let near: Vec<SitePosition> =
            points.iter().filter(|p| p.kind != PointKind::Receiver).map(|p| p.site).collect();
        let mut all = near.clone();
        all.push(project.site.receiver.into());
        let (with, without) = (Ground::fitting(&all, AREA, 15.0), Ground::fitting(&near, AREA, 15.0));
        // A far receiver would shrink the array to nothing: then its line leaves the sheet.
        let receiver_on_plan = with.denominator <= 1.6 * without.denominator;
        let ground = if receiver_on_plan { with } else { without };
        if !receiver_on_plan {
            points.retain(|point| point.kind != PointKind::Receiver);
        }
        let anchors = points.iter().filter(|p| p.kind != PointKind::Post).map(|p| p.site).collect();
        Self { points, ground, receiver_on_plan, anchors }
    }

    /// Whether another sign stands so close that both are drawn small.
    fn crowded(&self, point: &Point) -> bool {
        let near = |other: &&SitePosition| self.ground.mm(point.site.distance_m(**other)) < CROWDED;
        self.anchors.iter().filter(near).count() > 1
    }

    fn draw_signs(&self, board: &mut Board) {
        for point in &self.points {
            let at = self.ground.paper(point.site);
            let scale = if point.kind != PointKind::Post && self.crowded(point) { 0.5 } else { 1.0 };
            draw_point(board, point, at, scale);
        }
    }

    fn draw_names(&self, board: &mut Board) {
        for point in self.points.iter().filter(|point| point.kind != PointKind::Post) {
            let at = self.ground.paper(point.site);
            let half = sign_of(point).half() * if self.crowded(point) { 0.5 } else { 1.0 };
            board.label(at, half + 1.4, Type::bold(3.9), &[&point.name]);
        }
    }

    fn signs_used(&self) -> Vec<Sign> {
        let mut used: BTreeSet<Sign> = self.points.iter().map(|point| sign_of(point)).collect();
        if self.points.iter().any(|point| has_earth(point)) {
            used.insert(Sign::Earth);
        }
        used.into_iter().collect()
    }
}

fn sign_of(point: &Point) -> Sign {
    let mast = point.fixtures.iter().any(|fixture| matches!(fixture, Fixture::Mast(_)));
    match point.kind {
        PointKind::FeedPoint if mast => Sign::Vertical,
        PointKind::FeedPoint => Sign::Feed,
        PointKind::Termination => Sign::Termination,
        PointKind::Post => Sign::Post,
        PointKind::Hub => Sign::Hub,
        PointKind::Receiver => Sign::Receiver,
    }
}

fn has_earth(point: &Point) -> bool {
    point.fixtures.iter().any(|fixture| matches!(fixture, Fixture::Earth(_)))
}

fn draw_point(board: &mut Board, point: &Point, at: Paper, scale: f64) {
    let sign = sign_of(point);
    if has_earth(point) && scale > 0.9 {
        sign::draw(&mut board.svg, Sign::Earth, (at.0, at.1 + 4.8), 1.0);
        board.taken.rect(Rect::about((at.0, at.1 + 4.8), 1.8, 1.8));
    }
    sign::draw(&mut board.svg, sign, at, scale);
    let half = sign.half() * scale;
    board.taken.rect(Rect::about(at, half, half));
}

fn strokes_used(design: &Design, control: ControlCable) -> Vec<Stroke> {
    let mut used = BTreeSet::new();
    for plan in design.arrays.iter().map(|array| &array.plan) {
        if !plan.layout.spans.is_empty() {
            used.insert(Stroke::Wire);
        }
        used.extend(plan.feed.lines.iter().filter_map(|line| stroke_of(line.role)));
    }
    if control == ControlCable::Laid {
        used.insert(Stroke::Control);
    }
    used.into_iter().collect()
}

const fn stroke_of(role: LineRole) -> Option<Stroke> {
    match role {
        LineRole::Branch | LineRole::Run => Some(Stroke::Branch),
        LineRole::Main => Some(Stroke::Main),
        LineRole::Delay => None,
    }
}

/// Wires, coax and control cable, the last beside the lines it accompanies.
fn draw_lines(board: &mut Board, design: &Design, control: ControlCable) {
    for plan in design.arrays.iter().map(|array| &array.plan) {
        let at = |id| board.ground.paper(plan.layout.point(id).site);
        let mut lines: Vec<(Stroke, Paper, Paper)> = Vec::new();
        for line in &plan.feed.lines {
            let Some(stroke) = stroke_of(line.role) else { continue };
            let (a, b) = (at(line.termini.from), at(line.termini.to));
            lines.push((stroke, a, b));
            if control == ControlCable::Laid && matches!(line.role, LineRole::Main | LineRole::Run) {
                let (nx, ny) = normal(a, b);
                let beside = |p: Paper| (p.0 + 1.8 * nx, p.1 + 1.8 * ny);
                lines.push((Stroke::Control, beside(a), beside(b)));
            }
        }
        for span in &plan.layout.spans {
            lines.push((Stroke::Wire, at(span.from), at(span.to)));
        }
        for (stroke, a, b) in lines {
            board.line(stroke, a, b);
        }
    }
}

/// A hollow arrow toward where the array listens, with the bearing in words.
fn draw_beam(board: &mut Board, plan: &ArrayPlan, declination: Option<Angle>) {
    let middle = board.ground.paper(centroid(plan));
    let bearing = plan.feed.switch.states.first().map_or(plan.layout.heading, |state| state.bearing);
    let (sin, cos) = libm::sincos(bearing.radians());
    let across = |by: f64| (middle.0 + by * cos, middle.1 + by * sin);
    let mut places: Vec<Paper> = [0.0, 14.0, -14.0, 20.0, -20.0, 28.0, -28.0, 38.0, -38.0, 50.0, -50.0]
        .into_iter()
        .map(across)
        .collect();
    places.extend([(40.0, 25.0), (145.0, 25.0), (40.0, 125.0), (145.0, 125.0)]);
    let free = places.iter().find(|at| board.taken.is_free(Rect::about(**at, 10.0, 12.0)));
    let at = *free.unwrap_or(&places[1]);
    board.svg.raw(&format!(
        r##"<g transform="translate({} {}) rotate({})"><path d="M-2.6 10V-4H-5.4L0 -12L5.4 -4H2.6V10Z" fill="#fff" stroke="#000" stroke-width=".5"/></g>"##,
        num(at.0),
        num(at.1),
        num(bearing.degrees())
    ));
    board.taken.rect(Rect::about(at, 9.0, 11.0));
    let words = match plan.feed.switch.states.len() {
        0 | 1 => "listens".to_owned(),
        n => format!("first of {n}"),
    };
    let compass = declination
        .map(|angle| format!("{} compass", Bearing::from_degrees(bearing.degrees() - angle.degrees())));
    let bearing = format!("{bearing} true");
    let lines: Vec<&str> = [words.as_str(), &bearing].into_iter().chain(compass.as_deref()).collect();
    board.label(at, 11.0, Type::bold(3.9), &lines);
}

fn draw_line_names(board: &mut Board, design: &Design, receiver_on_plan: bool) {
    let kind = Type::plain(3.2);
    for array in &design.arrays {
        let plan = &array.plan;
        for (line, length) in plan.feed.lines.iter().zip(&array.lengths) {
            let (from, to) = (plan.layout.point(line.termini.from), plan.layout.point(line.termini.to));
            let ends = board.area.clip(board.ground.paper(from.site), board.ground.paper(to.site));
            let Some((a, b)) = ends else { continue };
            if to.kind == PointKind::Receiver && !receiver_on_plan {
                let away = format!("{} to RX: {:.2} m", line.label, from.site.distance_m(to.site));
                let toward = format!("at {} true from {}", from.site.bearing_to(to.site), from.name);
                let at = (a.0 + 0.7 * (b.0 - a.0), a.1 + 0.7 * (b.1 - a.1));
                board.label(at, 2.5, Type::bold(3.2), &[&away, &toward]);
            } else if apart(a, b) >= 12.0 {
                let middle = (f64::midpoint(a.0, b.0), f64::midpoint(a.1, b.1));
                board.label(middle, 1.6, kind, &[&format!("{} {}", line.label, length.finished)]);
            }
        }
    }
}

/// The largest crowd of signs once more, larger, under the key.
fn draw_detail(mut svg: Svg, scene: &Scene<'_>, design: &Design, foot: f64) -> Svg {
    let area = Rect { left: COLUMN, top: foot + 4.0, right: SHEET.0 - 0.5, bottom: 133.0 };
    let crowded = scene.points.iter().filter(|p| p.kind != PointKind::Post && scene.crowded(p));
    let found = crowded.map(|first| crowd_of(scene, first)).filter_map(|members| {
        let places: Vec<SitePosition> = members.iter().map(|point| point.site).collect();
        let apart = places.iter().any(|place| place.distance_m(places[0]) > 1.0);
        // The foot of the frame is for the distances in words.
        let inside = Rect { bottom: area.bottom - 5.0, ..area };
        let ground = Ground::fitting(&places, inside, 9.0);
        (apart && ground.denominator <= 0.6 * scene.ground.denominator).then_some((members, ground))
    });
    // Of equal crowds the first.
    let found = found.reduce(|best, next| if next.0.len() > best.0.len() { next } else { best });
    let Some((members, ground)) = found.filter(|_| area.bottom - area.top >= 30.0) else { return svg };
    let title = format!("Close up, 1 : {:.0}", ground.denominator);
    svg.rect((area.left, area.top), (area.right - area.left, area.bottom - area.top), "none", 0.25);
    svg.text((area.left, area.top - 1.2), Type::bold(3.2), &title);
    let mut board = Board { svg, taken: Taken::new(area), ground, area };
    draw_lines(&mut board, design, ControlCable::Absent);
    for point in &members {
        draw_point(&mut board, point, ground.paper(point.site), 1.0);
    }
    for point in &members {
        let at = ground.paper(point.site);
        board.label(at, sign_of(point).half() + 1.2, Type::bold(3.6), &[&point.name]);
    }
    for (n, a) in members.iter().enumerate() {
        for b in members.iter().skip(n + 1).filter(|b| b.kind == a.kind && a.kind == PointKind::FeedPoint) {
            let metres = Length::from_metres_nearest(a.site.distance_m(b.site));
            board.corner_note(Type::plain(3.2), &format!("{} to {}: {metres}", a.name, b.name));
        }
    }
    board.svg
}

/// The points that hang together with `first` by distances under the crowding limit.
fn crowd_of<'a>(scene: &Scene<'a>, first: &'a Point) -> Vec<&'a Point> {
    let mut members: Vec<&Point> = vec![first];
    let mut next = 0;
    while next < members.len() {
        let at = members[next].site;
        for point in scene.points.iter().filter(|point| point.kind != PointKind::Post) {
            let near = scene.ground.mm(at.distance_m(point.site)) < CROWDED;
            if near && !members.iter().any(|known| known.name == point.name) {
                members.push(point);
            }
        }
        next += 1;
    }
    members
}
