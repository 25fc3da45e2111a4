//! What the process does on an interrupt and on a panic, while a family is built.

use std::sync::Arc;
use std::sync::OnceLock;
use std::sync::atomic::{AtomicBool, Ordering};

use crate::family::is_guarded;

/// Set by an interrupt (Ctrl-C) or a request to end; signals are the process's, so this is too.
static STOP: OnceLock<Arc<AtomicBool>> = OnceLock::new();

/// Makes an interrupt a request to stop after the wings that are being built; a second one ends the process at once.
pub(super) fn watch() -> Arc<AtomicBool> {
    let stop = STOP.get_or_init(|| {
        let stop = Arc::new(AtomicBool::new(false));
        let asked = Arc::clone(&stop);
        // where no handler can be set an interrupt ends the process, which a later --resume makes good
        let _ = ctrlc::set_handler(move || {
            if asked.swap(true, Ordering::Relaxed) {
                std::process::exit(i32::from(crate::cli::STOPPED));
            }
        });
        stop
    });
    Arc::clone(stop)
}

/// Keeps panics off standard error that become a variant's error.
pub(super) fn keep_panics_quiet() {
    static ONCE: OnceLock<()> = OnceLock::new();
    ONCE.get_or_init(|| {
        let before = std::panic::take_hook();
        std::panic::set_hook(Box::new(move |panic| {
            if !is_guarded() {
                before(panic);
            }
        }));
    });
}
