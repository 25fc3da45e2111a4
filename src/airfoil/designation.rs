//! From a designation such as `NACA 2412` to its formula.
//!
//! | written | means |
//! |---|---|
//! | `2412`, `NACA 2412` | 4-digit: camber 2 % at 4 tenths, thickness 12 % |
//! | `23012` | 5-digit: design lift 0.15 x 2, mean line 230, thickness 12 % |
//! | `0012-64`, `2412-63`, `23012-64` | modified thickness form: leading-edge index 6, greatest thickness at 4 tenths |
//! | `16-012` | 16-series without camber, which is the modified form 45 |
//! | `2411.5`, `0011.5-64` | a fraction belongs to the last number before it, the thickness in per cent |
//! | `NACA 2.5 4 11.5` | the numbers apart, each of them with a fraction: camber 2.5 %, place 4 tenths, thickness 11.5 % |
//! | `NACA 2.5 30 12` | likewise for a 5-digit section: first digit 2.5 (design lift 0.375), mean line 30, thickness 12 % |
//!
//! `NACA` may stand in any case, with or without a space behind it; without it only the closed forms are designations.

use thiserror::Error;

use super::formula::{Camber, Formula};
use super::thickness::{Closing, Form, Thickness};

/// A designation that names no section of the families known here.
#[derive(Debug, Error, Clone, PartialEq, Eq)]
#[error("{reason}; {remedy}")]
pub struct UnknownDesignation {
    /// What is wrong.
    pub reason: String,
    /// What to write instead.
    pub remedy: String,
}

/// Mean lines of NACA Report 537 for a design lift coefficient of 0.3: digits, m, k₁, k₂/k₁.
///
/// Constants as in NASA TM 4741. The k₁ printed for 210 is 2.8 % above what gives a design lift of 0.3; the printed
/// value is what defines the section, so it is used.
#[expect(clippy::approx_constant, reason = "0.318 of the 241 line is not 1/π")]
const MEAN_LINES: [(u32, f64, f64, f64); 9] = [
    (10, 0.0580, 361.4, 0.0),
    (20, 0.1260, 51.64, 0.0),
    (30, 0.2025, 15.957, 0.0),
    (40, 0.2900, 6.643, 0.0),
    (50, 0.3910, 3.230, 0.0),
    (21, 0.1300, 51.99, 0.000_764),
    (31, 0.2170, 15.793, 0.006_77),
    (41, 0.3180, 6.520, 0.0303),
    (51, 0.4410, 3.191, 0.1355),
];

const KNOWN: &str = "give four digits (NACA 2412), five (NACA 23012), either with a suffix (NACA 0012-64), or the path of a coordinate file";

/// A designation taken apart: numbers still as text.
#[derive(Debug, PartialEq)]
struct Parts<'a> {
    /// Camber or first digit, place or mean line, thickness.
    numbers: [&'a str; 3],
    suffix: Option<&'a str>,
    sixteen: bool,
}

/// True where the text is meant as a designation and not as a file's path: `NACA …` followed by digits and no file
/// ending, or four or five digits alone, with fraction and suffix.
pub fn is_designation(text: &str) -> bool {
    let text = text.trim();
    match after_name(text) {
        Some(rest) => {
            let ending = rest
                .rsplit_once('.')
                .is_some_and(|(_, end)| end.starts_with(|c: char| c.is_ascii_alphabetic()));
            let plain = |c: char| c.is_ascii_alphanumeric() || matches!(c, ' ' | '.' | '-');
            !ending
                && rest.chars().all(plain)
                && (rest.is_empty() || rest.starts_with(|c: char| c.is_ascii_digit()))
        }
        None => !text.contains(' ') && parts(text).is_some(),
    }
}

/// What follows `NACA`, if the text begins with it.
fn after_name(text: &str) -> Option<&str> {
    let head = text.get(..4)?;
    head.eq_ignore_ascii_case("naca")
        .then(|| text[4..].trim_start_matches([' ', '-']))
}

/// Splits what stands behind `NACA`.
fn parts(text: &str) -> Option<Parts<'_>> {
    let words: Vec<&str> = text.split_whitespace().collect();
    let digits = |text: &str| !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
    let number = |text: &str| {
        let (whole, part) = text.split_once('.').unwrap_or((text, "0"));
        digits(whole) && digits(part)
    };
    match words[..] {
        [first, second, third] => {
            let (third, suffix) = third.split_once('-').map_or((third, None), |(a, b)| (a, Some(b)));
            let numbers = [first, second, third];
            (numbers.iter().all(|n| number(n)) && suffix.is_none_or(digits)).then_some(Parts {
                numbers,
                suffix,
                sixteen: false,
            })
        }
        [word] => {
            if let Some(rest) = word.strip_prefix("16-") {
                let whole = rest.split_once('.').map_or(rest, |(whole, _)| whole);
                return (number(rest) && whole.len() == 3).then(|| Parts {
                    numbers: [&rest[..1], "", &rest[1..]],
                    suffix: None,
                    sixteen: true,
                });
            }
            let (body, suffix) = word.split_once('-').map_or((word, None), |(a, b)| (a, Some(b)));
            let whole = body.split_once('.').map_or(body, |(whole, _)| whole);
            let middle = whole.len().checked_sub(3).filter(|n| matches!(n, 1 | 2))?;
            (number(body) && suffix.is_none_or(digits)).then(|| Parts {
                numbers: [&body[..1], &body[1..=middle], &body[middle + 1..]],
                suffix,
                sixteen: false,
            })
        }
        _ => None,
    }
}

/// The formula that a designation stands for, with an open trailing edge.
///
/// # Errors
///
/// [`UnknownDesignation`] where the digits name no section, with what would.
pub fn parse(text: &str) -> Result<Formula, UnknownDesignation> {
    let unknown = |reason: String, remedy: &str| UnknownDesignation {
        reason,
        remedy: remedy.to_owned(),
    };
    let text = text.trim();
    let body = after_name(text).unwrap_or(text);
    let Some(Parts {
        numbers,
        suffix,
        sixteen,
    }) = parts(body)
    else {
        return Err(unknown(
            format!("`{text}` is no designation of a family known here"),
            KNOWN,
        ));
    };
    let [first, second, third] = numbers.map(|n| n.parse::<f64>().unwrap_or(0.0));
    if !(1.0..=40.0).contains(&third) {
        return Err(unknown(
            format!("`{text}` gives a thickness of {third} % of the chord, and 1 to 40 % can be built"),
            "change the last two digits",
        ));
    }
    let form = match suffix {
        _ if sixteen => Form::Modified { nose: 4, place: 5 },
        None => Form::Digits,
        Some(suffix) => modified(suffix).map_err(|reason| {
            unknown(
                format!("`{text}`: {reason}"),
                "the suffix is the leading-edge index 1 to 9 and the place of the greatest thickness, 2 to 6 tenths",
            )
        })?,
    };
    let thickness = Thickness {
        ratio: third / 100.0,
        form,
        closing: Closing::Open,
    };
    let camber = if sixteen {
        if first > 0.0 {
            return Err(unknown(
                format!("`{text}` has the mean line of uniform load, which is infinitely steep at both ends"),
                "16-series sections are known without camber (NACA 16-012); give the path of a coordinate file for this one",
            ));
        }
        Camber::None
    } else if numbers[1].len() > 1 && second >= 10.0 || numbers[1] == "00" {
        five_digit_camber(first, numbers[1]).map_err(|reason| {
            unknown(
                format!("`{text}`: {reason}"),
                "the first digit is 1 to 9, the next two are 10, 20, 30, 40, 50 (simple) or 21, 31, 41, 51 (reflexed)",
            )
        })?
    } else {
        four_digit_camber(first, second).map_err(|reason| {
            unknown(
                format!("`{text}`: {reason}"),
                "write 00 for a symmetric section, or up to 9 % at 1 to 9 tenths for a cambered one",
            )
        })?
    };
    Ok(Formula { thickness, camber })
}

fn modified(suffix: &str) -> Result<Form, String> {
    let &[nose, place] = suffix.as_bytes() else {
        return Err(format!(
            "a suffix has two digits, and -{suffix} has {}",
            suffix.len()
        ));
    };
    match (nose - b'0', place - b'0') {
        (0, _) => Err(format!(
            "-{suffix} has a sharp nose, where the sides cannot meet with one curvature"
        )),
        (_, place @ (0 | 1 | 7..)) => Err(format!("no form has its greatest thickness at {place} tenths")),
        (nose, place) => Ok(Form::Modified { nose, place }),
    }
}

fn four_digit_camber(camber: f64, place: f64) -> Result<Camber, String> {
    if camber <= 0.0 {
        return if place > 0.0 {
            Err(format!("a camber of 0 has no place, but {place} tenths is given"))
        } else {
            Ok(Camber::None)
        };
    }
    if !(1.0..=9.0).contains(&place) || camber > 9.5 {
        return Err(format!(
            "no mean line has a camber of {camber} % at {place} tenths"
        ));
    }
    Ok(Camber::Parabolas {
        m: camber / 100.0,
        p: place / 10.0,
    })
}

fn five_digit_camber(lift: f64, line: &str) -> Result<Camber, String> {
    let found = MEAN_LINES.iter().find(|(digits, ..)| line.parse() == Ok(*digits));
    match found {
        Some(&(_, m, k1, ratio)) if lift > 0.0 && lift < 10.0 => Ok(Camber::Cubic {
            m,
            k1: k1 * lift / 2.0,
            ratio,
        }),
        _ => Err(format!("there is no 5-digit mean line {lift}{line}")),
    }
}

#[cfg(test)]
mod tests {
    use super::{is_designation, parse};
    use crate::airfoil::{Camber, Form};

    #[test]
    fn designations_are_told_from_paths() {
        for text in [
            "2412",
            "23012",
            "NACA 2412",
            "naca2412",
            "NACA-0012",
            "NACA 2412.5",
            "0012-64",
            "16-012",
            "2411.5",
            "NACA 2.5 4 12",
            "NACA 64A010",
            "NACA",
            " 0012 ",
            "NACA 24",
        ] {
            assert!(is_designation(text), "{text}");
        }
        for text in [
            "naca2412.dat",
            "naca 2412.txt",
            "naca/2412",
            "NACA-profile.csv",
            "naca_2412",
            "nacasections/12",
            "241",
            "241212",
            "2412.dat",
            "fell-113.dat",
            "16-012.dat",
            "2412-64.dat",
            "2412-6",
            "./2412",
            "",
            "nacelle",
            "2.5 4 12",
            "0012\u{b2}",
            "24\u{b2}",
        ] {
            assert!(
                !is_designation(text) || parse(text).is_err() && text == "2412-6",
                "{text}"
            );
        }
    }

    #[test]
    fn every_family_is_taken_apart() {
        let near = |a: f64, b: f64| (a - b).abs() < 1e-15;
        let formula = parse("NACA 2411.5").unwrap();
        assert!(near(formula.thickness.ratio, 0.115) && formula.thickness.form == Form::Digits);
        assert_eq!(formula.camber, Camber::Parabolas { m: 0.02, p: 0.4 });
        let formula = parse("0012-64").unwrap();
        assert!(near(formula.thickness.ratio, 0.12) && formula.camber == Camber::None);
        assert_eq!(formula.thickness.form, Form::Modified { nose: 6, place: 4 });
        assert_eq!(
            parse("NACA 16-012").unwrap().thickness,
            parse("0012-45").unwrap().thickness
        );
        let Camber::Cubic { k1, ratio, .. } = parse("naca 43112.25-63").unwrap().camber else {
            panic!("a 5-digit mean line");
        };
        assert!(near(k1, 2.0 * 15.793) && near(ratio, 0.00677));
        assert_eq!(
            parse("NACA 2.5 4.5 12").unwrap().camber,
            Camber::Parabolas { m: 0.025, p: 0.45 }
        );
        assert_eq!(parse("NACA 2 30 12").unwrap(), parse("23012").unwrap());
        assert_eq!(parse("NACA 2 4 12-63").unwrap(), parse("2412-63").unwrap());
    }

    #[test]
    fn what_names_no_section_is_refused_with_its_reason() {
        for (text, part) in [
            ("NACA 64A010", "no designation"),
            ("NACA", "no designation"),
            ("2400", "thickness of 0 %"),
            ("0041", "thickness of 41 %"),
            ("0412", "a camber of 0"),
            ("2012", "2 % at 0 tenths"),
            ("22212", "mean line 222"),
            ("20012", "mean line 200"),
            ("0012-04", "sharp nose"),
            ("0012-67", "7 tenths"),
            ("0012-6", "has 1"),
            ("16-212", "infinitely steep"),
            ("NACA 2 4.5.1 12", "no designation"),
            ("24\u{b2}2", "no designation"),
        ] {
            let error = parse(text).unwrap_err();
            assert!(error.to_string().contains(part), "{text}: {error}");
        }
    }
}
