//! Arguments, standard streams and exit codes, nothing else.

mod arguments;
mod catalogue;
mod check;
mod failure;
mod faults;
mod folder;
mod interrupt;
mod pipeline;
mod progress;
mod run;
mod streams;

use arguments::{Arguments, Command};
use clap::Parser;
use std::process::ExitCode;

/// Runs the command line and gives the exit code: 0 fine, 1 something
/// unexpected, 2 a scenario or arguments that cannot be used, 3 a run that
/// could not go on, 4 a file that could not be read or written, 130 stopped by
/// Ctrl-C.
pub fn main() -> ExitCode {
    let arguments = match Arguments::try_parse() {
        Ok(arguments) => arguments,
        Err(error) => {
            // Help and version come this way too; a reader that has gone away
            // is no fault of theirs.
            let _ = error.print();
            return ExitCode::from(u8::try_from(error.exit_code()).unwrap_or(1));
        }
    };
    let done = match &arguments.command {
        Command::Run(options) => run::run(options),
        Command::Check(options) => check::check(options),
        Command::Catalogue(options) => catalogue::catalogue(options),
    };
    match done {
        Ok(done) => ExitCode::from(done.code()),
        Err(failure) => {
            streams::say(&failure.to_string());
            ExitCode::from(failure.code())
        }
    }
}
