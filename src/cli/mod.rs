//! The command line: arguments, disk, terminal, clock.

mod args;
mod begin;
mod failure;
mod family;
mod inspect;
mod loft;
mod output;
mod section;
mod stamp;

use std::ffi::OsString;
use std::process::ExitCode;

use clap::Parser;

use args::{Arguments, Command};
use failure::Failure;
use output::Output;

/// Exit code where something asked for is out of tolerance.
const OUT_OF_TOLERANCE: u8 = 1;
/// Exit code for bad input, usage or files.
const BAD_INPUT: u8 = 2;
/// Exit code where a run was stopped by a signal: 128 + the interrupt's number, as shells have it.
const STOPPED: u8 = 130;

/// Runs the program with its arguments (the first is its name) and returns its exit code: 0 done, 1 something asked for
/// is out of tolerance or a variant failed, 2 bad input, usage or file, 130 stopped by a signal.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(error) => {
            // help and version are asked for and end well; usage errors go to standard error
            let code = if error.use_stderr() { BAD_INPUT } else { 0 };
            return match error.print() {
                Ok(()) => ExitCode::from(code),
                Err(_) => ExitCode::from(BAD_INPUT),
            };
        }
    };
    let output = Output {
        json: arguments.json,
        quiet: arguments.quiet,
    };
    let result = match &arguments.command {
        Command::Begin => begin::run(&output),
        Command::Inspect(options) => inspect::run(options, &output),
        Command::Family(options) => family::run(options, &output),
        Command::Loft(options) => loft::run(options, &output),
        Command::Section(options) => section::run(options, &output),
    };
    match result {
        Ok(true) => ExitCode::SUCCESS,
        Ok(false) => ExitCode::from(OUT_OF_TOLERANCE),
        Err(failure) => {
            output.complain(&failure);
            ExitCode::from(match failure {
                Failure::Family(family::Trouble::Stopped { .. }) => STOPPED,
                _ => BAD_INPUT,
            })
        }
    }
}
