//! What is wrong with a section file.

use std::fmt;

use crate::airfoil::coordinates::{MAX_BYTES, MAX_POINTS, MIN_SIDE};

/// A line of the file.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Place {
    /// Line, counted from 1.
    pub line: usize,
    /// The line as typed, cut after 100 characters.
    pub text: String,
}

impl Place {
    /// Line `line` with its text.
    pub(super) fn new(line: usize, text: &str) -> Self {
        let shown = text.trim().chars().take(100);
        let text = shown
            .map(|c| {
                if c.is_control() && c != '\t' {
                    char::REPLACEMENT_CHARACTER
                } else {
                    c
                }
            })
            .collect();
        Self { line, text }
    }
}

/// Why a file is refused: the line at fault, the reason and what to change.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// Nothing in it.
    Empty {
        /// The first line.
        at: Place,
    },
    /// More bytes than [`MAX_BYTES`].
    TooLarge {
        /// The first line.
        at: Place,
        /// Size of the file.
        bytes: usize,
    },
    /// Not a text.
    Binary {
        /// The first line with a byte that is no text.
        at: Place,
    },
    /// No line of it holds coordinates.
    NoPoints {
        /// The first line.
        at: Place,
    },
    /// More than [`MAX_POINTS`].
    TooManyPoints {
        /// The first line too many.
        at: Place,
    },
    /// A line that is no row of numbers, between rows of numbers.
    Words {
        /// The line.
        at: Place,
    },
    /// A row with another number of columns than the rest, or columns that are no coordinates.
    Columns {
        /// The line.
        at: Place,
        /// Numbers in this line.
        found: usize,
        /// Numbers in most lines.
        usual: usize,
    },
    /// A number that is not finite.
    NotFinite {
        /// The line.
        at: Place,
    },
    /// The file says how many points the two sides have, and that is not so.
    Counts {
        /// The line with the counts.
        at: Place,
        /// What the points say.
        found: String,
    },
    /// Fewer points than [`MIN_SIDE`] on a side.
    TooFewPoints {
        /// The foremost point, or the last line.
        at: Place,
        /// Points of the first side.
        upper: usize,
        /// Points of the other side.
        lower: usize,
    },
    /// The points are not one run around one section.
    NotOneContour {
        /// The line where that shows.
        at: Place,
        /// What shows it.
        why: String,
    },
    /// A point far off the curve through its neighbours.
    Spike {
        /// The point.
        at: Place,
    },
    /// The nose is aft of the trailing edge.
    NoseAft {
        /// The first point.
        at: Place,
    },
    /// All points in one place.
    NoChord {
        /// The first point.
        at: Place,
    },
    /// Thickness zero, or over 0.6 of the chord.
    Thickness {
        /// The foremost point.
        at: Place,
        /// Largest thickness \[chord\].
        thickness: f64,
    },
    /// The upper side ends below the lower side.
    CrossedTrailingEdge {
        /// The last point of the lower side.
        at: Place,
        /// By how much \[chord\].
        overlap: f64,
    },
    /// The contour crosses or touches itself.
    CrossesItself {
        /// A point where it does.
        at: Place,
        /// The line of the other piece there.
        other: usize,
    },
}

impl Error {
    /// The line at fault.
    pub fn place(&self) -> &Place {
        match self {
            Self::Empty { at }
            | Self::TooLarge { at, .. }
            | Self::Binary { at }
            | Self::NoPoints { at }
            | Self::TooManyPoints { at }
            | Self::Words { at }
            | Self::Columns { at, .. }
            | Self::NotFinite { at }
            | Self::Counts { at, .. }
            | Self::TooFewPoints { at, .. }
            | Self::NotOneContour { at, .. }
            | Self::Spike { at }
            | Self::NoseAft { at }
            | Self::NoChord { at }
            | Self::Thickness { at, .. }
            | Self::CrossedTrailingEdge { at, .. }
            | Self::CrossesItself { at, .. } => at,
        }
    }

    /// Number of the line at fault, counted from 1.
    pub fn line(&self) -> usize {
        self.place().line
    }

    /// The line at fault as typed.
    pub fn text(&self) -> &str {
        &self.place().text
    }

    /// Why the file is refused.
    pub fn reason(&self) -> String {
        match self {
            Self::Empty { .. } => "the file is empty".to_owned(),
            Self::TooLarge { bytes, .. } => format!("the file has {bytes} bytes, more than {MAX_BYTES}"),
            Self::Binary { .. } => "this is no text".to_owned(),
            Self::NoPoints { .. } => "no line of the file holds coordinates".to_owned(),
            Self::TooManyPoints { .. } => format!("more than {MAX_POINTS} points"),
            Self::Words { .. } => "not a row of numbers, and it stands among the coordinates".to_owned(),
            Self::Columns { found, usual, .. } if found == usual => {
                format!(
                    "rows of {found} numbers that are neither coordinates nor stations with two ordinates"
                )
            }
            Self::Columns { found, usual, .. } => {
                format!("{found} in a row, but {usual} in most rows of the file")
            }
            Self::NotFinite { .. } => "a coordinate that is not a finite number".to_owned(),
            Self::Counts { found, .. } => format!("these numbers of points do not fit: {found}"),
            Self::TooFewPoints { upper, lower, .. } => {
                format!("{upper} and {lower} points on the two sides; each needs at least {MIN_SIDE}")
            }
            Self::NotOneContour { why, .. } => format!("the points are not one run around a section: {why}"),
            Self::Spike { .. } => {
                "a point far off the curve through its neighbours, or out of order".to_owned()
            }
            Self::NoseAft { .. } => "the blunt end is aft (at greater x) of the sharp one".to_owned(),
            Self::NoChord { .. } => "all points are in one place".to_owned(),
            Self::Thickness { thickness, .. } => {
                format!(
                    "the section is {:.3} % of its chord thick; more than 0.01 % and at most 60 % can be",
                    thickness * 100.0
                )
            }
            Self::CrossedTrailingEdge { overlap, .. } => {
                format!(
                    "at the trailing edge the upper side ends {overlap:.6} of the chord below the lower side"
                )
            }
            Self::CrossesItself { other, .. } => {
                format!("the contour crosses itself here and at line {other}")
            }
        }
    }

    /// What to change.
    pub fn remedy(&self) -> &'static str {
        match self {
            Self::Empty { .. } | Self::NoPoints { .. } | Self::Binary { .. } => {
                "give a text file with a row of x and y for each point"
            }
            Self::TooLarge { .. } | Self::TooManyPoints { .. } => {
                "leave out points: 100 to 400 describe a section well"
            }
            Self::Words { .. } => "correct the row, or mark a remark with # at its beginning",
            Self::Columns { .. } => "give x and y in each row",
            Self::NotFinite { .. } => "correct the number",
            Self::Counts { .. } => "correct the counts or add the missing points",
            Self::TooFewPoints { .. } => "give more points, closer together at the nose",
            Self::NotOneContour { .. } => {
                "list one section: from the trailing edge over the top to the nose and back, or both sides from the nose"
            }
            Self::Spike { .. } => "correct or remove the point",
            Self::NoseAft { .. } => {
                "mirror or turn the coordinates so that x runs from the nose to the trailing edge"
            }
            Self::NoChord { .. } | Self::Thickness { .. } => {
                "check that the columns are x and y at the same scale"
            }
            Self::CrossedTrailingEdge { .. } | Self::CrossesItself { .. } => {
                "correct the points so that the upper side stays above the lower side"
            }
        }
    }
}

impl fmt::Display for Error {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let Place { line, text } = self.place();
        write!(f, "line {line}")?;
        if !text.is_empty() {
            write!(f, " ({text})")?;
        }
        write!(f, ": {}; {}", self.reason(), self.remedy())
    }
}
