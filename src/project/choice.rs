//! The words that a project file chooses from.

use std::fmt;

macro_rules! choice {
    ($(#[$doc:meta])* $name:ident { $($(#[$vdoc:meta])* $variant:ident = $text:literal),+ $(,)? }) => {
        $(#[$doc])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
        pub enum $name { $($(#[$vdoc])* $variant),+ }

        impl $name {
            /// Every choice with its word in the project file.
            pub const CHOICES: &'static [(&'static str, Self)] = &[$(($text, Self::$variant)),+];

            /// The word in the project file.
            pub const fn word(self) -> &'static str {
                match self { $(Self::$variant => $text),+ }
            }
        }

        impl fmt::Display for $name {
            fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
                out.write_str(self.word())
            }
        }
    };
}

choice!(
    /// Terrain class, as in `terrain.csv`.
    Terrain {
        /// Open field.
        Open = "open",
        /// Pasture with fences and stock.
        Pasture = "pasture",
        /// Light wood.
        LightWood = "light-wood",
        /// Dense bush.
        DenseBush = "dense-bush",
        /// Rock or frozen ground.
        Rock = "rock",
    }
);
choice!(
    /// Man-made noise class of the site.
    NoiseClass {
        /// City.
        City = "city",
        /// Residential.
        Residential = "residential",
        /// Rural.
        Rural = "rural",
        /// Quiet rural.
        QuietRural = "quiet-rural",
    }
);
choice!(
    /// How the two or more rows of an end-fire stage are phased.
    Scheme {
        /// Rear inverted and delayed.
        Crossfire = "crossfire",
        /// Front delayed, nothing inverted.
        InPhase = "in-phase",
        /// Front delayed by half a wave less the step; one frequency.
        HalfWave = "half-wave",
    }
);
choice!(
    /// Whether the delay is a piece of its own or part of the longer leg.
    DelayStyle {
        /// A separate labelled piece at the hub.
        Separate = "separate",
        /// Branch and delay of one part.
        Merged = "merged",
    }
);
choice!(
    /// In which order cells and rows are combined.
    Combining {
        /// Every cell has its hub, the cells join at the array hub.
        ByCell = "by-cell",
        /// One hub: each row of all cells is combined, then the rows.
        ByRow = "by-row",
    }
);
choice!(
    /// Where the outermost group's lines meet.
    Join {
        /// At the hub in the field.
        Hub = "hub",
        /// At the receiver: every group's line comes home.
        Receiver = "receiver",
    }
);
choice!(
    /// The hub's amplifier.
    AmplifierChoice {
        /// Fitted when the noise budget asks for it.
        Auto = "auto",
        /// Fitted.
        Hub = "hub",
        /// Not fitted.
        None = "none",
    }
);
choice!(
    /// How direct current reaches amplifiers.
    Power {
        /// A pair of the control cable.
        Control = "control",
        /// Along the main line, through bias tees.
        Main = "main",
    }
);
choice!(
    /// What holds a wire up.
    Supports {
        /// Posts.
        Posts = "posts",
        /// Trees.
        Trees = "trees",
    }
);
choice!(
    /// What a feedline or wire may cross.
    CrossingKind {
        /// A road.
        Road = "road",
        /// A footpath.
        Path = "path",
        /// A ditch.
        Ditch = "ditch",
        /// A gate.
        Gate = "gate",
    }
);
