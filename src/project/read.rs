//! The whole file, section by section.

use toml::de::DeTable;

use super::code;
use super::desk::Desk;
use super::model::Project;
use super::table::Table;
use super::{allowance, array, assumption, labour, on_hand, prices, site};
use crate::problem::Problems;

/// Reads a project file, and the table of stock on hand if there is one beside it (its name and text).
///
/// Every mistake is reported in one pass. There is a project exactly when none of the problems is an error.
pub fn read(file_name: &str, text: &str, on_hand_csv: Option<(&str, &str)>) -> (Option<Project>, Problems) {
    let shown = text.strip_prefix('\u{feff}').unwrap_or(text);
    let (document, syntax) = DeTable::parse_recoverable(shown);
    let desk = Desk::new(file_name, shown, &syntax);
    let project = sections(&Table::root(&desk, document.get_ref()), on_hand_csv);
    let project = project.filter(|_| !desk.has_errors());
    let (problems, assumptions) = desk.clear();
    (project.map(|project| Project { assumptions, ..project }), problems)
}

fn sections(file: &Table<'_>, on_hand_csv: Option<(&str, &str)>) -> Option<Project> {
    let header = site::header(&file.section("project"));
    let currency = header.currency.as_ref();
    let bands = header.bands();
    let site = site::site(&file.section("site"));
    let arrays = file.list("array");
    array::check_names(&arrays);
    if arrays.is_empty() && !file.has("array") && !file.desk.mentions("[[array") {
        let help = "add an [[array]] with name, heading and element";
        file.desk.error(code::NO_ARRAY, None, "the project has no array", help);
    }
    let arrays: Option<Vec<_>> =
        arrays.into_iter().map(|table| array::read(table, bands)).collect::<Vec<_>>().into_iter().collect();
    let practice = allowance::read(&file.section("practice"), currency);
    let prices = prices::read(&file.section("prices"), currency);
    let labour = labour::read(&file.section("labour"), currency);
    let mut on_hand: Vec<_> = file.list("on-hand").iter().filter_map(on_hand::read).collect();
    if let Some((name, text)) = on_hand_csv {
        let (stock, problems) = on_hand::read_csv(name, text);
        on_hand.extend(stock);
        file.desk.extend(problems);
    }
    let keep_out = file.list("keep-out").iter().filter_map(site::keep_out).collect();
    let crossings = file.list("crossing").iter().filter_map(site::crossing).collect();
    let existing = file.list("existing").iter().filter_map(site::existing).collect();
    selectors(file);
    file.finish_with(&MISPLACED);
    let arrays = arrays?;
    file.desk.forget(|key| assumption::does_not_matter(key, &arrays));
    Some(Project {
        title: header.title,
        currency: header.currency?,
        estimated: header.estimated?,
        frequency: header.frequency?,
        also: header.also,
        receiver_noise: header.receiver_noise,
        site: site?,
        arrays,
        keep_out,
        crossings,
        existing,
        practice,
        prices,
        labour,
        on_hand,
        assumptions: Vec::new(),
    })
}

/// Sections that are easily written one level too high.
const MISPLACED: [(&str, &str); 5] = [
    ("feed", "[array.feed]"),
    ("element", "[array.element]"),
    ("labor", "labour"),
    ("receiver", "[site] receiver"),
    ("frequency", "[project] frequency"),
];

/// Selectors are planned: their keys are known, and nothing is built from them.
fn selectors(file: &Table<'_>) {
    for table in file.list("selector") {
        for key in ["name", "lines", "at", "main", "control"] {
            table.take(key);
        }
        table.finish();
        let help = "built: arrays with a main line each; leave the selector out";
        file.desk.error(
            code::NOT_IN_THIS_VERSION,
            table.at(),
            "selectors are not built by this version",
            help,
        );
    }
}
