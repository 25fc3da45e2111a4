//! Dimensions after ISO 129-1, and notes with a leader: their lines, arrowheads and labels.

use super::sheet::{Anchor, At, Datum, LETTERS, Label, Rect, Sheet, Stroke};
use crate::write::lettering::{CAPITALS, width};

/// Length of an arrowhead \[mm\].
const HEAD: f64 = 2.6;
/// Gap between a label and its dimension line \[mm\].
const GAP: f64 = 0.9;

/// Direction of a dimension on paper.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Way {
    /// Along the sheet's x.
    Across,
    /// Along the sheet's y; its label reads from the right.
    Upright,
}

impl Way {
    /// Index of the coordinate along the dimension.
    pub(super) const fn along(self) -> usize {
        match self {
            Self::Across => 0,
            Self::Upright => 1,
        }
    }

    /// The point with a coordinate along the dimension and one across it.
    const fn point(self, along: f64, level: f64) -> At {
        match self {
            Self::Across => [along, level],
            Self::Upright => [level, along],
        }
    }
}

/// A distance between two points, measured along the sheet's x or y.
#[derive(Clone, Debug)]
pub(super) struct Linear {
    pub(super) from: At,
    pub(super) to: At,
    pub(super) way: Way,
    /// Where the dimension line stands: its other coordinate.
    pub(super) level: f64,
    pub(super) text: String,
    pub(super) datum: Option<Datum>,
}

/// Draws a linear dimension.
pub(super) fn linear(sheet: &mut Sheet, dimension: Linear) {
    let Linear {
        from,
        to,
        way,
        level,
        text,
        datum,
    } = dimension;
    let k = way.along();
    let (low, high) = (from[k].min(to[k]), from[k].max(to[k]));
    for point in [from, to] {
        let off = level - point[1 - k];
        if off.abs() > 1.0 {
            let start = point[1 - k] + 0.8 * off.signum();
            let end = level + 1.6 * off.signum();
            sheet.line(
                Stroke::Dimension,
                vec![way.point(point[k], start), way.point(point[k], end)],
            );
        }
    }
    let length = width(&text, LETTERS / CAPITALS);
    let room = high - low;
    let inside = room >= 2.0 * HEAD + 1.5;
    let (mut start, mut end) = (low, high);
    if inside {
        head(sheet, way.point(low, level), way.point(high, level));
        head(sheet, way.point(high, level), way.point(low, level));
    } else {
        head(sheet, way.point(low, level), way.point(low - 1.0, level));
        head(sheet, way.point(high, level), way.point(high + 1.0, level));
        (start, end) = (low - 2.0 * HEAD, high + 2.0 * HEAD);
    }
    let label = |middle: f64, level: f64| Label {
        turned: way == Way::Upright,
        datum: datum.clone(),
        ..Label::new(text.clone(), way.point(middle, level), Anchor::Middle)
    };
    let mut places = Vec::new();
    let middle = 0.5 * (low + high);
    let over = 0.72 * LETTERS / CAPITALS + GAP;
    for (side, dearer) in [(level - GAP, 0.0), (level + over + 0.2, 2.0)] {
        if room > length + 1.0 {
            for shift in 0..12_u8 {
                for sign in [1.0, -1.0] {
                    let shift = f64::from(shift) / 12.0 * 0.5 * (room - length);
                    places.push((label(middle + sign * shift, side), 0.2 * shift + dearer));
                }
            }
        }
        for step in 0..24_u8 {
            let away = 0.5 * length + 1.0 + 4.0 * f64::from(step);
            let far = 6.0 + 0.4 * away + dearer;
            places.push((label(end + away, side), far));
            places.push((label(start - away, side), far + 0.5));
        }
    }
    if way == Way::Upright && room <= length + 1.0 {
        // what does not fit along the line is easier to read beside it
        for (side, anchor) in [(1.5, Anchor::Start), (-1.5, Anchor::End)] {
            for shift in [0.0, 0.25, -0.25, 0.5, -0.5] {
                let base = middle + shift * room + 0.35 * LETTERS / CAPITALS;
                let beside = Label {
                    datum: datum.clone(),
                    ..Label::new(text.clone(), [level + side, base], anchor)
                };
                places.push((beside, 3.0 + 4.0 * f64::abs(shift)));
            }
        }
    }
    let placed = sheet.place(places);
    let along = sheet
        .labels
        .last()
        .is_some_and(|label| label.turned == (way == Way::Upright));
    if let Some(at) = placed.filter(|_| along) {
        // the dimension line runs on under a label that stands outside
        start = start.min(at[k] - 0.5 * length).min(start);
        end = if at[k] > high {
            end.max(at[k] + 0.5 * length)
        } else {
            end
        };
        if at[k] > low {
            start = start.max(low - if inside { 0.0 } else { 2.0 * HEAD });
        }
    } else if placed.is_none() {
        note(sheet, way.point(middle, level), &text, datum);
    }
    sheet.line(
        Stroke::Dimension,
        vec![way.point(start, level), way.point(end, level)],
    );
}

/// An arrowhead with its point at `tip`, coming from the side of `tail`.
fn head(sheet: &mut Sheet, tip: At, tail: At) {
    let way = [tail[0] - tip[0], tail[1] - tip[1]];
    let length = way[0].hypot(way[1]).max(1e-9);
    let (u, v) = (way[0] / length, way[1] / length);
    let half = 0.17 * HEAD;
    sheet.patches.push(super::sheet::Patch {
        stroke: Stroke::Dimension,
        points: vec![
            tip,
            [tip[0] + HEAD * u - half * v, tip[1] + HEAD * v + half * u],
            [tip[0] + HEAD * u + half * v, tip[1] + HEAD * v - half * u],
        ],
    });
}

/// An angle at `corner` from the direction of `zero` to that of `to`.
pub(super) struct Angular {
    pub(super) corner: At,
    pub(super) zero: At,
    pub(super) to: At,
    pub(super) radius: f64,
    pub(super) text: String,
    pub(super) datum: Datum,
}

/// Draws an angle: the direction it is counted from, an arc, a label.
pub(super) fn angular(sheet: &mut Sheet, angle: Angular) {
    let Angular {
        corner,
        zero,
        to,
        radius,
        text,
        datum,
    } = angle;
    let turn = |p: At| (p[1] - corner[1]).atan2(p[0] - corner[0]);
    let (from, mut end) = (turn(zero), turn(to));
    let whole = std::f64::consts::TAU;
    end -= ((end - from + 0.5 * whole) / whole).floor() * whole;
    let at = |angle: f64, radius: f64| [corner[0] + radius * angle.cos(), corner[1] + radius * angle.sin()];
    sheet.line(Stroke::Dimension, vec![at(from, 1.0), at(from, radius + 3.0)]);
    let arc = (end - from).abs() * radius;
    let sense = if end < from { -1.0 } else { 1.0 };
    // too narrow for arrowheads inside: they come from outside
    let outside = arc < 2.0 * HEAD + 1.0;
    let over = if outside { 2.2 * HEAD / radius * sense } else { 0.0 };
    let (first, last) = (from - over, end + over);
    let points = (0..=24_u8).map(|k| at(first + (last - first) * f64::from(k) / 24.0, radius));
    sheet.line(Stroke::Dimension, points.collect());
    let bend = 0.5 * HEAD / radius * sense * if outside { -1.0 } else { 1.0 };
    head(sheet, at(from, radius), at(from + 2.0 * bend, radius));
    head(sheet, at(end, radius), at(end - 2.0 * bend, radius));
    let middle = if outside { last } else { 0.5 * (from + end) };
    note(sheet, at(middle, radius), &text, Some(datum));
}

/// Writes a label near a point, with a leader to it; nothing where there is no room around it.
pub(super) fn note(sheet: &mut Sheet, target: At, text: &str, datum: Option<Datum>) -> bool {
    let mut best: Option<(Label, At, f64)> = None;
    for distance in [3.0, 5.0, 7.5, 11.0, 15.0, 20.0, 27.0, 36.0_f64] {
        for step in 0..24_u8 {
            let angle = f64::from(step) * std::f64::consts::TAU / 24.0;
            let (x, y) = (
                target[0] + distance * angle.cos(),
                target[1] + distance * angle.sin(),
            );
            let anchor = if angle.cos() >= -1e-9 {
                Anchor::Start
            } else {
                Anchor::End
            };
            let lean = if anchor == Anchor::Start { 0.8 } else { -0.8 };
            let mut label = Label::new(text, [x + lean, y + 0.35 * LETTERS / CAPITALS], anchor);
            label.datum = datum.clone();
            let mut cost = distance;
            if best.as_ref().is_some_and(|(_, _, least)| *least <= cost) {
                continue;
            }
            let rect = label.rect();
            if !sheet.is_free(&rect) {
                continue;
            }
            let covers = |r: &Rect| r.grown(0.3).is_crossed(target, [x, y]);
            if sheet.labels.iter().any(|other| covers(&other.rect())) {
                continue;
            }
            cost += 5.0 * f64::from(u32::try_from(sheet.crossings(&rect.grown(0.4))).unwrap_or(u32::MAX));
            if best.as_ref().is_none_or(|(_, _, least)| cost < *least) {
                best = Some((label, [x, y], cost));
            }
        }
    }
    let Some((label, end, _)) = best else {
        return false;
    };
    sheet.labels.push(label);
    sheet.line(Stroke::Dimension, vec![target, end]);
    true
}
