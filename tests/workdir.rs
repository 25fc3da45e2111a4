//! A directory of its own for a run of the program.

use std::ffi::OsStr;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

/// A temporary directory, removed when the value goes.
#[derive(Debug)]
pub(crate) struct WorkDir(tempfile::TempDir);

/// What a run of the program gave.
#[derive(Debug)]
pub(crate) struct Ran {
    /// Exit code; `None` when a signal ended it.
    pub(crate) code: Option<i32>,
    /// Standard output.
    pub(crate) stdout: String,
    /// Standard error.
    pub(crate) stderr: String,
}

impl From<Output> for Ran {
    fn from(output: Output) -> Self {
        Self {
            code: output.status.code(),
            stdout: String::from_utf8(output.stdout).expect("standard output is UTF-8"),
            stderr: String::from_utf8(output.stderr).expect("standard error is UTF-8"),
        }
    }
}

impl WorkDir {
    pub(crate) fn new() -> Self {
        Self(
            tempfile::Builder::new()
                .prefix("spanwise-test-")
                .tempdir()
                .expect("a temporary directory"),
        )
    }

    pub(crate) fn path(&self) -> &Path {
        self.0.path()
    }

    pub(crate) fn join(&self, name: impl AsRef<Path>) -> PathBuf {
        self.path().join(name)
    }

    /// Writes a file, with the directories above it.
    pub(crate) fn write(&self, name: &str, content: impl AsRef<[u8]>) -> PathBuf {
        let path = self.join(name);
        fs::create_dir_all(path.parent().expect("a name below the directory")).expect("directories");
        fs::write(&path, content).expect("a file in the temporary directory");
        path
    }

    /// Every file below the directory with its content, sorted by its path from here.
    pub(crate) fn files(&self) -> Vec<(PathBuf, Vec<u8>)> {
        let mut files = Vec::new();
        let mut open = vec![self.path().to_path_buf()];
        while let Some(directory) = open.pop() {
            for entry in fs::read_dir(directory).expect("a directory to list") {
                let path = entry.expect("an entry").path();
                if path.is_dir() {
                    open.push(path);
                } else {
                    let name = path
                        .strip_prefix(self.path())
                        .expect("below the directory")
                        .to_path_buf();
                    files.push((name, fs::read(&path).expect("a file to read")));
                }
            }
        }
        files.sort();
        files
    }

    /// Runs the program here.
    pub(crate) fn run<S: AsRef<OsStr>>(&self, arguments: &[S]) -> Ran {
        program(self.path())
            .args(arguments)
            .output()
            .expect("the program starts")
            .into()
    }
}

/// The program, to be started in a directory, with nothing set that changes its output.
pub(crate) fn program(directory: &Path) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_spanwise"));
    command.current_dir(directory).env_remove("SOURCE_DATE_EPOCH");
    command
}

/// The package's own directory.
pub(crate) fn package() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// Copies the files of one of the package's directories (no directories in it) to the same name in `target`.
pub(crate) fn copy_from_package(name: &str, target: &Path) {
    let copy = target.join(name);
    fs::create_dir_all(&copy).expect("a directory for the copy");
    for entry in fs::read_dir(package().join(name)).expect("a directory of the package") {
        let path = entry.expect("an entry").path();
        fs::copy(&path, copy.join(path.file_name().expect("a file has a name"))).expect("a copy of a file");
    }
}
