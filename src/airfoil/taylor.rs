//! Truncated Taylor series: values with their derivatives, for the exact derivatives of section formulas.

use std::ops::{Add, Mul, Neg, Sub};

/// `f(t + h) = c[0] + c[1] h + c[2] h² + … + c[N - 1] h^(N - 1)`
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Taylor<const N: usize>(pub(super) [f64; N]);

impl<const N: usize> Taylor<N> {
    /// A constant.
    pub(super) const fn constant(value: f64) -> Self {
        let mut c = [0.0; N];
        c[0] = value;
        Self(c)
    }

    /// The variable itself at `t`.
    pub(super) const fn variable(t: f64) -> Self {
        let mut c = [0.0; N];
        c[0] = t;
        if N > 1 {
            c[1] = 1.0;
        }
        Self(c)
    }

    /// The value.
    pub(super) const fn value(&self) -> f64 {
        self.0[0]
    }

    /// First derivative.
    pub(super) const fn first(&self) -> f64 {
        self.0[1]
    }

    /// Second derivative; 0 where the series does not reach that far.
    pub(super) fn second(&self) -> f64 {
        self.0.get(2).map_or(0.0, |c| 2.0 * c)
    }

    /// Third derivative; 0 where the series does not reach that far.
    pub(super) fn third(&self) -> f64 {
        self.0.get(3).map_or(0.0, |c| 6.0 * c)
    }

    /// `Σ coefficients[k] selfᵏ`.
    pub(super) fn polynomial(self, coefficients: &[f64]) -> Self {
        coefficients.iter().rev().fold(Self::constant(0.0), |sum, c| {
            let mut next = sum * self;
            next.0[0] += c;
            next
        })
    }

    /// `1 / sqrt(self)`, for a positive value.
    #[expect(clippy::needless_range_loop, reason = "the index runs through several arrays")]
    pub(super) fn inverse_sqrt(self) -> Self {
        // y = a^(-1/2) satisfies 2 a y' + a' y = 0, solved order by order
        let a = self.0;
        let mut y = [0.0; N];
        y[0] = 1.0 / a[0].sqrt();
        for n in 0..N - 1 {
            let mut sum = 0.0;
            for k in 1..=n + 1 {
                // coefficient of hⁿ: 2 a[k] (n + 1 - k) y[n + 1 - k] + k a[k] y[n + 1 - k]
                let rest = n + 1 - k;
                sum += (2 * rest + k) as f64 * a[k] * y[rest];
            }
            y[n + 1] = -sum / (2.0 * (n + 1) as f64 * a[0]);
        }
        Self(y)
    }
}

impl<const N: usize> Add for Taylor<N> {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| self.0[k] + other.0[k]))
    }
}

impl<const N: usize> Sub for Taylor<N> {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| self.0[k] - other.0[k]))
    }
}

impl<const N: usize> Neg for Taylor<N> {
    type Output = Self;
    fn neg(self) -> Self {
        Self(self.0.map(|c| -c))
    }
}

impl<const N: usize> Mul for Taylor<N> {
    type Output = Self;
    #[expect(clippy::needless_range_loop, reason = "the index runs through several arrays")]
    fn mul(self, other: Self) -> Self {
        let mut c = [0.0; N];
        for n in 0..N {
            for k in 0..=n {
                c[n] += self.0[k] * other.0[n - k];
            }
        }
        Self(c)
    }
}

impl<const N: usize> Mul<f64> for Taylor<N> {
    type Output = Self;
    fn mul(self, factor: f64) -> Self {
        Self(self.0.map(|c| c * factor))
    }
}

#[cfg(test)]
mod tests {
    use super::Taylor;

    #[test]
    fn the_inverse_square_root_squared_times_the_argument_is_one() {
        let a = Taylor([1.7, -0.4, 0.9, 2.1]);
        let y = a.inverse_sqrt();
        let one = y * y * a;
        for (k, c) in one.0.iter().enumerate() {
            assert!((c - f64::from(u8::from(k == 0))).abs() < 1e-14, "{one:?}");
        }
    }
}
