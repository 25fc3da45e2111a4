//! The legend: what each kind of line on the sheet shows.

use super::Subject;
use super::sheet::{Anchor, Label, Rect, Sheet, Stroke};
use crate::planform::LineKind;
use crate::write::lettering::{CAPITALS, fitted};
use crate::write::markup::clean;

/// Height of a row \[mm\].
const ROW: f64 = 5.0;
/// Lines of the spec that are listed; further ones are in the spec.
const MOST: usize = 10;

fn entries(subject: &Subject<'_>) -> Vec<(Option<Stroke>, String)> {
    let has = |kind: LineKind| subject.reference.lines.iter().any(|line| line.kind == kind);
    let mut rows = vec![
        (Some(Stroke::Visible), "built wing".to_owned()),
        (Some(Stroke::Reference), "reference wing".to_owned()),
    ];
    if subject.sides.iter().any(|side| !side.joints.is_empty()) {
        rows.push((Some(Stroke::Joint), "section between panels".into()));
    }
    rows.push((Some(Stroke::QuarterChord), "quarter-chord line".into()));
    if subject.sweep_line != "quarter-chord" && has(LineKind::TwistAxis) {
        rows.push((
            Some(Stroke::TwistAxis),
            format!("{} line, twist axis", subject.sweep_line),
        ));
    }
    rows.push((Some(Stroke::MeanChord), "mean aerodynamic chord (MAC)".into()));
    if subject.is_trapezoid {
        rows.push((Some(Stroke::Construction), "its construction".into()));
    } else {
        rows.push((None, "(by integration over the span)".into()));
    }
    rows.push((Some(Stroke::Centre), "centreline".into()));
    if subject.body.is_some() {
        rows.push((Some(Stroke::Body), "side of the fuselage".into()));
    }
    for (name, what) in subject.lines.iter().take(MOST) {
        rows.push((Some(Stroke::Named), name.clone()));
        rows.push((None, what.clone()));
    }
    if subject.lines.len() > MOST {
        rows.push((None, format!("and {} more lines", subject.lines.len() - MOST)));
    }
    rows
}

/// Height of the legend \[mm\].
pub(super) fn height(subject: &Subject<'_>) -> f64 {
    ROW * f64::from(u32::try_from(entries(subject).len()).unwrap_or(u32::MAX)) + 3.0
}

/// Draws the legend at the bottom of a box.
pub(super) fn draw(sheet: &mut Sheet, subject: &Subject<'_>, area: &Rect) {
    let top = area.bottom - height(subject);
    for (k, (stroke, text)) in entries(subject).into_iter().enumerate() {
        let base = top + ROW * f64::from(u32::try_from(k + 1).unwrap_or(u32::MAX)) - 1.0;
        if let Some(stroke) = stroke {
            let y = base - 0.9;
            sheet.line(stroke, vec![[area.left, y], [area.left + 14.5, y]]);
        }
        let start = area.left + 17.0;
        let room = area.right - start;
        sheet.labels.push(Label {
            light: stroke.is_none(),
            height: 2.2,
            ..Label::new(
                fitted(&clean(&text), 2.2 / CAPITALS, room),
                [start, base],
                Anchor::Start,
            )
        });
    }
}
