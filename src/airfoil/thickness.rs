//! Thickness forms of the NACA families, as polynomials in √x and x.

use super::taylor::Taylor;

/// Half the thickness of a form at x = 1 is reached by one of the closings in use; they give different sections.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Closing {
    /// As the family defines it: an open base, 0.021 t for the 4- and 5-digit form, 0.02 t for the modified ones.
    #[default]
    Open,
    /// The last coefficient is changed so that the form ends on a point: -0.1036 in place of -0.1015 in the 4- and
    /// 5-digit form, d₀ = 0 in the modified ones.
    Coefficient,
    /// The form is continued to where it closes by itself (x = 1.008930411365 for the 4- and 5-digit form) and scaled
    /// back to unit chord; the thickness ratio falls by the same factor.
    Extension,
}

/// Family of a thickness form.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Form {
    /// 4- and 5-digit: `y_t = t/0.20 (0.2969 √x - 0.1260 x - 0.3516 x² + 0.2843 x³ - 0.1015 x⁴)`.
    ///
    /// Source: NACA Report 460 (1933).
    Digits,
    /// Modified (suffix -IM): `y_t = t/0.20 (a₀ √x + a₁ x + a₂ x² + a₃ x³)` ahead of the greatest thickness and
    /// `t/0.20 (d₀ + d₁ (1-x) + d₂ (1-x)² + d₃ (1-x)³)` behind it.
    ///
    /// a₀ = 0.2969 I/6 for I up to 8 and √3 · 0.2969 for I = 9; d₀ = 0.002, d₁ by M. The other coefficients follow:
    /// both halves have y = 0.1 and no slope at M, and the same curvature there.
    ///
    /// Source: J. Stack, A. E. von Doenhoff, NACA Report 492 (1934); d₁ as in NASA TM X-3284 (from memory).
    Modified {
        /// Leading-edge index I, 1 to 9.
        nose: u8,
        /// Place of the greatest thickness M in tenths of the chord, 2 to 6.
        place: u8,
    },
}

/// A thickness form of given ratio.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Thickness {
    /// Thickness ratio t \[-\].
    pub ratio: f64,
    /// Its form.
    pub form: Form,
    /// How its trailing edge is closed.
    pub closing: Closing,
}

/// A thickness form with its coefficients worked out: half thickness by t = √x.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Curve {
    root: f64,
    ahead: [f64; 5],
    behind: [f64; 5],
    /// Where `behind` takes over \[-\]; beyond the trailing edge for the 4-digit form.
    pub(super) place: f64,
}

/// d₁ of the modified forms, by place of greatest thickness from 0.2 to 0.6.
const TAIL_SLOPES: [f64; 5] = [0.200, 0.234, 0.315, 0.465, 0.700];
const NEVER: f64 = f64::INFINITY;

impl Thickness {
    pub(super) fn curve(&self) -> Curve {
        let pointed = self.closing == Closing::Coefficient;
        let basic = match self.form {
            Form::Digits => {
                let last = if pointed { -0.1036 } else { -0.1015 };
                let ahead = [0.0, -0.1260, -0.3516, 0.2843, last];
                Curve {
                    root: 0.2969,
                    ahead,
                    behind: ahead,
                    place: NEVER,
                }
            }
            Form::Modified { nose, place } => modified(nose, place, if pointed { 0.0 } else { 0.002 }),
        };
        let length = if self.closing == Closing::Extension {
            basic.end()
        } else {
            1.0
        };
        let scale = self.ratio / 0.20 / length;
        let stretch = |c: [f64; 5]| {
            let mut power = scale;
            c.map(|c| {
                let out = c * power;
                power *= length;
                out
            })
        };
        Curve {
            root: basic.root * scale * length.sqrt(),
            ahead: stretch(basic.ahead),
            behind: stretch(basic.behind),
            place: basic.place / length,
        }
    }
}

impl Thickness {
    /// How the trailing edge is closed, in words.
    pub(super) fn closing_note(&self) -> String {
        let base = 100.0 * self.ratio * if self.form == Form::Digits { 0.021 } else { 0.020 };
        match (self.closing, self.form) {
            (Closing::Open, _) => {
                format!(
                    "open trailing edge as the family defines it, with a base of {base:.3} % of the chord"
                )
            }
            (Closing::Coefficient, Form::Digits) => {
                "trailing edge closed by the last coefficient, -0.1036 in place of -0.1015".to_owned()
            }
            (Closing::Coefficient, Form::Modified { .. }) => {
                "trailing edge closed by d0 = 0 in place of 0.002".to_owned()
            }
            (Closing::Extension, form) => {
                let open = Self {
                    ratio: 0.20,
                    form,
                    closing: Closing::Open,
                };
                let end = open.curve().end();
                format!("trailing edge closed by extension to x = {end:.12} and scaling back to unit chord")
            }
        }
    }
}

/// Coefficients of a modified form for a thickness ratio of 0.20.
fn modified(nose: u8, place: u8, d0: f64) -> Curve {
    let m = f64::from(place) / 10.0;
    let root = 0.2969
        * if nose == 9 {
            3.0_f64.sqrt()
        } else {
            f64::from(nose) / 6.0
        };
    // behind, with r = 1 - x: y(M) = 0.1, y'(M) = 0
    let r = 1.0 - m;
    let d1 = TAIL_SLOPES[usize::from(place.clamp(2, 6) - 2)];
    // d0 + d1 r + d2 r² + d3 r³ = 0.1 and d1 + 2 d2 r + 3 d3 r² = 0
    let d3 = (2.0 * (d0 - 0.1) + d1 * r) / (r * r * r);
    let d2 = -(d1 + 3.0 * d3 * r * r) / (2.0 * r);
    let bend = 2.0 * d2 + 6.0 * d3 * r;
    let behind = [
        d0 + d1 + d2 + d3,
        -d1 - 2.0 * d2 - 3.0 * d3,
        d2 + 3.0 * d3,
        -d3,
        0.0,
    ];
    // ahead: a1 M + a2 M² + a3 M³ = p, its first derivative q, its second w
    let p = 0.1 - root * m.sqrt();
    let q = -0.5 * root / m.sqrt();
    let w = bend + 0.25 * root / (m * m.sqrt());
    let a3 = (w - 2.0 * q / m + 2.0 * p / (m * m)) / (2.0 * m);
    let a2 = (w - 6.0 * a3 * m) / 2.0;
    let a1 = q - 2.0 * a2 * m - 3.0 * a3 * m * m;
    Curve {
        root,
        ahead: [0.0, a1, a2, a3, 0.0],
        behind,
        place: m,
    }
}

impl Curve {
    /// Half thickness by `t` = √x, where `t` may be slightly negative.
    pub(super) fn at<const N: usize>(&self, t: Taylor<N>, x: Taylor<N>) -> Taylor<N> {
        if x.value() < self.place {
            t * self.root + x.polynomial(&self.ahead)
        } else {
            x.polynomial(&self.behind)
        }
    }

    /// Where the form closes by itself at or behind x = 1 \[-\].
    fn end(&self) -> f64 {
        let mut x = 1.0_f64;
        for _ in 0..40 {
            let t = Taylor::<2>::variable(x.sqrt());
            let y = self.at(t, t * t);
            let step = y.value() * 2.0 * x.sqrt() / y.first();
            x -= step;
            if step.abs() < 1e-16 {
                break;
            }
        }
        x
    }
}

#[cfg(test)]
mod tests {
    use super::{Closing, Form, Thickness, modified};

    /// a₀ to a₃ and d₀ to d₃ for t = 0.20. Source: Abbott and von Doenhoff, Theory of Wing Sections, pp. 117-118, from
    /// memory; a₂ of suffix 64 is remembered as 0.175384, and the conditions give 0.175334.
    const AHEAD: [(u8, u8, [f64; 4]); 9] = [
        (6, 2, [0.2969, 0.213337, -2.931954, 5.22917]),
        (6, 3, [0.2969, -0.096082, -0.54331, 0.559395]),
        (6, 4, [0.2969, -0.246867, 0.175334, -0.266917]),
        (6, 5, [0.2969, -0.310275, 0.3417, -0.32182]),
        (6, 6, [0.2969, -0.27118, 0.1402, -0.082137]),
        (3, 3, [0.14845, 0.412103, -1.67261, 1.68869]),
        (3, 4, [0.14845, 0.193233, -0.558166, 0.283208]),
        (3, 5, [0.14845, 0.083362, -0.18315, -0.00691]),
        (9, 3, [0.514246, -0.840115, 1.1101, -1.09401]),
    ];
    const BEHIND: [[f64; 4]; 5] = [
        [0.002, 0.2, -0.040625, -0.070312],
        [0.002, 0.234, -0.068571, -0.093878],
        [0.002, 0.315, -0.233333, -0.032407],
        [0.002, 0.465, -0.684, 0.292],
        [0.002, 0.7, -1.6625, 1.3125],
    ];

    #[test]
    fn coefficients_of_the_modified_forms_are_the_published_ones() {
        for (nose, place, [a0, a1, a2, a3]) in AHEAD {
            let curve = modified(nose, place, 0.002);
            let found = [curve.root, curve.ahead[1], curve.ahead[2], curve.ahead[3]];
            for (found, printed) in found.into_iter().zip([a0, a1, a2, a3]) {
                // the printed ones were worked out from rounded numbers: six significant digits
                let allowed = 6e-6 * printed.abs().max(1.0);
                assert!(
                    (found - printed).abs() < allowed,
                    "{nose}{place}: {found} {printed}"
                );
            }
        }
        for (place, d) in (2..7).zip(BEHIND) {
            let curve = modified(6, place, 0.002);
            // by powers of x to by powers of 1 - x
            let [_, b1, b2, b3, _] = curve.behind;
            let found = [
                curve.behind.iter().sum::<f64>(),
                -(b1 + 2.0 * b2 + 3.0 * b3),
                b2 + 3.0 * b3,
                -b3,
            ];
            for (found, printed) in found.into_iter().zip(d) {
                assert!((found - printed).abs() < 1e-6, "{place}: {found} {printed}");
            }
        }
    }

    #[test]
    fn the_symmetric_16_series_is_the_form_45() {
        // y/t = 0.989665 √x - 0.239250 x - 0.041000 x² - 0.559400 x³ ahead of 0.5,
        // 0.010000 + 2.325000 (1-x) - 3.420000 (1-x)² + 1.460000 (1-x)³ behind.
        // Source: Abbott and von Doenhoff, Theory of Wing Sections, section 6.8, from memory.
        let curve = modified(4, 5, 0.002);
        let printed = [0.989665, -0.239250, -0.041000, -0.559400];
        let found = [curve.root, curve.ahead[1], curve.ahead[2], curve.ahead[3]].map(|c| 5.0 * c);
        for (found, printed) in found.into_iter().zip(printed) {
            assert!((found - printed).abs() < 1e-5 * 5.0, "{found} {printed}");
        }
    }

    #[test]
    fn the_three_closings_of_0012_are_those_in_use() {
        let form = |closing| {
            Thickness {
                ratio: 0.12,
                form: Form::Digits,
                closing,
            }
            .curve()
        };
        let base = |closing| 2.0 * form(closing).ahead.iter().sum::<f64>() + 2.0 * form(closing).root;
        assert!((base(Closing::Open) - 0.021 * 0.12).abs() < 1e-15);
        assert!(base(Closing::Coefficient).abs() < 1e-15);
        assert!(base(Closing::Extension).abs() < 1e-14);
        // root of the polynomial and the rescaled coefficients. Source: NASA Turbulence Modeling Resource,
        // naca0012_val: y = 0.594689181 (0.298222773 √x - 0.127125232 x - 0.357907906 x² + 0.291984971 x³
        // - 0.105174606 x⁴)
        let open = Thickness {
            ratio: 0.20,
            form: Form::Digits,
            closing: Closing::Open,
        };
        assert!((open.curve().end() - 1.008_930_411_365).abs() < 1e-12);
        let curve = form(Closing::Extension);
        let found = [
            curve.root,
            curve.ahead[1],
            curve.ahead[2],
            curve.ahead[3],
            curve.ahead[4],
        ];
        let printed = [0.298222773, -0.127125232, -0.357907906, 0.291984971, -0.105174606];
        for (found, printed) in found.into_iter().zip(printed) {
            assert!((found - 0.594689181 * printed).abs() < 1e-9, "{found} {printed}");
        }
    }
}
