//! A table as comma-separated text: a header, full precision, LF line ends.

use super::number::full;
use super::{Cell, Fault, Table};

/// The table as CSV.
///
/// # Errors
/// [`Fault::Csv`] where the text could not be made.
///
/// # References
/// RFC 4180, but with LF alone at line ends.
pub fn write(table: &Table) -> Result<String, Fault> {
    let fault = |error: ::csv::Error| Fault::Csv { table: table.name().into(), cause: error.to_string() };
    let mut writer = ::csv::WriterBuilder::new().from_writer(Vec::new());
    writer.write_record(table.columns().iter().map(|column| column.name)).map_err(fault)?;
    for row in table.rows() {
        writer.write_record(row.iter().map(field)).map_err(fault)?;
    }
    let failed = |cause: String| Fault::Csv { table: table.name().into(), cause };
    let bytes = writer.into_inner().map_err(|error| failed(error.to_string()))?;
    String::from_utf8(bytes).map_err(|error| failed(error.to_string()))
}

fn field(cell: &Cell) -> String {
    match cell {
        Cell::Text(text) => text.to_string(),
        Cell::Number(value) => full(*value),
        Cell::Integer(value) => value.to_string(),
        Cell::Blank => String::new(),
    }
}
