//! The schema beside the studies is current, and it tells good frame files from bad ones.
//!
//! To write it anew: `SWAYBOUND_PIN=write cargo test --release --test schema`.

#![allow(clippy::unwrap_used, clippy::panic)]

use serde_json::Value;
use std::fs;
use std::path::{Path, PathBuf};
use swaybound::frame::file;
use swaybound::frame::template::{self, TemplateOptions};
use swaybound::units::ReportUnits;

fn path(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(name)
}

fn instance(text: &str) -> Value {
    serde_json::to_value(toml::from_str::<toml::Table>(text).unwrap()).unwrap()
}

/// Files that hold a frame: a study of a family has no `[grid]` and a schema of its own.
fn frame_files() -> Vec<PathBuf> {
    let entries = fs::read_dir(path("studies")).unwrap().map(|entry| entry.unwrap().path());
    let frames = entries.filter(|path| path.extension().is_some_and(|end| end == "toml"));
    frames.filter(|path| fs::read_to_string(path).unwrap().lines().any(|line| line.trim() == "[grid]")).collect()
}

#[test]
fn the_committed_schema_is_current() {
    let file = path("studies/frame.schema.json");
    let current = serde_json::to_string_pretty(&file::schema()).unwrap() + "\n";
    if std::env::var("SWAYBOUND_PIN").is_ok_and(|value| value == "write") {
        fs::write(&file, &current).unwrap();
    }
    assert_eq!(fs::read_to_string(&file).unwrap(), current);
}

#[test]
fn every_frame_of_the_studies_is_valid_and_parses_without_warning() {
    let schema = jsonschema::validator_for(&file::schema()).unwrap();
    let files = frame_files();
    assert!(files.len() >= 4);
    for frame in files {
        let text = fs::read_to_string(&frame).unwrap();
        let errors: Vec<_> = schema.iter_errors(&instance(&text)).map(|error| error.to_string()).collect();
        assert!(errors.is_empty(), "{}: {errors:?}", frame.display());
        let read = file::parse(&text).unwrap_or_else(|fault| panic!("{}: {fault}", frame.display()));
        assert!(read.warnings.is_empty(), "{}: {:?}", frame.display(), read.warnings);
    }
}

#[test]
fn templates_are_valid() {
    let schema = jsonschema::validator_for(&file::schema()).unwrap();
    for (units, sizes_known) in [(ReportUnits::Metric, true), (ReportUnits::Us, false), (ReportUnits::Us, true)] {
        let text = template::write(&TemplateOptions { sizes_known, ..TemplateOptions::new(units) }).unwrap();
        assert!(schema.is_valid(&instance(&text)), "{text}");
    }
}

#[test]
fn the_schema_refuses_what_the_reader_refuses() {
    let schema = jsonschema::validator_for(&file::schema()).unwrap();
    let refused = [
        "key-misspelt",
        "key-unknown",
        "key-misspelt-inline",
        "number-without-unit",
        "number-without-unit-quoted",
        "unit-of-wrong-kind",
        "unit-of-wrong-kind-inertia",
        "unit-misspelt",
        "unit-unknown",
        "comma-decimal",
        "comma-grouping",
        "no-bays",
        "no-bays-count",
        "too-many-bays",
        "too-many-storeys",
        "count-quoted",
        "type-bays",
        "table-as-list",
        "factor-zero-column",
        "fixity-bad",
        "spring-wrong-kind",
        "report-units-bad",
        "shape-bad",
        "sizes-key-misspelt",
        "sizes-value-zero",
        "sizes-range-of-three",
        "sizes-tier-zero",
        "load-missing",
        "no-grid",
        "line-small-letter",
        "bay-is-a-line",
        "storeys-word",
        "within-below-one",
        "single-brackets",
        "pressure-wrong-kind",
        "poisson-percent",
        "shear-modulus-wrong-kind",
        "shear-area-other-share",
        "shear-area-number",
        "end-spring-word",
        "end-spring-key",
        "end-spring-number-left",
        "end-spring-of-columns",
        "joints-share-percent",
        "joints-length-number",
        "gravity-empty",
        "gravity-number",
        "gravity-shares-percent",
        "gravity-shares-number",
    ];
    for name in refused {
        let text = fs::read_to_string(path("tests/broken").join(name).with_extension("toml")).unwrap();
        assert!(!schema.is_valid(&instance(&text)), "{name} passes the schema");
    }
}

#[test]
fn every_key_is_described_and_every_spelling_of_a_quantity_passes() {
    let schema = file::schema();
    let definitions = schema["definitions"].as_object().unwrap().values().chain([&schema]);
    for table in definitions {
        for (key, value) in table["properties"].as_object().unwrap() {
            assert!(value["description"].is_string(), "{key} has no description");
        }
    }
    let validator = jsonschema::validator_for(&schema).unwrap();
    let lengths = [
        "7.2 m",
        "7.2m",
        "24 ft",
        "12'-6\\\"",
        "12' 6 1/2\\\"",
        "12 ft 6 in",
        "6 in",
        "30'",
        "1/2 in",
        "144\\\"",
        "12ft 6 1/2 in",
    ];
    for length in lengths {
        let text =
            format!("[grid]\nbays = [\"{length}\"]\nstoreys = [\"4 m\"]\n[lateral]\nfloors = [\"1 kN\"]\n[sizes]\n");
        file::parse(&text).unwrap();
        assert!(validator.is_valid(&instance(&text)), "{length}");
    }
}
