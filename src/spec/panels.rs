//! Panels: what they settle of the planform, and whether they can be joined.

use super::fault::Fault;
use super::written::{self, Entry};
use super::{AirfoilSource, Panel, Spec};

/// Dihedral of the first panel beyond which the whole surface is a fin \[rad\]: 60°.
pub(super) const FIN: f64 = 60.0 * std::f64::consts::PI / 180.0;

/// The plane that span and area of a surface are taken in.
///
/// A surface of which the first panel stands steeper than 60° is a fin: its reference plane is x-z instead of x-y, and
/// a panel counts with the sine of its dihedral instead of the cosine. Span and area still count two sides, as they do
/// where only one side of a wing is built: a fin of height h has the span 2 h.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum ReferencePlane {
    /// x-y.
    Level,
    /// x-z.
    Upright,
}

impl ReferencePlane {
    /// The plane of a surface of which the first panel has this dihedral \[rad\].
    pub fn of(first_dihedral: f64) -> Self {
        if first_dihedral.abs() > FIN + 1e-12 {
            Self::Upright
        } else {
            Self::Level
        }
    }

    /// How much of a panel's length counts as semispan \[-\].
    pub fn projection(self, dihedral: f64) -> f64 {
        match self {
            Self::Level => dihedral.cos(),
            Self::Upright => dihedral.abs().sin(),
        }
    }
}

impl Spec {
    /// The plane that span and area are taken in.
    pub fn reference_plane(&self) -> ReferencePlane {
        ReferencePlane::of(self.panels.first().map_or(0.0, |panel| panel.dihedral))
    }
}

/// What panels settle: the span, and the mean chord as a linear function of the root chord.
///
/// ```text
/// b = 2 Σ l_i p_i        c_m = (1/b) Σ l_i p_i (c_(i-1) + c_i) = constant + slope c_0
/// l_i length of panel i, p_i its projection (cos or sin of the dihedral), c_i chord at its outer end
/// ```
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Outline {
    /// Span \[mm\].
    pub(super) span: f64,
    /// Mean chord for a root chord of 0 \[mm\].
    pub(super) constant: f64,
    /// Mean chord for each mm of root chord \[-\].
    pub(super) slope: f64,
}

/// What these panels settle; `None` where a size of theirs is not known, or there are none.
pub(super) fn outline(panels: &[written::Panel]) -> Option<Outline> {
    if panels.iter().any(|panel| panel.dihedral.is_unreadable()) {
        return None;
    }
    let plane = ReferencePlane::of(panels.first()?.dihedral.or(0.0));
    let mut semispan = 0.0;
    let mut area = 0.0;
    let mut first = 0.0;
    let mut inner_chord = 0.0;
    for (i, panel) in panels.iter().enumerate() {
        let length = panel.span.given()?.value * plane.projection(panel.dihedral.or(0.0));
        let chord = panel.tip_chord.given()?.value;
        semispan += length;
        area += length * (inner_chord + chord);
        inner_chord = chord;
        if i == 0 {
            first = length;
        }
    }
    let span = 2.0 * semispan;
    Some(Outline {
        span,
        constant: area / span,
        slope: first / span,
    })
}

/// Faults of joints at which the surface folds back on itself.
///
/// With every dihedral within ±90°, no panel leads back towards the centreline; and where no joint turns by 90° or
/// more, no two panels that meet are on the same side of their joint. So the front view cannot cross itself, nor come to
/// y < 0.
pub(super) fn folds(panels: &[written::Panel]) -> Vec<Fault> {
    let mut faults = Vec::new();
    for pair in panels.windows(2) {
        let (inner, outer) = (&pair[0].dihedral, &pair[1].dihedral);
        if inner.is_unreadable() || outer.is_unreadable() {
            continue;
        }
        let turn = (outer.or(0.0) - inner.or(0.0)).to_degrees();
        if turn.abs() >= 90.0 - 1e-9 {
            let typed = outer.given();
            faults.push(Fault {
                place: typed.map_or_else(|| pair[1].place.clone(), |given| given.place.clone()),
                text: typed.map_or_else(String::new, |given| given.text.clone()),
                problem: format!(
                    "the panel folds back: its dihedral differs by {} deg from the panel before; allowed: less than 90 deg",
                    super::quantity::significant(turn.abs())
                ),
                remedy: "Put a panel with a dihedral in between before it.".to_owned(),
            });
        }
    }
    faults
}

/// The panels as they are built. `sweep_at` holds where a panel has none, `tip` is the section of the last panel where
/// it has none; a panel without a section or a twist of its own has that of the station before. `None` where a value is
/// not known.
pub(super) fn build(
    panels: &[written::Panel],
    sweep_at: f64,
    root: &AirfoilSource,
    tip: Option<AirfoilSource>,
) -> Option<Vec<Panel>> {
    let mut airfoil = root.clone();
    let mut twist = 0.0;
    let mut built = Vec::new();
    for (i, panel) in panels.iter().enumerate() {
        match (&panel.airfoil, &tip) {
            (Entry::Given(given), _) => airfoil = super::resolve::airfoil_source(given),
            (_, Some(tip)) if i + 1 == panels.len() => airfoil = tip.clone(),
            _ => {}
        }
        twist = panel.twist.or(twist);
        built.push(Panel {
            span: panel.span.given()?.value,
            tip_chord: panel.tip_chord.given()?.value,
            sweep: panel.sweep.or(0.0),
            sweep_at: panel.sweep_at.or(sweep_at),
            dihedral: panel.dihedral.or(0.0),
            twist,
            airfoil: airfoil.clone(),
        });
    }
    Some(built)
}
