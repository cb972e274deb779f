//! `estimate`: what it costs.

use super::failure::{Failure, Outcome};
use super::{Format, ProjectArgs, load, output};
use crate::report;

/// Price what is needed
#[derive(Debug, clap::Args)]
pub(super) struct Estimate {
    #[command(flatten)]
    project: ProjectArgs,
    /// How to write the result
    #[arg(long, value_enum, default_value_t)]
    format: Format,
}

impl Estimate {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = load::work(&self.project)?;
        output::problems(&work.problems);
        let sheet = report::estimate::sheet(&work.project, &work.results, work.notes());
        let json = report::estimate::document_of(&work.hash, &work.project, &work.results);
        output::result(self.format, &sheet, &json)?;
        Ok(work.outcome())
    }
}
