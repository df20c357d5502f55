//! The lock by which an unfinished report folder shows that its run is alive.

use std::fs::{self, File};
use std::io;
use std::path::{Path, PathBuf};

/// The lock file of an unfinished folder; it tells such a folder from any other.
const NAME: &str = ".swaybound.lock";
/// The same while it is not yet locked.
const UNLOCKED: &str = ".swaybound.lock.new";

/// An exclusive lock on a folder. The system gives it up when the process ends, however it ends.
#[derive(Debug)]
pub(super) struct FolderLock {
    path: PathBuf,
    file: Option<File>,
}

impl FolderLock {
    /// Locks a folder of one's own. Where the disk knows no locks, the folder stays without a lock file, and no other run
    /// will take it for a dead one.
    pub(super) fn hold(folder: &Path) -> io::Result<Self> {
        let (unlocked, path) = (folder.join(UNLOCKED), folder.join(NAME));
        let file = File::create_new(&unlocked)?;
        if file.try_lock().is_err() {
            fs::remove_file(&unlocked)?;
            return Ok(Self { path, file: None });
        }
        // Under its name the file is never seen unlocked while its run lives.
        fs::rename(&unlocked, &path)?;
        Ok(Self { path, file: Some(file) })
    }

    /// Takes the lock file away, then gives up the lock.
    pub(super) fn release(&mut self) -> io::Result<()> {
        match self.file.take() {
            Some(_held) => fs::remove_file(&self.path),
            None => Ok(()),
        }
    }
}

/// Whether `folder` is a real folder with a lock file whose run is dead; then its lock, to be held while it is deleted.
pub(super) fn of_dead_run(folder: &Path) -> Option<File> {
    let path = folder.join(NAME);
    let real = fs::symlink_metadata(folder).is_ok_and(|data| data.is_dir());
    let is_file = || fs::symlink_metadata(&path).is_ok_and(|data| data.is_file());
    if !real || !is_file() {
        return None;
    }
    let file = File::options().read(true).write(true).open(&path).ok()?;
    file.try_lock().ok()?;
    // A run that finished between the opening and the locking took the file away first.
    is_file().then_some(file)
}
