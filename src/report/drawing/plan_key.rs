//! What stands beside a site plan: the key, the scale bar, the north arrow.

use std::fmt::Write as _;

use super::ground::Ground;
use super::place::{Point, Rect, Taken};
use super::sign::{self, Sign};
use super::svg::{Anchor, Svg, Type, num};
use crate::units::Angle;

/// A kind of line on the plan.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Stroke {
    /// Antenna wire.
    Wire,
    /// Branch or run.
    Branch,
    /// Main line.
    Main,
    /// Control cable.
    Control,
}

impl Stroke {
    const fn words(self) -> &'static str {
        match self {
            Self::Wire => "antenna wire",
            Self::Branch => "coax: branch or run",
            Self::Main => "coax: main line",
            Self::Control => "control cable",
        }
    }

    /// Draws a line of this kind.
    pub(super) fn draw(self, svg: &mut Svg, a: Point, b: Point) {
        match self {
            Self::Wire => svg.line(a, b, 0.7, ""),
            // Dashes are counted from the hub: branches on one line then lie in step and stay dashed.
            Self::Branch => svg.line(b, a, 0.5, "3 1.1"),
            Self::Main => {
                svg.line(a, b, 1.5, "");
                let d = format!("M{} {}L{} {}", num(a.0), num(a.1), num(b.0), num(b.1));
                svg.raw(&format!(r##"<path d="{d}" stroke="#fff" stroke-width=".8" fill="none"/>"##));
            }
            Self::Control => {
                let d = format!("M{} {}L{} {}", num(a.0), num(a.1), num(b.0), num(b.1));
                svg.raw(&format!(
                    r##"<path d="{d}" stroke="#000" stroke-width=".5" stroke-dasharray="0 1.3" stroke-linecap="round" fill="none"/>"##
                ));
            }
        }
    }
}

/// Draws the key of what the plan shows; returns the height it took.
pub(super) fn draw_key(svg: &mut Svg, left: f64, signs: &[Sign], strokes: &[Stroke]) -> f64 {
    const ROW: f64 = 8.0;
    svg.text((left, 5.0), Type::bold(3.9), "What the signs mean");
    let mut y = 12.0;
    for sign in signs {
        sign::draw(svg, *sign, (left + 5.0, y), 1.0);
        svg.text((left + 12.0, y + 1.2), Type::plain(3.2), sign.words());
        y += ROW;
    }
    for stroke in strokes {
        stroke.draw(svg, (left, y), (left + 10.0, y));
        svg.text((left + 12.0, y + 1.2), Type::plain(3.2), stroke.words());
        y += 6.0;
    }
    y
}

/// A bar of four blocks that states its printed length.
pub(super) fn draw_scale_bar(svg: &mut Svg, left: f64, top: f64, ground: &Ground) {
    let block = [1.0, 2.0, 5.0, 10.0, 20.0, 25.0, 50.0, 100.0, 200.0, 500.0]
        .into_iter()
        .rfind(|metres| ground.mm(*metres) * 4.0 <= 52.0)
        .unwrap_or(1.0);
    let wide = ground.mm(block);
    for (n, fill) in ["#000", "#fff", "#000", "#fff"].into_iter().enumerate() {
        let x = left + offset(n) * wide;
        svg.rect((x, top), (wide, 2.0), fill, 0.25);
    }
    let small = Type::plain(3.2).at(Anchor::Middle);
    svg.text((left, top - 1.2), Type::plain(3.2), "0");
    svg.text((left + 2.0 * wide, top - 1.2), small, &num(2.0 * block));
    svg.text((left + 4.0 * wide, top - 1.2), small, &format!("{} m", num(4.0 * block)));
    let words = format!("1 : {:.0}. Bar = {:.1} mm", ground.denominator, 4.0 * wide);
    svg.text((left, top + 6.0), Type::plain(3.2), &words);
}

#[expect(clippy::cast_precision_loss, reason = "four blocks")]
fn offset(block: usize) -> f64 {
    block as f64
}

/// The north arrow, with the compass needle beside it where the declination is known.
pub(super) fn draw_north(svg: &mut Svg, taken: &mut Taken, area: Rect, declination: Option<Angle>) {
    let (half_w, half_h) = (9.0, 18.0);
    let corners = [
        (area.left + half_w, area.top + half_h),
        (area.right - half_w, area.top + half_h),
        (area.left + half_w, area.bottom - half_h),
        (area.right - half_w, area.bottom - half_h),
        (area.left + half_w, f64::midpoint(area.top, area.bottom)),
        (area.right - half_w, f64::midpoint(area.top, area.bottom)),
    ];
    let free = corners.into_iter().find(|at| taken.is_free(Rect::about(*at, half_w, half_h)));
    let at = free.unwrap_or(corners[0]);
    taken.rect(Rect::about(at, half_w, half_h));
    let (x, y) = (at.0, at.1 + 8.0);
    let mut body = format!(r#"<g transform="translate({} {})">"#, num(x), num(y));
    body.push_str(r##"<path d="M0 -18L3.4 -7L0 -9.5Z"/><path d="M0 -18L-3.4 -7L0 -9.5Z" fill="#fff" stroke="#000" stroke-width=".25"/><path d="M0 -9V8" stroke="#000" stroke-width=".35"/>"##);
    if let Some(angle) = declination {
        let _ = write!(
            body,
            r##"<g transform="rotate({})"><path d="M0 8V-14l1.8 4" stroke="#000" stroke-width=".35" fill="none"/></g>"##,
            num(angle.degrees())
        );
    }
    body.push_str("</g>");
    svg.raw(&body);
    svg.text((x, y - 20.0), Type::bold(3.6).at(Anchor::Middle), "N true");
    if let Some(angle) = declination {
        svg.text((x + 2.0, y + 2.0), Type::plain(3.2).haloed(), "M");
        svg.text((x + 2.0, y + 6.0), Type::plain(3.2).haloed(), &format!("{:+.1}°", angle.degrees()));
    }
}
