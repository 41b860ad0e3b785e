//! The command line: read, ask, show. No logic here that a user of the library would miss.

mod account;
mod args;
mod audit;
mod failure;
mod fate;
mod input;
mod named;
mod output;
mod rail;
mod saved;
mod shortlist;
mod starter;
mod watch;

use std::ffi::OsString;
use std::process::ExitCode;

use clap::Parser;

use args::{Arguments, Command};

/// How a command ended well.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Done {
    /// Exit status 0.
    Well,
    /// Exit status 1: done, but nothing meets the limits, or something is doubtful.
    NothingPasses,
    /// Exit status 2: the result tells what is bad in the input.
    BadInput,
    /// Exit status 130: the user stopped it, as a shell counts a process ended by Ctrl-C.
    Stopped,
}

/// Runs one command; its exit status: 0 done, 1 done but nothing meets the limits, 2 bad input or usage, 3 the machine failed.
pub fn run(arguments: impl IntoIterator<Item = OsString>) -> ExitCode {
    let arguments = match Arguments::try_parse_from(arguments) {
        Ok(arguments) => arguments,
        Err(error) => {
            // Nobody reads a closed terminal: there is nothing left to tell.
            let _ = error.print();
            return ExitCode::from(if error.use_stderr() { 2 } else { 0 });
        }
    };
    let color = match &arguments.command {
        Command::Shortlist(command) => command.common.color,
        Command::Account(command) => command.common.color,
        Command::Fate(command) => command.common.color,
        Command::Rail(command) => command.common.color,
        Command::Audit(command) => command.common.color,
        Command::Starter(_) => args::Color::Auto,
    };
    color.apply();
    let done = match &arguments.command {
        Command::Shortlist(command) => shortlist::run(command),
        Command::Account(command) => account::run(command),
        Command::Fate(command) => fate::run(command),
        Command::Rail(command) => rail::run(command),
        Command::Audit(command) => audit::run(command),
        Command::Starter(command) => starter::run(command),
    };
    match done {
        Ok(Done::Well) => ExitCode::SUCCESS,
        Ok(Done::NothingPasses) => ExitCode::from(1),
        Ok(Done::BadInput) => ExitCode::from(2),
        Ok(Done::Stopped) => ExitCode::from(130),
        Err(failure) => {
            failure.tell();
            failure.exit_code()
        }
    }
}
