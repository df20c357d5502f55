//! A dataset as JSON: `{"record": {...}, "run": {...}, "<table>": [{"<column>": value, ...}, ...]}`.
//!
//! A row stands on one line, a blank is `null`, numbers carry full precision.

use super::number::full;
use super::{Cell, Dataset, Fault, PROGRAM, Table};
use serde::Serialize;
use serde::ser::Error;
use std::io::{self, Write};

/// The whole dataset.
///
/// # Errors
/// [`Fault::Json`].
pub fn write(dataset: &Dataset) -> Result<String, Fault> {
    let mut bytes = Vec::new();
    write_to(dataset, &mut bytes).map_err(serde_json::Error::custom)?;
    String::from_utf8(bytes).map_err(|error| serde_json::Error::custom(error).into())
}

/// The whole dataset, row by row.
///
/// # Errors
/// What `out` returns.
pub fn write_to(dataset: &Dataset, out: &mut dyn Write) -> io::Result<()> {
    write!(out, "{{\n{}", heads(dataset)?.join(",\n"))?;
    for table in dataset.tables() {
        write!(out, ",\n{}", member(table.name(), ""))?;
        rows(table, out)?;
    }
    out.write_all(b"\n}\n")
}

/// Record and run alone, for `record.json`.
///
/// # Errors
/// [`Fault::Json`].
pub fn record(dataset: &Dataset) -> Result<String, Fault> {
    Ok(format!("{{\n{}\n}}\n", heads(dataset)?.join(",\n")))
}

/// Whether a text is a `record.json` of this program.
pub fn is_ours(text: &str) -> bool {
    inputs_of_ours(text).is_some()
}

/// Names of the inputs in a `record.json` of this program, as typed then; `None` for any other text.
pub fn inputs_of_ours(text: &str) -> Option<Vec<String>> {
    let file: serde_json::Value = serde_json::from_str(text).ok()?;
    let record = &file["record"];
    let inputs = record["inputs"].as_array().into_iter().flatten();
    (record["program"] == PROGRAM).then(|| inputs.filter_map(|input| Some(input["name"].as_str()?.into())).collect())
}

fn heads(dataset: &Dataset) -> Result<[String; 2], serde_json::Error> {
    Ok([member("record", &pretty(dataset.record())?), member("run", &pretty(dataset.run())?)])
}

fn member(name: &str, value: &str) -> String {
    format!("  \"{name}\": {value}")
}

/// Indented text, moved right by one level. A line feed inside a JSON string is escaped, so each one here is layout.
fn pretty(value: &impl Serialize) -> Result<String, serde_json::Error> {
    Ok(serde_json::to_string_pretty(value)?.replace('\n', "\n  "))
}

fn rows(table: &Table, out: &mut dyn Write) -> io::Result<()> {
    if table.rows().is_empty() {
        return out.write_all(b"[]");
    }
    for (index, row) in table.rows().iter().enumerate() {
        out.write_all(if index == 0 { b"[\n    {" } else { b",\n    {" })?;
        for (place, (column, cell)) in table.columns().iter().zip(row).enumerate() {
            write!(out, "{}\"{}\": ", if place == 0 { "" } else { ", " }, column.name)?;
            value(cell, out)?;
        }
        out.write_all(b"}")?;
    }
    out.write_all(b"\n  ]")
}

fn value(cell: &Cell, out: &mut dyn Write) -> io::Result<()> {
    match cell {
        Cell::Text(text) => Ok(serde_json::to_writer(out, text)?),
        Cell::Number(value) => out.write_all(full(*value).as_bytes()),
        Cell::Integer(value) => write!(out, "{value}"),
        Cell::Blank => out.write_all(b"null"),
    }
}
