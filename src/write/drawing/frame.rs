//! Frame, centring marks and title block.

use super::Subject;
use super::sheet::{Anchor, At, Label, Sheet, Stroke};
use super::view::Angle;
use crate::write::lettering::{CAPITALS, folded};
use crate::write::markup::clean;

/// Width of the title block \[mm\] (ISO 7200).
pub(super) const TITLE_WIDTH: f64 = 180.0;
/// Its height \[mm\].
pub(super) const TITLE_HEIGHT: f64 = 37.0;

/// Draws frame and title block, whose upper left corner is `corner`.
pub(super) fn draw(
    sheet: &mut Sheet,
    subject: &Subject<'_>,
    scale: &str,
    section_scale: &str,
    [left, top]: At,
) {
    let (frame, [width, height]) = (sheet.frame, sheet.size);
    sheet.line(
        Stroke::Frame,
        vec![
            [frame.left, frame.top],
            [frame.right, frame.top],
            [frame.right, frame.bottom],
            [frame.left, frame.bottom],
            [frame.left, frame.top],
        ],
    );
    // centring marks: from the edge of the paper to 5 mm inside the frame
    let (x, y) = (0.5 * width, 0.5 * height);
    for line in [
        [[x, 0.0], [x, frame.top + 5.0]],
        [[x, height], [x, frame.bottom]],
        [[0.0, y], [frame.left + 5.0, y]],
        [[width, y], [frame.right, y]],
    ] {
        sheet.line(Stroke::Frame, line.to_vec());
    }
    let right = frame.right;
    let rows = [top, top + 15.0, top + 26.0, frame.bottom];
    sheet.line(
        Stroke::Frame,
        vec![[left, frame.bottom], [left, top], [right, top]],
    );
    for row in &rows[1..3] {
        sheet.line(Stroke::Rule, vec![[left, *row], [right, *row]]);
    }
    let symbol = right - 34.0;
    sheet.line(Stroke::Rule, vec![[symbol, top], [symbol, rows[1]]]);
    projection(sheet, subject.angle, [symbol + 4.0, top + 6.0]);

    caption(sheet, "title", [left + 2.0, top + 3.4]);
    let size = 3.5 / CAPITALS;
    let lines = folded(&clean(&subject.record.name), size, symbol - left - 5.0, 2);
    for (k, line) in lines.iter().enumerate() {
        let down = match (lines.len(), k) {
            (1, _) => 11.0,
            (_, 0) => 8.4,
            _ => 13.6,
        };
        sheet.labels.push(Label {
            height: if lines.len() == 1 { 3.5 } else { 3.3 },
            ..Label::new(line.clone(), [left + 2.0, top + down], Anchor::Start)
        });
    }
    let unit = &subject.record.unit;
    let projection = match subject.angle {
        Angle::First => "first angle",
        Angle::Third => "third angle",
    };
    let fields = [
        [
            ("scale", scale),
            ("scale of sections", section_scale),
            ("lengths in", unit),
            ("angles in", "degrees"),
        ],
        [
            ("document", "dimensioned drawing"),
            ("made by", "spanwise"),
            ("sheet", sheet.format),
            ("date", subject.date.unwrap_or("–")),
        ],
    ];
    let columns = [0.0, 0.33, 0.56, 0.76, 1.0].map(|share| left + share * TITLE_WIDTH);
    for (row, entries) in fields.iter().enumerate() {
        for (k, (name, value)) in entries.iter().enumerate() {
            let start = columns[k];
            if k > 0 {
                sheet.line(Stroke::Rule, vec![[start, rows[row + 1]], [start, rows[row + 2]]]);
            }
            caption(sheet, name, [start + 2.0, rows[row + 1] + 3.4]);
            sheet.labels.push(Label::new(
                (*value).to_owned(),
                [start + 2.0, rows[row + 1] + 8.6],
                Anchor::Start,
            ));
        }
    }
    sheet.labels.push(Label {
        height: 1.8,
        light: true,
        ..Label::new(projection, [symbol + 17.0, top + 13.9], Anchor::Middle)
    });
}

fn caption(sheet: &mut Sheet, text: &str, at: At) {
    sheet.labels.push(Label {
        height: 1.8,
        light: true,
        ..Label::new(text, at, Anchor::Start)
    });
}

/// The symbol of the arrangement: a truncated cone from the side and from its narrow end (ISO 5456-2).
fn projection(sheet: &mut Sheet, angle: Angle, [x, y]: At) {
    let circle = |centre: f64, radius: f64| -> Vec<At> {
        (0..=48_u8)
            .map(|k| {
                let turn = f64::from(k) * std::f64::consts::TAU / 48.0;
                [centre + radius * turn.cos(), y + radius * turn.sin()]
            })
            .collect()
    };
    // from the side the cone tapers to the left: what is seen from the left stands on the right in first angle
    let (cone, rings) = match angle {
        Angle::First => (x, x + 19.0),
        Angle::Third => (x + 14.0, x + 4.0),
    };
    let (narrow, wide) = (2.0, 4.0);
    sheet.line(
        Stroke::Visible,
        vec![
            [cone, y - narrow],
            [cone + 9.0, y - wide],
            [cone + 9.0, y + wide],
            [cone, y + narrow],
            [cone, y - narrow],
        ],
    );
    sheet.line(Stroke::Visible, circle(rings, narrow));
    sheet.line(Stroke::Visible, circle(rings, wide));
    sheet.line(Stroke::Centre, vec![[cone - 1.5, y], [cone + 10.5, y]]);
    sheet.line(Stroke::Centre, vec![[rings - 5.2, y], [rings + 5.2, y]]);
    sheet.line(Stroke::Centre, vec![[rings, y - 5.2], [rings, y + 5.2]]);
}
