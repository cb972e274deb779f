//! The only place that knows files, the terminal and the command line.

mod catalog;
mod check;
mod compare;
mod estimate;
mod failure;
mod load;
mod output;
mod parts;
mod pattern;
mod start;
mod why;
mod workorder;

use std::ffi::OsString;
use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Parser, Subcommand, ValueEnum};

use failure::Outcome;

/// Plans, counts and prices low-band receive antenna arrays, and writes the sheets to build them by
#[derive(Debug, Parser)]
#[command(name = "arraywright", version, max_term_width = 100)]
pub struct Arguments {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Write a commented project file to begin from
    Start(start::Start),
    /// Say whether a project can be built: errors, warnings, assumptions
    Check(check::Check),
    /// List what is needed, with reasons
    Parts(parts::Parts),
    /// Say what the arrays hear: directivity, lobes, beam, and what errors do to them
    Pattern(pattern::Pattern),
    /// Price what is needed
    Estimate(estimate::Estimate),
    /// Put options side by side
    Compare(compare::Compare),
    /// Write the set of documents that the crew gets
    Workorder(workorder::WorkOrder),
    /// Say how a quantity, length or price came about
    Why(why::Why),
    /// Look after the price catalogue
    Catalog(catalog::Catalog),
}

/// Which project, which catalogue.
#[derive(Debug, Clone, clap::Args)]
struct ProjectArgs {
    /// The project file, or a folder that holds project.toml
    file: PathBuf,
    #[command(flatten)]
    catalogue: CatalogueArgs,
    /// Only this option
    #[arg(long, value_name = "NAME")]
    option: Option<String>,
}

/// Which catalogue.
#[derive(Debug, Clone, clap::Args)]
struct CatalogueArgs {
    /// A folder of catalogue files laid over the built-in ones
    #[arg(long, value_name = "DIR")]
    catalog: Option<PathBuf>,
    /// A folder of catalogue files instead of the built-in ones
    #[arg(long, value_name = "DIR", conflicts_with = "catalog")]
    catalog_only: Option<PathBuf>,
}

/// How a result is written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, ValueEnum)]
enum Format {
    /// For reading
    #[default]
    Text,
    /// For programs
    Json,
    /// For a spreadsheet
    Csv,
    /// Markdown
    Md,
}

/// Runs the program on the process's own arguments and gives its exit code.
///
/// 0 done; 1 the project or catalogue is at fault; 2 the command line is at fault; 3 a file could not be read or
/// written; 4 done, but a price is missing.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(error) => {
            let code = if error.use_stderr() { 2 } else { 0 };
            return match error.print() {
                Ok(()) => ExitCode::from(code),
                Err(_) => ExitCode::from(3),
            };
        }
    };
    let result = match arguments.command {
        Command::Start(command) => command.run(),
        Command::Check(command) => command.run(),
        Command::Parts(command) => command.run(),
        Command::Pattern(command) => command.run(),
        Command::Estimate(command) => command.run(),
        Command::Compare(command) => command.run(),
        Command::Workorder(command) => command.run(),
        Command::Why(command) => command.run(),
        Command::Catalog(command) => command.run(),
    };
    match result {
        Ok(Outcome::Done) => ExitCode::SUCCESS,
        Ok(Outcome::Unpriced) => ExitCode::from(4),
        Err(failure) => failure.report(),
    }
}

#[cfg(test)]
mod tests {
    use clap::CommandFactory;

    use super::Arguments;

    #[test]
    fn the_command_line_is_consistent() {
        Arguments::command().debug_assert();
    }
}
