//! The sections at the root, the mean aerodynamic chord and the tip, at their incidence.

use super::arrange::scales;
use super::sheet::{Anchor, At, LETTERS, Label, Rect, Sheet, Stroke};
use super::{SectionShape, Subject, angle_text, length_text, trimmed};
use crate::write::lettering::{CAPITALS, fitted};
use crate::write::markup::clean;

/// Height of the two lines of text over a section \[mm\].
const TEXT: f64 = 11.5;
/// Least gap below a section \[mm\].
const GAP: f64 = 3.0;

fn bounds(section: &SectionShape) -> Rect {
    Rect::around(section.upper.iter().chain(&section.lower).map(|[x, y]| [*x, -*y]))
}

/// Draws the sections one below the other in a box and gives their scale as written.
pub(super) fn draw(sheet: &mut Sheet, subject: &Subject<'_>, area: &Rect) -> String {
    let boxes: Vec<Rect> = subject.sections.iter().map(bounds).collect();
    let widest = boxes.iter().map(Rect::width).fold(0.0, f64::max);
    let count = f64::from(u32::try_from(boxes.len()).unwrap_or(u32::MAX));
    let total: f64 = boxes.iter().map(Rect::height).sum();
    let room = [area.width() - 4.0, area.height() - count * (TEXT + GAP)];
    let scale = scales()
        .find(|scale| scale.factor * widest <= room[0] && scale.factor * total <= room[1])
        .expect("the smallest scale fits any section");
    let spare = (room[1] - scale.factor * total) / count;
    let mut top = area.top;
    for (section, size) in subject.sections.iter().zip(&boxes) {
        texts(sheet, subject, section, [area.left, top], area.width());
        top += TEXT;
        let origin = [
            area.left + 2.0 - scale.factor * size.left,
            top - scale.factor * size.top,
        ];
        outline(sheet, section, scale.factor, origin);
        top += scale.factor * size.height() + GAP + spare;
    }
    scale.text
}

/// Draws one section with its origin at `origin`.
fn outline(sheet: &mut Sheet, section: &SectionShape, scale: f64, origin: At) {
    let at = |[x, y]: [f64; 2]| [origin[0] + scale * x, origin[1] - scale * y];
    let [front, rear] = section.chord_line();
    let chord = [rear[0] - front[0], rear[1] - front[1]];
    let reach = 3.0 / scale / chord[0].hypot(chord[1]);
    let beyond = |t: f64| [front[0] + t * chord[0], front[1] + t * chord[1]];
    sheet.line(
        Stroke::Centre,
        vec![at(beyond(-0.5 * reach)), at(beyond(1.0 + 0.5 * reach))],
    );
    let mut points: Vec<At> = section.upper.iter().rev().map(|p| at(*p)).collect();
    points.extend(section.lower.iter().skip(1).map(|p| at(*p)));
    points.push(points[0]);
    sheet.line(Stroke::Visible, points);
    // where the thickness is greatest: square to the chord, from side to side
    let place = beyond(section.thickness[1]);
    let half = 0.5 * section.thickness[0];
    let up = [-chord[1], chord[0]];
    let middle = camber_at(section, section.thickness[1]);
    let end = |t: f64| at([place[0] + t * up[0], place[1] + t * up[1]]);
    sheet.line(Stroke::Dimension, vec![end(middle - half), end(middle + half)]);
}

/// Height of the mean line over the chord at a fraction of it \[chord\].
fn camber_at(section: &SectionShape, fraction: f64) -> f64 {
    let [front, rear] = section.chord_line();
    let chord = [rear[0] - front[0], rear[1] - front[1]];
    let square = chord[0] * chord[0] + chord[1] * chord[1];
    let height = |side: &[[f64; 2]]| {
        let local: Vec<[f64; 2]> = (side.iter())
            .map(|p| {
                let d = [p[0] - front[0], p[1] - front[1]];
                [
                    (d[0] * chord[0] + d[1] * chord[1]) / square,
                    (d[1] * chord[0] - d[0] * chord[1]) / square,
                ]
            })
            .collect();
        let found = local
            .windows(2)
            .find(|pair| pair[0][0] <= fraction && fraction <= pair[1][0]);
        found.map_or(0.0, |pair| {
            let share = (fraction - pair[0][0]) / (pair[1][0] - pair[0][0]).max(1e-12);
            pair[0][1] + share * (pair[1][1] - pair[0][1])
        })
    };
    0.5 * (height(&section.upper) + height(&section.lower))
}

fn texts(sheet: &mut Sheet, subject: &Subject<'_>, section: &SectionShape, [left, top]: At, width: f64) {
    let size = LETTERS / CAPITALS;
    let unit = &subject.record.unit;
    let chord = length_text(section.chord / subject.unit, subject.unit);
    let first = format!("{}: {}", section.place, clean(&section.airfoil));
    let tail = format!("chord {chord} {unit}");
    let room = width - crate::write::lettering::width(&tail, size) - 4.0;
    sheet.labels.push(Label::new(
        fitted(&first, size, room),
        [left, top + 4.2],
        Anchor::Start,
    ));
    sheet
        .labels
        .push(Label::new(tail, [left + width, top + 4.2], Anchor::End));
    let percent = |value: f64| trimmed(100.0 * value, 2);
    let camber = if section.camber[1] > 0.0 {
        let place = trimmed(100.0 * section.camber[1], 1);
        format!("camber {} % at {place} %", percent(section.camber[0]))
    } else {
        "no camber".to_owned()
    };
    let second = format!(
        "incidence {}, thickness {} % at {} %, {camber}",
        angle_text(section.incidence.to_degrees()),
        percent(section.thickness[0]),
        trimmed(100.0 * section.thickness[1], 1),
    );
    let mut label = Label::new(second, [left, top + 8.6], Anchor::Start);
    label.height = 2.2;
    label.light = true;
    label.text = fitted(&label.text, label.size(), width);
    sheet.labels.push(label);
}

/// A section by itself as a small sheet, `width` wide \[mm\]: for the report.
pub fn chart(section: &SectionShape, width: f64) -> Sheet {
    let size = bounds(section);
    let scale = (width - 8.0) / size.width();
    let height = scale * size.height() + 8.0;
    let mut sheet = Sheet {
        title: format!("Section at the {}: {}", section.place, section.airfoil),
        description: format!(
            "Outline with its chord line, thickness {} % of the chord, camber {} %.",
            trimmed(100.0 * section.thickness[0], 2),
            trimmed(100.0 * section.camber[0], 2)
        ),
        format: "",
        size: [width, height],
        frame: Rect {
            left: 0.0,
            top: 0.0,
            right: width,
            bottom: height,
        },
        lines: Vec::new(),
        patches: Vec::new(),
        labels: Vec::new(),
    };
    outline(
        &mut sheet,
        section,
        scale,
        [4.0 - scale * size.left, 4.0 - scale * size.top],
    );
    sheet
}
