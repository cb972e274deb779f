//! `workorder`: the set of documents that the crew gets.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

use super::failure::{Failure, Outcome};
use super::{ProjectArgs, load, output};
use crate::report::document;

/// Write the set of documents that the crew gets
#[derive(Debug, clap::Args)]
pub(super) struct WorkOrder {
    #[command(flatten)]
    project: ProjectArgs,
    /// The folder to write to; it is made if it is not there
    #[arg(short, long, value_name = "DIR")]
    output: PathBuf,
    /// A folder of templates that take the place of ours by name
    #[arg(long, value_name = "DIR")]
    templates: Option<PathBuf>,
}

impl WorkOrder {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = load::work(&self.project)?;
        output::problems(&work.problems);
        let overrides = self.templates.as_deref().map(read_templates).transpose()?.unwrap_or_default();
        let options: Vec<document::OptionInput<'_>> = work
            .results
            .iter()
            .map(|result| document::OptionInput {
                design: &result.design,
                takeoff: &result.takeoff,
                bill: &result.bill,
            })
            .collect();
        let input = document::Input {
            project: &work.project,
            catalogue: &work.catalogue,
            options: &options,
            hash: &work.hash,
            version: env!("CARGO_PKG_VERSION"),
        };
        let files = document::render(&input, &overrides)
            .map_err(|error| Failure::Usage(format!("a template does not work: {error}")))?;
        for (name, text) in &files {
            let path = self.output.join(name);
            if let Some(folder) = path.parent() {
                fs::create_dir_all(folder)
                    .map_err(|error| Failure::file(folder, "make the folder", &error))?;
            }
            output::write_whole(&path, text)?;
        }
        let first = self.output.join("index.html");
        output::text(&format!(
            "{} files in {}; begin with {}\n",
            files.len(),
            self.output.display(),
            first.display()
        ))?;
        Ok(work.outcome())
    }
}

/// Every file of a template folder by name.
fn read_templates(folder: &Path) -> Result<BTreeMap<String, String>, Failure> {
    let entries = fs::read_dir(folder).map_err(|error| Failure::file(folder, "read", &error))?;
    let mut templates = BTreeMap::new();
    for entry in entries {
        let path = entry.map_err(|error| Failure::file(folder, "read", &error))?.path();
        if path.is_file()
            && let Some(name) = path.file_name().and_then(|name| name.to_str())
        {
            let text = fs::read_to_string(&path).map_err(|error| Failure::file(&path, "read", &error))?;
            templates.insert(name.to_owned(), text);
        }
    }
    Ok(templates)
}
