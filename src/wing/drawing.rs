//! What the drawing shows of a wing.

use std::collections::BTreeMap;

use nalgebra::Point3;

use super::Wing;
use crate::mesh::Mesh;
use crate::planform::ReferenceLine;
use crate::spec::{Outline, Sides, Unit};
use crate::write::drawing::{Angle, SectionShape, Setting, Sheet, Side, Subject, sheet, svg};
use crate::write::record::Record;

/// Facets of a drawing stay within this share of the span of the surface: a few hundredths of a millimetre of paper.
const FINE: f64 = 1.2e-4;
/// Sections of a drawing stay within this share of the chord.
const SMOOTH: f64 = 4e-5;

impl Wing {
    /// The dimensioned drawing as SVG, with a date in the title block where one is given.
    pub fn drawing(&self, date: Option<&str>) -> Vec<u8> {
        svg(&self.sheet(date), Setting::File).into_bytes()
    }

    /// The dimensioned drawing, laid out.
    pub fn sheet(&self, date: Option<&str>) -> Sheet {
        let record = self.record(BTreeMap::new());
        self.sheet_with(&record, date)
    }

    /// The drawing laid out with figures that are at hand.
    pub(super) fn sheet_with(&self, record: &Record, date: Option<&str>) -> Sheet {
        let fine = FINE * self.planform.wing.span;
        let finer: Vec<Mesh>;
        let meshes = if self.meshes.iter().all(|mesh| mesh.deviation <= fine) {
            &self.meshes
        } else {
            finer = self.facets_within(fine);
            &finer
        };
        sheet(&Subject {
            record,
            unit: self.spec.unit.millimetres(),
            angle: match self.spec.unit {
                Unit::Inch | Unit::Foot => Angle::Third,
                Unit::Millimetre | Unit::Centimetre | Unit::Metre => Angle::First,
            },
            meshes,
            reference: &self.reference,
            sides: self.drawn_sides(),
            sections: self.drawn_sections(),
            lines: self.drawn_lines(),
            fin: self.planform.fin,
            sweep_line: self.sweep_line(),
            is_trapezoid: self.spec.outline == Outline::Trapezoid && self.planform.marks.len() == 2,
            origin: Point3::from(self.planform.shift),
            body: (self.spec.body.filter(|_| !self.planform.fin)).map(|body| 0.5 * body.width),
            date,
        })
    }

    /// Name of the line that sweep is measured on, as the checks have it.
    fn sweep_line(&self) -> String {
        let axis = self.spec.setting.twist_axis;
        if (axis - 0.25).abs() < 1e-12 {
            "quarter-chord".into()
        } else {
            format!("{} %-chord", 100.0 * axis)
        }
    }

    fn drawn_sides(&self) -> Vec<Side> {
        let signs: &[f64] = match self.spec.sides {
            Sides::Both | Sides::Pair => &[1.0, -1.0],
            Sides::Starboard => &[1.0],
            Sides::Port => &[-1.0],
        };
        let side = |sign: f64| {
            let mirror = |p: Point3<f64>| Point3::new(p.x, p.y * sign, p.z) + self.planform.shift;
            let (stations, marks) = (&self.planform.stations, &self.planform.marks);
            let mac = &self.planform.wing.mac;
            // the first stations may lie inside the fuselage
            let hidden = stations.len() - self.loft.places.len();
            let joints = marks[1..marks.len() - 1].iter().filter_map(|mark| {
                let (strip, v) = self.loft.places[mark.checked_sub(hidden)?];
                let skin = self.loft.upper(strip);
                Some(
                    (0..=48_u32)
                        .map(|i| mirror(skin.at(f64::from(i) / 48.0, v)))
                        .collect(),
                )
            });
            Side {
                sign,
                stations: (marks.iter())
                    .map(|mark| &stations[*mark])
                    .map(|s| [s.leading_edge(), s.trailing_edge(), s.axis].map(mirror))
                    .collect(),
                joints: joints.collect(),
                mac: [mac.leading_edge, mac.trailing_edge].map(mirror),
            }
        };
        signs.iter().map(|sign| side(*sign)).collect()
    }

    /// The sections at the root, at the mean aerodynamic chord and at the tip.
    pub(super) fn drawn_sections(&self) -> Vec<SectionShape> {
        let start = self.planform.start;
        let last = f64::from(u32::try_from(self.planform.stations.len() - 1).unwrap_or(u32::MAX));
        let places = [
            (if start > 0.0 { "fuselage side" } else { "root" }, start),
            ("MAC", self.planform.wing.mac.place),
            ("tip", last),
        ];
        let shape = |(name, place): (&str, f64)| {
            let nominal = self.planform.wing.mac.length;
            // nothing to draw where the mean chord lies inside the fuselage
            let cut = self.cut(place, SMOOTH * nominal).ok()?;
            let [thickness, camber] = cut.thickness_and_camber();
            Some(SectionShape {
                place: name.into(),
                airfoil: self.airfoil_at(place),
                chord: cut.chord(),
                incidence: cut.incidence(),
                thickness,
                camber,
                upper: cut.upper,
                lower: cut.lower,
            })
        };
        places.into_iter().filter_map(shape).collect()
    }

    /// Name of the airfoil at a place; of both where they blend.
    fn airfoil_at(&self, place: f64) -> String {
        let at = |k: usize| f64::from(u32::try_from(self.planform.marks[k]).unwrap_or(u32::MAX));
        let panels = self.planform.panels.len();
        let panel = (0..panels).rev().find(|k| at(*k) <= place).unwrap_or(0);
        let fraction = (place - at(panel)) / (at(panel + 1) - at(panel));
        let name = |station: usize| match station {
            0 => self.spec.root_airfoil.text.as_str(),
            k => self.spec.panels[k - 1].airfoil.text.as_str(),
        };
        let (inner, outer) = (name(panel), name(panel + 1));
        if inner == outer || fraction <= 0.0 {
            inner.to_owned()
        } else if fraction >= 1.0 {
            outer.to_owned()
        } else {
            format!("{inner} to {outer}")
        }
    }

    fn drawn_lines(&self) -> Vec<(String, String)> {
        let exists = |name: &str| {
            let named = |line: &ReferenceLine| line.name.starts_with(name);
            self.reference.lines.iter().any(named)
        };
        (self.spec.lines.iter())
            .filter(|line| exists(&line.name))
            .map(|line| {
                let percent = |share: f64| format!("{:.4}", 100.0 * share);
                let [at, from, to] = [line.chord_fraction, line.from, line.to].map(|share| {
                    let text = percent(share);
                    text.trim_end_matches('0').trim_end_matches('.').to_owned()
                });
                (line.name.clone(), format!("{at} % chord, {from}–{to} % semispan"))
            })
            .collect()
    }
}
