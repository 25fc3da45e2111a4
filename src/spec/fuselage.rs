//! The fuselage at the wing, and the wing's place on it.

use super::fault::Fault;
use super::panels::ReferencePlane;
use super::quantity::significant;
use super::written::{self, Given};
use super::{Body, Outline, Panel, Placing};

/// Largest width of a body, as a part of the span \[-\].
const WIDEST_BODY: f64 = 0.8;
/// How far the aerodynamic centre's y may be typed from the wing's own, as a part of the semispan \[-\].
const OFF_CENTRE: f64 = 1e-3;

/// The fuselage; `None` without one, or where something is wrong with it. The span \[mm\] is `None` while it is not known.
pub(super) fn body(
    body: &written::Body,
    span: Option<f64>,
    plane: ReferencePlane,
    faults: &mut Vec<Fault>,
) -> Option<Body> {
    let width = body.width.given()?;
    if plane == ReferencePlane::Upright {
        faults.push(at(
            width,
            "a fin starts at its root: [body] does not go with a first panel steeper than 60 deg".to_owned(),
            "Delete [body], and place the fin with [place].",
        ));
    } else if let Some(span) = span.filter(|span| width.value > WIDEST_BODY * span) {
        let problem = format!(
            "the body is {} % as wide as the span of {}; allowed: at most 80 %",
            significant((1000.0 * width.value / span).round() / 10.0),
            width.scale.show(span)
        );
        faults.push(at(width, problem, "Make the body narrower, or the span larger."));
    }
    Some(Body {
        width: width.value,
        position: body.position.or_default(),
        carry_through: body.carry_through.or(false),
    })
}

/// Where the wing goes. `centre` is y of its aerodynamic centre \[mm\] and the semispan \[mm\], once they are known.
pub(super) fn placing(
    place: &written::Place,
    centre: Option<(f64, f64)>,
    faults: &mut Vec<Fault>,
) -> Placing {
    let Some(asked) = place.aerodynamic_centre.given() else {
        return Placing::RootLeadingEdge([place.x.or(0.0), place.y.or(0.0), place.z.or(0.0)]);
    };
    for (entry, axis) in [(&place.x, "x"), (&place.y, "y"), (&place.z, "z")] {
        if let Some(given) = entry.given() {
            let problem = format!(
                "contradicts aerodynamic_centre = {} ({}): both say where the wing goes in {axis}",
                asked.text,
                asked.place.short()
            );
            faults.push(at(given, problem, "Delete one of the two."));
        }
    }
    let y = asked.value[1];
    if let Some((own, semispan)) = centre
        && y != 0.0
        && (y.abs() - own).abs() > OFF_CENTRE * semispan
    {
        let problem = format!(
            "y = {} is not the wing's own: its aerodynamic centre lies at y = {}, and a place moves it in x and z",
            asked.scale.show(y),
            asked.scale.show(own)
        );
        faults.push(at(asked, problem, "Write 0, the plane of symmetry, for y."));
    }
    Placing::AerodynamicCentre(asked.value)
}

/// y of the mean aerodynamic chord of one side, and the semispan, both in the y direction \[mm\].
///
/// ```text
/// η = ∫ η c dη / ∫ c dη, η in the reference plane; an ellipse has η = 4 s / (3 π)
/// ```
pub(super) fn centre(root_chord: f64, panels: &[Panel], outline: Outline) -> (f64, f64) {
    let plane = ReferencePlane::of(panels.first().map_or(0.0, |panel| panel.dihedral));
    let (mut area, mut moment, mut start, mut inner) = (0.0, 0.0, 0.0, root_chord);
    for panel in panels {
        let width = panel.span * plane.projection(panel.dihedral);
        let chord = panel.tip_chord;
        area += 0.5 * width * (inner + chord);
        moment += width * (0.5 * start * (inner + chord) + width * (inner + 2.0 * chord) / 6.0);
        (start, inner) = (start + width, chord);
    }
    let offset = match outline {
        Outline::Trapezoid => moment / area,
        Outline::Ellipse => 4.0 * start / (3.0 * std::f64::consts::PI),
    };
    let (mut y, mut reach, mut own) = (0.0, 0.0, None);
    for panel in panels {
        let width = panel.span * plane.projection(panel.dihedral);
        let across = panel.span * panel.dihedral.cos();
        if own.is_none() && offset <= reach + width {
            own = Some(y + across * (offset - reach) / width);
        }
        (y, reach) = (y + across, reach + width);
    }
    (own.unwrap_or(y), y)
}

fn at<T>(given: &Given<T>, problem: String, remedy: &str) -> Fault {
    Fault {
        place: given.place.clone(),
        text: given.text.clone(),
        problem,
        remedy: remedy.to_owned(),
    }
}
