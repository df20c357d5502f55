//! Files that a run must reproduce. `SWAYBOUND_PIN=write cargo test --release` writes them anew: read the difference.

use std::fs;
use std::path::{Path, PathBuf};

/// A path from the project's root.
pub fn project(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

/// The pinned text at `path`, after writing `found` there if the run is told to; an error names a difference.
pub fn same(path: &Path, found: &str) -> Result<(), String> {
    let pinned = pinned(path, found);
    let mut lines = pinned.lines().zip(found.lines()).enumerate();
    match lines.find(|(_, (pinned, found))| pinned != found) {
        Some((line, (pinned, found))) => {
            Err(format!("{}:{}:\n  pinned: {pinned}\n  found:  {found}", path.display(), line + 1))
        }
        None if pinned != found => Err(format!("{}: lengths differ", path.display())),
        None => Ok(()),
    }
}

/// The text pinned at `path`; empty where there is none.
pub fn pinned(path: &Path, found: &str) -> String {
    if std::env::var("SWAYBOUND_PIN").is_ok_and(|value| value == "write") {
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, found).unwrap();
    }
    fs::read_to_string(path).unwrap_or_default()
}
