//! From a designation such as `NACA 2412` to its formula.

use thiserror::Error;

use super::formula::{Camber, Formula, Thickness};

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

/// True where the text is meant as a designation and not as a file's path: `NACA …`, or four or five digits alone.
pub fn is_designation(text: &str) -> bool {
    digits(text).is_some()
}

fn digits(text: &str) -> Option<&str> {
    let text = text.trim();
    let named = text
        .get(..4)
        .filter(|head| head.eq_ignore_ascii_case("naca"))
        .map(|_| text[4..].trim());
    match named {
        Some(rest) => Some(rest.trim_start_matches(['-', ' '])).filter(|rest| !rest.contains('.')),
        None => Some(text).filter(|t| matches!(t.len(), 4 | 5) && t.bytes().all(|b| b.is_ascii_digit())),
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
    let known = "give four digits (NACA 2412) or five (NACA 23012), or the path of a coordinate file";
    let Some(digits) = digits(text) else {
        return Err(unknown(format!("`{text}` is no designation"), known));
    };
    if !digits.bytes().all(|b| b.is_ascii_digit()) || !matches!(digits.len(), 4 | 5) {
        return Err(unknown(
            format!("`{digits}` is neither four nor five digits"),
            known,
        ));
    }
    let number = |range: std::ops::Range<usize>| -> u32 {
        digits[range]
            .bytes()
            .fold(0, |sum, b| sum * 10 + u32::from(b - b'0'))
    };
    let percent = number(digits.len() - 2..digits.len());
    if !(1..=40).contains(&percent) {
        return Err(unknown(
            format!(
                "the last two digits give a thickness of {percent} % of the chord, and 1 to 40 % can be built"
            ),
            "change the last two digits",
        ));
    }
    let thickness = Thickness {
        ratio: f64::from(percent) / 100.0,
        closed: false,
    };
    let camber = if digits.len() == 4 {
        four_digit_camber(number(0..1), number(1..2)).map_err(|reason| {
            unknown(
                reason,
                "write 00 for a symmetric section, or a place of 1 to 9 tenths for a cambered one",
            )
        })?
    } else {
        let (lift, line) = (number(0..1), number(1..3));
        let found = MEAN_LINES.iter().find(|(digits, ..)| *digits == line);
        let (Some(&(_, m, k1, ratio)), 1..) = (found, lift) else {
            return Err(unknown(
                format!("no 5-digit mean line has the first three digits {}", &digits[..3]),
                "the first digit is 1 to 9, the next two are 10, 20, 30, 40, 50 (simple) or 21, 31, 41, 51 (reflexed)",
            ));
        };
        Camber::Cubic {
            m,
            k1: k1 * f64::from(lift) / 2.0,
            ratio,
        }
    };
    Ok(Formula { thickness, camber })
}

fn four_digit_camber(camber: u32, place: u32) -> Result<Camber, String> {
    match (camber, place) {
        (0, 0) => Ok(Camber::None),
        (0, _) => Err(format!(
            "a camber of 0 has no place, but the second digit is {place}"
        )),
        (_, 0) => Err(format!(
            "a camber of {camber} % cannot have its greatest value at the nose"
        )),
        _ => Ok(Camber::Parabolas {
            m: f64::from(camber) / 100.0,
            p: f64::from(place) / 10.0,
        }),
    }
}
