//! `spanwise inspect`

use std::fmt::Write;
use std::path::Path;

use super::args::InspectOptions;
use super::failure::Failure;
use super::output::Output;
use crate::inspect::{Report, inspect};

/// Largest file that is read, 1 GiB: it is held in memory whole.
const MOST_BYTES: u64 = 1 << 30;

/// Reads files back and prints what is in them; true where each agrees with itself. A file that can't be read ends the
/// command after the others were read.
pub(super) fn run(options: &InspectOptions, output: &Output) -> Result<bool, Failure> {
    let (mut text, mut list) = (String::new(), Vec::new());
    let mut agree = true;
    let mut failed = None;
    for path in &options.files {
        match read(path) {
            Ok(report) => {
                agree &= report.findings().is_empty();
                if output.json {
                    list.push(serde_json::json!({ "file": path.display().to_string(), "report": report }));
                } else {
                    // a string takes everything that is written to it
                    let _ = writeln!(text, "{}\n{}", path.display(), report.sheet());
                }
            }
            Err(failure) => match failed {
                None => failed = Some(failure),
                Some(_) => output.complain(&failure),
            },
        }
    }
    if output.json && !list.is_empty() {
        text = format!("{:#}\n", serde_json::Value::Array(list));
    }
    if !text.is_empty() {
        output.print(&text)?;
    }
    failed.map_or(Ok(agree), Err)
}

fn read(path: &Path) -> Result<Report, Failure> {
    let failure = |source| Failure::Read {
        path: path.to_path_buf(),
        source,
    };
    let size = std::fs::metadata(path).map_err(failure)?.len();
    if size > MOST_BYTES {
        let reason = format!("{size} bytes are too many; the limit is {MOST_BYTES}");
        return Err(failure(std::io::Error::other(reason)));
    }
    let bytes = std::fs::read(path).map_err(failure)?;
    inspect(&bytes, &path.display().to_string()).map_err(|source| Failure::Inspect {
        path: path.to_path_buf(),
        source,
    })
}
