//! Work orders: every sheet as HTML for the printer and as Markdown, from views that hold nothing but printed text.
//!
//! Each sheet is one file here that computes a view (strings already rounded) and one pair of templates that loops over
//! it and prints. Options never share a sheet: a named option has a folder of its own.

mod build_sheet;
mod cuts;
mod engine;
mod escape;
mod estimate;
mod index;
mod labels;
mod pattern;
mod plan;
mod proof;
mod purchase;
mod safety;
mod sheet;
mod show;
mod stakes;

use std::collections::BTreeMap;

use tera::Context;

pub use engine::{TemplateError, template_names};
pub use sheet::Sheet;

use crate::catalogue::Catalogue;
use crate::design::Design;
use crate::pricing::Bill;
use crate::project::Project;
use crate::reception::{ArrayReport, Weighting};
use crate::takeoff::Takeoff;
use engine::Engine;
use sheet::Head;

/// Everything that the sheets are made from.
#[derive(Clone, Copy, Debug)]
pub struct Input<'a> {
    /// The project.
    pub project: &'a Project,
    /// The catalogue that the takeoff was made with.
    pub catalogue: &'a Catalogue,
    /// The options in project order.
    pub options: &'a [OptionInput<'a>],
    /// Short hash of all inputs, printed on every sheet.
    pub hash: &'a str,
    /// The program's version.
    pub version: &'a str,
}

/// One option, settled, taken off and priced.
#[derive(Clone, Copy, Debug)]
pub struct OptionInput<'a> {
    /// The settled design; its option name is empty when the file has none.
    pub design: &'a Design,
    /// What it needs.
    pub takeoff: &'a Takeoff,
    /// What it costs.
    pub bill: &'a Bill,
}

/// Renders every sheet of every option: file name, with a folder for a named option, and text.
///
/// `overrides` replaces any of our templates by file name, see [`template_names`].
///
/// # Errors
/// When an override has an unknown name, does not compile, or asks for a value that does not exist.
pub fn render(
    input: &Input<'_>,
    overrides: &BTreeMap<String, String>,
) -> Result<Vec<(String, String)>, TemplateError> {
    let engine = Engine::new(overrides)?;
    let mut files = Vec::new();
    let folders = folders(input.options);
    let heard: Vec<Vec<ArrayReport>> =
        input.options.iter().map(|option| hear(input.project, option.design)).collect();
    if folders.iter().any(|folder| !folder.is_empty()) {
        let context = context(&Head::whole(input), &index::whole(input, &folders, &heard))?;
        for (extension, template) in [("html", "options.html"), ("md", "options.md")] {
            files.push((format!("index.{extension}"), engine.render(template, &context)?));
        }
    }
    for ((option, folder), reports) in input.options.iter().zip(&folders).zip(&heard) {
        for sheet in Sheet::ALL {
            let context = sheet_context(input, option, reports, sheet)?;
            for extension in ["html", "md"] {
                let name = format!("{}.{extension}", sheet.name());
                let text = engine.render(&name, &context)?;
                let path = if folder.is_empty() { name } else { format!("{folder}/{name}") };
                files.push((path, text));
            }
        }
    }
    Ok(files)
}

/// What an option's arrays hear, with the weights that the parts produce.
fn hear(project: &Project, design: &Design) -> Vec<ArrayReport> {
    let options = super::pattern::reports(project, &[design], Weighting::Built);
    options.into_iter().flat_map(|(_, reports)| reports).collect()
}

fn sheet_context(
    input: &Input<'_>,
    option: &OptionInput<'_>,
    reports: &[ArrayReport],
    sheet: Sheet,
) -> Result<Context, TemplateError> {
    let head = Head::new(input, option, sheet);
    match sheet {
        Sheet::Index => context(&head, &index::view(input, option, reports)),
        Sheet::Safety => context(&head, &safety::view(input, option)),
        Sheet::Purchase => context(&head, &purchase::view(input, option)),
        Sheet::Cuts => context(&head, &cuts::view(input, option)),
        Sheet::Labels => context(&head, &labels::view(input, option)),
        Sheet::Plan => context(&head, &plan::view(input, option)),
        Sheet::Stakes => context(&head, &stakes::view(input, option)),
        Sheet::Build => context(&head, &build_sheet::view(input, option)),
        Sheet::Estimate => context(&head, &estimate::view(input, option)),
        Sheet::Pattern => pattern::context(input, option, reports, &head),
    }
}

fn context(head: &Head, view: &impl serde::Serialize) -> Result<Context, TemplateError> {
    let name = head.name.clone();
    let broken = |error: tera::Error| TemplateError::Broken { name, message: error.to_string() };
    let view = tera::Value::try_from_serializable(view).map_err(broken)?;
    let mut context = Context::new();
    context.insert("head", head);
    context.insert_value("view", view);
    Ok(context)
}

/// A folder for every named option: its name in small letters, digits and hyphens, each its own.
fn folders(options: &[OptionInput<'_>]) -> Vec<String> {
    let mut taken: Vec<String> = Vec::new();
    for option in options {
        let plain = folder_name(&option.design.option);
        let mut folder = plain.clone();
        let mut n = 2;
        while !folder.is_empty() && taken.contains(&folder) {
            folder = format!("{plain}-{n}");
            n += 1;
        }
        taken.push(folder);
    }
    taken
}

fn folder_name(option: &str) -> String {
    let hyphened: String =
        option.to_lowercase().chars().map(|c| if c.is_ascii_alphanumeric() { c } else { '-' }).collect();
    let parts: Vec<&str> = hyphened.split('-').filter(|part| !part.is_empty()).collect();
    match parts.join("-") {
        name if name.is_empty() && !option.is_empty() => "option".to_owned(),
        name => name,
    }
}

#[cfg(test)]
mod tests {
    use super::folder_name;

    #[test]
    fn a_folder_never_leaves_the_output_folder() {
        assert_eq!(folder_name("../../etc/Pass wd"), "etc-pass-wd");
        assert_eq!(folder_name("«»"), "option");
        assert_eq!(folder_name(""), "");
    }
}
