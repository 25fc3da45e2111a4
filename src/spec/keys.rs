//! The keys that a spec may have: names, kinds and ranges; one list for reading, messages and advice.

use super::quantity::Dimension;
use super::written::{CHANGED, TABLES};

/// A table of the spec, or its top level (with an empty name).
#[derive(Debug)]
pub(super) struct Table {
    /// Its name; empty for the top level.
    pub(super) name: &'static str,
    /// True for an array of tables, `[[name]]`.
    pub(super) many: bool,
    /// Its keys.
    pub(super) keys: &'static [Key],
}

/// A key of a table.
#[derive(Debug)]
pub(super) struct Key {
    /// Its name within the table.
    pub(super) name: &'static str,
    /// What its value is.
    pub(super) kind: Kind,
    /// True for a size that the proof sheet compares with the solid.
    pub(super) stated: bool,
}

/// What a value is.
#[derive(Clone, Copy, Debug)]
pub(super) enum Kind {
    /// Any text.
    Text,
    /// One of some words.
    Choice(&'static [&'static str]),
    /// A number of a dimension, in a range.
    Number(Dimension, Range),
    /// A number of a dimension, in a range, or a word in its place.
    NumberOr(Dimension, Range, &'static str),
    /// Three lengths: a point.
    Point(Range),
    /// True or false.
    Flag,
    /// A section: a text, or a table of the keys in [`CHANGED`].
    Airfoil,
}

impl Key {
    /// A text.
    pub(super) const fn text(name: &'static str) -> Self {
        Self {
            name,
            kind: Kind::Text,
            stated: false,
        }
    }

    /// One of some words.
    pub(super) const fn choice(name: &'static str, words: &'static [&'static str]) -> Self {
        Self {
            name,
            kind: Kind::Choice(words),
            stated: false,
        }
    }

    /// A number that the built wing is compared with.
    pub(super) const fn size(name: &'static str, dimension: Dimension, range: Range) -> Self {
        Self {
            name,
            kind: Kind::Number(dimension, range),
            stated: true,
        }
    }

    /// A number that the built wing is compared with, or a word in its place.
    pub(super) const fn size_or(
        name: &'static str,
        dimension: Dimension,
        range: Range,
        word: &'static str,
    ) -> Self {
        Self {
            name,
            kind: Kind::NumberOr(dimension, range, word),
            stated: true,
        }
    }

    /// A point.
    pub(super) const fn point(name: &'static str, range: Range) -> Self {
        Self {
            name,
            kind: Kind::Point(range),
            stated: false,
        }
    }

    /// True or false.
    pub(super) const fn flag(name: &'static str) -> Self {
        Self {
            name,
            kind: Kind::Flag,
            stated: false,
        }
    }

    /// A section.
    pub(super) const fn airfoil(name: &'static str) -> Self {
        Self {
            name,
            kind: Kind::Airfoil,
            stated: false,
        }
    }

    /// Any other number.
    pub(super) const fn detail(name: &'static str, dimension: Dimension, range: Range) -> Self {
        Self {
            name,
            kind: Kind::Number(dimension, range),
            stated: false,
        }
    }
}

/// The values that a number may have, in mm, mm², rad, SI or as a ratio.
#[derive(Clone, Copy, Debug)]
pub(super) struct Range {
    low: f64,
    high: f64,
    low_allowed: bool,
    high_allowed: bool,
    /// The range in words.
    pub(super) words: &'static str,
    /// What to do about a value outside.
    pub(super) remedy: &'static str,
}

impl Range {
    /// Any size of a wing: above 0, at most 1 km.
    pub(super) const LENGTH: Self = Self::above(0.0, 1e6, "more than 0, at most 1000 m");
    /// A chord.
    pub(super) const CHORD: Self = Self::closed(1.0, 1e6, "1 mm to 1000 m");
    /// An area.
    pub(super) const AREA: Self = Self::above(0.0, 1e12, "more than 0, at most 1000000 m^2");
    /// An aspect ratio.
    pub(super) const ASPECT: Self = Self::closed(0.1, 100.0, "0.1 to 100");
    /// A taper ratio.
    pub(super) const TAPER: Self = Self {
        remedy: "Give the wing a real tip chord: tip chord / root chord, such as 0.4.",
        ..Self::above(0.0, 1000.0, "more than 0, at most 1000")
    };
    /// A sweep angle.
    pub(super) const SWEEP: Self = Self {
        high_allowed: false,
        ..Self::above(
            -80_f64.to_radians(),
            80_f64.to_radians(),
            "more than -80 deg, less than 80 deg",
        )
    };
    /// A dihedral angle.
    pub(super) const DIHEDRAL: Self =
        Self::closed(-90_f64.to_radians(), 90_f64.to_radians(), "-90 deg to 90 deg");
    /// An incidence or twist.
    pub(super) const TURN: Self =
        Self::closed(-45_f64.to_radians(), 45_f64.to_radians(), "-45 deg to 45 deg");
    /// A fraction of chord or semispan.
    pub(super) const FRACTION: Self = Self::closed(0.0, 1.0, "0 to 1");
    /// A thickness of which the upper bound depends on the chords.
    pub(super) const THICKNESS: Self = Self::closed(
        0.0,
        1e6,
        "0 (sharp), or a thickness of less than 10 % of the smallest chord",
    );
    /// A trailing-edge thickness as a part of the chord.
    pub(super) const PROPORTION: Self = Self {
        high_allowed: false,
        ..Self::above(0.0, 0.1, "more than 0, less than 10 %")
    };
    /// A section's thickness as a part of the chord.
    pub(super) const SECTION_THICKNESS: Self =
        Self::closed(0.01, 0.40, "0.01 to 0.4 (1 % to 40 % of the chord)");
    /// A section's camber as a part of the chord.
    pub(super) const SECTION_CAMBER: Self = Self {
        remedy: "Write a camber in that range; inverted = true turns a section upside down.",
        ..Self::closed(0.0, 0.15, "0 to 0.15 (0 % to 15 % of the chord)")
    };
    /// How far smoothing may move a point, as a part of the chord.
    pub(super) const FAIRING: Self = Self::closed(1e-6, 0.005, "1e-6 to 0.005 of the chord");
    /// A place.
    pub(super) const PLACE: Self = Self::closed(-1e6, 1e6, "-1000 m to 1000 m");
    /// A mass.
    pub(super) const MASS: Self = Self::above(0.0, 1e6, "more than 0, at most 1000000 kg");
    /// A weight.
    pub(super) const WEIGHT: Self = Self::above(0.0, 1e7, "more than 0, at most 10000 kN");
    /// A wing loading.
    pub(super) const LOADING: Self = Self::above(0.0, 1e6, "more than 0, at most 1000 kPa");
    /// A speed.
    pub(super) const SPEED: Self = Self::above(0.0, 1000.0, "more than 0, at most 1000 m/s");
    /// A density: of any gas, or of water.
    pub(super) const DENSITY: Self = Self::above(0.0, 2000.0, "more than 0, at most 2000 kg/m^3");
    /// An altitude at which the standard atmosphere is known here \[mm\].
    pub(super) const ALTITUDE: Self = Self::closed(
        -5e6,
        2e7,
        "-5000 m to 20000 m (troposphere and lower stratosphere)",
    );
    /// A greatest lift coefficient.
    pub(super) const LIFT: Self = Self::above(0.0, 10.0, "more than 0, at most 10");
    /// The largest distance between a facet and the surface.
    pub(super) const TOLERANCE: Self = Self::closed(0.0005, 10.0, "0.0005 mm to 10 mm");

    const fn closed(low: f64, high: f64, words: &'static str) -> Self {
        Self {
            low,
            high,
            low_allowed: true,
            high_allowed: true,
            words,
            remedy: "",
        }
    }

    const fn above(low: f64, high: f64, words: &'static str) -> Self {
        Self {
            low_allowed: false,
            ..Self::closed(low, high, words)
        }
    }

    /// True where `value` lies in the range; a bound that was typed in another unit still counts as the bound.
    pub(super) fn holds(&self, value: f64) -> bool {
        let slack = |bound: f64| 1e-12 * bound.abs();
        let above = if self.low_allowed {
            value >= self.low - slack(self.low)
        } else {
            value > self.low + slack(self.low)
        };
        let below = if self.high_allowed {
            value <= self.high + slack(self.high)
        } else {
            value < self.high - slack(self.high)
        };
        above && below
    }
}

/// Every key that a spec may have, as a dotted path; in an array of tables the place counted from 0 is written `N`, as
/// in `panel.N.sweep`.
pub fn keys() -> Vec<String> {
    let mut keys = Vec::new();
    for table in TABLES {
        for key in table.keys {
            let path = path(table, key);
            let inner = CHANGED.keys.iter().map(|inner| format!("{path}.{}", inner.name));
            let inner: Vec<_> = inner.filter(|_| matches!(key.kind, Kind::Airfoil)).collect();
            keys.push(path);
            keys.extend(inner);
        }
    }
    keys
}

fn path(table: &Table, key: &Key) -> String {
    match (table.name, table.many) {
        ("", _) => key.name.to_owned(),
        (name, false) => format!("{name}.{}", key.name),
        (name, true) => format!("{name}.N.{}", key.name),
    }
}

/// The table of this name; the top level has an empty name.
pub(super) fn table(name: &str) -> Option<&'static Table> {
    TABLES.iter().copied().find(|table| table.name == name)
}

/// The key of this name in a table.
pub(super) fn key<'a>(table: &'a Table, name: &str) -> Option<&'a Key> {
    table.keys.iter().find(|key| key.name == name)
}

/// The known key or table nearest to an unknown `name` typed in the table `within`, as messages write it:
/// `planform.taper_ratio` or `[planform]`; `None` where nothing is near.
pub(super) fn nearest(within: &str, name: &str) -> Option<String> {
    let name = name.to_lowercase().replace(['-', ' '], "_");
    let mut best = (0.0, None);
    let mut offer = |likeness: f64, bonus: f64, text: String| {
        if likeness > NEAR && likeness + bonus > best.0 {
            best = (likeness + bonus, Some(text));
        }
    };
    for table in TABLES {
        // a key of the same table wins over one elsewhere, even if that is a little more alike
        let home = if table.name == within { 0.1 } else { 0.0 };
        for key in table.keys {
            offer(likeness(&name, key.name), home, path(table, key));
        }
        if !table.name.is_empty() {
            let text = if table.many {
                format!("[[{}]]", table.name)
            } else {
                format!("[{}]", table.name)
            };
            offer(likeness(&name, table.name), 0.0, text);
        }
    }
    best.1
}

/// The key of a table in the place of an airfoil's text that is nearest to an unknown `name`; `None` where none is near.
pub(super) fn nearest_change(name: &str) -> Option<&'static str> {
    let name = name.to_lowercase().replace(['-', ' '], "_");
    let near = CHANGED
        .keys
        .iter()
        .map(|key| (likeness(&name, key.name), key.name));
    near.filter(|(likeness, _)| *likeness > NEAR)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, name)| name)
}

/// Likeness below which a key is no help.
const NEAR: f64 = 0.8;

fn likeness(typed: &str, known: &str) -> f64 {
    let part = typed.len() >= 3 && known.split('_').any(|word| word == typed);
    let spelt = strsim::jaro_winkler(typed, known);
    if part { spelt.max(0.95) } else { spelt }
}

#[cfg(test)]
mod tests {
    use super::{Range, keys, nearest};

    #[test]
    fn near_keys_are_found_across_tables() {
        for (within, typed, known) in [
            ("planform", "taper", "planform.taper_ratio"),
            ("planform", "aspect", "planform.aspect_ratio"),
            ("planform", "Root-Chord", "planform.root_chord"),
            ("planform", "twist", "setting.twist"),
            ("", "span", "planform.span"),
            ("", "units", "unit"),
            ("panel", "tipchord", "panel.N.tip_chord"),
            ("panel", "sweeep", "panel.N.sweep"),
            ("", "panels", "[[panel]]"),
            ("", "airfoils", "[airfoil]"),
            ("", "facet", "[facets]"),
            ("line", "chord", "line.N.chord_fraction"),
        ] {
            assert_eq!(nearest(within, typed).as_deref(), Some(known), "{typed}");
        }
        assert_eq!(nearest("", "zzz"), None);
    }

    #[test]
    fn keys_are_unique() {
        let mut all = keys();
        assert!(
            all.contains(&"panel.N.sweep".to_owned()) && all.contains(&"planform.taper_ratio".to_owned())
        );
        let count = all.len();
        all.sort();
        all.dedup();
        assert_eq!(all.len(), count);
    }

    #[test]
    fn bounds_hold_in_any_unit() {
        assert!(!Range::SWEEP.holds(80_f64.to_radians()) && Range::SWEEP.holds(79.999_f64.to_radians()));
        assert!(
            Range::DIHEDRAL.holds(-90_f64.to_radians()) && !Range::DIHEDRAL.holds(90.001_f64.to_radians())
        );
        assert!(Range::TOLERANCE.holds(0.5 * 1e-3) && !Range::TOLERANCE.holds(0.000_49));
        assert!(!Range::LENGTH.holds(f64::NAN) && !Range::LENGTH.holds(0.0));
    }
}
