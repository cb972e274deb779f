//! Where a label still has room: rectangles and lines that are taken, and a search around a point.

use super::svg::{Anchor, Type};

/// A point on paper in millimetres.
pub(super) type Point = (f64, f64);

/// A rectangle on paper: left, top, right, bottom.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Rect {
    pub(super) left: f64,
    pub(super) top: f64,
    pub(super) right: f64,
    pub(super) bottom: f64,
}

impl Rect {
    /// A rectangle about a middle.
    pub(super) fn about((x, y): Point, half_w: f64, half_h: f64) -> Self {
        Self { left: x - half_w, top: y - half_h, right: x + half_w, bottom: y + half_h }
    }

    fn meets(self, other: Self) -> bool {
        self.left < other.right
            && other.left < self.right
            && self.top < other.bottom
            && other.top < self.bottom
    }

    /// Whether `other` lies inside.
    pub(super) fn holds(self, other: Self) -> bool {
        other.left >= self.left
            && other.right <= self.right
            && other.top >= self.top
            && other.bottom <= self.bottom
    }

    /// The part of a line inside, or nothing (Liang and Barsky's method).
    pub(super) fn clip(self, a: Point, b: Point) -> Option<(Point, Point)> {
        let (dx, dy) = (b.0 - a.0, b.1 - a.1);
        let (mut first, mut last) = (0.0_f64, 1.0_f64);
        for (step, room) in
            [(-dx, a.0 - self.left), (dx, self.right - a.0), (-dy, a.1 - self.top), (dy, self.bottom - a.1)]
        {
            if step == 0.0 {
                if room < 0.0 {
                    return None;
                }
            } else if step < 0.0 {
                first = first.max(room / step);
            } else {
                last = last.min(room / step);
            }
        }
        let at = |t: f64| (a.0 + t * dx, a.1 + t * dy);
        (first <= last).then(|| (at(first), at(last)))
    }
}

/// What is taken on a drawing.
pub(super) struct Taken {
    area: Rect,
    rects: Vec<Rect>,
    lines: Vec<(Point, Point)>,
}

impl Taken {
    /// An empty area.
    pub(super) fn new(area: Rect) -> Self {
        Self { area, rects: Vec::new(), lines: Vec::new() }
    }

    /// Takes a rectangle.
    pub(super) fn rect(&mut self, rect: Rect) {
        self.rects.push(rect);
    }

    /// Takes a line.
    pub(super) fn line(&mut self, a: Point, b: Point) {
        self.lines.push((a, b));
    }

    /// Whether nothing else is there.
    pub(super) fn is_free(&self, rect: Rect) -> bool {
        self.clear_of_rects(rect) && !self.lines.iter().any(|(a, b)| rect.clip(*a, *b).is_some())
    }

    /// Whether no sign or text is there.
    pub(super) fn clear_of_rects(&self, rect: Rect) -> bool {
        self.area.holds(rect) && !self.rects.iter().any(|taken| taken.meets(rect))
    }

    /// A place near `at` for some lines of text, with their anchor, and takes it: nearest first, clear of lines before
    /// merely clear of other texts. Nothing when the neighbourhood is full.
    pub(super) fn text(&mut self, at: Point, nearest: f64, kind: Type, lines: &[&str]) -> Option<Label> {
        let width = lines.iter().map(|line| kind.width(line)).fold(0.0, f64::max);
        let (height, below) = (kind.size * 1.15, kind.leading() * f64_of(lines.len().saturating_sub(1)));
        let mut second = None;
        for ring in [0.0, 2.5, 5.0, 8.0, 12.0, 17.0] {
            for (dx, dy) in COMPASS {
                let reach = nearest + ring;
                let anchor = anchor_of(dx);
                let spot =
                    (at.0 + dx * reach, at.1 + dy * reach + 0.35 * kind.size - 0.5 * below * (1.0 - dy));
                let left = match anchor {
                    Anchor::Start => spot.0,
                    Anchor::Middle => spot.0 - width / 2.0,
                    Anchor::End => spot.0 - width,
                };
                let rect = Rect {
                    left: left - 0.4,
                    top: spot.1 - 0.85 * height,
                    right: left + width + 0.4,
                    bottom: spot.1 + 0.3 * height + below,
                };
                if !self.clear_of_rects(rect) {
                    continue;
                }
                let label = Label { at: spot, anchor, rect, far: reach > nearest + 3.0 };
                if self.is_free(rect) {
                    self.rect(rect);
                    return Some(label);
                }
                second.get_or_insert(label);
            }
        }
        let label = second?;
        self.rect(label.rect);
        Some(label)
    }
}

/// A place for a text.
#[derive(Clone, Copy)]
pub(super) struct Label {
    pub(super) at: Point,
    pub(super) anchor: Anchor,
    pub(super) rect: Rect,
    /// Whether it stands so far off that it needs a line to its thing.
    pub(super) far: bool,
}

const COMPASS: [(f64, f64); 12] = [
    (1.0, 0.0),
    (-1.0, 0.0),
    (0.0, -1.0),
    (0.0, 1.0),
    (0.75, -0.75),
    (0.75, 0.75),
    (-0.75, -0.75),
    (-0.75, 0.75),
    (0.4, -0.95),
    (0.4, 0.95),
    (-0.4, -0.95),
    (-0.4, 0.95),
];

#[expect(clippy::cast_precision_loss, reason = "a few lines")]
fn f64_of(count: usize) -> f64 {
    count as f64
}

fn anchor_of(dx: f64) -> Anchor {
    if dx > 0.1 {
        Anchor::Start
    } else if dx < -0.1 {
        Anchor::End
    } else {
        Anchor::Middle
    }
}
