//! One reel as a strip: pieces to scale from the free end, marks under it, what is left dotted.

use super::svg::{Anchor, Svg, Type, num};

/// What a strip shows.
#[derive(Clone, Debug)]
pub struct Strip {
    /// Begins every id of the drawing.
    pub prefix: String,
    /// The accessible name.
    pub name: String,
    /// The reel's length in metres.
    pub length_m: f64,
    /// The pieces from the free end.
    pub pieces: Vec<StripPiece>,
    /// What is left in metres.
    pub left_m: f64,
    /// What is left, printed.
    pub left: String,
    /// The reel's length, printed.
    pub length: String,
}

/// One piece on a strip.
#[derive(Clone, Debug)]
pub struct StripPiece {
    /// The number of its row in the table.
    pub number: usize,
    /// Its label.
    pub label: String,
    /// Its cut length, printed.
    pub cut: String,
    /// Its first mark in metres.
    pub from_m: f64,
    /// Its last mark in metres.
    pub to_m: f64,
    /// Its last mark, printed.
    pub mark: String,
    /// Its fill.
    pub fill: Fill,
}

/// How a piece is filled.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fill {
    /// Rising hatch: branches and runs.
    Rising,
    /// Cross hatch: delay lines.
    Crossed,
    /// No hatch: everything else.
    Plain,
}

const WIDTH: f64 = 180.0;
const TOP: f64 = 9.0;
const HIGH: f64 = 11.0;

/// Draws a strip 180 mm wide.
pub fn draw(strip: &Strip) -> String {
    let mut svg = Svg::new(WIDTH, 27.0, &strip.prefix);
    svg.hatches();
    let scale = if strip.length_m > 0.0 { WIDTH / strip.length_m } else { 0.0 };
    let mut label_end = 0.0;
    for piece in &strip.pieces {
        draw_piece(&mut svg, piece, scale, &mut label_end);
    }
    draw_left(&mut svg, strip, scale);
    draw_marks(&mut svg, strip, scale);
    svg.finish(&strip.name)
}

fn draw_piece(svg: &mut Svg, piece: &StripPiece, scale: f64, label_end: &mut f64) {
    let (x, width) = (piece.from_m * scale, (piece.to_m - piece.from_m) * scale);
    let fill = match piece.fill {
        Fill::Rising => format!("url(#{})", svg.id("rise")),
        Fill::Crossed => format!("url(#{})", svg.id("cross")),
        Fill::Plain => "#fff".to_owned(),
    };
    svg.rect((x, TOP), (width, HIGH), &fill, 0.35);
    let (name, small) = (Type::bold(3.6).at(Anchor::Middle), Type::plain(3.2).at(Anchor::Middle));
    let middle = x + width / 2.0;
    let plate = name.width(&piece.label).max(small.width(&piece.cut)) + 1.5;
    if plate <= width - 1.0 {
        svg.rect((middle - plate / 2.0, TOP + 1.6), (plate, 8.0), "#fff", 0.0);
        svg.text((middle, TOP + 5.0), name, &piece.label);
        svg.text((middle, TOP + 8.6), small, &piece.cut);
        return;
    }
    // A narrow piece is named above by its row in the table, pushed to the right of the name before it.
    let number = piece.number.to_string();
    let half = name.width(&number) / 2.0;
    let at = middle.max(*label_end + half + 0.6);
    if at + half <= WIDTH && at - middle < 25.0 {
        svg.line((middle, TOP), (at, TOP - 4.0), 0.18, "");
        svg.text((at, TOP - 4.6), name, &number);
        *label_end = at + half;
    }
}

fn draw_left(svg: &mut Svg, strip: &Strip, scale: f64) {
    let width = strip.left_m * scale;
    if width < 0.4 {
        return;
    }
    let x = WIDTH - width;
    let fill = format!("url(#{})", svg.id("dots"));
    svg.raw(&format!(
        r##"<rect x="{}" y="{}" width="{}" height="{}" fill="{fill}" stroke="#000" stroke-width=".35" stroke-dasharray="1.2 .8"/>"##,
        num(x),
        num(TOP),
        num(width),
        num(HIGH)
    ));
    let small = Type::plain(3.2).at(Anchor::Middle);
    let plate = small.width("left over").max(small.width(&strip.left)) + 1.0;
    if plate < width - 1.0 {
        let middle = x + width / 2.0;
        svg.rect((middle - plate / 2.0, TOP + 1.6), (plate, 8.0), "#fff", 0.0);
        svg.text((middle, TOP + 5.0), small, "left over");
        svg.text((middle, TOP + 8.6), small, &strip.left);
    }
}

/// Marks under the strip: the first, the last, and every one between that has room.
fn draw_marks(svg: &mut Svg, strip: &Strip, scale: f64) {
    let foot = TOP + HIGH;
    let small = Type::plain(3.2);
    svg.line((0.15, foot), (0.15, foot + 2.0), 0.25, "");
    svg.text((0.0, foot + 5.4), small, "0");
    let last = small.width(&strip.length);
    svg.line((WIDTH - 0.15, foot), (WIDTH - 0.15, foot + 2.0), 0.25, "");
    svg.text((WIDTH, foot + 5.4), small.at(Anchor::End), &strip.length);
    let mut taken = 4.0;
    for piece in &strip.pieces {
        let (x, half) = (piece.to_m * scale, small.width(&piece.mark) / 2.0);
        if x - half < taken || x + half > WIDTH - last - 1.5 {
            continue;
        }
        svg.line((x, foot), (x, foot + 2.0), 0.25, "");
        svg.text((x, foot + 5.4), small.at(Anchor::Middle), &piece.mark);
        taken = x + half + 1.5;
    }
}
