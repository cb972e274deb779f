//! The `arraywright` program: arguments in, exit code out.

use std::process::ExitCode;

fn main() -> ExitCode {
    arraywright::cli::run(std::env::args_os())
}
