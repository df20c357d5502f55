//! What a command found, as files, terminal text and a page.
//!
//! [`Dataset`] (the repeatable [`Record`], the [`Run`] and typed tables) becomes [`csv`], [`json`] and
//! [`workbook`] files with the same field names and full precision. [`Document`] (sentences, tables, figures)
//! becomes terminal [`text`] and a stand-alone [`html`] page with rounded numbers for people.
//! Nothing here reads a clock, a disk or a terminal: all of it comes from the caller, so equal input gives equal
//! bytes.

pub mod compare;
pub mod csv;
mod dataset;
mod document;
pub mod figure;
pub mod html;
pub mod json;
mod labels;
pub mod number;
mod record;
mod sentence;
mod split;
mod table;
pub mod text;
pub mod workbook;

pub use dataset::{Cell, ColumnInfo, Dataset, Table};
pub use document::{Block, Document, Figure, Verdict};
pub use number::Form;
pub use record::{Input, PROGRAM, Record, Run, command_line};
pub use sentence::{Sentence, Span, say};
pub use table::{Align, Column, Content, Row, State, TableBlock, TableCell};

/// Why a dataset cannot become files.
#[derive(Debug, thiserror::Error)]
pub enum Fault {
    /// A table name that files cannot carry.
    #[error("table name `{0}`: use 1 to 31 small letters, digits and `_`, once each, and neither `record` nor `run`")]
    TableName(String),
    /// A column name that files cannot carry.
    #[error("table `{table}`, column `{column}`: use small letters, digits and `_`, once each")]
    ColumnName {
        /// The table.
        table: String,
        /// The column at fault.
        column: String,
    },
    /// The CSV text could not be made.
    #[error("the CSV text of table `{table}` could not be made: {cause}")]
    Csv {
        /// The table.
        table: String,
        /// What went wrong.
        cause: String,
    },
    /// The JSON text could not be made.
    #[error("the JSON text could not be made: {0}")]
    Json(#[from] serde_json::Error),
    /// A sheet of the workbook could not be made.
    #[error("sheet `{sheet}` of the workbook: {cause}")]
    Sheet {
        /// The sheet, which is the table's name.
        sheet: String,
        /// What went wrong.
        cause: rust_xlsxwriter::XlsxError,
    },
    /// The workbook could not be made.
    #[error("the workbook could not be made: {0}")]
    Workbook(rust_xlsxwriter::XlsxError),
}
