//! Every example: lofted by the program, then read back by programs that know nothing of it.

use crate::figures::{assert_near, assert_relative, distance};
use crate::lofted::{EXAMPLES, Example};
use crate::workdir::package;
use std::fs;

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
                let fits = |a: [f64; 3], b| {
                    if example.is_steep() {
                        // the chord may lean out of the upright plane: its y is not that of its place in the plan
                        let aside = (a[0] - nose[0]).hypot(a[2] - nose[2]);
                        aside <= 1e-5 && a[1] * sign >= -1e-5 && (distance(a, b) - length).abs() <= 1e-5
                    } else {
                        distance(a, nose) <= 1e-5 && distance(b, tail) <= 1e-5
                    }
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
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let text = fs::read_to_string(&path).expect("the spec");
        let comments: String = text.lines().filter(|line| line.starts_with('#')).collect();
        assert!(comments.contains("invented"), "{}", path.display());
    }
}
