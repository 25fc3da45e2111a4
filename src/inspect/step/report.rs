//! What was found in a STEP file, in the file's own length unit.

use serde::Serialize;

use crate::inspect::Finding;

/// What was found in a STEP file. Lengths, areas and volumes are in `unit` and its powers, angles in degrees.
#[derive(Clone, Debug, Default, Serialize)]
pub struct StepReport {
    /// The schema as the header names it.
    pub schema: String,
    /// The program that wrote it.
    pub program: String,
    /// The time stamp as written.
    pub time_stamp: String,
    /// Symbol of the length unit; empty where the file states none.
    pub unit: String,
    /// Distances below this don't count, as the file states.
    pub uncertainty: Option<f64>,
    /// Number of instances.
    pub instances: usize,
    /// Products.
    pub products: Vec<Product>,
    /// Solids.
    pub solids: Vec<Solid>,
    /// Reference lines.
    pub lines: Vec<Line>,
    /// Reference points.
    pub points: Vec<Point>,
    /// User-defined attributes.
    pub attributes: Vec<Attribute>,
    /// Layers.
    pub layers: Vec<Layer>,
    /// Different colours.
    pub colours: usize,
    /// Entities that were not read, with how many instances there are.
    pub not_read: Vec<NotRead>,
    /// What could not be looked at, and why.
    pub notes: Vec<String>,
    /// Where the file disagrees with itself.
    pub findings: Vec<Finding>,
}

/// A product.
#[derive(Clone, Debug, Serialize)]
pub struct Product {
    /// Its identifier.
    pub id: String,
    /// Its name.
    pub name: String,
    /// Its description.
    pub description: String,
}

/// A solid.
#[derive(Clone, Debug, Serialize)]
pub struct Solid {
    /// Its name.
    pub name: String,
    /// Name of the product it is the shape of; empty where it is of none.
    pub product: String,
    /// Its faces.
    pub faces: Vec<Face>,
    /// Number of edges.
    pub edges: usize,
    /// Number of vertices.
    pub vertices: usize,
    /// True where every edge is used exactly twice, in opposite senses.
    pub closed: bool,
    /// As integrated from the file's numbers; `None` where a face could not be.
    pub measured: Option<Figures>,
    /// As the file's validation properties state.
    pub stated: Stated,
}

/// A face.
#[derive(Clone, Debug, Serialize)]
pub struct Face {
    /// Its name.
    pub name: String,
    /// `plane`, `B-spline`, `rational B-spline`, or the entity's name.
    pub surface: String,
    /// Its area; `None` where it could not be integrated.
    pub area: Option<f64>,
}

/// Figures of a solid.
#[derive(Clone, Copy, Debug, Serialize)]
pub struct Figures {
    /// Volume.
    pub volume: f64,
    /// Area of all faces.
    pub area: f64,
    /// Centroid.
    pub centroid: [f64; 3],
    /// Lowest and highest corner of the box about vertices and edges.
    pub bounds: [[f64; 3]; 2],
}

/// Validation properties.
#[derive(Clone, Copy, Debug, Default, Serialize)]
pub struct Stated {
    /// Volume.
    pub volume: Option<f64>,
    /// Area.
    pub area: Option<f64>,
    /// Centroid.
    pub centroid: Option<[f64; 3]>,
    /// Corners of the box.
    pub bounds: Option<[[f64; 3]; 2]>,
}

/// A reference line.
#[derive(Clone, Debug, Serialize)]
pub struct Line {
    /// Its name.
    pub name: String,
    /// Its kind: the name of its layer in small letters.
    pub kind: String,
    /// Its length.
    pub length: f64,
    /// Its corners.
    pub points: Vec<[f64; 3]>,
    /// Its colour, red, green and blue from 0 to 1.
    pub colour: Option<[f64; 3]>,
    /// Its font, such as `dashed`.
    pub font: String,
}

/// A reference point.
#[derive(Clone, Debug, Serialize)]
pub struct Point {
    /// Its name.
    pub name: String,
    /// Where it is.
    pub at: [f64; 3],
}

/// An attribute.
#[derive(Clone, Debug, Serialize)]
pub struct Attribute {
    /// Its name.
    pub name: String,
    /// Its value.
    pub value: AttributeValue,
    /// Its unit's symbol; empty for counts, ratios and texts.
    pub unit: String,
}

/// An attribute's value.
#[derive(Clone, Debug, Serialize)]
#[serde(untagged)]
pub enum AttributeValue {
    /// A number.
    Number(f64),
    /// A text.
    Text(String),
}

/// A layer.
#[derive(Clone, Debug, Serialize)]
pub struct Layer {
    /// Its name.
    pub name: String,
    /// What is on it.
    pub description: String,
    /// How many items.
    pub items: usize,
}

/// An entity that was not read.
#[derive(Clone, Debug, Serialize)]
pub struct NotRead {
    /// Its name.
    pub entity: String,
    /// How many instances.
    pub count: usize,
}
