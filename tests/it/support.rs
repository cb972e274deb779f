//! The one helper: a project in a folder of its own, and the program run on it.

use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use serde_json::Value;

/// A folder with a project, gone when dropped.
pub(crate) struct ProjectTest {
    folder: tempfile::TempDir,
}

impl ProjectTest {
    /// A project from its text.
    pub(crate) fn new(text: &str) -> Self {
        let folder = tempfile::tempdir().unwrap();
        std::fs::write(folder.path().join("project.toml"), text).unwrap();
        Self { folder }
    }

    /// Another file beside it.
    #[must_use]
    pub(crate) fn with(self, name: &str, text: &str) -> Self {
        let path = self.folder.path().join(name);
        std::fs::create_dir_all(path.parent().unwrap()).unwrap();
        std::fs::write(path, text).unwrap();
        self
    }

    /// The folder.
    pub(crate) fn path(&self) -> &Path {
        self.folder.path()
    }

    /// Runs a command on the project.
    pub(crate) fn run(&self, arguments: &[&str]) -> Ran {
        let file = self.path().join("project.toml");
        let mut all = vec![arguments[0], file.to_str().unwrap()];
        all.extend(&arguments[1..]);
        run(&all)
    }
}

/// What a run of the program gave.
pub(crate) struct Ran {
    output: Output,
}

impl Ran {
    /// Standard output.
    pub(crate) fn stdout(&self) -> String {
        String::from_utf8(self.output.stdout.clone()).unwrap()
    }

    /// Standard error.
    pub(crate) fn stderr(&self) -> String {
        String::from_utf8(self.output.stderr.clone()).unwrap()
    }

    /// The exit code.
    pub(crate) fn code(&self) -> i32 {
        self.output.status.code().unwrap()
    }

    /// Fails unless the exit code is as expected.
    #[must_use]
    pub(crate) fn exits(self, code: i32) -> Self {
        assert_eq!(self.code(), code, "stdout:\n{}\nstderr:\n{}", self.stdout(), self.stderr());
        self
    }

    /// Standard output as JSON.
    pub(crate) fn json(&self) -> Value {
        serde_json::from_str(&self.stdout()).unwrap()
    }
}

/// Runs the program.
pub(crate) fn run(arguments: &[&str]) -> Ran {
    Ran { output: program().args(arguments).output().unwrap() }
}

/// The program, ready to be given arguments.
pub(crate) fn program() -> Command {
    Command::new(env!("CARGO_BIN_EXE_arraywright"))
}

/// A path below the repository.
pub(crate) fn repository(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

/// The demo projects by folder name.
pub(crate) fn demos() -> Vec<PathBuf> {
    let mut demos: Vec<PathBuf> =
        std::fs::read_dir(repository("demo-projects")).unwrap().map(|entry| entry.unwrap().path()).collect();
    demos.sort();
    demos
}
