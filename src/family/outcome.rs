//! One variant: from its values to its files, figures or error.

use std::any::Any;
use std::cell::Cell;
use std::io;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::Path;

use serde::ser::{SerializeMap, Serializer};
use serde_json::value::RawValue;

use super::hash::{files_hash, inputs_hash};
use super::line::{Line, Status};
use super::plan::{Plan, Variant};
use crate::spec::{Fault, Place, Source};
use crate::wing::{Kind, Library, Options, Prepared, Wing, prepare_with};
use crate::write::record::Record;

/// A plan with the spec that it varies.
#[derive(Debug)]
pub struct Family<F> {
    /// Which variants there are.
    pub plan: Plan,
    /// The spec's text.
    pub text: String,
    /// The spec's file as the user named it; its stem is the wing's name where the text has none.
    pub file: String,
    /// The table's file as the user named it, for messages.
    pub table: String,
    /// Which files are made.
    pub kinds: Vec<Kind>,
    /// Time stamp of the STEP files, ISO 8601 without zone.
    pub time_stamp: String,
    /// Sections and fits that the variants share; it reads coordinate files.
    pub library: Library<F>,
}

/// A variant that has been read but not built.
#[derive(Debug)]
pub struct Ready {
    /// The variant.
    pub variant: Variant,
    /// Hash of all that its files depend on; none where it has faults.
    pub hash: Option<String>,
    prepared: Result<Prepared, String>,
}

/// What became of a variant.
#[derive(Debug)]
pub struct Outcome {
    /// The variant.
    pub variant: Variant,
    /// Its line in `family.jsonl`.
    pub line: Line,
    /// Its figures; none where it was not built.
    pub record: Option<Record>,
    /// Name and bytes of each of its files; none where it was not built.
    pub files: Vec<(String, Vec<u8>)>,
}

impl<F: Fn(&str) -> io::Result<Vec<u8>>> Family<F> {
    /// Reads the variant at a place counted from 0, without building it.
    ///
    /// # Panics
    ///
    /// Where there are no so many variants.
    pub fn read(&self, i: usize) -> Ready {
        let variant = self.plan.variant(i);
        let read = guarded(|| self.prepare(&variant));
        let (hash, prepared) = match read.and_then(|prepared| prepared) {
            Ok(prepared) => (Some(self.hash(&variant, &prepared)), Ok(prepared)),
            Err(error) => (None, Err(error)),
        };
        Ready {
            variant,
            hash,
            prepared,
        }
    }

    /// Builds a variant that has been read.
    pub fn build(&self, ready: Ready) -> Outcome {
        let Ready {
            variant,
            hash,
            prepared,
        } = ready;
        let built = prepared.and_then(|prepared| guarded(|| self.make(&variant, &prepared))?);
        let mut line = Line {
            index: variant.index,
            of: self.plan.count(),
            name: variant.name.clone(),
            varied: self.varied(&variant),
            status: Status::Error,
            error: None,
            hash,
            files_hash: None,
            figures: None,
        };
        let (record, files) = match built {
            Ok(made) => {
                line.status = made.status;
                line.figures = Some(made.figures);
                line.files_hash = Some(files_hash(
                    (made.files.iter()).map(|(name, bytes)| (name.as_str(), bytes.as_slice())),
                ));
                (Some(made.record), made.files)
            }
            Err(error) => {
                line.error = Some(error);
                (None, Vec::new())
            }
        };
        Outcome {
            variant,
            line,
            record,
            files,
        }
    }

    /// What a variant varies, as a JSON object with the keys in the plan's order.
    ///
    /// # Panics
    ///
    /// Never: texts can be said in JSON.
    pub fn varied(&self, variant: &Variant) -> Box<RawValue> {
        let mut text = Vec::new();
        let mut json = serde_json::Serializer::new(&mut text);
        let mut write = || {
            let mut map = json.serialize_map(Some(variant.values.len()))?;
            for (key, value) in self.plan.keys().iter().zip(&variant.values) {
                map.serialize_entry(key, value)?;
            }
            map.end()
        };
        write().expect("a vector takes all bytes");
        let text = String::from_utf8(text).expect("JSON is UTF-8");
        RawValue::from_string(text).expect("what was written is JSON")
    }

    fn prepare(&self, variant: &Variant) -> Result<Prepared, String> {
        let set = self.plan.set(variant);
        let source = Source {
            text: &self.text,
            file: &self.file,
            set: &set,
        };
        prepare_with(&source, &self.library).map_err(|faults| {
            let faults: Vec<String> = faults
                .into_iter()
                .map(|fault| self.placed(fault, variant).to_string())
                .collect();
            faults.join("\n")
        })
    }

    /// A fault of a varied value, said to be where the value was typed.
    fn placed(&self, mut fault: Fault, variant: &Variant) -> Fault {
        if fault.place.file == Place::SET {
            let column = self.plan.keys().iter().position(|key| *key == fault.place.key);
            fault.place.file = match (variant.row, column) {
                (Some(row), Some(column)) => {
                    let column = column + 1 + usize::from(self.plan.is_named());
                    format!("{}: row {row}, column {column}", self.table)
                }
                (Some(row), None) => format!("{}: row {row}", self.table),
                (None, _) => "--vary".to_owned(),
            };
        }
        fault
    }

    fn make(&self, variant: &Variant, prepared: &Prepared) -> Result<Made, String> {
        let wing = Wing::build(prepared).map_err(|error| error.to_string())?;
        let options = Options {
            time_stamp: &self.time_stamp,
            id: &variant.name,
        };
        let contents = wing
            .contents(&self.kinds, options)
            .map_err(|error| error.to_string())?;
        let figures = serde_json::value::to_raw_value(&contents.record)
            .expect("a record has text keys and plain values only");
        Ok(Made {
            status: if wing.is_as_asked() {
                Status::Ok
            } else {
                Status::Out
            },
            figures,
            record: contents.record,
            files: contents.files,
        })
    }

    fn hash(&self, variant: &Variant, prepared: &Prepared) -> String {
        let stem = Path::new(&self.file)
            .file_stem()
            .map_or_else(String::new, |stem| stem.to_string_lossy().into_owned());
        let parts = [
            prepared.hash.as_bytes(),
            stem.as_bytes(),
            self.time_stamp.as_bytes(),
            variant.name.as_bytes(),
        ];
        let kinds = self.kinds.iter().map(|kind| kind.name().as_bytes());
        inputs_hash(parts.into_iter().chain(kinds))
    }
}

struct Made {
    status: Status,
    figures: Box<RawValue>,
    record: Record,
    files: Vec<(String, Vec<u8>)>,
}

thread_local! {
    static GUARDED: Cell<bool> = const { Cell::new(false) };
}

/// Whether a panic of this thread, if it happens now, becomes a variant's error: a panic hook need not report it.
pub fn is_guarded() -> bool {
    GUARDED.get()
}

/// What `work` gives, or what it said when it panicked.
fn guarded<T>(work: impl FnOnce() -> T) -> Result<T, String> {
    GUARDED.set(true);
    // nothing that a panic could leave half done outlives it: the work borrows values that it does not change, and the
    // library is whole whenever it is not locked
    let worked = catch_unwind(AssertUnwindSafe(work));
    GUARDED.set(false);
    worked.map_err(|payload| {
        format!(
            "the program panicked: {}; this is a fault of spanwise itself: please report it with the spec and the values",
            message(payload.as_ref())
        )
    })
}

fn message(payload: &(dyn Any + Send)) -> &str {
    match payload.downcast_ref::<String>() {
        Some(text) => text,
        None => payload
            .downcast_ref::<&str>()
            .copied()
            .unwrap_or("without a word"),
    }
}
