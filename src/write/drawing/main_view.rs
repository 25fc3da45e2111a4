//! Dimensions of the view that shows the planform, and of the dihedral.

use nalgebra::{Point3, Vector3};

use super::dimension::{Angular, Linear, Way, angular, linear, note};
use super::sheet::{At, Datum, Rect, Sheet, Stroke};
use super::view::View;
use super::{Side, Subject, angle_text, length_text};
use crate::write::lettering::{CAPITALS, fitted};
use crate::write::markup::clean;

/// An angle on paper may differ from the figure it stands for by this \[rad\], or it is not drawn: panels whose sweep or
/// dihedral is seen askew.
const TRUE: f64 = 2e-3;
/// Distance between levels of dimension lines \[mm\].
const LEVEL: f64 = 8.0;
/// Room for the name of a line \[mm\].
const NAME: f64 = 46.0;

/// Where the tip chord laid off ahead of the root and the root chord laid off behind the tip end: the line between them
/// meets the mid-chord line at the mean aerodynamic chord of a wing of one panel. Nothing where there are several.
pub(super) fn construction(subject: &Subject<'_>) -> Vec<Point3<f64>> {
    let Some(side) = subject.sides.first().filter(|_| subject.is_trapezoid) else {
        return Vec::new();
    };
    let [root, tip] = side.stations.as_slice() else {
        return Vec::new();
    };
    let chord = |station: &[Point3<f64>; 3]| station[1] - station[0];
    let length = |station: &[Point3<f64>; 3]| chord(station).norm();
    let direction = |station: &[Point3<f64>; 3]| chord(station) / length(station);
    vec![
        root[0] - direction(root) * length(tip),
        tip[1] + direction(tip) * length(root),
    ]
}

/// The view that shows the planform.
pub(super) struct MainView<'a> {
    subject: &'a Subject<'a>,
    view: View,
    /// Direction of chords on paper.
    chordwise: Way,
    /// Direction of the span on paper.
    spanwise: Way,
    /// What the wing and its construction fill on paper.
    bounds: Rect,
}

impl<'a> MainView<'a> {
    pub(super) fn new(subject: &'a Subject<'a>, view: View) -> Self {
        let (chordwise, spanwise) = if subject.fin {
            (Way::Across, Way::Upright)
        } else {
            (Way::Upright, Way::Across)
        };
        let construction = construction(subject);
        let points = (subject.meshes.iter().flat_map(|mesh| &mesh.corners))
            .chain(subject.reference.lines.iter().flat_map(|line| &line.points))
            .chain(&construction);
        Self {
            subject,
            view,
            chordwise,
            spanwise,
            bounds: view.bounds(points),
        }
    }

    /// Level `k` of dimension lines beyond the nose.
    fn level(&self, k: f64) -> f64 {
        let along = self.chordwise.along();
        let nose = self.view.at(&Point3::new(-1.0, 0.0, 0.0))[along] - self.view.at(&Point3::origin())[along];
        let (low, high) = match self.chordwise {
            Way::Across => (self.bounds.left, self.bounds.right),
            Way::Upright => (self.bounds.top, self.bounds.bottom),
        };
        if nose > 0.0 {
            high + LEVEL * k
        } else {
            low - LEVEL * k
        }
    }

    /// Outward direction of a side on paper along the span: -1 or 1.
    fn outward(&self, side: &Side) -> f64 {
        let k = self.spanwise.along();
        let (root, tip) = (side.stations[0][2], side.stations[side.stations.len() - 1][2]);
        (self.view.at(&tip)[k] - self.view.at(&root)[k]).signum()
    }

    /// Draws all dimensions and notes of the view.
    pub(super) fn draw(&self, sheet: &mut Sheet) {
        let sides = &self.subject.sides;
        let (Some(first), Some(other)) = (sides.first(), sides.last()) else {
            return;
        };
        self.construct(sheet, first);
        self.span(sheet, first, other);
        self.chords(sheet, other, sides.len() > 1);
        self.mean_chord(sheet, first);
        self.sweeps(sheet, other);
        self.centre(sheet, first);
        self.names(sheet, other);
    }

    fn construct(&self, sheet: &mut Sheet, side: &Side) {
        let ends = construction(self.subject);
        let [ahead, behind] = ends.as_slice() else {
            return;
        };
        let (root, tip) = (side.stations[0], side.stations[1]);
        let at = |point: &Point3<f64>| self.view.at(point);
        for line in [
            vec![at(&root[0]), at(ahead)],
            vec![at(&tip[1]), at(behind)],
            vec![at(ahead), at(behind)],
            vec![
                at(&nalgebra::center(&root[0], &root[1])),
                at(&nalgebra::center(&tip[0], &tip[1])),
            ],
        ] {
            sheet.titled(
                Stroke::Construction,
                line,
                Some("construction of the mean aerodynamic chord".into()),
            );
        }
    }

    fn span(&self, sheet: &mut Sheet, first: &Side, other: &Side) {
        let record = self.subject.record;
        let tip = |side: &Side| self.view.at(&side.stations[side.stations.len() - 1][2]);
        let (from, quantity, value, name) = if self.subject.sides.len() > 1 {
            (tip(first), "reference.span", record.reference.span, "span")
        } else {
            let root = self.view.at(&first.stations[0][2]);
            let name = if self.subject.fin {
                "span, one side"
            } else {
                "semispan"
            };
            (root, "built.span", record.built.span, name)
        };
        self.length(
            sheet,
            self.spanwise,
            [from, tip(other)],
            self.level(2.0),
            name,
            quantity,
            value,
            0.0,
        );
    }

    fn chords(&self, sheet: &mut Sheet, side: &Side, both: bool) {
        let reference = &self.subject.record.reference;
        let k = self.spanwise.along();
        let out = self.outward(side);
        let at = |station: &[Point3<f64>; 3]| [self.view.at(&station[0]), self.view.at(&station[1])];
        let (root, tip) = (at(&side.stations[0]), at(&side.stations[side.stations.len() - 1]));
        // beside the centreline where there is no wing; else on it
        let level = root[0][k] + out * if both { LEVEL } else { -LEVEL };
        self.length(
            sheet,
            self.chordwise,
            root,
            level,
            "root chord",
            "reference.root_chord",
            reference.root_chord,
            0.0,
        );
        let furthest = match self.spanwise {
            Way::Across => [self.bounds.left, self.bounds.right],
            Way::Upright => [self.bounds.top, self.bounds.bottom],
        }[usize::from(out > 0.0)];
        self.length(
            sheet,
            self.chordwise,
            tip,
            furthest + out * LEVEL,
            "tip chord",
            "reference.tip_chord",
            reference.tip_chord,
            0.0,
        );
    }

    fn mean_chord(&self, sheet: &mut Sheet, side: &Side) {
        let mac = &self.subject.record.reference.mac;
        let k = self.spanwise.along();
        let out = self.outward(side);
        let ends = side.mac.map(|point| self.view.at(&point));
        let root = self.view.at(&side.stations[0][0]);
        let nose = self.view.at(&self.subject.origin);
        let unit = self.subject.unit;
        let origin = self.subject.origin;
        // distances from the root's nose and the centreline, wherever the wing is placed
        let (quantity, value, datum) = if self.subject.fin {
            ("reference.mac.z_le", mac.z_le, origin.z)
        } else {
            ("reference.mac.y", mac.y, 0.0)
        };
        self.length(
            sheet,
            self.spanwise,
            [root, ends[0]],
            self.level(1.0),
            if self.subject.fin {
                "root to MAC"
            } else {
                "centreline to MAC"
            },
            quantity,
            value,
            datum / unit,
        );
        self.length(
            sheet,
            self.chordwise,
            [nose, ends[0]],
            ends[0][k] + 7.0 * out,
            "nose to MAC",
            "reference.mac.x_le",
            mac.x_le,
            origin.x / unit,
        );
        self.length(
            sheet,
            self.chordwise,
            ends,
            ends[0][k] - 6.0 * out,
            "MAC",
            "reference.mac.length",
            mac.length,
            0.0,
        );
    }

    /// A dimension whose figure is `value`, less `from_value` where the wing is placed elsewhere than at the origin.
    #[expect(clippy::too_many_arguments, reason = "a dimension is that many things")]
    fn length(
        &self,
        sheet: &mut Sheet,
        way: Way,
        [from, to]: [At; 2],
        level: f64,
        name: &str,
        quantity: &str,
        value: f64,
        from_value: f64,
    ) {
        linear(
            sheet,
            Linear {
                from,
                to,
                way,
                level,
                text: format!(
                    "{name} {}",
                    length_text((value - from_value).abs(), self.subject.unit)
                ),
                datum: (from_value.abs() < 1e-12).then(|| Datum {
                    quantity: quantity.into(),
                    value,
                }),
            },
        );
    }

    fn sweeps(&self, sheet: &mut Sheet, side: &Side) {
        let out = self.outward(side);
        for (k, pair) in side.stations.windows(2).enumerate() {
            let name = format!("{} sweep", self.subject.sweep_line);
            let Some((quantity, degrees)) = panel_figure(self.subject, &name, k) else {
                continue;
            };
            let (corner, to) = (self.view.at(&pair[0][2]), self.view.at(&pair[1][2]));
            let zero = match self.spanwise {
                Way::Across => [corner[0] + out, corner[1]],
                Way::Upright => [corner[0], corner[1] + out],
            };
            let (text, share) = (format!("sweep {}", angle_text(degrees)), 0.62);
            self::turned(sheet, [corner, zero, to], degrees, share, text, quantity);
        }
    }

    fn centre(&self, sheet: &mut Sheet, side: &Side) {
        let [front, rear] = side.mac;
        let [x, y] = self.view.at(&(front + (rear - front) * 0.25));
        const RADIUS: f64 = 1.3;
        let ring = |from: u8, to: u8| -> Vec<At> {
            let angle = |k: u8| f64::from(k) * std::f64::consts::TAU / 32.0;
            (from..=to)
                .map(|k| [x + RADIUS * angle(k).cos(), y + RADIUS * angle(k).sin()])
                .collect()
        };
        sheet.line(Stroke::Dimension, ring(0, 32));
        for quarter in [0, 16] {
            let mut points = vec![[x, y]];
            points.extend(ring(quarter, quarter + 8));
            sheet.patches.push(super::sheet::Patch {
                stroke: Stroke::MeanChord,
                points,
            });
        }
        note(sheet, [x, y], "aerodynamic centre", None);
    }

    /// Names of the lines that the spec asks for, on one side.
    fn names(&self, sheet: &mut Sheet, side: &Side) {
        let ending = if side.sign < 0.0 { ", port" } else { ", starboard" };
        for (name, _) in &self.subject.lines {
            let full = format!("{name}{ending}");
            let line = (self.subject.reference.lines.iter()).find(|line| line.name == full);
            let Some(points) = line.map(|line| &line.points) else {
                continue;
            };
            let (Some(from), Some(to)) = (points.first(), points.last()) else {
                continue;
            };
            let middle = self.view.at(&(from + (to - from) * 0.5));
            let target = if points.len() == 2 {
                middle
            } else {
                self.view.at(&points[points.len() / 2])
            };
            let text = fitted(&clean(name), super::sheet::LETTERS / CAPITALS, NAME);
            note(sheet, target, &text, None);
        }
    }
}

/// Quantity and value \[deg\] of a check on a panel, counted from 0.
fn panel_figure(subject: &Subject<'_>, name: &str, panel: usize) -> Option<(String, f64)> {
    let long = format!("{name} of panel {}", panel + 1);
    let check =
        (subject.record.checks.iter()).find(|check| check.quantity == long || check.quantity == name)?;
    Some((format!("checks.{}", check.quantity), check.asked))
}

/// Draws an angle where it is seen at its true size; `degrees` without regard to its sign.
fn turned(
    sheet: &mut Sheet,
    [corner, zero, to]: [At; 3],
    degrees: f64,
    share: f64,
    text: String,
    quantity: String,
) {
    let way = |p: At| Vector3::new(p[0] - corner[0], p[1] - corner[1], 0.0);
    let seen = way(zero).angle(&way(to));
    if (seen - degrees.to_radians().abs()).abs() > TRUE {
        return;
    }
    let length = way(to).norm();
    angular(
        sheet,
        Angular {
            corner,
            zero,
            to,
            radius: (share * length).clamp(4.0, 150.0),
            text,
            datum: Datum {
                quantity,
                value: degrees,
            },
        },
    );
}

/// Draws the dihedral of each panel in the view from ahead.
pub(super) fn dihedral(sheet: &mut Sheet, subject: &Subject<'_>, view: &View) {
    let Some(side) = subject.sides.last() else {
        return;
    };
    for (k, pair) in side.stations.windows(2).enumerate() {
        let Some((quantity, degrees)) = panel_figure(subject, "dihedral", k) else {
            continue;
        };
        let (corner, to) = (view.at(&pair[0][2]), view.at(&pair[1][2]));
        let zero = [corner[0] - side.sign, corner[1]];
        let (text, share) = (format!("dihedral {}", angle_text(degrees)), 0.7);
        turned(sheet, [corner, zero, to], degrees, share, text, quantity);
    }
}
