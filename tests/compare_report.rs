//! The reports of a comparison, as documents: nothing in them points nowhere, whatever the frame.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

use std::fs;
use std::path::Path;
use swaybound::compare::{Options, compare};
use swaybound::frame::file::parse;
use swaybound::report::compare::{Findings, brief, charts, page};
use swaybound::report::{Figure, Record};

#[track_caller]
fn without_faults(name: &str, text: &str) {
    let file = parse(text).unwrap_or_else(|fault| panic!("{name}: {fault}"));
    let comparison = compare(&file.frame, &file.options, Options::default()).unwrap();
    let findings = Findings { file: &file, comparison: &comparison, warnings: &[] };
    let figures: Vec<Figure> = charts(&findings).iter().map(|chart| chart.figure()).collect();
    let page = page(&findings, &Record::new("compare", "swaybound compare".into()), figures);
    assert_eq!(page.faults(), Vec::<String>::new(), "{name}, page");
    assert_eq!(brief(&findings).faults(), Vec::<String>::new(), "{name}, terminal");
}

#[test]
fn shipped_frames_make_reports_without_faults() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("studies");
    let files = fs::read_dir(folder).unwrap().map(|entry| entry.unwrap().path());
    let mut frames = 0;
    for path in files.filter(|path| path.extension().is_some_and(|end| end == "toml")) {
        without_faults(&path.display().to_string(), &fs::read_to_string(&path).unwrap());
        frames += 1;
    }
    assert!(frames >= 5);
}

#[test]
fn frames_at_the_edges_make_reports_without_faults() {
    let frame = |bays: usize, storeys: usize, feet: &str, factor: &str| {
        format!(
            "title = \"Edge\"\n[grid]\nbays = {{ count = {bays}, width = \"6 m\" }}\n\
             storeys = {{ count = {storeys}, height = \"3.5 m\" }}\n[feet]\nfixity = \"{feet}\"\n\
             [material]\nmodulus = \"30 GPa\"\n[[columns]]\ninertia = \"3e-3 m4\"\n\
             [[beams]]\ninertia = \"2e-3 m4\"\nstiffness_factor = {factor}\n[lateral]\nbase_shear = \"90 kN\"\nshape = \"uniform\"\n"
        )
    };
    for (bays, storeys, feet, factor) in [
        (1, 1, "fixed", "1"),
        (1, 2, "pinned", "1"),
        (2, 3, "fixed", "0"),
        (13, 2, "pinned", "1"),
        (1, 61, "fixed", "1"),
    ] {
        without_faults(
            &format!("{bays} bays, {storeys} storeys, {feet}, {factor}"),
            &frame(bays, storeys, feet, factor),
        );
    }
}
