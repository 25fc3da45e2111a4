//! Sections and fits that many wings share, each made once.

use std::collections::HashMap;
use std::fmt;
use std::hash::Hash;
use std::io;
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};

use crate::airfoil::{self, Profiles, Section};

/// Most sections, and most sets of sections, that are kept; beyond that all are made anew.
const MOST: usize = 256;

/// Sections that have been loaded and fitted, for wings that are built one after the other or at the same time.
///
/// What a library gives is what would be made without it: it saves time and changes nothing. A coordinate file is read
/// once, so a file that changes while the library lives is not seen.
pub struct Library<F> {
    pub(super) open: F,
    sections: Mutex<HashMap<String, Arc<Loaded>>>,
    fits: Mutex<HashMap<Vec<String>, Arc<Profiles>>>,
}

/// A section with what was found in its file.
#[derive(Clone, Debug)]
pub(super) struct Loaded {
    pub(super) section: Section,
    /// What was found and done in the coordinate file.
    pub(super) notes: Vec<String>,
    /// The bytes of the coordinate file; none for a designation.
    pub(super) bytes: Option<Vec<u8>>,
}

impl<F: Fn(&str) -> io::Result<Vec<u8>>> Library<F> {
    /// An empty library. `open` reads a coordinate file, given its path as a spec has it.
    pub fn new(open: F) -> Self {
        Self {
            open,
            sections: Mutex::default(),
            fits: Mutex::default(),
        }
    }

    /// A section that is kept under a key that tells it from every other, or the one that `load` gives.
    pub(super) fn section<E>(
        &self,
        key: String,
        load: impl FnOnce() -> Result<Loaded, E>,
    ) -> Result<Arc<Loaded>, E> {
        kept(&self.sections, key, load)
    }

    /// The fit of some sections, named by their keys.
    pub(super) fn fit(
        &self,
        keys: Vec<String>,
        sections: &[Section],
    ) -> Result<Arc<Profiles>, airfoil::Error> {
        kept(&self.fits, keys, || {
            airfoil::fit(&sections.iter().collect::<Vec<_>>(), airfoil::TOLERANCE)
        })
    }
}

impl<F> fmt::Debug for Library<F> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Library")
            .field("sections", &lock(&self.sections).len())
            .field("fits", &lock(&self.fits).len())
            .finish_non_exhaustive()
    }
}

/// The value of a key, or the one that `make` gives; it is made without the lock, by more than one thread if need be.
fn kept<K: Eq + Hash, T, E>(
    map: &Mutex<HashMap<K, Arc<T>>>,
    key: K,
    make: impl FnOnce() -> Result<T, E>,
) -> Result<Arc<T>, E> {
    if let Some(value) = lock(map).get(&key) {
        return Ok(Arc::clone(value));
    }
    let value = Arc::new(make()?);
    let mut map = lock(map);
    if map.len() >= MOST {
        map.clear();
    }
    map.insert(key, Arc::clone(&value));
    Ok(value)
}

/// Nothing panics while it holds the lock, and the map would be whole if it did.
fn lock<T>(mutex: &Mutex<T>) -> MutexGuard<'_, T> {
    mutex.lock().unwrap_or_else(PoisonError::into_inner)
}
