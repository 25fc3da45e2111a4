//! Evenly spaced numbers in exact decimals.

use rust_decimal::{Decimal, RoundingStrategy};

/// Decimals kept of a value that does not end, such as a third.
const PLACES: u32 = 12;

/// `count` values from `low` to `high`, both included, evenly spaced; `low` alone where `count` is 1.
///
/// Values are exact where they end within 12 decimals and rounded there otherwise: no 0.30000000000000004. `None` where
/// the numbers have more digits than can be reckoned with (28).
pub(super) fn spaced(low: Decimal, high: Decimal, count: u32) -> Option<Vec<Decimal>> {
    if count <= 1 {
        return Some(vec![low]);
    }
    let steps = Decimal::from(count - 1);
    let across = high.checked_sub(low)?;
    (0..count)
        .map(|i| {
            // the last is the upper end itself, whatever was rounded
            if i == count - 1 {
                return Some(high);
            }
            let along = across.checked_mul(Decimal::from(i))?.checked_div(steps)?;
            let value = low.checked_add(along)?;
            Some(
                value
                    .round_dp_with_strategy(PLACES, RoundingStrategy::MidpointAwayFromZero)
                    .normalize(),
            )
        })
        .collect()
}

/// The number at the start of a text and the rest without the spaces around it; `None` where there is none.
pub(super) fn leading(text: &str) -> Option<(Decimal, &str)> {
    let text = text.trim();
    let end = text
        .find(|c: char| !(c.is_ascii_digit() || "+-.eE".contains(c)))
        .unwrap_or(text.len());
    // a number with more digits than can be reckoned with is not cut in two
    let whole = |rest: &str| !rest.starts_with(|c: char| c.is_ascii_digit() || c == '.');
    (1..=end)
        .rev()
        .filter(|i| whole(&text[*i..]))
        .find_map(|i| Some((number(&text[..i])?, text[i..].trim())))
}

fn number(text: &str) -> Option<Decimal> {
    if text.contains(['e', 'E']) {
        Decimal::from_scientific(text).ok()
    } else {
        Decimal::from_str_exact(text).ok()
    }
}

#[cfg(test)]
mod tests {
    use super::{leading, spaced};

    fn texts(low: &str, high: &str, count: u32) -> Vec<String> {
        let number = |text: &str| leading(text).unwrap().0;
        let values = spaced(number(low), number(high), count).unwrap();
        values.iter().map(ToString::to_string).collect()
    }

    #[test]
    fn values_are_exact_decimals() {
        assert_eq!(texts("0.3", "0.6", 4), ["0.3", "0.4", "0.5", "0.6"]);
        assert_eq!(
            texts("-2.4", "3.6", 6),
            ["-2.4", "-1.2", "0", "1.2", "2.4", "3.6"]
        );
        assert_eq!(texts("0", "1", 4), ["0", "0.333333333333", "0.666666666667", "1"]);
        assert_eq!(texts("10", "6", 3), ["10", "8", "6"]);
        assert_eq!(texts("1e-3", "5e-3", 2), ["0.001", "0.005"]);
        assert_eq!(texts("7", "9", 1), ["7"]);
        assert!(texts("0", "0.1", 100_001).iter().all(|text| text.len() <= 8));
    }

    #[test]
    fn numbers_and_what_follows_them() {
        assert_eq!(
            leading(" 2.4 m ").map(|(n, u)| (n.to_string(), u)),
            Some(("2.4".into(), "m"))
        );
        assert_eq!(
            leading("3e2ft").map(|(n, u)| (n.to_string(), u)),
            Some(("300".into(), "ft"))
        );
        assert_eq!(
            leading("84 N/m^2").map(|(n, u)| (n.to_string(), u)),
            Some(("84".into(), "N/m^2"))
        );
        for text in [
            "",
            "m",
            "NACA 2412",
            "../a.dat",
            ".",
            "99999999999999999999999999999999",
        ] {
            assert!(leading(text).is_none(), "{text}");
        }
    }
}
