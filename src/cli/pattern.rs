//! `pattern`: what the arrays hear.

use std::path::PathBuf;

use super::failure::{Failure, Outcome};
use super::{Format, ProjectArgs, load, output};
use crate::design::Design;
use crate::reception::Weighting;
use crate::report::pattern::{self, View};

/// Say what the arrays hear: directivity, lobes, beam, and what errors do to them
#[derive(Debug, clap::Args)]
pub(super) struct Pattern {
    #[command(flatten)]
    project: ProjectArgs,
    /// Weights exactly as designed and matched terminations, instead of what the parts on the list give
    #[arg(long)]
    ideal: bool,
    /// How to write the result
    #[arg(long, value_enum, default_value_t)]
    format: Format,
    /// Also write a page to print, with plots
    #[arg(long, value_name = "OUT.html")]
    page: Option<PathBuf>,
}

impl Pattern {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = load::work_to_hear(&self.project)?;
        output::problems(&work.problems);
        let weighting = if self.ideal { Weighting::Ideal } else { Weighting::Built };
        let designs: Vec<&Design> = work.results.iter().map(|result| &result.design).collect();
        let options = pattern::reports(&work.project, &designs, weighting);
        let delays = pattern::delays(&work.project, &designs);
        let view =
            View { project: &work.project, hash: &work.hash, weighting, options: &options, delays: &delays };
        if let Some(path) = &self.page {
            let page = pattern::page(&view)
                .map_err(|error| Failure::File(format!("cannot make the page: {error}")))?;
            output::write_whole(path, &page)?;
        }
        let json = pattern::document_of(&work.hash, &work.project, &options);
        output::result(self.format, &pattern::sheet(&view), &json)?;
        Ok(Outcome::Done)
    }
}
