//! Where a report will stand, judged before anything is computed or written.

use super::StoreFault;
use super::folder::ReportFolder;
use super::siblings::{Siblings, Standing, lies_in, standing};
use std::fs;
use std::io;
use std::path::{Path, PathBuf};

/// A place that may take a report. Judging it leaves nothing on the disk.
#[derive(Debug, Clone)]
pub struct ReportPlace {
    place: PathBuf,
    siblings: Siblings,
    input: PathBuf,
}

impl ReportPlace {
    /// Judges `place` for the report on `input`. A link to a folder stands for that folder; `x/` and `x/.` for `x`.
    ///
    /// # Errors
    /// [`StoreFault`] where `place` holds something that is not a report of ours, or holds `input`, or cannot be written to.
    pub fn judge(place: &Path, input: &Path) -> Result<Self, StoreFault> {
        let place = resolved(place)?;
        let Some(siblings) = Siblings::of(&place) else { return Err(StoreFault::NoName { path: place }) };
        let judged = Self { place, siblings, input: input.into() };
        judged.look()?;
        judged.probe()?;
        Ok(judged)
    }

    /// Where the report will stand.
    pub fn path(&self) -> &Path {
        &self.place
    }

    /// Starts the report folder, after putting right what dead runs left beside its place.
    ///
    /// # Errors
    /// [`StoreFault`] as for [`ReportPlace::judge`].
    pub fn start(&self) -> Result<ReportFolder, StoreFault> {
        self.siblings.mend(&self.input);
        let replaced = self.look()?;
        let other = replaced.into_iter().find(|name| !self.is_input(name));
        ReportFolder::create(&self.place, &self.siblings, other)
    }

    /// Names of the inputs of the report that stands there.
    fn look(&self) -> Result<Vec<String>, StoreFault> {
        match standing(&self.place) {
            Standing::Nothing => Ok(Vec::new()),
            Standing::Other if !self.place.is_dir() => Err(StoreFault::NotFolder { path: self.place.clone() }),
            Standing::Other => Err(StoreFault::NotOurs { path: self.place.clone() }),
            Standing::Ours { .. } if lies_in(&self.input, &self.place) => {
                Err(StoreFault::HoldsInput { path: self.place.clone() })
            }
            Standing::Ours { inputs } => Ok(inputs),
        }
    }

    /// Creates a folder where the report's first folder would be created, and removes it at once: nothing else tells
    /// surely whether the system allows it.
    fn probe(&self) -> Result<(), StoreFault> {
        let parent = self.siblings.parent();
        let exists = |folder: &&Path| fs::symlink_metadata(folder).is_ok();
        let usual = Path::new(".");
        let nearest = parent.ancestors().filter(|folder| *folder != Path::new("")).find(exists).unwrap_or(usual);
        if !nearest.is_dir() {
            return Err(StoreFault::NotFolder { path: nearest.into() });
        }
        let refused = StoreFault::system("create the report folder", &self.place);
        let probe = self.siblings.create("part", nearest).map_err(|(_, error)| refused(error))?;
        fs::remove_dir(&probe).map_err(StoreFault::system("delete the folder", &probe))
    }

    /// Whether a name in the record of an earlier report stands for the input of this one.
    fn is_input(&self, name: &str) -> bool {
        let canonical = |path: &Path| path.canonicalize().ok();
        name == self.input.to_string_lossy()
            || canonical(Path::new(name)).is_some_and(|path| Some(path) == canonical(&self.input))
    }
}

/// The place without idle `.` and `/`, a link followed.
fn resolved(place: &Path) -> Result<PathBuf, StoreFault> {
    let place: PathBuf = place.components().collect();
    let is_link = fs::symlink_metadata(&place).is_ok_and(|data| data.is_symlink());
    if !is_link {
        return Ok(place);
    }
    place.canonicalize().map_err(|error| match error.kind() {
        io::ErrorKind::NotFound => StoreFault::DanglingLink { path: place },
        _ => StoreFault::system("follow the link", place)(error),
    })
}
