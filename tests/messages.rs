//! Every file in `tests/broken` holds one mistake; the message for it stands beside it, byte for byte.
//!
//! To write the messages anew: `SWAYBOUND_PIN=write cargo test --release --test messages`, then read the difference.

#![allow(clippy::unwrap_used, clippy::panic)]

use assert_cmd::Command;
use std::fs;
use std::path::{Path, PathBuf};

fn broken_files() -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/broken");
    let entries = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path());
    let mut files: Vec<_> = entries.filter(|path| path.extension().is_some_and(|end| end == "toml")).collect();
    files.sort();
    files
}

/// Runs the program on a copy of `file` in an empty folder; gives its message.
fn message(file: &Path) -> String {
    let folder = tempfile::tempdir().unwrap();
    let name = file.file_name().unwrap();
    fs::copy(file, folder.path().join(name)).unwrap();
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    command.current_dir(folder.path()).arg("compare").arg(name).env("NO_COLOR", "1");
    let output = command.output().unwrap();
    let stderr = String::from_utf8(output.stderr).unwrap();
    let shown = name.to_string_lossy();
    assert_eq!(output.status.code(), Some(2), "{shown}: {stderr}");
    assert!(output.stdout.is_empty(), "{shown} wrote to standard output");
    let left: Vec<_> = fs::read_dir(folder.path()).unwrap().map(|entry| entry.unwrap().file_name()).collect();
    assert_eq!(left, [name], "{shown}: something was written");
    stderr
}

#[test]
fn every_mistake_gets_its_message() {
    let write = std::env::var("SWAYBOUND_PIN").is_ok_and(|value| value == "write");
    let files = broken_files();
    assert!(files.len() >= 100, "only {} broken files found", files.len());
    let mut changed = Vec::new();
    for file in files {
        let (found, pinned) = (message(&file), file.with_extension("txt"));
        if write {
            fs::write(&pinned, &found).unwrap();
        } else if fs::read_to_string(&pinned).unwrap_or_default() != found {
            changed.push(format!("{}:\n{found}", file.display()));
        }
    }
    assert!(changed.is_empty(), "messages changed:\n{}", changed.join("\n"));
}

#[test]
fn every_message_names_file_line_column_and_remedy() {
    for file in broken_files() {
        let message = message(&file);
        let name = file.file_name().unwrap().to_string_lossy().into_owned();
        assert!(message.starts_with("error: "), "{message}");
        assert!(message.contains(&format!("--> {name}:")), "{message}");
        assert!(message.contains("= help: "), "{message}");
        assert!(message.contains('^'), "{message}");
        assert!(!message.contains("panicked") && !message.contains("$__"), "{message}");
    }
}

#[test]
fn no_pinned_message_is_left_without_its_file() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/broken");
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        assert!(path.with_extension("toml").exists(), "{}", path.display());
    }
}
