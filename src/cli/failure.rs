//! How a command ends.

use std::path::Path;
use std::process::ExitCode;

use super::output;
use crate::problem::Problems;

/// How a command that ran ended.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Outcome {
    /// All is done.
    Done,
    /// Done, but a price is missing.
    Unpriced,
}

/// Why a command could not do its work.
#[derive(Debug)]
pub(super) enum Failure {
    /// The project or the catalogue is at fault.
    Problems(Problems),
    /// The command line is at fault.
    Usage(String),
    /// A file could not be read or written.
    File(String),
    /// Nothing to say: it has been said already.
    Said,
}

impl Failure {
    /// A file that could not be read or written.
    pub(super) fn file(path: &Path, what: &str, error: &std::io::Error) -> Self {
        let why = if error.kind() == std::io::ErrorKind::NotFound {
            "there is no such file".to_owned()
        } else if error.kind() == std::io::ErrorKind::PermissionDenied {
            "no permission".to_owned()
        } else {
            error.to_string()
        };
        Self::File(format!("cannot {what} {}: {why}", path.display()))
    }

    /// Says it on stderr and gives the exit code.
    pub(super) fn report(self) -> ExitCode {
        match self {
            Self::Problems(problems) => {
                output::problems(&problems);
                ExitCode::from(1)
            }
            Self::Usage(message) => {
                output::complaint(&message);
                ExitCode::from(2)
            }
            Self::File(message) => {
                output::complaint(&message);
                ExitCode::from(3)
            }
            Self::Said => ExitCode::from(1),
        }
    }
}
