//! Builds a family of wings in a Rust program: `cargo run --release --example family -- examples/dunlin.toml target/family`.
//!
//! A use of the library: every combination of some aspect ratios and taper ratios, built on all cores; the figures alone are
//! compared, and the STEP file of the wing with the most volume within a limit of span is written.

use std::error::Error;
use std::ops::ControlFlow;
use std::path::Path;
use std::sync::Mutex;

use spanwise::family::{Family, Plan, Vary};
use spanwise::wing::{Kind, Library};

/// Largest span \[mm\].
const SPAN: f64 = 2600.0;

fn main() -> Result<(), Box<dyn Error>> {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    let [spec, folder] = arguments.as_slice() else {
        return Err("usage: family SPEC FOLDER".into());
    };
    let directory = Path::new(spec).parent().unwrap_or(Path::new(""));
    let family = Family {
        plan: Plan::combinations(vec![
            Vary::parse("planform.aspect_ratio=6..12/13")?,
            Vary::parse("planform.taper_ratio=0.3..0.6/4")?,
        ])?,
        text: std::fs::read_to_string(spec)?,
        file: spec.clone(),
        table: String::new(),
        kinds: vec![Kind::Step],
        time_stamp: "2025-01-01T00:00:00".to_owned(),
        library: Library::new(|name: &str| std::fs::read(directory.join(name))),
    };
    let places: Vec<usize> = (0..family.plan.count()).collect();
    let jobs = std::thread::available_parallelism().map_or(1, |cores| cores.get());
    let best = Mutex::new(None);
    let errors = Mutex::new(Vec::new());
    family.run(
        &places,
        jobs,
        |ready| ControlFlow::Continue(Some(ready)),
        |outcome| {
            match &outcome.record {
                None => {
                    let error = outcome.line.error.unwrap_or_default();
                    errors
                        .lock()
                        .expect("nobody panics with it")
                        .push((outcome.variant.name, error));
                }
                Some(record) if record.reference.span <= SPAN => {
                    let volume = record.built.volume;
                    let mut best = best.lock().expect("nobody panics with it");
                    // equal volumes are told apart by their places, so that the threads' order does not matter
                    let rank = (volume, std::cmp::Reverse(outcome.variant.index));
                    if best.as_ref().is_none_or(|(other, _)| rank > *other) {
                        *best = Some((rank, outcome));
                    }
                }
                Some(_) => {}
            }
            ControlFlow::Continue(())
        },
    )?;
    for (name, error) in errors.into_inner()? {
        eprintln!("{name}: {error}");
    }
    let Some((_, best)) = best.into_inner()? else {
        return Err("no wing is within the span".into());
    };
    println!(
        "{} of {} wings: {}",
        best.variant.name,
        family.plan.count(),
        best.line.varied.get()
    );
    std::fs::create_dir_all(folder)?;
    for (name, bytes) in &best.files {
        std::fs::write(Path::new(folder).join(name), bytes)?;
        println!("Written: {name}");
    }
    Ok(())
}
