//! Azimuth and elevation plots: rim 0 dB, centre −30 dB, true bearings on the rim.
//!
//! One user unit is one millimetre on paper. Curves are told apart by weight and dash and named in words; every number
//! that matters stands in a table as well.

use std::fmt::Write as _;

use super::svg::{escaped, num};
use crate::radio::CutPoint;
use crate::units::Bearing;

/// The level at the centre in dB; weaker is drawn there.
const CENTRE_DB: f64 = -30.0;
/// Radius of the rim in mm.
const RIM: f64 = 44.0;
/// Width of every plot in mm.
const WIDTH: f64 = 180.0;
/// Where the words beside the plot begin.
const LEGEND_X: f64 = 124.0;
/// Centre of the circle from the left.
const CENTRE_X: f64 = 60.0;
/// Weight and dash of the curves, in the order in which they are used.
const STYLES: [(f64, &str); 6] =
    [(0.7, ""), (0.6, "2.4 1"), (0.3, ""), (0.6, "0.1 1.3"), (0.35, "5 1.2"), (1.1, "")];
/// Chain dots, for the wanted bearing alone.
const CHAIN: &str = "4 1 .8 1";
/// Letters that fit beside the plot in a wide font: of a curve's name, and of a line.
const NAME_LETTERS: usize = 19;
const LINE_LETTERS: usize = 28;

/// One curve.
#[derive(Clone, Copy, Debug)]
pub struct Curve<'a> {
    /// Its name in the legend.
    pub name: &'a str,
    /// The wanted direction, from which azimuths are counted.
    pub wanted: Bearing,
    /// The cut through the pattern.
    pub points: &'a [CutPoint],
}

/// What a plot shows.
#[derive(Clone, Copy, Debug)]
pub struct Plot<'a> {
    /// Begins every id of the drawing.
    pub prefix: &'a str,
    /// The heading beside it.
    pub title: &'a str,
    /// Lines under the heading.
    pub lines: &'a [String],
    /// The curves; more than six are named and not drawn.
    pub curves: &'a [Curve<'a>],
}

/// How many curves one plot tells apart.
pub const CURVES: usize = STYLES.len();

/// The level all round at one elevation; curves from [`crate::radio::azimuth_cut`].
pub fn azimuth(plot: &Plot<'_>) -> String {
    let centre = (CENTRE_X, RIM + 12.0);
    let mut drawing = Drawing::new(plot.prefix, centre);
    let drawn = drawn(plot);
    drawing.rings(360.0);
    let mut marks = String::new();
    for bearing in (0..360_u32).step_by(10) {
        drawing.spoke(bearing.into());
        if bearing % 30 == 0 {
            marks += &drawing.rim_text(bearing.into(), &bearing_label(bearing));
        }
    }
    drawing.body += &marks;
    let wanted = wanted(drawn);
    for bearing in &wanted {
        drawing.wanted(bearing.degrees());
    }
    let turned: Vec<Vec<(f64, f64)>> = drawn
        .iter()
        .map(|curve| {
            curve.points.iter().map(|p| (curve.wanted.degrees() + p.angle_deg, p.level_db)).collect()
        })
        .collect();
    drawing.curves(&turned);
    let free =
        quietest(&turned, &[75.0, 105.0, 255.0, 285.0, 15.0, 45.0, 135.0, 165.0, 195.0, 225.0, 315.0, 345.0]);
    drawing.ring_labels(free);
    let names: Vec<String> = wanted.iter().map(|bearing| format!("wanted, {bearing} true")).collect();
    let bottom = drawing.legend(plot, &names, &turned);
    drawing.finish(bottom.max(2.0 * RIM + 20.0), &format!("{}: level by azimuth, true bearings", plot.title))
}

/// The level from the horizon ahead over the zenith to the horizon behind; curves from [`crate::radio::elevation_cut`].
pub fn elevation(plot: &Plot<'_>) -> String {
    let centre = (CENTRE_X, RIM + 9.0);
    let mut drawing = Drawing::new(plot.prefix, centre);
    drawing.rings(180.0);
    // elevation runs anticlockwise from the right, the drawing's angle clockwise from the top
    let dial = |elevation: f64| 90.0 - elevation;
    for elevation in (0..=180_u32).step_by(10) {
        drawing.spoke(dial(elevation.into()));
        if elevation % 30 == 0 {
            let above = if elevation > 90 { 180 - elevation } else { elevation };
            let text = drawing.rim_text(dial(elevation.into()), &format!("{above}°"));
            drawing.body += &text;
        }
    }
    drawing.ground();
    let turned: Vec<Vec<(f64, f64)>> = drawn(plot)
        .iter()
        .map(|curve| curve.points.iter().map(|p| (dial(p.angle_deg), p.level_db)).collect())
        .collect();
    drawing.curves(&turned);
    drawing.ring_labels(quietest(&turned, &[-75.0, -45.0, -15.0, 15.0, 45.0, 75.0]));
    let bottom = drawing.legend(plot, &[], &turned);
    drawing.finish(bottom.max(RIM + 17.0), &format!("{}: level by elevation", plot.title))
}

fn drawn<'a>(plot: &Plot<'a>) -> &'a [Curve<'a>] {
    &plot.curves[..plot.curves.len().min(CURVES)]
}

fn bearing_label(bearing: u32) -> String {
    match bearing {
        0 => "N 0°".to_owned(),
        90 => "E 90°".to_owned(),
        180 => "S 180°".to_owned(),
        270 => "W 270°".to_owned(),
        other => format!("{other}°"),
    }
}

/// The wanted bearings, each once.
fn wanted(curves: &[Curve<'_>]) -> Vec<Bearing> {
    let mut bearings: Vec<Bearing> = Vec::new();
    for curve in curves {
        if !bearings.iter().any(|known| (known.degrees() - curve.wanted.degrees()).abs() < 0.05) {
            bearings.push(curve.wanted);
        }
    }
    bearings
}

/// The one of some angles about which the curves leave most room for figures.
fn quietest(curves: &[Vec<(f64, f64)>], angles: &[f64]) -> f64 {
    let loudest = |angle: f64| {
        let near = |(at, _): &&(f64, f64)| (at - angle + 180.0).rem_euclid(360.0) - 180.0;
        let points = curves.iter().flatten().filter(|point| near(point).abs() < 12.0);
        points.map(|(_, level)| clamped(*level)).fold(CENTRE_DB, f64::max)
    };
    let mut best = (f64::INFINITY, 75.0);
    for angle in angles {
        let level = loudest(*angle);
        if level < best.0 - 1e-9 {
            best = (level, *angle);
        }
    }
    best.1
}

/// Between centre and rim; what is not a number lies at the centre.
fn clamped(level_db: f64) -> f64 {
    if level_db.is_nan() { CENTRE_DB } else { level_db.clamp(CENTRE_DB, 0.0) }
}

/// How far from the centre a level lies in mm.
fn radius(level_db: f64) -> f64 {
    RIM * (1.0 - clamped(level_db) / CENTRE_DB)
}

/// A drawing that grows.
struct Drawing {
    prefix: String,
    centre: (f64, f64),
    body: String,
}

impl Drawing {
    fn new(prefix: &str, centre: (f64, f64)) -> Self {
        Self { prefix: escaped(prefix), centre, body: String::new() }
    }

    /// The place at a radius, `angle` degrees clockwise from the top.
    fn at(&self, angle: f64, radius: f64) -> (f64, f64) {
        let (sin, cos) = angle.to_radians().sin_cos();
        (self.centre.0 + radius * sin, self.centre.1 - radius * cos)
    }

    /// A ring every 5 dB, whole or its upper half.
    fn rings(&mut self, degrees: f64) {
        for step in 0..6_u32 {
            let (ring, weight) = (radius(-5.0 * f64::from(step)), if step == 0 { 0.35 } else { 0.13 });
            if degrees > 350.0 {
                let (x, y) = (num(self.centre.0), num(self.centre.1));
                let ring = num(ring);
                let _ = writeln!(
                    self.body,
                    r##"<circle cx="{x}" cy="{y}" r="{ring}" fill="none" stroke="#000" stroke-width="{weight}"/>"##
                );
            } else {
                let ((x1, y1), (x2, y2)) = (self.at(-90.0, ring), self.at(90.0, ring));
                let ring = num(ring);
                let path = format!("M{} {}A{ring} {ring} 0 0 1 {} {}", num(x1), num(y1), num(x2), num(y2));
                self.stroke(&path, weight, "");
            }
        }
    }

    /// A spoke each 30°, a tick between.
    fn spoke(&mut self, angle: f64) {
        let whole = (angle / 30.0 - (angle / 30.0).round()).abs() < 1e-9;
        let (from, to) = if whole { (radius(-25.0), RIM) } else { (RIM - 1.5, RIM) };
        self.line(self.at(angle, from), self.at(angle, to), 0.13, "");
    }

    /// A figure outside the rim.
    fn rim_text(&self, angle: f64, text: &str) -> String {
        let (x, y) = self.at(angle, RIM + 2.6);
        let side = angle.to_radians().sin();
        let anchor = if side > 0.3 {
            "start"
        } else if side < -0.3 {
            "end"
        } else {
            "middle"
        };
        // the baseline: above the rim at the top, below it at the bottom
        let y = y + 1.2 - 1.4 * angle.to_radians().cos();
        text_at((x, y), 3.2, anchor, "", text)
    }

    /// The wanted bearing as a chain-dotted line with an open arrowhead on the rim.
    fn wanted(&mut self, angle: f64) {
        self.line(self.centre, self.at(angle, RIM + 1.8), 0.35, CHAIN);
        let tip = self.at(angle, RIM);
        let (left, right) = (self.at(angle - 2.2, RIM - 3.6), self.at(angle + 2.2, RIM - 3.6));
        let _ = writeln!(
            self.body,
            r##"<path d="M{} {}L{} {}L{} {}Z" fill="#fff" stroke="#000" stroke-width="0.35"/>"##,
            num(left.0),
            num(left.1),
            num(tip.0),
            num(tip.1),
            num(right.0),
            num(right.1)
        );
    }

    /// The ground, with words for ahead and behind.
    fn ground(&mut self) {
        self.line(self.at(-90.0, RIM + 2.0), self.at(90.0, RIM + 2.0), 0.5, "");
        let y = self.centre.1 + 4.8;
        self.body += &text_at((self.centre.0 + RIM, y), 3.2, "end", "", "ahead");
        self.body += &text_at((self.centre.0 - RIM, y), 3.2, "start", "", "behind");
    }

    fn ring_labels(&mut self, angle: f64) {
        for level in [-5.0, -10.0, -15.0, -20.0, -25.0] {
            let (x, y) = self.at(angle, radius(level));
            let label = format!("−{}", -level);
            self.body += &text_at((x, y + 1.0), 2.9, "middle", HALO, &label);
        }
    }

    fn curves(&mut self, curves: &[Vec<(f64, f64)>]) {
        for (n, (curve, (weight, dash))) in curves.iter().zip(STYLES).enumerate() {
            let mut path = String::new();
            for (angle, level) in curve {
                let (x, y) = self.at(*angle, radius(*level));
                let _ = write!(path, "{}{} {}", if path.is_empty() { "M" } else { "L" }, num(x), num(y));
            }
            if path.is_empty() {
                continue;
            }
            let id = format!("{}-c{}", self.prefix, n + 1);
            let _ = writeln!(
                self.body,
                r##"<path id="{id}" d="{path}" fill="none" stroke="#000" stroke-width="{weight}"{} stroke-linejoin="round" stroke-linecap="{}"/>"##,
                dash_of(dash),
                cap(dash)
            );
        }
    }

    /// Names everything beside the plot, and says where the words end.
    fn legend(&mut self, plot: &Plot<'_>, wanted: &[String], curves: &[Vec<(f64, f64)>]) -> f64 {
        let mut pen = Pen { body: String::new(), y: 8.0 };
        pen.words(plot.title, (3.9, 5.0), NAME_LETTERS, LEGEND_X, BOLD);
        for line in plot.lines {
            pen.words(line, (3.2, 4.4), LINE_LETTERS, LEGEND_X, "");
        }
        pen.words("rim 0 dB, centre −30 dB", (3.2, 4.4), LINE_LETTERS, LEGEND_X, "");
        pen.y += 3.5;
        for (curve, (weight, dash)) in plot.curves.iter().zip(STYLES) {
            pen.sample(weight, dash);
            pen.words(curve.name, (3.4, 4.2), NAME_LETTERS, LEGEND_X + 15.0, "");
            pen.y += 1.6;
        }
        for line in wanted {
            pen.sample(0.35, CHAIN);
            pen.words(line, (3.4, 4.2), NAME_LETTERS, LEGEND_X + 15.0, "");
            pen.y += 1.6;
        }
        if plot.curves.len() > CURVES {
            let more = format!("{} more are not drawn", plot.curves.len() - CURVES);
            pen.words(&more, (3.2, 4.4), LINE_LETTERS, LEGEND_X, "");
        }
        if curves.iter().flatten().any(|(_, level)| *level > 0.05) {
            pen.words(
                "louder than the wanted direction: drawn on the rim",
                (3.2, 4.4),
                LINE_LETTERS,
                LEGEND_X,
                "",
            );
        }
        self.body += &pen.body;
        pen.y
    }

    fn line(&mut self, from: (f64, f64), to: (f64, f64), weight: f64, dash: &str) {
        let path = format!("M{} {}L{} {}", num(from.0), num(from.1), num(to.0), num(to.1));
        self.stroke(&path, weight, dash);
    }

    fn stroke(&mut self, path: &str, weight: f64, dash: &str) {
        let dash = dash_of(dash);
        let _ = writeln!(
            self.body,
            r##"<path d="{path}" fill="none" stroke="#000" stroke-width="{weight}"{dash}/>"##
        );
    }

    fn finish(self, height: f64, name: &str) -> String {
        let (width, height) = (num(WIDTH), num(height));
        format!(
            "<svg id=\"{}\" viewBox=\"0 0 {width} {height}\" width=\"{width}mm\" height=\"{height}mm\" role=\"img\" aria-label=\"{}\">\n{}</svg>",
            self.prefix,
            escaped(name),
            self.body
        )
    }
}

const HALO: &str = r##" stroke="#fff" stroke-width="1.2" paint-order="stroke" stroke-linejoin="round""##;
const BOLD: &str = r#" font-weight="700""#;

/// Writes the legend from the top.
struct Pen {
    body: String,
    y: f64,
}

impl Pen {
    /// Text in lines of at most `letters`.
    fn words(&mut self, text: &str, (size, step): (f64, f64), letters: usize, x: f64, style: &str) {
        for line in wrapped(text, letters) {
            self.body += &text_at((x, self.y), size, "start", style, &line);
            self.y += step;
        }
    }

    fn sample(&mut self, weight: f64, dash: &str) {
        let _ = writeln!(
            self.body,
            r##"<path d="M{LEGEND_X} {}h12" fill="none" stroke="#000" stroke-width="{weight}"{} stroke-linecap="{}"/>"##,
            num(self.y - 1.2),
            dash_of(dash),
            cap(dash)
        );
    }
}

fn dash_of(dash: &str) -> String {
    if dash.is_empty() { String::new() } else { format!(r#" stroke-dasharray="{dash}""#) }
}

/// Dots are round.
fn cap(dash: &str) -> &'static str {
    if dash.starts_with("0.1 ") { "round" } else { "butt" }
}

fn text_at((x, y): (f64, f64), size: f64, anchor: &str, style: &str, text: &str) -> String {
    let anchor = if anchor == "start" { String::new() } else { format!(r#" text-anchor="{anchor}""#) };
    format!(
        "<text x=\"{}\" y=\"{}\" font-size=\"{size}\"{anchor}{style}>{}</text>\n",
        num(x),
        num(y),
        escaped(text)
    )
}

/// Lines of at most `letters`, broken between words, after hyphens, or inside a word that is longer than a line.
fn wrapped(text: &str, letters: usize) -> Vec<String> {
    let mut lines = vec![String::new()];
    for word in text.split_whitespace() {
        let mut word: Vec<char> = word.chars().collect();
        loop {
            let line = lines.last_mut().expect("invariant: there is always a line");
            let used = line.chars().count();
            let room = letters.saturating_sub(if used == 0 { 0 } else { used + 1 });
            if word.len() <= room {
                if used > 0 {
                    line.push(' ');
                }
                line.extend(&word);
                break;
            }
            let part = breakable(&word, room).or_else(|| (used == 0).then(|| letters.min(word.len())));
            if let Some(part) = part {
                if used > 0 {
                    line.push(' ');
                }
                line.extend(word.drain(..part));
            }
            lines.push(String::new());
        }
    }
    lines.retain(|line| !line.is_empty());
    lines
}

/// How much of a word fits up to and with its last hyphen within `room`.
fn breakable(word: &[char], room: usize) -> Option<usize> {
    word[..room.min(word.len())].iter().rposition(|c| *c == '-').map(|at| at + 1)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_rim_is_0_db_and_the_centre_30_below() {
        assert!((radius(0.0) - RIM).abs() < 1e-12);
        assert!((radius(-15.0) - RIM / 2.0).abs() < 1e-12);
        assert!(radius(-30.0).abs() < 1e-12 && radius(-99.0).abs() < 1e-12 && radius(f64::NAN).abs() < 1e-12);
        assert!((radius(3.0) - RIM).abs() < 1e-12);
    }

    #[test]
    fn azimuth_is_clockwise_from_north_at_the_top() {
        let drawing = Drawing::new("x", (0.0, 0.0));
        let (east, south) = (drawing.at(90.0, 10.0), drawing.at(180.0, 10.0));
        assert!((east.0 - 10.0).abs() < 1e-12 && east.1.abs() < 1e-12);
        assert!(south.0.abs() < 1e-12 && (south.1 - 10.0).abs() < 1e-12);
    }

    #[test]
    fn a_curve_is_drawn_from_its_own_wanted_bearing() {
        let points =
            [CutPoint { angle_deg: 0.0, level_db: 0.0 }, CutPoint { angle_deg: 90.0, level_db: f64::NAN }];
        let curve = Curve { name: "a<b", wanted: Bearing::from_degrees(90.0), points: &points };
        let svg = azimuth(&Plot { prefix: "az", title: "T", lines: &[], curves: &[curve] });
        // wanted east: the first point on the rim at the right, the second at the centre
        assert!(svg.contains(r#"id="az-c1" d="M104 56L60 56""#), "{svg}");
        assert!(svg.contains("a&lt;b") && !svg.contains("NaN"));
    }

    #[test]
    fn ahead_is_to_the_right_in_elevation() {
        let points = [0.0, 90.0, 180.0].map(|angle_deg| CutPoint { angle_deg, level_db: 0.0 });
        let curve = Curve { name: "x", wanted: Bearing::from_degrees(300.0), points: &points };
        let svg = elevation(&Plot { prefix: "el", title: "T", lines: &[], curves: &[curve] });
        assert!(svg.contains(r#"id="el-c1" d="M104 53L60 9L16 53""#), "{svg}");
    }

    #[test]
    fn long_names_are_broken_into_lines() {
        assert_eq!(wrapped("two ways north-west", 10), ["two ways", "north-west"]);
        assert_eq!(wrapped("abcdefghij", 4), ["abcd", "efgh", "ij"]);
        assert_eq!(wrapped("a long-winded-name", 12), ["a long-", "winded-name"]);
    }
}
