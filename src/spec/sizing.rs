//! Sizes the area by what the wing carries.
//!
//! ```text
//! W = m g        W/S = ρ V_S² C_Lmax / 2        S = W / (W/S)
//! m mass, g standard acceleration of free fall, W weight, S reference area, ρ density, V_S stall speed,
//! C_Lmax greatest lift coefficient
//! ```
//!
//! Source: D. P. Raymer, *Aircraft Design: A Conceptual Approach*, ch. 4 and 5 (relations from memory).

use super::atmosphere::Air;
use super::fault::{Fault, Place};
use super::keys::Range;
use super::limit::Limit;
use super::quantity::{Dimension, GRAVITY, Scale, significant};
use super::sizes::{ROUNDING, Size, Values};
use super::written::{self, Entry, Given};
use super::{Load, Step, Unit};

/// Millimetres in a metre.
pub(super) const METRE: f64 = 1000.0;
const GROUND_GIVEN: &str = "as asked";

/// What `[load]` says of the wing before its planform is known.
#[derive(Debug, Default)]
pub(super) struct Sizing {
    /// Weight \[N\].
    weight: Option<f64>,
    /// Area \[mm²\] that follows, placed where the loading was typed.
    pub(super) area: Option<Given<f64>>,
    /// True where a fault of the table may hide an area.
    pub(super) doubtful: bool,
    chain: Vec<Step>,
}

/// A step of a chain of results.
fn step(name: &str, value: f64, unit: &'static str, ground: impl Into<String>) -> Step {
    Step {
        name: name.to_owned(),
        value,
        unit,
        ground: ground.into(),
    }
}

impl Sizing {
    /// Reads `[load]`; `place` is the table's, `hidden` is true where a misspelling may hide one of its keys.
    pub(super) fn of(load: &written::Load, place: &Place, hidden: bool, faults: &mut Vec<Fault>) -> Self {
        let mut sizing = Self {
            doubtful: hidden || load.entries().iter().any(|entry| entry.is_unreadable()),
            ..Self::default()
        };
        if place.line == 0 && load.entries().iter().all(|entry| matches!(entry, Entry::Absent)) {
            return sizing;
        }
        let before = faults.len();
        sizing.weigh(load, place, faults);
        let loading = sizing.loading(load, faults);
        if let (Some(weight), Some(loading)) = (sizing.weight, loading) {
            let area = weight / loading.value * METRE * METRE;
            if Range::AREA.holds(area) {
                sizing
                    .chain
                    .push(step("area", weight / loading.value, "m²", "S = W / (W/S)"));
                sizing.area = Some(Given {
                    value: area,
                    scale: SQUARE_METRE,
                    ..loading
                });
            } else {
                let problem = format!(
                    "a weight of {} N makes an area of {}; allowed: {}",
                    significant(weight),
                    SQUARE_METRE.show(area),
                    Range::AREA.words
                );
                faults.push(at(&loading, problem, "Change the weight or the loading."));
            }
        }
        sizing.doubtful |= faults.len() > before;
        sizing
    }

    /// The weight, from mass or weight.
    fn weigh(&mut self, load: &written::Load, place: &Place, faults: &mut Vec<Fault>) {
        let (mass, weight) = (load.mass.given(), load.weight.given());
        if let Some(mass) = mass {
            let made = mass.value * GRAVITY;
            self.chain.push(step("mass", mass.value, "kg", GROUND_GIVEN));
            self.chain
                .push(step("weight", made, "N", "W = m g, g = 9.80665 m/s²"));
            self.weight = Some(made);
            if let Some(weight) = weight.filter(|weight| (weight.value - made).abs() > ROUNDING * made) {
                let problem = format!(
                    "contradicts mass = {} ({}), which weighs {}",
                    mass.text,
                    mass.place.short(),
                    weight.scale.show(made)
                );
                faults.push(at(weight, problem, "Delete one of the two."));
            }
        } else if let Some(weight) = weight {
            self.chain.push(step("weight", weight.value, "N", GROUND_GIVEN));
            self.weight = Some(weight.value);
        } else if !self.doubtful {
            faults.push(Fault {
                place: place.clone(),
                text: String::new(),
                problem: "mass or weight is missing".to_owned(),
                remedy: "Add to [load], for example, mass = \"6.2 kg\".".to_owned(),
            });
        }
    }

    /// The wing loading \[N/m²\], given or from the stall.
    fn loading(&mut self, load: &written::Load, faults: &mut Vec<Fault>) -> Option<Given<f64>> {
        let stalled = self.stall(load, faults);
        let Some(loading) = load.wing_loading.given() else {
            return stalled;
        };
        match stalled {
            None => self
                .chain
                .push(step("wing loading", loading.value, "N/m²", GROUND_GIVEN)),
            Some(stalled) if (stalled.value - loading.value).abs() > ROUNDING * loading.value => {
                let problem = format!(
                    "contradicts stall_speed = {} ({}), which with max_lift_coefficient and density makes it {}",
                    stalled.text,
                    stalled.place.short(),
                    loading.scale.show(stalled.value)
                );
                faults.push(at(loading, problem, "Delete one of them."));
            }
            Some(_) => {}
        }
        Some(loading.clone())
    }

    /// The wing loading that stalls at the stall speed.
    fn stall(&mut self, load: &written::Load, faults: &mut Vec<Fault>) -> Option<Given<f64>> {
        let needs = |given: &Given<f64>, other: &str| {
            at(
                given,
                format!("sizes nothing without {other}"),
                &format!("Add {other} to [load], or delete the line."),
            )
        };
        let (speed, lift) = (&load.stall_speed, &load.max_lift_coefficient);
        if let (Entry::Absent, false) = (speed, self.doubtful) {
            let idle = [lift, &load.altitude, &load.density];
            faults.extend(
                idle.iter()
                    .filter_map(|entry| entry.given())
                    .map(|given| needs(given, "stall_speed")),
            );
        }
        let speed = speed.given()?;
        if let (Entry::Absent, false) = (lift, self.doubtful) {
            faults.push(needs(speed, "max_lift_coefficient"));
        }
        let lift = lift.given()?;
        self.chain
            .push(step("stall speed", speed.value, "m/s", GROUND_GIVEN));
        self.chain
            .push(step("greatest lift coefficient", lift.value, "", GROUND_GIVEN));
        let density = self.density(load, faults)?;
        let value = 0.5 * density * speed.value * speed.value * lift.value;
        self.chain
            .push(step("wing loading", value, "N/m²", "W/S = ρ V² C_Lmax / 2"));
        Some(Given {
            value,
            scale: Dimension::Loading.bare(Unit::Metre),
            ..speed.clone()
        })
    }

    /// The density \[kg/m³\].
    fn density(&mut self, load: &written::Load, faults: &mut Vec<Fault>) -> Option<f64> {
        let altitude = altitude(&load.altitude, &load.density, faults)?;
        match (load.density.given(), altitude) {
            (Some(density), _) => {
                self.chain
                    .push(step("density", density.value, "kg/m³", GROUND_GIVEN));
                Some(density.value)
            }
            (None, altitude) => {
                let ground = if matches!(load.altitude, Entry::Absent) {
                    "at sea level where no altitude is asked for"
                } else {
                    GROUND_GIVEN
                };
                self.chain.push(step("altitude", altitude, "m", ground));
                let density = Air::at(altitude).density;
                self.chain.push(step(
                    "density",
                    density,
                    "kg/m³",
                    "standard atmosphere, ICAO Doc 7488",
                ));
                Some(density)
            }
        }
    }

    /// The load of a wing of which the sizes are known; `None` without a weight.
    pub(super) fn load(
        mut self,
        sizes: &Values,
        limit: Option<&Limit>,
        planform: &written::Planform,
    ) -> Option<Load> {
        let weight = self.weight?;
        let (span, area) = (sizes.get(Size::Span)?, sizes.get(Size::Area)?);
        let typed = |entry: &Entry<f64>| entry.given().is_some();
        let area_metres = area / (METRE * METRE);
        if self.area.is_none() {
            let ground = if typed(&planform.area) {
                GROUND_GIVEN
            } else {
                "from [planform]"
            };
            self.chain.push(step("area", area_metres, "m²", ground));
            self.chain
                .push(step("wing loading", weight / area_metres, "N/m²", "W / S"));
        }
        let aspect = limit.map_or(span * span / area, |limit| limit.aspect_ratio);
        let asked = typed(&planform.aspect_ratio);
        let ground = if asked { GROUND_GIVEN } else { "A = b² / S" };
        self.chain.push(step("aspect ratio", aspect, "", ground));
        let wanted = limit.map_or(span, |limit| limit.span);
        let ground = match (typed(&planform.span), asked) {
            (true, _) => GROUND_GIVEN,
            (false, true) => "b = sqrt(A S)",
            (false, false) => "from [planform]",
        };
        self.chain.push(step("span", wanted / METRE, "m", ground));
        if limit.is_some() {
            self.chain
                .push(step("span built", span / METRE, "m", "span_limit of [planform]"));
            self.chain.push(step(
                "aspect ratio built",
                span * span / area,
                "",
                "A = b² / S, area kept",
            ));
        }
        Some(Load {
            weight,
            chain: self.chain,
        })
    }
}

/// The altitude \[m\] of altitude or density: sea level where neither is given; `None` where one is wrong or both are
/// given, which is a fault.
pub(super) fn altitude(altitude: &Entry<f64>, density: &Entry<f64>, faults: &mut Vec<Fault>) -> Option<f64> {
    if altitude.is_unreadable() || density.is_unreadable() {
        return None;
    }
    if let (Some(altitude), Some(density)) = (altitude.given(), density.given()) {
        let problem = format!(
            "contradicts altitude = {} ({}): both say how dense the air is",
            altitude.text,
            altitude.place.short()
        );
        faults.push(at(density, problem, "Delete one of the two."));
        return None;
    }
    Some(altitude.or(0.0) / METRE)
}

const SQUARE_METRE: Scale = Scale {
    symbol: "m^2",
    factor: METRE * METRE,
};

fn at(given: &Given<f64>, problem: String, remedy: &str) -> Fault {
    Fault {
        place: given.place.clone(),
        text: given.text.clone(),
        problem,
        remedy: remedy.to_owned(),
    }
}
