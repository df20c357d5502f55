//! The report folder as a user meets it: what is replaced and what is not, runs at once, interrupts.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

#[path = "support/program.rs"]
mod program;

#[cfg(unix)]
use program::tree;
use program::{fails, fails_in, frame, home, names, run, stderr};
use std::fs;
use std::process::{Command, Stdio};

#[test]
fn a_folder_that_is_not_a_report_is_left_alone() {
    let home = home(&frame("fixed", "1.0"));
    fs::create_dir(home.path().join("thesis")).unwrap();
    fs::write(home.path().join("thesis/chapter.txt"), "years").unwrap();
    fails(&home, &["compare", "frame.toml", "--out", "thesis"], 4, "not a report folder");
    assert_eq!(fs::read_to_string(home.path().join("thesis/chapter.txt")).unwrap(), "years");
}

#[test]
fn a_report_is_replaced_by_the_next() {
    let home = home(&frame("fixed", "1.0"));
    assert!(run(&home, &["compare", "frame.toml", "--out", "here"]).status.success());
    let first = fs::read(home.path().join("here/report.html")).unwrap();
    fs::write(home.path().join("frame.toml"), frame("pinned", "1.0")).unwrap();
    assert!(run(&home, &["compare", "frame.toml", "--out", "here"]).status.success());
    assert_ne!(fs::read(home.path().join("here/report.html")).unwrap(), first);
    assert_eq!(names(home.path()), ["frame.toml", "here"]);
}

#[test]
fn places_that_no_report_may_take_are_left_as_they_are() {
    let home = home(&frame("fixed", "1.0"));
    let inner = home.path().join("inner");
    fs::create_dir(&inner).unwrap();
    let frame = home.path().join("frame.toml");
    let compare = |out: &str, message: &str| {
        fails_in(&inner, &home, &["compare", frame.to_str().unwrap(), "--out", out], 4, message);
    };
    compare(".", "names no folder");
    compare("..", "names no folder");
    compare("../inner", "not a report folder");
    compare("../frame.toml", "is not a folder");
    compare("../frame.toml/report", "is not a folder");
    compare("../frame.toml/", "is not a folder");
}

#[test]
fn the_place_is_judged_before_the_analysis_and_nothing_is_created_when_that_fails() {
    let unsound = home(&frame("pinned", "0"));
    fails(&unsound, &["compare", "frame.toml"], 3, "storey 1 sways");
    fails(&unsound, &["compare", "frame.toml", "--out", "deep/deeper/report"], 3, "storey 1 sways");
    fs::create_dir(unsound.path().join("thesis")).unwrap();
    fails(&unsound, &["compare", "frame.toml", "--out", "thesis"], 4, "not a report folder");
    if cfg!(target_os = "linux") {
        // Nobody may create folders there, the administrator neither.
        fails(&unsound, &["compare", "frame.toml", "--out", "/proc/shelf/x"], 4, "cannot create the report folder");
    }
}

#[test]
fn the_folder_of_the_input_is_never_replaced() {
    let home = home(&frame("fixed", "1.0"));
    assert!(run(&home, &["compare", "frame.toml", "--out", "here"]).status.success());
    fs::copy(home.path().join("frame.toml"), home.path().join("here/frame.toml")).unwrap();
    fails(&home, &["compare", "here/frame.toml", "--out", "here"], 4, "the frame file lies in this folder");
}

#[test]
fn a_report_of_another_frame_is_replaced_with_a_word() {
    let home = home(&frame("fixed", "1.0"));
    fs::create_dir(home.path().join("b")).unwrap();
    fs::copy(home.path().join("frame.toml"), home.path().join("b/frame.toml")).unwrap();
    let said = |words: &[&str]| stderr(&run(&home, &[&["compare"], words].concat()));
    assert!(!said(&["frame.toml"]).contains("warning"));
    assert!(!said(&["./frame.toml"]).contains("warning"), "the same file by another name");
    let other = said(&["b/frame.toml"]);
    assert!(other.contains("made from ./frame.toml") && other.contains("from b/frame.toml, replaces it"), "{other}");
    assert!(said(&["frame.toml", "--quiet"]).is_empty());
}

#[cfg(unix)]
#[test]
fn a_link_is_followed_and_stays_a_link() {
    let home = home(&frame("fixed", "1.0"));
    assert!(run(&home, &["compare", "frame.toml", "--out", "target/"]).status.success());
    std::os::unix::fs::symlink("target", home.path().join("link")).unwrap();
    fs::write(home.path().join("target/added.txt"), "added").unwrap();
    assert!(run(&home, &["compare", "frame.toml", "--out", "link"]).status.success());
    assert_eq!(names(home.path()), ["frame.toml", "link", "target"]);
    assert!(fs::symlink_metadata(home.path().join("link")).unwrap().is_symlink());
    assert!(!home.path().join("target/added.txt").exists(), "the report is replaced as a whole");
    std::os::unix::fs::symlink("nowhere", home.path().join("dangling")).unwrap();
    fails(&home, &["compare", "frame.toml", "--out", "dangling"], 4, "link to something that does not exist");
}

#[test]
fn programs_at_once_all_succeed_and_one_whole_report_stands() {
    let home = home(&frame("fixed", "1.0"));
    let start = || {
        let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
        command.current_dir(home.path()).args(["compare", "frame.toml", "--out", "deep/report"]);
        command.stdout(Stdio::null()).stderr(Stdio::piped()).spawn().unwrap()
    };
    for _ in 0..4 {
        let runs: Vec<_> = (0..8).map(|_| start()).collect();
        for run in runs {
            let output = run.wait_with_output().unwrap();
            assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
        }
    }
    assert_eq!(names(&home.path().join("deep")), ["report"]);
    let report = names(&home.path().join("deep/report"));
    assert!(run(&home, &["compare", "frame.toml", "--out", "alone"]).status.success());
    assert_eq!(report, names(&home.path().join("alone")));
}

/// A frame whose report takes seconds to write.
#[cfg(unix)]
fn large() -> String {
    let [bays, storeys] = ["bays    = [\"6 m\", \"7 m\"]", "storeys = [\"4 m\", \"3.5 m\"]"];
    let text = frame("fixed", "1.0").replace(bays, "bays = { count = 60, width = \"6 m\" }");
    let text = text.replace(storeys, "storeys = { count = 150, height = \"3.5 m\" }");
    text.replace("floors = [\"30 kN\", \"40 kN\"]", "base_shear = \"9000 kN\"\nshape = \"triangular\"")
}

#[cfg(unix)]
fn interrupt(process: u32) {
    assert!(Command::new("kill").args(["-INT", &process.to_string()]).status().unwrap().success());
}

/// Starts a run on `frame.toml` and waits until it is writing its report into `deep`.
#[cfg(unix)]
fn writing(home: &tempfile::TempDir) -> std::process::Child {
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    command.current_dir(home.path()).args(["compare", "frame.toml", "--out", "deep/report"]);
    let mut child = command.stdout(Stdio::piped()).stderr(Stdio::piped()).spawn().unwrap();
    let deep = home.path().join("deep");
    // Its first file stands in the part: the run is at work on the report, and seconds from its end.
    let is_writing = || {
        let parts = fs::read_dir(&deep).into_iter().flatten().flatten();
        parts.into_iter().any(|part| part.path().join("values.csv").exists() && part.file_name() != "report")
    };
    while !is_writing() {
        assert!(child.try_wait().unwrap().is_none(), "the run ended before it wrote");
        std::thread::sleep(std::time::Duration::from_millis(5));
    }
    child
}

#[cfg(unix)]
#[test]
fn an_interrupt_is_exit_code_130_and_leaves_nothing() {
    let home = home(&large());
    let before = tree(home.path());
    let child = writing(&home);
    interrupt(child.id());
    let output = child.wait_with_output().unwrap();
    assert_eq!(output.status.code(), Some(130), "{}", stderr(&output));
    assert!(stderr(&output).contains("error: interrupted"), "{}", stderr(&output));
    assert!(output.stdout.is_empty());
    assert_eq!(tree(home.path()), before);
}

#[cfg(unix)]
#[test]
fn after_an_interrupt_the_older_report_stands() {
    let home = home(&frame("fixed", "1.0"));
    assert!(run(&home, &["compare", "frame.toml", "--out", "deep/report"]).status.success());
    fs::write(home.path().join("frame.toml"), large()).unwrap();
    let before = tree(home.path());
    let child = writing(&home);
    interrupt(child.id());
    assert_eq!(child.wait_with_output().unwrap().status.code(), Some(130));
    assert!(tree(home.path()) == before, "the report or what lies beside it has changed");
}

#[cfg(unix)]
#[test]
fn what_a_killed_run_leaves_is_cleared_away_by_the_next() {
    let home = home(&large());
    let mut child = writing(&home);
    child.kill().unwrap();
    child.wait().unwrap();
    assert_eq!(names(&home.path().join("deep")).len(), 1, "the part of the killed run");
    fs::write(home.path().join("frame.toml"), frame("fixed", "1.0")).unwrap();
    assert!(run(&home, &["compare", "frame.toml", "--out", "deep/report"]).status.success());
    assert_eq!(names(&home.path().join("deep")), ["report"]);
}
