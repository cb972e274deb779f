//! Codes of problems found while settling a design.

crate::problem_codes! {
    /// The catalogue lacks the site's terrain class.
    NO_TERRAIN_ROW = "no-terrain-row";
    /// The array listens backwards.
    LISTENS_BACKWARDS = "listens-backwards";
    /// The array hardly hears forward.
    HEARS_NOTHING = "hears-nothing";
    /// Forward over rear is under 1.5.
    WEAK_FRONT = "weak-front";
    /// A wire hangs low over a path, gate or road.
    LOW_CROSSING = "low-crossing";
    /// Points stand inside a keep-out area.
    IN_KEEP_OUT = "in-keep-out";
    /// Given radials would touch those of the next element.
    RADIALS_TOUCH = "radials-touch";
    /// An earth set above 150 ohm.
    POOR_EARTH = "poor-earth";
    /// A number of legs that no equal tree of 2- and 3-way hybrids has.
    ROW_NOT_BUILDABLE = "row-not-buildable";
    /// A hub stands closer to an antenna earth than its surge rod may.
    HUB_NEAR_EARTH = "hub-near-earth";
    /// A given termination reflects much.
    TERMINATION_MISMATCH = "termination-mismatch";
    /// A key that is read, but that nothing uses in this version.
    NOT_USED_YET = "not-used-yet";
    /// The trim allowance is smaller than the cable's own spread.
    TRIM_TIGHT = "trim-tight";
}
