//! How a command ends.

use crate::show::files::FilesError;
use std::io;
use std::path::{Path, PathBuf};

/// A command that did what it could.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Done {
    /// All of it.
    Fine,
    /// The run could not go on; what exists is kept.
    CouldNotGoOn,
    /// Ctrl-C; what exists is kept.
    Stopped,
}

impl Done {
    /// Exit code.
    pub fn code(self) -> u8 {
        match self {
            Done::Fine => 0,
            Done::CouldNotGoOn => 3,
            Done::Stopped => 130,
        }
    }
}

/// A command that failed; the text goes to standard error.
#[derive(Debug, thiserror::Error)]
pub enum Failure {
    /// A scenario with faults, already told.
    #[error("Nothing was run and nothing was written.")]
    Scenario,
    /// A scenario that passed the checks and still cannot be used.
    #[error("{0}\nNothing was run and nothing was written.")]
    Unusable(String),
    /// Arguments that do not go together.
    #[error("{0}")]
    Arguments(String),
    /// The scenario cannot be read.
    #[error("cannot read {}: {source}", .path.display())]
    Read {
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// The results cannot be written.
    #[error("cannot write the results: {0}")]
    Write(#[from] FilesError),
    /// Standard output cannot be written.
    #[error("cannot write to standard output: {0}")]
    Output(io::Error),
    /// Something that should not happen.
    #[error("unexpected: {0}")]
    Unexpected(String),
}

impl Failure {
    /// The scenario at `path` cannot be read.
    pub fn read(path: &Path, source: io::Error) -> Self {
        Failure::Read {
            path: path.to_owned(),
            source,
        }
    }

    /// Exit code.
    pub fn code(&self) -> u8 {
        match self {
            Failure::Unexpected(_) => 1,
            Failure::Scenario | Failure::Unusable(_) | Failure::Arguments(_) => 2,
            Failure::Read { .. } | Failure::Write(_) | Failure::Output(_) => 4,
        }
    }
}
