//! What stands on a sheet: lines, arrowheads and labels, in millimetres of paper, x to the right, y down.

use crate::write::lettering::{CAPITALS, width};

/// A point on paper \[mm\].
pub type At = [f64; 2];

/// A box with sides along the paper's \[mm\].
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Rect {
    /// Left side.
    pub left: f64,
    /// Upper side.
    pub top: f64,
    /// Right side.
    pub right: f64,
    /// Lower side.
    pub bottom: f64,
}

impl Rect {
    /// The least box around some points; empty inside out where there are none.
    pub fn around(points: impl IntoIterator<Item = At>) -> Self {
        let nothing = Self {
            left: f64::INFINITY,
            top: f64::INFINITY,
            right: f64::NEG_INFINITY,
            bottom: f64::NEG_INFINITY,
        };
        points.into_iter().fold(nothing, |r, [x, y]| Self {
            left: r.left.min(x),
            top: r.top.min(y),
            right: r.right.max(x),
            bottom: r.bottom.max(y),
        })
    }

    /// Its width \[mm\].
    pub fn width(&self) -> f64 {
        self.right - self.left
    }

    /// Its height \[mm\].
    pub fn height(&self) -> f64 {
        self.bottom - self.top
    }

    /// The box with all sides moved outwards by `by` \[mm\].
    pub fn grown(&self, by: f64) -> Self {
        Self {
            left: self.left - by,
            top: self.top - by,
            right: self.right + by,
            bottom: self.bottom + by,
        }
    }

    /// Whether two boxes share more than their sides.
    pub fn overlaps(&self, other: &Self) -> bool {
        self.left < other.right
            && other.left < self.right
            && self.top < other.bottom
            && other.top < self.bottom
    }

    /// Whether the box lies inside another.
    pub fn is_inside(&self, outer: &Self) -> bool {
        self.left >= outer.left
            && self.right <= outer.right
            && self.top >= outer.top
            && self.bottom <= outer.bottom
    }

    /// Whether a straight line from `a` to `b` passes through the box.
    pub fn is_crossed(&self, a: At, b: At) -> bool {
        // clipping by each pair of sides (Liang and Barsky)
        let (mut from, mut to) = (0.0_f64, 1.0_f64);
        for (start, way, low, high) in [
            (a[0], b[0] - a[0], self.left, self.right),
            (a[1], b[1] - a[1], self.top, self.bottom),
        ] {
            if way.abs() < 1e-12 {
                if start <= low || start >= high {
                    return false;
                }
                continue;
            }
            let (p, q) = ((low - start) / way, (high - start) / way);
            from = from.max(p.min(q));
            to = to.min(p.max(q));
        }
        from < to
    }
}

/// What a line shows; each has a width and a type after ISO 128-2 (numbers from memory) and a colour of its own.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Stroke {
    /// Visible outlines and edges: continuous wide (01.2).
    Visible,
    /// Sections where panels meet, without a visible edge: continuous narrow (01.1).
    Joint,
    /// The reference wing: continuous narrow, blue.
    Reference,
    /// Centrelines: long-dashed dotted narrow (04.1).
    Centre,
    /// The quarter-chord line: long-dashed double-dotted narrow (05.1).
    QuarterChord,
    /// The line that the sections turn about: dotted narrow (07.1).
    TwistAxis,
    /// The mean aerodynamic chord: continuous wide.
    MeanChord,
    /// Its graphical construction: dashed spaced narrow (03.1).
    Construction,
    /// Lines that the spec names: dashed narrow (02.1).
    Named,
    /// Sides of the fuselage, an adjacent part: long-dashed double-dotted narrow (05.1).
    Body,
    /// Dimension, extension and leader lines: continuous narrow (01.1).
    Dimension,
    /// The frame of the sheet: continuous, 0.7 mm (ISO 5457).
    Frame,
    /// Rules inside title block and tables.
    Rule,
}

/// Width of narrow lines \[mm\]; wide ones are twice as wide.
pub(super) const NARROW: f64 = 0.25;

impl Stroke {
    /// Width \[mm\].
    pub const fn width(self) -> f64 {
        match self {
            Self::Visible | Self::MeanChord => 2.0 * NARROW,
            Self::Frame => 0.7,
            _ => NARROW,
        }
    }

    /// Dashes and gaps in line widths, alternating; nothing for a continuous line.
    pub const fn dashes(self) -> &'static [f64] {
        match self {
            Self::Centre => &[24.0, 3.0, 0.5, 3.0],
            Self::QuarterChord | Self::Body => &[24.0, 3.0, 0.5, 3.0, 0.5, 3.0],
            Self::TwistAxis => &[0.5, 3.0],
            Self::Construction => &[12.0, 18.0],
            Self::Named => &[12.0, 3.0],
            _ => &[],
        }
    }

    /// Colour, told apart by any colour vision and dark enough to print in black.
    pub const fn colour(self) -> &'static str {
        match self {
            Self::Reference | Self::QuarterChord => "#0b4f8a",
            Self::MeanChord => "#a63a00",
            Self::Construction => "#7a5230",
            Self::Named => "#5a2a7a",
            Self::Dimension | Self::TwistAxis | Self::Rule => "#4a4f54",
            _ => "#101214",
        }
    }

    /// Class in the SVG.
    pub const fn class(self) -> &'static str {
        match self {
            Self::Visible => "visible",
            Self::Joint => "joint",
            Self::Reference => "reference",
            Self::Centre => "centre",
            Self::QuarterChord => "quarter",
            Self::TwistAxis => "axis",
            Self::MeanChord => "mac",
            Self::Construction => "construction",
            Self::Named => "named",
            Self::Body => "body",
            Self::Dimension => "dimension",
            Self::Frame => "frame",
            Self::Rule => "rule",
        }
    }

    /// All of them.
    pub const ALL: [Self; 13] = [
        Self::Visible,
        Self::Joint,
        Self::Reference,
        Self::Centre,
        Self::QuarterChord,
        Self::TwistAxis,
        Self::MeanChord,
        Self::Construction,
        Self::Named,
        Self::Body,
        Self::Dimension,
        Self::Frame,
        Self::Rule,
    ];
}

/// Which point of a text stands at its place.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Anchor {
    /// Its beginning.
    Start,
    /// Its middle.
    Middle,
    /// Its end.
    End,
}

/// A figure that a label shows, for programs that read the drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Datum {
    /// Where the figures file has it: `reference.span`, or `checks.` and a check's quantity.
    pub quantity: String,
    /// Its value as the figures file has it.
    pub value: f64,
}

/// A text on the sheet.
#[derive(Clone, Debug, PartialEq)]
pub struct Label {
    /// What it says.
    pub text: String,
    /// The point of its base line that [`Label::anchor`] names \[mm\].
    pub at: At,
    /// Which point that is.
    pub anchor: Anchor,
    /// Height of its capitals \[mm\].
    pub height: f64,
    /// Whether it reads upwards, from the right of the sheet.
    pub turned: bool,
    /// Whether it is a caption of a field, set lighter.
    pub light: bool,
    /// The figure it shows.
    pub datum: Option<Datum>,
}

/// Height of capitals of labels \[mm\] (ISO 3098).
pub(super) const LETTERS: f64 = 2.5;

impl Label {
    /// A label of ordinary size.
    pub fn new(text: impl Into<String>, at: At, anchor: Anchor) -> Self {
        Self {
            text: text.into(),
            at,
            anchor,
            height: LETTERS,
            turned: false,
            light: false,
            datum: None,
        }
    }

    /// The font's size \[mm\].
    pub fn size(&self) -> f64 {
        self.height / CAPITALS
    }

    /// The box that its letters fill, from the top of accents to the lowest descenders \[mm\].
    pub fn rect(&self) -> Rect {
        let (size, [x, y]) = (self.size(), self.at);
        let length = width(&self.text, size);
        let start = match self.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => -0.5 * length,
            Anchor::End => -length,
        };
        let (over, under) = (0.80 * size, 0.22 * size);
        if self.turned {
            Rect {
                left: x - over,
                right: x + under,
                top: y - start - length,
                bottom: y - start,
            }
        } else {
            Rect {
                left: x + start,
                right: x + start + length,
                top: y - over,
                bottom: y + under,
            }
        }
    }
}

/// A straight or broken line.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// What it shows.
    pub stroke: Stroke,
    /// Its corners.
    pub points: Vec<At>,
    /// What it is, in words: the SVG's tool tip.
    pub title: Option<String>,
}

/// A filled shape: an arrowhead, half of a centre's mark.
#[derive(Clone, Debug, PartialEq)]
pub struct Patch {
    /// Its corners.
    pub points: Vec<At>,
    /// The line it belongs to.
    pub stroke: Stroke,
}

/// A sheet and everything on it.
#[derive(Clone, Debug, PartialEq)]
pub struct Sheet {
    /// What it shows: the SVG's title.
    pub title: String,
    /// What it shows, in a sentence or two for those who cannot see it.
    pub description: String,
    /// Name of its size, such as `A3`.
    pub format: &'static str,
    /// Width and height \[mm\].
    pub size: At,
    /// The frame that everything stands in.
    pub frame: Rect,
    /// Lines, in the order they are drawn.
    pub lines: Vec<Line>,
    /// Filled shapes, drawn after the lines.
    pub patches: Vec<Patch>,
    /// Texts, drawn last.
    pub labels: Vec<Label>,
}

impl Sheet {
    /// Adds a line.
    pub fn line(&mut self, stroke: Stroke, points: Vec<At>) {
        self.titled(stroke, points, None);
    }

    /// Adds a line with a tool tip.
    pub fn titled(&mut self, stroke: Stroke, points: Vec<At>, title: Option<String>) {
        if points.len() > 1 {
            self.lines.push(Line {
                stroke,
                points,
                title,
            });
        }
    }

    /// Whether a label may stand in this box: inside the frame, half a millimetre from every other label.
    pub fn is_free(&self, rect: &Rect) -> bool {
        let wide = rect.grown(0.5);
        wide.is_inside(&self.frame) && !self.labels.iter().any(|label| label.rect().overlaps(&wide))
    }

    /// How many drawn lines pass through a box.
    pub fn crossings(&self, rect: &Rect) -> usize {
        let segments = self.lines.iter().flat_map(|line| line.points.windows(2));
        segments.filter(|pair| rect.is_crossed(pair[0], pair[1])).count()
    }

    /// Puts a label at the best of some places, each with what it costs beside the lines it would cover; false where
    /// all are taken, and then nothing is written.
    pub fn place(&mut self, places: impl IntoIterator<Item = (Label, f64)>) -> Option<At> {
        let mut best: Option<(Label, f64)> = None;
        for (label, cost) in places {
            if best.as_ref().is_some_and(|(_, least)| *least <= cost) {
                continue;
            }
            let rect = label.rect();
            if !self.is_free(&rect) {
                continue;
            }
            let crossed = u32::try_from(self.crossings(&rect)).unwrap_or(u32::MAX);
            let total = cost + 6.0 * f64::from(crossed);
            if best.as_ref().is_none_or(|(_, least)| total < *least) {
                best = Some((label, total));
            }
        }
        let (label, _) = best?;
        let at = label.at;
        self.labels.push(label);
        Some(at)
    }
}
