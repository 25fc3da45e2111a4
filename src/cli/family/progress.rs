//! How far a run is: a bar on a terminal, a line every few seconds elsewhere.

use std::io::{self, IsTerminal, Write};
use std::sync::Mutex;
use std::sync::PoisonError;
use std::time::{Duration, Instant};

use indicatif::{ProgressBar, ProgressDrawTarget, ProgressStyle};

/// Time between two lines.
const PAUSE: Duration = Duration::from_secs(5);

/// Shows how far a run is, on standard error.
#[derive(Debug)]
pub(super) struct Progress {
    total: usize,
    shown: Shown,
}

#[derive(Debug)]
enum Shown {
    Nothing,
    Bar(ProgressBar),
    Lines(Mutex<Lines>),
}

#[derive(Debug)]
struct Lines {
    done: usize,
    started: Instant,
    last: Instant,
}

impl Progress {
    /// Begins to show the progress of a number of variants.
    pub(super) fn start(total: usize, quiet: bool) -> Self {
        let shown = if quiet {
            Shown::Nothing
        } else if io::stderr().is_terminal() {
            let bar = ProgressBar::with_draw_target(Some(total as u64), ProgressDrawTarget::stderr());
            let style =
                ProgressStyle::with_template("{bar:40} {pos} of {len} wings, {per_sec:0}, {eta} left");
            if let Ok(style) = style {
                bar.set_style(style);
            }
            Shown::Bar(bar)
        } else {
            let now = Instant::now();
            Shown::Lines(Mutex::new(Lines {
                done: 0,
                started: now,
                last: now,
            }))
        };
        Self { total, shown }
    }

    /// One more variant has ended.
    pub(super) fn step(&self) {
        match &self.shown {
            Shown::Nothing => {}
            Shown::Bar(bar) => bar.inc(1),
            Shown::Lines(lines) => {
                let mut lines = lines.lock().unwrap_or_else(PoisonError::into_inner);
                lines.done += 1;
                let now = Instant::now();
                if now - lines.last >= PAUSE {
                    lines.last = now;
                    let text = line(lines.done, self.total, now - lines.started);
                    // with standard error gone there is nobody left to tell
                    let _ = writeln!(io::stderr(), "{text}");
                }
            }
        }
    }

    /// Takes the bar away.
    pub(super) fn end(&self) {
        if let Shown::Bar(bar) = &self.shown {
            bar.finish_and_clear();
        }
    }
}

fn line(done: usize, total: usize, time: Duration) -> String {
    let rate = done as f64 / time.as_secs_f64();
    let left = (total - done) as f64 / rate;
    format!("{done} of {total} wings, {rate:.0} a second, {left:.0} s left")
}

#[cfg(test)]
mod tests {
    use std::time::Duration;

    #[test]
    fn lines_have_rate_and_time_left() {
        assert_eq!(
            super::line(500, 2000, Duration::from_secs(5)),
            "500 of 2000 wings, 100 a second, 15 s left"
        );
    }
}
