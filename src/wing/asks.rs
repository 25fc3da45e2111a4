//! What is asked of the solid, beside what is found on it.

use crate::measure::{Ask, Quantity, Slices};
use crate::planform::Planform;
use crate::spec::{IncidenceAt, Sides, Spec};

/// Lengths may deviate by this share of the span, areas by this share of themselves.
const RELATIVE: f64 = 1e-6;
/// Angles may deviate by this \[rad\]: 0.01°.
const ANGLE: f64 = 0.01 * std::f64::consts::PI / 180.0;

/// All asks of a wing, measured on one side.
pub(super) fn asks(spec: &Spec, planform: &Planform, slices: &Slices) -> Vec<Ask> {
    let wing = &planform.wing;
    let length = RELATIVE * wing.span;
    let mut asks = Vec::new();
    let mut add = |name: String, quantity, asked, built, allowed| {
        asks.push(Ask {
            name,
            quantity,
            asked,
            built,
            allowed,
        });
    };
    let axis = spec.setting.twist_axis;
    let last = slices.stations() - 1;
    let chords: Vec<_> = (0..=last).map(|k| slices.at_station(k)).collect();
    let found = slices.planform();
    // chords between the stations of a twisted panel are a little shorter than the trapezoid's: see the note
    let shortfall = wing.area - planform.straight_element_area();
    let sides = match spec.sides {
        Sides::Both | Sides::Pair => 2.0,
        Sides::Starboard | Sides::Port => 1.0,
    };
    add(
        if sides > 1.0 {
            "planform area"
        } else {
            "planform area, one side"
        }
        .into(),
        Quantity::Area,
        wing.area * sides / 2.0,
        found.area * sides,
        RELATIVE * wing.area + shortfall * sides / 2.0,
    );
    let tip_offset = slices.offset(&chords[last].at(axis)) - slices.offset(&chords[0].at(axis));
    let span_name = if sides > 1.0 { "span" } else { "semispan" };
    add(
        span_name.into(),
        Quantity::Length,
        wing.span * sides / 2.0,
        tip_offset * sides,
        length,
    );
    for (k, (chord, station)) in chords.iter().zip(&planform.stations).enumerate() {
        add(
            format!("chord at the {}", place(k, last)),
            Quantity::Length,
            station.chord,
            chord.length(),
            length,
        );
    }
    let mac = &wing.mac;
    let relative_shortfall = shortfall / wing.area;
    add(
        "mean aerodynamic chord".into(),
        Quantity::Length,
        mac.length,
        found.mac,
        length + 4.0 * relative_shortfall * mac.length,
    );
    add(
        "its distance from the centreline".into(),
        Quantity::Length,
        mac.offset,
        found.offset,
        length + 4.0 * relative_shortfall * mac.offset.max(mac.length),
    );
    if let Some(chord) = slices.at_offset(mac.offset) {
        add(
            "chord of the section there".into(),
            Quantity::Length,
            mac.local_chord,
            chord.length(),
            length,
        );
        let asked = if spec.setting.at == IncidenceAt::Mac {
            spec.setting.incidence
        } else {
            mac.incidence
        };
        add(
            "incidence at the mean aerodynamic chord".into(),
            Quantity::Angle,
            asked,
            chord.incidence(),
            ANGLE,
        );
    }
    let root = match spec.setting.at {
        IncidenceAt::Root => spec.setting.incidence,
        IncidenceAt::Mac => planform.stations[0].incidence,
    };
    add(
        "incidence at the root".into(),
        Quantity::Angle,
        root,
        chords[0].incidence(),
        ANGLE,
    );
    for (k, panel) in planform.panels.iter().enumerate() {
        let of = if last == 1 {
            String::new()
        } else {
            format!(" of panel {}", k + 1)
        };
        let (a, b) = (chords[k].at(axis), chords[k + 1].at(axis));
        let way = b - a;
        let across = if spec.sides == Sides::Port { -way.y } else { way.y };
        let run = if spec.panels[k].is_steep() {
            across.hypot(way.z)
        } else {
            across
        };
        let line = if (axis - 0.25).abs() < 1e-12 {
            "quarter-chord".into()
        } else {
            format!("{} %-chord", 100.0 * axis)
        };
        add(
            format!("{line} sweep{of}"),
            Quantity::Angle,
            panel.axis_sweep,
            (way.x / run).atan(),
            ANGLE,
        );
        add(
            format!("dihedral{of}"),
            Quantity::Angle,
            panel.dihedral,
            way.z.atan2(across),
            ANGLE,
        );
        let twist = chords[k + 1].incidence() - chords[0].incidence();
        add(
            format!("twist at the {}", place(k + 1, last)),
            Quantity::Angle,
            spec.panels[k].twist,
            twist,
            ANGLE,
        );
    }
    asks
}

fn place(station: usize, last: usize) -> String {
    match station {
        0 => "root".into(),
        k if k == last => "tip".into(),
        k => format!("end of panel {k}"),
    }
}
