//! Reads the table of check values and compares.

use std::collections::{BTreeMap, BTreeSet};
use std::fmt::Write as _;

use arraywright::units::Frequency;
use serde::Deserialize;
use toml::Value;

const TABLE: &str = include_str!("../reference/physics-values.toml");

/// One quantity given to a formula.
#[derive(Debug, Deserialize)]
struct Quantity {
    name: String,
    value: Value,
}

/// One quantity that must come out.
#[derive(Debug, Deserialize)]
struct Row {
    name: String,
    value: Option<Value>,
    unit: String,
    tol_rel: Option<f64>,
    tol_abs: Option<f64>,
    exact: Option<bool>,
    min: Option<f64>,
    max: Option<f64>,
}

/// One entry.
#[derive(Debug, Deserialize)]
pub(crate) struct Check {
    pub(crate) id: String,
    topic: String,
    inputs: Vec<Quantity>,
    expected: Vec<Row>,
}

#[derive(Debug, Deserialize)]
struct Table {
    check: Vec<Check>,
}

/// What a topic says to one expected row.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Answer {
    /// Computed by a formula, in the row's unit.
    Computed(f64),
    /// Read from a table that the program carries: the comparison proves the copy and not a formula.
    Tabulated(f64),
    /// Outside the program's job, with the reason.
    Outside(&'static str),
}

/// Answers by the name of the expected row.
pub(crate) type Answers = BTreeMap<String, Answer>;

/// Answers that are all computed.
pub(crate) fn computed<const N: usize>(rows: [(&str, f64); N]) -> Answers {
    rows.into_iter().map(|(name, value)| (name.to_owned(), Answer::Computed(value))).collect()
}

/// Answers of any kind.
pub(crate) fn answers<const N: usize>(rows: [(&str, Answer); N]) -> Answers {
    rows.into_iter().map(|(name, answer)| (name.to_owned(), answer)).collect()
}

fn as_number(value: &Value) -> Option<f64> {
    #[expect(clippy::cast_precision_loss, reason = "the table's integers are small")]
    value.as_float().or_else(|| value.as_integer().map(|whole| whole as f64))
}

impl Check {
    fn input(&self, name: &str) -> &Value {
        let found = self.inputs.iter().find(|quantity| quantity.name == name);
        &found.unwrap_or_else(|| panic!("{}: no input `{name}`", self.id)).value
    }

    pub(crate) fn has(&self, name: &str) -> bool {
        self.inputs.iter().any(|quantity| quantity.name == name)
    }

    pub(crate) fn number(&self, name: &str) -> f64 {
        as_number(self.input(name)).unwrap_or_else(|| panic!("{}: `{name}` is no number", self.id))
    }

    #[expect(clippy::cast_possible_truncation, reason = "the table's counts are small")]
    pub(crate) fn whole(&self, name: &str) -> i32 {
        let number = self.number(name);
        assert!((number - number.round()).abs() < 1e-9, "{}: `{name}` is no whole number", self.id);
        number.round() as i32
    }

    pub(crate) fn count(&self, name: &str) -> u32 {
        u32::try_from(self.whole(name)).unwrap_or_else(|_| panic!("{}: `{name}` is negative", self.id))
    }

    pub(crate) fn list(&self, name: &str) -> Vec<f64> {
        let value = self.input(name);
        match value.as_array() {
            Some(list) => list.iter().filter_map(as_number).collect(),
            None => as_number(value).into_iter().collect(),
        }
    }

    pub(crate) fn text(&self, name: &str) -> &str {
        self.input(name).as_str().unwrap_or_else(|| panic!("{}: `{name}` is no text", self.id))
    }

    /// The input `frequency`, given in hertz.
    pub(crate) fn frequency(&self) -> Frequency {
        Frequency::from_mhz(self.number("frequency") / 1e6)
    }

    /// The input `frequency`, given in megahertz.
    pub(crate) fn frequency_mhz(&self) -> Frequency {
        Frequency::from_mhz(self.number("frequency"))
    }
}

impl Row {
    /// What is wrong with `got`, if anything; every row must have some way to be judged.
    fn fault(&self, got: f64) -> Option<String> {
        if !got.is_finite() && self.value.is_some() {
            return Some(format!("{got}"));
        }
        let wanted = self.value.as_ref().and_then(as_number);
        let (good, rule) = match (wanted, self.tol_rel, self.tol_abs, self.exact) {
            (Some(v), Some(tolerance), None, None) => {
                ((got - v).abs() <= tolerance * v.abs(), format!("{v} ± {tolerance} of it"))
            }
            (Some(v), None, Some(tolerance), None) => {
                ((got - v).abs() <= tolerance, format!("{v} ± {tolerance}"))
            }
            (Some(v), None, None, Some(true)) => ((got - v).abs() < 1e-12, format!("{v} exactly")),
            (None, None, None, None) if self.min.is_some() || self.max.is_some() => {
                let above = self.min.is_none_or(|min| got >= min);
                let below = self.max.is_none_or(|max| got <= max);
                (above && below, format!("between {:?} and {:?}", self.min, self.max))
            }
            _ => (false, "a row that cannot be judged".to_owned()),
        };
        (!good).then(|| format!("{got} {} instead of {rule}", self.unit))
    }
}

/// The whole table.
pub(crate) fn table() -> Vec<Check> {
    toml::from_str::<Table>(TABLE).expect("the table of check values can be read").check
}

/// The entry of an id.
pub(crate) fn entry(id: &str) -> Check {
    table().into_iter().find(|check| check.id == id).unwrap_or_else(|| panic!("no entry {id}"))
}

/// How many rows of a topic were dealt with in which way.
#[derive(Default)]
struct Tally {
    entries: usize,
    computed: usize,
    tabulated: usize,
    outside: usize,
}

/// Walks the entries of a topic. `outside` lists whole entries that are none of the program's business, with reasons.
pub(crate) fn walk(topic: &str, outside: &[(&str, &str)], answer: fn(&Check) -> Option<Answers>) {
    let mut tally = Tally::default();
    let mut faults = String::new();
    let mut unused: BTreeSet<&str> = outside.iter().map(|(id, _)| *id).collect();
    assert_eq!(unused.len(), outside.len(), "an entry is listed twice");
    for check in table().iter().filter(|check| check.topic == topic) {
        tally.entries += 1;
        let listed = outside.iter().find(|(id, _)| *id == check.id);
        match (listed, answer(check)) {
            (Some((id, _)), None) => {
                unused.remove(id);
                tally.outside += check.expected.len();
            }
            (Some((id, _)), Some(_)) => writeln!(faults, "{id}: computed and listed outside").expect("text"),
            (None, None) => writeln!(faults, "{}: an entry that no formula knows", check.id).expect("text"),
            (None, Some(given)) => compare(check, &given, &mut tally, &mut faults),
        }
    }
    assert!(unused.is_empty(), "listed as outside but not in the table: {unused:?}");
    assert!(faults.is_empty(), "{topic}:\n{faults}");
    assert!(tally.computed > 0, "no entries of topic {topic}");
    report(topic, &tally);
}

fn compare(check: &Check, given: &Answers, tally: &mut Tally, faults: &mut String) {
    for row in &check.expected {
        let fault = match given.get(&row.name) {
            None => Some("a row that no formula knows".to_owned()),
            Some(Answer::Outside(reason)) => {
                assert!(!reason.is_empty());
                tally.outside += 1;
                None
            }
            Some(Answer::Tabulated(value)) => {
                tally.tabulated += 1;
                row.fault(*value)
            }
            Some(Answer::Computed(value)) => {
                tally.computed += 1;
                row.fault(*value)
            }
        };
        if let Some(fault) = fault {
            writeln!(faults, "{} {}: {fault}", check.id, row.name).expect("text");
        }
    }
}

#[expect(clippy::print_stdout, reason = "the count belongs in the test's output")]
fn report(topic: &str, tally: &Tally) {
    println!(
        "{topic}: {} entries, {} values computed, {} looked up, {} outside",
        tally.entries, tally.computed, tally.tabulated, tally.outside
    );
}

#[test]
fn every_topic_of_the_table_has_its_test() {
    let known =
        ["coax", "control cable", "earthing", "matching", "noise", "sag", "skin", "wire"].map(str::to_owned);
    let present: BTreeSet<String> = table().into_iter().map(|check| check.topic).collect();
    assert_eq!(present, BTreeSet::from(known));
}

#[test]
fn a_value_beyond_its_tolerance_is_a_fault() {
    let row = |rule: &str| -> Row {
        toml::from_str(&format!("name = \"x\"\nunit = \"1\"\n{rule}")).expect("a row")
    };
    assert!(row("value = 10.0\ntol_rel = 0.01").fault(10.09).is_none());
    assert!(row("value = 10.0\ntol_rel = 0.01").fault(10.11).is_some());
    assert!(row("value = 10.0\ntol_abs = 0.01").fault(9.98).is_some());
    assert!(row("value = 3\nexact = true").fault(4.0).is_some());
    assert!(row("max = 5.0").fault(5.1).is_some());
    assert!(row("min = 5.0").fault(f64::INFINITY).is_none());
    assert!(row("value = 10.0").fault(10.0).is_some(), "a row without a tolerance cannot be judged");
    assert!(row("value = 10.0\ntol_abs = 1.0").fault(f64::NAN).is_some());
}
