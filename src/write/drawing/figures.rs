//! The table of figures above the title block: reference wing, built wing, panels.

use super::frame::TITLE_WIDTH;
use super::sheet::{Anchor, At, Datum, Label, Sheet, Stroke};
use super::{Subject, angle_text, length_text, trimmed};
use crate::write::sheet::figure;

/// Height of a row \[mm\].
const ROW: f64 = 4.6;
/// Panels that the table lists; further ones are in the figures file.
const MOST_PANELS: usize = 24;

/// A named figure.
#[derive(Clone, Debug)]
struct Figure {
    name: String,
    text: String,
    datum: Option<Datum>,
}

/// The rows of the table.
#[derive(Clone, Debug)]
pub(super) struct Rows {
    figures: Vec<Figure>,
    panels: Vec<Vec<Figure>>,
    left_out: usize,
}

impl Rows {
    pub(super) fn of(subject: &Subject<'_>) -> Self {
        let record = subject.record;
        let (r, b, unit) = (&record.reference, &record.built, &record.unit);
        let length = |name: &str, key: &str, value: f64| Figure {
            name: name.into(),
            text: format!("{} {unit}", length_text(value, subject.unit)),
            datum: datum(key, value),
        };
        let other = |name: &str, key: &str, value: f64, text: String| Figure {
            name: name.into(),
            text,
            datum: datum(key, value),
        };
        let square = |value: f64| format!("{} {unit}²", minus(&figure(value)));
        let [ax, ay, az] = r.aerodynamic_centre;
        let figures = vec![
            other("reference area", "reference.area", r.area, square(r.area)),
            length("reference span", "reference.span", r.span),
            other(
                "aspect ratio",
                "reference.aspect_ratio",
                r.aspect_ratio,
                trimmed(r.aspect_ratio, 3),
            ),
            other(
                "taper ratio",
                "reference.taper_ratio",
                r.taper_ratio,
                trimmed(r.taper_ratio, 4),
            ),
            length("mean chord", "reference.mean_chord", r.mean_chord),
            length("MAC", "reference.mac.length", r.mac.length),
            other(
                "incidence at the MAC",
                "reference.mac.incidence",
                r.mac.incidence,
                angle_text(r.mac.incidence),
            ),
            length("MAC, nose at x", "reference.mac.x_le", r.mac.x_le),
            length("MAC, nose at y", "reference.mac.y", r.mac.y),
            length("MAC, nose at z", "reference.mac.z_le", r.mac.z_le),
            length("aerodynamic centre x", "reference.aerodynamic_centre.0", ax),
            length("aerodynamic centre y", "reference.aerodynamic_centre.1", ay),
            length("aerodynamic centre z", "reference.aerodynamic_centre.2", az),
            length("built span", "built.span", b.span),
            other(
                "wetted area",
                "built.wetted_area",
                b.wetted_area,
                square(b.wetted_area),
            ),
            other(
                "volume",
                "built.volume",
                b.volume,
                format!("{} {unit}³", minus(&figure(b.volume))),
            ),
        ];
        let count = subject.sides.first().map_or(0, |side| side.stations.len() - 1);
        let panels = (0..count.min(MOST_PANELS))
            .map(|k| panel(subject, k, count))
            .collect();
        Self {
            figures,
            panels,
            left_out: count.saturating_sub(MOST_PANELS),
        }
    }

    /// Height of the table \[mm\].
    pub(super) fn height(&self) -> f64 {
        let rows = self.figures.len().div_ceil(2) + self.panels.len() + 1 + usize::from(self.left_out > 0);
        ROW * f64::from(u32::try_from(rows).unwrap_or(u32::MAX)) + 1.6
    }
}

fn datum(quantity: &str, value: f64) -> Option<Datum> {
    Some(Datum {
        quantity: quantity.into(),
        value,
    })
}

/// Chord, sweep, dihedral and twist of a panel, as asked.
fn panel(subject: &Subject<'_>, k: usize, count: usize) -> Vec<Figure> {
    let of = if count == 1 {
        String::new()
    } else {
        format!(" of panel {}", k + 1)
    };
    let end = if k + 1 == count {
        "tip".to_owned()
    } else {
        format!("end of panel {}", k + 1)
    };
    let quantities = [
        format!("chord at the {end}"),
        format!("{} sweep{of}", subject.sweep_line),
        format!("dihedral{of}"),
        format!("twist at the {end}"),
    ];
    let mut row = vec![Figure {
        name: String::new(),
        text: format!("{}", k + 1),
        datum: None,
    }];
    for (column, quantity) in quantities.iter().enumerate() {
        let check = subject
            .record
            .checks
            .iter()
            .find(|check| check.quantity == *quantity);
        row.push(Figure {
            name: String::new(),
            text: check.map_or_else(
                || "–".into(),
                |check| match column {
                    0 => length_text(check.asked, subject.unit),
                    _ => angle_text(check.asked),
                },
            ),
            datum: check.and_then(|check| datum(&format!("checks.{quantity}"), check.asked)),
        });
    }
    row
}

/// Draws the table with its upper left corner at `corner`, as wide as the title block.
pub(super) fn draw(sheet: &mut Sheet, rows: &Rows, [left, top]: At) {
    let right = left + TITLE_WIDTH;
    let half = rows.figures.len().div_ceil(2);
    let middle = left + 0.5 * TITLE_WIDTH;
    let line = |k: usize| top + 0.8 + ROW * f64::from(u32::try_from(k).unwrap_or(u32::MAX));
    let base = |k: usize| line(k + 1) - 1.1;
    for (k, entry) in rows.figures.iter().enumerate() {
        let (row, start, end) = if k < half {
            (k, left, middle)
        } else {
            (k - half, middle, right)
        };
        sheet.labels.push(Label {
            light: true,
            ..Label::new(entry.name.clone(), [start + 2.0, base(row)], Anchor::Start)
        });
        sheet.labels.push(Label {
            datum: entry.datum.clone(),
            ..Label::new(entry.text.clone(), [end - 2.0, base(row)], Anchor::End)
        });
    }
    let columns = [0.10, 0.32, 0.55, 0.77, 1.0].map(|share| left + share * TITLE_WIDTH - 2.0);
    for (name, column) in ["panel", "outer chord", "sweep", "dihedral", "twist to root"]
        .into_iter()
        .zip(columns)
    {
        sheet.labels.push(Label {
            light: true,
            ..Label::new(name, [column, base(half)], Anchor::End)
        });
    }
    for (k, row) in rows.panels.iter().enumerate() {
        for (entry, column) in row.iter().zip(columns) {
            sheet.labels.push(Label {
                datum: entry.datum.clone(),
                ..Label::new(entry.text.clone(), [column, base(half + 1 + k)], Anchor::End)
            });
        }
    }
    if rows.left_out > 0 {
        let text = format!("and {} more panels: see the figures file", rows.left_out);
        sheet.labels.push(Label::new(
            text,
            [left + 2.0, base(half + 1 + rows.panels.len())],
            Anchor::Start,
        ));
    }
    let bottom = top + rows.height();
    for k in [half, half + 1] {
        sheet.line(Stroke::Rule, vec![[left, line(k)], [right, line(k)]]);
    }
    sheet.line(Stroke::Rule, vec![[middle, top], [middle, line(half)]]);
    sheet.line(Stroke::Frame, vec![[left, bottom], [left, top], [right, top]]);
}

/// The text with a true minus sign.
fn minus(text: &str) -> String {
    text.strip_prefix('-')
        .map_or_else(|| text.to_owned(), |digits| format!("−{digits}"))
}
