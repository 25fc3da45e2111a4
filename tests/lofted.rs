//! The examples, each lofted once and read back from outside, for all tests that look at them.

use crate::figures::{Figures, millimetres_in};
use crate::python::outside;
use crate::workdir::{Ran, WorkDir, copy_from_package, package};
use std::fs;
use std::path::PathBuf;
use std::sync::LazyLock;

/// An example after it was lofted and read back.
pub(crate) struct Example {
    /// Stem of its file.
    pub(crate) name: String,
    /// The spec, as TOML.
    pub(crate) spec: toml::Table,
    /// What `--json` printed.
    pub(crate) printed: Figures,
    /// The file of figures.
    pub(crate) figures: Figures,
    /// The STEP file's text.
    pub(crate) step_text: String,
    /// What Open CASCADE finds in the STEP file \[mm\].
    pub(crate) step: Figures,
    /// What trimesh finds in the STL files (in the spec's unit).
    pub(crate) stl: Vec<Figures>,
}

impl Example {
    /// Millimetres in one of the example's unit.
    pub(crate) fn unit(&self) -> f64 {
        millimetres_in(self.figures.text("unit"))
    }

    pub(crate) fn sides(&self) -> &str {
        self.spec["build"]["sides"]
            .as_str()
            .expect("each example states its sides")
    }

    pub(crate) fn panels(&self) -> Vec<&toml::Value> {
        self.spec
            .get("panel")
            .and_then(toml::Value::as_array)
            .map_or_else(Vec::new, |list| list.iter().collect())
    }

    /// True where a panel stands steeper than 30°: its chord may lean across the plane of symmetry.
    pub(crate) fn is_steep(&self) -> bool {
        self.panels()
            .iter()
            .any(|panel| number(panel.get("dihedral")).abs() > 30.0)
    }

    /// Largest distance allowed between facet and surface \[mm\].
    pub(crate) fn facet_tolerance(&self) -> f64 {
        let asked = self.spec.get("facets").and_then(|table| table.get("tolerance"));
        match asked {
            None => 0.05,
            Some(toml::Value::String(text)) => {
                let (value, unit) = text.split_once(' ').expect("a value and a unit");
                value.parse::<f64>().expect("a number") * millimetres_in(unit)
            }
            bare => number(bare) * self.unit(),
        }
    }

    /// Signs of y on the sides that are built.
    pub(crate) fn signs(&self) -> &'static [f64] {
        match self.sides() {
            "starboard" => &[1.0],
            "port" => &[-1.0],
            "both" | "pair" => &[1.0, -1.0],
            other => panic!("{other} is no choice of sides"),
        }
    }

    pub(crate) fn is_sharp(&self) -> bool {
        let thickness = self
            .spec
            .get("trailing_edge")
            .and_then(|table| table.get("thickness"));
        thickness.is_some_and(|value| value.as_integer() == Some(0) || value.as_float() == Some(0.0))
    }
}

fn number(value: Option<&toml::Value>) -> f64 {
    match value {
        Some(toml::Value::Float(number)) => *number,
        Some(toml::Value::Integer(number)) => f64::from(i32::try_from(*number).expect("a small number")),
        None => 0.0,
        other => panic!("{other:?} is no bare number"),
    }
}

pub(crate) static EXAMPLES: LazyLock<Vec<Example>> = LazyLock::new(|| {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    let mut specs: Vec<PathBuf> = fs::read_dir(package().join("examples"))
        .expect("the examples")
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .collect();
    specs.sort();
    let examples: Vec<Example> = specs.iter().map(|path| lofted(&directory, path)).collect();
    assert!(examples.len() >= 5, "examples from simple to hard");
    examples
});

fn lofted(directory: &WorkDir, path: &std::path::Path) -> Example {
    let name = path
        .file_stem()
        .and_then(|stem| stem.to_str())
        .expect("a plain name")
        .to_owned();
    let file = format!("examples/{name}.toml");
    let out = format!("out/{name}");
    let Ran { code, stdout, stderr } = directory.run(&["loft", &file, "-o", &out, "--json"]);
    assert_eq!(code, Some(0), "{name}:\n{stderr}\n{stdout}");
    let written = |end: &str| -> Vec<PathBuf> {
        let mut found: Vec<PathBuf> = fs::read_dir(directory.join(&out))
            .expect("the directory of the output")
            .map(|entry| entry.expect("an entry").path())
            .filter(|path| path.extension().is_some_and(|extension| extension == end))
            .collect();
        found.sort();
        found
    };
    let [step, json] = ["step", "json"].map(|end| match written(end).as_slice() {
        [only] if *only == directory.join(&out).join(format!("{name}.{end}")) => only.clone(),
        other => panic!("{name}: one .{end} file of that name, not {other:?}"),
    });
    let stl = written("stl");
    assert!(!stl.is_empty(), "{name}: an STL file");
    Example {
        spec: fs::read_to_string(path)
            .expect("the spec")
            .parse()
            .unwrap_or_else(|_| panic!("{}: no TOML", path.display())),
        printed: Figures::parse(&stdout),
        figures: Figures::parse(&fs::read_to_string(json).expect("the figures")),
        step_text: fs::read_to_string(&step).expect("the STEP file"),
        step: outside("step_read.py", &[step]).list("").remove(0),
        stl: outside("stl_read.py", &stl).list(""),
        name,
    }
}
