//! From the text that names a section to the section itself, with what is changed in it.

use std::io;

use thiserror::Error;

use crate::airfoil::{self, Changes, Section, coordinates};
use crate::spec::{AirfoilChanges, AirfoilForm};

/// A section that is asked for.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct SectionAsk<'a> {
    /// A designation, or the path of a coordinate file.
    pub text: &'a str,
    /// Which of the two it is.
    pub form: AirfoilForm,
    /// What is changed in it; the closing goes to formulas only.
    pub changes: Changes,
    /// How far smoothing may move a point of a coordinate file \[chord\].
    pub fairing: Option<f64>,
}

/// A section with what its file says.
#[derive(Clone, Debug)]
pub struct LoadedSection {
    /// The section, named as it was asked for, with its changes.
    pub section: Section,
    /// The title of its coordinate file.
    pub title: Option<String>,
    /// What was found and done in the file, a sentence each.
    pub notes: Vec<String>,
    /// How far smoothing moved points, and waves; a sentence each.
    pub shape_notes: Vec<String>,
    /// The bytes of its coordinate file.
    pub bytes: Option<Vec<u8>>,
}

/// Why there is no such section.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Refused {
    /// The coordinate file cannot be read.
    #[error("the coordinate file cannot be read: {0}")]
    Unread(io::Error),
    /// What was read is no section, or one that cannot be changed like that.
    #[error("{problem}")]
    NoSection {
        /// File and line with its text where there is one, and the reason.
        problem: String,
        /// What to change; empty where the reason says it.
        remedy: String,
    },
}

impl Refused {
    /// What to change.
    pub fn remedy(&self) -> &str {
        match self {
            Self::Unread(_) => "give a designation such as \"NACA 2412\", or the path of a coordinate file",
            Self::NoSection { remedy, .. } => remedy,
        }
    }
}

impl From<airfoil::Error> for Refused {
    fn from(error: airfoil::Error) -> Self {
        Self::NoSection {
            problem: error.to_string(),
            remedy: String::new(),
        }
    }
}

impl SectionAsk<'_> {
    /// The section. `open` reads a coordinate file, given its path as the text has it.
    ///
    /// # Errors
    ///
    /// [`Refused`] where there is none.
    pub fn load(&self, open: &dyn Fn(&str) -> io::Result<Vec<u8>>) -> Result<LoadedSection, Refused> {
        let by_formula = match self.form {
            AirfoilForm::Either => airfoil::is_designation(self.text),
            AirfoilForm::Designation => true,
            AirfoilForm::File => false,
        };
        let mut loaded = if by_formula {
            self.formula()?
        } else {
            self.points(open)?
        };
        loaded.section.name = AirfoilChanges {
            thickness: self.changes.thickness,
            camber: self.changes.camber,
            inverted: self.changes.inverted,
            fairing: self.fairing,
        }
        .name(self.text);
        Ok(loaded)
    }

    fn formula(&self) -> Result<LoadedSection, Refused> {
        if self.fairing.is_some() {
            return Err(Refused::NoSection {
                problem: "fairing smooths the points of a coordinate file, and this section is a formula"
                    .to_owned(),
                remedy: "Leave fairing out.".to_owned(),
            });
        }
        let formula = airfoil::parse(self.text).map_err(|unknown| Refused::NoSection {
            problem: unknown.reason,
            remedy: unknown.remedy,
        })?;
        let mut section = Section::from_formula(self.text, formula)?;
        if self.changes != Changes::default() {
            section = section.with(&self.changes)?;
        }
        Ok(LoadedSection {
            section,
            title: None,
            notes: Vec::new(),
            shape_notes: Vec::new(),
            bytes: None,
        })
    }

    fn points(&self, open: &dyn Fn(&str) -> io::Result<Vec<u8>>) -> Result<LoadedSection, Refused> {
        let bytes = open(self.text).map_err(Refused::Unread)?;
        let contour = coordinates::read(&bytes, self.text).map_err(|e| {
            let line = if e.line() > 0 {
                format!(":{}", e.line())
            } else {
                String::new()
            };
            let typed = if e.text().is_empty() {
                String::new()
            } else {
                format!(" (`{}`)", e.text().trim())
            };
            Refused::NoSection {
                problem: format!("{}{line}{typed}: {}", self.text, e.reason()),
                remedy: e.remedy().to_owned(),
            }
        })?;
        let mut section = match self.fairing {
            Some(fairing) => Section::faired(self.text, &contour, fairing)?,
            None => Section::from_contour(self.text, &contour)?,
        };
        let changes = Changes {
            closing: None,
            ..self.changes
        };
        let mut shape_notes = Vec::new();
        if self.fairing.is_some() {
            shape_notes.push(format!(
                "Smoothing moved no point by more than {:.1e} of the chord.",
                section.deviation
            ));
        }
        if changes != Changes::default() {
            section = section.with(&changes)?;
        }
        shape_notes.extend(waves(&section, self.fairing.is_some()));
        Ok(LoadedSection {
            section,
            title: Some(contour.title),
            notes: contour.notes,
            shape_notes,
            bytes: Some(bytes),
        })
    }
}

/// What to say of a section with waves.
fn waves(section: &Section, faired: bool) -> Option<String> {
    let waviness = section.waviness();
    let advice = if faired {
        "Allow more fairing, or check the points."
    } else {
        "A fairing of 2e-4 smooths it within 2e-4 of the chord."
    };
    (waviness.excess() > 0).then(|| {
        format!(
            "Wavy: its curvature changes sign {} times above and {} times below, {} more than a section should have. {advice}",
            waviness.upper,
            waviness.lower,
            waviness.excess()
        )
    })
}
