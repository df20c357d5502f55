//! A table as comma-separated text: a header, full precision, LF line ends.

use super::number::full;
use super::{Cell, Table};

/// The table as CSV.
///
/// # References
/// RFC 4180, but with LF alone at line ends.
pub fn write(table: &Table) -> String {
    let mut text = String::new();
    push_row(&mut text, table.columns().iter().map(|column| column.name.into()));
    for row in table.rows() {
        push_row(&mut text, row.iter().map(field));
    }
    text
}

fn field(cell: &Cell) -> String {
    match cell {
        Cell::Text(text) => text.to_string(),
        Cell::Number(value) => full(*value),
        Cell::Integer(value) => value.to_string(),
        Cell::Blank => String::new(),
    }
}

fn push_row(text: &mut String, fields: impl ExactSizeIterator<Item = String>) {
    let alone = fields.len() == 1;
    for (index, field) in fields.enumerate() {
        if index > 0 {
            text.push(',');
        }
        // A row of one empty field would read as no row.
        let quoted = field.contains([',', '"', '\n', '\r']) || (alone && field.is_empty());
        match quoted {
            true => text.push_str(&format!("\"{}\"", field.replace('"', "\"\""))),
            false => text.push_str(&field),
        }
    }
    text.push('\n');
}
