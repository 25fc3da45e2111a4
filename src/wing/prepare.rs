//! From texts to a resolved spec and its exact sections, or to every fault of both.

use std::io;
use std::sync::Arc;

use sha2::{Digest, Sha256};

use super::library::{Library, Loaded};
use crate::airfoil::{self, Closing, Profiles, Section, coordinates};
use crate::spec::{self, AirfoilSource, Fault, Source, Spec, sort_faults};

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
    let sharp = reading
        .spec
        .as_ref()
        .is_some_and(|spec| spec.trailing_edge == Some(0.0));
    let mut hash = Sha256::new();
    hash_part(&mut hash, reading.identity.as_bytes());
    let (mut texts, mut sections, mut notes) = (Vec::<String>::new(), Vec::new(), Vec::new());
    for airfoil in &reading.airfoils {
        if texts.contains(&airfoil.text) {
            continue;
        }
        texts.push(airfoil.text.clone());
        match library.section(&airfoil.text, sharp, || load(airfoil, sharp, &library.open)) {
            Ok(loaded) => {
                if let Some(bytes) = &loaded.bytes {
                    hash_part(&mut hash, airfoil.text.as_bytes());
                    hash_part(&mut hash, bytes);
                }
                sections.push(loaded.section.clone());
                notes.extend(loaded.note.clone());
            }
            Err(fault) => faults.push(*fault),
        }
    }
    if !faults.is_empty() {
        sort_faults(&mut faults);
        return Err(faults);
    }
    let spec = reading.spec.expect("a reading without faults has a spec");
    let find = |airfoil: &AirfoilSource| texts.iter().position(|text| *text == airfoil.text);
    let chosen = (std::iter::once(&spec.root_airfoil).chain(spec.panels.iter().map(|panel| &panel.airfoil)))
        .map(|airfoil| find(airfoil).expect("a reading names every airfoil of its spec"))
        .collect();
    // a fit that fails is tried again, and its failure reported, where the wing is built
    let fitted = library.fit(texts, sharp, &sections).ok();
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

fn load(
    airfoil: &AirfoilSource,
    sharp: bool,
    open: &dyn Fn(&str) -> io::Result<Vec<u8>>,
) -> Result<Loaded, Box<Fault>> {
    let text = airfoil.text.as_str();
    let fault = |problem: String, remedy: String| {
        Box::new(Fault {
            place: airfoil.place.clone(),
            text: format!("\"{text}\""),
            problem,
            remedy,
        })
    };
    if airfoil::is_designation(text) {
        let mut formula = airfoil::parse(text).map_err(|unknown| fault(unknown.reason, unknown.remedy))?;
        if sharp {
            formula.thickness.closing = Closing::Coefficient;
        }
        let section =
            Section::from_formula(text, formula).map_err(|e| fault(e.to_string(), String::new()))?;
        return Ok(Loaded {
            section,
            note: None,
            bytes: None,
        });
    }
    let bytes = open(text).map_err(|e| {
        fault(
            format!("the coordinate file cannot be read: {e}"),
            "give a designation such as \"NACA 2412\", or the path of a coordinate file relative to the spec file".into(),
        )
    })?;
    let contour = coordinates::read(&bytes, text).map_err(|e| {
        let place = if e.line() > 0 {
            format!(":{}", e.line())
        } else {
            String::new()
        };
        let typed = if e.text().is_empty() {
            String::new()
        } else {
            format!(" (`{}`)", e.text().trim())
        };
        fault(
            format!("{text}{place}{typed}: {}", e.reason()),
            e.remedy().to_owned(),
        )
    })?;
    let section = Section::from_contour(text, &contour).map_err(|e| fault(e.to_string(), String::new()))?;
    let note = (!contour.notes.is_empty())
        .then(|| format!("{text}: {}.", contour.notes.join("; ").trim_end_matches('.')));
    Ok(Loaded {
        section,
        note,
        bytes: Some(bytes),
    })
}
