//! The command line of spanwise.

use std::process::ExitCode;

fn main() -> ExitCode {
    spanwise::cli::run(std::env::args_os())
}
