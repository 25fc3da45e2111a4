//! Truncated Taylor series: values with three derivatives, for the exact derivatives of section formulas.

use std::ops::{Add, Mul, Neg, Sub};

/// `f(t + h) = c[0] + c[1] h + c[2] h² + c[3] h³ + …`
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Taylor(pub(super) [f64; 4]);

impl Taylor {
    /// A constant.
    pub(super) const fn constant(value: f64) -> Self {
        Self([value, 0.0, 0.0, 0.0])
    }

    /// The variable itself at `t`.
    pub(super) const fn variable(t: f64) -> Self {
        Self([t, 1.0, 0.0, 0.0])
    }

    /// The value.
    pub(super) const fn value(&self) -> f64 {
        self.0[0]
    }

    /// First derivative.
    pub(super) const fn first(&self) -> f64 {
        self.0[1]
    }

    /// Second derivative.
    pub(super) const fn second(&self) -> f64 {
        2.0 * self.0[2]
    }

    /// Third derivative.
    pub(super) const fn third(&self) -> f64 {
        6.0 * self.0[3]
    }

    /// `Σ coefficients[k] selfᵏ`.
    pub(super) fn polynomial(self, coefficients: &[f64]) -> Self {
        coefficients
            .iter()
            .rev()
            .fold(Self::constant(0.0), |sum, c| sum * self + Self::constant(*c))
    }

    /// `1 / sqrt(self)`, for a positive value.
    pub(super) fn inverse_sqrt(self) -> Self {
        // y = a^(-1/2) satisfies 2 a y' + a' y = 0, solved order by order
        let a = self.0;
        let mut y = [a[0].powf(-0.5), 0.0, 0.0, 0.0];
        for n in 0..3_u8 {
            let order = usize::from(n);
            let mut sum = 0.0;
            for k in 1..=n + 1 {
                // coefficient of hⁿ: 2 a[k] (n + 1 - k) y[n + 1 - k] + k a[k] y[n + 1 - k]
                let rest = n + 1 - k;
                sum += (2.0 * f64::from(rest) + f64::from(k)) * a[usize::from(k)] * y[usize::from(rest)];
            }
            y[order + 1] = -sum / (2.0 * f64::from(n + 1) * a[0]);
        }
        Self(y)
    }
}

impl Add for Taylor {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self(std::array::from_fn(|k| self.0[k] + other.0[k]))
    }
}

impl Sub for Taylor {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        self + -other
    }
}

impl Neg for Taylor {
    type Output = Self;
    fn neg(self) -> Self {
        Self(self.0.map(|c| -c))
    }
}

impl Mul for Taylor {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        Self(std::array::from_fn(|n| {
            (0..=n).map(|k| self.0[k] * other.0[n - k]).sum()
        }))
    }
}

impl Mul<f64> for Taylor {
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
