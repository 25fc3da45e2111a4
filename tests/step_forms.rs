//! Every example in every unit, every `sides`, both schemas and every form of reference geometry: read by Open CASCADE
//! and by `inspect`, both without a word of complaint.
//!
//! A wing is built once for each `sides`; unit, schema and form then make a file each. Every example meets every unit, and
//! over the examples every pair of unit, schema, form and sides occurs; the first example meets every combination of
//! form, schema and sides.

use std::collections::BTreeSet;
use std::path::PathBuf;

use spanwise::inspect::{Report, inspect};
use spanwise::spec::{Sides, Source, StepReference, StepSchema, Unit};
use spanwise::wing::{Options, Wing, prepare};

use crate::figures::{Figures, assert_near, assert_relative, distance};
use crate::python::outside;
use crate::workdir::{WorkDir, package};

const UNITS: [Unit; 5] = [
    Unit::Millimetre,
    Unit::Centimetre,
    Unit::Metre,
    Unit::Inch,
    Unit::Foot,
];
const SCHEMAS: [StepSchema; 2] = [StepSchema::Ap242, StepSchema::Ap214];
const FORMS: [StepReference; 5] = [
    StepReference::Both,
    StepReference::Construction,
    StepReference::Wireframe,
    StepReference::Parts,
    StepReference::None,
];
const SIDES: [&str; 4] = ["both", "starboard", "port", "pair"];

/// One file of a wing.
struct Form {
    label: String,
    wing: Wing,
    text: String,
}

/// The wing of an example with sides of its own; `None` for both sides of a fin.
fn wing(path: &PathBuf, sides: &str) -> Option<Wing> {
    let text = std::fs::read_to_string(path).expect("an example");
    let set = [("build.sides".to_owned(), sides.to_owned())];
    let source = Source {
        text: &text,
        file: path.to_str().expect("a plain name"),
        set: &set,
    };
    let folder = path.parent().expect("a folder");
    let prepared = match prepare(&source, &|name| std::fs::read(folder.join(name))) {
        Ok(prepared) => prepared,
        Err(faults) => {
            let fin = faults.iter().all(|fault| fault.to_string().contains("fin"));
            assert!(fin && ["both", "pair"].contains(&sides), "{faults:?}");
            return None;
        }
    };
    Some(Wing::build(&prepared).expect("a wing"))
}

/// A file of a wing.
fn form(name: &str, wing: &Wing, unit: Unit, schema: StepSchema, reference: StepReference) -> Form {
    let mut wing = wing.clone();
    wing.spec.unit = unit;
    (wing.spec.step.schema, wing.spec.step.reference) = (schema, reference);
    let label = format!("{name}-{:?}-{unit:?}-{schema:?}-{reference:?}", wing.spec.sides).to_lowercase();
    let options = Options {
        time_stamp: "2025-01-01T00:00:00",
        id: &label,
    };
    let text = String::from_utf8(wing.step(options).expect("a file")).expect("ASCII");
    Form { label, wing, text }
}

fn forms() -> Vec<Form> {
    let mut paths: Vec<PathBuf> = (std::fs::read_dir(package().join("examples")).expect("the examples"))
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "toml"))
        .collect();
    paths.sort();
    let mut forms = Vec::new();
    for (e, path) in paths.iter().enumerate() {
        let name = path
            .file_stem()
            .and_then(|stem| stem.to_str())
            .expect("a plain name");
        let wings: Vec<Wing> = SIDES.iter().filter_map(|sides| wing(path, sides)).collect();
        for (u, unit) in UNITS.into_iter().enumerate() {
            let wing = &wings[(e + u) % wings.len()];
            forms.push(form(
                name,
                wing,
                unit,
                SCHEMAS[(e + u / 2) % 2],
                FORMS[(2 * e + 3 * u) % 5],
            ));
        }
        if e == 0 {
            for wing in &wings {
                for schema in SCHEMAS {
                    for reference in FORMS {
                        forms.push(form(name, wing, Unit::Millimetre, schema, reference));
                    }
                }
            }
        }
    }
    forms
}

/// Colours in a file, in thousandths: of surfaces, and of curves.
fn colours(text: &str) -> [BTreeSet<[u32; 3]>; 2] {
    let line = |id: &str| {
        let start = format!("#{id}=COLOUR_RGB('',");
        let found = text
            .lines()
            .find_map(|line| line.strip_prefix(&start))
            .expect("a colour");
        let parts = found.trim_end_matches(");").split(',');
        let parts: Vec<u32> = parts
            .map(|part| (1000.0 * part.parse::<f64>().expect("a number")).round())
            .map(|x| format!("{x}").parse().expect("a whole number"))
            .collect();
        <[u32; 3]>::try_from(parts).expect("three parts")
    };
    let of = |entity: &str| {
        (text.lines().filter(|line| line.contains(entity)))
            .map(|found| {
                line(
                    found
                        .trim_end_matches(");")
                        .rsplit_once('#')
                        .expect("a reference")
                        .1,
                )
            })
            .collect()
    };
    [of("=FILL_AREA_STYLE_COLOUR("), of("=CURVE_STYLE(")]
}

/// Names of the layers in a file.
fn layers(text: &str) -> Vec<&str> {
    let names = text
        .lines()
        .filter_map(|line| line.split_once("=PRESENTATION_LAYER_ASSIGNMENT('"));
    names
        .map(|(_, rest)| rest.split('\'').next().expect("a name"))
        .collect()
}

#[track_caller]
fn check_outside(Form { label, wing, text }: &Form, found: &Figures) {
    assert!(found.truth("readable"), "{label}: {:?}", found.at("messages"));
    assert!(
        found.list("messages").is_empty(),
        "{label}: {:?}",
        found.at("messages")
    );
    assert!(found.truth("valid"), "{label}");
    assert_eq!(found.count("solids"), wing.solids.len(), "{label}");
    let faces: usize = wing.solids.iter().map(|solid| solid.faces.len()).sum();
    assert_eq!(found.count("faces"), faces, "{label}");
    assert_near(
        &format!("{label}: largest tolerance [mm]"),
        found.number("max_tolerance"),
        0.0,
        1e-6,
    );

    // figures that the file states, as the reader understands them; the reader adds figures of assemblies' parts up
    for (k, figures) in wing.figures.iter().enumerate() {
        let at = |key: &str| -> Vec<f64> { found.list(key).iter().map(|value| value.number("")).collect() };
        let near = |key: &str, wanted: f64| {
            let best = at(key)
                .into_iter()
                .map(|x| (x / wanted - 1.0).abs())
                .fold(f64::INFINITY, f64::min);
            assert_near(&format!("{label}: {key} of solid {k}"), best, 0.0, 1e-12);
        };
        near("volumes", figures.volume);
        near("areas", figures.surface_area);
        let off = (found.list("centroids").iter())
            .map(|centroid| distance(centroid.point(""), figures.centroid.into()))
            .fold(f64::INFINITY, f64::min);
        assert_near(&format!("{label}: centroid of solid {k} [mm]"), off, 0.0, 1e-9);
    }

    let form = wing.spec.step.reference;
    let shown = matches!(
        form,
        StepReference::Both | StepReference::Wireframe | StepReference::Parts
    );
    // the parts of an assembly have construction geometry of their own nowhere
    let pieces: usize = wing
        .reference
        .lines
        .iter()
        .map(|line| line.points.len() - 1)
        .sum();
    let lengths: Vec<f64> = found
        .list("lengths")
        .iter()
        .map(|length| length.number(""))
        .collect();
    assert_eq!(lengths.len(), if shown { pieces } else { 0 }, "{label}: lines");
    assert_eq!(
        found.count("points"),
        if shown { wing.reference.points.len() } else { 0 },
        "{label}: points"
    );
    if shown {
        let wanted: f64 = (wing
            .reference
            .lines
            .iter()
            .flat_map(|line| line.points.windows(2)))
        .map(|pair| (pair[1] - pair[0]).norm())
        .sum();
        assert_relative(
            &format!("{label}: length of all lines"),
            lengths.iter().sum(),
            wanted,
            1e-12,
        );
    }

    let names: Vec<String> = found
        .list("names")
        .iter()
        .map(|name| name.text("").to_owned())
        .collect();
    let named = |name: &str| names.iter().any(|known| known == name);
    assert!(named(&wing.spec.name), "{label}: {names:?}");
    if wing.spec.sides == Sides::Pair || form == StepReference::Parts {
        assert!(
            wing.solids.iter().all(|solid| named(&solid.name)) || wing.solids.len() == 1,
            "{label}: {names:?}"
        );
    }
    if form == StepReference::Parts {
        for line in &wing.reference.lines {
            assert!(named(&line.name), "{label}: no {} in {names:?}", line.name);
        }
    }

    let [surfaces, curves] = colours(text);
    let wanted: BTreeSet<[u32; 3]> = if shown {
        surfaces.union(&curves).copied().collect()
    } else {
        surfaces
    };
    let colours: BTreeSet<[u32; 3]> = (found.list("colours").iter())
        .map(|rgb| ["0", "1", "2"].map(|part| u32::try_from(rgb.count(part)).expect("a small number")))
        .collect();
    assert_eq!(colours, wanted, "{label}: colours");

    let found: BTreeSet<String> = found
        .list("layers")
        .iter()
        .map(|layer| layer.text("").to_owned())
        .collect();
    let wanted: BTreeSet<String> = (layers(text).into_iter())
        .filter(|layer| shown || *layer == "WING_SOLID")
        .map(str::to_owned)
        .collect();
    // without a wireframe the reader may still list layers of what it leaves out
    assert!(
        found.is_superset(&wanted),
        "{label}: layers {found:?}, wanted {wanted:?}"
    );
}

#[track_caller]
fn check_own(Form { label, wing, text }: &Form) {
    let report = inspect(text.as_bytes(), label).expect("a file that can be read");
    assert!(report.findings().is_empty(), "{label}: {:?}", report.findings());
    let Report::Step(report) = report else {
        panic!("{label}: a STEP file")
    };
    let unit = wing.spec.unit;
    assert_eq!(report.unit, unit.symbol(), "{label}");
    assert_eq!(report.solids.len(), wing.solids.len(), "{label}");
    for (solid, figures) in report.solids.iter().zip(&wing.figures) {
        let measured = solid.measured.as_ref().expect("every face is measured");
        let scale = unit.millimetres();
        assert_relative(
            &format!("{label}: volume"),
            measured.volume * scale.powi(3),
            figures.volume,
            1e-10,
        );
        assert!(solid.closed, "{label}");
    }
    let drawn = wing.spec.step.reference != StepReference::None;
    assert_eq!(
        report.lines.len(),
        if drawn { wing.reference.lines.len() } else { 0 },
        "{label}"
    );
    for (line, asked) in report.lines.iter().zip(&wing.reference.lines) {
        assert_eq!(
            (&line.name, line.points.len()),
            (&asked.name, asked.points.len()),
            "{label}"
        );
    }
    assert_eq!(
        report.points.len(),
        if drawn { wing.reference.points.len() } else { 0 },
        "{label}"
    );
    assert!(
        report.not_read.is_empty() && report.notes.is_empty(),
        "{label}: {:?}",
        report.notes
    );
}

#[test]
fn every_form_is_read_by_open_cascade_and_by_inspect() {
    let forms = forms();
    assert!(forms.len() >= 80);
    forms.iter().for_each(check_own);
    let directory = WorkDir::new();
    let paths: Vec<PathBuf> = (forms.iter().enumerate())
        .map(|(i, form)| directory.write(&format!("{i}-{}.step", form.label), &form.text))
        .collect();
    let found = outside("step_forms.py", &paths).list("");
    let find = |path: &PathBuf| {
        let path = path.to_str().expect("a plain name");
        found.iter().find(|found| found.text("file") == path)
    };
    for (form, path) in forms.iter().zip(&paths) {
        check_outside(
            form,
            find(path).unwrap_or_else(|| panic!("{}: the reader ended before", form.label)),
        );
    }
}
