//! A figure drawn against what was varied, as SVG: one panel a key.

use std::collections::{BTreeMap, HashSet};
use std::fmt::Write;

use thiserror::Error;

use super::axis::{Axis, escaped, short};
use super::decimal::leading;
use super::line::Line;
use super::plan::{Plan, Variant};
use super::row::{figures, number, number_keys};
use crate::spec::{Source, shortened, starter};
use crate::wing::{Wing, prepare};

/// Size of a panel's frame, and the room around it \[px\].
const FRAME: [f64; 2] = [360.0, 240.0];
const LEFT: f64 = 84.0;
const TOP: f64 = 46.0;
const RIGHT: f64 = 22.0;
const BOTTOM: f64 = 54.0;
/// Most lines between variants in a panel; with more there are points only.
const MOST_LINES: usize = 24;

/// Why nothing can be drawn.
#[derive(Clone, Debug, Error, PartialEq, Eq)]
#[non_exhaustive]
pub enum PlotError {
    /// No figure has this key.
    #[error("{key:?} is no figure; {advice}")]
    Key {
        /// As typed.
        key: String,
        /// The nearest key, or all.
        advice: String,
    },
}

/// A drawing of one figure in the making.
#[derive(Debug)]
pub struct Plot {
    key: String,
    unit: String,
    keys: Vec<String>,
    /// What was varied and the figure, for each variant that has it.
    points: Vec<(Vec<String>, f64)>,
}

impl Plot {
    /// Begins the drawing of a figure.
    ///
    /// # Errors
    ///
    /// [`PlotError::Key`] where no wing has such a figure.
    pub fn new(plan: &Plan, key: &str) -> Result<Self, PlotError> {
        let known = figure_keys();
        if !known.iter().any(|other| other == key) {
            let last = |key: &str| key.rsplit('.').next().unwrap_or_default().to_owned();
            let likeness = |other: &str| {
                strsim::jaro_winkler(key, other).max(strsim::jaro_winkler(&last(key), &last(other)))
            };
            let nearest = known.iter().max_by(|a, b| likeness(a).total_cmp(&likeness(b)));
            let advice = match nearest.filter(|near| likeness(near) > 0.8) {
                Some(near) => format!("the nearest is {near}"),
                None => format!("the figures are {}", known.join(", ")),
            };
            return Err(PlotError::Key {
                key: shortened(key),
                advice,
            });
        }
        Ok(Self {
            key: key.to_owned(),
            unit: String::new(),
            keys: plan.keys().to_vec(),
            points: Vec::new(),
        })
    }

    /// Puts a variant in; one without the figure is left out.
    pub fn add(&mut self, variant: &Variant, line: &Line) {
        let figures = figures(line);
        if let Some(value) = number(&figures, &self.key) {
            if self.unit.is_empty() {
                self.unit = unit(&self.key, figures["unit"].as_str().unwrap_or_default());
            }
            self.points.push((variant.values.clone(), value));
        }
    }

    /// The drawing.
    pub fn svg(&self) -> String {
        let shown: Vec<usize> = (0..self.keys.len())
            .filter(|&k| {
                self.points
                    .iter()
                    .any(|(values, _)| values[k] != self.points[0].0[k])
            })
            .collect();
        let shown = if shown.is_empty() { vec![0] } else { shown };
        let across = shown.len().min(3);
        let down = shown.len().div_ceil(across);
        let cell = [LEFT + FRAME[0] + RIGHT, TOP + FRAME[1] + BOTTOM];
        let (width, height) = (cell[0] * across as f64, cell[1] * down as f64);
        let mut svg = format!(
            "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width}\" height=\"{height}\" viewBox=\"0 0 {width} \
             {height}\" font-family=\"sans-serif\" font-size=\"12\">\n<rect width=\"100%\" height=\"100%\" fill=\"#fff\"/>\n"
        );
        for (place, &k) in shown.iter().enumerate() {
            let (column, row) = (place % across, place / across);
            let _ = writeln!(
                svg,
                "<g transform=\"translate({} {})\">",
                LEFT + cell[0] * column as f64,
                TOP + cell[1] * row as f64
            );
            self.panel(&mut svg, k);
            svg.push_str("</g>\n");
        }
        svg.push_str("</svg>\n");
        svg
    }

    fn panel(&self, svg: &mut String, k: usize) {
        let up = Axis::of_numbers(&self.points.iter().map(|(_, y)| *y).collect::<Vec<_>>());
        let texts: Vec<&str> = self.points.iter().map(|(values, _)| values[k].as_str()).collect();
        let (along, xs, unit) = positions(&texts);
        let x = |value: f64| FRAME[0] * along.share(value);
        let y = |value: f64| FRAME[1] * (1.0 - up.share(value));
        let [w, h] = FRAME;
        let label = |text: &str, unit: &str| {
            escaped(&if unit.is_empty() {
                text.to_owned()
            } else {
                format!("{text} [{unit}]")
            })
        };
        // writing to a text cannot fail
        let _ = writeln!(
            svg,
            "<text x=\"{}\" y=\"-16\" font-weight=\"bold\">{}</text>",
            -LEFT + 12.0,
            label(&self.key, &self.unit)
        );
        let _ = writeln!(
            svg,
            "<text x=\"{}\" y=\"{}\" text-anchor=\"middle\">{}</text>",
            w / 2.0,
            h + 40.0,
            label(&self.keys[k], &unit)
        );
        for (value, text) in &up.ticks {
            let at = y(*value);
            let _ = writeln!(
                svg,
                "<path d=\"M0 {at:.1}H{w}\" stroke=\"#ddd\"/><text x=\"-8\" y=\"{:.1}\" text-anchor=\"end\">{text}</text>",
                at + 4.0
            );
        }
        for (value, text) in &along.ticks {
            let at = x(*value);
            let _ = writeln!(
                svg,
                "<path d=\"M{at:.1} {h}v5\" stroke=\"#555\"/><text x=\"{at:.1}\" y=\"{}\" text-anchor=\"middle\">{}</text>",
                h + 20.0,
                escaped(&short(text))
            );
        }
        let _ = writeln!(svg, "<path d=\"M0 0V{h}H{w}\" fill=\"none\" stroke=\"#555\"/>");
        for line in self.lines(k, &xs) {
            let points: Vec<String> = line
                .iter()
                .map(|(a, b)| format!("{:.1},{:.1}", x(*a), y(*b)))
                .collect();
            let _ = writeln!(
                svg,
                "<polyline points=\"{}\" fill=\"none\" stroke=\"#1f5fa8\" stroke-opacity=\"0.45\"/>",
                points.join(" ")
            );
        }
        svg.push_str("<g fill=\"#1f5fa8\">\n");
        let mut drawn = HashSet::new();
        for (px, (_, value)) in xs.iter().zip(&self.points) {
            let Some(px) = px else { continue };
            let dot = format!("<circle cx=\"{:.1}\" cy=\"{:.1}\" r=\"2.6\"/>", x(*px), y(*value));
            // points on the same spot are one
            if !drawn.contains(&dot) {
                let _ = writeln!(svg, "{dot}");
                drawn.insert(dot);
            }
        }
        svg.push_str("</g>\n");
        if drawn.is_empty() {
            let _ = writeln!(
                svg,
                "<text x=\"{}\" y=\"{}\" text-anchor=\"middle\">no wing was built</text>",
                w / 2.0,
                h / 2.0
            );
        }
    }

    /// Lines through the variants that differ in one key alone; none where they would be too many to tell apart.
    fn lines(&self, k: usize, xs: &[Option<f64>]) -> Vec<Vec<(f64, f64)>> {
        let mut groups: BTreeMap<Vec<&str>, Vec<(f64, f64)>> = BTreeMap::new();
        for (x, (values, y)) in xs.iter().zip(&self.points) {
            let Some(x) = x else { continue };
            let others = (values.iter().enumerate())
                .filter(|(other, _)| *other != k)
                .map(|(_, value)| value.as_str())
                .collect();
            groups.entry(others).or_default().push((*x, *y));
        }
        if groups.len() > MOST_LINES {
            return Vec::new();
        }
        let mut lines: Vec<_> = groups.into_values().filter(|line| line.len() > 1).collect();
        for line in &mut lines {
            line.sort_by(|a, b| a.0.total_cmp(&b.0));
        }
        lines
    }
}

/// The axis of what was varied, the place of each value on it, and its unit. Numbers of one unit are drawn to scale; other
/// texts stand side by side. An empty value (the spec's own) has no place among numbers.
fn positions(texts: &[&str]) -> (Axis, Vec<Option<f64>>, String) {
    let numbers: Vec<Option<(f64, &str)>> = texts
        .iter()
        .map(|text| {
            let (number, unit) = leading(text)?;
            Some((number.to_string().parse().ok()?, unit))
        })
        .collect();
    let all: Vec<(f64, &str)> = numbers.iter().flatten().copied().collect();
    let filled = texts.iter().filter(|text| !text.is_empty()).count();
    if !all.is_empty() && all.len() == filled && all.iter().all(|(_, unit)| *unit == all[0].1) {
        let axis = Axis::of_numbers(&all.iter().map(|(number, _)| *number).collect::<Vec<_>>());
        let xs = numbers
            .iter()
            .map(|number| number.map(|(number, _)| number))
            .collect();
        return (axis, xs, all[0].1.to_owned());
    }
    let mut different: Vec<&str> = Vec::new();
    let mut places = BTreeMap::new();
    let xs = texts
        .iter()
        .map(|text| {
            let place = *places.entry(*text).or_insert_with(|| {
                different.push(text);
                different.len() - 1
            });
            Some(place as f64)
        })
        .collect();
    let labels = different
        .iter()
        .map(|text| if text.is_empty() { "(as in the spec)" } else { text });
    (Axis::of_texts(labels), xs, String::new())
}

/// The figures that can be drawn: every number that a wing has, by its key.
pub fn figure_keys() -> Vec<String> {
    let source = Source {
        text: starter(),
        file: "starter.toml",
        set: &[],
    };
    let none = |_: &str| Err(std::io::ErrorKind::NotFound.into());
    let wing = prepare(&source, &none)
        .ok()
        .and_then(|prepared| Wing::build(&prepared).ok());
    wing.and_then(|wing| serde_json::to_value(wing.record(BTreeMap::new())).ok())
        .map_or_else(Vec::new, |figures| number_keys(&figures))
}

/// The unit of a figure, where lengths are in `length`.
fn unit(key: &str, length: &str) -> String {
    let last = key.rsplit('.').next().unwrap_or_default();
    let plain = ["aspect_ratio", "taper_ratio", "solids", "faces", "facets"].contains(&last)
        || key.starts_with("section_fit")
        || !key.contains('.');
    if last.ends_with("incidence") {
        "deg".to_owned()
    } else if plain {
        String::new()
    } else if last.ends_with("area") {
        format!("{length}²")
    } else if last == "volume" {
        format!("{length}³")
    } else {
        length.to_owned()
    }
}
