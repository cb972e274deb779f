//! Label strips of 84 × 34 mm, two columns, with marks to cut along.

use super::sign::{Sign, draw as draw_sign};
use super::svg::{Anchor, Svg, Type};

/// One strip.
#[derive(Clone, Debug)]
pub struct LabelStrip {
    /// B1, W1-F …
    pub id: String,
    /// What stands large beside it.
    pub first: String,
    /// The line under it.
    pub second: String,
    /// The machine text, or a sentence.
    pub text: String,
    /// A second sentence; empty for a cable.
    pub more: String,
    /// The foot of the strip.
    pub foot: String,
    /// Whether the foot is wrapped round a cable.
    pub kind: LabelKind,
}

/// What a strip goes on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LabelKind {
    /// One end of a cable.
    Cable,
    /// A feed box.
    FeedBox,
    /// A termination box.
    Termination,
    /// A hub.
    Hub,
    /// The station entry.
    Station,
}

/// Strips on one sheet: two columns of five, which leaves room for a head on Letter paper.
pub const PER_SHEET: usize = 10;

const WIDE: f64 = 84.0;
const HIGH: f64 = 34.0;
const LEFT: f64 = 6.0;
const TOP: f64 = 12.0;

/// Draws one sheet of at most [`PER_SHEET`] strips.
pub fn draw(strips: &[LabelStrip], name: &str, prefix: &str) -> String {
    let rows = strips.len().div_ceil(2).max(1);
    let height = TOP + row_y(rows) + 8.0;
    let mut svg = Svg::new(180.0, height, prefix);
    let title = "Print at 100 %. Cut from mark to mark; cover with clear tape.";
    svg.text((90.0, 4.0), Type::plain(3.4).at(Anchor::Middle), title);
    for (index, strip) in strips.iter().enumerate() {
        let x = if index % 2 == 0 { LEFT } else { LEFT + WIDE };
        draw_strip(&mut svg, strip, (x, TOP + row_y(index / 2)));
    }
    draw_marks(&mut svg, rows);
    svg.finish(name)
}

#[expect(clippy::cast_precision_loss, reason = "five rows at most")]
fn row_y(row: usize) -> f64 {
    row as f64 * HIGH
}

fn draw_strip(svg: &mut Svg, strip: &LabelStrip, (x, y): (f64, f64)) {
    let sign = match strip.kind {
        LabelKind::Cable => None,
        LabelKind::FeedBox => Some(Sign::Feed),
        LabelKind::Termination => Some(Sign::Termination),
        LabelKind::Hub => Some(Sign::Hub),
        LabelKind::Station => Some(Sign::Receiver),
    };
    let mut at = x + 4.0;
    if let Some(sign) = sign {
        draw_sign(svg, sign, (at + 4.0, y + 9.0), 1.0);
        at += 10.0;
    }
    // The id keeps 34 mm, however long it is.
    let mut id = Type::bold(11.0);
    while id.width(&strip.id) > 34.0 && id.size > 5.0 {
        id.size -= 0.5;
    }
    svg.text((at, y + 13.0), id, &strip.id);
    let right = x + if sign.is_some() { 49.0 } else { 40.0 };
    let room = x + WIDE - right - 1.5;
    let (bold, plain) = (Type::bold(4.0), Type::plain(4.0));
    svg.text((right, y + 7.5), bold, &fitted(bold, &strip.first, room));
    svg.text((right, y + 13.0), plain, &fitted(plain, &strip.second, room));
    if strip.kind == LabelKind::Cable {
        let mono = Type::bold(4.2).mono();
        svg.text((x + 4.0, y + 20.6), mono, &fitted(mono, &strip.text, WIDE - 6.0));
        svg.line((x, y + 24.0), (x + WIDE, y + 24.0), 0.18, "1 1");
        let foot = Type::plain(3.2).at(Anchor::Middle);
        svg.text((x + WIDE / 2.0, y + 29.6), foot, &fitted(foot, &strip.foot, WIDE - 4.0));
    } else {
        let small = Type::plain(3.2);
        for (row, text) in [(20.0, &strip.text), (24.6, &strip.more), (30.0, &strip.foot)] {
            svg.text((x + 4.0, y + row), small, &fitted(small, text, WIDE - 6.0));
        }
    }
}

/// As much of a text as has room.
fn fitted(kind: Type, text: &str, room: f64) -> String {
    if kind.width(text) <= room {
        return text.to_owned();
    }
    let mut kept = text.to_owned();
    while !kept.is_empty() && kind.width(&kept) + kind.size > room {
        kept.pop();
    }
    kept.push('…');
    kept
}

fn draw_marks(svg: &mut Svg, rows: usize) {
    let foot = TOP + row_y(rows);
    for x in [LEFT, LEFT + WIDE, LEFT + 2.0 * WIDE] {
        svg.line((x, 6.0), (x, 10.0), 0.25, "");
        svg.line((x, foot + 2.0), (x, foot + 6.0), 0.25, "");
    }
    for row in 0..=rows {
        let y = TOP + row_y(row);
        svg.line((0.0, y), (4.0, y), 0.25, "");
        svg.line((176.0, y), (180.0, y), 0.25, "");
        svg.line((LEFT + WIDE - 1.5, y), (LEFT + WIDE + 1.5, y), 0.18, "");
        svg.line((LEFT + WIDE, y - 1.5), (LEFT + WIDE, y + 1.5), 0.18, "");
    }
}
