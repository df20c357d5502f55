//! Why a command could not be carried out, how it is said and with which exit code.

use super::{complain, interrupt};
use std::io;
use std::path::PathBuf;
use std::process::ExitCode;
use swaybound::exact::Unsolvable;
use swaybound::frame::file::FileFault;
use swaybound::frame::template::TemplateFault;
use swaybound::report::Fault as ReportFault;
use swaybound::report::figure::PngError;
use swaybound::store::StoreFault;
use thiserror::Error;

/// A command's failure.
#[derive(Debug, Error)]
pub(super) enum Failure {
    /// The frame file is at fault.
    #[error("{fault}")]
    File {
        /// What is wrong, and where.
        fault: Box<FileFault>,
        /// The file as typed.
        path: PathBuf,
        /// Its text.
        text: String,
    },
    /// The flags of a new frame file are at fault.
    #[error(transparent)]
    Template(#[from] TemplateFault),
    /// A file or folder cannot be used.
    #[error(transparent)]
    Store(#[from] StoreFault),
    /// The frame cannot be solved.
    #[error("{}: {fault}", path.display())]
    Unsolvable {
        /// Why.
        fault: Unsolvable,
        /// The file as typed.
        path: PathBuf,
    },
    /// A report file could not be made.
    #[error("the report could not be made: {0}")]
    Report(#[from] ReportFault),
    /// A picture could not be made.
    #[error("a picture could not be made: {0}")]
    Picture(#[from] PngError),
    /// The user stopped the run.
    #[error("interrupted")]
    Interrupted,
    /// Standard output could not be written.
    #[error("standard output could not be written: {0}")]
    Output(#[from] io::Error),
}

impl Failure {
    /// The message for standard error.
    pub(super) fn render(&self) -> String {
        match self {
            Self::File { fault, path, text } => complain::render(fault, &path.display().to_string(), text, true),
            Self::Template(fault) => complain::plain_error(&fault.to_string(), fault.help().as_deref()),
            other => complain::plain_error(&other.to_string(), None),
        }
    }

    /// See the exit codes in `--help`.
    pub(super) fn exit_code(&self) -> ExitCode {
        ExitCode::from(match self {
            Self::File { .. } | Self::Template(_) => 2,
            Self::Store(fault) if fault.is_input_at_fault() => 2,
            // A frame without areas or with relative sizes is fine; what was asked of it is not.
            Self::Unsolvable { fault: Unsolvable::NoAreas | Unsolvable::RelativeSizes, .. } => 2,
            Self::Unsolvable { .. } => 3,
            Self::Interrupted => interrupt::EXIT_CODE,
            Self::Store(_) | Self::Report(_) | Self::Picture(_) | Self::Output(_) => 4,
        })
    }
}
