//! The folder of a family: one run at a time, files that are whole or not there.

use std::fs::{self, File, TryLockError};
use std::io;
use std::path::{Path, PathBuf};

use super::Trouble;
use crate::cli::failure::Failure;
use crate::wing::Kind;

/// The lock; it is there only while a run works, or after one was killed.
const LOCK: &str = ".spanwise-family.lock";
/// How the names of files begin that are not whole yet.
const UNFINISHED: &str = ".spanwise-family-";
/// The table.
pub(super) const TABLE: &str = "family.csv";
/// The figures, a line each.
pub(super) const LINES: &str = "family.jsonl";

/// A folder that this run has for itself.
#[derive(Debug)]
pub(super) struct Folder {
    path: PathBuf,
    lock: Option<File>,
}

impl Folder {
    /// Makes the folder where there is none, takes it for this run, and clears away what a killed run left unfinished.
    pub(super) fn open(path: &Path) -> Result<Self, Failure> {
        fs::create_dir_all(path).map_err(|source| write(path, source))?;
        for name in [TABLE, LINES] {
            let path = path.join(name);
            if path.is_dir() {
                let reason = io::Error::new(io::ErrorKind::IsADirectory, "a directory has this name");
                return Err(write(&path, reason));
            }
        }
        let folder = Self {
            path: path.to_path_buf(),
            lock: Some(lock(path)?),
        };
        folder.clear().map_err(|source| write(path, source))?;
        Ok(folder)
    }

    /// The path of a file in it.
    pub(super) fn join(&self, name: &str) -> PathBuf {
        self.path.join(name)
    }

    /// Writes files beside their names, then renames them all into place.
    pub(super) fn put(&self, files: &[(String, Vec<u8>)]) -> Result<(), Failure> {
        let unfinished = |name: &str| self.join(&format!("{UNFINISHED}{name}"));
        let put = || {
            for (name, bytes) in files {
                fs::write(unfinished(name), bytes).map_err(|source| (name, source))?;
            }
            for (name, _) in files {
                fs::rename(unfinished(name), self.join(name)).map_err(|source| (name, source))?;
            }
            Ok(())
        };
        put().map_err(|(name, source): (&String, io::Error)| {
            for (name, _) in files {
                // what is not there need not go
                let _ = fs::remove_file(unfinished(name));
            }
            write(&self.join(name), source)
        })
    }

    /// A file to be written piece by piece, and what to do when it is whole.
    pub(super) fn begin(&self, name: &str) -> Result<Unfinished, Failure> {
        let path = self.join(&format!("{UNFINISHED}{name}"));
        let file = File::create(&path).map_err(|source| write(&path, source))?;
        Ok(Unfinished {
            file,
            path,
            name: self.join(name),
        })
    }

    /// Takes away the files of some kinds that a variant may have from an earlier run, but those that it has now.
    pub(super) fn take_away(
        &self,
        variant: &str,
        kinds: &[Kind],
        but: &[(String, Vec<u8>)],
    ) -> Result<(), Failure> {
        for kind in kinds {
            for side in ["", "-starboard", "-port"] {
                let name = format!("{variant}{side}.{}", kind.name());
                if !but.iter().any(|(kept, _)| *kept == name) {
                    self.remove(&name)?;
                }
            }
        }
        Ok(())
    }

    /// Removes a file, if it is there.
    pub(super) fn remove(&self, name: &str) -> Result<(), Failure> {
        let path = self.join(name);
        match fs::remove_file(&path) {
            Err(source) if source.kind() != io::ErrorKind::NotFound => Err(write(&path, source)),
            _ => Ok(()),
        }
    }

    fn clear(&self) -> io::Result<()> {
        for entry in fs::read_dir(&self.path)? {
            let name = entry?.file_name();
            if name.to_str().is_some_and(|name| name.starts_with(UNFINISHED)) {
                fs::remove_file(self.path.join(name))?;
            }
        }
        Ok(())
    }
}

impl Drop for Folder {
    /// The lock's file goes while it is still locked: whoever waits for it finds that it is no longer there.
    fn drop(&mut self) {
        let _ = fs::remove_file(self.path.join(LOCK));
        self.lock = None;
    }
}

/// A file that is being written beside its name.
#[derive(Debug)]
pub(super) struct Unfinished {
    pub(super) file: File,
    path: PathBuf,
    name: PathBuf,
}

impl Unfinished {
    /// Renames the file into place.
    pub(super) fn keep(self) -> Result<(), Failure> {
        fs::rename(&self.path, &self.name).map_err(|source| write(&self.name, source))
    }

    /// Why it could not be written.
    pub(super) fn failure(&self, source: io::Error) -> Failure {
        write(&self.name, source)
    }
}

/// A file or directory that cannot be written.
pub(super) fn write(path: &Path, source: io::Error) -> Failure {
    Failure::Write {
        path: path.to_path_buf(),
        source,
    }
}

fn lock(folder: &Path) -> Result<File, Failure> {
    let path = folder.join(LOCK);
    // a run that ends takes the file away: then the lock that was got is that of a file that is gone
    for _ in 0..100 {
        let file = File::options()
            .create(true)
            .truncate(false)
            .write(true)
            .open(&path)
            .map_err(|source| write(&path, source))?;
        match file.try_lock() {
            Ok(()) => {}
            Err(TryLockError::WouldBlock) => return Err(Trouble::Busy(folder.to_path_buf()).into()),
            Err(TryLockError::Error(source)) => return Err(write(&path, source)),
        }
        if is_at(&file, &path) {
            return Ok(file);
        }
    }
    Err(Trouble::Busy(folder.to_path_buf()).into())
}

#[cfg(unix)]
fn is_at(file: &File, path: &Path) -> bool {
    use std::os::unix::fs::MetadataExt;
    let identity = |data: fs::Metadata| (data.dev(), data.ino());
    match (file.metadata(), fs::metadata(path)) {
        (Ok(held), Ok(there)) => identity(held) == identity(there),
        _ => false,
    }
}

/// Elsewhere a file that is open cannot be taken away and made anew under the same name.
#[cfg(not(unix))]
fn is_at(_: &File, path: &Path) -> bool {
    path.exists()
}
