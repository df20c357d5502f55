//! Report folders: written beside their place under another name, then swapped in as a whole.

use super::StoreFault;
use std::fs;
use std::path::{Path, PathBuf};

/// File whose content tells a report folder of ours from any other folder.
const RECORD: &str = "record.json";
/// The most of a record that is read to recognise it, bytes.
const RECORD_LIMIT: u64 = 256 * 1024 * 1024;

/// A report folder while it is being written. Dropped without [`ReportFolder::finish`], it leaves nothing behind.
#[derive(Debug)]
pub struct ReportFolder {
    place: PathBuf,
    part: PathBuf,
    finished: bool,
}

impl ReportFolder {
    /// Starts a folder that will stand at `place`, after mending what an interrupted run left there.
    ///
    /// # Errors
    /// [`StoreFault`] where `place` holds something that is not ours, holds `input`, or cannot be written to.
    pub fn start(place: &Path, input: &Path) -> Result<Self, StoreFault> {
        let siblings = Siblings::of(place)?;
        siblings.mend()?;
        if place.exists() {
            if !is_ours(place) {
                return Err(StoreFault::NotOurs { path: place.into() });
            }
            if lies_in(input, place) {
                return Err(StoreFault::HoldsInput { path: place.into() });
            }
        }
        let part = siblings.named("part");
        fs::create_dir(&part).map_err(StoreFault::system("create the folder", &part))?;
        Ok(Self { place: place.into(), part, finished: false })
    }

    /// Writes one file of the folder; `name` may lie in a subfolder.
    ///
    /// # Errors
    /// [`StoreFault::System`].
    pub fn write(&self, name: &str, bytes: &[u8]) -> Result<(), StoreFault> {
        let path = self.part.join(name);
        if let Some(parent) = path.parent() {
            fs::create_dir_all(parent).map_err(StoreFault::system("create the folder", parent))?;
        }
        fs::write(&path, bytes).map_err(StoreFault::system("write the file", &path))
    }

    /// Puts the folder in its place: the old one aside, the new one in, the old one deleted.
    ///
    /// # Errors
    /// [`StoreFault::System`]; then the old folder stands where it stood.
    pub fn finish(mut self) -> Result<(), StoreFault> {
        let old = Siblings::of(&self.place)?.named("old");
        let had_old = self.place.exists();
        if had_old {
            fs::rename(&self.place, &old).map_err(StoreFault::system("move the old report aside", &self.place))?;
        }
        if let Err(error) = fs::rename(&self.part, &self.place) {
            if had_old {
                drop(fs::rename(&old, &self.place));
            }
            return Err(StoreFault::system("put the report in its place", &self.place)(error));
        }
        self.finished = true;
        if had_old {
            fs::remove_dir_all(&old).map_err(StoreFault::system("delete the old report", &old))?;
        }
        Ok(())
    }
}

impl Drop for ReportFolder {
    fn drop(&mut self) {
        if !self.finished {
            drop(fs::remove_dir_all(&self.part));
        }
    }
}

/// The hidden folders beside a report folder that a run uses: `.<name>.part-<pid>` and `.<name>.old-<pid>`.
struct Siblings {
    place: PathBuf,
    parent: PathBuf,
    name: String,
}

impl Siblings {
    /// Creates the parent folder where it is missing.
    fn of(place: &Path) -> Result<Self, StoreFault> {
        let Some(name) = place.file_name() else { return Err(StoreFault::NotOurs { path: place.into() }) };
        let parent = match place.parent() {
            Some(parent) if parent != Path::new("") => parent.to_path_buf(),
            _ => PathBuf::from("."),
        };
        fs::create_dir_all(&parent).map_err(StoreFault::system("create the folder", &parent))?;
        Ok(Self { place: place.into(), parent, name: name.to_string_lossy().into_owned() })
    }

    fn named(&self, role: &str) -> PathBuf {
        self.parent.join(format!(".{}.{role}-{}", self.name, std::process::id()))
    }

    /// Folders of `role` that runs which are no longer alive have left.
    fn left(&self, role: &str) -> Result<Vec<PathBuf>, StoreFault> {
        let entries = fs::read_dir(&self.parent).map_err(StoreFault::system("look into the folder", &self.parent))?;
        let prefix = format!(".{}.{role}-", self.name);
        let abandoned = |path: &PathBuf| {
            let name = path.file_name().map(|name| name.to_string_lossy().into_owned()).unwrap_or_default();
            name.strip_prefix(&prefix).and_then(|pid| pid.parse().ok()).is_some_and(|pid| !may_be_alive(pid))
        };
        let mut left: Vec<_> = entries.filter_map(|entry| Some(entry.ok()?.path())).filter(abandoned).collect();
        left.sort();
        Ok(left)
    }

    /// Restores a folder that was left aside, deletes what else is left of dead runs.
    fn mend(&self) -> Result<(), StoreFault> {
        for old in self.left("old")? {
            if self.place.exists() {
                fs::remove_dir_all(&old).map_err(StoreFault::system("delete the old report", &old))?;
            } else {
                fs::rename(&old, &self.place).map_err(StoreFault::system("restore the report", &old))?;
            }
        }
        for part in self.left("part")? {
            fs::remove_dir_all(&part).map_err(StoreFault::system("delete the unfinished report", &part))?;
        }
        Ok(())
    }
}

/// Whether a process may still be running; where the system does not tell, it may.
fn may_be_alive(pid: u32) -> bool {
    let processes = Path::new("/proc");
    pid == std::process::id() || !processes.join("self").exists() || processes.join(pid.to_string()).exists()
}

fn is_ours(place: &Path) -> bool {
    let path = place.join(RECORD);
    let small = fs::metadata(&path).is_ok_and(|data| data.is_file() && data.len() <= RECORD_LIMIT);
    let record = || serde_json::from_slice::<serde_json::Value>(&fs::read(&path).ok()?).ok();
    small && record().is_some_and(|record| record["record"]["program"] == "swaybound")
}

fn lies_in(input: &Path, place: &Path) -> bool {
    match (input.canonicalize(), place.canonicalize()) {
        (Ok(input), Ok(place)) => input.starts_with(place),
        _ => false,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const OURS: &[u8] = br#"{"record": {"program": "swaybound"}}"#;

    fn report(place: &Path, text: &[u8]) {
        let folder = ReportFolder::start(place, Path::new("frame.toml")).unwrap();
        folder.write(RECORD, OURS).unwrap();
        folder.write("charts/one.svg", text).unwrap();
        folder.finish().unwrap();
    }

    fn names(folder: &Path) -> Vec<String> {
        let mut names: Vec<_> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().file_name()).collect();
        names.sort();
        names.into_iter().map(|name| name.into_string().unwrap()).collect()
    }

    #[test]
    fn a_report_replaces_an_older_one_and_leaves_nothing_beside_it() {
        let home = tempfile::tempdir().unwrap();
        let place = home.path().join("deep/compare");
        report(&place, b"first");
        report(&place, b"second");
        assert_eq!(fs::read(place.join("charts/one.svg")).unwrap(), b"second");
        assert_eq!(names(&home.path().join("deep")), ["compare"]);
    }

    #[test]
    fn an_unfinished_report_leaves_the_old_one_and_nothing_else() {
        let home = tempfile::tempdir().unwrap();
        let place = home.path().join("compare");
        report(&place, b"first");
        let folder = ReportFolder::start(&place, Path::new("frame.toml")).unwrap();
        folder.write("charts/one.svg", b"second").unwrap();
        drop(folder);
        assert_eq!(fs::read(place.join("charts/one.svg")).unwrap(), b"first");
        assert_eq!(names(home.path()), ["compare"]);
    }

    #[cfg(target_os = "linux")]
    #[test]
    fn a_folder_left_aside_by_a_dead_run_is_restored_and_its_part_deleted() {
        let home = tempfile::tempdir().unwrap();
        let place = home.path().join("compare");
        report(&place, b"first");
        // No process has this number: Linux numbers end at 4 194 304.
        fs::rename(&place, home.path().join(".compare.old-4294967294")).unwrap();
        fs::create_dir(home.path().join(".compare.part-4294967294")).unwrap();
        drop(ReportFolder::start(&place, Path::new("frame.toml")).unwrap());
        assert_eq!(fs::read(place.join("charts/one.svg")).unwrap(), b"first");
        assert_eq!(names(home.path()), ["compare"]);
    }

    #[test]
    fn what_is_not_ours_is_not_replaced() {
        let home = tempfile::tempdir().unwrap();
        let place = home.path().join("compare");
        fs::create_dir(&place).unwrap();
        fs::write(place.join("thesis.txt"), b"years of work").unwrap();
        let refused = ReportFolder::start(&place, Path::new("frame.toml"));
        assert!(matches!(refused, Err(StoreFault::NotOurs { .. })));
        fs::write(place.join(RECORD), br#"{"record": {"program": "another"}}"#).unwrap();
        let refused = ReportFolder::start(&place, Path::new("frame.toml"));
        assert!(matches!(refused, Err(StoreFault::NotOurs { .. })));
        assert_eq!(names(&place), [RECORD, "thesis.txt"]);
    }

    #[test]
    fn a_report_never_replaces_the_folder_of_its_own_input() {
        let home = tempfile::tempdir().unwrap();
        let place = home.path().join("compare");
        report(&place, b"first");
        let input = place.join("frame.toml");
        fs::write(&input, b"title").unwrap();
        let refused = ReportFolder::start(&place, &input);
        assert!(matches!(refused, Err(StoreFault::HoldsInput { .. })));
    }
}
