//! Straight elements close to a curved loft.

use nalgebra::{Point3, Vector3};

use super::{Loft, Section, Strip};
use crate::spline::{Knots, Surface};

impl Loft {
    /// A loft with straight elements only that is within `tolerance` \[mm\] of this one, and how far it is from it.
    ///
    /// Strips that are curved along the span are cut into as many straight ones as that takes.
    pub fn straightened(&self, tolerance: f64) -> (Self, f64) {
        let mut loft = Self {
            sections: vec![self.sections[0].clone()],
            strips: Vec::new(),
            ..self.clone()
        };
        let mut worst = 0.0_f64;
        for k in 0..self.panels() {
            if self.strips[k].knots.degree() > 1 {
                let skins = [self.upper(k), self.lower(k)];
                let mut parts = 4_u32;
                let mut deviation = sag(&skins, parts);
                while deviation > tolerance && parts < 2000 {
                    parts = (parts + 1).max(parts * 6 / 5);
                    deviation = sag(&skins, parts);
                }
                worst = worst.max(deviation);
                let (from, to) = self.strips[k].knots.range();
                for j in 1..parts {
                    let v = from + (to - from) * f64::from(j) / f64::from(parts);
                    loft.sections.push(self.section_at(k, v));
                }
            }
            loft.sections.push(self.sections[k + 1].clone());
        }
        loft.strips = vec![
            Strip {
                knots: Knots::bezier(1),
                rows: Vec::new()
            };
            loft.sections.len() - 1
        ];
        loft.places.clear();
        (loft, worst)
    }

    /// The section of panel `k` at the spanwise parameter `v`, as control points.
    pub fn section_at(&self, k: usize, v: f64) -> Section {
        let knots = &self.strips[k].knots;
        let (first, basis) = knots.basis(v);
        let rows: Vec<&Section> = self.rows(k).skip(first).take(knots.degree() + 1).collect();
        let mix = |pick: fn(&Section) -> &Vec<Point3<f64>>| -> Vec<Point3<f64>> {
            (0..pick(rows[0]).len())
                .map(|i| {
                    let weighted = rows.iter().zip(&basis);
                    Point3::from(
                        weighted.fold(Vector3::zeros(), |sum, (row, b)| sum + pick(row)[i].coords * *b),
                    )
                })
                .collect()
        };
        let mut section = Section {
            upper: mix(|s| &s.upper),
            lower: mix(|s| &s.lower),
        };
        section.lower[0] = section.upper[0];
        section
    }
}

/// Largest distance between a strip's skins and straight elements between `parts` equal parts of it \[mm\].
fn sag(skins: &[Surface; 2], parts: u32) -> f64 {
    let mut worst = 0.0_f64;
    for skin in skins {
        let (from, to) = skin.v.range();
        for u in [0.0, 0.05, 0.15, 0.3, 0.5, 0.7, 0.85, 1.0] {
            for j in 0..parts {
                let v = |share: f64| from + (to - from) * (f64::from(j) + share) / f64::from(parts);
                let (a, b) = (skin.at(u, v(0.0)), skin.at(u, v(1.0)));
                for share in [0.25, 0.5, 0.75] {
                    let off = skin.at(u, v(share)) - a;
                    // what matters is the distance from the element, not the place along it
                    worst = worst.max(off.cross(&(b - a)).norm() / (b - a).norm());
                }
            }
        }
    }
    worst
}
