//! The built wing.

use super::asks::asks;
use super::notes::notes;
use super::{Error, Prepared};
use crate::airfoil::{self, Profiles};
use crate::loft::Loft;
use crate::measure::{self, Check, Figures, Slices, compare};
use crate::mesh::{self, Mesh};
use crate::planform::{Planform, Reference, reference_geometry};
use crate::solid::{self, Solid};
use crate::spec::{Sides, Spec};

/// A wing, built and measured.
#[derive(Clone, Debug)]
pub struct Wing {
    /// What was asked for.
    pub spec: Spec,
    /// How it was laid out.
    pub planform: Planform,
    /// Its sections, fitted.
    pub profiles: Profiles,
    /// Largest distance between a section as given and as built \[chord\].
    pub section_deviation: f64,
    /// Its solids: one, or two for a pair.
    pub solids: Vec<Solid>,
    /// Figures of each solid, measured on the exact faces.
    pub figures: Vec<Figures>,
    /// Chords of one side, cut out of the exact faces.
    pub slices: Slices,
    /// What was asked for beside what was found.
    pub checks: Vec<Check>,
    /// Facets of each solid.
    pub meshes: Vec<Mesh>,
    /// Construction geometry.
    pub reference: Reference,
    /// Cautions and guidance.
    pub notes: Vec<String>,
}

impl Wing {
    /// Builds and measures a wing.
    ///
    /// # Errors
    ///
    /// [`enum@Error`] where the sections cannot be fitted or joined.
    pub fn build(prepared: &Prepared) -> Result<Self, Error> {
        let Prepared {
            spec,
            sections,
            chosen,
            ..
        } = prepared;
        let planform = Planform::of(spec);
        let sections: Vec<&airfoil::Section> = sections.iter().collect();
        let profiles = airfoil::fit(&sections, airfoil::TOLERANCE)?;
        let given = sections
            .iter()
            .map(|section| section.deviation)
            .fold(0.0, f64::max);
        let section_deviation = given + profiles.deviation;
        let starboard = Loft::new(&planform, &profiles, chosen, spec.trailing_edge)?;
        let port = starboard.mirrored();
        let groups: Vec<(&str, Vec<&Loft>)> = match spec.sides {
            Sides::Both => vec![("wing", vec![&starboard, &port])],
            Sides::Starboard => vec![("starboard wing", vec![&starboard])],
            Sides::Port => vec![("port wing", vec![&port])],
            Sides::Pair => vec![("starboard wing", vec![&starboard]), ("port wing", vec![&port])],
        };
        let solids = groups
            .iter()
            .map(|(name, lofts)| solid::build(name, lofts))
            .collect::<Result<Vec<_>, _>>()?;
        let figures: Vec<Figures> = groups.iter().map(|(_, lofts)| measure::figures(lofts)).collect();
        let meshes: Vec<Mesh> = groups
            .iter()
            .map(|(_, lofts)| mesh::build(lofts, spec.facet_tolerance))
            .collect();
        for mesh in &meshes {
            mesh::check(mesh, spec.unit.millimetres()).map_err(Error::Mesh)?;
        }
        let side = if spec.sides == Sides::Port {
            &port
        } else {
            &starboard
        };
        let slices = Slices::of(side, spec.setting.twist_axis, planform.fin);
        let checks = compare(asks(spec, &planform, &slices));
        let reference = reference_geometry(spec, &planform);
        let notes = notes(prepared, &planform, &starboard, &profiles);
        Ok(Self {
            spec: spec.clone(),
            planform,
            profiles,
            section_deviation,
            solids,
            figures,
            slices,
            checks,
            meshes,
            reference,
            notes,
        })
    }

    /// Whether everything asked for was found on the solid.
    pub fn is_as_asked(&self) -> bool {
        self.checks.iter().all(|check| check.ok)
    }
}
