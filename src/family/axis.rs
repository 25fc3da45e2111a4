//! Axes of drawings: ranges and ticks.

/// Ticks that a scale of numbers has at most.
const MOST_TICKS: f64 = 6.0;
/// Texts that are named below an axis at most.
const MOST_TEXTS: usize = 8;

/// A range with its ticks.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Axis {
    low: f64,
    high: f64,
    /// Value and text of each.
    pub(super) ticks: Vec<(f64, String)>,
}

impl Axis {
    /// A scale that holds all numbers; ticks are 1, 2 or 5 times a power of ten apart.
    pub(super) fn of_numbers(numbers: &[f64]) -> Self {
        let least = numbers.iter().copied().fold(f64::INFINITY, f64::min);
        let greatest = numbers.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        let (least, greatest) = if least <= greatest {
            (least, greatest)
        } else {
            (0.0, 1.0)
        };
        // one value alone, or values that differ in their last digits only, stand in the middle
        let room = (0.06 * (greatest - least)).max(1e-9 * greatest.abs()).max(1e-12);
        let (low, high) = (least - room, greatest + room);
        let raw = (high - low) / MOST_TICKS;
        let power = 10_f64.powf(raw.log10().floor());
        let step = [1.0, 2.0, 5.0, 10.0]
            .map(|times| times * power)
            .into_iter()
            .find(|step| *step >= raw * (1.0 - 1e-9))
            .unwrap_or(10.0 * power);
        let mut ticks = Vec::new();
        let mut count = (low / step).ceil();
        while count * step <= high && ticks.len() < 20 {
            ticks.push((count * step, number(count * step, step)));
            count += 1.0;
        }
        Self { low, high, ticks }
    }

    /// Texts side by side, at 0, 1, 2 and so on; where they are many, some are named.
    pub(super) fn of_texts<'a>(texts: impl Iterator<Item = &'a str>) -> Self {
        let all: Vec<&str> = texts.collect();
        let each = all.len().div_ceil(MOST_TEXTS).max(1);
        Self {
            low: -0.5,
            high: all.len().max(1) as f64 - 0.5,
            ticks: (all.iter().enumerate().step_by(each))
                .map(|(i, text)| (i as f64, (*text).to_owned()))
                .collect(),
        }
    }

    /// Where a value is, from 0 at the low end to 1 at the high one.
    pub(super) fn share(&self, value: f64) -> f64 {
        (value - self.low) / (self.high - self.low)
    }
}

/// A tick's number, with the decimals that its step needs.
fn number(value: f64, step: f64) -> String {
    let decimals = (0..=12)
        .find(|&d| {
            let scaled = step * 10_f64.powi(d);
            (scaled - scaled.round()).abs() < 1e-6
        })
        .unwrap_or(12);
    if value.abs() >= 1e10 {
        return format!("{value:e}");
    }
    let places = usize::try_from(decimals).unwrap_or_default();
    format!("{:.places$}", value + 0.0)
}

/// A text short enough for a tick.
pub(super) fn short(text: &str) -> String {
    const LONGEST: usize = 16;
    if text.chars().count() <= LONGEST {
        return text.to_owned();
    }
    let end: Vec<char> = text.chars().rev().take(LONGEST - 1).collect();
    std::iter::once('…').chain(end.into_iter().rev()).collect()
}

/// A text as XML has it.
pub(super) fn escaped(text: &str) -> String {
    text.replace('&', "&amp;")
        .replace('<', "&lt;")
        .replace('>', "&gt;")
        .chars()
        .filter(|c| !c.is_control())
        .collect()
}

#[cfg(test)]
mod tests {
    use super::{Axis, short};

    fn texts(numbers: &[f64]) -> Vec<String> {
        let axis = Axis::of_numbers(numbers);
        axis.ticks.into_iter().map(|(_, text)| text).collect()
    }

    #[test]
    fn ticks_are_round_numbers_within_the_range() {
        assert_eq!(texts(&[6.0, 12.0]), ["6", "8", "10", "12"]);
        assert_eq!(texts(&[0.3, 0.6]), ["0.3", "0.4", "0.5", "0.6"]);
        assert_eq!(texts(&[-3.0, 0.0]), ["-3", "-2", "-1", "0"]);
        assert_eq!(texts(&[2e10, 4e10]), ["2e10", "2.5e10", "3e10", "3.5e10", "4e10"]);
        for alone in [0.0, 7.0, -1e-9, 3e8] {
            let axis = Axis::of_numbers(&[alone]);
            assert!(
                (axis.share(alone) - 0.5).abs() < 1e-3 && !axis.ticks.is_empty(),
                "{axis:?}"
            );
        }
        assert!(!Axis::of_numbers(&[]).ticks.is_empty());
    }

    #[test]
    fn texts_stand_side_by_side() {
        let axis = Axis::of_texts(["a", "b"].into_iter());
        assert!((axis.share(0.0) - 0.25).abs() < 1e-12 && (axis.share(1.0) - 0.75).abs() < 1e-12);
        assert!(Axis::of_texts((0..100).map(|_| "x")).ticks.len() <= 8);
        assert_eq!(short("airfoils/thick-root.dat"), "…/thick-root.dat");
    }
}
