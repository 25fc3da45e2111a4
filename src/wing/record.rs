//! The wing's figures in its own unit.

use std::collections::BTreeMap;

use super::Wing;
use crate::measure::{Check, Quantity};
use crate::spec::Sides;
use crate::write::record::{
    BuiltFigures, CheckFigures, MacFigures, MeshFigures, Record, ReferenceFigures, SectionFit, SizingStep,
};

impl Wing {
    /// All figures for scripts and the proof sheet, with the names of the files that go with them.
    pub fn record(&self, files: BTreeMap<String, String>) -> Record {
        let unit = self.spec.unit.millimetres();
        let wing = &self.planform.wing;
        let mac = &wing.mac;
        let sign = if self.spec.sides == Sides::Port { -1.0 } else { 1.0 };
        let point = |p: nalgebra::Point3<f64>| [p.x / unit, p.y / unit, p.z / unit];
        let shift = self.planform.shift;
        let side =
            |p: nalgebra::Point3<f64>| point(nalgebra::Point3::new(p.x, p.y * sign + 0.0, p.z) + shift);
        let leading_edge = side(mac.leading_edge);
        let volume: f64 = self.figures.iter().map(|f| f.volume).sum();
        let moment = self.figures.iter().fold(nalgebra::Vector3::zeros(), |sum, f| {
            sum + f.centroid.coords * f.volume
        });
        let sides = if matches!(self.spec.sides, Sides::Both | Sides::Pair) {
            2.0
        } else {
            1.0
        };
        let found = self.slices.planform();
        let tip = self
            .slices
            .at_station(self.slices.stations() - 1)
            .at(self.spec.setting.twist_axis);
        Record {
            name: self.spec.name.clone(),
            unit: self.spec.unit.symbol().to_owned(),
            reference: ReferenceFigures {
                area: wing.area / (unit * unit),
                span: wing.span / unit,
                aspect_ratio: wing.aspect_ratio(),
                taper_ratio: wing.taper_ratio(),
                root_chord: wing.root_chord / unit,
                tip_chord: wing.tip_chord / unit,
                mean_chord: wing.mean_chord() / unit,
                mac: MacFigures {
                    length: mac.length / unit,
                    y: leading_edge[1],
                    x_le: leading_edge[0],
                    z_le: leading_edge[2],
                    incidence: mac.incidence.to_degrees(),
                },
                aerodynamic_centre: side(mac.aerodynamic_centre()),
            },
            built: BuiltFigures {
                volume: volume / unit.powi(3),
                wetted_area: self.figures.iter().map(|f| f.wetted_area).sum::<f64>() / (unit * unit),
                surface_area: self.figures.iter().map(|f| f.surface_area).sum::<f64>() / (unit * unit),
                planform_area: found.area * sides / (unit * unit),
                span: self.slices.offset(&tip) * sides / unit,
                centroid: point(nalgebra::Point3::from(moment / volume)),
                solids: self.solids.len(),
                faces: self.solids.iter().map(|solid| solid.faces.len()).sum(),
            },
            checks: self
                .checks
                .iter()
                .map(|check| in_unit(check, self.spec.unit))
                .collect(),
            section_fit: SectionFit {
                max_deviation: self.section_deviation,
                upper_points: self.profiles.upper.count(),
                lower_points: self.profiles.lower.count(),
            },
            mesh: MeshFigures {
                facets: self.meshes.iter().map(|mesh| mesh.facets.len()).sum(),
                max_deviation: self.meshes.iter().map(|mesh| mesh.deviation).fold(0.0, f64::max) / unit,
                // a wing is built only where the check of its facets passes
                watertight: true,
            },
            sizing: self
                .sizing
                .iter()
                .map(|step| SizingStep {
                    name: step.name.clone(),
                    value: step.value,
                    unit: step.unit.to_owned(),
                    ground: step.ground.clone(),
                })
                .collect(),
            notes: self.notes.clone(),
            files,
        }
    }
}

fn in_unit(check: &Check, unit: crate::spec::Unit) -> CheckFigures {
    let scale = unit.millimetres();
    let (factor, symbol) = match check.ask.quantity {
        Quantity::Length => (1.0 / scale, unit.symbol().to_owned()),
        Quantity::Area => (1.0 / (scale * scale), format!("{}²", unit.symbol())),
        Quantity::Angle => (1.0_f64.to_degrees(), "deg".to_owned()),
        Quantity::Ratio => (1.0, String::new()),
    };
    CheckFigures {
        quantity: check.ask.name.clone(),
        asked: check.ask.asked * factor + 0.0,
        built: check.ask.built * factor + 0.0,
        deviation: check.deviation * factor + 0.0,
        allowed: check.ask.allowed * factor,
        ok: check.ok,
        unit: symbol,
    }
}
