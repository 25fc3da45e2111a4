//! Building variants on several threads.

use std::io;
use std::ops::ControlFlow;
use std::sync::atomic::{AtomicBool, AtomicUsize, Ordering};

use thiserror::Error;

use super::outcome::{Family, Outcome, Ready};

/// Why the threads could not be started.
#[derive(Debug, Error)]
#[error("{jobs} threads could not be started: {source}; take fewer jobs")]
pub struct JobsError {
    jobs: usize,
    source: rayon::ThreadPoolBuildError,
}

impl<F: Fn(&str) -> io::Result<Vec<u8>> + Sync> Family<F> {
    /// Builds the variants at some places (counted from 0) on `jobs` threads, taking them in the order given.
    ///
    /// `choose` sees each variant before it is built and gives it back to have it built, or keeps it. `finish` gets each
    /// outcome as it is finished, on the thread that made it; with [`ControlFlow::Break`] no further variant is begun. A
    /// panic while a variant is built is that variant's error; what the panic hook prints is up to the caller.
    ///
    /// # Errors
    ///
    /// [`JobsError`] where the threads could not be started.
    pub fn run(
        &self,
        places: &[usize],
        jobs: usize,
        choose: impl Fn(Ready) -> ControlFlow<(), Option<Ready>> + Sync,
        finish: impl Fn(Outcome) -> ControlFlow<()> + Sync,
    ) -> Result<(), JobsError> {
        let jobs = jobs.clamp(1, places.len().max(1));
        let pool = rayon::ThreadPoolBuilder::new()
            .num_threads(jobs)
            .build()
            .map_err(|source| JobsError { jobs, source })?;
        let next = AtomicUsize::new(0);
        let stop = AtomicBool::new(false);
        // every thread takes the next variant there is, so that they end in about the order given
        pool.broadcast(|_| {
            while !stop.load(Ordering::Relaxed) {
                let Some(&place) = places.get(next.fetch_add(1, Ordering::Relaxed)) else {
                    return;
                };
                let flow = match choose(self.read(place)) {
                    ControlFlow::Continue(Some(ready)) => finish(self.build(ready)),
                    ControlFlow::Continue(None) => ControlFlow::Continue(()),
                    ControlFlow::Break(()) => ControlFlow::Break(()),
                };
                if flow.is_break() {
                    stop.store(true, Ordering::Relaxed);
                }
            }
        });
        Ok(())
    }
}
