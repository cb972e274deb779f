//! Legal files, and what they mean.

use arraywright::project::{self, EndfireStage};
use arraywright::units::{Length, Money};
use rust_decimal::Decimal;

use crate::support::{codes, one_wire, project, text_of};

#[test]
fn the_worked_vectors_of_this_version_read() {
    for name in ["V01", "V02", "V03", "V04", "V05", "V06", "V07", "V08"] {
        let project = project(&text_of(&format!("vectors/{name}.toml")));
        assert_eq!(project.title, name);
        assert_eq!(project.practice.route_factor, Some(Decimal::new(105, 2)), "{name}");
        assert_eq!(project.arrays.len(), 1, "{name}");
    }
}

#[test]
fn the_other_worked_vectors_are_only_not_built_yet() {
    for name in ["V09", "V10", "V11", "V12", "V13"] {
        let codes = codes(&text_of(&format!("vectors/{name}.toml")));
        assert_eq!(codes, ["not-in-this-version"], "{name}");
    }
}
