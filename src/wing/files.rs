//! The files of a wing, as bytes.

use super::{Error, Wing};
use crate::mesh::Mesh;
use crate::spec::AirfoilSource;
use crate::spec::{StepReference, StepSchema};
use crate::write::step::{Attribute, Document, Properties, ReferenceForm, Schema, Value};
use crate::write::{step, stl};

/// Description of the product in the STEP file where the spec has none.
const DESCRIPTION: &str = "wing solid with its reference geometry, made by spanwise";

/// A kind of file.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// The exact solid.
    Step,
    /// The facets.
    Stl,
    /// The figures.
    Json,
    /// The dimensioned drawing.
    Drawing,
    /// The report page.
    Report,
}

impl Kind {
    /// All kinds, in the order they are written.
    pub const ALL: [Self; 5] = [Self::Step, Self::Stl, Self::Json, Self::Drawing, Self::Report];

    /// The kinds that are written where none are named.
    pub const USUAL: [Self; 3] = [Self::Step, Self::Stl, Self::Json];

    /// The kinds that are written where these are named: the usual ones where none is.
    pub fn chosen(named: &[Self]) -> Vec<Self> {
        let wanted = if named.is_empty() { &Self::USUAL } else { named };
        Self::ALL
            .into_iter()
            .filter(|kind| wanted.contains(kind))
            .collect()
    }

    /// Its name on the command line and in the figures.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Step => "step",
            Self::Stl => "stl",
            Self::Json => "json",
            Self::Drawing => "drawing",
            Self::Report => "report",
        }
    }

    /// Ending of its file's name.
    pub const fn ending(self) -> &'static str {
        match self {
            Self::Drawing => "svg",
            Self::Report => "html",
            _ => self.name(),
        }
    }
}

/// What the files' contents depend on beside the wing.
#[derive(Clone, Copy, Debug)]
pub struct Options<'a> {
    /// Time stamp of the STEP file, ISO 8601 without zone.
    pub time_stamp: &'a str,
    /// Identifier of the part: the stem of the files' names.
    pub id: &'a str,
}

impl<'a> Options<'a> {
    /// The stamp of files that no date was given for.
    pub const UNDATED: &'static str = "2025-01-01T00:00:00";

    /// The date that people read on drawing and report: none where none was given.
    pub fn date(&self) -> Option<&'a str> {
        let (date, _) = self.time_stamp.split_once('T')?;
        (self.time_stamp != Self::UNDATED).then_some(date)
    }
}

impl Wing {
    /// The STEP file.
    ///
    /// # Errors
    ///
    /// [`Error::Step`] where a text cannot be said in STEP.
    pub fn step(&self, options: Options<'_>) -> Result<Vec<u8>, Error> {
        let properties: Vec<Properties> = (self.figures.iter())
            .map(|figures| Properties {
                volume: figures.volume,
                area: figures.surface_area,
                centroid: figures.centroid,
                corners: [figures.least, figures.greatest],
            })
            .collect();
        let attributes = self.attributes();
        let document = Document {
            id: options.id,
            name: &self.spec.name,
            description: self.spec.description.as_deref().unwrap_or(DESCRIPTION),
            unit: self.spec.unit,
            schema: match self.spec.step.schema {
                StepSchema::Ap242 => Schema::Ap242,
                StepSchema::Ap214 => Schema::Ap214,
            },
            reference_form: match self.spec.step.reference {
                StepReference::Both => ReferenceForm::Both,
                StepReference::Construction => ReferenceForm::Construction,
                StepReference::Wireframe => ReferenceForm::Wireframe,
                StepReference::Parts => ReferenceForm::Parts,
                StepReference::None => ReferenceForm::None,
            },
            solids: &self.solids,
            properties: &properties,
            reference: &self.reference,
            attributes: &attributes,
            time_stamp: options.time_stamp,
        };
        let mut bytes = Vec::with_capacity(1 << 16);
        step::write(&document, &mut bytes)?;
        Ok(bytes)
    }

    /// The STL files: one a solid, because STL cannot tell two solids that touch apart.
    ///
    /// # Panics
    ///
    /// Never: a vector takes all bytes.
    pub fn stl(&self) -> Vec<Vec<u8>> {
        let write = |mesh: &Mesh| {
            let mut bytes = Vec::with_capacity(84 + 50 * mesh.facets.len());
            stl::write(mesh, self.spec.unit.millimetres(), &mut bytes).expect("a vector takes all bytes");
            bytes
        };
        self.meshes.iter().map(write).collect()
    }

    /// Names of the files of a kind, each with its key in the figures: one, or an STL file for each solid of a pair.
    pub fn names(&self, kind: Kind, stem: &str) -> Vec<(String, String)> {
        let (name, ending) = (kind.name(), kind.ending());
        if kind == Kind::Stl && self.solids.len() == 2 {
            return vec![
                (name.to_owned(), format!("{stem}-starboard.{ending}")),
                (format!("{name}_port"), format!("{stem}-port.{ending}")),
            ];
        }
        vec![(name.to_owned(), format!("{stem}.{ending}"))]
    }

    /// Figures that go into the STEP file as attributes.
    fn attributes(&self) -> Vec<Attribute> {
        let wing = &self.planform.wing;
        let attribute = |name: &str, value: Value| Attribute {
            name: name.to_owned(),
            value,
        };
        let mut attributes = vec![
            attribute("reference span", Value::Length(wing.span)),
            attribute("reference area", Value::Area(wing.area)),
            attribute("aspect ratio", Value::Ratio(wing.aspect_ratio())),
            attribute("taper ratio", Value::Ratio(wing.taper_ratio())),
            attribute("mean aerodynamic chord", Value::Length(wing.mac.length)),
            attribute(
                "incidence at the mean aerodynamic chord",
                Value::Angle(wing.mac.incidence),
            ),
            attribute(
                "incidence at the root",
                Value::Angle(self.planform.stations[0].incidence),
            ),
            attribute(
                "section fit deviation of the chord",
                Value::Ratio(self.section_deviation),
            ),
        ];
        let airfoils =
            std::iter::once(&self.spec.root_airfoil).chain(self.spec.panels.iter().map(|p| &p.airfoil));
        let mut texts: Vec<String> = airfoils.map(AirfoilSource::name).collect();
        texts.dedup();
        let sections = Value::Text(in_ascii(&texts.join(", ")));
        attributes.push(attribute("sections from root to tip", sections));
        attributes.push(attribute(
            "spec hash, SHA-256",
            Value::Text(self.spec_hash.clone()),
        ));
        attributes
    }
}

/// A text in printable ASCII, which is all that readers decode in an attribute: any other character as its code point,
/// such as `<U+03B1>`.
fn in_ascii(text: &str) -> String {
    let put = |c: char| match c {
        ' '..='~' => c.to_string(),
        _ => format!("<U+{:04X}>", u32::from(c)),
    };
    text.chars().map(put).collect()
}

#[cfg(test)]
mod tests {
    use super::in_ascii;

    #[test]
    fn text_in_attributes_is_ascii_and_nothing_is_lost() {
        assert_eq!(in_ascii("it's a\\b, NACA 2412"), "it's a\\b, NACA 2412");
        assert_eq!(in_ascii("flügel α\u{1F426}"), "fl<U+00FC>gel <U+03B1><U+1F426>");
    }
}
