//! `spanwise begin`

use super::failure::Failure;
use super::output::Output;
use crate::spec;

/// Prints the starter spec.
pub(super) fn run(output: &Output) -> Result<bool, Failure> {
    if output.json {
        let text = serde_json::json!({ "spec": spec::starter() });
        output.print(&format!("{text}\n"))?;
    } else {
        output.print(spec::starter())?;
    }
    Ok(true)
}
