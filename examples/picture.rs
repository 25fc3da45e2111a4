//! Makes the pictures of the README: a shaded view of a wing and its dimensioned drawing.
//!
//! `cargo run --release --example picture -- examples/corrie.toml examples/corrie.svg examples/corrie-drawing.svg`

use std::error::Error;
use std::path::Path;

use spanwise::spec::Source;
use spanwise::wing::{Wing, prepare};

fn main() -> Result<(), Box<dyn Error>> {
    let arguments: Vec<String> = std::env::args().skip(1).collect();
    let [spec, picture, drawing] = arguments.as_slice() else {
        return Err("usage: picture SPEC PICTURE.svg DRAWING.svg".into());
    };
    let text = std::fs::read_to_string(spec)?;
    let directory = Path::new(spec).parent().unwrap_or(Path::new(""));
    let source = Source {
        text: &text,
        file: spec,
        set: &[],
    };
    let prepared = prepare(&source, &|name| std::fs::read(directory.join(name))).map_err(|faults| {
        faults
            .iter()
            .map(ToString::to_string)
            .collect::<Vec<_>>()
            .join("\n")
    })?;
    let wing = Wing::build(&prepared)?;
    std::fs::write(picture, wing.picture())?;
    std::fs::write(drawing, wing.drawing(None))?;
    Ok(())
}
