//! Numbers out of the program's JSON, and comparisons that say what they compared.

use crate::workdir::{Ran, WorkDir};
use serde_json::Value;

/// A JSON document whose numbers are taken by dotted path.
#[derive(Clone, Debug)]
pub(crate) struct Figures(pub(crate) Value);

impl Figures {
    pub(crate) fn parse(text: &str) -> Self {
        Self(serde_json::from_str(text).unwrap_or_else(|fault| panic!("no JSON ({fault}):\n{text}")))
    }

    /// The value at a dotted path such as `built.volume` or `checks.0.ok`; the whole at the empty path.
    pub(crate) fn at(&self, path: &str) -> &Value {
        path.split('.')
            .filter(|key| !key.is_empty())
            .fold(&self.0, |value, key| {
                let inner = key
                    .parse::<usize>()
                    .map_or_else(|_| value.get(key), |index| value.get(index));
                inner.unwrap_or_else(|| panic!("{path}: no {key} in {value}"))
            })
    }

    pub(crate) fn number(&self, path: &str) -> f64 {
        let value = self.at(path);
        value
            .as_f64()
            .unwrap_or_else(|| panic!("{path} = {value} is no number"))
    }

    pub(crate) fn count(&self, path: &str) -> usize {
        let value = self.at(path);
        let count = value
            .as_u64()
            .unwrap_or_else(|| panic!("{path} = {value} is no count"));
        usize::try_from(count).expect("a count fits")
    }

    pub(crate) fn text(&self, path: &str) -> &str {
        let value = self.at(path);
        value
            .as_str()
            .unwrap_or_else(|| panic!("{path} = {value} is no text"))
    }

    pub(crate) fn truth(&self, path: &str) -> bool {
        let value = self.at(path);
        value
            .as_bool()
            .unwrap_or_else(|| panic!("{path} = {value} is neither true nor false"))
    }

    pub(crate) fn list(&self, path: &str) -> Vec<Self> {
        let value = self.at(path);
        let list = value
            .as_array()
            .unwrap_or_else(|| panic!("{path} = {value} is no list"));
        list.iter().cloned().map(Self).collect()
    }

    pub(crate) fn point(&self, path: &str) -> [f64; 3] {
        [0, 1, 2].map(|axis| self.number(&format!("{path}.{axis}")))
    }
}

/// Millimetres in one of the unit that a document of figures names.
pub(crate) fn millimetres_in(unit: &str) -> f64 {
    match unit {
        "mm" => 1.0,
        "cm" => 10.0,
        "m" => 1000.0,
        "in" => 25.4,
        "ft" => 304.8,
        other => panic!("{other} is no unit of length"),
    }
}

/// Fails unless `got` is within `tolerance` (absolute) of `wanted`.
#[track_caller]
pub(crate) fn assert_near(what: &str, got: f64, wanted: f64, tolerance: f64) {
    let off = (got - wanted).abs();
    // written so that NaN fails
    assert!(
        off <= tolerance,
        "{what}: got {got}, wanted {wanted}; off by {off:e}, allowed {tolerance:e}"
    );
}

/// Fails unless `got` is within `tolerance` times `wanted` of it.
#[track_caller]
pub(crate) fn assert_relative(what: &str, got: f64, wanted: f64, tolerance: f64) {
    assert_near(what, got, wanted, tolerance * wanted.abs());
}

/// Distance between two points.
pub(crate) fn distance(a: [f64; 3], b: [f64; 3]) -> f64 {
    (0..3).map(|axis| (a[axis] - b[axis]).powi(2)).sum::<f64>().sqrt()
}

/// Lofts a spec, which must succeed, into the directory `out`; gives the figures that `--json` prints.
#[track_caller]
pub(crate) fn loft(directory: &WorkDir, spec: &str) -> Figures {
    directory.write("wing.toml", spec);
    let Ran { code, stdout, stderr } = directory.run(&["loft", "wing.toml", "-o", "out", "--json"]);
    assert_eq!(code, Some(0), "{stderr}\n{stdout}\nof the spec\n{spec}");
    Figures::parse(&stdout)
}
