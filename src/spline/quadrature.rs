//! Gauss-Legendre rules for integrals over spline spans.

/// Nodes and weights on \[-1, 1\], positive half, of the rule with 10 points; exact to degree 19.
///
/// Source: M. Abramowitz, I. Stegun, *Handbook of Mathematical Functions*, 1964, table 25.4.
const TEN: [(f64, f64); 5] = [
    (0.148_874_338_981_631_21, 0.295_524_224_714_752_87),
    (0.433_395_394_129_247_2, 0.269_266_719_309_996_36),
    (0.679_409_568_299_024_4, 0.219_086_362_515_982_04),
    (0.865_063_366_688_984_5, 0.149_451_349_150_580_6),
    (0.973_906_528_517_171_7, 0.066_671_344_308_688_14),
];

/// The same with 4 points; exact to degree 7. Same source.
const FOUR: [(f64, f64); 2] = [
    (0.339_981_043_584_856_26, 0.652_145_154_862_546_1),
    (0.861_136_311_594_052_6, 0.347_854_845_137_453_85),
];

fn on(half: &[(f64, f64)], from: f64, to: f64) -> impl Iterator<Item = (f64, f64)> + '_ {
    let (middle, scale) = (0.5 * (from + to), 0.5 * (to - from));
    half.iter().flat_map(move |(node, weight)| {
        [
            (middle - scale * node, scale * weight),
            (middle + scale * node, scale * weight),
        ]
    })
}

/// Ten (node, weight) pairs on an interval.
pub fn ten(from: f64, to: f64) -> impl Iterator<Item = (f64, f64)> {
    on(&TEN, from, to)
}

/// Four (node, weight) pairs on an interval.
pub fn four(from: f64, to: f64) -> impl Iterator<Item = (f64, f64)> {
    on(&FOUR, from, to)
}

#[cfg(test)]
mod tests {
    use super::{four, ten};

    #[test]
    fn rules_are_exact_for_the_polynomials_they_should_be() {
        // ∫₀² x¹⁹ dx = 2²⁰/20, ∫₀² x⁷ dx = 2⁸/8
        let sum: f64 = ten(0.0, 2.0).map(|(x, w)| w * x.powi(19)).sum();
        assert!((sum / (f64::from(1 << 20) / 20.0) - 1.0).abs() < 1e-14, "{sum}");
        let sum: f64 = four(0.0, 2.0).map(|(x, w)| w * x.powi(7)).sum();
        assert!((sum / 32.0 - 1.0).abs() < 1e-14, "{sum}");
    }
}
