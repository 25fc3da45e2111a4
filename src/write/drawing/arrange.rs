//! The arrangement: which sheet, which scale, where everything stands.

use nalgebra::Point3;

use super::Subject;
use super::figures::{self, Rows};
use super::frame::{self, TITLE_HEIGHT, TITLE_WIDTH};
use super::legend;
use super::main_view::{self, MainView};
use super::outline::{Edges, visible};
use super::sections;
use super::sheet::{Anchor, At, Label, Rect, Sheet, Stroke};
use super::view::View;
use crate::planform::LineKind;

/// Sheets of the ISO 216 A series that are used, landscape: name, width and height \[mm\].
const FORMATS: [(&str, f64, f64); 3] = [("A3", 420.0, 297.0), ("A2", 594.0, 420.0), ("A1", 841.0, 594.0)];
/// Margins of the frame: on the left for filing, and on the other sides \[mm\] (ISO 5457).
const MARGINS: [f64; 2] = [20.0, 10.0];
/// Width of the legend \[mm\].
const LEGEND: f64 = 62.0;
/// Least height of the band below the views, for the sections \[mm\].
const BAND: f64 = 96.0;
/// The smallest sheet whose views fill this share of it is taken, else the best filled one.
const FILLED: f64 = 0.62;

/// Room around a view for its dimensions \[mm\].
#[derive(Clone, Copy, Debug)]
struct Pads {
    left: f64,
    top: f64,
    right: f64,
    bottom: f64,
}

const fn pads(left: f64, top: f64, right: f64, bottom: f64) -> Pads {
    Pads {
        left,
        top,
        right,
        bottom,
    }
}

/// The three views at scale 1, in one corner, and what they take around them.
struct Views {
    front: View,
    plan: View,
    side: View,
    bounds: [Rect; 3],
    pads: [Pads; 3],
}

impl Views {
    fn of(subject: &Subject<'_>) -> Self {
        let views = [View::front(), View::plan(), View::side(subject.angle)];
        let construction = main_view::construction(subject);
        let points: Vec<&Point3<f64>> = (subject.meshes.iter().flat_map(|mesh| &mesh.corners))
            .chain(subject.reference.lines.iter().flat_map(|line| &line.points))
            .collect();
        let solids: Vec<&Point3<f64>> = subject.meshes.iter().flat_map(|mesh| &mesh.corners).collect();
        let main = if subject.fin { 2 } else { 1 };
        let mut bounds = [0, 1, 2].map(|k: usize| {
            if k == main {
                views[k].bounds(points.iter().copied().chain(&construction))
            } else {
                views[k].bounds(solids.iter().copied())
            }
        });
        // views that stand in line share their extent
        let across = [bounds[0], bounds[1]];
        for k in [0, 1] {
            bounds[k].left = across[0].left.min(across[1].left);
            bounds[k].right = across[0].right.max(across[1].right);
        }
        let upright = [bounds[0], bounds[2]];
        for k in [0, 2] {
            bounds[k].top = upright[0].top.min(upright[1].top);
            bounds[k].bottom = upright[0].bottom.max(upright[1].bottom);
        }
        let pads = if subject.fin {
            [
                pads(16.0, 14.0, 16.0, 14.0),
                pads(16.0, 8.0, 16.0, 8.0),
                pads(27.0, 14.0, 27.0, 14.0),
            ]
        } else {
            [
                pads(19.0, 12.0, 19.0, 10.0),
                pads(19.0, 14.0, 19.0, 22.0),
                pads(8.0, 12.0, 8.0, 10.0),
            ]
        };
        let [front, plan, side] = views;
        Self {
            front,
            plan,
            side,
            bounds,
            pads,
        }
    }

    /// Columns' widths and rows' heights at a scale.
    fn extent(&self, scale: f64) -> [[f64; 2]; 2] {
        let [front, plan, side] = &self.bounds;
        let [f, p, s] = &self.pads;
        let columns = [
            scale * plan.width() + p.left.max(f.left) + p.right.max(f.right),
            scale * side.width() + s.left + s.right,
        ];
        let rows = [
            scale * front.height() + f.top.max(s.top) + f.bottom.max(s.bottom),
            scale * plan.height() + p.top + p.bottom,
        ];
        [columns, rows]
    }

    fn fits(&self, scale: f64, room: At) -> bool {
        let [columns, rows] = self.extent(scale);
        columns[0] + columns[1] <= room[0] && rows[0] + rows[1] <= room[1]
    }

    /// How much of the room is filled, the fuller way.
    fn fill(&self, scale: f64, room: At) -> f64 {
        let [columns, rows] = self.extent(scale);
        ((columns[0] + columns[1]) / room[0]).max((rows[0] + rows[1]) / room[1])
    }
}

/// Scales of ISO 5455, from 1000:1 down.
pub(super) fn scales() -> impl Iterator<Item = Scale> {
    let decade = |power: i32| [5.0, 2.0, 1.0].map(|step| step * 10.0_f64.powi(power));
    let larger = (0..=2).rev().flat_map(decade).map(|factor| Scale {
        factor,
        text: format!("{factor}:1"),
    });
    let smaller = (0..=6).flat_map(|power| [1.0, 2.0, 5.0].map(|step| step * 10.0_f64.powi(power)));
    larger.chain(smaller.skip(1).map(|divisor| Scale {
        factor: 1.0 / divisor,
        text: format!("1:{divisor}"),
    }))
}

/// A scale and how it is written.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Scale {
    /// Paper over wing.
    pub(super) factor: f64,
    /// Such as `1:10`.
    pub(super) text: String,
}

/// Lays out the drawing of a wing.
///
/// # Panics
///
/// Never: at the smallest scale any wing fits on the largest sheet.
pub fn sheet(subject: &Subject<'_>) -> Sheet {
    let views = Views::of(subject);
    let rows = Rows::of(subject);
    let stack = TITLE_HEIGHT + rows.height();
    let band = stack.max(legend::height(subject)).max(BAND);
    let mut best: Option<(f64, usize, Scale)> = None;
    for (k, (_, width, height)) in FORMATS.iter().enumerate() {
        let room = [
            width - MARGINS[0] - MARGINS[1],
            height - 2.0 * MARGINS[1] - band - 2.0,
        ];
        let Some(scale) = scales().find(|scale| views.fits(scale.factor, room)) else {
            continue;
        };
        let fill = views.fill(scale.factor, room);
        if best.as_ref().is_none_or(|(most, ..)| fill > *most + 1e-9) {
            best = Some((fill, k, scale));
        }
        if fill >= FILLED {
            break;
        }
    }
    let (_, format, scale) = best.expect("the smallest scale fits any wing on the largest sheet");
    let (name, width, height) = FORMATS[format];
    let frame = Rect {
        left: MARGINS[0],
        top: MARGINS[1],
        right: width - MARGINS[1],
        bottom: height - MARGINS[1],
    };
    let mut sheet = Sheet {
        title: format!("Drawing of {}", subject.record.name),
        description: description(subject, &scale),
        format: name,
        size: [width, height],
        frame,
        lines: Vec::new(),
        patches: Vec::new(),
        labels: Vec::new(),
    };
    let corner = [frame.right - TITLE_WIDTH, frame.bottom - TITLE_HEIGHT];
    figures::draw(&mut sheet, &rows, [corner[0], corner[1] - rows.height()]);
    let area = Rect {
        bottom: frame.bottom - band - 2.0,
        ..frame
    };
    let low = Rect {
        top: area.bottom,
        right: corner[0] - 3.0,
        ..frame
    };
    legend::draw(
        &mut sheet,
        subject,
        &Rect {
            left: low.right - LEGEND,
            ..low
        },
    );
    let section_scale = sections::draw(
        &mut sheet,
        subject,
        &Rect {
            left: low.left + 4.0,
            right: low.right - LEGEND - 3.0,
            ..low
        },
    );
    frame::draw(&mut sheet, subject, &scale.text, &section_scale, corner);
    draw_views(&mut sheet, subject, &views, scale.factor, &area);
    sheet
}

fn draw_views(sheet: &mut Sheet, subject: &Subject<'_>, views: &Views, scale: f64, area: &Rect) {
    let [columns, rows] = views.extent(scale);
    let spare = [
        (area.width() - columns[0] - columns[1]) / 3.0,
        (area.height() - rows[0] - rows[1]) / 3.0,
    ];
    let lefts = [area.left + spare[0], area.left + 2.0 * spare[0] + columns[0]];
    let third = subject.angle == super::view::Angle::Third;
    let (front_top, plan_top) = if third {
        (area.top + 2.0 * spare[1] + rows[1], area.top + spare[1])
    } else {
        (area.top + spare[1], area.top + 2.0 * spare[1] + rows[0])
    };
    let [f, p, s] = &views.pads;
    let [front_box, plan_box, side_box] = &views.bounds;
    let left = lefts[0] + p.left.max(f.left);
    let top = front_top + f.top.max(s.top);
    let front = views.front.put(scale, front_box, [left, top]);
    let plan = views.plan.put(scale, plan_box, [left, plan_top + p.top]);
    let side = views.side.put(scale, side_box, [lefts[1] + s.left, top]);
    let edges: Vec<Edges<'_>> = subject.meshes.iter().map(Edges::of).collect();
    for (k, (view, caption)) in [
        (front, "from ahead"),
        (plan, "from above"),
        (side, side_caption(subject)),
    ]
    .into_iter()
    .enumerate()
    {
        let is_main = k == if subject.fin { 2 } else { 1 };
        lines(sheet, subject, &view, is_main, k == 0);
        for line in visible(&edges, &view) {
            sheet.line(Stroke::Visible, line);
        }
        let bounds = view.bounds(subject.meshes.iter().flat_map(|mesh| &mesh.corners));
        let pad = &views.pads[k];
        let mut label = Label::new(
            caption,
            [
                bounds.left - 0.5 * pad.left,
                view.bounds_top(&views.bounds[k]) - pad.top + 4.5,
            ],
            Anchor::Start,
        );
        label.light = true;
        sheet.labels.push(label);
    }
    let main = if subject.fin { side } else { plan };
    MainView::new(subject, main).draw(sheet);
    main_view::dihedral(sheet, subject, &front);
}

fn side_caption(subject: &Subject<'_>) -> &'static str {
    match subject.angle {
        super::view::Angle::First => "from starboard",
        super::view::Angle::Third => "from port",
    }
}

/// Reference lines of a view: all of them where it is the main one.
fn lines(sheet: &mut Sheet, subject: &Subject<'_>, view: &View, is_main: bool, is_front: bool) {
    let same_axis = subject.sweep_line == "quarter-chord";
    for line in &subject.reference.lines {
        let stroke = match line.kind {
            LineKind::Outline | LineKind::Chord if is_main => Stroke::Reference,
            LineKind::QuarterChord => Stroke::QuarterChord,
            LineKind::MeanAerodynamicChord => Stroke::MeanChord,
            LineKind::Centreline if is_main => Stroke::Centre,
            LineKind::TwistAxis if is_main && !same_axis => Stroke::TwistAxis,
            LineKind::Custom if is_main => Stroke::Named,
            _ => continue,
        };
        let points: Vec<At> = line.points.iter().map(|point| view.at(point)).collect();
        let extent = Rect::around(points.iter().copied());
        if extent.width().hypot(extent.height()) > 0.2 {
            sheet.titled(stroke, points, Some(line.name.clone()));
        }
    }
    if is_main || is_front {
        for side in &subject.sides {
            for joint in &side.joints {
                sheet.line(Stroke::Joint, joint.iter().map(|point| view.at(point)).collect());
            }
        }
    }
    if is_front && !subject.fin {
        let bounds = view.bounds(subject.meshes.iter().flat_map(|mesh| &mesh.corners));
        let x = view.at(&subject.origin)[0];
        sheet.line(
            Stroke::Centre,
            vec![[x, bounds.top - 5.0], [x, bounds.bottom + 5.0]],
        );
    }
    if let Some(half) = subject.body {
        body(
            sheet,
            subject,
            view,
            half,
            is_main && !subject.fin,
            is_front && !subject.fin,
        );
    }
}

/// Sides of the fuselage where the built wing starts.
fn body(sheet: &mut Sheet, subject: &Subject<'_>, view: &View, half: f64, plan: bool, front: bool) {
    for side in &subject.sides {
        let y = half * side.sign;
        let Some([fore, aft, _]) = side.stations.first() else {
            continue;
        };
        let chord = aft.x - fore.x;
        let reach = if plan {
            [
                Point3::new(fore.x - 0.1 * chord, y, fore.z),
                Point3::new(aft.x + 0.1 * chord, y, fore.z),
            ]
        } else if front {
            [
                Point3::new(fore.x, y, fore.z - 0.15 * chord),
                Point3::new(fore.x, y, fore.z + 0.15 * chord),
            ]
        } else {
            continue;
        };
        sheet.titled(
            Stroke::Body,
            reach.iter().map(|point| view.at(point)).collect(),
            Some("side of the fuselage".into()),
        );
    }
}

fn description(subject: &Subject<'_>, scale: &Scale) -> String {
    let record = subject.record;
    let (reference, unit) = (&record.reference, &record.unit);
    format!(
        "Views from ahead, from above and from the side at {}, and the sections at the root, the mean aerodynamic chord and \
         the tip. Reference span {} {unit}, root chord {} {unit}, tip chord {} {unit}, mean aerodynamic chord {} {unit}.",
        scale.text,
        super::length_text(reference.span, subject.unit),
        super::length_text(reference.root_chord, subject.unit),
        super::length_text(reference.tip_chord, subject.unit),
        super::length_text(reference.mac.length, subject.unit),
    )
}
