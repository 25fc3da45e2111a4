//! `spanwise loft`

use std::path::Path;

use super::args::LoftOptions;
use super::failure::Failure;
use super::output::{Files, Output};
use super::stamp::time_stamp;
use crate::spec::Source;
use crate::wing::{Kind, Options, Wing, prepare};
use crate::write::{record, sheet};

/// Largest spec file that is read.
const MOST_BYTES: u64 = 4 << 20;

/// Builds one wing and writes its files.
pub(super) fn run(options: &LoftOptions, output: &Output) -> Result<bool, Failure> {
    let stamp = time_stamp()?;
    let path = &options.spec;
    let text = read_text(path)?;
    let file = path.display().to_string();
    let source = Source {
        text: &text,
        file: &file,
        set: &options.set,
    };
    let directory = path.parent().unwrap_or(Path::new(""));
    let prepared = prepare(&source, &|name| std::fs::read(directory.join(name))).map_err(Failure::Faults)?;
    let broken = |source| Failure::Wing {
        path: path.clone(),
        source,
    };
    let wing = Wing::build(&prepared).map_err(broken)?;
    let stem = path
        .file_stem()
        .map_or_else(|| "wing".into(), |stem| stem.to_string_lossy());
    let kinds = Kind::chosen(&options.only);
    let named = Options {
        time_stamp: &stamp,
        id: &stem,
    };
    let contents = wing.contents(&kinds, named).map_err(broken)?;
    let mut files = Files::open(&options.output)?;
    for (name, bytes) in &contents.files {
        files.add(name, bytes)?;
    }
    files.keep()?;
    output.print(&if output.json {
        record::json(&contents.record)
    } else {
        sheet::sheet(&contents.record)
    })?;
    Ok(wing.is_as_asked())
}

/// The text of a spec file, without a byte-order mark.
pub(super) fn read_text(path: &Path) -> Result<String, Failure> {
    let failure = |source| Failure::Read {
        path: path.to_path_buf(),
        source,
    };
    let size = std::fs::metadata(path).map_err(failure)?.len();
    if size > MOST_BYTES {
        let reason = format!("{size} bytes is no spec; the limit is {MOST_BYTES}");
        return Err(failure(std::io::Error::other(reason)));
    }
    let bytes = std::fs::read(path).map_err(failure)?;
    let text = String::from_utf8(bytes).map_err(|error| Failure::NoText {
        path: path.to_path_buf(),
        at: error.utf8_error().valid_up_to(),
    })?;
    Ok(text.strip_prefix('\u{feff}').map(str::to_owned).unwrap_or(text))
}
