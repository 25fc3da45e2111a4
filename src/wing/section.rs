//! A section by itself: its figures, its points, its drawing.

use std::collections::BTreeMap;

use super::source::LoadedSection;
use crate::airfoil::{self, Figures, Outline, Section};
use crate::write::section_record::{AtX, Edge, SectionFit, SectionRecord, Waves};
use crate::write::{SectionDrawing, Tooth, section_record, section_svg};

/// Points of the drawing's contour.
const DRAWN: usize = 601;
/// Teeth of the curvature comb on a side.
const TEETH: usize = 120;

/// The figures of a section, for scripts and for the table.
///
/// # Errors
///
/// [`airfoil::Error`] where the section cannot be fitted by control points.
pub fn section_record(loaded: &LoadedSection) -> Result<SectionRecord, airfoil::Error> {
    let section = &loaded.section;
    let fit = airfoil::fit(&[section], airfoil::TOLERANCE)?;
    let Figures {
        area,
        centroid,
        perimeter,
        thickness,
        camber,
        nose_radius,
        trailing_angle,
        base,
        zero_lift_angle,
        quarter_chord_moment,
        ideal_angle,
        ideal_lift,
    } = section.figures();
    let waviness = section.waviness();
    Ok(SectionRecord {
        name: section.name.clone(),
        title: loaded.title.clone(),
        area,
        centroid,
        perimeter,
        thickness: AtX {
            value: thickness.value,
            x: thickness.x,
        },
        camber: AtX {
            value: camber.value,
            x: camber.x,
        },
        nose_radius,
        trailing_edge: Edge {
            angle: trailing_angle.to_degrees(),
            base,
            closing: section.closing_note(),
        },
        zero_lift_angle: zero_lift_angle.to_degrees(),
        quarter_chord_moment,
        ideal_angle: ideal_angle.to_degrees(),
        ideal_lift,
        fit: SectionFit {
            max_deviation: fit.deviation,
            point_deviation: section.deviation,
            upper_points: fit.upper.count(),
            lower_points: fit.lower.count(),
        },
        waviness: Waves {
            upper: waviness.upper,
            lower: waviness.lower,
            excess: waviness.excess(),
        },
        notes: loaded.notes.iter().chain(&loaded.shape_notes).cloned().collect(),
        points: None,
        files: BTreeMap::new(),
    })
}

/// The drawing of a section as an SVG file.
pub fn section_drawing(section: &Section, record: &SectionRecord) -> String {
    let Outline { points, .. } = section.points(DRAWN);
    let line = section.camber_line();
    let camber = (0..=200).map(|i| {
        // finer towards the nose, where a mean line may be steep
        let x = (f64::from(i) / 200.0).powi(2);
        [x, line.at(x).0]
    });
    let comb = section.curvature(TEETH).into_iter().map(|tooth| Tooth {
        foot: tooth.point,
        outwards: tooth.outwards,
        curvature: tooth.value,
    });
    section_svg(&SectionDrawing {
        title: record.name.clone(),
        outline: points,
        camber: camber.collect(),
        nose: Some(section.nose_circle()),
        comb: comb.collect(),
        notes: section_record::captions(record),
    })
}
