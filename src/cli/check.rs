//! `check`: can it be built?

use super::failure::{Failure, Outcome};
use super::{Format, ProjectArgs, load, output};
use crate::problem::{Problems, Severity};
use crate::report::machine;
use crate::report::{Sheet, Table};

/// Say whether a project can be built: errors, warnings, assumptions
#[derive(Debug, clap::Args)]
pub(super) struct Check {
    #[command(flatten)]
    project: ProjectArgs,
    /// How to write the result
    #[arg(long, value_enum, default_value_t)]
    format: Format,
}

impl Check {
    pub(super) fn run(&self) -> Result<Outcome, Failure> {
        let checked = load::check(&self.project)?;
        let assumptions =
            checked.project.as_ref().map(|project| project.assumptions.clone()).unwrap_or_default();
        let json = machine::check(&checked.hash, &checked.problems, &assumptions);
        let mut sheet = Sheet { answer: vec![verdict(&checked.problems)], ..Sheet::default() };
        let mut problems =
            Table::new("problems", &["severity", "code", "line", "what", "what would be right"]);
        for problem in checked.problems.sorted() {
            let place = problem.place.as_ref().map(|p| format!("{}:{}:{}", p.file, p.line, p.column));
            problems.rows.push(vec![
                problem.severity.to_string(),
                problem.code.to_string(),
                place.unwrap_or_default(),
                problem.message.clone(),
                problem.help.clone(),
            ]);
        }
        let mut table = Table::new("assumptions (every default that was used)", &["key", "value", "why"]);
        for a in &assumptions {
            table.rows.push(vec![a.key.clone(), a.value.clone(), a.why.clone()]);
        }
        if self.format == Format::Text {
            output::problems(&checked.problems);
        } else {
            sheet.tables.push(problems);
        }
        sheet.answer.extend(checked.remarks.iter().cloned());
        sheet.tables.push(table);
        output::result(self.format, &sheet, &json)?;
        if checked.problems.has_errors() { Err(Failure::Said) } else { Ok(Outcome::Done) }
    }
}

fn verdict(problems: &Problems) -> String {
    let count = |severity| problems.sorted().iter().filter(|problem| problem.severity == severity).count();
    let plural = |n: usize, word: &str| format!("{n} {word}{}", if n == 1 { "" } else { "s" });
    let (errors, warnings) = (count(Severity::Error), count(Severity::Warning));
    match (errors, warnings) {
        (0, 0) => "this can be built".to_owned(),
        (0, _) => format!("this can be built; {} to read", plural(warnings, "warning")),
        (_, 0) => format!("this cannot be built yet: {}", plural(errors, "error")),
        _ => format!(
            "this cannot be built yet: {} and {}",
            plural(errors, "error"),
            plural(warnings, "warning")
        ),
    }
}
