//! Clamped knot vectors and their basis functions.
//!
//! Reference: L. Piegl and W. Tiller, *The NURBS Book*, 2nd ed., Springer 1997, algorithms A2.1 to A2.3.

/// Highest degree that this crate uses.
pub const MAX_DEGREE: usize = 5;
const ORDER: usize = MAX_DEGREE + 1;

/// A clamped knot vector on an interval.
#[derive(Clone, Debug, PartialEq)]
pub struct Knots {
    degree: usize,
    values: Vec<f64>,
}

/// Values and first two derivatives of the basis functions that are not zero at a parameter.
#[derive(Clone, Copy, Debug)]
pub struct Derivatives {
    /// Index of the first basis function that is not zero.
    pub first: usize,
    /// `rows[k][i]`: k-th derivative of basis function `first + i`.
    pub rows: [[f64; ORDER]; 3],
}

/// The basis functions that are not zero on one span.
#[derive(Clone, Copy, Debug)]
pub(super) struct SpanBasis {
    /// Index of the first of them.
    pub(super) first: usize,
    degree: usize,
    /// The knots that they depend on: `degree` up to the span's start and `degree` from its end.
    knots: [f64; 2 * MAX_DEGREE],
    /// Reciprocal distances between knots, by level of the recursion.
    inverse: [[f64; MAX_DEGREE]; MAX_DEGREE],
}

impl SpanBasis {
    /// Whether a parameter is on the span.
    pub(super) fn holds(&self, t: f64) -> bool {
        t >= self.knots[self.degree - 1] && t < self.knots[self.degree]
    }

    /// Values at `t`.
    pub(super) fn at(&self, t: f64) -> [f64; ORDER] {
        if self.degree == MAX_DEGREE {
            self.recur(MAX_DEGREE, t)
        } else {
            self.recur(self.degree, t)
        }
    }

    #[inline(always)]
    #[expect(clippy::needless_range_loop, reason = "the index runs through several arrays")]
    fn recur(&self, degree: usize, t: f64) -> [f64; ORDER] {
        let mut values = [0.0; ORDER];
        values[0] = 1.0;
        for level in 1..=degree {
            let mut saved = 0.0;
            for i in 0..level {
                let part = values[i] * self.inverse[level - 1][i];
                values[i] = saved + (self.knots[degree + i] - t) * part;
                saved = (t - self.knots[degree + i - level]) * part;
            }
            values[level] = saved;
        }
        values
    }
}

impl Knots {
    /// A knot vector of `degree` (1 to 5) over \[`start`, `end`\] with simple or multiple `interior` knots in ascending order.
    ///
    /// Returns `None` where the degree is out of range, the knots do not ascend strictly inside the interval, or one
    /// is repeated more than `degree` times.
    pub fn clamped(degree: usize, start: f64, end: f64, interior: &[f64]) -> Option<Self> {
        let inside = interior.iter().all(|&knot| knot > start && knot < end);
        let ascending = interior.windows(2).all(|pair| pair[0] <= pair[1]);
        let simple = interior.windows(degree + 1).all(|run| run[0] < run[degree]);
        if !(1..=MAX_DEGREE).contains(&degree) || start >= end || !inside || !ascending || !simple {
            return None;
        }
        let mut values = vec![start; degree + 1];
        values.extend_from_slice(interior);
        values.extend(std::iter::repeat_n(end, degree + 1));
        Some(Self { degree, values })
    }

    /// A knot vector of `degree` (1 to 5) with one span, \[0, 1\].
    ///
    /// # Panics
    ///
    /// Where the degree is out of range.
    pub fn bezier(degree: usize) -> Self {
        Self::clamped(degree, 0.0, 1.0, &[]).expect("a degree from 1 to 5 is given")
    }

    /// The knots of `f(-t)`.
    pub fn mirrored(&self) -> Self {
        Self {
            degree: self.degree,
            values: self.values.iter().rev().map(|t| -t).collect(),
        }
    }

    /// Polynomial degree.
    pub const fn degree(&self) -> usize {
        self.degree
    }

    /// All knots, the ends repeated `degree + 1` times.
    pub fn values(&self) -> &[f64] {
        &self.values
    }

    /// Number of basis functions, and of control points that go with them.
    pub fn count(&self) -> usize {
        self.values.len() - self.degree - 1
    }

    /// First and last parameter.
    pub fn range(&self) -> (f64, f64) {
        (self.values[0], self.values[self.values.len() - 1])
    }

    /// The distinct knots, ends included: the corners between which the spline is one polynomial.
    pub fn corners(&self) -> Vec<f64> {
        let mut corners = self.values.clone();
        corners.dedup();
        corners
    }

    /// Index of the knot span that holds `t`, counted in `values`; parameters outside count to the end spans.
    pub fn span(&self, t: f64) -> usize {
        let last = self.count() - 1;
        let inner = &self.values[self.degree + 1..=last];
        self.degree + inner.partition_point(|&knot| knot <= t)
    }

    /// Values of the basis functions that are not zero at `t`: index of the first, then `degree + 1` values.
    pub fn basis(&self, t: f64) -> (usize, [f64; ORDER]) {
        let span = self.span(t);
        let mut values = [0.0; ORDER];
        values[0] = 1.0;
        for level in 1..=self.degree {
            self.raise(span, level, t, &mut values);
        }
        (span - self.degree, values)
    }

    /// The basis on one span, made ready for many parameters.
    #[expect(clippy::needless_range_loop, reason = "the index runs through several arrays")]
    pub(super) fn on_span(&self, span: usize) -> SpanBasis {
        let mut knots = [0.0; 2 * MAX_DEGREE];
        let mut inverse = [[0.0; MAX_DEGREE]; MAX_DEGREE];
        let first = span + 1 - self.degree;
        for (k, knot) in knots.iter_mut().enumerate().take(2 * self.degree) {
            *knot = self.values[first + k];
        }
        for level in 1..=self.degree {
            for i in 0..level {
                let right = self.values[span + i + 1];
                let left = self.values[span + i + 1 - level];
                inverse[level - 1][i] = 1.0 / (right - left);
            }
        }
        SpanBasis {
            first: span - self.degree,
            degree: self.degree,
            knots,
            inverse,
        }
    }

    /// One step of the recursion: basis of degree `level - 1` to degree `level`, in place.
    #[expect(clippy::needless_range_loop, reason = "the index runs through several arrays")]
    fn raise(&self, span: usize, level: usize, t: f64, values: &mut [f64; ORDER]) {
        let mut saved = 0.0;
        for i in 0..level {
            let right = self.values[span + i + 1];
            let left = self.values[span + i + 1 - level];
            let part = values[i] / (right - left);
            values[i] = saved + (right - t) * part;
            saved = (t - left) * part;
        }
        values[level] = saved;
    }

    /// Values and first two derivatives of the basis at `t`.
    pub fn derivatives(&self, t: f64) -> Derivatives {
        let p = self.degree;
        let span = self.span(t);
        let mut rows = [[0.0; ORDER]; 3];
        let mut lower = [[0.0; ORDER]; 3]; // bases of degree p - 2, p - 1, p
        let mut values = [0.0; ORDER];
        values[0] = 1.0;
        for level in 0..=p {
            if level > 0 {
                self.raise(span, level, t, &mut values);
            }
            if level + 2 >= p {
                lower[level + 2 - p] = values;
            }
        }
        rows[0] = lower[2];
        rows[1] = self.differentiate(span, p, &lower[1]);
        if p >= 2 {
            let once = self.differentiate(span, p - 1, &lower[0]);
            rows[2] = self.differentiate(span, p, &once);
        }
        Derivatives {
            first: span - p,
            rows,
        }
    }

    /// From the values of a combination of the basis of degree `level - 1` to the derivatives of that of `level`.
    fn differentiate(&self, span: usize, level: usize, values: &[f64; ORDER]) -> [f64; ORDER] {
        let mut out = [0.0; ORDER];
        for (i, value) in out.iter_mut().enumerate().take(level + 1) {
            let first = span + i - level; // index of the basis function
            let scale = |from: usize| level as f64 / (self.values[from + level] - self.values[from]);
            if i > 0 {
                *value += values[i - 1] * scale(first);
            }
            if i < level {
                *value -= values[i] * scale(first + 1);
            }
        }
        out
    }

    /// Coefficients on this knot vector of the polynomial `Σ coefficients[k] tᵏ`, of at most this degree: exact.
    ///
    /// The coefficient of basis function i is the polynomial's blossom at the knots i+1 to i+p.
    ///
    /// # Panics
    ///
    /// Where the polynomial's degree is above the knots'.
    pub fn polynomial(&self, coefficients: &[f64]) -> Vec<f64> {
        let p = self.degree;
        assert!(
            coefficients.len() <= p + 1,
            "the polynomial's degree is at most the spline's"
        );
        (0..self.count())
            .map(|i| {
                // elementary symmetric functions of the p knots, divided by their number of terms
                let mut symmetric = [0.0; ORDER];
                symmetric[0] = 1.0;
                for (n, &knot) in self.values[i + 1..=i + p].iter().enumerate() {
                    for k in (1..=n + 1).rev() {
                        symmetric[k] += knot * symmetric[k - 1];
                    }
                }
                let mut terms = 1.0; // binomial(p, k)
                let mut sum = 0.0;
                for (k, coefficient) in coefficients.iter().enumerate() {
                    sum += coefficient * symmetric[k] / terms;
                    terms *= (p - k) as f64 / (k + 1) as f64;
                }
                sum
            })
            .collect()
    }
}

#[cfg(test)]
mod tests {
    use super::Knots;

    fn sample() -> Knots {
        Knots::clamped(5, 0.0, 1.0, &[0.1, 0.3, 0.3, 0.55, 0.8]).unwrap()
    }

    #[test]
    fn basis_sums_to_one_and_its_derivatives_to_zero() {
        let knots = sample();
        for i in 0..=200 {
            let d = knots.derivatives(f64::from(i) / 200.0);
            let sums = d.rows.map(|row| row.iter().sum::<f64>());
            assert!(
                (sums[0] - 1.0).abs() < 1e-14 && sums[1].abs() < 1e-11 && sums[2].abs() < 1e-9,
                "{sums:?}"
            );
        }
    }

    #[test]
    fn a_polynomial_is_reproduced_with_its_derivatives() {
        let knots = sample();
        // y = 1 - 2 t + 3 t² - t⁴ + 0.5 t⁵
        let coefficients = knots.polynomial(&[1.0, -2.0, 3.0, 0.0, -1.0, 0.5]);
        for i in 0..=100 {
            let t = f64::from(i) / 100.0;
            let d = knots.derivatives(t);
            let value = |k: usize| -> f64 { (0..6).map(|i| d.rows[k][i] * coefficients[d.first + i]).sum() };
            assert!((value(0) - (1.0 - 2.0 * t + 3.0 * t * t - t.powi(4) + 0.5 * t.powi(5))).abs() < 1e-13);
            assert!((value(1) - (-2.0 + 6.0 * t - 4.0 * t.powi(3) + 2.5 * t.powi(4))).abs() < 1e-12);
            assert!((value(2) - (6.0 - 12.0 * t * t + 10.0 * t.powi(3))).abs() < 1e-10);
        }
    }

    #[test]
    fn the_basis_made_ready_for_a_span_is_the_basis() {
        for degree in 1..=5 {
            let knots = Knots::clamped(degree, 0.0, 1.0, &[0.1, 0.3, 0.55, 0.8]).unwrap();
            for i in 0..200 {
                let t = f64::from(i) / 200.0;
                let (first, basis) = knots.basis(t);
                let ready = knots.on_span(knots.span(t));
                assert!(ready.holds(t) && ready.first == first);
                for (a, b) in ready.at(t).iter().zip(&basis) {
                    assert!((a - b).abs() < 1e-14);
                }
            }
        }
    }

    #[test]
    fn knots_that_make_no_spline_are_refused() {
        assert!(Knots::clamped(6, 0.0, 1.0, &[]).is_none());
        assert!(Knots::clamped(2, 0.0, 1.0, &[0.5, 0.4]).is_none());
        assert!(Knots::clamped(2, 0.0, 1.0, &[1.0]).is_none());
        assert!(Knots::clamped(2, 0.0, 1.0, &[0.5, 0.5, 0.5]).is_none());
    }
}
