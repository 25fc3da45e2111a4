//! Integration tests: one binary, a module a subject.

// helpers
mod figures; // numbers out of the program's JSON, and comparisons that say what they compared
mod lofted; // the examples, each lofted once and read back
mod python; // the readers from outside (Open CASCADE, trimesh) in a pinned environment under target/
mod refusal; // sound specs to spoil, and the demands on every refusal
mod source; // Rust source as tokens, for the test on the modules' order
mod workdir; // a directory of its own for a run of the program

// subjects
mod bad_files; // missing, malformed and unwritable files, wrong usage: nothing is left behind
mod bad_spec; // faults of a spec: what is said about them
mod drawing; // the dimensioned drawing: labels apart, figures as in the JSON, hostile names
mod examples; // every example, as programs see it that know nothing of this one
mod family; // families of wings: tables, files and figures that belong together
mod family_outside; // a mixed family read back from outside; the examples of families, run
mod family_refused; // bad tables, sweeps, names and specs: refused before work
mod family_stopped; // killed, interrupted, run twice at once, gone on with
mod inspecting; // the command that reads files back: tables, JSON, exit codes
mod known_answers; // closed forms and published wings
mod layers; // each module imports only from those before it
mod own_sections; // the coordinate files are what their headers say
mod readme; // the README shows the program's real output
mod report; // the report page: whole, self-contained, names are text
mod same_bytes; // same input, same bytes
mod section;
mod sized; // wings sized by what they carry
mod step_edits; // single edits of a STEP file are found or harmless; what is no STEP file is refused
mod step_forms; // every unit, side, schema and form of reference geometry, read by Open CASCADE and by inspect // `section`, and sections with changes in a wing
