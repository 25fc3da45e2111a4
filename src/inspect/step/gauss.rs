//! Gauss-Legendre rules of any size.

/// Nodes and weights on \[-1, 1\] of the rule with `n` points; exact to degree 2 n - 1.
///
/// The nodes are the roots of the Legendre polynomial Pₙ, found by Newton's method from cos(π (i + 3/4) / (n + 1/2)); the
/// weights are 2 / ((1 - x²) Pₙ'(x)²). Source: M. Abramowitz, I. Stegun, *Handbook of Mathematical Functions*, 1964,
/// equations 25.4.29 and 22.7.10.
pub(super) fn rule(n: usize) -> Vec<(f64, f64)> {
    let size = n as f64;
    let node = |i: usize| {
        let mut x = (std::f64::consts::PI * (i as f64 + 0.75) / (size + 0.5)).cos();
        let mut slope = 1.0;
        for _ in 0..100 {
            let (mut last, mut value) = (1.0, x);
            for k in 2..=n {
                let k = k as f64;
                (last, value) = (value, ((2.0 * k - 1.0) * x * value - (k - 1.0) * last) / k);
            }
            slope = size * (x * value - last) / (x * x - 1.0);
            let step = value / slope;
            x -= step;
            if step.abs() < 1e-16 {
                break;
            }
        }
        (x, 2.0 / ((1.0 - x * x) * slope * slope))
    };
    (0..n).map(node).collect()
}

/// A rule's nodes and weights on an interval.
pub(super) fn on(rule: &[(f64, f64)], from: f64, to: f64) -> impl Iterator<Item = (f64, f64)> + '_ {
    let (middle, half) = (0.5 * (from + to), 0.5 * (to - from));
    rule.iter()
        .map(move |(x, weight)| (middle + half * x, half * weight))
}

#[cfg(test)]
mod tests {
    use super::{on, rule};

    #[test]
    fn rules_are_exact_for_the_polynomials_they_should_be() {
        // ∫₀² xᵏ dx = 2ᵏ⁺¹ / (k + 1)
        for n in [1, 2, 3, 4, 6, 10, 16, 24] {
            let degree = 2 * n - 1;
            let power = i32::try_from(degree).unwrap();
            let sum: f64 = on(&rule(n), 0.0, 2.0).map(|(x, w)| w * x.powi(power)).sum();
            let exact = 2.0_f64.powi(power + 1) / f64::from(power + 1);
            assert!((sum / exact - 1.0).abs() < 1e-13, "{n}: {sum}");
        }
    }
}
