//! The program as a user meets it: exit codes, what goes to which stream, what is written and what is not.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

#[path = "support/program.rs"]
mod program;

use program::{fails, frame, home, names, run, stderr};
use std::fs::{self, File};
use std::path::Path;

#[test]
fn a_sound_frame_gives_results_on_standard_output_and_a_report() {
    let home = home(&frame("fixed", "1.0"));
    let output = run(&home, &["compare", "frame.toml"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(String::from_utf8_lossy(&output.stdout).starts_with("Workshop\n"));
    assert!(stderr(&output).contains("report: output/frame/compare/report.html"));
    let report = names(&home.path().join("output/frame/compare"));
    for name in ["record.json", "report.html", "result.json", "results.xlsx", "values.csv", "errors.csv"] {
        assert!(report.contains(&name.to_string()), "{name}");
    }
    assert_eq!(names(&home.path().join("output/frame")), ["compare"], "nothing is left beside the report");
}

#[test]
fn quiet_leaves_standard_error_empty_and_the_results_whole() {
    let home = home(&frame("fixed", "1.0").replace("\"4 m\"", "\"16 m\""));
    let (loud, quiet) = (run(&home, &["compare", "frame.toml"]), run(&home, &["compare", "frame.toml", "--quiet"]));
    assert!(stderr(&loud).contains("16 m"), "{}", stderr(&loud));
    assert!(quiet.stderr.is_empty());
    assert!(!String::from_utf8_lossy(&loud.stdout).contains("warning"));
    assert_eq!(loud.stdout, quiet.stdout);
}

#[test]
fn absurd_results_are_warned_about_and_still_given() {
    let home = home(&frame("fixed", "1.0").replace("\"30 kN\"", "\"9000 kN\""));
    let output = run(&home, &["compare", "frame.toml"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(stderr(&output).contains("beyond 1/20"), "{}", stderr(&output));
    assert!(String::from_utf8_lossy(&output.stdout).contains("beyond 1/20"));
}

#[test]
fn new_writes_a_file_that_compare_takes_and_never_overwrites() {
    let home = tempfile::tempdir().unwrap();
    let words = ["new", "hall.toml", "--storeys", "3", "--bays", "2", "--height", "12'-6\"", "--units", "us"];
    assert_eq!(run(&home, &words).status.code(), Some(0));
    assert_eq!(names(home.path()), ["frame.schema.json", "hall.toml"]);
    let text = fs::read_to_string(home.path().join("hall.toml")).unwrap();
    assert!(text.starts_with("#:schema ./frame.schema.json\n") && text.contains("12'-6"));
    assert_eq!(run(&home, &["compare", "hall.toml"]).status.code(), Some(0));
    fails(&home, &words, 4, "exists already");
    fails(&home, &["new", "other.toml", "--height", "3.5"], 2, "needs a unit");
    fails(&home, &["new", "other.toml", "--storeys", "501"], 2, "1 to 500");
    fails(&home, &["new", "other.toml", "--forces", "1 kN,2 kN", "--base-shear", "9 kN"], 2, "cannot be used with");
}

#[test]
fn new_writes_to_standard_output_and_prints_the_schema() {
    let home = tempfile::tempdir().unwrap();
    let text = String::from_utf8(run(&home, &["new", "-", "--unknown-sizes"]).stdout).unwrap();
    assert!(text.contains("\n[sizes]\n") && !text.contains("#:schema"));
    let schema = String::from_utf8(run(&home, &["new", "--schema"]).stdout).unwrap();
    let shipped = Path::new(env!("CARGO_MANIFEST_DIR")).join("studies/frame.schema.json");
    assert_eq!(schema, fs::read_to_string(shipped).unwrap());
    assert!(names(home.path()).is_empty());
}

#[test]
fn the_csv_on_standard_output_begins_with_the_agreed_head() {
    let home = home(&frame("fixed", "1.0"));
    let output = run(&home, &["compare", "frame.toml", "--format", "csv"]);
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(text.starts_with("method,member,storey,at,quantity,value,unit\n"));
    assert!(text.contains("\nportal,column,1,A,moment_foot,-"));
    let errors = fs::read_to_string(home.path().join("output/frame/compare/errors.csv")).unwrap();
    let head =
        "method,reference,member,storey,at,quantity,exact,quick,unit,error_percent,storey_error_percent,factor,flag\n";
    assert!(errors.starts_with(head));
}

#[test]
fn units_on_the_command_line_replace_those_of_the_file() {
    let home = home(&frame("fixed", "1.0"));
    let output = run(&home, &["compare", "frame.toml", "--format", "csv", "--units", "us"]);
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(text.contains(",kip ft\n") && text.contains(",in\n") && !text.contains("kN"));
}

#[test]
fn require_turns_a_shortfall_into_exit_code_1() {
    let home = home(&frame("fixed", "1.0"));
    let code = |words: &[&str]| run(&home, words).status.code();
    assert_eq!(code(&["compare", "frame.toml", "--require", "--tolerance", "1"]), Some(1));
    assert_eq!(code(&["compare", "frame.toml", "--tolerance", "1%"]), Some(0));
    assert_eq!(code(&["compare", "frame.toml", "--require", "--tolerance", "90 %"]), Some(0));
}

#[test]
fn a_frame_that_cannot_stand_is_exit_code_3_and_names_the_storey() {
    fails(&home(&frame("pinned", "0")), &["compare", "frame.toml"], 3, "storey 1 sways without resistance");
}

/// The frame with column areas and vertical loads of `load` at each floor.
fn heavy(load: &str) -> String {
    let text = frame("fixed", "1.0").replace("inertia = \"2e-4 m4\"", "inertia = \"2e-4 m4\"\narea = \"0.01 m2\"");
    format!("{text}[gravity]\nfloors = [\"{load}\", \"{load}\"]\n")
}

#[test]
fn gravity_brings_the_second_order_answer_beside_the_first() {
    let home = home(&heavy("900 kN"));
    let output = run(&home, &["compare", "frame.toml"]);
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(text.contains("Second order over first order") && text.contains("buckles sideways at"));
    let report = home.path().join("output/frame/compare");
    let amplified = fs::read_to_string(report.join("second_order.csv")).unwrap();
    assert_eq!(amplified.lines().count(), 3);
    let first: f64 = amplified.lines().nth(1).unwrap().split(',').nth(3).unwrap().parse().unwrap();
    assert!(first > 1.0 && first < 2.0, "{amplified}");
    assert!(fs::read_to_string(report.join("values.csv")).unwrap().contains("\nsecond-order,column,1,A,moment_foot,-"));
}

#[test]
fn a_frame_that_buckles_is_exit_code_3_and_names_the_storey() {
    fails(&home(&heavy("900 MN")), &["compare", "frame.toml"], 3, "storey 1 sways without limit");
}

/// One slender column under all of the load of the top floor: not a sway, and the message says where.
#[test]
fn a_column_that_buckles_alone_is_named_by_its_joint() {
    let text = "title = \"Slender\"\n[grid]\nbays = [\"6 m\", \"6 m\"]\nstoreys = [\"4 m\", \"4 m\", \"4 m\"]\n\
                [material]\nmodulus = \"200 GPa\"\n[[columns]]\ninertia = \"3e-4 m4\"\narea = \"0.02 m2\"\n\
                [[columns]]\nstoreys = \"3\"\nlines = \"B\"\ninertia = \"2e-6 m4\"\narea = \"0.02 m2\"\n\
                [[beams]]\ninertia = \"8e-4 m4\"\n[gravity]\nfloors = [\"10 kN\", \"10 kN\", \"1800 kN\"]\n\
                lines = [0.0, 1.0, 0.0]\n[lateral]\nfloors = [\"3 kN\", \"3 kN\", \"3 kN\"]\n";
    fails(&home(text), &["compare", "frame.toml"], 3, "the columns at the joint of floor 3 on line B give way");
}

#[test]
fn chosen_methods_alone_are_run_and_unknown_ones_refused() {
    let home = home(&frame("fixed", "1.0"));
    let output = run(&home, &["compare", "frame.toml", "--methods", "factor,portal", "--format", "csv"]);
    let text = String::from_utf8(output.stdout).unwrap();
    let methods: std::collections::BTreeSet<_> =
        text.lines().skip(1).map(|line| line.split(',').next().unwrap()).collect();
    assert_eq!(methods.into_iter().collect::<Vec<_>>(), ["factor", "portal", "slope-deflection"]);
    fails(&home, &["compare", "frame.toml", "--methods", "portl"], 2, "the quick methods are portal");
}

#[test]
fn a_method_that_does_not_apply_is_refused_with_its_reason() {
    let home = home(&frame("pinned", "1.0"));
    let text = String::from_utf8(run(&home, &["compare", "frame.toml"]).stdout).unwrap();
    let words = text.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(words.contains("Wilbur's storey stiffness") && words.contains("not run:"), "{text}");
}

#[test]
fn rigid_zones_bring_moments_at_their_faces() {
    let text = heavy("1 kN") + "[joints]\ncolumn = \"0.3 m\"\nbeam = \"0.2 m\"\n";
    let home = home(&text);
    let csv = String::from_utf8(run(&home, &["compare", "frame.toml", "--format", "csv"]).stdout).unwrap();
    for method in ["portal", "stiffness", "second-order", "slope-deflection"] {
        assert!(csv.contains(&format!("\n{method},column,2,B,moment_head_face,")), "{method}");
        assert!(csv.contains(&format!("\n{method},beam,1,A-B,design_moment_face,")), "{method}");
    }
}

#[test]
fn an_analysis_that_lacks_areas_is_refused_with_the_reason() {
    let words = ["compare", "frame.toml", "--exact", "stiffness"];
    fails(&home(&frame("fixed", "1.0")), &words, 2, "not every column has an area");
}

#[test]
fn inputs_that_are_no_frame_files_get_one_message_each() {
    let home = home("");
    fs::create_dir(home.path().join("folder")).unwrap();
    fs::write(home.path().join("latin.toml"), b"title = \"x\"\n# B\xfcro\n").unwrap();
    File::create(home.path().join("huge.toml")).unwrap().set_len(100_000_000).unwrap();
    fails(&home, &["compare", "folder"], 2, "this is a folder");
    fails(&home, &["compare", "latin.toml"], 2, "latin.toml:2: the file is not UTF-8");
    fails(&home, &["compare", "huge.toml"], 2, "100000000 bytes");
    fails(&home, &["compare", "frame.toml"], 2, "empty");
    fails(&home, &["compare", "nowhere.toml"], 4, "there is no such file");
}

#[test]
fn words_that_mean_nothing_are_exit_code_2() {
    let home = home(&frame("fixed", "1.0"));
    fails(&home, &["compare", "frame.toml", "--tolerance", "0"], 2, "percentage over 0");
    fails(&home, &["compare", "frame.toml", "--tolerance", "NaN"], 2, "percentage over 0");
    fails(&home, &["compare", "frame.toml", "--formt", "csv"], 2, "--format");
    fails(&home, &["compare"], 2, "<FRAME>");
}

#[test]
fn help_shows_cautions_and_exit_codes() {
    let home = home("");
    for words in [&["--help"][..], &["compare", "--help"], &["new", "--help"]] {
        let output = run(&home, words);
        let text = String::from_utf8(output.stdout).unwrap();
        assert!(text.split_whitespace().collect::<Vec<_>>().join(" ").contains("It is not a design"), "{text}");
        assert!(text.lines().all(|line| line.chars().count() <= 100));
    }
}

#[test]
fn assumed_sizes_are_said_in_the_first_line() {
    let text = "title = \"Sketch\"\n[grid]\nbays = { count = 2, width = \"7 m\" }\n\
                storeys = { count = 3, height = \"3.6 m\" }\n[sizes]\n[lateral]\nfloors = [\"1 kN\", \"2 kN\", \"3 kN\"]\n";
    let home = home(text);
    let output = run(&home, &["compare", "frame.toml"]);
    assert!(String::from_utf8_lossy(&output.stdout).starts_with("Sketch: member sizes assumed\n"));
    let csv = String::from_utf8(run(&home, &["compare", "frame.toml", "--format", "csv"]).stdout).unwrap();
    assert!(!csv.contains("drift"), "relative sizes give no drifts");
}

#[test]
fn every_shipped_frame_runs() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("studies");
    let mut frames = 0;
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.extension().is_none_or(|end| end != "toml") {
            continue;
        }
        let home = tempfile::tempdir().unwrap();
        let output = run(&home, &["compare", path.to_str().unwrap()]);
        assert_eq!(output.status.code(), Some(0), "{}: {}", path.display(), stderr(&output));
        assert!(!stderr(&output).contains("warning"), "{}: {}", path.display(), stderr(&output));
        frames += 1;
    }
    assert!(frames >= 4);
}

#[test]
fn new_takes_floor_forces_to_the_left() {
    let home = tempfile::tempdir().unwrap();
    let output = run(&home, &["new", "hall.toml", "--forces", "-40 kN,100 kN", "--bays", "2"]);
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    assert!(fs::read_to_string(home.path().join("hall.toml")).unwrap().contains("-40 kN"));
    assert_eq!(run(&home, &["compare", "hall.toml"]).status.code(), Some(0));
    fails(&home, &["new", "other.toml", "--base-shear", "-5 kN"], 2, "base shear");
}

#[test]
fn another_schema_beside_a_new_file_is_kept_and_named() {
    let home = tempfile::tempdir().unwrap();
    fs::write(home.path().join("frame.schema.json"), "{}").unwrap();
    let output = run(&home, &["new", "hall.toml"]);
    assert_eq!(output.status.code(), Some(0));
    assert!(stderr(&output).contains("frame.schema.json: exists with other content"), "{}", stderr(&output));
    assert_eq!(fs::read_to_string(home.path().join("frame.schema.json")).unwrap(), "{}");
    fs::remove_file(home.path().join("frame.schema.json")).unwrap();
    assert!(run(&home, &["new", "second.toml"]).status.success());
    let said = stderr(&run(&home, &["new", "third.toml"]));
    assert!(!said.contains("warning"), "the same schema needs no words: {said}");
}

#[test]
fn a_tolerance_with_a_fraction_is_shown_with_it() {
    let home = home(&frame("fixed", "1.0"));
    let output = run(&home, &["compare", "frame.toml", "--tolerance", "12.5"]);
    let text = String::from_utf8(output.stdout).unwrap();
    assert!(text.contains("12.5\u{a0}%") || text.contains("12.5 %"), "{text}");
    assert!(!text.contains("tolerance of 12 %") && !text.contains("tolerance of 13 %"), "{text}");
}

#[test]
fn a_very_long_title_reaches_every_file() {
    let title = "Workshop hall ".repeat(5_000);
    let home = home(&frame("fixed", "1.0").replace("Workshop", title.trim_end()));
    let output = run(&home, &["compare", "frame.toml"]);
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    let page = fs::read_to_string(home.path().join("output/frame/compare/report.html")).unwrap();
    assert!(page.contains(title.trim_end()));
}

#[test]
fn line_ends_and_byte_order_marks_of_other_systems_change_nothing() {
    let unix = frame("fixed", "1.0");
    let values = |text: &str| {
        let home = home(text);
        let output = run(&home, &["compare", "frame.toml", "--format", "csv"]);
        assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
        output.stdout
    };
    let expected = values(&unix);
    assert_eq!(values(&unix.replace('\n', "\r\n")), expected);
    assert_eq!(values(&format!("\u{feff}{unix}")), expected);
    assert_eq!(values(&format!("\u{feff}{}", unix.replace('\n', "\r\n"))), expected);
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_standard_output_is_exit_code_4() {
    let home = home(&frame("fixed", "1.0"));
    let full = File::options().write(true).open("/dev/full").unwrap();
    let mut command = std::process::Command::new(env!("CARGO_BIN_EXE_swaybound"));
    let output = command.current_dir(home.path()).args(["compare", "frame.toml"]).stdout(full).output().unwrap();
    assert_eq!(output.status.code(), Some(4), "{}", stderr(&output));
    assert!(stderr(&output).contains("standard output could not be written"), "{}", stderr(&output));
}

#[cfg(target_os = "linux")]
#[test]
fn a_file_name_that_is_not_text_is_no_reason_to_panic() {
    use std::os::unix::ffi::OsStrExt;
    let name = std::ffi::OsStr::from_bytes(b"h\xe4lle.toml");
    let home = tempfile::tempdir().unwrap();
    fs::write(home.path().join(name), frame("fixed", "1.0")).unwrap();
    let mut command = std::process::Command::new(env!("CARGO_BIN_EXE_swaybound"));
    let output = command.current_dir(home.path()).arg("compare").arg(name).output().unwrap();
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    let mut expected = std::ffi::OsString::from("output/");
    expected.push(std::ffi::OsStr::from_bytes(b"h\xe4lle/compare/record.json"));
    let record = fs::read_to_string(home.path().join(expected)).unwrap();
    assert!(record.contains("swaybound compare 'h\u{fffd}lle.toml'"), "{record}");
}
