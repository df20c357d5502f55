//! A dataset as JSON: `{"record": {...}, "run": {...}, "<table>": [{"<column>": value, ...}, ...]}`.
//!
//! A row stands on one line, a blank is `null`, numbers carry full precision.

use super::number::full;
use super::{Cell, ColumnInfo, Dataset, Fault, PROGRAM, Table};
use serde::Serialize;

/// The whole dataset.
///
/// # Errors
/// [`Fault::Json`].
pub fn write(dataset: &Dataset) -> Result<String, Fault> {
    let mut members = heads(dataset)?;
    for table in dataset.tables() {
        members.push(member(table.name(), &rows(table)?));
    }
    Ok(object(&members))
}

/// Record and run alone, for `record.json`.
///
/// # Errors
/// [`Fault::Json`].
pub fn record(dataset: &Dataset) -> Result<String, Fault> {
    Ok(object(&heads(dataset)?))
}

/// Whether a text is a `record.json` of this program.
pub fn is_ours(text: &str) -> bool {
    let read: Option<serde_json::Value> = serde_json::from_str(text).ok();
    read.is_some_and(|file| file["record"]["program"] == PROGRAM)
}

fn heads(dataset: &Dataset) -> Result<Vec<String>, Fault> {
    Ok(vec![member("record", &pretty(dataset.record())?), member("run", &pretty(dataset.run())?)])
}

fn member(name: &str, value: &str) -> String {
    format!("  \"{name}\": {value}")
}

fn object(members: &[String]) -> String {
    format!("{{\n{}\n}}\n", members.join(",\n"))
}

/// Indented text, moved right by one level. A line feed inside a JSON string is escaped, so each one here is layout.
fn pretty(value: &impl Serialize) -> Result<String, Fault> {
    Ok(serde_json::to_string_pretty(value)?.replace('\n', "\n  "))
}

fn rows(table: &Table) -> Result<String, Fault> {
    let rows: Vec<String> =
        table.rows().iter().map(|row| object_row(table.columns(), row)).collect::<Result<_, _>>()?;
    match rows.is_empty() {
        true => Ok("[]".into()),
        false => Ok(format!("[\n    {}\n  ]", rows.join(",\n    "))),
    }
}

fn object_row(columns: &[ColumnInfo], row: &[Cell]) -> Result<String, Fault> {
    let field = |(column, cell): (&ColumnInfo, &Cell)| Ok(format!("\"{}\": {}", column.name, value(cell)?));
    let fields: Vec<String> = columns.iter().zip(row).map(field).collect::<Result<_, Fault>>()?;
    Ok(format!("{{{}}}", fields.join(", ")))
}

fn value(cell: &Cell) -> Result<String, Fault> {
    match cell {
        Cell::Text(text) => Ok(serde_json::to_string(text)?),
        Cell::Number(value) => Ok(full(*value)),
        Cell::Integer(value) => Ok(value.to_string()),
        Cell::Blank => Ok("null".into()),
    }
}
