//! What a spec decides beyond sizes: how the wing is loaded, set, placed, ended and built.

/// What the wing carries, and how its area follows from it.
#[derive(Clone, Debug, PartialEq)]
pub struct Load {
    /// Weight \[N\].
    pub weight: f64,
    /// How the area was sized, step by step, for the proof sheet.
    pub chain: Vec<Step>,
}

/// One step of a chain of results.
#[derive(Clone, Debug, PartialEq)]
pub struct Step {
    /// What it is, such as `wing loading`.
    pub name: String,
    /// Its value in `unit`.
    pub value: f64,
    /// SI unit or degrees, such as `N/m²`; empty for a ratio.
    pub unit: &'static str,
    /// The law or formula it comes from, such as `W = m g, g = 9.80665 m/s²`; `as asked` where it was given.
    pub ground: String,
}

/// Speed and air for an incidence that carries the weight in cruise.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Cruise {
    /// True speed \[m/s\].
    pub speed: f64,
    /// Density of the air \[kg/m³\].
    pub density: f64,
    /// Mach number; 0 where only a density was given \[-\].
    pub mach: f64,
}

/// How the tip's twist against the root is counted.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum TwistKind {
    /// Between the chord lines (default).
    #[default]
    Geometric,
    /// Between the sections' zero-lift lines.
    Aerodynamic,
}

/// How twist runs along the span.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum TwistLaw {
    /// As straight elements between the stations make it (default).
    #[default]
    Straight,
    /// The angle is linear in the span.
    Linear,
}

/// The reference wing's outline.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Outline {
    /// Straight edges between stations (default).
    #[default]
    Trapezoid,
    /// The chord is an ellipse's ordinate along the span.
    Ellipse,
}

/// How faces run between stations.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum SurfaceKind {
    /// Straight elements on every panel (default).
    #[default]
    Ruled,
    /// One face a side, curvature-continuous along the span.
    Smooth,
}

/// How the wing ends.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum TipForm {
    /// A plane cap (default).
    #[default]
    Square,
    /// Half ellipses on the tip section.
    Round,
}

/// The fuselage at the wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Body {
    /// Its width at the wing \[mm\].
    pub width: f64,
    /// Where the wing sits on it; for guidance only.
    pub position: Position,
    /// Whether one solid runs through it.
    pub carry_through: bool,
}

/// Where a wing sits on the fuselage.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Position {
    /// On top.
    High,
    /// In the middle (default).
    #[default]
    Mid,
    /// Below.
    Low,
}

/// Where the wing goes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Placing {
    /// The reference root's leading edge (before its turn) goes to this point \[mm\].
    RootLeadingEdge([f64; 3]),
    /// The quarter point of the mean aerodynamic chord goes to this station: x \[mm\], z \[mm\]; y is its own unless
    /// given, and then has to agree.
    AerodynamicCentre([f64; 3]),
}

impl Default for Placing {
    fn default() -> Self {
        Self::RootLeadingEdge([0.0; 3])
    }
}
