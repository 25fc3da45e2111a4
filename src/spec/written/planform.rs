//! `[planform]`: any sufficient, consistent set of sizes, and the angles of a wing without panels.

use super::{Entry, Section};
use crate::spec::Outline;
use crate::spec::keys::{Key, Range, Table};
use crate::spec::quantity::Dimension::{Angle, Area, Length, Ratio};

pub(super) const TABLE: Table = Table {
    name: "planform",
    many: false,
    keys: &[
        Key::size("area", Area, Range::AREA),
        Key::size("span", Length, Range::LENGTH),
        Key::size("aspect_ratio", Ratio, Range::ASPECT),
        Key::size("root_chord", Length, Range::CHORD),
        Key::size("tip_chord", Length, Range::CHORD),
        Key::size("taper_ratio", Ratio, Range::TAPER),
        Key::size("mean_chord", Length, Range::CHORD),
        Key::size("sweep", Angle, Range::SWEEP),
        Key::detail("sweep_at", Ratio, Range::FRACTION),
        Key::size("dihedral", Angle, Range::DIHEDRAL),
        Key::choice("outline", &["trapezoid", "ellipse"]),
        Key::detail("span_limit", Length, Range::LENGTH),
    ],
};

/// The table `[planform]`.
#[derive(Debug)]
pub(in crate::spec) struct Planform {
    pub(in crate::spec) area: Entry<f64>,
    pub(in crate::spec) span: Entry<f64>,
    pub(in crate::spec) aspect_ratio: Entry<f64>,
    pub(in crate::spec) root_chord: Entry<f64>,
    pub(in crate::spec) tip_chord: Entry<f64>,
    pub(in crate::spec) taper_ratio: Entry<f64>,
    pub(in crate::spec) mean_chord: Entry<f64>,
    pub(in crate::spec) sweep: Entry<f64>,
    pub(in crate::spec) sweep_at: Entry<f64>,
    pub(in crate::spec) dihedral: Entry<f64>,
    pub(in crate::spec) outline: Entry<Outline>,
    pub(in crate::spec) span_limit: Entry<f64>,
}

impl Planform {
    pub(super) fn read(section: &mut Section<'_>) -> Self {
        Self {
            area: section.number("area"),
            span: section.number("span"),
            aspect_ratio: section.number("aspect_ratio"),
            root_chord: section.number("root_chord"),
            tip_chord: section.number("tip_chord"),
            taper_ratio: section.number("taper_ratio"),
            mean_chord: section.number("mean_chord"),
            sweep: section.number("sweep"),
            sweep_at: section.number("sweep_at"),
            dihedral: section.number("dihedral"),
            outline: section.choice("outline", |word| match word {
                "trapezoid" => Some(Outline::Trapezoid),
                "ellipse" => Some(Outline::Ellipse),
                _ => None,
            }),
            span_limit: section.number("span_limit"),
        }
    }
}
