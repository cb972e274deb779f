//! The signs of the plan and the labels: shapes that always carry a letter.

use super::svg::{Anchor, Svg, Type, num};

/// What a sign stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Sign {
    /// Feed box of a wire.
    Feed,
    /// Termination box.
    Termination,
    /// Base of a vertical.
    Vertical,
    /// Hub box.
    Hub,
    /// Station.
    Receiver,
    /// Post between the ends of a wire.
    Post,
    /// Earth set.
    Earth,
}

impl Sign {
    /// Its words in the key.
    pub(super) const fn words(self) -> &'static str {
        match self {
            Self::Feed => "feed box of a wire",
            Self::Termination => "termination box",
            Self::Vertical => "vertical",
            Self::Hub => "hub box",
            Self::Receiver => "receiver, station entry",
            Self::Post => "support of a wire",
            Self::Earth => "earth set",
        }
    }

    /// Half of its height and width in millimetres at scale 1.
    pub(super) const fn half(self) -> f64 {
        match self {
            Self::Feed | Self::Termination | Self::Vertical => 3.0,
            Self::Hub => 3.8,
            Self::Receiver => 4.2,
            Self::Post => 1.2,
            Self::Earth => 1.8,
        }
    }
}

/// Draws a sign about its middle.
pub(super) fn draw(svg: &mut Svg, sign: Sign, (x, y): (f64, f64), scale: f64) {
    let (mx, my) = (num(x), num(y));
    let body = match sign {
        Sign::Feed => r#"<rect x="-2.8" y="-2.8" width="5.6" height="5.6"/>"#,
        Sign::Termination => {
            r##"<rect x="-2.8" y="-2.8" width="5.6" height="5.6" fill="#fff" stroke="#000" stroke-width=".35"/><path d="M-2.8 2.4h5.6" stroke="#000" stroke-width="1"/>"##
        }
        Sign::Vertical => {
            r##"<circle r="2.8" fill="#fff" stroke="#000" stroke-width=".5"/><path d="M-2 -2L2 2M-2 2L2 -2" stroke="#000" stroke-width=".35"/>"##
        }
        Sign::Hub => {
            r##"<polygon points="3.6,0 1.8,3.1 -1.8,3.1 -3.6,0 -1.8,-3.1 1.8,-3.1" fill="#fff" stroke="#000" stroke-width=".35"/>"##
        }
        Sign::Receiver => {
            r##"<path d="M-4 3.4v-5l4 -3l4 3v5z" fill="#fff" stroke="#000" stroke-width=".35"/>"##
        }
        Sign::Post => r##"<circle r="1" fill="#fff" stroke="#000" stroke-width=".35"/>"##,
        Sign::Earth => r#"<path d="M-1.6 -1.5h3.2l-1.6 3z"/>"#,
    };
    svg.raw(&format!(r#"<g transform="translate({mx} {my}) scale({})">{body}</g>"#, num(scale)));
    let letter = match sign {
        Sign::Feed => ("F", 1.2, 3.4),
        Sign::Termination => ("T", 0.9, 3.4),
        Sign::Hub => ("H", 1.2, 3.4),
        Sign::Receiver => ("RX", 2.4, 3.0),
        Sign::Vertical | Sign::Post | Sign::Earth => return,
    };
    if scale < 0.99 {
        return;
    }
    if sign == Sign::Feed {
        svg.raw(&format!(
            r#"<text x="{mx}" y="{}" font-size="3.4" font-weight="700" text-anchor="middle" style="fill:#fff">F</text>"#,
            num(y + letter.1)
        ));
    } else {
        svg.text((x, y + letter.1), Type::bold(letter.2).at(Anchor::Middle), letter.0);
    }
}
