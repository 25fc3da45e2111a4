//! The spec file: as written in TOML, then resolved into a wing of which every number is known.
//!
//! [`read`] takes the text and gives a [`Reading`]: the resolved [`Spec`], or every [`Fault`] of the file at once.
//! All lengths here are millimetres, all angles radians (see the crate's conventions).

mod airfoil;
mod atmosphere;
mod choices;
mod document;
mod fault;
mod flight;
mod fuselage;
mod identity;
mod keys;
mod limit;
mod lookup;
mod panels;
mod planform;
mod quantity;
mod reading;
mod resolve;
mod sizes;
mod sizing;
mod step;
#[cfg(test)]
mod tests;
mod unit;
mod unknown;
mod written;

pub use airfoil::{AirfoilChanges, AirfoilForm, AirfoilSource, SharpBy};
pub use choices::{
    Body, Cruise, Load, Outline, Placing, Position, Step, SurfaceKind, TipForm, TwistKind, TwistLaw,
};
pub use fault::{Fault, Place, sort_faults};
pub use keys::keys;
pub use lookup::{known, lasting_faults, shortened};
pub use panels::ReferencePlane;
pub use reading::{Reading, Source, read, starter};
pub use step::{StepForm, StepReference, StepSchema};
pub use unit::Unit;

/// A wing of which every number is known: what the file means, whatever way it was written.
#[derive(Clone, Debug, PartialEq)]
pub struct Spec {
    /// The wing's name, as written.
    pub name: String,
    /// What it is, in the words of the spec; `None` where it says nothing.
    pub description: Option<String>,
    /// Unit of bare lengths in the spec and of every file written.
    pub unit: Unit,
    /// Root chord of the reference wing, on the centreline \[mm\].
    pub root_chord: f64,
    /// Section at the root.
    pub root_airfoil: AirfoilSource,
    /// Panels from the root outwards; at least one.
    pub panels: Vec<Panel>,
    /// Incidence and twist axis.
    pub setting: Setting,
    /// Least trailing-edge thickness \[mm\]: `None` as the sections define it, `Some(0.0)` sharp.
    pub trailing_edge: Option<f64>,
    /// How the formulas of sections are closed where the trailing edge is sharp.
    pub sharp_by: SharpBy,
    /// Largest distance between a facet and the surface \[mm\].
    pub facet_tolerance: f64,
    /// Which sides are built.
    pub sides: Sides,
    /// How the STEP file is written.
    pub step: StepForm,
    /// Extra construction lines.
    pub lines: Vec<ConstructionLine>,
    /// What the wing carries, where the file says so.
    pub load: Option<Load>,
    /// Cruise, where the file has it.
    pub cruise: Option<Cruise>,
    /// The fuselage, where the file has one.
    pub body: Option<Body>,
    /// Where the wing goes.
    pub placing: Placing,
    /// The outline.
    pub outline: Outline,
    /// How faces run between stations.
    pub surface: SurfaceKind,
    /// How the wing ends.
    pub tip: TipForm,
    /// Trailing-edge thickness in proportion to the chord at least this part of it \[-\]; besides `trailing_edge`.
    pub trailing_edge_ratio: Option<f64>,
    /// The sizes that the file states, for the proof sheet: each with the value typed.
    pub stated: Vec<Stated>,
    /// What had to give way to what, and what it costs.
    pub notes: Vec<String>,
}

/// One panel between two stations; one side.
#[derive(Clone, Debug, PartialEq)]
pub struct Panel {
    /// Length along the panel in front view \[mm\], > 0. Its projection on the y axis is `span * cos(dihedral)`.
    pub span: f64,
    /// Chord at the outer end \[mm\], > 0.
    pub tip_chord: f64,
    /// Sweep of the chord line at `sweep_at`, aft positive \[rad\]: in plan view, or in the panel's own plane
    /// where the panel is [steep](Panel::is_steep).
    pub sweep: f64,
    /// Chord fraction of the line that `sweep` is measured on \[-\], 0 to 1.
    pub sweep_at: f64,
    /// Dihedral, up positive \[rad\], at most ±90°.
    pub dihedral: f64,
    /// Twist at the outer end relative to the root, leading edge up positive \[rad\].
    pub twist: f64,
    /// Section at the outer end.
    pub airfoil: AirfoilSource,
}

impl Panel {
    /// Dihedral beyond which a panel carries its sections square to itself instead of upright \[rad\]: 30°.
    pub const STEEP: f64 = 30.0 * std::f64::consts::PI / 180.0;

    /// True where the panel's dihedral is beyond 30°: its sections stand square to the panel, and its sweep is
    /// measured in its own plane.
    pub fn is_steep(&self) -> bool {
        self.dihedral.abs() > Self::STEEP + 1e-12
    }
}

/// How the wing is set.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Setting {
    /// Incidence at `at`, leading edge up positive \[rad\].
    pub incidence: f64,
    /// Where the incidence holds.
    pub at: IncidenceAt,
    /// Chord fraction of the point that a section turns about \[-\], 0 to 1.
    pub twist_axis: f64,
    /// How the panels' twist is counted.
    pub twist_kind: TwistKind,
    /// How twist runs along the span.
    pub twist_law: TwistLaw,
    /// True for `incidence = "cruise"`: the incidence at the mean aerodynamic chord follows from cruise and load.
    pub for_cruise: bool,
}

/// Where the incidence that was asked for holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum IncidenceAt {
    /// At the mean aerodynamic chord (default).
    Mac,
    /// At the root.
    Root,
}

/// Which sides of the wing are built.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sides {
    /// One solid over both sides, joined at the centreline.
    Both,
    /// The starboard half (y > 0).
    Starboard,
    /// The port half (y < 0).
    Port,
    /// Two solids, one a side.
    Pair,
}

/// An extra construction line: a spar, a hinge line.
#[derive(Clone, Debug, PartialEq)]
pub struct ConstructionLine {
    /// Its name, as written.
    pub name: String,
    /// Chord fraction \[-\], 0 to 1.
    pub chord_fraction: f64,
    /// Inner end as a fraction of the semispan \[-\], 0 to 1.
    pub from: f64,
    /// Outer end as a fraction of the semispan \[-\], 0 to 1, > `from`.
    pub to: f64,
}

/// A size that the file states.
#[derive(Clone, Debug, PartialEq)]
pub struct Stated {
    /// Dotted key, such as `planform.area`.
    pub key: String,
    /// Its value: mm, mm², rad or a ratio.
    pub value: f64,
}
