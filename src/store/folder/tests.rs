use super::*;
use crate::store::ReportPlace;
use crate::store::siblings::RECORD;
use std::thread;

const OURS: &[u8] = br#"{"record": {"program": "swaybound"}}"#;

fn start(place: &Path) -> ReportFolder {
    ReportPlace::judge(place, Path::new("frame.toml")).unwrap().start().unwrap()
}

fn report(place: &Path, text: &[u8]) {
    let folder = start(place);
    folder.write(RECORD, OURS).unwrap();
    folder.write("charts/one.svg", text).unwrap();
    folder.finish().unwrap();
}

fn text(place: &Path) -> Vec<u8> {
    fs::read(place.join("charts/one.svg")).unwrap()
}

fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<_> = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().file_name()).collect();
    names.sort();
    names.into_iter().map(|name| name.into_string().unwrap()).collect()
}

/// A folder with one file in it.
fn plant(folder: &Path, file: &str, text: &[u8]) {
    fs::create_dir_all(folder).unwrap();
    fs::write(folder.join(file), text).unwrap();
}

#[test]
fn a_report_replaces_an_older_one_and_leaves_nothing_beside_it() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("deep/compare");
    report(&place, b"first");
    report(&place, b"second");
    assert_eq!(text(&place), b"second");
    assert_eq!(names(&home.path().join("deep")), ["compare"]);
    assert_eq!(names(&place), ["charts", RECORD], "no lock is left in it");
}

#[test]
fn an_unfinished_report_leaves_the_old_one_and_nothing_else() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&place, b"first");
    let folder = start(&place);
    folder.write("charts/one.svg", b"second").unwrap();
    drop(folder);
    assert_eq!(text(&place), b"first");
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn judging_and_an_unfinished_report_leave_no_folders_above_the_place() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("deep/deeper/compare");
    let judged = ReportPlace::judge(&place, Path::new("frame.toml")).unwrap();
    assert!(names(home.path()).is_empty());
    let folder = judged.start().unwrap();
    folder.write("charts/one.svg", b"first").unwrap();
    assert_eq!(names(home.path()), ["deep"]);
    drop(folder);
    assert!(names(home.path()).is_empty());
}

#[test]
fn a_report_left_aside_by_a_dead_run_is_restored_and_its_part_deleted() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&place, b"first");
    fs::rename(&place, home.path().join(".compare.old-17")).unwrap();
    // The file is there and nobody holds its lock: what a killed run leaves.
    plant(&home.path().join(".compare.part-17"), ".swaybound.lock", b"");
    drop(start(&place));
    assert_eq!(text(&place), b"first");
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn of_several_reports_left_aside_the_newest_is_restored() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    for (name, age) in [("1", 30), ("2", 10), ("3", 20)] {
        let old = home.path().join(format!(".compare.old-{name}"));
        report(&old, name.as_bytes());
        let time = std::time::SystemTime::now() - std::time::Duration::from_secs(age);
        File::options().write(true).open(old.join(RECORD)).unwrap().set_modified(time).unwrap();
    }
    drop(start(&place));
    assert_eq!(text(&place), b"2");
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn a_report_left_aside_is_deleted_where_another_stands() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&place, b"first");
    fs::rename(&place, home.path().join(".compare.old-17-3")).unwrap();
    fs::create_dir(&place).unwrap();
    fs::write(place.join(RECORD), OURS).unwrap();
    drop(start(&place));
    assert_eq!(names(home.path()), ["compare"]);
    assert_eq!(names(&place), [RECORD]);
}

#[test]
fn what_only_has_the_name_of_a_part_or_an_old_report_is_left_and_blocks_nothing() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    let beside = |name: &str| home.path().join(name);
    plant(&beside(".compare.part-1"), "thesis.txt", b"years of work");
    plant(&beside(".compare.old-1"), "thesis.txt", b"years of work");
    plant(&beside(".compare.old-2"), RECORD, br#"{"record": {"program": "another"}}"#);
    fs::write(beside(".compare.part-2"), "a file").unwrap();
    fs::write(beside(".compare.old-3"), "a file").unwrap();
    plant(&beside(".compare.part-keep"), ".swaybound.lock", b"");
    plant(&beside(".compare.old-keep"), RECORD, OURS);
    fs::create_dir(beside(".compare.part-3")).unwrap();
    fs::create_dir(beside(".compare.part-3/.swaybound.lock")).unwrap();
    let before = names(home.path());
    drop(start(&place));
    assert_eq!(names(home.path()), before, "nothing is restored or deleted");
    report(&place, b"first");
    report(&place, b"second");
    assert_eq!(text(&place), b"second");
    assert_eq!(names(home.path()).len(), before.len() + 1);
    assert_eq!(names(&beside(".compare.part-1")), ["thesis.txt"]);
    assert_eq!(names(&beside(".compare.old-1")), ["thesis.txt"]);
}

#[test]
fn names_that_this_process_would_use_next_block_nothing() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    for (role, number) in ["part", "old"].iter().flat_map(|role| (0..200).map(move |number| (role, number))) {
        fs::write(home.path().join(format!(".compare.{role}-{}-{number}", std::process::id())), "a file").unwrap();
    }
    report(&place, b"first");
    report(&place, b"second");
    assert_eq!(text(&place), b"second");
    assert_eq!(names(home.path()).len(), 401);
}

#[cfg(unix)]
#[test]
fn links_with_the_name_of_a_part_or_an_old_report_are_left() {
    use std::os::unix::fs::symlink;
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&home.path().join("elsewhere"), b"first");
    fs::write(home.path().join("elsewhere/.swaybound.lock"), "").unwrap();
    symlink("elsewhere", home.path().join(".compare.old-1")).unwrap();
    symlink("elsewhere", home.path().join(".compare.part-1")).unwrap();
    drop(start(&place));
    assert_eq!(names(home.path()), [".compare.old-1", ".compare.part-1", "elsewhere"]);
    assert_eq!(text(&home.path().join("elsewhere")), b"first");
}

#[test]
fn the_part_of_a_living_run_is_left() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    let living = start(&place);
    living.write(RECORD, OURS).unwrap();
    living.write("charts/one.svg", b"living").unwrap();
    report(&place, b"other");
    assert_eq!(text(&place), b"other");
    living.finish().unwrap();
    assert_eq!(text(&place), b"living");
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn runs_at_once_all_succeed_and_one_whole_report_stands() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("deep/compare");
    let run = |number: usize| {
        let place = &place;
        move || {
            for _ in 0..25 {
                let folder = start(place);
                folder.write(RECORD, OURS).unwrap();
                for file in 0..20 {
                    folder.write(&format!("{file}.csv"), number.to_string().as_bytes()).unwrap();
                }
                folder.finish().unwrap();
            }
        }
    };
    thread::scope(|scope| {
        let runs: Vec<_> = (0..6).map(|number| scope.spawn(run(number))).collect();
        runs.into_iter().for_each(|run| run.join().unwrap());
    });
    assert_eq!(names(&home.path().join("deep")), ["compare"]);
    assert_eq!(names(&place).len(), 21);
    let first = fs::read(place.join("0.csv")).unwrap();
    assert!((1..20).all(|file| fs::read(place.join(format!("{file}.csv"))).unwrap() == first));
}

#[test]
fn what_is_not_ours_is_not_replaced() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    let judge = || ReportPlace::judge(&place, Path::new("frame.toml"));
    plant(&place, "thesis.txt", b"years of work");
    assert!(matches!(judge(), Err(StoreFault::NotOurs { .. })));
    fs::write(place.join(RECORD), br#"{"record": {"program": "another"}}"#).unwrap();
    assert!(matches!(judge(), Err(StoreFault::NotOurs { .. })));
    assert_eq!(names(&place), [RECORD, "thesis.txt"]);
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn what_came_to_stand_there_meanwhile_is_not_replaced() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    let judged = ReportPlace::judge(&place, Path::new("frame.toml")).unwrap();
    let folder = judged.start().unwrap();
    plant(&place, "thesis.txt", b"years of work");
    assert!(matches!(judged.start(), Err(StoreFault::NotOurs { .. })));
    assert!(matches!(folder.finish(), Err(StoreFault::NotOurs { .. })));
    assert_eq!(names(&place), ["thesis.txt"]);
    assert_eq!(names(home.path()), ["compare"]);
}

#[test]
fn a_report_never_replaces_the_folder_of_its_own_input() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&place, b"first");
    let input = place.join("frame.toml");
    fs::write(&input, b"title").unwrap();
    let refused = ReportPlace::judge(&place, &input);
    assert!(matches!(refused, Err(StoreFault::HoldsInput { .. })));
}

#[test]
fn an_input_in_a_report_left_aside_is_not_deleted() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    report(&place, b"first");
    let old = home.path().join(".compare.old-17");
    fs::rename(&place, &old).unwrap();
    fs::write(old.join("frame.toml"), b"title").unwrap();
    drop(ReportPlace::judge(&place, &old.join("frame.toml")).unwrap().start().unwrap());
    assert_eq!(names(home.path()), [".compare.old-17"]);
}

#[test]
fn places_that_name_no_folder_are_refused() {
    let home = tempfile::tempdir().unwrap();
    fs::write(home.path().join("file"), "text").unwrap();
    let judge = |place: &str| ReportPlace::judge(&home.path().join(place), Path::new("frame.toml"));
    assert!(matches!(judge(".."), Err(StoreFault::NoName { .. })));
    assert!(matches!(judge("nowhere/.."), Err(StoreFault::NoName { .. })));
    assert!(matches!(judge("file"), Err(StoreFault::NotFolder { .. })));
    assert!(matches!(judge("file/compare"), Err(StoreFault::NotFolder { path }) if path.ends_with("file")));
    assert!(matches!(ReportPlace::judge(Path::new("."), Path::new("x")), Err(StoreFault::NoName { .. })));
    assert!(matches!(ReportPlace::judge(Path::new("/"), Path::new("x")), Err(StoreFault::NoName { .. })));
    assert_eq!(names(home.path()), ["file"]);
}

#[test]
fn idle_ends_of_a_place_do_not_matter() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    for (end, words) in [(".", "first"), ("", "second"), ("./.", "third")] {
        report(&place.join(end), words.as_bytes());
        assert_eq!(text(&place), words.as_bytes());
    }
    assert_eq!(names(home.path()), ["compare"]);
}

#[cfg(unix)]
#[test]
fn a_link_stands_for_its_folder() {
    use std::os::unix::fs::symlink;
    let home = tempfile::tempdir().unwrap();
    let (link, target) = (home.path().join("link"), home.path().join("shelf/target"));
    report(&target, b"first");
    symlink("shelf/target", &link).unwrap();
    report(&link, b"second");
    assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
    assert_eq!(text(&target), b"second");
    assert_eq!(names(home.path()), ["link", "shelf"]);
    assert_eq!(names(&home.path().join("shelf")), ["target"]);
    fs::remove_dir_all(&target).unwrap();
    let refused = ReportPlace::judge(&link, Path::new("frame.toml"));
    assert!(matches!(refused, Err(StoreFault::DanglingLink { .. })));
}

#[cfg(target_os = "linux")]
#[test]
fn a_place_that_cannot_be_written_is_refused_at_once() {
    // Nobody may create folders there, the administrator neither.
    let refused = ReportPlace::judge(Path::new("/proc/shelf/compare"), Path::new("frame.toml"));
    assert!(matches!(refused, Err(StoreFault::System { .. })));
}

#[test]
fn the_input_of_the_report_that_is_replaced_is_named_where_it_is_another() {
    let home = tempfile::tempdir().unwrap();
    let place = home.path().join("compare");
    let input = home.path().join("frame.toml");
    fs::write(&input, "title").unwrap();
    let other_input = |name: &Path| {
        let record = format!(r#"{{"record": {{"program": "swaybound", "inputs": [{{"name": {name:?}}}]}}}}"#);
        plant(&place, RECORD, record.as_bytes());
        let folder = ReportPlace::judge(&place, &input).unwrap().start().unwrap();
        folder.other_input().map(String::from)
    };
    assert_eq!(other_input(&input), None);
    assert_eq!(other_input(&home.path().join("./compare/../frame.toml")), None);
    assert_eq!(other_input(Path::new("b/frame.toml")).as_deref(), Some("b/frame.toml"));
}
