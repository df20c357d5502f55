//! The hidden folders beside a report folder: `.<name>.part-<number>`, which is being written, and
//! `.<name>.old-<number>`, which was moved aside.

use super::lock;
use crate::report::json;
use std::ffi::OsString;
use std::fs;
use std::io;
use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicU64, Ordering};
use std::time::{Duration, SystemTime};

/// File whose content tells a report folder of ours from any other folder.
pub(super) const RECORD: &str = "record.json";
/// The most of a record that is read to recognise it, bytes.
const RECORD_LIMIT: u64 = 256 * 1024 * 1024;
/// How often what another run may be changing is tried, and how long to wait in between.
const ATTEMPTS: usize = 40;
const PAUSE: Duration = Duration::from_millis(5);

/// Tells the names of one process apart.
static COUNTER: AtomicU64 = AtomicU64::new(0);

/// What stands at a report's place.
#[derive(Debug, PartialEq, Eq)]
pub(super) enum Standing {
    /// Nothing.
    Nothing,
    /// A report folder of this program.
    Ours {
        /// Names of its inputs, as typed then.
        inputs: Vec<String>,
    },
    /// Anything else.
    Other,
}

/// What stands at `place`; a link is not followed.
pub(super) fn standing(place: &Path) -> Standing {
    // While another run swaps its report in, the folder may be there and its record no longer, or the other way round.
    for _ in 0..3 {
        // A place in a file is none; whether one could be made there is judged apart.
        let absent = [io::ErrorKind::NotFound, io::ErrorKind::NotADirectory];
        if fs::symlink_metadata(place).is_err_and(|error| absent.contains(&error.kind())) {
            return Standing::Nothing;
        }
        if let Some(inputs) = inputs_of_ours(place) {
            return Standing::Ours { inputs };
        }
        std::thread::sleep(PAUSE);
    }
    Standing::Other
}

/// Names of the inputs of a real folder that is a report of this program.
fn inputs_of_ours(folder: &Path) -> Option<Vec<String>> {
    let path = folder.join(RECORD);
    let real = fs::symlink_metadata(folder).is_ok_and(|data| data.is_dir());
    let small = fs::metadata(&path).is_ok_and(|data| data.is_file() && data.len() <= RECORD_LIMIT);
    let text = (real && small).then(|| fs::read_to_string(&path).ok())??;
    json::inputs_of_ours(&text)
}

/// Deletes a report folder of this program, its record last, so that a half-deleted one is still known as ours. What
/// another run has deleted meanwhile is no fault.
pub(super) fn delete_ours(folder: &Path) -> io::Result<()> {
    let gone = |result: io::Result<()>| match result {
        Err(error) if error.kind() == io::ErrorKind::NotFound => Ok(()),
        other => other,
    };
    retried(|| {
        let entries = match fs::read_dir(folder) {
            Err(error) if error.kind() == io::ErrorKind::NotFound => return Ok(()),
            other => other?,
        };
        for entry in entries {
            let entry = entry?;
            if entry.file_name() == RECORD {
                continue;
            }
            let is_folder = entry.file_type().is_ok_and(|kind| kind.is_dir());
            gone(if is_folder { fs::remove_dir_all(entry.path()) } else { fs::remove_file(entry.path()) })?;
        }
        gone(fs::remove_file(folder.join(RECORD)))?;
        gone(fs::remove_dir(folder))
    })
}

/// Tries `action` until it succeeds, a few times with a pause: another run may be at work on the same place.
pub(super) fn retried<E>(mut action: impl FnMut() -> Result<(), E>) -> Result<(), E> {
    for _ in 1..ATTEMPTS {
        if action().is_ok() {
            return Ok(());
        }
        std::thread::sleep(PAUSE);
    }
    action()
}

/// Names and clearing of the hidden folders of one place.
#[derive(Debug, Clone)]
pub(super) struct Siblings {
    place: PathBuf,
    parent: PathBuf,
    name: OsString,
}

impl Siblings {
    /// `None` where `place` names no folder of its own, as `..` does.
    pub(super) fn of(place: &Path) -> Option<Self> {
        let name = place.file_name()?.to_os_string();
        let parent = place.parent().filter(|parent| *parent != Path::new("")).unwrap_or(Path::new("."));
        Some(Self { place: place.into(), parent: parent.into(), name })
    }

    /// The folder they lie in.
    pub(super) fn parent(&self) -> &Path {
        &self.parent
    }

    /// A name that no other run uses, in `folder`; the number is the process's, then counted on.
    pub(super) fn fresh(&self, role: &str, folder: &Path) -> PathBuf {
        let number = COUNTER.fetch_add(1, Ordering::Relaxed);
        let mut name = self.prefix(role);
        name.push(format!("{}-{number}", std::process::id()));
        folder.join(name)
    }

    /// Creates a folder of a fresh name in `folder`.
    pub(super) fn create(&self, role: &str, folder: &Path) -> Result<PathBuf, (PathBuf, io::Error)> {
        loop {
            let path = self.fresh(role, folder);
            match fs::create_dir(&path) {
                Ok(()) => return Ok(path),
                Err(error) if error.kind() == io::ErrorKind::AlreadyExists => continue,
                Err(error) => return Err((path, error)),
            }
        }
    }

    /// Moves what stands at the place aside, under a fresh name.
    pub(super) fn move_aside(&self) -> io::Result<PathBuf> {
        let mut aside = self.fresh("old", &self.parent);
        while fs::symlink_metadata(&aside).is_ok() {
            aside = self.fresh("old", &self.parent);
        }
        fs::rename(&self.place, &aside).map(|()| aside)
    }

    /// Puts right what dead runs have left: a report moved aside is restored where nothing stands at the place, else
    /// deleted, and parts are deleted. What is not surely ours, what holds `input`, and what resists is left as it is.
    pub(super) fn mend(&self, input: &Path) {
        let is_ours = |path: &PathBuf| inputs_of_ours(path).is_some() && !lies_in(input, path);
        let mut old: Vec<_> = self.found("old").into_iter().filter(is_ours).collect();
        old.sort_by_key(|path| std::cmp::Reverse(age(path)));
        for old in old {
            match fs::symlink_metadata(&self.place) {
                Ok(_) => drop(delete_ours(&old)),
                Err(error) if error.kind() == io::ErrorKind::NotFound => drop(fs::rename(&old, &self.place)),
                Err(_) => {}
            }
        }
        for part in self.found("part").iter().filter(|part| !lies_in(input, part)) {
            if let Some(_held) = lock::of_dead_run(part) {
                drop(fs::remove_dir_all(part));
            }
        }
    }

    fn prefix(&self, role: &str) -> OsString {
        let mut prefix = OsString::from(".");
        prefix.push(&self.name);
        prefix.push(format!(".{role}-"));
        prefix
    }

    /// Entries beside the place whose name is that of a `role`.
    fn found(&self, role: &str) -> Vec<PathBuf> {
        let prefix = self.prefix(role);
        let numbered = |name: &OsString| {
            let rest = name.as_encoded_bytes().strip_prefix(prefix.as_encoded_bytes());
            rest.is_some_and(|rest| rest.iter().all(|byte| byte.is_ascii_digit() || *byte == b'-'))
        };
        let entries = fs::read_dir(&self.parent).into_iter().flatten().flatten();
        entries.filter(|entry| numbered(&entry.file_name())).map(|entry| entry.path()).collect()
    }
}

/// When a report was written; the oldest time where that cannot be told.
fn age(report: &Path) -> SystemTime {
    fs::metadata(report.join(RECORD)).and_then(|data| data.modified()).unwrap_or(SystemTime::UNIX_EPOCH)
}

/// Whether `input` lies in the folder `place`.
pub(super) fn lies_in(input: &Path, place: &Path) -> bool {
    match (input.canonicalize(), place.canonicalize()) {
        (Ok(input), Ok(place)) => input.starts_with(place),
        _ => false,
    }
}
