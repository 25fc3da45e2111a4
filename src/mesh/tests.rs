//! Facets of random wings, measured by points all over them.

use nalgebra::{Point3, Vector3};
use proptest::prelude::{Strategy, any, prop_assert, proptest};
use proptest::sample::select;
use proptest::test_runner::{Config, TestCaseError};

use super::{Limits, Mesh, build, check};
use crate::airfoil::{Section, TOLERANCE, fit, parse};
use crate::loft::{Loft, TrailingEdge};
use crate::planform::Planform;
use crate::spec::{Source, read};
use crate::spline::Surface;

/// A wing in few numbers.
#[derive(Clone, Debug)]
struct Draft {
    /// Half span \[mm\].
    reach: f64,
    /// Root chord / half span.
    slender: f64,
    taper: [f64; 2],
    sweep: f64,
    dihedral: f64,
    twist: [f64; 2],
    airfoils: [&'static str; 2],
    blunt: bool,
    round: bool,
    joined: bool,
    panels: usize,
    /// Tolerance \[mm\].
    tolerance: f64,
}

fn draft() -> impl Strategy<Value = Draft> {
    let sections = || {
        select(vec![
            "NACA 0009",
            "NACA 2412",
            "NACA 4415",
            "NACA 6409",
            "NACA 23012",
            "NACA 0018",
        ])
    };
    let shape = (
        60_f64.ln()..30_000_f64.ln(),
        0.1..0.5,
        [0.3..1.3, 0.3..1.0],
        -20.0..40.0,
    );
    let turn = (-5.0..10.0, [-6.0..6.0, -6.0..6.0], sections(), sections());
    let kind = (any::<[bool; 3]>(), 1..3_usize, 1e-3_f64.ln()..0.0);
    (shape, turn, kind).prop_map(
        |(
            (reach, slender, taper, sweep),
            (dihedral, twist, first, second),
            ([blunt, round, joined], panels, tolerance),
        )| {
            let (reach, tolerance) = (f64::exp(reach), f64::exp(tolerance));
            Draft {
                reach,
                slender,
                taper,
                sweep,
                dihedral,
                twist,
                airfoils: [first, second],
                blunt,
                round,
                joined,
                panels,
                // 32-bit numbers and the test's time set the limit
                tolerance: tolerance.max(2e-6 * reach),
            }
        },
    )
}

/// The starboard half of a draft.
fn loft(draft: &Draft) -> Loft {
    let root = draft.slender * draft.reach;
    let mut text = format!(
        "name = \"draft\"\nplanform = {{ root_chord = {root} }}\nairfoil = {{ root = \"{}\" }}\n",
        draft.airfoils[0]
    );
    if draft.blunt {
        text += &format!("trailing_edge = {{ thickness = {} }}\n", 2e-3 * root);
    }
    let mut chord = root;
    for k in 0..draft.panels {
        chord *= draft.taper[k];
        text += &format!(
            "[[panel]]\nspan = {}\ntip_chord = {chord}\nsweep = {}\ndihedral = {}\ntwist = {}\nairfoil = \"{}\"\n",
            draft.reach / draft.panels as f64,
            draft.sweep,
            draft.dihedral,
            draft.twist[k],
            draft.airfoils[1]
        );
    }
    let source = Source {
        text: &text,
        file: "draft.toml",
        set: &[],
    };
    let reading = read(&source);
    let spec = reading
        .spec
        .unwrap_or_else(|| panic!("{:?}\n{text}", reading.faults));
    let sections = draft
        .airfoils
        .map(|name| Section::from_formula(name, parse(name).unwrap()).unwrap());
    let mut profiles = fit(&[&sections[0], &sections[1]], TOLERANCE).unwrap();
    if draft.round {
        profiles = profiles.on_common_knots();
    }
    let planform = Planform::of(&spec, &vec![0.0; draft.panels + 1]).unwrap();
    let edge = TrailingEdge {
        thickness: spec.trailing_edge,
        ratio: None,
    };
    let chosen: Vec<usize> = (0..=draft.panels).map(|k| usize::from(k > 0)).collect();
    let loft = Loft::new(&planform, &profiles, &chosen, edge).unwrap();
    if draft.round {
        loft.with_round_tip(&planform)
    } else {
        loft
    }
}

/// A surface with points all over it, to start the search for the nearest from.
struct Target {
    surface: Surface,
    starts: Vec<(f64, f64, Point3<f64>)>,
}

const STARTS: u32 = 40;

impl Target {
    fn new(surface: Surface) -> Self {
        let starts = (0..=STARTS)
            .flat_map(|i| (0..=STARTS).map(move |j| [i, j].map(|k| f64::from(k) / f64::from(STARTS))))
            .map(|[u, v]| (u, v, surface.at(u, v)))
            .collect();
        Self { surface, starts }
    }

    /// Distance of a point from the surface \[mm\], by Gauss and Newton's method from the nearest start.
    fn distance(&self, point: &Point3<f64>) -> f64 {
        let nearest = |a: &&(f64, f64, Point3<f64>), b: &&(f64, f64, Point3<f64>)| {
            (a.2 - point).norm().total_cmp(&(b.2 - point).norm())
        };
        let (mut u, mut v, start) = *self.starts.iter().min_by(nearest).unwrap();
        let mut least = (start - point).norm();
        for _ in 0..30 {
            let d = self.surface.derivative(u, v);
            let r: Vector3<f64> = point - d.point;
            least = least.min(r.norm());
            let (a, b, c) = (d.u.dot(&d.u), d.u.dot(&d.v), d.v.dot(&d.v));
            let (p, q) = (d.u.dot(&r), d.v.dot(&r));
            let det = a * c - b * b;
            if det <= 1e-14 * a * c {
                break;
            }
            u = (u + (c * p - b * q) / det).clamp(0.0, 1.0);
            v = (v + (a * q - b * p) / det).clamp(0.0, 1.0);
        }
        least
    }
}

/// Places on a facet: along its edges and inside.
const SHARES: [[f64; 3]; 10] = [
    [0.5, 0.5, 0.0],
    [0.0, 0.5, 0.5],
    [0.5, 0.0, 0.5],
    [0.4, 0.6, 0.0],
    [0.6, 0.4, 0.0],
    [0.0, 0.4, 0.6],
    [0.0, 0.6, 0.4],
    [0.4, 0.0, 0.6],
    [0.6, 0.0, 0.4],
    [0.3, 0.3, 0.4],
];

/// Largest distance of points on some facets from the surface \[mm\].
fn measured(mesh: &Mesh, loft: &Loft, facets: usize) -> f64 {
    let faces = (0..loft.panels()).flat_map(|k| [Some(loft.upper(k)), Some(loft.lower(k)), loft.base(k)]);
    let targets: Vec<Target> = faces.flatten().map(Target::new).collect();
    let stride = mesh.facets.len() / facets + 1;
    let corner = |k: u32| mesh.corners[k as usize];
    let mut worst = 0.0_f64;
    for [a, b, c] in mesh.facets.iter().step_by(stride).map(|facet| facet.map(corner)) {
        for [p, q, r] in SHARES {
            let point = Point3::from(a.coords * p + b.coords * q + c.coords * r);
            // facets of a cap lie in the plane of the section and inside the wing
            let on_cap = |y: f64| {
                [a, b, c]
                    .iter()
                    .all(|corner| (corner.y - y).abs() < 1e-3 * y.abs().max(1.0))
            };
            let last = &loft.sections[loft.panels()];
            if on_cap(loft.sections[0].nose().y) || on_cap(last.nose().y) {
                continue;
            }
            let off = targets
                .iter()
                .map(|target| target.distance(&point))
                .fold(f64::INFINITY, f64::min);
            worst = worst.max(off);
        }
    }
    worst
}

proptest! {
    #![proptest_config(Config { cases: 24, ..Config::default() })]

    #[test]
    fn facets_are_sound_and_as_close_as_asked(draft in draft()) {
        let starboard = loft(&draft);
        let port = starboard.mirrored();
        let both = [&starboard, &port];
        let lofts = if draft.joined { &both[..] } else { &both[..1] };
        let limits = Limits { tolerance: draft.tolerance };
        let mesh = build(lofts, &limits, 1.0).map_err(|finding| TestCaseError::fail(finding.to_string()))?;
        prop_assert!(check(&mesh, 1.0).is_ok());
        prop_assert!(mesh.deviation <= draft.tolerance);
        if !draft.round && !draft.joined {
            let found = measured(&mesh, &starboard, 60);
            prop_assert!(found <= draft.tolerance, "{found} of {}", draft.tolerance);
        }
    }
}

#[test]
fn no_point_of_a_tapered_twisted_wing_is_farther_off_than_is_said() {
    // taper makes points of equal parameter slide along each other: their distance is not that of the surfaces
    for tolerance in [1.0, 0.2, 0.05] {
        let draft = Draft {
            reach: 1000.0,
            slender: 0.3,
            taper: [0.5, 1.0],
            sweep: 2.0,
            dihedral: 0.0,
            twist: [-3.0, 0.0],
            airfoils: ["NACA 2412", "NACA 2412"],
            blunt: false,
            round: false,
            joined: false,
            panels: 1,
            tolerance,
        };
        let loft = loft(&draft);
        let mesh = build(&[&loft], &Limits { tolerance }, 1.0).unwrap();
        let found = measured(&mesh, &loft, usize::MAX);
        assert!(
            found <= mesh.deviation && mesh.deviation <= tolerance,
            "{found}, {}",
            mesh.deviation
        );
        assert!(found > 0.5 * tolerance, "{found} of {tolerance}");
    }
}

#[test]
fn an_untwisted_wing_of_one_chord_has_one_strip_of_facets_a_skin() {
    let draft = Draft {
        reach: 1000.0,
        slender: 0.3,
        taper: [1.0, 1.0],
        sweep: 0.0,
        dihedral: 0.0,
        twist: [0.0, 0.0],
        airfoils: ["NACA 0009", "NACA 0009"],
        blunt: false,
        round: false,
        joined: false,
        panels: 1,
        tolerance: 0.05,
    };
    let mesh = build(&[&loft(&draft)], &Limits { tolerance: 0.05 }, 1.0).unwrap();
    // n intervals all around: 2 n facets on the skins, n - 2 on each of two caps and 2 more for the base
    let points = mesh.corners.len() / 2;
    assert_eq!(mesh.corners.len() % 2, 0);
    assert_eq!(mesh.facets.len(), 2 * points + 2 * (points - 2));
    assert!(
        mesh.deviation > 0.04 && mesh.deviation <= 0.05,
        "{}",
        mesh.deviation
    );
}

#[test]
fn what_32_bit_numbers_cannot_say_is_refused() {
    let draft = Draft {
        reach: 30_000.0,
        slender: 0.2,
        taper: [0.5, 0.5],
        sweep: 10.0,
        dihedral: 3.0,
        twist: [-3.0, 0.0],
        airfoils: ["NACA 2412", "NACA 2412"],
        blunt: false,
        round: false,
        joined: true,
        panels: 1,
        tolerance: 0.001,
    };
    assert!(build(&[&loft(&draft)], &Limits { tolerance: 0.001 }, 1.0).is_err());
}
