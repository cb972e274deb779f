//! What the arrays of an option hear: the page and the tables of the `pattern` command, as a sheet of the set.

use serde::Serialize;
use tera::Context;

use super::sheet::Head;
use super::{Input, OptionInput, TemplateError};
use crate::reception::{ArrayReport, Weighting};
use crate::report::pattern;

#[derive(Debug, Serialize)]
struct View {
    body: String,
}

/// The page for the HTML template, the tables for the Markdown one.
pub(super) fn context(
    input: &Input<'_>,
    option: &OptionInput<'_>,
    reports: &[ArrayReport],
    head: &Head,
) -> Result<Context, TemplateError> {
    let options = [(option.design.option.clone(), reports.to_vec())];
    let delays = pattern::delays(input.project, &[option.design]);
    let view = pattern::View {
        project: input.project,
        hash: input.hash,
        weighting: Weighting::Built,
        options: &options,
        delays: &delays,
    };
    let mut context = super::context(head, &View { body: pattern::sheet(&view).to_markdown() })?;
    context.insert("page", &pattern::contents(&view));
    Ok(context)
}
