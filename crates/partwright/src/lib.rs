//! The command line: arguments, files and reports. What is found is found by `partwright_check`.
//!
//! Results go to standard output, everything else to standard error; both are passed in as a
//! [`Stage`], so that a test can stand in for a terminal.

mod align;
mod arguments;
mod check;
mod files;
mod houses;
mod in_order;
mod judge;
mod known;
mod mend;
mod met;
mod names;
mod outcome;
mod progress;
mod prose;
mod report;
mod rules;
mod save;
mod stage;
mod styles;

pub use outcome::Outcome;
pub use stage::{Output, Stage, Terminal};

use std::ffi::OsString;
use std::io::{self, BufWriter};
use std::process::ExitCode;

use clap::Parser;

use arguments::{Arguments, Command};

/// Runs the program on its own arguments, streams and terminal.
#[must_use]
pub fn main() -> ExitCode {
    let mut input = io::stdin();
    let mut out = BufWriter::new(io::stdout());
    let mut err = io::stderr();
    let mut stage = Stage::new(&mut input, &mut out, &mut err, Terminal::of_this_process());
    run(std::env::args_os(), &mut stage)
}

/// Runs the program on given arguments, the program's name first.
pub fn run(arguments: impl IntoIterator<Item = OsString>, stage: &mut Stage<'_>) -> ExitCode {
    let outcome = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => match arguments.command {
            Command::Check(wanted) => check::run(&wanted, stage),
            Command::Mend(wanted) => mend::run(&wanted, stage),
            Command::Align(wanted) => align::run(&wanted, stage),
            Command::Rules(wanted) => rules::run(&wanted, stage),
            Command::Serve(_) => return partwright_server::serve(),
        },
        Err(message) => spoken(&message, stage),
    };
    outcome.max(stage.finish()).into()
}

/// A word about the arguments: help and version are results, the rest is a wrong call.
fn spoken(message: &clap::Error, stage: &mut Stage<'_>) -> Outcome {
    let text = message.render().to_string();
    if message.use_stderr() {
        stage.complain(&text);
        Outcome::Trouble
    } else {
        stage.out.print(&text);
        Outcome::Clean
    }
}
