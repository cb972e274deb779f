//! `why`: where a number came from.

use super::failure::{Failure, Outcome};
use super::{ProjectArgs, load, output};
use crate::problem::nearest;
use crate::report;

/// Say how a quantity, length or price came about
#[derive(Debug, clap::Args)]
pub(super) struct Why {
    #[command(flatten)]
    project: ProjectArgs,
    /// A piece (D1), a role (ground-rod), or a part
    label: String,
}

impl Why {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let work = load::work(&self.project)?;
        match report::why::explain(&work.results, &self.label) {
            Some(sheet) => {
                output::text(&sheet.to_text())?;
                Ok(Outcome::Done)
            }
            None => Err(Failure::Usage(self.unknown(&report::why::known(&work.results)))),
        }
    }

    fn unknown(&self, known: &[String]) -> String {
        let near = nearest(&self.label, known.iter().map(String::as_str));
        let hint = match near {
            Some(near) => format!("did you mean `{near}`?"),
            None => "`parts` lists every label".to_owned(),
        };
        format!("nothing here is called `{}`; {hint}", self.label)
    }
}
