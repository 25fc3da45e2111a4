//! STEP: the solid, its reference geometry, validation properties and attributes as an ISO 10303-21 file after AP242
//! (ISO 10303-242:2014) or AP214.
//!
//! Lengths are millimetres in the [`Document`] and stand in the file in its unit. Text outside printable ASCII is
//! escaped in names; in an attribute's text it is refused, as readers decode it wrongly there. Equal documents give
//! equal bytes.
//!
//! The kernel's own STEP output is used for truth values and lists of references and integers. Its numbers (eleven
//! digits below 0.01) and its unescaped text are not.

mod entity;
mod error;
mod geometry;
mod part21;
mod presentation;
mod product;
mod property;
mod reference;
pub(crate) mod schema;
mod shape;
mod style;
#[cfg(test)]
mod test;
mod text;
mod units;

use std::io::{BufWriter, Write};

use nalgebra::Point3;

use crate::planform::Reference;
use crate::solid::Solid;
use crate::spec::Unit;

pub use error::Error;

use part21::{Exchange, Id, Parameter};
use presentation::Presentation;
use product::{Component, Contexts, Product, write_assembly, write_origin};
use property::{write_attributes, write_properties};
use reference::write_reference;
use shape::write_solid;
use units::Units;

/// What headers name the schemas: AP242, AP214.
pub(crate) const SCHEMAS: [&str; 2] = [
    "AP242_MANAGED_MODEL_BASED_3D_ENGINEERING_MIM_LF { 1 0 10303 442 1 1 4 }",
    "AUTOMOTIVE_DESIGN { 1 0 10303 214 1 1 1 1 }",
];

/// What a STEP file holds.
#[derive(Clone, Copy, Debug)]
pub struct Document<'a> {
    /// The product's identifier; those of an assembly's parts begin with it.
    pub id: &'a str,
    /// The product's name.
    pub name: &'a str,
    /// The product's description.
    pub description: &'a str,
    /// The unit of all lengths in the file.
    pub unit: Unit,
    /// The application protocol.
    pub schema: Schema,
    /// How the reference lines and points are written.
    pub reference_form: ReferenceForm,
    /// The solids, at least one, each a part. Several parts make an assembly.
    pub solids: &'a [Solid],
    /// The solids' validation properties, in the solids' order.
    pub properties: &'a [Properties],
    /// Reference lines and points.
    pub reference: &'a Reference,
    /// Attributes of the whole.
    pub attributes: &'a [Attribute],
    /// The time stamp, as ISO 8601 has it: `2026-01-31T12:00:00`.
    pub time_stamp: &'a str,
}

/// The application protocol that a file follows.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Schema {
    /// AP242 edition 1, ISO 10303-242:2014 (default).
    #[default]
    Ap242,
    /// AP214 edition 1, ISO 10303-214:2001, for older readers.
    Ap214,
}

/// How reference lines and points are written.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum ReferenceForm {
    /// As construction geometry and as a wireframe of the same curves, for readers that know no construction geometry
    /// (default).
    #[default]
    Both,
    /// As construction geometry only: the plain solid is the part's whole shape.
    Construction,
    /// As a wireframe beside the solid.
    Wireframe,
    /// As parts of an assembly, one a line: keeps the names in most readers.
    Parts,
    /// Not at all.
    None,
}

impl ReferenceForm {
    const fn has_construction(self) -> bool {
        matches!(self, Self::Both | Self::Construction)
    }

    const fn has_wireframe(self) -> bool {
        matches!(self, Self::Both | Self::Wireframe)
    }
}

/// What a reader should find when it measures a solid.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Properties {
    /// \[mm³\]
    pub volume: f64,
    /// Surface area \[mm²\].
    pub area: f64,
    /// \[mm\]
    pub centroid: Point3<f64>,
    /// Lowest and highest corner of the box around vertices and edges \[mm\].
    pub corners: [Point3<f64>; 2],
}

/// A named figure or text of the whole.
#[derive(Clone, Debug, PartialEq)]
pub struct Attribute {
    /// Such as `mean aerodynamic chord`.
    pub name: String,
    /// Its value.
    pub value: Value,
}

/// An attribute's value.
#[derive(Clone, Debug, PartialEq)]
pub enum Value {
    /// \[mm\]
    Length(f64),
    /// \[mm²\]
    Area(f64),
    /// \[rad\]; degrees in the file.
    Angle(f64),
    /// \[-\]
    Ratio(f64),
    /// \[-\]
    Count(u32),
    /// Printable ASCII.
    Text(String),
}

/// Writes a document, in one pass and as it goes.
///
/// # Errors
/// What the document holds can't be written ([`Error`] says what), or `out` can't take it. The counts and the
/// attributes' texts are checked before the first byte, the rest on the way.
pub fn write(document: &Document<'_>, out: &mut impl Write) -> Result<(), Error> {
    check(document)?;
    let mut out = begin(document, BufWriter::new(out))?;
    let contexts = Contexts::write(&mut out, document.schema)?;
    let units = Units::write(&mut out, document.unit)?;
    let mut writer = Writer {
        document,
        contexts,
        units,
        out,
        presentation: Presentation::default(),
    };
    let whole = writer.write_shape()?;
    let Writer {
        mut out,
        presentation,
        ..
    } = writer;
    presentation.write(&mut out, units)?;
    write_attributes(&mut out, units, document.schema, whole, document.attributes)?;
    out.end()
}

/// The counts and texts that can be checked before anything is written.
fn check(document: &Document<'_>) -> Result<(), Error> {
    let (solids, properties) = (document.solids.len(), document.properties.len());
    if solids == 0 {
        return Err(Error::NoSolid);
    }
    if solids != properties {
        return Err(Error::Properties { solids, properties });
    }
    for Attribute { name, value } in document.attributes {
        let Value::Text(text) = value else { continue };
        if let Some((i, character)) = text.chars().enumerate().find(|(_, c)| !matches!(c, ' '..='~')) {
            return Err(Error::AttributeText {
                name: name.clone(),
                character,
                at: i + 1,
            });
        }
    }
    Ok(())
}

/// Writes the header. Its strings hold at most 256 characters (ISO 10303-21:2002): a description is cut into
/// several, a name is cut off (it is whole in the product).
fn begin<W: Write>(document: &Document<'_>, out: W) -> Result<Exchange<W>, Error> {
    const LONGEST: usize = 256;
    const PRACTICE: &str =
        "CAx-IF Rec.Pracs.---Geometric and Assembly Validation Properties---4.6---2023-04-21";
    const VERSION: &str = concat!(env!("CARGO_PKG_NAME"), " ", env!("CARGO_PKG_VERSION"));
    let characters: Vec<char> = document.description.chars().collect();
    let mut description: Vec<String> = characters
        .chunks(LONGEST)
        .map(|part| part.iter().collect())
        .collect();
    description.push(PRACTICE.to_owned());
    let description: Vec<&str> = description.iter().map(String::as_str).collect();
    let name: String = document.name.chars().take(LONGEST).collect();
    let schema = [match document.schema {
        Schema::Ap242 => SCHEMAS[0],
        Schema::Ap214 => SCHEMAS[1],
    }];
    let program = env!("CARGO_PKG_NAME");
    let file_name: [&dyn Parameter; 7] = [
        &name.as_str(),
        &document.time_stamp,
        &[""],
        &[""],
        &VERSION,
        &program,
        &"",
    ];
    let header = [
        ("FILE_DESCRIPTION", &[&description as &dyn Parameter, &"2;1"][..]),
        ("FILE_NAME", &file_name[..]),
        ("FILE_SCHEMA", &[&schema as &dyn Parameter][..]),
    ];
    Exchange::begin(out, &header)
}

/// Name of the reference geometry as a whole.
const REFERENCE: &str = "reference geometry";

/// A document on its way out.
struct Writer<'a, W> {
    document: &'a Document<'a>,
    contexts: Contexts,
    units: Units,
    out: Exchange<W>,
    presentation: Presentation,
}

impl<W: Write> Writer<'_, W> {
    /// Writes parts, assembly and reference geometry, and gives the product that is the whole.
    fn write_shape(&mut self) -> Result<Product, Error> {
        let document = self.document;
        let lines = match document.reference_form {
            ReferenceForm::None => Vec::new(),
            _ => write_reference(
                &mut self.out,
                self.units,
                document.reference,
                &mut self.presentation,
            )?,
        };
        let items: Vec<Id> = lines.iter().flat_map(|line| line.items.iter().copied()).collect();
        let form = if items.is_empty() {
            ReferenceForm::None
        } else {
            document.reference_form
        };
        if let ([solid], [properties]) = (document.solids, document.properties)
            && form != ReferenceForm::Parts
        {
            let part = self.part(
                document.id,
                document.name,
                document.description,
                solid,
                properties,
            )?;
            if form.has_construction() {
                self.add_construction(&items, part.representation)?;
            }
            if form.has_wireframe() {
                self.add_wireframe(&items, part.representation)?;
            }
            return Ok(part.product);
        }
        let mut components = Vec::new();
        for (i, (solid, properties)) in document.solids.iter().zip(document.properties).enumerate() {
            let id = format!("{} / solid {}", document.id, i + 1);
            components.push(self.part(&id, &solid.name, "", solid, properties)?);
        }
        if form == ReferenceForm::Parts {
            for (i, line) in lines.iter().enumerate() {
                let id = format!("{} / reference {}", document.id, i + 1);
                components.push(self.line_part(&id, line.name, &line.items)?);
            }
        } else if form.has_wireframe() {
            // an assembly has no shape of its own beside its parts, so the wireframe is one of them
            let id = format!("{} / reference", document.id);
            components.push(self.line_part(&id, REFERENCE, &items)?);
        }
        let Document {
            id,
            name,
            description,
            ..
        } = *document;
        let whole = Product::write(&mut self.out, self.contexts, id, name, description)?;
        let representation = write_assembly(&mut self.out, self.units, whole, name, &components)?;
        if form.has_construction() {
            self.add_construction(&items, representation)?;
        }
        Ok(whole)
    }

    /// Writes a part that is a solid.
    fn part(
        &mut self,
        id: &str,
        name: &str,
        description: &str,
        solid: &Solid,
        properties: &Properties,
    ) -> Result<Component, Error> {
        let out = &mut self.out;
        let product = Product::write(out, self.contexts, id, name, description)?;
        let body = write_solid(out, self.units, solid, &mut self.presentation)?;
        let origin = write_origin(out)?;
        let representation = out.solid_representation(&solid.name, [origin, body], self.units.context)?;
        out.shape_of(product.shape, representation)?;
        write_properties(out, self.units, product, properties)?;
        Ok(Component {
            name: name.to_owned(),
            product,
            representation,
            origin,
        })
    }

    /// Writes a part that is reference geometry.
    fn line_part(&mut self, id: &str, name: &str, items: &[Id]) -> Result<Component, Error> {
        let out = &mut self.out;
        let product = Product::write(out, self.contexts, id, name, "")?;
        let origin = write_origin(out)?;
        let set = out.curve_set(name, items)?;
        let representation = out.wireframe_representation(name, &[set, origin], self.units.context)?;
        out.shape_of(product.shape, representation)?;
        Ok(Component {
            name: name.to_owned(),
            product,
            representation,
            origin,
        })
    }

    /// Adds reference geometry to a shape as its construction geometry.
    fn add_construction(&mut self, items: &[Id], shape: Id) -> Result<(), Error> {
        let construction = self
            .out
            .construction_representation(REFERENCE, items, self.units.context)?;
        self.out.construction_of(REFERENCE, shape, construction)?;
        Ok(())
    }

    /// Adds reference geometry to a shape as a wireframe beside it.
    fn add_wireframe(&mut self, items: &[Id], shape: Id) -> Result<(), Error> {
        let set = self.out.curve_set(REFERENCE, items)?;
        let wireframe = self
            .out
            .wireframe_representation(REFERENCE, &[set], self.units.context)?;
        self.out.wireframe_of(REFERENCE, shape, wireframe)?;
        Ok(())
    }
}
