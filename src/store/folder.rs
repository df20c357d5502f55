//! Report folders: written beside their place under another name, then swapped in as a whole.

use super::StoreFault;
use super::lock::FolderLock;
use super::siblings::{Siblings, Standing, delete_ours, retried, standing};
use std::fs::{self, File};
use std::io::{self, BufWriter, Write};
use std::path::{Path, PathBuf};

/// A report folder while it is being written. Dropped without [`ReportFolder::finish`], it leaves nothing behind.
#[derive(Debug)]
pub struct ReportFolder {
    place: PathBuf,
    siblings: Siblings,
    part: PathBuf,
    lock: FolderLock,
    /// Folders above the place that did not exist, the innermost first.
    parents: Vec<PathBuf>,
    other_input: Option<String>,
    finished: bool,
}

impl ReportFolder {
    pub(super) fn create(place: &Path, siblings: &Siblings, other_input: Option<String>) -> Result<Self, StoreFault> {
        let parent = siblings.parent();
        let missing = parent.ancestors().filter(|folder| *folder != Path::new("") && !folder.exists());
        let parents: Vec<_> = missing.map(Path::to_path_buf).collect();
        let mut part = PathBuf::new();
        // A failing run removes the folders above that it created, perhaps just now.
        let created = retried(|| {
            fs::create_dir_all(parent).map_err(StoreFault::system("create the folder", parent))?;
            let refused = |(path, error)| StoreFault::system("create the folder", path)(error);
            part = siblings.create("part", parent).map_err(refused)?;
            Ok(())
        });
        let held = created.and_then(|()| FolderLock::hold(&part).map_err(StoreFault::system("lock the folder", &part)));
        match held {
            Ok(lock) => {
                let (place, siblings) = (place.into(), siblings.clone());
                Ok(Self { place, siblings, part, lock, parents, other_input, finished: false })
            }
            Err(fault) => {
                discard(&part, &parents);
                Err(fault)
            }
        }
    }

    /// Name of the input of the report to be replaced, as typed then, where it was another file than this report's.
    pub fn other_input(&self) -> Option<&str> {
        self.other_input.as_deref()
    }

    /// Writes one file of the folder; `name` may lie in a subfolder.
    ///
    /// # Errors
    /// [`StoreFault::System`].
    pub fn write(&self, name: &str, bytes: &[u8]) -> Result<(), StoreFault> {
        self.write_with(name, |out| out.write_all(bytes))
    }

    /// Writes one file of the folder piece by piece, as `fill` gives them.
    ///
    /// # Errors
    /// [`StoreFault::System`], also with what `fill` returns.
    pub fn write_with(
        &self,
        name: &str,
        fill: impl FnOnce(&mut dyn Write) -> io::Result<()>,
    ) -> Result<(), StoreFault> {
        let path = self.part.join(name);
        if let Some(parent) = path.parent() {
            fs::create_dir_all(parent).map_err(StoreFault::system("create the folder", parent))?;
        }
        let filled = File::create(&path).and_then(|file| {
            let mut out = BufWriter::with_capacity(1 << 16, file);
            fill(&mut out)?;
            out.flush()
        });
        filled.map_err(StoreFault::system("write the file", &path))
    }

    /// Puts the folder in its place: the old one aside, the new one in, the old one deleted. Of several runs that finish
    /// at once, the last one's report stands.
    ///
    /// # Errors
    /// [`StoreFault::NotOurs`] where something else came to stand there meanwhile, [`StoreFault::System`] where the system
    /// refuses; then what stood there still does.
    pub fn finish(mut self) -> Result<(), StoreFault> {
        self.lock.release().map_err(StoreFault::system("unlock the folder", &self.part))?;
        let mut aside = Vec::new();
        if let Err(fault) = retried(|| self.swap(&mut aside)) {
            // Where another report stands by now this fails, as it should.
            drop(aside.last().map(|old| fs::rename(old, &self.place)));
            return Err(fault);
        }
        self.finished = true;
        for old in aside {
            delete_ours(&old).map_err(StoreFault::system("delete the old report", &old))?;
        }
        Ok(())
    }

    fn swap(&self, aside: &mut Vec<PathBuf>) -> Result<(), StoreFault> {
        match standing(&self.place) {
            Standing::Nothing => {}
            Standing::Other => return Err(StoreFault::NotOurs { path: self.place.clone() }),
            Standing::Ours { .. } => match self.siblings.move_aside() {
                Ok(old) => aside.push(old),
                Err(error) if error.kind() == io::ErrorKind::NotFound => {}
                Err(error) => return Err(StoreFault::system("move the old report aside", &self.place)(error)),
            },
        }
        fs::rename(&self.part, &self.place).map_err(StoreFault::system("put the report in its place", &self.place))
    }
}

impl Drop for ReportFolder {
    fn drop(&mut self) {
        if !self.finished {
            discard(&self.part, &self.parents);
        }
    }
}

/// Deletes an unfinished folder, and the folders above it that its run created, where they are empty.
fn discard(part: &Path, parents: &[PathBuf]) {
    drop(fs::remove_dir_all(part));
    for parent in parents {
        drop(fs::remove_dir(parent));
    }
}

#[cfg(test)]
mod tests;
