//! The result of a command as data: record, run and typed tables.

use super::number::unsigned_zero;
use super::{Fault, Record, Run};
use std::borrow::Cow;
use std::collections::HashSet;

/// Longest table name: the limit of a workbook's sheet names.
const LONGEST_NAME: usize = 31;

/// Everything a command found, ready to become files.
#[derive(Debug, Clone, PartialEq)]
pub struct Dataset {
    record: Record,
    run: Run,
    tables: Vec<Table>,
}

impl Dataset {
    /// Puts record, run and tables together.
    ///
    /// # Errors
    /// [`Fault::TableName`] or [`Fault::ColumnName`] where a name is empty, doubled, taken or has letters that file
    /// names, JSON keys or sheet names would have to change.
    pub fn new(record: Record, run: Run, tables: Vec<Table>) -> Result<Self, Fault> {
        let mut names = HashSet::from(["record", "run"]);
        for table in &tables {
            if !plain(table.name) || table.name.len() > LONGEST_NAME || !names.insert(table.name) {
                return Err(Fault::TableName(table.name.into()));
            }
            let mut columns = HashSet::new();
            if let Some(bad) = table.columns.iter().find(|column| !plain(column.name) || !columns.insert(column.name)) {
                return Err(Fault::ColumnName { table: table.name.into(), column: bad.name.into() });
            }
        }
        Ok(Self { record, run, tables })
    }

    /// The repeatable part.
    pub fn record(&self) -> &Record {
        &self.record
    }

    /// The part that differs from run to run.
    pub fn run(&self) -> &Run {
        &self.run
    }

    /// The tables in order.
    pub fn tables(&self) -> &[Table] {
        &self.tables
    }

    /// The table of that name.
    pub fn table(&self, name: &str) -> Option<&Table> {
        self.tables.iter().find(|table| table.name == name)
    }
}

fn plain(name: &str) -> bool {
    !name.is_empty() && name.bytes().all(|byte| matches!(byte, b'a'..=b'z' | b'0'..=b'9' | b'_'))
}

/// A column of a [`Table`].
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct ColumnInfo {
    /// Name in every file.
    pub name: &'static str,
    /// What it holds, with its unit where it has one, for the workbook's first sheet and the format's documentation.
    pub description: &'static str,
}

/// A table whose rows all have one cell per column.
#[derive(Debug, Clone, PartialEq)]
pub struct Table {
    name: &'static str,
    columns: &'static [ColumnInfo],
    rows: Vec<Vec<Cell>>,
}

impl Table {
    /// A table of `N` columns; that every row has `N` cells is held by the compiler.
    ///
    /// Numbers are tidied: `-0` becomes `0`, and a number that is not finite becomes [`Cell::Blank`], because no file
    /// format here can carry it and a blank says "no value" in all of them.
    pub fn new<const N: usize>(
        name: &'static str,
        columns: &'static [ColumnInfo; N],
        rows: impl IntoIterator<Item = [Cell; N]>,
    ) -> Self {
        let rows = rows.into_iter().map(|row| row.map(Cell::tidy).into()).collect();
        Self { name, columns, rows }
    }

    /// Name of the table: its key in JSON, its file's stem, its sheet.
    pub fn name(&self) -> &'static str {
        self.name
    }

    /// The columns in order.
    pub fn columns(&self) -> &'static [ColumnInfo] {
        self.columns
    }

    /// The rows, each with one cell per column.
    pub fn rows(&self) -> &[Vec<Cell>] {
        &self.rows
    }
}

/// One entry of a [`Table`].
#[derive(Debug, Clone, PartialEq)]
pub enum Cell {
    /// A name, a flag, a unit.
    Text(Cow<'static, str>),
    /// A measured or computed number.
    Number(f64),
    /// A count or an index.
    Integer(i64),
    /// No value.
    Blank,
}

impl Cell {
    fn tidy(self) -> Self {
        match self {
            Self::Number(value) if value.is_finite() => Self::Number(unsigned_zero(value)),
            Self::Number(_) => Self::Blank,
            other => other,
        }
    }
}

impl From<f64> for Cell {
    fn from(value: f64) -> Self {
        Self::Number(value)
    }
}

impl From<usize> for Cell {
    /// A count; one beyond the largest 64-bit signed integer becomes a number.
    fn from(value: usize) -> Self {
        i64::try_from(value).map_or(Self::Number(value as f64), Self::Integer)
    }
}

impl From<i64> for Cell {
    fn from(value: i64) -> Self {
        Self::Integer(value)
    }
}

impl From<&'static str> for Cell {
    fn from(text: &'static str) -> Self {
        Self::Text(text.into())
    }
}

impl From<String> for Cell {
    fn from(text: String) -> Self {
        Self::Text(text.into())
    }
}

impl<T: Into<Self>> From<Option<T>> for Cell {
    fn from(value: Option<T>) -> Self {
        value.map_or(Self::Blank, Into::into)
    }
}
