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
    /// Twist relative to the root, leading edge up \[rad\].
    pub twist: f64,
    /// Turn about the axis point, leading edge up \[rad\].
    pub incidence: f64,
    /// The section's upward direction: a unit vector square to x; (0, 0, 1) where it stands upright.
    pub up: Vector3<f64>,
    /// Factor on the section's ordinates where it lies in a mitre plane \[-\].
    pub mitre: f64,
    /// x of the leading edge before the section is turned \[mm\].
    pub nominal_leading_edge: f64,
    /// The section it has.
    pub blend: Blend,
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

/// Sections of a station: those at two of the spec's own stations, and the share of the second.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Blend {
    /// The inner of the two, counted from the root.
    pub inner: usize,
    /// The outer of the two.
    pub outer: usize,
    /// Share of the outer one's ordinates \[-\].
    pub share: f64,
}

impl Blend {
    const fn only(station: usize) -> Self {
        Self {
            inner: station,
            outer: station,
            share: 0.0,
        }
    }
}

/// Stations (not yet turned) and panel shapes of a spec with straight edges.
pub(super) fn lay_out(spec: &Spec, fin: bool, twists: &[f64]) -> (Vec<Station>, Vec<PanelShape>) {
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
            twist: twists[k],
            incidence: 0.0,
            up: Vector3::new(0.0, -angle.sin(), angle.cos()),
            mitre,
            nominal_leading_edge: x,
            blend: Blend::only(k),
        });
    }
    (stations, panels)
}

/// Stations along an ellipse, from the root to its tip chord.
///
/// ```text
/// y = s sin φ    c = c₀ cos φ    0 ≤ φ ≤ φ_t,  cos φ_t = 0.04
/// ```
///
/// s is such that y ends at the semispan, c₀ such that the area is that of the full ellipse on the same span with the
/// spec's root chord (S = π b c / 4), unless the root chord itself was asked for.
pub(super) fn lay_out_ellipse(
    spec: &Spec,
    twists: &[f64],
    root_chord_asked: bool,
) -> (Vec<Station>, Vec<PanelShape>) {
    let panel = &spec.panels[0];
    let fraction = spec.setting.twist_axis;
    let (across, up) = (
        panel.span * panel.dihedral.cos(),
        panel.span * panel.dihedral.sin(),
    );
    let end = ELLIPSE_TIP.acos();
    let semi_axis = 1.0 / end.sin(); // of the semispan
    let full = std::f64::consts::FRAC_PI_4 * 2.0 * spec.root_chord; // 2 S / b
    let root = if root_chord_asked {
        spec.root_chord
    } else {
        2.0 * full / (2.0 * semi_axis * (end + end.sin() * end.cos()))
    };
    let stations = (0..ELLIPSE_STATIONS)
        .map(|k| {
            let angle = end * f64::from(k) / f64::from(ELLIPSE_STATIONS - 1);
            let (eta, chord) = (semi_axis * angle.sin(), root * angle.cos());
            let eta = if k + 1 == ELLIPSE_STATIONS { 1.0 } else { eta };
            let leading_edge =
                panel.sweep_at * root + eta * across * panel.sweep.tan() - panel.sweep_at * chord;
            Station {
                axis: Point3::new(leading_edge + fraction * chord, eta * across, eta * up),
                axis_fraction: fraction,
                chord,
                twist: twists[1] * eta,
                incidence: 0.0,
                up: Vector3::z(),
                mitre: 1.0,
                nominal_leading_edge: leading_edge,
                blend: Blend {
                    inner: 0,
                    outer: 1,
                    share: eta,
                },
            }
        })
        .collect::<Vec<_>>();
    let (first, last) = (&stations[0], &stations[stations.len() - 1]);
    let axis_sweep = ((last.axis.x - first.axis.x) / across).atan();
    let shape = PanelShape {
        width: across,
        axis_sweep,
        dihedral: panel.dihedral,
    };
    (stations, vec![shape])
}

/// Tip chord of an elliptic outline, of the root chord: small but real.
const ELLIPSE_TIP: f64 = 0.04;
/// Stations along half an ellipse.
const ELLIPSE_STATIONS: u32 = 12;

/// Puts stations between those of panels whose twist is to be linear in the span, so close that straight elements between
/// them keep within `tolerance` \[rad\] of it. Returns all stations, and which of them are the spec's own.
pub(super) fn with_linear_twist(own: &[Station], tolerance: f64) -> (Vec<Station>, Vec<usize>) {
    let mut stations = vec![own[0].clone()];
    let mut marks = vec![0];
    for pair in own.windows(2) {
        let mut parts = 1_u32;
        while parts < 200 && worst_twist(pair, parts) > tolerance {
            parts += 1;
        }
        stations.extend((1..parts).map(|k| between(&pair[0], &pair[1], f64::from(k) / f64::from(parts))));
        stations.push(pair[1].clone());
        marks.push(stations.len() - 1);
    }
    (stations, marks)
}

/// The station at a fraction of a panel with straight edges, its twist linear in the span.
fn between(inner: &Station, outer: &Station, fraction: f64) -> Station {
    let mix = |a: f64, b: f64| a + (b - a) * fraction;
    let chord = mix(inner.chord, outer.chord);
    Station {
        axis: inner.axis + (outer.axis - inner.axis) * fraction,
        axis_fraction: inner.axis_fraction,
        chord,
        twist: mix(inner.twist, outer.twist),
        incidence: 0.0,
        up: (inner.up + (outer.up - inner.up) * fraction).normalize(),
        mitre: mix(inner.mitre, outer.mitre),
        nominal_leading_edge: mix(inner.nominal_leading_edge, outer.nominal_leading_edge),
        // straight elements blend lengths, not ratios
        blend: Blend {
            inner: inner.blend.inner,
            outer: outer.blend.outer,
            share: fraction * outer.chord / chord,
        },
    }
}

/// Largest difference between the turn that straight elements make and the linear one, panel cut into `parts`.
fn worst_twist(pair: &[Station], parts: u32) -> f64 {
    let mut worst = 0.0_f64;
    for k in 0..parts {
        let at = |j: u32| between(&pair[0], &pair[1], f64::from(j) / f64::from(parts));
        let (a, b) = (at(k), at(k + 1));
        let turn = b.twist - a.twist;
        for share in [0.25, 0.5, 0.75] {
            let straight =
                (share * b.chord * turn.sin()).atan2((1.0 - share) * a.chord + share * b.chord * turn.cos());
            worst = worst.max((straight - share * turn).abs());
        }
    }
    worst
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
