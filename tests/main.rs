//! Integration tests: one binary, a module a subject.

// helpers
mod figures; // numbers out of the program's JSON, and comparisons that say what they compared
mod python; // the readers from outside (Open CASCADE, trimesh) in a pinned environment under target/
mod source; // Rust source as tokens, for the test on the modules' order
mod workdir; // a directory of its own for a run of the program

// subjects
mod bad_input; // what is refused, how it is said, and that nothing is left behind
mod examples; // every example: lofted, then read back by programs that know nothing of this one
mod known_answers; // closed forms and published wings
mod layers; // each module imports only from those before it
mod own_sections; // the coordinate files are what their headers say
mod readme; // the README shows the program's real output
mod same_bytes; // same input, same bytes
