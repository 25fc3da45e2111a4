//! What `--vary KEY=LIST` means: a key and the values it takes.

use rust_decimal::Decimal;
use thiserror::Error;

use super::decimal::{leading, spaced};
use crate::spec::{known, shortened};

/// Most values of one key.
pub const MOST_VALUES: u32 = 100_000;

/// A key and the values it takes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Vary {
    /// Dotted path, such as `planform.taper_ratio`.
    pub key: String,
    /// Its values, as texts that a spec would take; at least one.
    pub values: Vec<String>,
}

/// What can be wrong with `KEY=LIST`.
#[derive(Clone, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum VaryError {
    /// No key, or no values.
    #[error("{0}: write KEY=VALUE,VALUE or KEY=LOW..HIGH/COUNT, such as planform.taper_ratio=0.3..0.6/4")]
    Form(String),
    /// No spec has this key.
    #[error("{key}: unknown key; {advice}")]
    Key {
        /// As typed.
        key: String,
        /// The nearest known key.
        advice: String,
    },
    /// The wing's name, which is not a variant's.
    #[error(
        "name is the wing's, which its variants share; a variant's own name stands in the first column of a --table"
    )]
    Name,
    /// A value is empty.
    #[error("{key}: value {place} is empty; delete a comma, or write a value between the two")]
    Empty {
        /// The key.
        key: String,
        /// Its place, counted from 1.
        place: usize,
    },
    /// A range without the number of its values.
    #[error("{key}={text}: how many? Write LOW..HIGH/COUNT, such as 0.3..0.6/4 for 0.3, 0.4, 0.5, 0.6")]
    Count {
        /// The key.
        key: String,
        /// The range as typed.
        text: String,
    },
    /// A count outside its range.
    #[error("{key}={text}: COUNT is 2 to {MOST_VALUES}")]
    Many {
        /// The key.
        key: String,
        /// The range as typed.
        text: String,
    },
    /// A range whose ends are no numbers of one unit.
    #[error(
        "{key}={text}: LOW and HIGH are numbers with at most 28 digits, both in one unit or only the last with a unit, such as 2.4 m..3.0 m/4"
    )]
    Ends {
        /// The key.
        key: String,
        /// The range as typed.
        text: String,
    },
}

impl Vary {
    /// Reads `KEY=LIST`. A list holds values divided by commas; each may be a range `LOW..HIGH/COUNT`, that is COUNT values
    /// evenly spaced with both ends included. Commas within double quotes or square brackets belong to the value.
    ///
    /// # Errors
    ///
    /// [`VaryError`], which says what to write.
    pub fn parse(text: &str) -> Result<Self, VaryError> {
        let form = || VaryError::Form(shortened(text));
        let (key, list) = text.split_once('=').ok_or_else(form)?;
        let key = key.trim();
        if key.is_empty() || list.trim().is_empty() {
            return Err(form());
        }
        known(key).map_err(|advice| VaryError::Key {
            key: shortened(key),
            advice,
        })?;
        if key == "name" {
            return Err(VaryError::Name);
        }
        let mut values = Vec::new();
        for (i, item) in items(list).into_iter().enumerate() {
            if item.is_empty() {
                return Err(VaryError::Empty {
                    key: key.to_owned(),
                    place: i + 1,
                });
            }
            match range(key, item)? {
                Some(range) => values.extend(range),
                None => values.push(item.to_owned()),
            }
        }
        Ok(Self {
            key: key.to_owned(),
            values,
        })
    }
}

/// The items of a list, without the spaces around them.
fn items(list: &str) -> Vec<&str> {
    let (mut items, mut start, mut depth, mut quoted) = (Vec::new(), 0, 0_usize, false);
    for (at, c) in list.char_indices() {
        match c {
            '"' => quoted = !quoted,
            '[' if !quoted => depth += 1,
            ']' if !quoted => depth = depth.saturating_sub(1),
            ',' if !quoted && depth == 0 => {
                items.push(list[start..at].trim());
                start = at + 1;
            }
            _ => {}
        }
    }
    items.push(list[start..].trim());
    items
}

/// The values of a range; `None` where the text is a plain value.
fn range(key: &str, text: &str) -> Result<Option<Vec<String>>, VaryError> {
    let Some((low, rest)) = text.split_once("..") else {
        return Ok(None);
    };
    // `../a.dat` is a path
    let Some((first, first_unit)) = leading(low) else {
        return Ok(None);
    };
    let (key, typed) = (key.to_owned(), shortened(text));
    let Some((high, count)) = rest
        .rsplit_once('/')
        .filter(|(_, count)| count.trim().parse::<u64>().is_ok())
    else {
        return Err(VaryError::Count { key, text: typed });
    };
    let count = count
        .trim()
        .parse::<u32>()
        .ok()
        .filter(|count| (2..=MOST_VALUES).contains(count));
    let Some(count) = count else {
        return Err(VaryError::Many { key, text: typed });
    };
    let ends = || VaryError::Ends { key, text: typed };
    let Some((last, unit)) = leading(high) else {
        return Err(ends());
    };
    if !(first_unit.is_empty() || first_unit == unit) {
        return Err(ends());
    }
    let Some(values) = spaced(first, last, count) else {
        return Err(ends());
    };
    let text = |value: Decimal| {
        if unit.is_empty() {
            value.to_string()
        } else {
            format!("{value} {unit}")
        }
    };
    Ok(Some(values.into_iter().map(text).collect()))
}

#[cfg(test)]
mod tests {
    use super::{Vary, VaryError};

    fn values(text: &str) -> Vec<String> {
        Vary::parse(text).unwrap().values
    }

    #[test]
    fn lists_and_ranges() {
        assert_eq!(values("planform.aspect_ratio=6,8, 10"), ["6", "8", "10"]);
        assert_eq!(
            values("planform.taper_ratio = 0.3..0.6/4"),
            ["0.3", "0.4", "0.5", "0.6"]
        );
        assert_eq!(
            values("planform.span=2.4 m..3.0 m/4"),
            ["2.4 m", "2.6 m", "2.8 m", "3.0 m"]
        );
        assert_eq!(values("planform.span=2..3 ft/2"), ["2 ft", "3 ft"]);
        assert_eq!(values("setting.twist=0,-1..-3/3"), ["0", "-1", "-2", "-3"]);
        assert_eq!(
            values("airfoil.root=NACA 2412,../a.dat,\"b,c.dat\""),
            ["NACA 2412", "../a.dat", "\"b,c.dat\""]
        );
    }

    #[test]
    fn what_is_no_list() {
        let wrong = |text: &str| Vary::parse(text).unwrap_err();
        assert!(matches!(wrong("planform.span"), VaryError::Form(_)));
        assert!(matches!(wrong("=3"), VaryError::Form(_)));
        assert_eq!(wrong("name=a,b"), VaryError::Name);
        assert!(matches!(wrong("planform.span= "), VaryError::Form(_)));
        assert_eq!(
            wrong("planform.taper=0.3").to_string(),
            "planform.taper: unknown key; the nearest known is planform.taper_ratio"
        );
        assert!(matches!(
            wrong("planform.span=1,,2"),
            VaryError::Empty { place: 2, .. }
        ));
        for text in ["6..8", "6..8/x", "6..8/", "6..8/-2", "6..8/2.5"] {
            assert!(
                matches!(wrong(&format!("planform.span={text}")), VaryError::Count { .. }),
                "{text}"
            );
        }
        for text in ["6..8/0", "6..8/1", "6..8/100001", "6..8/99999999999"] {
            assert!(
                matches!(wrong(&format!("planform.span={text}")), VaryError::Many { .. }),
                "{text}"
            );
        }
        for text in [
            "6..wide/3",
            "6 m..8 ft/3",
            "6 m..8/3",
            "1..99999999999999999999999999999999/3",
        ] {
            assert!(
                matches!(wrong(&format!("planform.span={text}")), VaryError::Ends { .. }),
                "{text}"
            );
        }
    }
}
