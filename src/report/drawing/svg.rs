//! A small writer of SVG: one user unit is one millimetre on paper.

use std::fmt::Write as _;

/// A drawing that grows element by element.
pub(super) struct Svg {
    body: String,
    width: f64,
    height: f64,
    prefix: String,
}

/// How a text is set.
#[derive(Clone, Copy)]
pub(super) struct Type {
    pub(super) size: f64,
    pub(super) anchor: Anchor,
    pub(super) bold: Weight,
    pub(super) halo: Halo,
}

/// Which end of a text stands at its place.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Anchor {
    Start,
    Middle,
    End,
}

/// Normal or bold.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Weight {
    Normal,
    Bold,
    /// Bold and of even width, for texts that a label printer repeats.
    Mono,
}

/// Whether a white rim keeps a text readable on lines.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Halo {
    White,
    None,
}

impl Type {
    /// Normal text of `size` millimetres.
    pub(super) const fn plain(size: f64) -> Self {
        Self { size, anchor: Anchor::Start, bold: Weight::Normal, halo: Halo::None }
    }

    /// Bold text of `size` millimetres.
    pub(super) const fn bold(size: f64) -> Self {
        Self { size, anchor: Anchor::Start, bold: Weight::Bold, halo: Halo::None }
    }

    /// The same with another anchor.
    pub(super) const fn at(self, anchor: Anchor) -> Self {
        Self { anchor, ..self }
    }

    /// The same in even width.
    pub(super) const fn mono(self) -> Self {
        Self { bold: Weight::Mono, ..self }
    }

    /// The same with a white rim.
    pub(super) const fn haloed(self) -> Self {
        Self { halo: Halo::White, ..self }
    }

    /// From one line of text to the next in millimetres.
    pub(super) const fn leading(self) -> f64 {
        self.size * 1.25
    }

    /// How wide a text comes out in a wide font, in millimetres (0.62 and 0.72 of the size a letter, measured on a wide
    /// sans serif with a margin).
    #[expect(clippy::cast_precision_loss, reason = "texts are short")]
    pub(super) fn width(self, text: &str) -> f64 {
        let each = match self.bold {
            Weight::Normal => 0.62,
            Weight::Bold | Weight::Mono => 0.72,
        };
        text.chars().count() as f64 * self.size * each
    }
}

impl Svg {
    /// An empty drawing; `prefix` begins every id in it, because ids are global to an HTML file.
    pub(super) fn new(width: f64, height: f64, prefix: &str) -> Self {
        Self { body: String::new(), width, height, prefix: prefix.to_owned() }
    }

    /// Appends raw SVG made of numbers and constants.
    pub(super) fn raw(&mut self, text: &str) {
        self.body.push_str(text);
        self.body.push('\n');
    }

    /// The full id of a pattern.
    pub(super) fn id(&self, name: &str) -> String {
        format!("{}-{name}", self.prefix)
    }

    /// A path with stroke width and, where wanted, a dash.
    pub(super) fn stroke(&mut self, d: &str, width: f64, dash: &str) {
        let dash = if dash.is_empty() { String::new() } else { format!(" stroke-dasharray=\"{dash}\"") };
        self.raw(&format!(r##"<path d="{d}" stroke="#000" stroke-width="{width}"{dash} fill="none"/>"##));
    }

    /// A straight line.
    pub(super) fn line(&mut self, a: (f64, f64), b: (f64, f64), width: f64, dash: &str) {
        let d = format!("M{} {}L{} {}", num(a.0), num(a.1), num(b.0), num(b.1));
        self.stroke(&d, width, dash);
    }

    /// A rectangle; `fill` is a constant or a `url(#…)` of this drawing.
    pub(super) fn rect(&mut self, at: (f64, f64), size: (f64, f64), fill: &str, width: f64) {
        let stroke =
            if width > 0.0 { format!(" stroke=\"#000\" stroke-width=\"{width}\"") } else { String::new() };
        self.raw(&format!(
            r#"<rect x="{}" y="{}" width="{}" height="{}" fill="{fill}"{stroke}/>"#,
            num(at.0),
            num(at.1),
            num(size.0),
            num(size.1)
        ));
    }

    /// A level text with its baseline at `y`.
    pub(super) fn text(&mut self, at: (f64, f64), kind: Type, text: &str) {
        let transform = format!(r#"x="{}" y="{}""#, num(at.0), num(at.1));
        self.text_with(&transform, kind, text);
    }

    /// A text turned about its place, `degrees` clockwise, `lift` above the line through it.
    pub(super) fn turned_text(&mut self, at: (f64, f64), degrees: f64, lift: f64, kind: Type, text: &str) {
        // Never upside down: a line that runs to the left is read from its other end.
        let readable =
            if (90.0..270.0).contains(&degrees.rem_euclid(360.0)) { degrees + 180.0 } else { degrees };
        let turn = num(readable.rem_euclid(360.0));
        let transform = format!(
            r#"transform="translate({} {}) rotate({turn})" y="{}""#,
            num(at.0),
            num(at.1),
            num(-lift)
        );
        self.text_with(&transform, kind, text);
    }

    fn text_with(&mut self, place: &str, kind: Type, text: &str) {
        let anchor = match kind.anchor {
            Anchor::Start => "",
            Anchor::Middle => r#" text-anchor="middle""#,
            Anchor::End => r#" text-anchor="end""#,
        };
        let weight = match kind.bold {
            Weight::Normal => "",
            Weight::Bold => r#" font-weight="700""#,
            Weight::Mono => r#" font-weight="700" font-family="monospace""#,
        };
        let halo = match kind.halo {
            Halo::White => {
                r##" stroke="#fff" stroke-width="1.2" paint-order="stroke" stroke-linejoin="round""##
            }
            Halo::None => "",
        };
        let size = num(kind.size);
        let text = escaped(text);
        self.raw(&format!(r#"<text {place} font-size="{size}"{anchor}{weight}{halo}>{text}</text>"#));
    }

    /// The finished drawing with its accessible name.
    pub(super) fn finish(self, name: &str) -> String {
        let (w, h) = (num(self.width), num(self.height));
        format!(
            "<svg viewBox=\"0 0 {w} {h}\" width=\"{w}mm\" height=\"{h}mm\" role=\"img\" aria-label=\"{}\">\n{}</svg>",
            escaped(name),
            self.body
        )
    }

    /// The four hatches, for drawings that use them: rising, falling, crossed, dots.
    pub(super) fn hatches(&mut self) {
        let id = self.prefix.clone();
        let lines = [
            ("rise", 2.0, "rotate(45)", r##"<path d="M1 0V2" stroke="#000" stroke-width=".25"/>"##),
            ("fall", 2.0, "rotate(-45)", r##"<path d="M1 0V2" stroke="#000" stroke-width=".25"/>"##),
            (
                "cross",
                2.2,
                "rotate(45)",
                r##"<path d="M1.1 0V2.2M0 1.1H2.2" stroke="#000" stroke-width=".2"/>"##,
            ),
            ("dots", 1.8, "rotate(0)", r#"<circle cx=".9" cy=".9" r=".28"/>"#),
        ];
        let mut defs = String::from("<defs>");
        for (name, pitch, turn, content) in lines {
            let _ = write!(
                defs,
                r#"<pattern id="{id}-{name}" width="{pitch}" height="{pitch}" patternUnits="userSpaceOnUse" patternTransform="{turn}">{content}</pattern>"#
            );
        }
        defs.push_str("</defs>");
        self.raw(&defs);
    }
}

/// A number with at most two decimals; never `NaN`, never minus nothing.
pub(super) fn num(value: f64) -> String {
    if !value.is_finite() {
        return "0".to_owned();
    }
    let text = format!("{value:.2}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" || text.is_empty() { "0".to_owned() } else { text.to_owned() }
}

/// Text made safe inside SVG and its attributes.
pub(super) fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            '\'' => out.push_str("&#39;"),
            c if c.is_control() => out.push(' '),
            c => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_hostile_name_stays_text() {
        assert_eq!(escaped("</style><script>\"x\""), "&lt;/style&gt;&lt;script&gt;&quot;x&quot;");
    }

    #[test]
    fn numbers_are_short_and_finite() {
        assert_eq!([num(1.0), num(-0.001), num(f64::NAN), num(2.345)], ["1", "0", "0", "2.35"]);
    }
}
