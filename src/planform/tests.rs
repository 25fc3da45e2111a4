//! Known answers of the reference wing.

use crate::spec::{
    AirfoilChanges, AirfoilForm, AirfoilSource, IncidenceAt, Outline, Panel, Place, Placing, Setting,
    SharpBy, Sides, Spec, StepForm, SurfaceKind, TipForm, TwistKind, TwistLaw, Unit,
};

use super::Planform;

fn airfoil() -> AirfoilSource {
    AirfoilSource {
        text: "NACA 0012".into(),
        form: AirfoilForm::Either,
        changes: AirfoilChanges::default(),
        place: Place::default(),
    }
}

/// A straight wing of panels given as (span, tip chord, leading-edge sweep in degrees), lengths in mm.
fn wing(root_chord: f64, panels: &[(f64, f64, f64)]) -> Spec {
    let panels = panels.iter().map(|(span, tip_chord, sweep)| Panel {
        span: *span,
        tip_chord: *tip_chord,
        sweep: sweep.to_radians(),
        sweep_at: 0.0,
        dihedral: 0.0,
        twist: 0.0,
        airfoil: airfoil(),
    });
    Spec {
        name: "test".into(),
        description: None,
        unit: Unit::Millimetre,
        root_chord,
        root_airfoil: airfoil(),
        panels: panels.collect(),
        setting: Setting {
            incidence: 0.0,
            at: IncidenceAt::Mac,
            twist_axis: 0.25,
            twist_kind: TwistKind::default(),
            twist_law: TwistLaw::default(),
            for_cruise: false,
        },
        trailing_edge: None,
        sharp_by: SharpBy::default(),
        facet_tolerance: 0.05,
        sides: Sides::Both,
        step: StepForm::default(),
        lines: Vec::new(),
        load: None,
        cruise: None,
        body: None,
        placing: Placing::default(),
        outline: Outline::default(),
        surface: SurfaceKind::default(),
        tip: TipForm::default(),
        trailing_edge_ratio: None,
        stated: Vec::new(),
        notes: Vec::new(),
    }
}

#[test]
fn three_station_wing_has_the_hand_integrated_figures() {
    // y = (0, 2, 6), c = (3, 2, 1), x_LE = (0, 1, 3): half area 11, MAC 2, y 82/33, x_LE 41/33 (exact, by hand)
    let wing = wing(
        3.0,
        &[
            (2.0, 2.0, 0.5_f64.atan().to_degrees()),
            (4.0, 1.0, 0.5_f64.atan().to_degrees()),
        ],
    );
    let planform = Planform::of(&wing, &[0.0; 3]).unwrap();
    assert!((planform.wing.area - 22.0).abs() < 1e-12);
    assert!((planform.wing.mac.length - 2.0).abs() < 1e-12);
    assert!((planform.wing.mac.offset - 82.0 / 33.0).abs() < 1e-12);
    assert!((planform.wing.mac.leading_edge.x - 41.0 / 33.0).abs() < 1e-12);
}

#[test]
fn twist_between_stations_follows_the_straight_elements() {
    // taper 0.5, tip -2°: -1.2000° at 0.75 of the span, not -1.5° (tan θ = η c_t sin θ_t/((1-η) c_r + η c_t cos θ_t))
    let mut wing = wing(2.0, &[(4.0, 1.0, 0.0)]);
    wing.panels[0].twist = (-2.0_f64).to_radians();
    wing.setting.at = IncidenceAt::Root;
    let planform = Planform::of(&wing, &[0.0; 3]).unwrap();
    let there = planform.chord(0.75);
    let exact = (0.75 * (-2.0_f64).to_radians().sin() / (0.5 + 0.75 * (2.0_f64).to_radians().cos())).atan();
    assert!((there.incidence() - exact).abs() < 1e-14);
    assert!((there.incidence().to_degrees() + 1.2).abs() < 1e-3);
}

#[test]
fn the_incidence_asked_for_is_the_built_section_s_at_the_mean_aerodynamic_chord() {
    for dihedral in [0.0_f64, 10.0, 40.0] {
        let mut wing = wing(300.0, &[(500.0, 250.0, 10.0), (700.0, 120.0, 20.0)]);
        wing.setting.incidence = 2.0_f64.to_radians();
        wing.panels[0].twist = (-1.0_f64).to_radians();
        wing.panels[1].twist = (-4.0_f64).to_radians();
        wing.panels
            .iter_mut()
            .for_each(|panel| panel.dihedral = dihedral.to_radians());
        let planform = Planform::of(&wing, &[0.0; 3]).unwrap();
        assert!((planform.wing.mac.incidence.to_degrees() - 2.0).abs() < 1e-12);
    }
}
