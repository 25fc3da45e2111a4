//! Lift slopes of wings \[1/rad\] and the angles at which twisted wings do not lift.

use std::f64::consts::PI;

use super::error::Error;

/// Lift slope of a thin section \[1/rad\]: 2π (Glauert).
pub const THIN_SECTION: f64 = 2.0 * PI;
/// Largest geometric twist that an aerodynamic one may take, either way \[rad\]: 30°.
const MOST_TWIST: f64 = 30.0 * PI / 180.0;

/// Lift slope by Prandtl's lifting line, for straight wings of high aspect ratio \[1/rad\].
///
/// ```text
/// a = a0 / (1 + a0 / (π A) (1 + τ))
/// a0 section's lift slope [1/rad], A aspect ratio, τ >= 0 from the outline: 0 for elliptic loading
/// ```
///
/// Source: H. Glauert, *The Elements of Aerofoil and Airscrew Theory*, 1926, ch. XI (from memory); J. D. Anderson, *Aircraft
/// Performance and Design*, 1999, ch. 2, with e1 = 1 / (1 + τ).
pub fn lifting_line(section: f64, aspect_ratio: f64, tau: f64) -> f64 {
    section / (1.0 + section / (PI * aspect_ratio) * (1.0 + tau))
}

/// Lift slope by Helmbold's formula, for low speed \[1/rad\]; with sweep in Küchemann's form.
///
/// ```text
/// a = a0 cosΛ / (sqrt(1 + (a0 cosΛ / (π A))²) + a0 cosΛ / (π A))
/// a0 section's lift slope [1/rad], A aspect ratio, Λ sweep of the mid-chord line [rad]
/// ```
///
/// Source: J. D. Anderson, *Aircraft Performance and Design*, 1999, eq. 2.18a and 2.19.
pub fn helmbold(section: f64, aspect_ratio: f64, sweep: f64) -> f64 {
    let normal = section * sweep.cos();
    let ratio = normal / (PI * aspect_ratio);
    normal / (ratio.hypot(1.0) + ratio)
}

/// Lift slope by the DATCOM relation, for swept wings and subsonic speed \[1/rad\].
///
/// ```text
/// a = 2 π A / (2 + sqrt(A² β² / κ² (1 + tan²Λ / β²) + 4))        β² = 1 - M²        κ = a0 / (2 π)
/// A aspect ratio, Λ sweep of the mid-chord line [rad], M Mach number < 1, a0 section's lift slope at low speed [1/rad]
/// ```
///
/// Source: USAF Stability and Control DATCOM, 1978, sec. 4.1.3.2 (from memory).
pub fn datcom(section: f64, aspect_ratio: f64, sweep: f64, mach: f64) -> f64 {
    let compressed = 1.0 - mach * mach;
    let kappa = section / (2.0 * PI);
    let tangent = sweep.tan();
    let square = (aspect_ratio / kappa).powi(2) * (compressed + tangent * tangent) + 4.0;
    2.0 * PI * aspect_ratio / (2.0 + square.sqrt())
}

/// A strip of one side of a wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strip {
    /// Its width along the span, in any unit, the same for all strips.
    pub width: f64,
    /// Its chord, in any unit, the same for all strips.
    pub chord: f64,
    /// Its twist relative to the section at the mean aerodynamic chord, leading edge up \[rad\].
    pub twist: f64,
    /// Its section's zero-lift angle \[rad\].
    pub zero_lift: f64,
}

/// Angle of attack at which a twisted wing does not lift, of the chord line at its mean aerodynamic chord \[rad\]; not a number
/// without strips.
///
/// ```text
/// Σ w c (α + ε - α0) = 0   =>   α = Σ w c (α0 - ε) / Σ w c
/// w width, c chord, ε twist against the section at the mean aerodynamic chord, α0 section's zero-lift angle
/// ```
///
/// Strip theory: every section lifts in proportion to its own angle, as if it were part of an endless wing, all with the
/// same slope (as in Anderson, *Fundamentals of Aerodynamics*, ch. 5, before induced angles; from memory). What the induced
/// angles change is small: for twist linear along the span the angle differs from that of a converged lifting line by
/// 0.01 of the tip's twist at taper ratios from 0.3 to 0.45, and by up to 0.05 of it on a rectangular wing (aspect ratios
/// 5 to 12; computed).
pub fn zero_lift_angle(strips: &[Strip]) -> f64 {
    let (lift, area) = strips.iter().fold((0.0, 0.0), |(lift, area), strip| {
        let part = strip.width * strip.chord;
        (lift + part * (strip.zero_lift - strip.twist), area + part)
    });
    lift / area
}

/// Geometric twist, between chord lines, that gives an aerodynamic one, between zero-lift lines \[rad\].
///
/// ```text
/// ε = ε_a + α0 - α0_root
/// ε_a aerodynamic twist, α0 zero-lift angle of the section at `place`, α0_root that of the root
/// ```
///
/// The zero-lift line stands at -α0 above the chord line; `place` is for the message.
///
/// # Errors
///
/// [`Error::AerodynamicTwist`] beyond 30° either way.
pub fn geometric_twist(aerodynamic: f64, root: f64, outer: f64, place: &str) -> Result<f64, Error> {
    let needed = aerodynamic + outer - root;
    if needed.abs() <= MOST_TWIST + 1e-12 {
        return Ok(needed);
    }
    Err(Error::AerodynamicTwist {
        place: place.to_owned(),
        asked: aerodynamic,
        root,
        outer,
        needed,
        most: MOST_TWIST,
    })
}

#[cfg(test)]
mod tests {
    use std::f64::consts::PI;

    use proptest::prelude::{prop_assert, proptest};

    use super::{Strip, THIN_SECTION, datcom, geometric_twist, helmbold, lifting_line, zero_lift_angle};

    #[track_caller]
    fn near(found: f64, expected: f64, within: f64) {
        assert!((found - expected).abs() <= within, "{found} is not {expected}");
    }

    #[test]
    fn lifting_line_as_worked_in_textbooks() {
        // J. D. Anderson, Aircraft Performance and Design, example 2.5: A = 6, NACA 2412 with a0 = 0.105 per degree,
        // e1 = 0.95: a = 4.51 per rad, 0.079 per degree; C_L(6°) = 0.079 · (6 + 2.2) = 0.648; a0 rounded to 6.02 per rad
        let a = lifting_line(6.02, 6.0, 1.0 / 0.95 - 1.0);
        near(a, 4.51, 0.005);
        near(a.to_radians(), 0.079, 0.0005);
        near(a.to_radians() * 8.2, 0.648, 0.0005 * 8.2);
        // J. D. Anderson, Fundamentals of Aerodynamics, example 5.1 (from memory): A = 8, τ = 0.055: a = 4.97
        near(lifting_line(THIN_SECTION, 8.0, 0.055), 4.97, 0.005);
        // elliptic loading, A = 8: 2π · 8 / (8 + 2) (closed form)
        near(lifting_line(THIN_SECTION, 8.0, 0.0), 1.6 * PI, 1e-14);
    }

    #[test]
    fn helmbold_is_what_its_formula_makes() {
        // Anderson eq. 2.18a with a0 = 2π, worked anew (computed)
        let slopes = [
            (1.0, 1.4833),
            (2.0, 2.6026),
            (3.0, 3.3627),
            (4.0, 3.8832),
            (6.0, 4.5287),
            (8.0, 4.9058),
            (10.0, 5.1510),
        ];
        for (aspect_ratio, slope) in slopes {
            near(helmbold(THIN_SECTION, aspect_ratio, 0.0), slope, 5e-5);
        }
        // slender wings tend to Jones's π A / 2 (closed form)
        near(helmbold(THIN_SECTION, 1e-4, 0.0), PI / 2.0 * 1e-4, 1e-8);
    }

    #[test]
    fn datcom_is_what_its_formula_makes() {
        // A = 4, κ = 1, M = 0, worked anew (computed): 35° 3.4538; 45° π, because 4² (1 + 1) + 4 = 36
        near(datcom(THIN_SECTION, 4.0, 35_f64.to_radians(), 0.0), 3.4538, 5e-5);
        near(datcom(THIN_SECTION, 4.0, 45_f64.to_radians(), 0.0), PI, 1e-14);
        // Prandtl and Glauert: an endless wing has a0 / β (closed form), A = 1e9, M = 0.6
        near(datcom(THIN_SECTION, 1e9, 0.0, 0.6), THIN_SECTION / 0.8, 1e-6);
    }

    #[test]
    fn zero_lift_lines_are_twisted_as_asked() {
        // thin-aerofoil theory (computed): NACA 4412 -4.15448°, NACA 2412 -2.07724°, symmetric 0°
        let degrees = |aerodynamic: f64, root: f64, outer: f64| {
            let [aerodynamic, root, outer] = [aerodynamic, root, outer].map(f64::to_radians);
            geometric_twist(aerodynamic, root, outer, "tip").map(f64::to_degrees)
        };
        near(degrees(-2.5, -4.154_48, -2.077_24).unwrap(), -0.422_76, 1e-12);
        near(degrees(-2.0, -2.077_24, -2.077_24).unwrap(), -2.0, 1e-12);
        let fault = degrees(-29.0, -2.0, -4.0).unwrap_err().to_string();
        assert_eq!(
            fault,
            "aerodynamic twist of -29.00 deg at the tip: between zero-lift angles of -2.00 deg at the root and -4.00 deg \
             there it takes a geometric twist of -31.00 deg; allowed: -30 deg to 30 deg. Take sections that are more \
             alike, or less twist"
        );
        near(degrees(-28.0, -2.0, -4.0).unwrap(), -30.0, 1e-12);
    }

    /// Strips of a trapezoid with twist linear along the span, counted from the mean aerodynamic chord \[rad\].
    fn trapezoid(taper: f64, tip_twist: f64, zero_lift: f64) -> Vec<Strip> {
        const COUNT: u32 = 4000;
        let centre = (1.0 + 2.0 * taper) / (3.0 * (1.0 + taper));
        let strips = (0..COUNT).map(|i| {
            let eta = (f64::from(i) + 0.5) / f64::from(COUNT);
            Strip {
                width: 1.0 / f64::from(COUNT),
                chord: 1.0 - (1.0 - taper) * eta,
                twist: tip_twist * (eta - centre),
                zero_lift,
            }
        });
        strips.collect()
    }

    #[test]
    fn strips_come_close_to_the_lifting_line() {
        // zero-lift angle of the root section for twist linear along the span, per tip twist: converged lifting line of
        // 80 terms, a0 = 2π (computed)
        for (aspect_ratio, taper, lifting_line, within) in [
            (6.0, 0.30, 0.4168, 0.01),
            (8.0, 0.45, 0.4287, 0.01),
            (10.0, 0.60, 0.4407, 0.02),
            (6.0, 1.00, 0.4540, 0.05),
        ] {
            let centre = (1.0 + 2.0 * taper) / (3.0 * (1.0 + taper));
            let at_mac = zero_lift_angle(&trapezoid(taper, 0.1, 0.0));
            let at_root = (centre - at_mac / 0.1).abs();
            assert!(
                (at_root - lifting_line).abs() < within,
                "aspect ratio {aspect_ratio}: {at_root}"
            );
        }
    }

    proptest! {
        #[test]
        fn slopes_agree_where_they_are_the_same_and_keep_their_order(
            section in 5.0..7.0_f64, aspect_ratio in 0.5..40.0_f64, sweep in -1.2..1.2_f64, mach in 0.0..0.95_f64,
        ) {
            // DATCOM at M = 0 is Küchemann's form of Helmbold: multiply both by (π A / (a0 cosΛ)), 1 + tan²Λ = 1 / cos²Λ
            let slow = datcom(section, aspect_ratio, sweep, 0.0);
            prop_assert!((helmbold(section, aspect_ratio, sweep) - slow).abs() < 1e-12 * slow);
            prop_assert!(datcom(section, aspect_ratio, sweep, mach) >= slow);
            prop_assert!(helmbold(section, aspect_ratio, 0.0) < lifting_line(section, aspect_ratio, 0.0));
            prop_assert!(lifting_line(section, aspect_ratio, 0.0) < section);
        }

        #[test]
        fn linear_twist_leaves_the_mean_chord_as_it_is(taper in 0.1..1.5_f64, twist in -0.2..0.2_f64, zero in -0.1..0.1_f64) {
            // the mean aerodynamic chord of a trapezoid lies at ∫ y c dy / ∫ c dy: linear twist cancels around it
            prop_assert!((zero_lift_angle(&trapezoid(taper, twist, zero)) - zero).abs() < 1e-7);
        }
    }
}
