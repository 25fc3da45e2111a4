//! Why a document can't be written as STEP.

use thiserror::Error;

/// Why a document can't be written as STEP. What was written before an error is no whole file.
#[derive(Debug, Error)]
#[non_exhaustive]
pub enum Error {
    /// The output can't take the bytes.
    #[error("can't write the STEP file: {0}")]
    Output(#[from] std::io::Error),
    /// There is nothing to write.
    #[error("no solid to write: a STEP file needs at least one")]
    NoSolid,
    /// Solids and their validation properties don't match.
    #[error("{solids} solids, but validation properties for {properties}: one set a solid is needed")]
    Properties {
        /// Number of solids.
        solids: usize,
        /// Number of sets of properties.
        properties: usize,
    },
    /// A solid is not one closed shell.
    #[error("solid `{solid}` has {shells} shells: exactly one is written")]
    Shells {
        /// The solid's name.
        solid: String,
        /// Number of its shells.
        shells: usize,
    },
    /// A solid's faces and their labels don't match.
    #[error("solid `{solid}` has {faces} faces and {labels} labels: one label a face is needed")]
    Labels {
        /// The solid's name.
        solid: String,
        /// Number of its faces.
        faces: usize,
        /// Number of labels.
        labels: usize,
    },
    /// A surface of a kind that is not written.
    #[error("face `{face}`: {kind}; only planes and B-spline surfaces (also rational) are written")]
    Surface {
        /// The face's name.
        face: String,
        /// The surface's kind.
        kind: &'static str,
    },
    /// An edge curve of a kind that is not written.
    #[error("face `{face}`: an edge is {kind}; only lines and B-spline curves (also rational) are written")]
    Curve {
        /// Name of the face that the edge bounds.
        face: String,
        /// The curve's kind.
        kind: &'static str,
    },
    /// A straight piece without length, which has no direction.
    #[error("{place}: the straight piece has no length, so no direction")]
    NoLength {
        /// Where it is.
        place: String,
    },
    /// A plane whose axes are parallel or zero.
    #[error("face `{face}`: the plane has no normal")]
    NoNormal {
        /// The face's name.
        face: String,
    },
    /// A number that is infinite or none.
    #[error("{entity} would hold {value}: STEP has finite numbers only")]
    NotFinite {
        /// The entity that would hold it.
        entity: &'static str,
        /// The number.
        value: f64,
    },
    /// Text in an attribute that readers would show wrongly.
    #[error(
        "attribute `{name}`: {character:?} at character {at} of its text; readers decode only printable ASCII in \
         an attribute's text: write it with letters, digits and signs from space to ~"
    )]
    AttributeText {
        /// The attribute's name.
        name: String,
        /// The character that is not printable ASCII.
        character: char,
        /// Its place in the text, from 1.
        at: usize,
    },
}
