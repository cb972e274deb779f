//! The roles that items and pieces play, as project files name them.

use super::code;
use super::value::Value;
use crate::catalogue::{ITEM_ROLES, PIECE_ROLES};
use crate::problem::nearest;

/// Every role of pieces, then of items.
pub fn roles() -> impl Iterator<Item = &'static str> {
    PIECE_ROLES.iter().chain(ITEM_ROLES).copied()
}

/// The roles whose long pieces may be joined.
pub const JOINT_ROLES: &[&str] = &["main", "control", "antenna-wire"];

/// Reads a role given as a value.
pub(super) fn read(value: &Value<'_>) -> Option<String> {
    let role = value.text()?;
    check(value, role).then(|| role.to_owned())
}

/// Whether `role` is one; if not, writes it down at `value`.
pub(super) fn check(value: &Value<'_>, role: &str) -> bool {
    let known = roles().any(|own| own == role);
    if !known {
        let help = match nearest(role, roles()) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("roles are: {}", roles().collect::<Vec<_>>().join(", ")),
        };
        let message = format!("no item or piece has the role `{}`", role.escape_debug());
        value.desk.error(code::UNKNOWN_ROLE, Some(value.key_at), message, help);
    }
    known
}
