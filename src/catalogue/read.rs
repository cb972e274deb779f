//! The five files together: which is which, duplicates, the order of reading.

use std::collections::{BTreeMap, BTreeSet};

use crate::problem::{Place, Problems, nearest};

use super::model::{Catalogue, Source};
use super::offer::Units;
use super::part::Counted;
use super::report::{Fixes, Report};
use super::row::RowReader;
use super::table::{self, Schema, Table};
use super::{cable, code, decode, labour, offer, part};

/// One catalogue file as it came from the disk.
#[derive(Clone, Debug)]
pub struct CatalogueFile {
    /// Its name, with or without a path; the last part says which of the five it is.
    pub name: String,
    /// Its bytes.
    pub bytes: Vec<u8>,
}

/// The names of the files of a catalogue.
pub const FILES: [&str; 5] = ["parts.csv", "offers.csv", "cables.csv", "labour.csv", "terrain.csv"];

/// What was read, with what later checks need to point at.
pub(super) struct Draft {
    pub(super) catalogue: Catalogue,
    pub(super) report: Report,
    /// The prerequisites of tasks, each with its task and place.
    pub(super) prerequisites: Vec<(String, String, Place)>,
    /// Parts whose rows could not be read, which has been reported.
    pub(super) lost: Lost,
}

/// Parts that stand in a file but could not be read.
#[derive(Debug, PartialEq, Eq)]
pub(super) enum Lost {
    /// These ids.
    Ids(BTreeSet<String>),
    /// Nobody knows which.
    Unknown,
}

impl Lost {
    /// Whether a part that is not in the catalogue may be one of them.
    pub(super) fn may_hold(&self, id: &str) -> bool {
        match self {
            Self::Ids(ids) => ids.contains(id),
            Self::Unknown => true,
        }
    }
}

/// Reads the files of a catalogue, each by itself.
///
/// Every mistake is reported; when there are errors, the catalogue is good for finding further mistakes only.
/// What one file says about another is checked by [`super::load()`].
pub fn read(files: &[CatalogueFile], source: Source) -> (Catalogue, Problems, Fixes) {
    let draft = draft(files, source, &Catalogue::default());
    let (problems, fixes) = draft.report.finish();
    (draft.catalogue, problems, fixes)
}

/// Reads files; `base` says in what unit parts are counted that these files do not define.
pub(super) fn draft(files: &[CatalogueFile], source: Source, base: &Catalogue) -> Draft {
    let mut draft = Draft {
        catalogue: Catalogue::default(),
        report: Report::default(),
        prerequisites: Vec::new(),
        lost: Lost::Ids(BTreeSet::new()),
    };
    let known = |part: &super::Part| (part.id.clone(), (part.unit, Counted::InItsUnit));
    let mut units: Units = base.parts.values().map(known).collect();
    for file in files {
        known_file(file, &mut draft.report);
    }
    each(files, &part::SCHEMA, &mut draft, |table, draft| parts(table, source, &mut units, draft));
    each(files, &offer::SCHEMA, &mut draft, |table, draft| offers(table, source, &units, draft));
    each(files, &cable::SCHEMA, &mut draft, cables);
    each(files, &labour::TASKS, &mut draft, tasks);
    each(files, &labour::TERRAIN, &mut draft, terrain);
    draft
}

pub(super) fn base_name(name: &str) -> String {
    name.rsplit(['/', '\\']).next().unwrap_or(name).to_lowercase()
}

fn known_file(file: &CatalogueFile, report: &mut Report) {
    let name = base_name(&file.name);
    if FILES.contains(&name.as_str()) {
        return;
    }
    let place = Place { file: file.name.clone(), line: 1, column: 1, excerpt: String::new() };
    let help = match nearest(&name, FILES) {
        Some(near) => format!("is {near} meant?"),
        None => format!("a catalogue has {}", FILES.join(", ")),
    };
    report.warning(code::UNKNOWN_FILE, place, format!("{name} is not read"), help);
}

/// Takes every file of this name apart and hands it on.
fn each(
    files: &[CatalogueFile],
    schema: &Schema,
    draft: &mut Draft,
    mut rows: impl FnMut(&Table, &mut Draft),
) {
    for file in files.iter().filter(|file| base_name(&file.name) == schema.file) {
        let text = decode::decode(&file.name, &file.bytes, &mut draft.report);
        let table = text.and_then(|text| table::read(&file.name, &text, schema, &mut draft.report));
        match table {
            Some(table) => rows(&table, draft),
            None if schema.file == part::SCHEMA.file => draft.lost = Lost::Unknown,
            None => {}
        }
    }
}

/// Whether an id is new; reports both lines otherwise.
fn is_new(id: &str, column: &str, seen: &mut BTreeMap<String, Place>, row: &mut RowReader<'_>) -> bool {
    let place = row.place(column);
    if let Some(first) = seen.get(&id.to_lowercase()) {
        let file = if first.file == place.file { String::new() } else { format!(" of {}", first.file) };
        let message = format!("\"{id}\" stands in line {}{file} and in line {}", first.line, place.line);
        row.report.error(code::DUPLICATE_ID, place, message, format!("each `{column}` has one row"));
        return false;
    }
    seen.insert(id.to_lowercase(), place);
    true
}

fn parts(table: &Table, source: Source, units: &mut Units, draft: &mut Draft) {
    match (&mut draft.lost, table.column("part")) {
        (Lost::Ids(ids), Some(column)) if !table.swallowed => {
            let cells = table.lost.iter().filter_map(|row| row.cells.get(column));
            ids.extend(cells.map(|cell| cell.text.trim().to_lowercase()));
        }
        (Lost::Ids(_) | Lost::Unknown, _) => draft.lost = Lost::Unknown,
    }
    let mut seen = draft.catalogue.parts.values().map(|part| (part.id.clone(), part.place.clone())).collect();
    for row in &table.rows {
        let mut row = RowReader { table, row, report: &mut draft.report };
        let Some((part, counted)) = part::read(&mut row, source) else { continue };
        if is_new(&part.id, "part", &mut seen, &mut row) {
            units.insert(part.id.clone(), (part.unit, counted));
            draft.catalogue.parts.insert(part.id.clone(), part);
        }
    }
}

fn offers(table: &Table, source: Source, units: &Units, draft: &mut Draft) {
    let mut seen =
        draft.catalogue.offers.values().map(|offer| (offer.id.clone(), offer.place.clone())).collect();
    let codes = offer::codes_used(table);
    for row in &table.rows {
        let mut row = RowReader { table, row, report: &mut draft.report };
        let Some(offer) = offer::read(&mut row, source, units, &codes) else { continue };
        if is_new(&offer.id, "offer", &mut seen, &mut row) {
            draft.catalogue.offers.insert(offer.id.clone(), offer);
        }
    }
}

fn cables(table: &Table, draft: &mut Draft) {
    let mut seen =
        draft.catalogue.cables.values().map(|cable| (cable.part.clone(), cable.place.clone())).collect();
    for row in &table.rows {
        let mut row = RowReader { table, row, report: &mut draft.report };
        let Some(cable) = cable::read(&mut row) else { continue };
        if is_new(&cable.part, "part", &mut seen, &mut row) {
            draft.catalogue.cables.insert(cable.part.clone(), cable);
        }
    }
}

fn tasks(table: &Table, draft: &mut Draft) {
    let mut seen = BTreeMap::new();
    for row in &table.rows {
        let mut row = RowReader { table, row, report: &mut draft.report };
        let Some(task) = labour::task(&mut row) else { continue };
        if is_new(&task.id, "task", &mut seen, &mut row) {
            let place = row.place("after");
            for id in labour::prerequisites(&task.after) {
                draft.prerequisites.push((task.id.clone(), id.to_owned(), place.clone()));
            }
            draft.catalogue.labour.insert(task.id.clone(), task);
        }
    }
}

fn terrain(table: &Table, draft: &mut Draft) {
    let mut seen = BTreeMap::new();
    for row in &table.rows {
        let mut row = RowReader { table, row, report: &mut draft.report };
        let Some(terrain) = labour::terrain(&mut row) else { continue };
        if is_new(&terrain.class, "class", &mut seen, &mut row) {
            draft.catalogue.terrain.insert(terrain.class.clone(), terrain);
        }
    }
}
