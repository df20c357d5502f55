//! A table as comma-separated text: a header, full precision, LF line ends.

use super::number::full;
use super::{Cell, Fault, Table};
use std::borrow::Cow;
use std::io::{self, Write};

/// The table as CSV.
///
/// # Errors
/// [`Fault::Csv`] where the text could not be made.
///
/// # References
/// RFC 4180, but with LF alone at line ends.
pub fn write(table: &Table) -> Result<String, Fault> {
    let fault = |cause: String| Fault::Csv { table: table.name().into(), cause };
    let mut bytes = Vec::new();
    write_to(table, &mut bytes).map_err(|error| fault(error.to_string()))?;
    String::from_utf8(bytes).map_err(|error| fault(error.to_string()))
}

/// The table as CSV, row by row.
///
/// # Errors
/// What `out` returns.
pub fn write_to(table: &Table, out: &mut dyn Write) -> io::Result<()> {
    let mut writer = ::csv::WriterBuilder::new().from_writer(out);
    writer.write_record(table.columns().iter().map(|column| column.name))?;
    for row in table.rows() {
        writer.write_record(row.iter().map(field))?;
    }
    writer.flush()
}

fn field(cell: &Cell) -> Cow<'_, [u8]> {
    match cell {
        Cell::Text(text) => text.as_bytes().into(),
        Cell::Number(value) => full(*value).into_bytes().into(),
        Cell::Integer(value) => value.to_string().into_bytes().into(),
        Cell::Blank => Cow::default(),
    }
}
