//! The incidence at which a wing carries the weight in cruise with the fuselage level.

use super::error::Error;
use super::lift::{Strip, datcom, helmbold, lifting_line, zero_lift_angle};
use crate::spec::{Cruise, Step};

/// Largest lift coefficient in cruise: beyond it there is little left to the stall \[-\] (common practice, no source).
const MOST_LIFT: f64 = 1.2;
/// Largest incidence, either way \[rad\]: 15° (common practice, no source).
const MOST_INCIDENCE: f64 = 15.0 * std::f64::consts::PI / 180.0;
/// Sweep of the mid-chord line from which a wing counts as swept \[rad\]: 5°.
const SWEPT: f64 = 5.0 * std::f64::consts::PI / 180.0;
/// Mach number from which the flow counts as compressible \[-\].
const COMPRESSIBLE: f64 = 0.3;

/// A wing in cruise, as plain numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CruiseInput<'a> {
    /// Weight on both sides \[N\].
    pub weight: f64,
    /// Speed and air.
    pub cruise: Cruise,
    /// Reference area, both sides \[m²\].
    pub area: f64,
    /// Aspect ratio \[-\].
    pub aspect_ratio: f64,
    /// Sweep of the mid-chord line \[rad\]; of a wing with cranks the mean of its panels, weighted by their areas.
    pub half_chord_sweep: f64,
    /// Sections' lift slope at low speed \[1/rad\], such as [`THIN_SECTION`](super::THIN_SECTION).
    pub section_slope: f64,
    /// One side in strips.
    pub strips: &'a [Strip],
}

/// The incidence for cruise and how it came about.
#[derive(Clone, Debug, PartialEq)]
pub struct CruiseResult {
    /// Incidence at the mean aerodynamic chord \[rad\].
    pub incidence: f64,
    /// Every figure on the way, for the proof sheet.
    pub chain: Vec<Step>,
}

/// The incidence at the mean aerodynamic chord at which the wing carries its weight with the fuselage axis along the flow.
///
/// ```text
/// q = ρ V² / 2        C_L = W / (q S)        i = C_L / a + α_0
/// a lift slope of the wing: Helmbold where the mid-chord line is swept less than 5° and the Mach number is less than 0.3,
/// else DATCOM; α_0 zero-lift angle of the wing, of the chord line at the mean aerodynamic chord (strip theory)
/// ```
///
/// The tail's load and the fuselage's lift are left out.
///
/// # Errors
///
/// [`Error::Nothing`] where a figure that has to be positive is not, [`Error::Mach`] from the speed of sound on,
/// [`Error::Lift`] beyond a lift coefficient of 1.2, [`Error::Incidence`] beyond 15° either way.
pub fn cruise_incidence(input: &CruiseInput<'_>) -> Result<CruiseResult, Error> {
    let Cruise { speed, density, mach } = input.cruise;
    let covered: f64 = input.strips.iter().map(|strip| strip.width * strip.chord).sum();
    for (what, value) in [
        ("the weight", input.weight),
        ("the speed", speed),
        ("the density", density),
        ("the area", input.area),
        ("the aspect ratio", input.aspect_ratio),
        ("the sections' lift slope", input.section_slope),
        ("the area of the strips", covered),
    ] {
        // also where it is not a number
        if !(value > 0.0 && value.is_finite()) {
            return Err(Error::Nothing { what, value });
        }
    }
    if mach >= 1.0 {
        return Err(Error::Mach { mach });
    }
    let mut chain = Vec::new();
    let mut step = |name: &str, value: f64, unit: &'static str, ground: &str| {
        chain.push(Step {
            name: name.to_owned(),
            value,
            unit,
            ground: ground.to_owned(),
        });
    };
    step("cruise speed", speed, "m/s", "as asked");
    let air = if mach > 0.0 {
        "standard atmosphere, ICAO Doc 7488"
    } else {
        "as asked"
    };
    step("density in cruise", density, "kg/m³", air);
    if mach > 0.0 {
        step("Mach number in cruise", mach, "", "V / sqrt(γ R T)");
    }
    let pressure = 0.5 * density * speed * speed;
    step("dynamic pressure in cruise", pressure, "N/m²", "q = ρ V² / 2");
    let coefficient = input.weight / (pressure * input.area);
    step("lift coefficient in cruise", coefficient, "", "C_L = W / (q S)");
    if coefficient > MOST_LIFT {
        return Err(Error::Lift {
            weight: input.weight,
            pressure,
            area: input.area,
            coefficient,
            most: MOST_LIFT,
        });
    }
    let (section, aspect_ratio, sweep) = (input.section_slope, input.aspect_ratio, input.half_chord_sweep);
    step("sections' lift slope", section, "1/rad", "a0, at low speed");
    step(
        "sweep of the mid-chord line",
        sweep.to_degrees(),
        "deg",
        "Λ, of the reference wing",
    );
    let slope = if sweep.abs() < SWEPT && mach < COMPRESSIBLE {
        step(
            "lift slope by lifting line, for comparison",
            lifting_line(section, aspect_ratio, 0.0),
            "1/rad",
            "a0 / (1 + a0 / (π A)): Prandtl, elliptic loading",
        );
        let slope = helmbold(section, aspect_ratio, 0.0);
        step(
            "lift slope of the wing",
            slope,
            "1/rad",
            "Helmbold: Λ < 5° and Mach < 0.3",
        );
        slope
    } else {
        let slope = datcom(section, aspect_ratio, sweep, mach);
        step(
            "lift slope of the wing",
            slope,
            "1/rad",
            "DATCOM 4.1.3.2: swept or compressible",
        );
        slope
    };
    let zero_lift = zero_lift_angle(input.strips);
    step(
        "zero-lift angle at the mean aerodynamic chord",
        zero_lift.to_degrees(),
        "deg",
        "strip theory: mean of α0 - twist, weighted by the chord",
    );
    let above = coefficient / slope;
    step("angle above zero lift", above.to_degrees(), "deg", "C_L / a");
    let incidence = above + zero_lift;
    step(
        "incidence at the mean aerodynamic chord",
        incidence.to_degrees(),
        "deg",
        "the sum of the last two, fuselage level",
    );
    if incidence.abs() > MOST_INCIDENCE {
        return Err(Error::Incidence {
            incidence,
            coefficient,
            zero_lift,
            most: MOST_INCIDENCE,
        });
    }
    Ok(CruiseResult { incidence, chain })
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use proptest::prelude::{prop_assert, proptest};

    use super::{CruiseInput, cruise_incidence};
    use crate::planform::{Error, Strip, THIN_SECTION};
    use crate::spec::Cruise;

    /// A rectangular wing without twist, of a section that does not lift at -2°.
    const STRIPS: [Strip; 1] = [Strip {
        width: 4.0,
        chord: 1.0,
        twist: 0.0,
        zero_lift: -2.0 * PI / 180.0,
    }];

    fn input(weight: f64, speed: f64, mach: f64) -> CruiseInput<'static> {
        CruiseInput {
            weight,
            cruise: Cruise {
                speed,
                density: 1.25,
                mach,
            },
            area: 8.0,
            aspect_ratio: 8.0,
            half_chord_sweep: 0.0,
            section_slope: THIN_SECTION,
            strips: &STRIPS,
        }
    }

    fn value(found: &super::CruiseResult, name: &str) -> f64 {
        let step = found.chain.iter().find(|step| step.name == name);
        step.unwrap_or_else(|| panic!("{name}")).value
    }

    #[test]
    fn an_unswept_wing_by_hand() {
        // q = 1.25 · 40² / 2 = 1000, C_L = 4000 / (1000 · 8) = 0.5; Helmbold: a0/(π A) = 1/4,
        // a = 2π / (sqrt(17)/4 + 1/4) = 8π / (sqrt(17) + 1); i = 0.5 / a - 2°
        let found = cruise_incidence(&input(4000.0, 40.0, 0.1)).unwrap();
        let slope = 8.0 * PI / (17_f64.sqrt() + 1.0);
        let by_hand = (0.5 / slope).to_degrees() - 2.0;
        assert!((found.incidence.to_degrees() - by_hand).abs() < 1e-12);
        assert!((by_hand - 3.839_640_2).abs() < 5e-8, "{by_hand}");
        for (name, expected) in [
            ("dynamic pressure in cruise", 1000.0),
            ("lift coefficient in cruise", 0.5),
            ("lift slope of the wing", slope),
            // 2π · 8 / (8 + 2)
            ("lift slope by lifting line, for comparison", 1.6 * PI),
            ("zero-lift angle at the mean aerodynamic chord", -2.0),
            ("incidence at the mean aerodynamic chord", by_hand),
        ] {
            assert!((value(&found, name) - expected).abs() < 1e-12, "{name}");
        }
    }

    #[test]
    fn swept_or_fast_wings_go_by_datcom() {
        let ground = |input: &CruiseInput<'_>| {
            let found = cruise_incidence(input).unwrap();
            let step = found
                .chain
                .iter()
                .find(|step| step.name == "lift slope of the wing");
            (step.unwrap().value, step.unwrap().ground.clone())
        };
        let fast = ground(&input(4000.0, 40.0, 0.3));
        assert!(fast.1.starts_with("DATCOM"), "{}", fast.1);
        // 2π·8 / (2 + sqrt(64 · 0.91 + 4)), by hand
        assert!((fast.0 - 16.0 * PI / (2.0 + (64.0 * 0.91 + 4.0_f64).sqrt())).abs() < 1e-13);
        for (sweep, name) in [(4.9_f64, "Helmbold"), (-5.0, "DATCOM"), (45.0, "DATCOM")] {
            let swept = CruiseInput {
                half_chord_sweep: sweep.to_radians(),
                ..input(4000.0, 40.0, 0.0)
            };
            assert!(ground(&swept).1.starts_with(name), "{sweep}");
        }
    }

    #[test]
    fn what_no_wing_does_is_refused_with_its_numbers() {
        for (input, expected) in [
            (
                input(9700.0, 40.0, 0.1),
                "incidence for cruise: carrying 9700.0000 N at 1000.0000 N/m² on 8.0000 m² takes a lift coefficient of \
                 1.212; allowed: at most 1.2. Raise the speed or the area, or lower the weight",
            ),
            (
                CruiseInput {
                    aspect_ratio: 1.0,
                    ..input(8000.0, 40.0, 0.1)
                },
                "incidence for cruise: 36.63 deg would carry the weight (lift coefficient 1.000, zero-lift angle -2.00 deg); \
                 allowed: -15 deg to 15 deg. Change the speed, the area, the twist or the sections",
            ),
            (
                input(4000.0, 400.0, 1.2),
                "incidence for cruise: a Mach number of 1.200 is too high; the formulas hold below 1",
            ),
            (
                input(4000.0, 0.0, 0.0),
                "incidence for cruise: the speed is 0, and has to be more than 0",
            ),
            (
                input(f64::NAN, 40.0, 0.0),
                "incidence for cruise: the weight is NaN, and has to be more than 0",
            ),
        ] {
            assert_eq!(cruise_incidence(&input).unwrap_err().to_string(), expected);
        }
        let bare = CruiseInput {
            strips: &[],
            ..input(4000.0, 40.0, 0.0)
        };
        assert!(matches!(cruise_incidence(&bare), Err(Error::Nothing { .. })));
    }

    proptest! {
        #[test]
        fn the_wing_carries_its_weight_at_the_incidence(
            weight in 100.0..9000.0_f64, sweep in -0.6..0.6_f64, mach in 0.0..0.9_f64, aspect_ratio in 3.0..20.0_f64,
            twists in proptest::collection::vec((-0.06..0.06_f64, -0.08..0.02_f64, 0.2..2.0_f64), 1..8),
        ) {
            let strips: Vec<Strip> = twists
                .iter()
                .map(|&(twist, zero_lift, chord)| Strip { width: 0.5, chord, twist, zero_lift })
                .collect();
            let input = CruiseInput { half_chord_sweep: sweep, aspect_ratio, strips: &strips, ..input(weight, 40.0, mach) };
            if let Ok(found) = cruise_incidence(&input) {
                // strips at their own angles, each with the wing's slope, make the weight
                let area: f64 = strips.iter().map(|strip| strip.width * strip.chord).sum();
                let slope = value(&found, "lift slope of the wing");
                let lift: f64 = strips
                    .iter()
                    .map(|s| slope * (found.incidence + s.twist - s.zero_lift) * s.width * s.chord)
                    .sum();
                prop_assert!((lift / area * 1000.0 * 8.0 - weight).abs() < 1e-9 * weight);
            } else {
                prop_assert!(weight > 800.0, "a light wing is refused");
            }
        }
    }
}
