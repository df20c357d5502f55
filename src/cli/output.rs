//! Standard output and standard error, and the report folder's usual place.

use std::io::{self, ErrorKind, Write};
use std::path::{Path, PathBuf};

/// Writes results to standard output. A reader that has seen enough and closed the pipe is no fault.
pub(super) fn results(text: &str) -> io::Result<()> {
    let mut stdout = anstream::stdout().lock();
    match stdout.write_all(text.as_bytes()).and_then(|()| stdout.flush()) {
        Err(error) if error.kind() == ErrorKind::BrokenPipe => Ok(()),
        other => other,
    }
}

/// Writes a note to standard error.
pub(super) fn note(text: &str) {
    // A note that cannot be written must not stop the work.
    drop(writeln!(anstream::stderr().lock(), "{}", text.trim_end()));
}

/// `output/<file stem>/<command>`.
pub(super) fn usual_place(input: &Path, command: &str) -> PathBuf {
    let stem = input.file_stem().unwrap_or(input.as_os_str());
    Path::new("output").join(stem).join(command)
}
