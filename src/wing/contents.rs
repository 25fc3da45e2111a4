//! All files of a wing at once.

use std::collections::BTreeMap;

use super::{Error, Kind, Options, Wing};
use crate::write::record::{self, Record};

/// What a wing's files hold.
#[derive(Clone, Debug)]
pub struct Contents {
    /// The figures, with the names of the files.
    pub record: Record,
    /// Name and bytes of each file.
    pub files: Vec<(String, Vec<u8>)>,
}

impl Wing {
    /// The files of some kinds, named after [`Options::id`], and the figures that go with them.
    ///
    /// # Errors
    ///
    /// [`Error::Step`] where a text cannot be said in STEP.
    pub fn contents(&self, kinds: &[Kind], options: Options<'_>) -> Result<Contents, Error> {
        let names: Vec<_> = kinds
            .iter()
            .map(|kind| (*kind, self.names(*kind, options.id)))
            .collect();
        let all: BTreeMap<String, String> = names.iter().flat_map(|(_, names)| names.clone()).collect();
        let record = self.record(all);
        let mut files = Vec::new();
        for (kind, names) in names {
            let contents = match kind {
                Kind::Step => vec![self.step(options)?],
                Kind::Stl => self.stl(),
                Kind::Json => vec![record::json(&record).into_bytes()],
                Kind::Drawing => vec![self.drawing(options.date())],
                Kind::Report => vec![self.report(options.date())],
            };
            files.extend(names.into_iter().map(|(_, name)| name).zip(contents));
        }
        Ok(Contents { record, files })
    }
}
