//! `parts`: what is needed.

use super::failure::{Failure, Outcome};
use super::{Format, ProjectArgs, load, output};
use crate::report;

/// List what is needed, with reasons
#[derive(Debug, clap::Args)]
pub(super) struct Parts {
    #[command(flatten)]
    project: ProjectArgs,
    /// How to write the result
    #[arg(long, value_enum, default_value_t)]
    format: Format,
}

impl Parts {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = load::work(&self.project)?;
        output::problems(&work.problems);
        let sheet = report::parts::sheet(&work.results);
        let json = report::machine::parts(&work.hash, &work.project, &work.results);
        output::result(self.format, &sheet, &json)?;
        Ok(Outcome::Done)
    }
}
