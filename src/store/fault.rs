//! What can go wrong with files.

use std::io;
use std::path::PathBuf;
use thiserror::Error;

/// A file or folder that cannot be used. Every message says how to mend it.
#[derive(Debug, Error)]
pub enum StoreFault {
    /// The input does not exist.
    #[error("{}: there is no such file; check the path", path.display())]
    Missing {
        /// The path as given.
        path: PathBuf,
    },
    /// The input is a folder.
    #[error("{}: this is a folder; name the frame file in it", path.display())]
    Folder {
        /// The path as given.
        path: PathBuf,
    },
    /// The input is larger than any sensible input.
    #[error("{}: the file has {size} bytes; at most {limit} are read: is it a frame file?", path.display())]
    TooLarge {
        /// The path as given.
        path: PathBuf,
        /// Its size, bytes.
        size: u64,
        /// The limit, bytes.
        limit: u64,
    },
    /// The input is not UTF-8 text.
    #[error("{}:{line}: the file is not UTF-8 text (byte {offset} cannot be read); save it as UTF-8 in your editor", path.display())]
    NotText {
        /// The path as given.
        path: PathBuf,
        /// Line of the first byte that is not text, from 1.
        line: usize,
        /// Its offset, bytes.
        offset: usize,
    },
    /// The place of the report folder holds something that is not a report of this program.
    #[error("{}: exists and is not a report folder of swaybound (no record.json of ours in it); choose another --out", path.display())]
    NotOurs {
        /// The folder.
        path: PathBuf,
    },
    /// The place of the report folder, or one above it, is a file.
    #[error("{}: exists and is not a folder; choose another --out", path.display())]
    NotFolder {
        /// The file.
        path: PathBuf,
    },
    /// The place of the report folder is a link to nothing.
    #[error("{}: is a link to something that does not exist; mend the link or choose another --out", path.display())]
    DanglingLink {
        /// The link.
        path: PathBuf,
    },
    /// The place of the report folder ends in no name.
    #[error("{}: names no folder that a report could replace; end --out with the report folder's own name", path.display())]
    NoName {
        /// The path as given.
        path: PathBuf,
    },
    /// The report would replace the folder its own input lies in.
    #[error("{}: the frame file lies in this folder, which the report would replace; choose another --out", path.display())]
    HoldsInput {
        /// The folder.
        path: PathBuf,
    },
    /// A file to be created is already there.
    #[error("{}: exists already and is left as it is; choose another name or remove it", path.display())]
    Exists {
        /// The file.
        path: PathBuf,
    },
    /// The operating system refused.
    #[error("{}: cannot {action}: {source}", path.display())]
    System {
        /// What was tried.
        action: &'static str,
        /// On what.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
}

impl StoreFault {
    /// Wraps what the system said on `action` at `path`.
    pub(super) fn system(action: &'static str, path: impl Into<PathBuf>) -> impl FnOnce(io::Error) -> Self {
        let path = path.into();
        move |source| Self::System { action, path, source }
    }

    /// True where the input itself is at fault, not the disk.
    pub fn is_input_at_fault(&self) -> bool {
        matches!(self, Self::Folder { .. } | Self::TooLarge { .. } | Self::NotText { .. })
    }
}
