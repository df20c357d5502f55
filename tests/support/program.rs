//! The program run in a folder of its own.
#![allow(dead_code, reason = "each test file uses a part")]

use assert_cmd::Command;
use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Output;
use tempfile::TempDir;

const FRAME: &str = r#"
title = "Workshop"
[grid]
bays    = ["6 m", "7 m"]
storeys = ["4 m", "3.5 m"]
[feet]
fixity = "FEET"
[material]
modulus = "200 GPa"
[[columns]]
storeys = "all"
lines   = "all"
inertia = "2e-4 m4"
[[beams]]
floors = "all"
bays   = "all"
inertia = "3e-4 m4"
stiffness_factor = FACTOR
[lateral]
floors = ["30 kN", "40 kN"]
"#;

pub fn frame(feet: &str, factor: &str) -> String {
    FRAME.replace("FEET", feet).replace("FACTOR", factor)
}

/// An empty folder with `frame.toml` in it.
pub fn home(text: &str) -> TempDir {
    let home = tempfile::tempdir().unwrap();
    fs::write(home.path().join("frame.toml"), text).unwrap();
    home
}

pub fn run(home: &TempDir, words: &[&str]) -> Output {
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    command.current_dir(home.path()).args(words).output().unwrap()
}

pub fn stderr(output: &Output) -> String {
    String::from_utf8(output.stderr.clone()).unwrap()
}

/// Asserts a failure: its code, one message that holds `words`, nothing on standard output, nothing changed on the disk.
pub fn fails(home: &TempDir, words: &[&str], code: i32, message: &str) {
    fails_in(home.path(), home, words, code, message);
}

/// The same for a run in `folder`, somewhere under `home`.
pub fn fails_in(folder: &Path, home: &TempDir, words: &[&str], code: i32, message: &str) {
    let before = tree(home.path());
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    let output = command.current_dir(folder).args(words).output().unwrap();
    let said = stderr(&output);
    assert_eq!(output.status.code(), Some(code), "{said}");
    assert!(said.contains(message), "{message:?} is not in:\n{said}");
    assert_eq!(said.lines().filter(|line| line.starts_with("error")).count(), 1, "not one message:\n{said}");
    assert!(!said.contains("panicked"), "{said}");
    assert!(output.stdout.is_empty());
    assert!(tree(home.path()) == before, "something was written: {:?}", tree(home.path()).keys());
}

/// Every file under a folder with its size and a sum over its bytes, and every folder.
pub fn tree(folder: &Path) -> BTreeMap<PathBuf, Option<(usize, u64)>> {
    let mut found = BTreeMap::new();
    for entry in fs::read_dir(folder).unwrap() {
        let entry = entry.unwrap();
        let kind = entry.file_type().unwrap();
        if kind.is_dir() {
            found.extend(tree(&entry.path()));
        }
        let sum = |bytes: &[u8]| bytes.iter().fold(7_u64, |sum, byte| sum.wrapping_mul(31) + u64::from(*byte));
        let content = (!kind.is_dir()).then(|| fs::read(entry.path()).map_or((0, 0), |text| (text.len(), sum(&text))));
        found.insert(entry.path(), content);
    }
    found
}

pub fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<_> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path()).collect();
    names.sort();
    names.iter().map(|path| path.file_name().unwrap().to_string_lossy().into_owned()).collect()
}
