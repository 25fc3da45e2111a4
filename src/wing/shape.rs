//! The built wing.

use nalgebra::Point3;

use super::asks::asks;
use super::notes::notes;
use super::{Error, Prepared};
use crate::airfoil::{self, Profiles};
use crate::loft::{Loft, TrailingEdge};
use crate::measure::{self, Check, Figures, Slices, Spanwise, compare};
use crate::mesh::{self, Mesh};
use crate::planform::{Planform, Reference, reference_geometry};
use crate::solid::{self, Solid};
use crate::spec::{Sides, Spec, Step, TipForm, TwistKind};

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
    /// The exact faces of its starboard side with the reference root's leading edge at the origin, also where only the
    /// port side is built or the wing is placed elsewhere.
    pub loft: Loft,
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
    /// SHA-256 of the spec and the coordinate files it names, hexadecimal.
    pub spec_hash: String,
    /// How load and cruise led to the area and the incidence.
    pub sizing: Vec<Step>,
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
            fitted,
            ..
        } = prepared;
        let zero_lift = zero_lift(prepared);
        let planform = Planform::of(spec, &zero_lift)?;
        let sections: Vec<&airfoil::Section> = sections.iter().collect();
        let profiles = match fitted {
            Some(profiles) => Profiles::clone(profiles),
            None => airfoil::fit(&sections, airfoil::TOLERANCE)?,
        };
        let given = sections
            .iter()
            .map(|section| section.deviation)
            .fold(0.0, f64::max);
        let section_deviation = given + profiles.deviation;
        let edge = TrailingEdge {
            thickness: spec.trailing_edge,
            ratio: spec.trailing_edge_ratio,
        };
        let round = spec.tip == TipForm::Round;
        let profiles = if round {
            profiles.on_common_knots()
        } else {
            profiles
        };
        let mut at_origin = Loft::new(&planform, &profiles, chosen, edge)?;
        if round {
            at_origin = at_origin.with_round_tip(&planform);
        }
        let starboard = at_origin.shifted(&planform.shift);
        let port = at_origin.mirrored().shifted(&planform.shift);
        let groups = solids_of(spec.sides, planform.start == 0.0, &starboard, &port);
        let solids = groups
            .iter()
            .map(|(name, lofts)| solid::build(name, lofts))
            .collect::<Result<Vec<_>, _>>()?;
        let figures: Vec<Figures> = groups.iter().map(|(_, lofts)| measure::figures(lofts)).collect();
        let meshes: Vec<Mesh> = groups
            .iter()
            .map(|(_, lofts)| facets(lofts, spec.facet_tolerance, spec.unit.millimetres()))
            .collect::<Result<_, _>>()
            .map_err(Error::Mesh)?;
        let side = if spec.sides == Sides::Port {
            &port
        } else {
            &starboard
        };
        let spanwise = Spanwise {
            fraction: spec.setting.twist_axis,
            fin: planform.fin,
            origin: Point3::from(planform.shift),
        };
        let slices = Slices::of(side, spanwise);
        let checks = compare(asks(spec, &planform, &slices));
        let reference = reference_geometry(spec, &planform);
        let load = spec.load.iter().flat_map(|load| load.chain.iter());
        let sizing = load.chain(&planform.chain).cloned().collect();
        let notes = notes(prepared, &planform, &starboard, &profiles);
        Ok(Self {
            spec: spec.clone(),
            planform,
            profiles,
            section_deviation,
            loft: at_origin,
            solids,
            figures,
            slices,
            checks,
            meshes,
            reference,
            sizing,
            spec_hash: prepared.hash.clone(),
            notes,
        })
    }

    /// Whether everything asked for was found on the solid.
    pub fn is_as_asked(&self) -> bool {
        self.checks.iter().all(|check| check.ok)
    }
}

/// The solids that are built, each with its name and its one or two sides. Sides that do not reach the centreline, because a
/// fuselage is between them, are two solids.
pub(super) fn solids_of<'a>(
    sides: Sides,
    reach_centreline: bool,
    starboard: &'a Loft,
    port: &'a Loft,
) -> Vec<(&'static str, Vec<&'a Loft>)> {
    let (right, left) = (("starboard wing", vec![starboard]), ("port wing", vec![port]));
    match sides {
        Sides::Both if reach_centreline => vec![("wing", vec![starboard, port])],
        Sides::Starboard => vec![right],
        Sides::Port => vec![left],
        Sides::Both | Sides::Pair => vec![right, left],
    }
}

/// Facets of a loft, or of two that meet; where they are curved along the span, of straight elements close to them.
pub(super) fn facets(lofts: &[&Loft], tolerance: f64, unit: f64) -> Result<Mesh, mesh::Finding> {
    if lofts[0].strips.iter().all(|strip| strip.knots.degree() == 1) {
        return mesh::build(lofts, &mesh::Limits { tolerance }, unit);
    }
    let straight: Vec<(Loft, f64)> = lofts
        .iter()
        .map(|loft| loft.straightened(0.4 * tolerance))
        .collect();
    let off = straight.iter().map(|(_, off)| *off).fold(0.0, f64::max);
    let lofts: Vec<&Loft> = straight.iter().map(|(loft, _)| loft).collect();
    let limits = mesh::Limits {
        tolerance: tolerance - off,
    };
    let mut mesh = mesh::build(&lofts, &limits, unit)?;
    mesh.deviation += off;
    Ok(mesh)
}

/// Zero-lift angle of each of the spec's own stations \[rad\], by thin-aerofoil theory; zeros where nothing asks for it.
fn zero_lift(prepared: &Prepared) -> Vec<f64> {
    let setting = &prepared.spec.setting;
    if setting.twist_kind == TwistKind::Geometric && !setting.for_cruise {
        return vec![0.0; prepared.chosen.len()];
    }
    let angles: Vec<f64> = prepared
        .sections
        .iter()
        .map(|section| section.figures().zero_lift_angle)
        .collect();
    prepared.chosen.iter().map(|k| angles[*k]).collect()
}
