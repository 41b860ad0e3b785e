//! Why a command did not get done.

use std::process::ExitCode;

use crate::fault::Faults;

/// Why a command did not get done.
#[derive(Debug)]
pub(super) enum Failure {
    /// What the user wrote in files: exit status 2.
    Input(Faults),
    /// What the user asked for: exit status 2.
    Usage(String),
    /// The machine: exit status 3.
    Machine(String),
    /// The faults of files that the machine could not read: exit status 3.
    MachineFaults(Faults),
    /// Whoever read the result has gone: not an error.
    ReaderGone,
}

impl Failure {
    /// A file that cannot be read or written.
    pub(super) fn file(doing: &str, name: &str, error: &std::io::Error) -> Self {
        let text = format!("{doing} {name}: {error}");
        match error.kind() {
            std::io::ErrorKind::NotFound
            | std::io::ErrorKind::AlreadyExists
            | std::io::ErrorKind::IsADirectory
            | std::io::ErrorKind::NotADirectory => Self::Usage(text),
            std::io::ErrorKind::BrokenPipe => Self::ReaderGone,
            _ => Self::Machine(text),
        }
    }

    /// Says it on the error stream.
    pub(super) fn tell(&self) {
        match self {
            Self::Input(faults) | Self::MachineFaults(faults) => anstream::eprint!("{}", faults.render(true)),
            Self::Usage(text) | Self::Machine(text) => anstream::eprintln!("error: {text}"),
            Self::ReaderGone => {}
        }
    }

    pub(super) fn exit_code(&self) -> ExitCode {
        match self {
            Self::Input(_) | Self::Usage(_) => ExitCode::from(2),
            Self::Machine(_) | Self::MachineFaults(_) => ExitCode::from(3),
            Self::ReaderGone => ExitCode::SUCCESS,
        }
    }
}
