//! Wings over the whole valid range, built and measured.

use proptest::prelude::{Strategy, any, prop, prop_oneof, proptest};
use proptest::test_runner::Config;

use super::{Options, Prepared, Wing, prepare};
use crate::planform;
use crate::spec::{Body, Outline, Placing, Position, Sides, Source, SurfaceKind, TwistLaw};

/// A wing as numbers: root chord, panels as (span, taper, sweep, dihedral, twist), and choices.
#[derive(Clone, Debug)]
struct Draft {
    root: f64,
    panels: Vec<(f64, f64, f64, f64, f64)>,
    airfoils: Vec<&'static str>,
    incidence: f64,
    axis: f64,
    edge: Option<f64>,
    sides: Sides,
    surface: SurfaceKind,
    law: TwistLaw,
    body: Option<f64>,
}

fn prepared(draft: &Draft) -> Prepared {
    let mut text = format!("name = \"draft\"\n[planform]\nroot_chord = {}\n", draft.root);
    text += &format!(
        "[setting]\nincidence = {}\ntwist_axis = {}\n",
        draft.incidence, draft.axis
    );
    text += &format!("[airfoil]\nroot = \"{}\"\n", draft.airfoils[0]);
    if let Some(edge) = draft.edge {
        // within what the smallest chord allows
        let chord = draft
            .panels
            .iter()
            .fold((draft.root, draft.root), |(c, least), panel| {
                (c * panel.1, least.min(c * panel.1))
            });
        let edge = edge.min(0.09 * chord.1);
        text += &format!("[trailing_edge]\nthickness = {edge}\n");
    }
    let mut chord = draft.root;
    for (k, (span, taper, sweep, dihedral, twist)) in draft.panels.iter().enumerate() {
        chord *= taper;
        text += &format!(
            "[[panel]]\nspan = {}\ntip_chord = {chord}\nsweep = {sweep}\ndihedral = {dihedral}\ntwist = {twist}\nairfoil = \"{}\"\n",
            span * draft.root,
            draft.airfoils[(k + 1) % draft.airfoils.len()]
        );
    }
    let source = Source {
        text: &text,
        file: "draft.toml",
        set: &[],
    };
    let mut prepared = prepare(&source, &|_| Err(std::io::ErrorKind::NotFound.into()))
        .unwrap_or_else(|faults| panic!("{text}\n{faults:?}"));
    prepared.spec.facet_tolerance = 1e-3 * draft.root;
    prepared.spec.sides = draft.sides;
    prepared.spec.surface = draft.surface;
    prepared.spec.setting.twist_law = draft.law;
    prepared.spec.body = draft.body.map(|share| Body {
        width: 2.0 * share * draft.panels[0].0 * draft.root,
        position: Position::Mid,
        carry_through: false,
    });
    prepared
}

fn drafts() -> impl Strategy<Value = Draft> {
    let panel = (
        0.6..4.0_f64,
        0.4..1.25_f64,
        -40.0..50.0_f64,
        -12.0..25.0_f64,
        -4.0..3.0_f64,
    );
    let airfoils = prop_oneof![
        prop::strategy::Just(vec!["NACA 2412"]),
        prop::strategy::Just(vec!["NACA 0012", "NACA 4409"]),
        prop::strategy::Just(vec!["NACA 23015", "NACA 23012", "NACA 0010"]),
    ];
    let edge = prop_oneof![
        prop::strategy::Just(None),
        prop::strategy::Just(Some(0.0)),
        (0.3..2.0_f64).prop_map(Some)
    ];
    let sides = prop_oneof![
        prop::strategy::Just(Sides::Both),
        prop::strategy::Just(Sides::Starboard),
        prop::strategy::Just(Sides::Port),
        prop::strategy::Just(Sides::Pair)
    ];
    let shape = (any::<bool>(), any::<bool>(), prop::option::of(0.05..0.7_f64));
    (
        100.0..900.0_f64,
        prop::collection::vec(panel, 1..6),
        airfoils,
        (-3.0..6.0_f64, 0.0..0.6_f64),
        edge,
        sides,
        shape,
    )
        .prop_map(
            |(root, panels, airfoils, (incidence, axis), edge, sides, (smooth, linear, body))| Draft {
                root,
                panels,
                airfoils,
                incidence,
                axis,
                edge,
                sides,
                surface: if smooth {
                    SurfaceKind::Smooth
                } else {
                    SurfaceKind::Ruled
                },
                law: if linear {
                    TwistLaw::Linear
                } else {
                    TwistLaw::Straight
                },
                body,
            },
        )
}

fn assert_as_asked(wing: &Wing) {
    for check in &wing.checks {
        assert!(check.ok, "{check:#?}");
    }
    for (figures, mesh) in wing.figures.iter().zip(&wing.meshes) {
        assert!(figures.volume > 0.0);
        assert!(mesh.deviation <= wing.spec.facet_tolerance);
        let off = (mesh.volume() - figures.volume).abs();
        assert!(off <= wing.spec.facet_tolerance * figures.surface_area, "{off}");
    }
}

proptest! {
    #![proptest_config(Config::with_cases(40))]

    #[test]
    fn every_wing_in_range_is_built_as_asked(draft in drafts()) {
        match Wing::build(&prepared(&draft)) {
            Ok(wing) => {
                assert_as_asked(&wing);
                wing.step(Options { time_stamp: "2025-01-01T00:00:00", id: "draft" }).unwrap();
            }
            // a short panel between leaning sections may be refused, with its reason
            Err(super::Error::Loft(_)) => {}
            // a smooth surface through uneven stations may be refused, with what it would do
            Err(super::Error::Planform(planform::Error::Overshoot { chord, inner, outer, .. })) => {
                assert!(chord < inner.min(outer) || chord > inner.max(outer));
            }
            Err(error) => panic!("{error}"),
        }
    }
}

#[test]
fn an_ellipse_has_its_area_span_and_mean_chord() {
    for (sweep_at, sides) in [(0.25, Sides::Both), (0.6, Sides::Starboard)] {
        let text = format!(
            "[planform]\nspan = 2000\nroot_chord = 250\ntaper_ratio = 1\nsweep_at = {sweep_at}\ndihedral = 3\n\
             [setting]\nincidence = 2\ntwist = -2\n[airfoil]\nroot = \"NACA 2412\"\n"
        );
        let source = Source {
            text: &text,
            file: "ellipse.toml",
            set: &[],
        };
        let mut prepared = prepare(&source, &|_| Err(std::io::ErrorKind::NotFound.into())).unwrap();
        prepared.spec.outline = Outline::Ellipse;
        prepared.spec.sides = sides;
        prepared.spec.stated.clear();
        let wing = Wing::build(&prepared).unwrap();
        assert_as_asked(&wing);
        // the full ellipse: S = π b c / 4; MAC / c₀ = 8 / 3π = 0.848826, y / s = 4 / 3π = 0.424413 (exact)
        let reference = &wing.planform.wing;
        let area = std::f64::consts::PI * 2000.0 * 250.0 / 4.0;
        assert!(
            (reference.area / area - 1.0).abs() < 1e-12,
            "{}",
            reference.area / area
        );
        let found = wing.slices.planform();
        assert!(
            (2.0 * found.area / area - 1.0).abs() < 1e-4,
            "{}",
            2.0 * found.area / area
        );
        assert!(
            (found.mac / reference.root_chord - 0.848_826).abs() < 1e-3,
            "{}",
            found.mac / reference.root_chord
        );
        assert!(
            (found.offset / 1000.0 - 0.424_413).abs() < 1e-3,
            "{}",
            found.offset / 1000.0
        );
        assert_eq!(
            wing.solids[0].faces.len(),
            if sides == Sides::Both { 8 } else { 5 }
        );
    }
}

#[test]
fn the_aerodynamic_centre_goes_where_it_is_put() {
    let text = "[planform]\nspan = 2000\nroot_chord = 250\ntip_chord = 150\nsweep = 20\ndihedral = 5\n\
                [setting]\nincidence = 2\n[airfoil]\nroot = \"NACA 2412\"\n";
    let source = Source {
        text,
        file: "placed.toml",
        set: &[],
    };
    let mut prepared = prepare(&source, &|_| Err(std::io::ErrorKind::NotFound.into())).unwrap();
    prepared.spec.placing = Placing::AerodynamicCentre([1234.0, 0.0, -56.0]);
    let wing = Wing::build(&prepared).unwrap();
    assert_as_asked(&wing);
    let record = wing.record(std::collections::BTreeMap::new());
    let [x, _, z] = record.reference.aerodynamic_centre;
    assert!((x - 1234.0).abs() < 1e-9 && (z + 56.0).abs() < 1e-9, "{x} {z}");
    // the quarter point of the chord that is found on the solid at the mean chord's place
    let found = wing
        .slices
        .at_offset(wing.planform.wing.mac.offset)
        .unwrap()
        .at(0.25);
    assert!(
        (found.x - 1234.0).abs() < 1e-2 && (found.z + 56.0).abs() < 1e-2,
        "{found}"
    );
}
