//! Section coordinate files: whatever layout the file has, one contour of unit chord.
//!
//! [`read`] recognises the layout by itself (one loop, two blocks, or a table of stations; see [`Contour::notes`] for
//! what it found), brings the points into one order and into the chord frame, and refuses what cannot be a section with
//! the line at fault. No point is added and none is moved relative to the others.
//!
//! Stages, each in its own file: `text` (bytes to lines), `number` (lines to numbers), `layout` (title, counts,
//! columns), `order` (one run of points around the section), `frame` (chord frame), `check` and `crossing` (what cannot
//! be a section). [`write_loop`] and [`write_blocks`] write the two public layouts.

mod check;
mod crossing;
mod ends;
mod error;
mod frame;
mod layout;
mod nose;
mod number;
mod order;
mod text;
mod write;

#[cfg(test)]
mod forms;
#[cfg(test)]
mod refusals;
#[cfg(test)]
mod tests;
#[cfg(test)]
mod trials;

pub use error::{Error, Place};
pub use frame::Moved;
pub use write::{write_blocks, write_loop};

/// Largest file that is read: 16 MB.
pub const MAX_BYTES: usize = 16 << 20;
/// Most points of a file.
pub const MAX_POINTS: usize = 100_000;
/// Fewest points of a side, the nose included.
pub const MIN_SIDE: usize = 7;

/// The points of a section file, in order and in the chord frame.
#[derive(Clone, Debug, PartialEq)]
pub struct Contour {
    /// The file's title, or its name where it has none.
    pub title: String,
    /// From the upper trailing edge over the top to the nose and back under the bottom to the lower trailing edge
    /// \[chord\]. The chord line runs from (0, 0), a point of the curve, to (1, 0), the middle of the trailing edge.
    /// First and last point are the same where the trailing edge is sharp; no other points coincide.
    pub points: Vec<[f64; 2]>,
    /// Index of the foremost given point.
    pub nose: usize,
    /// Decimals that the file's numbers carry, in units of the chord: the points are good to half of
    /// `10^-decimals`.
    pub decimals: usize,
    /// What was recognised and what was done, a short sentence each.
    pub notes: Vec<String>,
    /// How the points were moved, where more than a plain factor was needed.
    pub moved: Option<Moved>,
}

impl Contour {
    /// The upper side from the trailing edge to the nose.
    pub fn upper(&self) -> &[[f64; 2]] {
        &self.points[..=self.nose]
    }

    /// The lower side from the nose to the trailing edge.
    pub fn lower(&self) -> &[[f64; 2]] {
        &self.points[self.nose..]
    }
}

/// Reads a section file of any layout. `name` (usually the file's name without its ending) serves as title where the
/// file has none.
///
/// # Errors
/// What cannot be a section, with the line at fault and what to change; see [`Error`].
pub fn read(bytes: &[u8], name: &str) -> Result<Contour, Error> {
    let mut notes = Vec::new();
    let text = text::decode(bytes, &mut notes)?;
    let lines = text::lines(&text);
    let listing = layout::recognise(&lines, &mut notes)?;
    let run = order::arrange(&listing, &lines, &mut notes)?;
    let framed = frame::normalise(&run, &lines, &mut notes)?;
    let (points, nose) = check::section(framed.points, &run, framed.unit, &lines, &mut notes)?;
    Ok(Contour {
        title: listing.title.unwrap_or_else(|| name.to_owned()),
        points,
        nose,
        decimals: framed.decimals,
        notes,
        moved: framed.moved,
    })
}
