//! Where a section's shape comes from, and what the spec changes in it.

use super::fault::Place;

/// Where a section's shape comes from, as the spec states it.
#[derive(Clone, Debug, PartialEq)]
pub struct AirfoilSource {
    /// The text as typed: a designation such as `NACA 2412`, or a path relative to the spec file.
    pub text: String,
    /// Which of the two it is.
    pub form: AirfoilForm,
    /// What is changed in the section.
    pub changes: AirfoilChanges,
    /// Where the text was typed.
    pub place: Place,
}

impl AirfoilSource {
    /// The text with what is changed, as in `NACA 2412 (thickness 10 %, inverted)`.
    pub fn name(&self) -> String {
        self.changes.name(&self.text)
    }
}

/// What an airfoil's text is.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum AirfoilForm {
    /// What it looks like: `root = "…"`.
    #[default]
    Either,
    /// A designation: `{ naca = "…" }`.
    Designation,
    /// A coordinate file: `{ file = "…" }`.
    File,
}

/// What the spec changes in a section.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct AirfoilChanges {
    /// Greatest thickness \[chord\], 0.01 to 0.40.
    pub thickness: Option<f64>,
    /// Greatest camber \[chord\], 0 to 0.15.
    pub camber: Option<f64>,
    /// Turned upside down.
    pub inverted: bool,
    /// How far smoothing may move a point of a coordinate file \[chord\].
    pub fairing: Option<f64>,
}

impl AirfoilChanges {
    /// The name of a section with these changes.
    pub fn name(&self, text: &str) -> String {
        let part = |what: &str, value: f64| format!("{what} {} %", (value * 1e6).round() / 1e4);
        let changed: Vec<String> = [
            self.thickness.map(|value| part("thickness", value)),
            self.camber.map(|value| part("camber", value)),
            self.inverted.then(|| "inverted".to_owned()),
            self.fairing.map(|value| format!("faired within {value:.1e}")),
        ]
        .into_iter()
        .flatten()
        .collect();
        if changed.is_empty() {
            text.to_owned()
        } else {
            format!("{text} ({})", changed.join(", "))
        }
    }
}

/// How the formula of a section is closed to a sharp trailing edge.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum SharpBy {
    /// By the last coefficient of the thickness form (default).
    #[default]
    Coefficient,
    /// By continuing the form to where it ends on a point, and scaling back to unit chord.
    Extension,
}
