//! What is asked of the solid, beside what is found on it.

use crate::measure::{self, Ask, Quantity, Slices};
use crate::planform::{ChordLine, Planform, SpanLaw};
use crate::spec::{IncidenceAt, Outline, Sides, Spec};

/// Lengths may deviate by this share of the span, areas by this share of themselves.
const RELATIVE: f64 = 1e-6;
/// Angles may deviate by this \[rad\]: 0.01°.
const ANGLE: f64 = 0.01 * std::f64::consts::PI / 180.0;

/// All asks of a wing, measured on one side.
pub(super) fn asks(spec: &Spec, planform: &Planform, slices: &Slices) -> Vec<Ask> {
    let mut asks = Asks {
        list: Vec::new(),
        length: RELATIVE * planform.wing.span,
        found: slices.planform(),
    };
    let sides = match spec.sides {
        Sides::Both | Sides::Pair => 2.0,
        Sides::Starboard | Sides::Port => 1.0,
    };
    asks.whole(spec, planform, slices, sides);
    asks.mean_chord(spec, planform, slices);
    asks.stations(spec, planform, slices);
    asks.list
}

struct Asks {
    list: Vec<Ask>,
    /// Allowed deviation of lengths \[mm\].
    length: f64,
    /// Integrals over the chords found.
    found: measure::Planform,
}

impl Asks {
    fn add(&mut self, name: impl Into<String>, quantity: Quantity, asked: f64, built: f64, allowed: f64) {
        self.list.push(Ask {
            name: name.into(),
            quantity,
            asked,
            built,
            allowed,
        });
    }

    fn length(&mut self, name: impl Into<String>, asked: f64, built: f64) {
        let allowed = self.length;
        self.add(name, Quantity::Length, asked, built, allowed);
    }

    fn angle(&mut self, name: impl Into<String>, asked: f64, built: f64) {
        self.add(name, Quantity::Angle, asked, built, ANGLE);
    }

    /// Area and span of the built wing.
    ///
    /// Where it reaches the centreline and its outline is the reference wing's they are the reference wing's own; chords
    /// between twisted stations are a little shorter than the trapezoid's, and that much is allowed (see the note).
    /// Elsewhere what was laid out is asked for.
    fn whole(&mut self, spec: &Spec, planform: &Planform, slices: &Slices, sides: f64) {
        let (found, expected) = (self.found, planform.expected);
        let reference = 0.5 * planform.wing.area;
        let straight = matches!(planform.law, SpanLaw::Straight);
        let whole = planform.start == 0.0 && (straight || spec.outline == Outline::Ellipse);
        let asked = if whole { reference } else { expected.area };
        let mut name = if planform.start > 0.0 {
            "exposed area"
        } else {
            "planform area"
        }
        .to_owned();
        if sides < 2.0 {
            name += ", one side";
        }
        // the smooth outline of an ellipse is met within 1e-4 of its area
        let relative = if spec.outline == Outline::Ellipse {
            1e-4
        } else {
            RELATIVE
        };
        let allowed = relative * reference + (asked - expected.area).abs();
        self.add(
            name,
            Quantity::Area,
            asked * sides,
            found.area * sides,
            allowed * sides,
        );
        let axis = spec.setting.twist_axis;
        let last = slices.stations() - 1;
        let tip = slices.offset(&slices.at_station(last).at(axis));
        let span = 0.5 * planform.wing.span;
        self.length(
            if sides > 1.0 { "span" } else { "semispan" },
            span * sides,
            tip * sides,
        );
        if planform.start > 0.0 {
            let side = slices.offset(&slices.at_station(0).at(axis));
            self.length(
                "fuselage side from the centreline",
                planform.offset(planform.start),
                side,
            );
        }
    }

    /// The mean aerodynamic chord: of the whole wing, and the built section where it lies.
    fn mean_chord(&mut self, spec: &Spec, planform: &Planform, slices: &Slices) {
        let (mac, found, expected) = (&planform.wing.mac, self.found, planform.expected);
        if planform.start == 0.0 {
            let allowed = self.length + (mac.length - expected.mac).abs();
            self.add(
                "mean aerodynamic chord",
                Quantity::Length,
                mac.length,
                found.mac,
                allowed,
            );
            let allowed = self.length + (mac.offset - expected.offset).abs();
            self.add(
                "its distance from the centreline",
                Quantity::Length,
                mac.offset,
                found.offset,
                allowed,
            );
        }
        if let Some(chord) = slices.at_offset(mac.offset) {
            self.length("chord of the section there", mac.local_chord, chord.length());
            let at_mac = spec.setting.at == IncidenceAt::Mac || spec.setting.for_cruise;
            let asked = if at_mac { planform.incidence } else { mac.incidence };
            self.angle(
                "incidence at the mean aerodynamic chord",
                asked,
                chord.incidence(),
            );
        }
    }

    /// Chords, sweep, dihedral and twist from station to station of the spec.
    fn stations(&mut self, spec: &Spec, planform: &Planform, slices: &Slices) {
        let axis = spec.setting.twist_axis;
        let count = planform.stations.len();
        // stations of the layout that are on the solid: its last ones, the first of them perhaps the fuselage side
        let skipped = count - slices.stations();
        let on_solid = |mark: usize| mark.checked_sub(skipped);
        let inner: ChordLine = planform.chord(planform.start);
        let first = slices.at_station(0);
        let name = if planform.start > 0.0 {
            "at the fuselage side"
        } else {
            "at the root"
        };
        self.length(format!("chord {name}"), inner.length(), first.length());
        let asked = match spec.setting.at {
            IncidenceAt::Root if planform.start == 0.0 => spec.setting.incidence,
            _ => inner.incidence(),
        };
        self.angle(format!("incidence {name}"), asked, first.incidence());
        let panels = planform.panels.len();
        let mut before = (inner, first);
        for (k, panel) in planform.panels.iter().enumerate() {
            let mark = planform.marks[k + 1];
            let Some(station) = on_solid(mark).filter(|station| *station > 0) else {
                continue;
            };
            let found = slices.at_station(station);
            let asked = &planform.stations[mark];
            let place = if k + 1 == panels {
                "tip".to_owned()
            } else {
                format!("end of panel {}", k + 1)
            };
            let of = if panels == 1 {
                String::new()
            } else {
                format!(" of panel {}", k + 1)
            };
            self.length(format!("chord at the {place}"), asked.chord, found.length());
            let way = found.at(axis) - before.1.at(axis);
            let across = if spec.sides == Sides::Port { -way.y } else { way.y };
            let run = if spec.panels[k].is_steep() {
                across.hypot(way.z)
            } else {
                across
            };
            let line = if (axis - 0.25).abs() < 1e-12 {
                "quarter-chord".to_owned()
            } else {
                format!("{} %-chord", 100.0 * axis)
            };
            let from_side = planform.start > 0.0 && before.0 == inner;
            let (sweep, dihedral) = if from_side || spec.outline == Outline::Ellipse {
                // from a place that is no station: as laid out between the same two places
                let way = planform.chord(mark as f64).at(axis) - before.0.at(axis);
                ((way.x / way.y).atan(), way.z.atan2(way.y))
            } else {
                (panel.axis_sweep, panel.dihedral)
            };
            self.angle(format!("{line} sweep{of}"), sweep, (way.x / run).atan());
            self.angle(format!("dihedral{of}"), dihedral, way.z.atan2(across));
            // twist counts from the root on the centreline, which a fuselage may hide: then by the incidence
            let root = if planform.start > 0.0 {
                planform.stations[0].incidence
            } else {
                first.incidence()
            };
            self.angle(
                format!("twist at the {place}"),
                asked.twist,
                found.incidence() - root,
            );
            before = (planform.chord(mark as f64), found);
        }
    }
}
