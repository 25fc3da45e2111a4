//! A variant's line in `family.jsonl`.

use std::collections::BTreeMap;
use std::fmt;

use serde::{Deserialize, Serialize};
use serde_json::value::RawValue;

/// How a variant ended.
#[derive(Clone, Copy, Debug, Deserialize, PartialEq, Eq, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum Status {
    /// Built, and everything asked for was found on the solid.
    Ok,
    /// Built, but something asked for is out of tolerance.
    Out,
    /// Not built.
    Error,
}

impl Status {
    /// The word that stands for it in tables.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Ok => "ok",
            Self::Out => "out",
            Self::Error => "error",
        }
    }
}

impl fmt::Display for Status {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.word())
    }
}

/// What is known of a variant that has ended: one line of JSON.
#[derive(Clone, Debug, Deserialize, Serialize)]
pub struct Line {
    /// Its place in the family, counted from 1.
    pub index: usize,
    /// How many variants the family has.
    pub of: usize,
    /// Its name, which its files have too.
    pub name: String,
    /// What was varied, as typed; an object with the keys in the plan's order.
    pub varied: Box<RawValue>,
    /// How it ended.
    pub status: Status,
    /// Why it was not built.
    pub error: Option<String>,
    /// Hash of all that its files depend on; none where not even that is known.
    pub hash: Option<String>,
    /// Hash of its files.
    pub files_hash: Option<String>,
    /// Its figures: what `loft` writes as JSON, on one line.
    pub figures: Option<Box<RawValue>>,
}

impl Line {
    /// The line as text, ending in a line feed.
    ///
    /// # Panics
    ///
    /// Never: a line holds nothing that JSON cannot say.
    pub fn text(&self) -> String {
        let mut text = serde_json::to_string(self).expect("a line has text keys and plain values only");
        text.push('\n');
        text
    }

    /// Names of the variant's files.
    pub fn file_names(&self) -> Vec<String> {
        #[derive(Deserialize)]
        struct Names {
            files: BTreeMap<String, String>,
        }
        let names = (self.figures.as_ref()).and_then(|raw| serde_json::from_str::<Names>(raw.get()).ok());
        names.map_or_else(Vec::new, |names| names.files.into_values().collect())
    }

    /// Reads a line.
    ///
    /// # Errors
    ///
    /// Where it is none.
    pub fn read(text: &str) -> Result<Self, serde_json::Error> {
        serde_json::from_str(text)
    }
}
