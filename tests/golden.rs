//! One frame from file to every output, pinned: text, page and charts byte for byte, numbers field by field.
//!
//! To pin anew: `SWAYBOUND_PIN=write cargo test --release --test golden`, then read the difference.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

#[path = "support/pin.rs"]
mod pin;

use assert_cmd::Command;
use serde_json::Value;
use std::collections::HashMap;
use std::fs;
use std::path::{Path, PathBuf};
use tempfile::TempDir;

/// Numbers in files may differ by this share of themselves, or of 1 near zero: the arithmetic is the same on every
/// machine, but a compiler may order a sum differently.
const TOLERANCE: f64 = 1e-9;

fn golden(name: &str) -> PathBuf {
    pin::project("tests/golden/compare").join(name)
}

/// Runs `compare` on the golden frame in an empty folder; gives the folder and standard output.
fn run(options: &[&str]) -> (TempDir, String) {
    let home = tempfile::tempdir().unwrap();
    fs::copy(golden("frame.toml"), home.path().join("frame.toml")).unwrap();
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    let output = command.current_dir(home.path()).args(["compare", "frame.toml"]).args(options).output().unwrap();
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    (home, String::from_utf8(output.stdout).unwrap())
}

fn report(home: &TempDir) -> PathBuf {
    home.path().join("output/frame/compare")
}

fn close(pinned: f64, found: f64) -> bool {
    (pinned - found).abs() <= TOLERANCE * pinned.abs().max(1.0)
}

#[test]
fn standard_output_is_the_pinned_text() {
    let (_, text) = run(&[]);
    pin::same(&golden("stdout.txt"), &text).unwrap();
    assert!(text.lines().all(|line| line.chars().count() <= 100));
}

#[test]
fn page_and_charts_are_the_pinned_bytes() {
    let (home, _) = run(&[]);
    let mut files: Vec<_> = fs::read_dir(report(&home)).unwrap().map(|entry| entry.unwrap().path()).collect();
    files.sort();
    let text_files = files.iter().filter(|path| path.extension().is_some_and(|end| end == "svg" || end == "html"));
    let different: Vec<_> = text_files
        .filter_map(|path| {
            let found = fs::read_to_string(path).unwrap();
            pin::same(&golden(path.file_name().unwrap().to_str().unwrap()), &found).err()
        })
        .collect();
    assert!(different.is_empty(), "{}", different.join("\n"));
}

#[test]
fn csv_fields_are_the_pinned_ones() {
    let (home, stdout) = run(&["--format", "csv"]);
    let values = fs::read_to_string(report(&home).join("values.csv")).unwrap();
    assert_eq!(stdout, values, "standard output carries the file");
    for name in
        ["values.csv", "errors.csv", "verdicts.csv", "feet.csv", "methods.csv", "statics.csv", "equilibrium.csv"]
    {
        let found = fs::read_to_string(report(&home).join(name)).unwrap();
        same_fields(name, &pin::pinned(&golden(name), &found), &found);
    }
}

fn same_fields(name: &str, pinned: &str, found: &str) {
    assert_eq!(pinned.lines().count(), found.lines().count(), "{name}");
    let rows = |text: &str| {
        let mut reader = csv::ReaderBuilder::new().has_headers(false).from_reader(text.as_bytes());
        reader.records().map(|record| record.unwrap()).collect::<Vec<_>>()
    };
    for (line, (pinned, found)) in rows(pinned).iter().zip(&rows(found)).enumerate() {
        assert_eq!(pinned.len(), found.len(), "{name}:{}", line + 1);
        for (pinned, found) in pinned.iter().zip(found) {
            let same = match (pinned.parse::<f64>(), found.parse::<f64>()) {
                (Ok(pinned), Ok(found)) => close(pinned, found),
                _ => pinned == found,
            };
            assert!(same, "{name}:{}: {pinned} pinned, {found} found", line + 1);
        }
    }
}

#[test]
fn json_is_the_pinned_one_field_by_field_but_for_the_run() {
    let (home, stdout) = run(&["--format", "json"]);
    assert_eq!(stdout, fs::read_to_string(report(&home).join("result.json")).unwrap());
    let mut found: Value = serde_json::from_str(&stdout).unwrap();
    let run = found.as_object_mut().unwrap().remove("run").unwrap();
    assert!(run["start"].is_string() && run["seconds"].is_number() && run["threads"] == 1 && run["host"].is_string());
    let text = serde_json::to_string_pretty(&found).unwrap() + "\n";
    let pinned: Value = serde_json::from_str(&pin::pinned(&golden("result.json"), &text)).unwrap();
    same_json("$", &pinned, &found);
    let record: Value = serde_json::from_str(&fs::read_to_string(report(&home).join("record.json")).unwrap()).unwrap();
    assert_eq!(record["record"], found["record"]);
}

fn same_json(place: &str, pinned: &Value, found: &Value) {
    match (pinned, found) {
        (Value::Number(a), Value::Number(b)) => {
            assert!(close(a.as_f64().unwrap(), b.as_f64().unwrap()), "{place}: {a} pinned, {b} found");
        }
        (Value::Array(a), Value::Array(b)) => {
            assert_eq!(a.len(), b.len(), "{place}");
            a.iter().zip(b).enumerate().for_each(|(index, (a, b))| same_json(&format!("{place}[{index}]"), a, b));
        }
        (Value::Object(a), Value::Object(b)) => {
            assert!(a.keys().eq(b.keys()), "{place}: keys differ");
            a.iter().zip(b).for_each(|((key, a), (_, b))| same_json(&format!("{place}.{key}"), a, b));
        }
        _ => assert_eq!(pinned, found, "{place}"),
    }
}

/// What rounding leaves differs from machine to machine, so it is bounded, not pinned.
#[test]
fn statics_close_in_every_row() {
    let (home, _) = run(&[]);
    let mut reader = csv::Reader::from_path(report(&home).join("equilibrium.csv")).unwrap();
    let relative = reader.headers().unwrap().iter().position(|head| head == "relative").unwrap();
    let rows: Vec<f64> = reader.records().map(|record| record.unwrap()[relative].parse().unwrap()).collect();
    assert!(rows.len() >= 5 * 6 && rows.iter().all(|relative| relative.abs() < 1e-12), "{rows:?}");
}

#[test]
fn the_workbook_holds_every_table() {
    use calamine::{Reader, Xlsx, open_workbook};
    let (home, _) = run(&[]);
    let mut book: Xlsx<_> = open_workbook(report(&home).join("results.xlsx")).unwrap();
    let tables = ["values", "errors", "verdicts", "feet", "methods", "second_order", "statics", "equilibrium"];
    let sheets: Vec<_> = std::iter::once("About").chain(tables).collect();
    assert_eq!(book.sheet_names(), sheets);
    for sheet in &sheets[1..] {
        let csv = fs::read_to_string(report(&home).join(format!("{sheet}.csv"))).unwrap();
        assert_eq!(book.worksheet_range(sheet).unwrap().height(), csv.lines().count(), "{sheet}");
    }
}

#[test]
fn pictures_have_size_and_ink() {
    let (home, _) = run(&["--png"]);
    let (mut pictures, mut charts) = (0, 0);
    for entry in fs::read_dir(report(&home)).unwrap() {
        let path = entry.unwrap().path();
        charts += usize::from(path.extension().is_some_and(|end| end == "svg"));
        if path.extension().is_none_or(|end| end != "png") {
            continue;
        }
        let bytes = fs::read(&path).unwrap();
        let picture = resvg::tiny_skia::Pixmap::decode_png(&bytes).unwrap();
        let svg = fs::read_to_string(path.with_extension("svg")).unwrap();
        let document = roxmltree::Document::parse(&svg).unwrap();
        let width: f64 = document.root_element().attribute("width").unwrap().parse().unwrap();
        assert!((f64::from(picture.width()) - 2.0 * width).abs() <= 1.0, "{}", path.display());
        let inked = picture.pixels().iter().filter(|pixel| pixel.red() < 200).count();
        assert!(inked * 100 > picture.pixels().len(), "{}: {inked} dark pixels", path.display());
        pictures += 1;
    }
    assert!(pictures >= 6 && pictures == charts, "{pictures} pictures of {charts} charts");
}

#[test]
fn two_runs_differ_in_the_run_alone() {
    let ((first, _), (second, _)) = (run(&[]), run(&[]));
    for entry in fs::read_dir(report(&first)).unwrap() {
        let name = entry.unwrap().file_name();
        if name == "result.json" || name == "record.json" {
            continue;
        }
        let read = |home: &TempDir| fs::read(report(home).join(Path::new(&name))).unwrap();
        assert!(read(&first) == read(&second), "{}", name.display());
    }
}

/// The pictures of the README are those of the shipped main example.
#[test]
fn the_pictures_of_the_readme_are_current() {
    let home = tempfile::tempdir().unwrap();
    let study = pin::project("studies/research-institute.toml");
    let mut command = Command::new(env!("CARGO_BIN_EXE_swaybound"));
    command.current_dir(home.path()).arg("compare").arg(study).assert().success();
    let readme = fs::read_to_string(pin::project("README.md")).unwrap();
    let folder = "tests/golden/research-institute/";
    the_numbers_of_the_readme_are_current(&readme, &home.path().join("output/research-institute/compare/verdicts.csv"));
    let shown: Vec<_> =
        readme.split("](").skip(1).filter_map(|rest| rest.split(')').next()?.strip_prefix(folder)).collect();
    assert!(shown.len() >= 3, "the README shows {} pictures", shown.len());
    for name in shown {
        let found = fs::read_to_string(home.path().join("output/research-institute/compare").join(name)).unwrap();
        pin::same(&pin::project(folder).join(name), &found).unwrap();
    }
}

/// The README says how far the least short method is off for column moments, where, and for column shears.
fn the_numbers_of_the_readme_are_current(readme: &str, verdicts: &Path) {
    let mut reader = csv::Reader::from_path(verdicts).unwrap();
    let rows: Vec<HashMap<String, String>> = reader.deserialize().map(|row| row.unwrap()).collect();
    let number = |row: &HashMap<String, String>, name: &str| row[name].parse::<f64>().unwrap();
    let least_short = |quantity: &str| {
        let whole = rows.iter().filter(|row| row["member"] == "column" && row["band"] == "all");
        let of_quantity = whole.filter(|row| row["quantity"] == quantity);
        of_quantity.max_by(|a, b| number(a, "lowest_percent").total_cmp(&number(b, "lowest_percent"))).unwrap()
    };
    let (moments, shears) = (least_short("design_moment"), least_short("shear"));
    let short = (-number(moments, "lowest_percent")).ceil();
    let shear = number(shears, "highest_percent").max(-number(shears, "lowest_percent")).ceil();
    let words = [
        format!("`{}` comes closest", moments["method"]),
        format!("{short} % short in column {}, storey {}", moments["lowest_at"], moments["lowest_storey"]),
        format!("`{}` is within {shear} %", shears["method"]),
    ];
    for words in words {
        assert!(readme.contains(&words), "the README does not say: {words}");
    }
}
