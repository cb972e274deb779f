//! `catalog`: the health of a catalogue.

use std::fmt::Write as _;
use std::path::{Path, PathBuf};

use chrono::NaiveDate;
use clap::Subcommand;

use super::failure::{Failure, Outcome};
use super::{CatalogueArgs, load, output};
use crate::catalogue;

/// Look after the price catalogue
#[derive(Debug, clap::Args)]
pub(super) struct Catalog {
    #[command(subcommand)]
    action: Action,
}

#[derive(Debug, Subcommand)]
enum Action {
    /// Read a folder of catalogue files and say everything that is wrong with them
    Check {
        /// The folder; without it the built-in catalogue is checked
        folder: Option<PathBuf>,
        /// Check the folder alone, not laid over the built-in catalogue
        #[arg(long, requires = "folder")]
        alone: bool,
    },
    /// Say how old the prices are
    Age {
        /// The folder; without it the built-in catalogue
        folder: Option<PathBuf>,
        /// The day to judge against, such as 2026-06-01
        #[arg(long, value_name = "DATE")]
        on: NaiveDate,
    },
    /// Write empty catalogue files with example rows
    Template {
        /// The folder to write to; files that exist are never overwritten
        #[arg(short, long, value_name = "DIR")]
        output: PathBuf,
    },
}

impl Catalog {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        match &self.action {
            Action::Check { folder, alone } => check(folder.as_deref(), *alone),
            Action::Age { folder, on } => age(folder.as_deref(), *on),
            Action::Template { output } => template(output),
        }
    }
}

fn supply(folder: Option<&Path>, alone: bool) -> Result<load::Supply, Failure> {
    let folder = folder.map(Path::to_path_buf);
    let (catalog, catalog_only) = if alone { (None, folder) } else { (folder, None) };
    load::Supply::read(&CatalogueArgs { catalog, catalog_only }, Path::new(""))
}

fn check(folder: Option<&Path>, alone: bool) -> Result<Outcome, Failure> {
    let supply = supply(folder, alone)?;
    let mut problems = supply.problems;
    problems.extend(catalogue::health(&supply.catalogue));
    let problems = problems.in_folder(&supply.folder, &catalogue::FILES);
    output::problems(&problems);
    let of = if supply.read.is_empty() { "the built-in files".to_owned() } else { supply.read.join(", ") };
    let catalogue = &supply.catalogue;
    let verdict = if problems.has_errors() {
        "this catalogue cannot be used yet"
    } else if problems.is_empty() {
        "this catalogue is sound"
    } else {
        "this catalogue can be used; warnings to read"
    };
    let mut text = format!("{verdict}\nread: {of}\n");
    let _ = writeln!(
        text,
        "{} parts, {} offers, {} cables and wires, {} tasks, {} terrain classes",
        catalogue.parts.len(),
        catalogue.offers.len(),
        catalogue.cables.len(),
        catalogue.labour.len(),
        catalogue.terrain.len()
    );
    for repair in supply.repairs.lines() {
        let _ = writeln!(text, "{repair}");
    }
    output::text(&text)?;
    if problems.has_errors() { Err(Failure::Said) } else { Ok(Outcome::Done) }
}

fn age(folder: Option<&Path>, on: NaiveDate) -> Result<Outcome, Failure> {
    let supply = supply(folder, false)?;
    let priced =
        supply.catalogue.offers.values().filter_map(|offer| offer.priced_on.map(|date| (date, offer)));
    let mut dated: Vec<_> = priced.map(|(date, offer)| ((on - date).num_days(), &offer.id)).collect();
    dated.sort_by(|a, b| b.cmp(a));
    let undated = supply.catalogue.offers.values().filter(|offer| offer.priced_on.is_none()).count();
    let mut text = match (dated.first(), dated.last()) {
        (Some(oldest), Some(newest)) => format!(
            "{} prices, {} to {} days old on {on}; {undated} without a date\n",
            dated.len(),
            newest.0,
            oldest.0
        ),
        _ => format!("no price has a date ({undated} offers)\n"),
    };
    for (days, offer) in dated.iter().filter(|(days, _)| *days > 180) {
        let _ = writeln!(text, "{days:>6} days  {offer}");
    }
    output::text(&text)?;
    Ok(Outcome::Done)
}

fn template(folder: &Path) -> Result<Outcome, Failure> {
    let files = catalogue::template();
    std::fs::create_dir_all(folder).map_err(|error| Failure::file(folder, "make the folder", &error))?;
    for (name, _) in &files {
        let path = folder.join(name);
        if path.exists() {
            return Err(Failure::Usage(format!("{} exists already; choose another folder", path.display())));
        }
    }
    for (name, text) in &files {
        output::write_whole(&folder.join(name), text)?;
    }
    output::complaint(&format!(
        "wrote {} files to {}; fill them in, then run `arraywright catalog check {}`",
        files.len(),
        folder.display(),
        folder.display()
    ));
    Ok(Outcome::Done)
}
