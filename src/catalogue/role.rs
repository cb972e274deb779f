//! The roles that a catalogue part can play.

/// The roles of parts that are cut to length.
pub const CUT_ROLES: &[&str] = &["cable", "wire", "radial-wire", "control-cable"];

/// The roles of pieces, each served by one of [`CUT_ROLES`].
pub const PIECE_ROLES: &[&str] =
    &["antenna-wire", "radial", "branch", "run", "delay", "main", "control", "bond-wire"];

/// The roles of things that are counted.
pub const ITEM_ROLES: &[&str] = &[
    "feed-box",
    "termination-box",
    "reflection-box",
    "ground-rod",
    "rod-clamp",
    "surge-rod",
    "end-support",
    "mid-support",
    "tree-support",
    "backstay",
    "end-insulator",
    "mid-insulator",
    "spreader",
    "mast",
    "base-mount",
    "guy",
    "guy-anchor",
    "tensioner",
    "loading-coil",
    "top-wire",
    "hub-box",
    "hybrid-2way",
    "hybrid-3way",
    "inverter",
    "pad",
    "amplifier",
    "bias-tee",
    "power-supply",
    "fuse",
    "choke",
    "relay-spdt",
    "relay-dpdt",
    "idle-terminator",
    "decoder",
    "control-box",
    "enclosure",
    "gland",
    "plug",
    "barrel",
    "adaptor",
    "surge-device",
    "coax-arrester",
    "control-arrester",
    "conduit",
    "marker",
    "consumable",
    "tool",
    "test-gear",
    "permit",
];

/// Every role of `parts.csv`: those that serve pieces, then the item roles.
pub fn part_roles() -> impl Iterator<Item = &'static str> {
    CUT_ROLES.iter().chain(ITEM_ROLES).copied()
}

/// The role whose parts serve a piece of this role; an item role serves itself.
///
/// ```
/// assert_eq!(arraywright::catalogue::serving("delay"), "cable");
/// assert_eq!(arraywright::catalogue::serving("bond-wire"), "radial-wire");
/// assert_eq!(arraywright::catalogue::serving("plug"), "plug");
/// ```
pub fn serving(role: &str) -> &str {
    match role {
        "branch" | "run" | "delay" | "main" => "cable",
        "antenna-wire" => "wire",
        "radial" | "bond-wire" => "radial-wire",
        "control" => "control-cable",
        item => item,
    }
}

/// Whether a missing default matters: tools, test gear, permits and consumables are chosen by their kind.
pub(super) fn wants_default(role: &str) -> bool {
    !matches!(role, "tool" | "test-gear" | "permit" | "consumable")
}
