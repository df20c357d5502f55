//! Single files: reading input, creating new files.

use super::StoreFault;
use std::fs::{self, File, OpenOptions};
use std::io::{self, Read, Write};
use std::path::Path;

/// The largest input that is read, bytes: the largest frame with every member stated on its own takes about a tenth.
pub const INPUT_LIMIT: u64 = 32 * 1024 * 1024;

/// Reads a text file of at most [`INPUT_LIMIT`] bytes.
///
/// # Errors
/// [`StoreFault`] where the file is missing, a folder, too large, not UTF-8 or cannot be read.
pub fn read_text(path: &Path) -> Result<String, StoreFault> {
    let data = fs::metadata(path).map_err(|error| match error.kind() {
        io::ErrorKind::NotFound => StoreFault::Missing { path: path.into() },
        _ => StoreFault::system("look at the file", path)(error),
    })?;
    if data.is_dir() {
        return Err(StoreFault::Folder { path: path.into() });
    }
    let too_large = |size| StoreFault::TooLarge { path: path.into(), size, limit: INPUT_LIMIT };
    if data.len() > INPUT_LIMIT {
        return Err(too_large(data.len()));
    }
    let mut bytes = Vec::new();
    let file = File::open(path).map_err(StoreFault::system("open the file", path))?;
    file.take(INPUT_LIMIT + 1).read_to_end(&mut bytes).map_err(StoreFault::system("read the file", path))?;
    if bytes.len() as u64 > INPUT_LIMIT {
        return Err(too_large(bytes.len() as u64));
    }
    String::from_utf8(bytes).map_err(|error| {
        let offset = error.utf8_error().valid_up_to();
        let line = 1 + error.as_bytes()[..offset].iter().filter(|byte| **byte == b'\n').count();
        StoreFault::NotText { path: path.into(), line, offset }
    })
}

/// Creates a file that must not exist yet.
///
/// # Errors
/// [`StoreFault::Exists`] where it does, [`StoreFault::System`] where it cannot be written; then no part of it is left.
pub fn write_new(path: &Path, text: &str) -> Result<(), StoreFault> {
    let mut file = OpenOptions::new().write(true).create_new(true).open(path).map_err(|error| match error.kind() {
        io::ErrorKind::AlreadyExists => StoreFault::Exists { path: path.into() },
        _ => StoreFault::system("create the file", path)(error),
    })?;
    file.write_all(text.as_bytes()).map_err(|error| {
        drop(fs::remove_file(path));
        StoreFault::system("write the file", path)(error)
    })
}
