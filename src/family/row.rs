//! A variant's row in `family.csv`.

use serde_json::Value;

use super::line::Line;
use super::plan::{Plan, Variant};

/// Figures of the table: dotted keys of a wing's figures, the same as in its JSON file.
const FIGURES: [&str; 22] = [
    "unit",
    "reference.area",
    "reference.span",
    "reference.aspect_ratio",
    "reference.taper_ratio",
    "reference.root_chord",
    "reference.tip_chord",
    "reference.mac.length",
    "reference.mac.y",
    "reference.mac.x_le",
    "reference.mac.z_le",
    "reference.mac.incidence",
    "built.volume",
    "built.wetted_area",
    "built.planform_area",
    "built.span",
    "built.solids",
    "built.faces",
    "section_fit.max_deviation",
    "mesh.facets",
    "mesh.max_deviation",
    "mesh.watertight",
];

/// The column of the incidence at the root, as it was measured on the solid \[deg\].
const ROOT_INCIDENCE: &str = "root_incidence";
/// The check that measured it.
const ROOT_INCIDENCE_CHECK: &str = "incidence at the root";
/// The column of the largest deviation of all checks, in parts of what is allowed \[-\].
const WORST_CHECK: &str = "worst_check";

/// The headers: the variant's name, what is varied, status, figures, notes, error.
pub fn header(plan: &Plan) -> Vec<String> {
    (std::iter::once("name"))
        .chain(plan.keys().iter().map(String::as_str))
        .chain(["status"])
        .chain(FIGURES)
        .chain([ROOT_INCIDENCE, WORST_CHECK, "notes", "error"])
        .map(str::to_owned)
        .collect()
}

/// The fields of a row, in the order of the [`header`]. Lengths are in the wing's unit, angles in degrees; figures of a
/// variant that was not built are empty.
pub fn row(variant: &Variant, line: &Line) -> Vec<String> {
    let figures = figures(line);
    let mut fields = vec![line.name.clone()];
    fields.extend(variant.values.iter().cloned());
    fields.push(line.status.word().to_owned());
    fields.extend(FIGURES.map(|key| at(&figures, key).map_or_else(String::new, text)));
    for key in [ROOT_INCIDENCE, WORST_CHECK] {
        fields.push(number(&figures, key).map_or_else(String::new, |number| number.to_string()));
    }
    let notes = figures["notes"].as_array().map(Vec::as_slice).unwrap_or_default();
    fields.push(
        notes
            .iter()
            .filter_map(Value::as_str)
            .collect::<Vec<_>>()
            .join(" | "),
    );
    fields.push(line.error.clone().unwrap_or_default().replace('\n', " | "));
    fields
}

/// A line's figures; null where there are none.
pub(super) fn figures(line: &Line) -> Value {
    line.figures
        .as_ref()
        .and_then(|raw| serde_json::from_str(raw.get()).ok())
        .unwrap_or_default()
}

/// A figure by its dotted key, or by the name of one of the table's own columns.
pub(super) fn number(figures: &Value, key: &str) -> Option<f64> {
    match key {
        ROOT_INCIDENCE => checks(figures)
            .find(|check| check["quantity"] == ROOT_INCIDENCE_CHECK)
            .and_then(|check| check["built"].as_f64()),
        WORST_CHECK => checks(figures)
            .filter_map(|check| Some(check["deviation"].as_f64()?.abs() / check["allowed"].as_f64()?))
            .reduce(f64::max),
        _ => at(figures, key)?.as_f64(),
    }
}

fn checks(figures: &Value) -> impl Iterator<Item = &Value> {
    figures["checks"].as_array().into_iter().flatten()
}

fn at<'a>(figures: &'a Value, key: &str) -> Option<&'a Value> {
    key.split('.').try_fold(figures, |value, part| {
        part.parse::<usize>()
            .map_or_else(|_| value.get(part), |index| value.get(index))
    })
}

/// A value as a field; whole numbers without a decimal point.
fn text(value: &Value) -> String {
    match value {
        Value::String(text) => text.clone(),
        Value::Null => String::new(),
        other => {
            let text = other.to_string();
            text.strip_suffix(".0").map(str::to_owned).unwrap_or(text)
        }
    }
}

/// The dotted keys of all numbers among some figures but those of the checks, which are a list without names; then the
/// table's own columns.
pub(super) fn number_keys(figures: &Value) -> Vec<String> {
    fn walk(value: &Value, path: &str, keys: &mut Vec<String>) {
        let join = |name: &str| {
            if path.is_empty() {
                name.to_owned()
            } else {
                format!("{path}.{name}")
            }
        };
        match value {
            Value::Number(_) => keys.push(path.to_owned()),
            Value::Object(members) => {
                for (name, value) in members {
                    walk(value, &join(name), keys);
                }
            }
            Value::Array(items) if path != "checks" => {
                for (i, value) in items.iter().enumerate() {
                    walk(value, &join(&i.to_string()), keys);
                }
            }
            _ => {}
        }
    }
    let mut keys = Vec::new();
    walk(figures, "", &mut keys);
    keys.extend([ROOT_INCIDENCE, WORST_CHECK].map(str::to_owned));
    keys
}
