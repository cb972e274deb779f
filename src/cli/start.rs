//! `start`: a commented project file to begin from.

use std::path::PathBuf;

use clap::ValueEnum;

use super::failure::{Failure, Outcome};
use super::output;

/// Write a commented project file to begin from
#[derive(Debug, clap::Args)]
pub(super) struct Start {
    /// What kind of array
    family: Family,
    /// Write to this file instead of the screen; an existing file is never overwritten
    #[arg(short, long, value_name = "FILE")]
    output: Option<PathBuf>,
}

/// Kinds of array, each just a composition of an element and its stages
#[derive(Debug, Clone, Copy, PartialEq, Eq, ValueEnum)]
pub(super) enum Family {
    /// One terminated wire
    SingleWire,
    /// Two staggered wires, end-fire
    EchelonPair,
    /// A row of wires, fed in phase
    BroadsideWires,
    /// A row of echelon pairs
    BroadsideEchelon,
    /// Two short verticals, end-fire
    VerticalPair,
    /// Three short verticals in line
    #[value(name = "inline-3")]
    Inline3,
    /// A row of three-element end-fire cells
    CellPair,
    /// Given positions and weights
    Custom,
}

impl Family {
    fn array(self) -> &'static str {
        match self {
            Self::SingleWire => WIRE,
            Self::EchelonPair => ECHELON_PAIR,
            Self::BroadsideWires => BROADSIDE_WIRES,
            Self::BroadsideEchelon => BROADSIDE_ECHELON,
            Self::VerticalPair => VERTICAL_PAIR,
            Self::Inline3 => INLINE_3,
            Self::CellPair => CELL_PAIR,
            Self::Custom => CUSTOM,
        }
    }
}

impl Start {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let text = format!("{HEAD}{}{TAIL}", self.family.array());
        match &self.output {
            None => output::text(&text)?,
            Some(path) if path.exists() => {
                return Err(Failure::Usage(format!(
                    "{} exists already; choose another name",
                    path.display()
                )));
            }
            Some(path) => {
                output::write_whole(path, &text)?;
                output::complaint(&format!(
                    "wrote {}; edit it, then run `arraywright check {0}`",
                    path.display()
                ));
            }
        }
        Ok(Outcome::Done)
    }
}

const HEAD: &str = r#"# Every dimension is text with its unit: "60 ft", "18.3 m", "1.83 MHz", "310 deg".
# Bare numbers are ratios and counts. Lines that begin with # are remarks.

[project]
title          = "My receive array"
currency       = "EUR"
estimated      = 2026-06-01           # the day that prices are judged against
frequency      = "1.83 MHz"           # design frequency
# also         = ["3.55 MHz"]         # other bands it must serve
# receiver-noise = "12 dB"

[site]
ground    = "average"                 # perfect, good, average, poor, or { conductivity = "5 mS/m", permittivity = 13 }
# soil    = "120 ohm m"               # for the earth rods
terrain   = "pasture"                 # open, pasture, light-wood, dense-bush, rock
noise     = "quiet-rural"             # city, residential, rural, quiet-rural
receiver  = { east = "-140 m", north = "-60 m" }   # where the main feedline ends, from the datum stake

"#;

const WIRE: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # the feed point
element.wire = { length = "176 m", height = "2.5 m" }
"#;

const ECHELON_PAIR: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # middle of the two feed points
element.wire = { length = "176 m", height = "2.5 m" }
echelon   = { stagger = "60 ft", offset = "5 m" }   # the front wire stands `offset` to the right; negative: left
"#;

const BROADSIDE_WIRES: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # middle of the feed points
element.wire = { length = "176 m", height = "2.5 m" }
broadside = { count = 2, spacing = "120 m" }        # count may be 2, 3, 4, 6, 8, 9 …
"#;

const BROADSIDE_ECHELON: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # middle of all feed points
element.wire = { length = "176 m", height = "2.5 m" }
echelon   = { stagger = "60 ft", offset = "5 m" }   # the front wire stands `offset` to the right; negative: left
broadside = { count = 2, spacing = "120 m" }
"#;

const VERTICAL_PAIR: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # middle of the two bases
element.vertical = { height = "6 m", active = true }   # false: passive, with a loading coil
endfire   = { count = 2, spacing = "20 m" }
"#;

const INLINE_3: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # the middle one
element.vertical = { height = "6 m", active = true }   # false: passive, with a loading coil
endfire   = { count = 3, spacing = "20 m" }
"#;

const CELL_PAIR: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }         # middle of all bases
element.vertical = { height = "6 m", active = true }   # false: passive, with a loading coil
endfire   = { count = 3, spacing = "20 m" }
broadside = { count = 2, spacing = "100 m" }
"#;

const CUSTOM: &str = r#"[[array]]
name      = "north-west"
heading   = "310 deg"                 # true bearing of the wanted direction
centre    = { east = "0 m", north = "0 m" }
element.vertical = { height = "6 m", active = true }   # false: passive, with a loading coil

[array.custom]                        # one weight for each position; phase is what the leg adds (a delay is negative)
positions = [
  { forward = "9 m", right = "0 m" },
  { forward = "-9 m", right = "0 m" },
]
weights = [
  { amplitude = 1.0, phase = "0 deg" },
  { amplitude = 1.0, phase = "160 deg" },
]
"#;

const TAIL: &str = r#"
# [array.feed]                        # all optional
# hub       = "centre"                # or "best", or { forward = "0 m", right = "0 m" } from the middle of the feed points
# branch    = "…"                     # part ids of your catalogue, for branch, delay, run, main, control
# amplifier = "auto"                  # auto, hub, none

# [practice]                          # every allowance has a key; these are some
# riser        = "1 m"
# service-loop = "1 m"
# max-bay      = "25 m"

# [prices]
# tax         = "21 %"
# freight     = { S1 = "15.00", heavy = "0.40 per kg", free-over = "500.00" }
# contingency = "10 %"

# [[on-hand]]
# part   = "…"
# length = "120 m"
# note   = "half reel in the shed"
"#;
