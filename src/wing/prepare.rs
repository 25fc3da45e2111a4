//! From texts to a resolved spec and its exact sections, or to every fault of both.

use std::io;
use std::sync::Arc;

use sha2::{Digest, Sha256};

use super::library::{Library, Loaded};
use super::source::{Refused, SectionAsk};
use crate::airfoil::{Changes, Closing, Profiles, Section};
use crate::spec::{self, AirfoilSource, Fault, SharpBy, Source, Spec, sort_faults};

/// A spec with its sections, ready to be built.
#[derive(Clone, Debug)]
pub struct Prepared {
    /// The resolved spec.
    pub spec: Spec,
    /// The different sections of the wing.
    pub sections: Vec<Section>,
    /// Which of them each station has, from the root outwards.
    pub chosen: Vec<usize>,
    /// What was found and done in coordinate files.
    pub notes: Vec<String>,
    /// SHA-256 of the spec, `--set` values included, and of the coordinate files it names; hexadecimal.
    pub hash: String,
    /// The sections' fit, where a library has it or could make it.
    pub(super) fitted: Option<Arc<Profiles>>,
}

/// Reads a spec and the sections it names. `open` reads a coordinate file, given its path as the spec has it.
///
/// # Errors
///
/// Every fault of the spec and of its sections, in the order of the file.
///
/// # Panics
///
/// Never: a reading without faults has a spec, and names each of its airfoils.
pub fn prepare(
    source: &Source<'_>,
    open: &dyn Fn(&str) -> io::Result<Vec<u8>>,
) -> Result<Prepared, Vec<Fault>> {
    prepare_with(source, &Library::new(open))
}

/// The same with sections and fits out of a library that other wings use too.
///
/// # Errors
///
/// As [`prepare`].
///
/// # Panics
///
/// Never, as [`prepare`].
pub fn prepare_with<F: Fn(&str) -> io::Result<Vec<u8>>>(
    source: &Source<'_>,
    library: &Library<F>,
) -> Result<Prepared, Vec<Fault>> {
    let reading = spec::read(source);
    let mut faults = reading.faults;
    let closing = closing(reading.spec.as_ref());
    let mut hash = Sha256::new();
    hash_part(&mut hash, reading.identity.as_bytes());
    let (mut keys, mut sections, mut notes) = (Vec::<String>::new(), Vec::new(), Vec::<String>::new());
    for airfoil in &reading.airfoils {
        let key = key(airfoil, closing);
        if keys.contains(&key) {
            continue;
        }
        keys.push(key.clone());
        match library.section(key, || load(airfoil, closing, &library.open)) {
            Ok(loaded) => {
                if let Some(bytes) = &loaded.bytes {
                    hash_part(&mut hash, airfoil.text.as_bytes());
                    hash_part(&mut hash, bytes);
                }
                sections.push(loaded.section.clone());
                // a file that is taken twice, with different changes, is described once
                for note in loaded
                    .notes
                    .iter()
                    .filter(|note| !notes.contains(note))
                    .cloned()
                    .collect::<Vec<_>>()
                {
                    notes.push(note);
                }
            }
            Err(fault) => faults.push(*fault),
        }
    }
    if !faults.is_empty() {
        sort_faults(&mut faults);
        return Err(faults);
    }
    let spec = reading.spec.expect("a reading without faults has a spec");
    let find = |airfoil: &AirfoilSource| keys.iter().position(|known| *known == key(airfoil, closing));
    let chosen = (std::iter::once(&spec.root_airfoil).chain(spec.panels.iter().map(|panel| &panel.airfoil)))
        .map(|airfoil| find(airfoil).expect("a reading names every airfoil of its spec"))
        .collect();
    // a fit that fails is tried again, and its failure reported, where the wing is built
    let fitted = library.fit(keys, &sections).ok();
    Ok(Prepared {
        spec,
        sections,
        chosen,
        notes,
        hash: (hash.finalize().iter())
            .map(|byte| format!("{byte:02x}"))
            .collect(),
        fitted,
    })
}

/// Adds one part, its length first, so that no two lists of parts are the same bytes.
fn hash_part(hash: &mut Sha256, part: &[u8]) {
    hash.update((part.len() as u64).to_le_bytes());
    hash.update(part);
}

/// The closing that a sharp trailing edge asks of formulas.
fn closing(spec: Option<&Spec>) -> Option<Closing> {
    let sharp = spec.filter(|spec| spec.trailing_edge == Some(0.0))?;
    Some(match sharp.sharp_by {
        SharpBy::Coefficient => Closing::Coefficient,
        SharpBy::Extension => Closing::Extension,
    })
}

/// What a section is known by: the same for the same section, whatever wing it is in.
fn key(airfoil: &AirfoilSource, closing: Option<Closing>) -> String {
    format!(
        "{:?} {:?} {closing:?} {}",
        airfoil.form, airfoil.changes, airfoil.text
    )
}

fn load(
    airfoil: &AirfoilSource,
    closing: Option<Closing>,
    open: &dyn Fn(&str) -> io::Result<Vec<u8>>,
) -> Result<Loaded, Box<Fault>> {
    let text = airfoil.text.as_str();
    let changes = &airfoil.changes;
    let ask = SectionAsk {
        text,
        form: airfoil.form,
        changes: Changes {
            thickness: changes.thickness,
            camber: changes.camber,
            inverted: changes.inverted,
            closing,
        },
        fairing: changes.fairing,
    };
    let loaded = ask.load(open).map_err(|refused| {
        let beside = if matches!(refused, Refused::Unread(_)) {
            " relative to the spec file"
        } else {
            ""
        };
        Box::new(Fault {
            place: airfoil.place.clone(),
            text: format!("\"{text}\""),
            problem: refused.to_string(),
            remedy: format!("{}{beside}", refused.remedy()),
        })
    })?;
    let said = [(text, &loaded.notes), (&loaded.section.name, &loaded.shape_notes)];
    Ok(Loaded {
        notes: (said.into_iter())
            .filter(|(_, of_it)| !of_it.is_empty())
            .map(|(name, of_it)| format!("{name}: {}", of_it.join(" ")))
            .collect(),
        section: loaded.section,
        bytes: loaded.bytes,
    })
}
