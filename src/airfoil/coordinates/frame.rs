//! Points in the file's units to the chord frame.

use crate::airfoil::coordinates::error::Error;
use crate::airfoil::coordinates::nose;
use crate::airfoil::coordinates::order::Run;
use crate::airfoil::coordinates::text::{Line, place};

/// The file's axis is the chord line where the trailing edge is this near to it, and the curve crosses it this near to
/// the origin or to the foremost point \[chord\].
const EDGE_NEAR: f64 = 2e-3;
const NOSE_NEAR: f64 = 5e-3;

/// How the points were moved into the chord frame.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Moved {
    /// The leading edge in the file's units, which became (0, 0).
    pub leading_edge: [f64; 2],
    /// The chord in the file's units, which became 1.
    pub chord: f64,
    /// Direction of the chord line in the file, from leading to trailing edge: anticlockwise from the x axis \[rad\].
    pub angle: f64,
}

/// Points in the chord frame.
#[derive(Clone, Debug)]
pub(super) struct Framed {
    /// The points \[chord\].
    pub(super) points: Vec<[f64; 2]>,
    /// Decimals of the file's numbers in units of the chord.
    pub(super) decimals: usize,
    /// One unit of the last decimal \[chord\], at least 1e-12.
    pub(super) unit: f64,
    /// How they were moved, unless by a plain factor alone.
    pub(super) moved: Option<Moved>,
}

/// Brings the points into the frame with the leading edge at (0, 0) and the middle of the trailing edge at (1, 0).
///
/// A file whose x axis is the chord line keeps that axis: the leading edge is where the curve crosses it. In any other
/// file it is the point of the curve farthest from the middle of the trailing edge.
pub(super) fn normalise(run: &Run, lines: &[Line<'_>], notes: &mut Vec<String>) -> Result<Framed, Error> {
    let raw: Vec<[f64; 2]> = run.points.iter().map(|p| p.at).collect();
    let line = run.points.first().map_or(1, |p| p.line);
    let no_chord = || Error::NoChord {
        at: place(lines, line),
    };
    let (&upper, &lower) = raw.first().zip(raw.last()).ok_or_else(no_chord)?;
    let edge = [0.5 * (upper[0] + lower[0]), 0.5 * (upper[1] + lower[1])];
    let size = raw
        .iter()
        .map(|p| (p[0] - edge[0]).hypot(p[1] - edge[1]))
        .fold(0.0, f64::max);
    if size <= 0.0 {
        return Err(no_chord());
    }
    let raw_unit = 10_f64.powi(-run.decimals[1].clamp(-12, 17));
    let foremost = raw.iter().map(|p| p[0]).fold(f64::INFINITY, f64::min);
    let own = if edge[1].abs() <= EDGE_NEAR * size {
        nose::crossing(&raw, size, raw_unit.min(1e-3 * size))
            .filter(|x| (x - foremost).min(x.abs()) <= NOSE_NEAR * size)
    } else {
        None
    };
    let leading = own.map_or_else(
        || nose::farthest(&raw, edge, raw_unit.min(1e-3 * size)),
        |x| [x, 0.0],
    );
    let (dx, dy) = (edge[0] - leading[0], edge[1] - leading[1]);
    let chord = if dy.abs() <= 0.0 { dx } else { dx.hypot(dy) };
    if !(chord > 0.0 && chord.is_finite()) {
        return Err(no_chord());
    }
    let (c, s) = (dx / chord, dy / chord);
    let mut points: Vec<[f64; 2]> = raw
        .iter()
        .map(|p| {
            let d = [p[0] - leading[0], p[1] - leading[1]];
            [(d[0] * c + d[1] * s) / chord, (d[1] * c - d[0] * s) / chord]
        })
        .collect();
    centre(&mut points);

    let decimals = decimals(run.decimals, chord);
    let unit = 10_f64.powi(-i32::try_from(decimals).unwrap_or(17)).max(1e-12);
    let plain = plain_factor(chord);
    if (plain - 1.0).abs() > 0.0 {
        notes.push(format!("Scale: chord {} to 1.", shown(plain)));
    }
    // how far the nose and the trailing edge are from where a plain factor would put them
    let at_nose = (leading[0] / plain).hypot(leading[1] / plain);
    let at_edge = (edge[0] / plain - 1.0).hypot(edge[1] / plain);
    let moved = Moved {
        leading_edge: leading,
        chord,
        angle: dy.atan2(dx),
    };
    if at_nose.max(at_edge) <= unit {
        return Ok(Framed {
            points,
            decimals,
            unit,
            moved: None,
        });
    }
    if own.is_none() {
        notes.push(format!(
            "Shifted by ({}, {}) and turned by {:.4} degrees about the nose, the point farthest from the trailing edge.",
            shown(-leading[0]),
            shown(-leading[1]),
            -moved.angle.to_degrees()
        ));
    } else {
        notes.push(format!(
            "Shifted by {} along the chord and fitted to the trailing edge: scaled by {:.9}, turned by {:.4} degrees.",
            shown(-leading[0]),
            plain / chord,
            -moved.angle.to_degrees() + 0.0
        ));
    }
    Ok(Framed {
        points,
        decimals,
        unit,
        moved: Some(moved),
    })
}

/// Puts the middle of the trailing edge at (1, 0) where the arithmetic left it off in the last digits.
fn centre(points: &mut [[f64; 2]]) {
    let [first, .., last] = points else { return };
    let off = [0.5 * (first[0] + last[0]) - 1.0, 0.5 * (first[1] + last[1])];
    for k in 0..2 {
        if off[k].abs() > 0.0 {
            let target = if k == 0 { 2.0 } else { 0.0 };
            first[k] -= off[k];
            last[k] = target - first[k];
        }
    }
}

/// A short print of a length of the file.
fn shown(value: f64) -> String {
    let text = format!("{value:.6}");
    let text = text.trim_end_matches('0').trim_end_matches('.');
    if text == "-0" {
        "0".to_owned()
    } else {
        text.to_owned()
    }
}

/// The power of ten that the chord nearly is, else the chord itself.
fn plain_factor(chord: f64) -> f64 {
    let power = 10_f64.powf(chord.log10().round());
    if (chord / power - 1.0).abs() <= 5e-3 {
        power
    } else {
        chord
    }
}

/// Decimals in units of the chord. Those of y count: stations x are often whole or short numbers, printed exactly;
/// those of x where they are fewer and yet too many for that.
fn decimals(raw: [i32; 2], chord: f64) -> usize {
    let more = chord.log10() + 1e-3;
    let [x, y] = raw.map(|d| (f64::from(d.clamp(-12, 20)) + more).floor().clamp(0.0, 17.0));
    let fewest = if x >= 5.0 { x.min(y) } else { y };
    (0..17_usize).find(|&d| d as f64 >= fewest).unwrap_or(17)
}
