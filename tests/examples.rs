//! Every example: lofted by the program, then read back by programs that know nothing of it.

use crate::figures::{Figures, assert_near, assert_relative, distance, millimetres_in};
use crate::python::outside;
use crate::workdir::{Ran, WorkDir, copy_from_package, package};
use std::fs;
use std::path::PathBuf;
use std::sync::LazyLock;

/// An example after it was lofted and read back.
struct Example {
    /// Stem of its file.
    name: String,
    /// The spec, as TOML.
    spec: toml::Table,
    /// What `--json` printed.
    printed: Figures,
    /// The file of figures.
    figures: Figures,
    /// The STEP file's text.
    step_text: String,
    /// What Open CASCADE finds in the STEP file \[mm\].
    step: Figures,
    /// What trimesh finds in the STL files (in the spec's unit).
    stl: Vec<Figures>,
}

impl Example {
    /// Millimetres in one of the example's unit.
    fn unit(&self) -> f64 {
        millimetres_in(self.figures.text("unit"))
    }

    fn sides(&self) -> &str {
        self.spec["build"]["sides"]
            .as_str()
            .expect("each example states its sides")
    }

    fn panels(&self) -> Vec<&toml::Value> {
        self.spec
            .get("panel")
            .and_then(toml::Value::as_array)
            .map_or_else(Vec::new, |list| list.iter().collect())
    }

    /// True where a panel stands steeper than 30°: its chord may lean across the plane of symmetry.
    fn is_steep(&self) -> bool {
        self.panels()
            .iter()
            .any(|panel| number(panel.get("dihedral")).abs() > 30.0)
    }

    /// Largest distance allowed between facet and surface \[mm\].
    fn facet_tolerance(&self) -> f64 {
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
    fn signs(&self) -> &'static [f64] {
        match self.sides() {
            "starboard" => &[1.0],
            "port" => &[-1.0],
            "both" | "pair" => &[1.0, -1.0],
            other => panic!("{other} is no choice of sides"),
        }
    }

    fn is_sharp(&self) -> bool {
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

static EXAMPLES: LazyLock<Vec<Example>> = LazyLock::new(|| {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    let mut specs: Vec<PathBuf> = fs::read_dir(package().join("examples"))
        .expect("the examples")
        .map(|entry| entry.expect("an entry").path())
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
        spec: fs::read_to_string(path).expect("the spec").parse().expect("TOML"),
        printed: Figures::parse(&stdout),
        figures: Figures::parse(&fs::read_to_string(json).expect("the figures")),
        step_text: fs::read_to_string(&step).expect("the STEP file"),
        step: outside("step_read.py", &[step]).list("").remove(0),
        stl: outside("stl_read.py", &stl).list(""),
        name,
    }
}

#[test]
fn every_check_of_every_example_is_met() {
    for Example { name, figures, .. } in EXAMPLES.iter() {
        let checks = figures.list("checks");
        assert!(checks.len() >= 8, "{name}: {} checks", checks.len());
        for check in checks {
            let quantity = check.text("quantity");
            let (off, allowed) = (check.number("deviation").abs(), check.number("allowed"));
            assert!(check.truth("ok"), "{name}: {quantity}: {:?}", check.0);
            assert!(
                off <= allowed,
                "{name}: {quantity} is called ok at {off:e}, allowed {allowed:e}"
            );
            assert_near(
                &format!("{name}: deviation of {quantity}"),
                off,
                (check.number("built") - check.number("asked")).abs(),
                1e-9 * check.number("asked").abs().max(1.0),
            );
        }
    }
}

#[test]
fn the_figures_printed_are_the_figures_written() {
    for Example {
        name,
        printed,
        figures,
        ..
    } in EXAMPLES.iter()
    {
        assert_eq!(printed.0, figures.0, "{name}");
    }
}

#[test]
fn open_cascade_reads_every_example_without_a_message() {
    for Example { name, step, .. } in EXAMPLES.iter() {
        assert!(step.truth("readable"), "{name}: {:?}", step.at("messages"));
        assert!(
            step.list("messages").is_empty(),
            "{name}: {:?}",
            step.at("messages")
        );
    }
}

#[test]
fn each_example_is_one_valid_closed_solid_or_two_for_a_pair() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let solids = step.list("solids");
        assert_eq!(
            solids.len(),
            if example.sides() == "pair" { 2 } else { 1 },
            "{name}"
        );
        assert_eq!(solids.len(), figures.count("built.solids"), "{name}");
        assert!(step.truth("valid"), "{name}");
        assert_eq!(step.count("faces_outside_solids"), 0, "{name}");
        for solid in solids {
            for quality in ["valid", "closed", "outward"] {
                assert!(solid.truth(quality), "{name} is not {quality}");
            }
        }
    }
}

#[test]
fn open_cascade_widens_no_tolerance() {
    for Example { name, step, .. } in EXAMPLES.iter() {
        assert_near(
            &format!("{name}: largest tolerance [mm]"),
            step.number("max_tolerance"),
            0.0,
            1e-6,
        );
    }
}

#[test]
fn volume_and_centroid_agree_with_open_cascade() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let unit = example.unit();
        let volume = figures.number("built.volume") * unit.powi(3);
        assert_relative(
            &format!("{name}: volume [mm3]"),
            volume,
            step.number("volume"),
            1e-6,
        );
        let solids = step.list("solids");
        let sizes = solids
            .iter()
            .map(|solid| distance(solid.point("bounds.0"), solid.point("bounds.1")));
        let size = sizes.fold(0.0, f64::max);
        let centroid = figures
            .point("built.centroid")
            .map(|coordinate| coordinate * unit);
        let off = distance(centroid, step.point("centroid"));
        assert_near(&format!("{name}: centroid [mm]"), off, 0.0, 1e-6 * size);
    }
}

#[test]
fn there_are_no_needless_faces() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let solids = step.list("solids");
        let halves = if example.sides() == "both" { 2 } else { 1 };
        let around = if example.is_sharp() { 2 } else { 3 };
        let one = halves * around * example.panels().len().max(1) + 2;
        for solid in &solids {
            assert_eq!(solid.list("faces").len(), one, "{name}");
        }
        assert_eq!(figures.count("built.faces"), one * solids.len(), "{name}");
    }
}

#[test]
fn the_mean_aerodynamic_chord_lies_where_the_figures_say() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let unit = example.unit();
        let mac = |key: &str| figures.number(&format!("reference.mac.{key}"));
        let (length, y) = (mac("length") * unit, mac("y").abs() * unit);
        let incidence = mac("incidence").to_radians();
        for sign in example.signs() {
            let nose = [mac("x_le") * unit, sign * y, mac("z_le") * unit];
            let tail = [
                nose[0] + length * incidence.cos(),
                nose[1],
                nose[2] - length * incidence.sin(),
            ];
            let found = step.list("free_edges").into_iter().any(|edge| {
                let (start, end) = (edge.point("start"), edge.point("end"));
                let fits = |a, b| {
                    // a steep panel's chord leans out of the upright plane: only its length is known here
                    let far = if example.is_steep() {
                        (distance(a, b) - length).abs()
                    } else {
                        distance(b, tail)
                    };
                    distance(a, nose) <= 1e-5 && far <= 1e-5
                };
                fits(start, end) || fits(end, start)
            });
            assert!(found, "{name}: no line of {length} mm from {nose:?}");
        }
    }
}

#[test]
fn the_aerodynamic_centre_is_a_point_where_the_figures_say() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let centre = figures
            .point("reference.aerodynamic_centre")
            .map(|coordinate| coordinate * example.unit());
        let points = step.list("free_points");
        let nearest = points.iter().map(|point| {
            distance(
                [0, 1, 2].map(|axis: usize| point.number(&axis.to_string())),
                centre,
            )
        });
        assert_near(
            &format!("{name}: aerodynamic centre [mm]"),
            nearest.fold(f64::INFINITY, f64::min),
            0.0,
            1e-5,
        );
    }
}

#[test]
fn every_construction_line_asked_for_is_named_in_the_step_file() {
    for Example {
        name,
        spec,
        step_text,
        ..
    } in EXAMPLES.iter()
    {
        for line in spec
            .get("line")
            .and_then(toml::Value::as_array)
            .into_iter()
            .flatten()
        {
            let label = line["name"].as_str().expect("a name");
            let named = ["TRIMMED_CURVE", "POLYLINE"]
                .iter()
                .any(|entity| step_text.contains(&format!("{entity}('{label}")));
            assert!(named, "{name}: no curve named {label}");
        }
    }
}

#[test]
fn trimesh_calls_every_mesh_watertight_and_wound_one_way() {
    for Example {
        name, stl, figures, ..
    } in EXAMPLES.iter()
    {
        for mesh in stl {
            assert!(mesh.truth("watertight"), "{name}: {:?}", mesh.0);
            assert!(mesh.truth("winding_consistent"), "{name}: {:?}", mesh.0);
            assert!(mesh.number("volume") > 0.0, "{name}: facets face inward");
            assert_eq!(mesh.count("degenerate_facets"), 0, "{name}: {:?}", mesh.0);
        }
        let facets: usize = stl.iter().map(|mesh| mesh.count("facets")).sum();
        assert_eq!(facets, figures.count("mesh.facets"), "{name}");
        assert!(figures.truth("mesh.watertight"), "{name}");
    }
}

#[test]
fn the_mesh_keeps_the_volume_and_stays_within_its_tolerance() {
    for example in EXAMPLES.iter() {
        let Example {
            name,
            step,
            stl,
            figures,
            ..
        } = example;
        let (unit, tolerance) = (example.unit(), example.facet_tolerance());
        let meshed: f64 = stl.iter().map(|mesh| mesh.number("volume") * unit.powi(3)).sum();
        let allowed = tolerance * figures.number("built.wetted_area") * unit.powi(2);
        assert_near(
            &format!("{name}: volume of the mesh [mm3]"),
            meshed,
            step.number("volume"),
            allowed,
        );
        let deviation = figures.number("mesh.max_deviation") * unit;
        assert!(
            deviation <= tolerance,
            "{name}: {deviation} mm off, {tolerance} mm allowed"
        );
        assert!(
            deviation > 0.0,
            "{name}: facets of a curved surface are off it by something"
        );
    }
}

#[test]
fn the_wetted_area_is_that_of_faces_open_cascade_knows() {
    for example in EXAMPLES.iter() {
        let Example {
            name, step, figures, ..
        } = example;
        let wetted = figures.number("built.wetted_area") * example.unit().powi(2);
        let whole: f64 = step.list("solids").iter().map(|solid| solid.number("area")).sum();
        let skins: f64 = step
            .list("solids")
            .iter()
            .flat_map(|solid| solid.list("faces"))
            .filter(|face| face.text("surface") != "Plane")
            .map(|face| face.number("area"))
            .sum();
        assert!(
            wetted <= whole * (1.0 + 1e-6),
            "{name}: {wetted} mm2 wetted of {whole} mm2 in all"
        );
        assert!(
            wetted >= skins * (1.0 - 1e-6),
            "{name}: {wetted} mm2 wetted, {skins} mm2 of curved skin"
        );
    }
}

#[test]
fn every_example_says_that_its_aircraft_is_invented() {
    for entry in fs::read_dir(package().join("examples")).expect("the examples") {
        let path = entry.expect("an entry").path();
        let text = fs::read_to_string(&path).expect("the spec");
        let comments: String = text.lines().filter(|line| line.starts_with('#')).collect();
        assert!(comments.contains("invented"), "{}", path.display());
    }
}
