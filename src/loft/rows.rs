//! Control rows of splines through sections.

use nalgebra::Point3;

use super::Section;
use crate::spline::{Interpolation, Knots, part_from};

/// Control rows of the spline through sections.
pub(super) fn through(spline: &Interpolation, sections: &[Section]) -> Vec<Section> {
    let column = |pick: fn(&Section) -> &Vec<Point3<f64>>, i: usize| -> Vec<Point3<f64>> {
        spline.through(
            &sections
                .iter()
                .map(|section| pick(section)[i])
                .collect::<Vec<_>>(),
        )
    };
    let columns = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Vec<Vec<Point3<f64>>> {
        (0..pick(&sections[0]).len()).map(|i| column(pick, i)).collect()
    };
    transposed(&columns(|s| &s.upper), &columns(|s| &s.lower))
}

/// The part of a spline of control rows from `v` on.
pub(super) fn cut(knots: &Knots, rows: &[Section], v: f64) -> Option<(Knots, Vec<Section>)> {
    let mut kept = None;
    let mut columns = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Option<Vec<Vec<Point3<f64>>>> {
        (0..pick(&rows[0]).len())
            .map(|i| {
                let column: Vec<Point3<f64>> = rows.iter().map(|row| pick(row)[i]).collect();
                let (knots, control) = part_from(knots, &column, v)?;
                kept = Some(knots);
                Some(control)
            })
            .collect()
    };
    let (upper, lower) = (columns(|s| &s.upper)?, columns(|s| &s.lower)?);
    Some((kept?, transposed(&upper, &lower)))
}

fn transposed(upper: &[Vec<Point3<f64>>], lower: &[Vec<Point3<f64>>]) -> Vec<Section> {
    (0..upper[0].len())
        .map(|row| {
            let mut section = Section {
                upper: upper.iter().map(|column| column[row]).collect(),
                lower: lower.iter().map(|column| column[row]).collect(),
            };
            section.lower[0] = section.upper[0];
            section
        })
        .collect()
}
