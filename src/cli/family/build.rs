//! Building a family into a folder.

use std::io;
use std::ops::ControlFlow;
use std::path::Path;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Mutex, PoisonError};

use super::Trouble;
use super::finish;
use super::folder::{Folder, write};
use super::journal::{JOURNAL, Journal};
use super::options::{FamilyOptions, Shard};
use super::progress::Progress;
use super::signal;
use crate::cli::failure::Failure;
use crate::cli::loft::read_text;
use crate::cli::output::Output;
use crate::cli::stamp::time_stamp;
use crate::family::{Family, Line, Outcome, Plan, Plot, PlotError, Ready, Status, Table, files_hash};
use crate::spec::{Source, lasting_faults};
use crate::wing::{Kind, Library};

/// Largest table that is read.
const MOST_BYTES: u64 = 256 << 20;

/// Builds the variants of a spec.
pub(super) fn run(spec: &Path, options: &FamilyOptions, output: &Output) -> Result<bool, Failure> {
    let time_stamp = time_stamp()?;
    let text = read_text(spec)?;
    let file = spec.display().to_string();
    let faults = lasting_faults(&Source {
        text: &text,
        file: &file,
        set: &[],
    });
    if !faults.is_empty() {
        return Err(Failure::Faults(faults));
    }
    let plan = match &options.table {
        Some(path) => Plan::of_table(table(path)?),
        None => Plan::combinations(options.vary.clone()).map_err(Trouble::Plan)?,
    };
    let directory = spec.parent().unwrap_or(Path::new(""));
    let kinds = Kind::chosen(&options.only);
    let family = Family {
        text,
        file,
        table: options
            .table
            .as_ref()
            .map_or_else(String::new, |path| path.display().to_string()),
        kinds,
        time_stamp,
        library: Library::new(|name: &str| std::fs::read(directory.join(name))),
        plan,
    };
    let places = options.shard.unwrap_or(Shard::WHOLE).places(family.plan.count());
    let plots = (options.plot.iter())
        .map(|key| Ok((key.clone(), Plot::new(&family.plan, key)?)))
        .collect::<Result<Vec<_>, PlotError>>()
        .map_err(Trouble::Plot)?;
    let folder = Folder::open(&options.output)?;
    let journal = Journal::open(&folder, options.resume)?;
    let jobs = match options.jobs {
        Some(jobs) => jobs.get(),
        None => std::thread::available_parallelism().map_or(1, |cores| cores.get()),
    };
    signal::keep_panics_quiet();
    let stop = signal::watch();
    let progress = Progress::start(places.len(), output.quiet);
    let run = Run {
        family: &family,
        folder: &folder,
        stop: &stop,
        progress: &progress,
        output,
        places: &places,
        resume: options.resume,
        state: Mutex::new(State {
            journal,
            shown: 0,
            failure: None,
        }),
    };
    let ran = family.run(
        &places,
        jobs,
        |ready| run.choose(ready),
        |outcome| run.finish(&outcome),
    );
    progress.end();
    ran.map_err(Trouble::Jobs)?;
    let state = run.state.into_inner().unwrap_or_else(PoisonError::into_inner);
    if let Some(failure) = state.failure {
        return Err(failure);
    }
    if state.journal.count() < places.len() {
        let (done, total) = (state.journal.count(), places.len());
        return Err(Trouble::Stopped { done, total }.into());
    }
    finish::tables(&family.plan, &places, plots, &folder, state.journal, output)
}

fn table(path: &Path) -> Result<Table, Failure> {
    let failure = |source| Failure::Read {
        path: path.to_path_buf(),
        source,
    };
    let size = std::fs::metadata(path).map_err(failure)?.len();
    if size > MOST_BYTES {
        let reason = format!("{size} bytes are more than a table may have; the limit is {MOST_BYTES}");
        return Err(failure(io::Error::other(reason)));
    }
    let bytes = std::fs::read(path).map_err(failure)?;
    Table::read(&bytes).map_err(|source| {
        Trouble::Table {
            path: path.to_path_buf(),
            source,
        }
        .into()
    })
}

/// A run, as its threads see it.
struct Run<'a, F> {
    family: &'a Family<F>,
    folder: &'a Folder,
    stop: &'a AtomicBool,
    progress: &'a Progress,
    output: &'a Output,
    places: &'a [usize],
    resume: bool,
    state: Mutex<State>,
}

/// What the threads share.
struct State {
    journal: Journal,
    /// How many places have been printed as JSON.
    shown: usize,
    failure: Option<Failure>,
}

impl<F: Fn(&str) -> io::Result<Vec<u8>> + Sync> Run<'_, F> {
    /// Keeps a variant that an earlier run has finished; gives others back to be built.
    fn choose(&self, ready: Ready) -> ControlFlow<(), Option<Ready>> {
        if self.stop.load(Ordering::Relaxed) {
            return ControlFlow::Break(());
        }
        if !self.resume {
            return ControlFlow::Continue(Some(ready));
        }
        let earlier = self.locked(|state| state.journal.earlier(&ready.variant.name));
        match earlier {
            Ok(Some(mut line)) if self.is_whole(&line, &ready) => {
                line.index = ready.variant.index;
                line.of = self.family.plan.count();
                line.varied = self.family.varied(&ready.variant);
                match self.ended(ready.variant.index - 1, &line) {
                    ControlFlow::Continue(()) => ControlFlow::Continue(None),
                    ControlFlow::Break(()) => ControlFlow::Break(()),
                }
            }
            _ => ControlFlow::Continue(Some(ready)),
        }
    }

    /// Whether an earlier run has finished a variant from the same inputs, and its files are as they were written.
    fn is_whole(&self, line: &Line, ready: &Ready) -> bool {
        if ready.hash.is_none() || line.hash != ready.hash || line.status == Status::Error {
            return false;
        }
        let names = line.file_names();
        let files: io::Result<Vec<(String, Vec<u8>)>> = names
            .into_iter()
            .map(|name| Ok((name.clone(), std::fs::read(self.folder.join(&name))?)))
            .collect();
        files.is_ok_and(|files| {
            let hash = files_hash(
                files
                    .iter()
                    .map(|(name, bytes)| (name.as_str(), bytes.as_slice())),
            );
            line.files_hash.as_ref() == Some(&hash)
        })
    }

    /// Writes a variant's files, then its line.
    fn finish(&self, outcome: &Outcome) -> ControlFlow<()> {
        let put = self.folder.put(&outcome.files).and_then(|()| {
            self.folder
                .take_away(&outcome.variant.name, &self.family.kinds, &outcome.files)
        });
        match put {
            Ok(()) => self.ended(outcome.variant.index - 1, &outcome.line),
            Err(failure) => self.fail(failure),
        }
    }

    /// Notes that a variant has ended; prints its line, and those that waited for it, where JSON is asked for.
    fn ended(&self, place: usize, line: &Line) -> ControlFlow<()> {
        self.progress.step();
        let noted = self.locked(|state| {
            let unwritten = |source| write(&self.folder.join(JOURNAL), source);
            state.journal.add(place, line).map_err(unwritten)?;
            if self.output.json {
                while let Some(next) = self.places.get(state.shown) {
                    let Some(text) = state.journal.line(*next).map_err(unwritten)? else {
                        break;
                    };
                    self.output.print(&text)?;
                    state.shown += 1;
                }
            }
            Ok(())
        });
        match noted {
            Ok(()) => ControlFlow::Continue(()),
            Err(failure) => self.fail(failure),
        }
    }

    /// Ends the run; the first failure is the one that is told.
    fn fail(&self, failure: Failure) -> ControlFlow<()> {
        self.locked(|state| state.failure.get_or_insert(failure).to_string());
        ControlFlow::Break(())
    }

    fn locked<T>(&self, work: impl FnOnce(&mut State) -> T) -> T {
        work(&mut self.state.lock().unwrap_or_else(PoisonError::into_inner))
    }
}
