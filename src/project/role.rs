//! The roles that items and pieces play, as project files name them.

use super::code;
use super::value::Value;
use crate::problem::nearest;

/// Every role of pieces, then of items.
pub const ROLES: &[&str] = &[
    "antenna-wire",
    "radial",
    "branch",
    "run",
    "delay",
    "main",
    "control",
    "bond-wire",
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

/// The roles whose long pieces may be joined.
pub const JOINT_ROLES: &[&str] = &["main", "control", "antenna-wire"];

/// Reads a role given as a value.
pub(super) fn read(value: &Value<'_>) -> Option<String> {
    let role = value.text()?;
    check(value, role).then(|| role.to_owned())
}

/// Whether `role` is one; if not, writes it down at `value`.
pub(super) fn check(value: &Value<'_>, role: &str) -> bool {
    let known = ROLES.contains(&role);
    if !known {
        let help = match nearest(role, ROLES.iter().copied()) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("roles are: {}", ROLES.join(", ")),
        };
        let message = format!("no item or piece has the role `{}`", role.escape_debug());
        value.desk.error(code::UNKNOWN_ROLE, Some(value.key_at), message, help);
    }
    known
}
