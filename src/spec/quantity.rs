//! A number with its unit: from the text as typed to mm, mm², rad, SI or a ratio, and back for messages.

use super::unit::Unit;

/// What a number measures.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Dimension {
    /// Length; inside in mm.
    Length,
    /// Area; inside in mm².
    Area,
    /// Angle; bare in degrees, inside in rad.
    Angle,
    /// Ratio or fraction; bare, or in per cent.
    Ratio,
    /// Mass; bare and inside in kg.
    Mass,
    /// Force; bare and inside in N.
    Force,
    /// Force per area; bare and inside in N/m². A mass per area counts as its weight under [`GRAVITY`].
    Loading,
    /// Speed; bare and inside in m/s.
    Speed,
    /// Density; bare and inside in kg/m³.
    Density,
}

impl Dimension {
    /// The word for messages, with its article.
    pub(super) const fn noun(self) -> &'static str {
        match self {
            Self::Length => "a length",
            Self::Area => "an area",
            Self::Angle => "an angle",
            Self::Ratio => "a ratio",
            Self::Mass => "a mass",
            Self::Force => "a force",
            Self::Loading => "a wing loading",
            Self::Speed => "a speed",
            Self::Density => "a density",
        }
    }

    /// Texts that would be right, for messages.
    pub(super) const fn example(self) -> &'static str {
        match self {
            Self::Length => "\"300 mm\"",
            Self::Area => "\"0.33 m^2\"",
            Self::Angle => "\"3 deg\"",
            Self::Ratio => "0.4 or \"40 %\"",
            Self::Mass => "\"6.2 kg\"",
            Self::Force => "\"61 N\"",
            Self::Loading => "\"84 N/m^2\"",
            Self::Speed => "\"11 m/s\"",
            Self::Density => "\"1.2 kg/m^3\"",
        }
    }

    /// The units that fit, for messages: `mm, cm, m, in or ft`.
    pub(super) fn units(self) -> String {
        let fitting: Vec<_> = MEASURES
            .iter()
            .filter(|m| m.dimension == self)
            .map(|m| m.names[0])
            .collect();
        one_of(&fitting)
    }

    /// What a bare number is in, where bare lengths are in `unit`.
    pub(super) const fn bare(self, unit: Unit) -> Scale {
        let mm = unit.millimetres();
        match self {
            Self::Length => Scale {
                symbol: unit.symbol(),
                factor: mm,
            },
            Self::Area => Scale {
                symbol: square(unit),
                factor: mm * mm,
            },
            Self::Angle => Scale {
                symbol: "deg",
                factor: DEGREE,
            },
            Self::Ratio => Scale::ONE,
            Self::Mass => Scale::si("kg"),
            Self::Force => Scale::si("N"),
            Self::Loading => Scale::si("N/m^2"),
            Self::Speed => Scale::si("m/s"),
            Self::Density => Scale::si("kg/m^3"),
        }
    }
}

/// A unit as a message writes it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Scale {
    /// Its symbol; empty for a bare ratio.
    pub(super) symbol: &'static str,
    /// What one of it is in mm, mm², rad, SI or as a ratio.
    pub(super) factor: f64,
}

impl Scale {
    /// A bare ratio.
    pub(super) const ONE: Self = Self {
        symbol: "",
        factor: 1.0,
    };

    /// An SI unit that values are kept in.
    const fn si(symbol: &'static str) -> Self {
        Self { symbol, factor: 1.0 }
    }

    /// The value with its unit, to six significant digits.
    pub(super) fn show(self, value: f64) -> String {
        let number = significant(value / self.factor);
        if self.symbol.is_empty() {
            number
        } else {
            format!("{number} {}", self.symbol)
        }
    }
}

/// Why a text is no quantity.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub(super) enum QuantityError {
    /// It does not begin with a number.
    #[error("{} is expected, a number and its unit", .0.noun())]
    NoNumber(Dimension),
    /// A decimal comma.
    #[error("a decimal comma is not understood")]
    Comma,
    /// A unit of another dimension.
    #[error("{unit} is the unit of {}, and {} is expected", .found.noun(), .expected.noun())]
    Misfit {
        unit: String,
        found: Dimension,
        expected: Dimension,
    },
    /// No unit that is known.
    #[error("the unit {unit:?} is not known")]
    Unknown { unit: String, expected: Dimension },
}

impl QuantityError {
    /// What to change.
    pub(super) fn remedy(&self) -> String {
        match self {
            Self::Comma => "Write it with a decimal point: \"1.5 m\".".to_owned(),
            Self::NoNumber(expected) => format!("Write it like {}.", expected.example()),
            Self::Misfit { expected, .. } | Self::Unknown { expected, .. } => {
                format!(
                    "Units that fit: {}. Write it like {}.",
                    expected.units(),
                    expected.example()
                )
            }
        }
    }
}

/// Reads `text` as a quantity of `dimension`; a number without a unit is in `bare`. Gives the value in mm, mm², rad,
/// SI or as a ratio, and the unit it was typed in. The number may be infinite: the caller checks the range.
///
/// # Errors
/// [`QuantityError`], if `text` is not a number with a unit of this dimension.
pub(super) fn parse(text: &str, dimension: Dimension, bare: Scale) -> Result<(f64, Scale), QuantityError> {
    let text = text.trim().replace('\u{2212}', "-");
    let (number, rest) = split(&text).ok_or(QuantityError::NoNumber(dimension))?;
    if rest.is_empty() {
        return Ok((number * bare.factor, bare));
    }
    if rest.starts_with(',') {
        return Err(QuantityError::Comma);
    }
    let plain = rest.replace('²', "^2").replace('³', "^3").replace(' ', "");
    match MEASURES.iter().find(|m| m.names.contains(&plain.as_str())) {
        Some(m) if m.dimension == dimension => {
            let scale = Scale {
                symbol: m.names[0],
                factor: m.factor,
            };
            Ok((number * m.factor, scale))
        }
        Some(m) => Err(QuantityError::Misfit {
            unit: plain,
            found: m.dimension,
            expected: dimension,
        }),
        None => Err(QuantityError::Unknown {
            unit: super::fault::excerpt(rest),
            expected: dimension,
        }),
    }
}

/// The longest number at the start of `text`, and what follows it without spaces around.
fn split(text: &str) -> Option<(f64, &str)> {
    let end = text
        .find(|c: char| !(c.is_ascii_digit() || "+-.eE".contains(c)))
        .unwrap_or(text.len());
    (1..=end)
        .rev()
        .find_map(|i| Some((text[..i].parse().ok()?, text[i..].trim())))
}

/// Lists words for a sentence: `a, b or c`.
pub(super) fn one_of(words: &[&str]) -> String {
    join(words, "or")
}

/// Lists words for a sentence: `a, b and c`.
pub(super) fn all_of(words: &[&str]) -> String {
    join(words, "and")
}

fn join(words: &[&str], last: &str) -> String {
    match words {
        [] => String::new(),
        [only] => (*only).to_owned(),
        [first @ .., end] => format!("{} {last} {end}", first.join(", ")),
    }
}

/// `value` to six significant digits without trailing zeros.
pub(super) fn significant(value: f64) -> String {
    let size = value.abs();
    if size > 0.0 && !(1e-4..1e9).contains(&size) {
        return format!("{value:.4e}");
    }
    // log10 of a number in 1e-4..1e9 lies in -4..9
    let decimals = (1..=9).find(|&d| size >= 10_f64.powi(5 - d)).unwrap_or(9);
    let decimals = if size >= 1e5 { 0 } else { decimals };
    let text = format!("{value:.*}", usize::try_from(decimals).unwrap_or(0));
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

struct Measure {
    /// The symbol for messages, then other ways to type it; without spaces, `^2` for squares, `^3` for cubes.
    names: &'static [&'static str],
    dimension: Dimension,
    factor: f64,
}

const DEGREE: f64 = std::f64::consts::PI / 180.0;

/// Standard acceleration of free fall \[m/s²\] (ISO 80000-3:2019, exact).
pub(super) const GRAVITY: f64 = 9.806_65;
/// The pound \[kg\] (international yard and pound agreement, 1959, exact).
const POUND: f64 = 0.453_592_37;
const FOOT: f64 = 0.3048;

const fn square(unit: Unit) -> &'static str {
    match unit {
        Unit::Millimetre => "mm^2",
        Unit::Centimetre => "cm^2",
        Unit::Metre => "m^2",
        Unit::Inch => "in^2",
        Unit::Foot => "ft^2",
    }
}

const fn measure(names: &'static [&'static str], dimension: Dimension, factor: f64) -> Measure {
    Measure {
        names,
        dimension,
        factor,
    }
}

/// Every unit that may be typed. The inch is 25.4 mm, the foot 304.8 mm, the nautical mile 1852 m, the mile 1609.344 m
/// exactly.
const MEASURES: &[Measure] = &[
    measure(&["um", "µm", "μm"], Dimension::Length, 1e-3),
    measure(&["mm"], Dimension::Length, 1.0),
    measure(&["cm"], Dimension::Length, 10.0),
    measure(&["dm"], Dimension::Length, 100.0),
    measure(&["m"], Dimension::Length, 1000.0),
    measure(&["km"], Dimension::Length, 1e6),
    measure(&["in", "inch", "\""], Dimension::Length, 25.4),
    measure(&["ft", "foot", "feet", "'"], Dimension::Length, 304.8),
    measure(&["mm^2", "mm2"], Dimension::Area, 1.0),
    measure(&["cm^2", "cm2"], Dimension::Area, 1e2),
    measure(&["dm^2", "dm2"], Dimension::Area, 1e4),
    measure(&["m^2", "m2"], Dimension::Area, 1e6),
    measure(&["in^2", "in2", "sqin"], Dimension::Area, 25.4 * 25.4),
    measure(&["ft^2", "ft2", "sqft"], Dimension::Area, 304.8 * 304.8),
    measure(&["deg", "°", "degree", "degrees"], Dimension::Angle, DEGREE),
    measure(&["rad"], Dimension::Angle, 1.0),
    measure(&["%"], Dimension::Ratio, 0.01),
    measure(&["kg"], Dimension::Mass, 1.0),
    measure(&["g"], Dimension::Mass, 1e-3),
    measure(&["lb", "lbs"], Dimension::Mass, POUND),
    measure(&["oz"], Dimension::Mass, POUND / 16.0),
    measure(&["N"], Dimension::Force, 1.0),
    measure(&["kN"], Dimension::Force, 1e3),
    measure(&["lbf"], Dimension::Force, POUND * GRAVITY),
    measure(&["N/m^2", "N/m2"], Dimension::Loading, 1.0),
    measure(&["Pa"], Dimension::Loading, 1.0),
    measure(&["kPa"], Dimension::Loading, 1e3),
    measure(&["kg/m^2", "kg/m2"], Dimension::Loading, GRAVITY),
    measure(&["g/dm^2", "g/dm2"], Dimension::Loading, 0.1 * GRAVITY),
    measure(
        &["lb/ft^2", "lb/ft2", "lbf/ft^2", "lbf/ft2", "psf"],
        Dimension::Loading,
        POUND * GRAVITY / (FOOT * FOOT),
    ),
    measure(
        &["oz/ft^2", "oz/ft2"],
        Dimension::Loading,
        POUND / 16.0 * GRAVITY / (FOOT * FOOT),
    ),
    measure(&["m/s"], Dimension::Speed, 1.0),
    measure(&["km/h"], Dimension::Speed, 1.0 / 3.6),
    measure(&["kn", "kt", "kts"], Dimension::Speed, 1852.0 / 3600.0),
    measure(&["mph"], Dimension::Speed, 0.447_04),
    measure(&["ft/s"], Dimension::Speed, FOOT),
    measure(&["kg/m^3", "kg/m3"], Dimension::Density, 1.0),
    measure(&["g/cm^3", "g/cm3"], Dimension::Density, 1e3),
    // a slug is the mass that a pound-force gives 1 ft/s²
    measure(
        &["slug/ft^3", "slug/ft3"],
        Dimension::Density,
        POUND * GRAVITY / (FOOT * FOOT * FOOT * FOOT),
    ),
];

#[cfg(test)]
mod tests {
    use super::{Dimension, QuantityError, Scale, parse, significant};
    use crate::spec::Unit;

    fn value(text: &str, dimension: Dimension) -> f64 {
        parse(text, dimension, dimension.bare(Unit::Millimetre))
            .unwrap()
            .0
    }

    #[test]
    fn quantities_with_units() {
        // 1 in = 25.4 mm and 1 ft = 304.8 mm exactly
        for (text, dimension, expected) in [
            ("2.4 m", Dimension::Length, 2400.0),
            ("8 ft", Dimension::Length, 2438.4),
            ("300mm", Dimension::Length, 300.0),
            ("7 in", Dimension::Length, 177.8),
            ("1e3", Dimension::Length, 1000.0),
            ("50 µm", Dimension::Length, 0.05),
            ("0.33 m^2", Dimension::Area, 330_000.0),
            ("0.33 m²", Dimension::Area, 330_000.0),
            ("51 dm^2", Dimension::Area, 510_000.0),
            ("3.5 ft^2", Dimension::Area, 3.5 * 92_903.04),
            ("180 deg", Dimension::Angle, std::f64::consts::PI),
            ("\u{2212}180°", Dimension::Angle, -std::f64::consts::PI),
            ("0.05 rad", Dimension::Angle, 0.05),
            ("40%", Dimension::Ratio, 0.4),
            ("40 %", Dimension::Ratio, 0.4),
            ("0.4", Dimension::Ratio, 0.4),
        ] {
            let found = value(text, dimension);
            assert!(
                (found - expected).abs() <= 1e-12 * expected.abs(),
                "{text}: {found}"
            );
        }
    }

    #[test]
    fn what_is_no_quantity() {
        let parse = |text| parse(text, Dimension::Length, Dimension::Length.bare(Unit::Metre));
        assert_eq!(parse("wide"), Err(QuantityError::NoNumber(Dimension::Length)));
        assert_eq!(parse(""), Err(QuantityError::NoNumber(Dimension::Length)));
        assert_eq!(parse("nan m"), Err(QuantityError::NoNumber(Dimension::Length)));
        assert_eq!(parse("1,5 m"), Err(QuantityError::Comma));
        let misfit = parse("3 deg").unwrap_err();
        assert_eq!(
            misfit.to_string(),
            "deg is the unit of an angle, and a length is expected"
        );
        assert_eq!(
            misfit.remedy(),
            "Units that fit: um, mm, cm, dm, m, km, in or ft. Write it like \"300 mm\"."
        );
        assert_eq!(
            parse("3 furlong").unwrap_err().to_string(),
            "the unit \"furlong\" is not known"
        );
    }

    #[test]
    fn numbers_for_messages() {
        for (value, text) in [
            (12.649_110_6, "12.6491"),
            (0.0, "0"),
            (8.0, "8"),
            (100_000.0, "100000"),
            (123_456.7, "123457"),
            (0.001_234_567_8, "0.00123457"),
            (-10.5, "-10.5"),
            (1e12, "1.0000e12"),
        ] {
            assert_eq!(significant(value), text);
        }
        assert_eq!(
            Scale {
                symbol: "m",
                factor: 1000.0
            }
            .show(2400.0),
            "2.4 m"
        );
    }
}
