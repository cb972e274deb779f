//! `compare`: options side by side.

use std::path::PathBuf;

use super::failure::{Failure, Outcome};
use super::{CatalogueArgs, Format, ProjectArgs, load, output};
use crate::report;

/// Put options side by side
#[derive(Debug, clap::Args)]
pub(super) struct Compare {
    /// One project with several options, or several projects
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    #[command(flatten)]
    catalogue: CatalogueArgs,
    /// Only this option of each project
    #[arg(long, value_name = "NAME")]
    option: Option<String>,
    /// How to write the result
    #[arg(long, value_enum, default_value_t)]
    format: Format,
}

impl Compare {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = self.gather()?;
        output::problems(&work.problems);
        let heard = work.heard();
        let rows = report::compare::rows(&work.project, &work.results, &heard);
        let sheet = report::compare::sheet(&work.project, &work.results, &heard, &rows);
        let json = report::compare::document_of(&work.hash, &work.project, &work.results, &rows);
        output::result(self.format, &sheet, &json)?;
        Ok(work.outcome())
    }

    /// All options of all files; with several files an option carries its file's name.
    fn gather(&self) -> Result<load::Work, Failure> {
        let mut all: Option<load::Work> = None;
        for file in &self.files {
            let arguments = ProjectArgs {
                file: file.clone(),
                catalogue: self.catalogue.clone(),
                option: self.option.clone(),
            };
            let mut work = load::work(&arguments)?;
            if self.files.len() > 1 {
                let stem = load::stem(file);
                for result in &mut work.results {
                    let option = &mut result.design.option;
                    *option = if option.is_empty() { stem.clone() } else { format!("{stem} {option}") };
                }
            }
            match &mut all {
                None => all = Some(work),
                Some(all) if all.project.currency != work.project.currency => {
                    return Err(Failure::Usage(format!(
                        "{} counts in {} and the first project in {}: totals cannot be compared",
                        file.display(),
                        work.project.currency,
                        all.project.currency
                    )));
                }
                Some(all) => all.join(work),
            }
        }
        all.ok_or_else(|| Failure::Usage("name at least one project file".to_owned()))
    }
}
