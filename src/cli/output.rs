//! Standard output, standard error, and files that are whole or not there.

use std::io::{self, Write};
use std::path::{Path, PathBuf};

use tempfile::NamedTempFile;

use super::failure::Failure;

/// How much to print.
#[derive(Clone, Copy, Debug)]
pub(super) struct Output {
    /// JSON instead of text.
    pub(super) json: bool,
    /// Nothing but errors.
    pub(super) quiet: bool,
}

impl Output {
    /// Prints what was asked for; a reader that has had enough (a closed pipe) is no failure.
    pub(super) fn print(&self, text: &str) -> Result<(), Failure> {
        if self.quiet {
            return Ok(());
        }
        let mut out = io::stdout().lock();
        match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
            Err(error) if error.kind() != io::ErrorKind::BrokenPipe => Err(Failure::Print(error)),
            _ => Ok(()),
        }
    }

    /// Says on standard error what deserves notice.
    pub(super) fn warn(&self, text: &str) {
        if !self.quiet {
            // with standard error gone there is nobody left to tell
            let _ = writeln!(io::stderr(), "{text}");
        }
    }

    /// Says on standard error why a command failed.
    pub(super) fn complain(&self, failure: &Failure) {
        // with standard error gone there is nobody left to tell
        let _ = writeln!(io::stderr(), "{failure}");
    }
}

/// Files written beside their final names, then all renamed into place.
#[derive(Debug)]
pub(super) struct Files {
    directory: PathBuf,
    made: Vec<PathBuf>,
    waiting: Vec<(NamedTempFile, PathBuf)>,
}

impl Files {
    /// Opens a directory for files, making it where there is none.
    pub(super) fn open(directory: &Path) -> Result<Self, Failure> {
        let mut made = Vec::new();
        let mut missing = directory.to_path_buf();
        while !missing.as_os_str().is_empty() && !missing.exists() {
            made.push(missing.clone());
            if !missing.pop() {
                break;
            }
        }
        let files = Self {
            directory: directory.to_path_buf(),
            made,
            waiting: Vec::new(),
        };
        std::fs::create_dir_all(directory).map_err(|source| Failure::Write {
            path: directory.to_path_buf(),
            source,
        })?;
        Ok(files)
    }

    /// Writes a file beside its final name.
    pub(super) fn add(&mut self, name: &str, bytes: &[u8]) -> Result<(), Failure> {
        let path = self.directory.join(name);
        let failure = |source| Failure::Write {
            path: path.clone(),
            source,
        };
        if path.is_dir() {
            return Err(failure(io::Error::new(
                io::ErrorKind::IsADirectory,
                "a directory has this name",
            )));
        }
        let mut builder = tempfile::Builder::new();
        builder.prefix(".spanwise-");
        #[cfg(unix)]
        {
            use std::os::unix::fs::PermissionsExt;
            builder.permissions(std::fs::Permissions::from_mode(0o666));
        }
        let mut file = builder.tempfile_in(&self.directory).map_err(failure)?;
        file.write_all(bytes).map_err(failure)?;
        self.waiting.push((file, path));
        Ok(())
    }

    /// Renames all files into place.
    pub(super) fn keep(mut self) -> Result<(), Failure> {
        self.made.clear();
        for (file, path) in self.waiting.drain(..) {
            file.persist(&path).map_err(|error| Failure::Write {
                path,
                source: error.error,
            })?;
        }
        Ok(())
    }
}

impl Drop for Files {
    /// Directories that were made for files that never came are taken away again.
    fn drop(&mut self) {
        self.waiting.clear();
        for directory in &self.made {
            let _ = std::fs::remove_dir(directory);
        }
    }
}
