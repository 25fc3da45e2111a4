//! What the report shows of a wing.

use std::collections::BTreeMap;

use super::Wing;
use super::shape::{facets, solids_of};
use crate::mesh::Mesh;
use crate::spec::IncidenceAt;
use crate::write::drawing::{Setting, angle_text, length_text, trimmed};
use crate::write::picture::picture;
use crate::write::record::Record;
use crate::write::report::{Chain, Report, Step, page};
use crate::write::sheet::figure;

/// A picture takes at most so many facets; a wing with more gets coarser ones for it.
const MOST_FACETS: usize = 6000;
/// Distance of the coarser facets from the surface, of the span.
const COARSE: f64 = 1e-4;

impl Wing {
    /// The report page as HTML, with a date where one is given.
    pub fn report(&self, date: Option<&str>) -> Vec<u8> {
        let record = self.record(BTreeMap::new());
        let drawing = self.sheet_with(&record, date);
        let sections = self.drawn_sections();
        let coarse = self.coarse_facets();
        let report = Report {
            record: &record,
            unit: self.spec.unit.millimetres(),
            drawing: &drawing,
            meshes: coarse.as_deref().unwrap_or(&self.meshes),
            reference: &self.reference,
            sections: &sections,
            chains: self.chains(&record),
            date,
        };
        page(&report).into_bytes()
    }

    /// A shaded picture of the facets with the construction lines, as SVG.
    pub fn picture(&self) -> Vec<u8> {
        let coarse = self.coarse_facets();
        let meshes = coarse.as_deref().unwrap_or(&self.meshes);
        picture(meshes, &self.reference, &self.spec.name, Setting::File).into_bytes()
    }

    /// Facets for a picture, where the wing's own are too many.
    fn coarse_facets(&self) -> Option<Vec<Mesh>> {
        let count: usize = self.meshes.iter().map(|mesh| mesh.facets.len()).sum();
        (count > MOST_FACETS).then(|| self.facets_within(COARSE * self.planform.wing.span))
    }

    /// Facets of each solid within a distance of the surface \[mm\].
    pub(super) fn facets_within(&self, tolerance: f64) -> Vec<Mesh> {
        let shift = &self.planform.shift;
        let (starboard, port) = (self.loft.shifted(shift), self.loft.mirrored().shifted(shift));
        let groups = solids_of(self.spec.sides, self.planform.start == 0.0, &starboard, &port);
        let unit = self.spec.unit.millimetres();
        let finer: Result<Vec<Mesh>, _> = groups
            .iter()
            .map(|(_, lofts)| facets(lofts, tolerance, unit))
            .collect();
        // where such facets fall together in 32-bit numbers the wing's own will do
        finer.unwrap_or_else(|_| self.meshes.clone())
    }

    /// How the wing's figures follow from each other.
    fn chains(&self, record: &Record) -> Vec<Chain> {
        let mut chains = Vec::new();
        if !record.sizing.is_empty() {
            let steps = (record.sizing.iter())
                .map(|step| Step {
                    name: step.name.clone(),
                    value: format!("{} {}", figure(step.value), step.unit)
                        .trim_end()
                        .to_owned(),
                    ground: step.ground.clone(),
                })
                .collect();
            chains.push(Chain {
                title: "Load and cruise",
                steps,
            });
        }
        chains.push(self.planform_chain(record));
        chains.push(self.incidence_chain(record));
        chains
    }

    fn planform_chain(&self, record: &Record) -> Chain {
        let (r, unit) = (&record.reference, &record.unit);
        let scale = self.spec.unit.millimetres();
        let length = |value: f64| format!("{} {unit}", length_text(value, scale));
        let step = |name: &str, value: String, ground: &str| Step {
            name: name.into(),
            value,
            ground: ground.into(),
        };
        Chain {
            title: "Planform",
            steps: vec![
                step(
                    "span b",
                    length(r.span),
                    "panels' widths in the reference plane, both sides",
                ),
                step(
                    "area S",
                    format!("{} {unit}²", figure(r.area)),
                    "S = ∫ c dy, both sides, to the centreline",
                ),
                step("aspect ratio A", trimmed(r.aspect_ratio, 4), "A = b² / S"),
                step(
                    "taper ratio λ",
                    trimmed(r.taper_ratio, 4),
                    "λ = tip chord / root chord",
                ),
                step("mean chord", length(r.mean_chord), "S / b"),
                step(
                    "mean aerodynamic chord c̄",
                    length(r.mac.length),
                    "c̄ = ∫ c² dy / ∫ c dy",
                ),
                step(
                    "its distance from the centreline",
                    length(r.mac.y.abs()),
                    "y = ∫ y c dy / ∫ c dy",
                ),
                step(
                    "its leading edge, x",
                    length(r.mac.x_le),
                    "x = ∫ x c dy / ∫ c dy along the leading edge",
                ),
                step(
                    "aerodynamic centre, x",
                    length(r.aerodynamic_centre[0]),
                    "a quarter of c̄ behind its leading edge (thin-aerofoil theory)",
                ),
            ],
        }
    }

    fn incidence_chain(&self, record: &Record) -> Chain {
        let stations = &self.planform.stations;
        let root = stations[0].incidence.to_degrees();
        let at_mac = self.spec.setting.at == IncidenceAt::Mac;
        let mac_ground = match (at_mac, self.spec.setting.for_cruise) {
            (true, true) => "carries the weight in cruise",
            (true, false) => "as asked",
            (false, _) => "of the chord between front and rear edge there",
        };
        let mut steps = vec![
            Step {
                name: "at the mean aerodynamic chord".into(),
                value: angle_text(record.reference.mac.incidence),
                ground: mac_ground.into(),
            },
            Step {
                name: "at the root".into(),
                value: angle_text(root),
                ground: if at_mac {
                    "solved so that the built section at the mean aerodynamic chord has its incidence"
                } else {
                    "as asked"
                }
                .into(),
            },
        ];
        for (k, mark) in self.planform.marks.iter().enumerate().skip(1) {
            let place = if k + 1 == self.planform.marks.len() {
                "at the tip".to_owned()
            } else {
                format!("at the end of panel {k}")
            };
            let station = &stations[*mark];
            steps.push(Step {
                name: place,
                value: angle_text(station.incidence.to_degrees()),
                ground: format!("root + twist of {}", angle_text(station.twist.to_degrees())),
            });
        }
        Chain {
            title: "Incidence",
            steps,
        }
    }
}
