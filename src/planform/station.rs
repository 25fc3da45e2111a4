//! Where each section stands: its twist-axis point, its plane, and its turn.

use nalgebra::{Point3, Vector3};

use super::PanelShape;
use crate::spec::{Panel, Spec};

/// A section's place on the starboard side.
#[derive(Clone, Debug, PartialEq)]
pub struct Station {
    /// The point that the section turns about \[mm\].
    pub axis: Point3<f64>,
    /// Chord fraction of that point \[-\].
    pub axis_fraction: f64,
    /// Chord \[mm\].
    pub chord: f64,
    /// Turn about the axis point, leading edge up \[rad\].
    pub incidence: f64,
    /// The section's upward direction: a unit vector square to x; (0, 0, 1) where it stands upright.
    pub up: Vector3<f64>,
    /// Factor on the section's ordinates where it lies in a mitre plane \[-\].
    pub mitre: f64,
    /// x of the leading edge before the section is turned \[mm\].
    pub nominal_leading_edge: f64,
}

impl Station {
    /// Place of the point (x, y) of the unit-chord section \[mm\].
    pub fn place(&self, [x, y]: [f64; 2]) -> Point3<f64> {
        let (sine, cosine) = self.incidence.sin_cos();
        let along = (x - self.axis_fraction) * self.chord;
        let height = y * self.mitre * self.chord;
        self.axis
            + Vector3::x() * (along * cosine + height * sine)
            + self.up * (height * cosine - along * sine)
    }

    /// The chord line's front end \[mm\].
    pub fn leading_edge(&self) -> Point3<f64> {
        self.place([0.0, 0.0])
    }

    /// The chord line's rear end \[mm\].
    pub fn trailing_edge(&self) -> Point3<f64> {
        self.place([1.0, 0.0])
    }
}

/// Stations (not yet turned) and panel shapes of a spec.
pub(super) fn lay_out(spec: &Spec, fin: bool) -> (Vec<Station>, Vec<PanelShape>) {
    let fraction = spec.setting.twist_axis;
    let leans = leans(&spec.panels, fin);
    let mut stations = Vec::with_capacity(spec.panels.len() + 1);
    let mut panels = Vec::with_capacity(spec.panels.len());
    let (mut x, mut y, mut z, mut chord) = (0.0, 0.0, 0.0, spec.root_chord);
    for k in 0..=spec.panels.len() {
        if let Some(panel) = k.checked_sub(1).map(|inner| &spec.panels[inner]) {
            let (across, up) = (
                panel.span * panel.dihedral.cos(),
                panel.span * panel.dihedral.sin(),
            );
            let run = if panel.is_steep() { panel.span } else { across };
            let outer =
                x + panel.sweep_at * chord + run * panel.sweep.tan() - panel.sweep_at * panel.tip_chord;
            let axis_shift = outer + fraction * panel.tip_chord - (x + fraction * chord);
            panels.push(PanelShape {
                width: if fin { up.abs() } else { across },
                run,
                axis_sweep: (axis_shift / run).atan(),
                dihedral: panel.dihedral,
            });
            (x, y, z, chord) = (outer, y + across, z + up, panel.tip_chord);
        }
        let Lean { angle, mitre } = leans[k];
        stations.push(Station {
            axis: Point3::new(x + fraction * chord, y, z),
            axis_fraction: fraction,
            chord,
            incidence: 0.0,
            up: Vector3::new(0.0, -angle.sin(), angle.cos()),
            mitre,
            nominal_leading_edge: x,
        });
    }
    (stations, panels)
}

/// How far a section leans from upright, and the factor on its ordinates.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Lean {
    angle: f64,
    mitre: f64,
}

const UPRIGHT: Lean = Lean {
    angle: 0.0,
    mitre: 1.0,
};

/// The planes of all sections, by the rule in the crate's conventions.
fn leans(panels: &[Panel], fin: bool) -> Vec<Lean> {
    let (first, last) = (&panels[0], &panels[panels.len() - 1]);
    let root = if !first.is_steep() {
        UPRIGHT
    } else if fin {
        Lean {
            angle: first.dihedral,
            mitre: 1.0,
        }
    } else {
        // the mirror image's panel is the neighbour: they meet in the plane of symmetry
        Lean {
            angle: 0.0,
            mitre: 1.0 / first.dihedral.cos(),
        }
    };
    let tip = if last.is_steep() {
        Lean {
            angle: last.dihedral,
            mitre: 1.0,
        }
    } else {
        UPRIGHT
    };
    let joints = panels.windows(2).map(|pair| {
        if pair.iter().any(Panel::is_steep) {
            let half = 0.5 * (pair[1].dihedral - pair[0].dihedral);
            Lean {
                angle: 0.5 * (pair[0].dihedral + pair[1].dihedral),
                mitre: 1.0 / half.cos(),
            }
        } else {
            UPRIGHT
        }
    });
    std::iter::once(root)
        .chain(joints)
        .chain(std::iter::once(tip))
        .collect()
}
