//! `spanwise section`

use std::fs::File;
use std::io::{self, Read};
use std::path::Path;

use super::args::{Layout, SectionOptions};
use super::failure::Failure;
use super::output::{Files, Output};
use crate::airfoil::coordinates::{MAX_BYTES, write_blocks, write_loop};
use crate::airfoil::{Changes, Closing, Outline};
use crate::spec::AirfoilForm;
use crate::wing::{Refused, SectionAsk, section_drawing, section_record};
use crate::write::section_record::{json, table};

/// Decimals of the coordinates printed.
const DECIMALS: usize = 8;

/// Prints the figures of one section, or its coordinates.
pub(super) fn run(options: &SectionOptions, output: &Output) -> Result<bool, Failure> {
    let airfoil = options.airfoil.as_str();
    let ask = SectionAsk {
        text: airfoil,
        form: AirfoilForm::Either,
        changes: Changes {
            thickness: options.thickness,
            camber: options.camber,
            inverted: options.inverted,
            closing: options.sharp.then_some(Closing::Coefficient),
        },
        fairing: options.fairing,
    };
    let refused = |refused| Failure::Section {
        airfoil: airfoil.to_owned(),
        refused,
    };
    let loaded = ask.load(&|name| read(Path::new(name))).map_err(refused)?;
    let section = &loaded.section;
    if options.sharp && section.formula().is_none() {
        return Err(refused(Refused::NoSection {
            problem: "--sharp closes the formula of a designation, and this section is a file's".to_owned(),
            remedy: "Leave --sharp out; [trailing_edge] thickness = 0 closes a wing.".to_owned(),
        }));
    }
    let mut record = section_record(&loaded).map_err(|error| refused(error.into()))?;
    if let Some(path) = &options.svg {
        let name = path.file_name().ok_or_else(|| Failure::Write {
            path: path.clone(),
            source: io::Error::new(io::ErrorKind::InvalidInput, "this names no file"),
        })?;
        let name = name.to_string_lossy();
        let mut files = Files::open(path.parent().unwrap_or(Path::new("")))?;
        files.add(&name, section_drawing(section, &record).as_bytes())?;
        files.keep()?;
        record.files.insert("svg".to_owned(), name.into_owned());
    }
    let outline = options.points.map(|count| section.points(count));
    let text = match outline {
        Some(Outline { points, .. }) if output.json => {
            record.points = Some(points);
            json(&record)
        }
        Some(Outline { points, nose }) => match options.layout {
            Layout::Loop => write_loop(&section.name, &points, DECIMALS),
            Layout::Blocks => write_blocks(&section.name, &points, nose, DECIMALS),
        },
        None if output.json => json(&record),
        None => table(&record),
    };
    output.print(&text)?;
    Ok(true)
}

/// A coordinate file; of one that is too large only as much as shows it.
fn read(path: &Path) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    File::open(path)?
        .take(MAX_BYTES as u64 + 1)
        .read_to_end(&mut bytes)?;
    Ok(bytes)
}
