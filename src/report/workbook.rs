//! A dataset as a workbook: an `About` sheet, then one sheet per table.
//!
//! Values keep full precision; only their display is rounded. Dates are fixed, so equal datasets give equal bytes.

use super::number::exponent;
use super::{Cell, Dataset, Fault, Record, Table};
use rust_xlsxwriter::{DocProperties, ExcelDateTime, Format, FormatAlign, Workbook, Worksheet, XlsxError};

/// Name of the first sheet. Table names have small letters, so none can clash.
const ABOUT: &str = "About";
/// Rows of a sheet, its head among them, a limit of the file format.
const MOST_ROWS: usize = 1_048_576;
/// Longest text of a cell, a limit of the file format.
const LONGEST_TEXT: usize = 32_767;
/// Columns are at least and at most so wide, in characters.
const COLUMN_WIDTHS: (usize, usize) = (9, 44);
/// Room for the filter button beside a head, in characters.
const FILTER_BUTTON: usize = 3;
/// Figures shown of a number; the cell holds them all.
const FIGURES_SHOWN: i32 = 4;

/// What the first sheet says besides the record.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct About {
    /// Title of the report.
    pub title: String,
    /// What a reader must know before using the numbers.
    pub cautions: Vec<String>,
    /// Anything else, such as sign conventions.
    pub notes: Vec<String>,
}

/// The bytes of the workbook. A table with more rows than a sheet holds (1 048 576, its head among them) is left out, and
/// the first sheet says so.
///
/// # Errors
/// [`Fault::Sheet`] where a table exceeds another limit of the format (16 384 columns, 32 767 characters a cell).
pub fn write(dataset: &Dataset, about: &About) -> Result<Vec<u8>, Fault> {
    write_up_to(MOST_ROWS, dataset, about)
}

/// The workbook with sheets of at most so many rows.
fn write_up_to(most_rows: usize, dataset: &Dataset, about: &About) -> Result<Vec<u8>, Fault> {
    let mut book = Workbook::new();
    let created = ExcelDateTime::from_ymd(2000, 1, 1).map_err(Fault::Workbook)?;
    let author = format!("{} {}", dataset.record().program, dataset.record().version);
    book.set_properties(
        &DocProperties::new().set_title(&about.title).set_author(author).set_creation_datetime(&created),
    );
    let formats = Formats::new();
    let named = |sheet: &str| {
        let sheet = sheet.to_string();
        move |cause| Fault::Sheet { sheet, cause }
    };
    let (held, left_out): (Vec<_>, Vec<_>) = dataset.tables().iter().partition(|table| table.rows().len() < most_rows);
    let left_out: Vec<_> = left_out.into_iter().map(|table| reason(table, most_rows)).collect();
    let mut page = Page { sheet: book.add_worksheet(), formats: &formats, line: 0, most_rows };
    page.fill(dataset, about, &left_out).map_err(named(ABOUT))?;
    for table in held {
        fill_table(book.add_worksheet(), table, &formats).map_err(named(table.name()))?;
    }
    book.save_to_buffer().map_err(Fault::Workbook)
}

struct Formats {
    title: Format,
    head: Format,
    wrapped: Format,
    fixed_pitch: Format,
    whole: Format,
    percent: Format,
    decimals: [Format; 6],
    powers: Format,
}

impl Formats {
    fn new() -> Self {
        let number = |pattern: &str| Format::new().set_num_format(pattern);
        Self {
            title: Format::new().set_bold().set_font_size(14),
            head: Format::new().set_bold(),
            wrapped: Format::new().set_text_wrap().set_align(FormatAlign::Top),
            fixed_pitch: Format::new().set_font_name("Courier New").set_font_size(9),
            whole: number("0"),
            percent: number("0.0"),
            decimals: ["0", "0.0", "0.00", "0.000", "0.0000", "0.00000"].map(number),
            powers: number("0.000E+00"),
        }
    }

    /// Decimals that show [`FIGURES_SHOWN`] figures of the number; percentages have one decimal.
    fn of(&self, column: &str, value: f64) -> &Format {
        if column.ends_with("percent") {
            return &self.percent;
        }
        let exponent = exponent(value);
        match usize::try_from((FIGURES_SHOWN - 1 - exponent).max(0)) {
            Ok(places) if places < self.decimals.len() && exponent < 10 => &self.decimals[places],
            _ => &self.powers,
        }
    }
}

fn fill_table(sheet: &mut Worksheet, table: &Table, formats: &Formats) -> Result<(), XlsxError> {
    sheet.set_name(table.name())?;
    for (index, column) in table.columns().iter().enumerate() {
        let at = place(index)?;
        sheet.write_string_with_format(0, at, column.name, &formats.head)?;
        sheet.set_column_width(at, width(table, index) as f64)?;
    }
    for (index, row) in table.rows().iter().enumerate() {
        let line = u32::try_from(index + 1).map_err(|_| XlsxError::RowColumnLimitError)?;
        for (index, cell) in row.iter().enumerate() {
            let at = place(index)?;
            match cell {
                Cell::Text(text) => sheet.write_string(line, at, text.as_ref())?,
                Cell::Number(value) => {
                    sheet.write_number_with_format(line, at, *value, formats.of(table.columns()[index].name, *value))?
                }
                Cell::Integer(value) => sheet.write_number_with_format(line, at, *value as f64, &formats.whole)?,
                Cell::Blank => continue,
            };
        }
    }
    if !table.columns().is_empty() {
        let last_row = u32::try_from(table.rows().len()).map_err(|_| XlsxError::RowColumnLimitError)?;
        sheet.autofilter(0, 0, last_row, place(table.columns().len() - 1)?)?;
    }
    sheet.set_freeze_panes(1, 0)?;
    sheet.set_repeat_rows(0, 0)?;
    sheet.set_landscape().set_print_fit_to_pages(1, 0).set_footer("&L&A&RPage &P of &N");
    Ok(())
}

fn place(index: usize) -> Result<u16, XlsxError> {
    u16::try_from(index).map_err(|_| XlsxError::RowColumnLimitError)
}

fn width(table: &Table, column: usize) -> usize {
    let shown = |cell: &Cell| match cell {
        Cell::Text(text) => text.chars().count(),
        Cell::Number(_) => FIGURES_SHOWN as usize + 3,
        Cell::Integer(value) => value.to_string().len(),
        Cell::Blank => 0,
    };
    let longest = table.rows().iter().map(|row| shown(&row[column])).max().unwrap_or(0);
    let head = table.columns()[column].name.len() + FILTER_BUTTON;
    (longest + 1).max(head).clamp(COLUMN_WIDTHS.0, COLUMN_WIDTHS.1)
}

/// Why a table has no sheet, and where it is found.
fn reason(table: &Table, most_rows: usize) -> String {
    let (name, rows, most) = (table.name(), table.rows().len(), most_rows - 1);
    format!(
        "{name}: {rows} rows, more than a sheet holds below its head ({most}). {name}.csv and result.json hold them."
    )
}

/// The `About` sheet, filled from the top down.
struct Page<'a> {
    sheet: &'a mut Worksheet,
    formats: &'a Formats,
    line: u32,
    most_rows: usize,
}

impl Page<'_> {
    fn fill(&mut self, dataset: &Dataset, about: &About, left_out: &[String]) -> Result<(), XlsxError> {
        let sheet = &mut self.sheet;
        sheet.set_name(ABOUT)?;
        sheet.set_column_width(0, 24)?.set_column_width(1, 26)?.set_column_width(2, 90)?;
        sheet.set_landscape().set_print_fit_to_pages(1, 0);
        sheet.write_string_with_format(0, 0, fitting(&about.title), &self.formats.title)?;
        self.line = 1;
        self.sentences("Cautions", &about.cautions)?;
        self.sentences("Left out of this workbook", left_out)?;
        self.sentences("Notes", &about.notes)?;
        self.record(dataset.record())?;
        self.columns(dataset.tables())?;
        self.inputs(dataset.record())
    }

    fn head(&mut self, texts: &[&str]) -> Result<(), XlsxError> {
        self.line += 1;
        for (at, text) in (0..).zip(texts) {
            self.sheet.write_string_with_format(self.line, at, *text, &self.formats.head)?;
        }
        self.line += 1;
        Ok(())
    }

    fn sentences(&mut self, head: &str, sentences: &[String]) -> Result<(), XlsxError> {
        if sentences.is_empty() {
            return Ok(());
        }
        self.head(&[head])?;
        for sentence in sentences {
            self.sheet.merge_range(self.line, 0, self.line, 2, &fitting(sentence), &self.formats.wrapped)?;
            // A merged row does not grow by itself; about 125 characters stand on its line, which is 15 points high.
            let lines = sentence.chars().count() / 125 + 1;
            self.sheet.set_row_height(self.line, 15.0 * lines as f64)?;
            self.line += 1;
        }
        Ok(())
    }

    fn record(&mut self, record: &Record) -> Result<(), XlsxError> {
        self.head(&["Record"])?;
        for (name, value) in record.entries() {
            self.sheet.write_string(self.line, 0, name)?;
            self.sheet.write_string(self.line, 1, fitting(&value))?;
            self.line += 1;
        }
        Ok(())
    }

    fn columns(&mut self, tables: &[Table]) -> Result<(), XlsxError> {
        self.head(&["Sheet", "Column", "Meaning"])?;
        for table in tables {
            for column in table.columns() {
                self.sheet.write_string(self.line, 0, table.name())?;
                self.sheet.write_string(self.line, 1, column.name)?;
                self.sheet.write_string_with_format(self.line, 2, column.description, &self.formats.wrapped)?;
                self.line += 1;
            }
        }
        Ok(())
    }

    fn inputs(&mut self, record: &Record) -> Result<(), XlsxError> {
        for input in &record.inputs {
            self.head(&[&fitting(&format!("Input file {}", input.name))])?;
            if self.line as usize + input.text.lines().count() > self.most_rows {
                self.sheet.write_string(
                    self.line,
                    0,
                    "The file has more lines than a sheet holds: see record.json.",
                )?;
                continue;
            }
            for line in input.text.lines() {
                self.sheet.write_string_with_format(self.line, 0, fitting(line), &self.formats.fixed_pitch)?;
                self.line += 1;
            }
        }
        Ok(())
    }
}

/// The text, cut to what a cell can hold.
fn fitting(text: &str) -> String {
    match text.chars().count() > LONGEST_TEXT {
        true => text.chars().take(LONGEST_TEXT - 1).chain(['…']).collect(),
        false => text.into(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::{ColumnInfo, Input, Run};
    use calamine::{Reader, Xlsx};
    use std::io::Cursor;
    use std::time::{Duration, UNIX_EPOCH};

    static COLUMNS: [ColumnInfo; 1] = [ColumnInfo { name: "storey", description: "which storey" }];

    fn table(name: &'static str, rows: usize) -> Table {
        Table::new(name, &COLUMNS, (0..rows).map(|row| [Cell::from(row)]))
    }

    fn book(most_rows: usize, input: &str) -> Xlsx<Cursor<Vec<u8>>> {
        let record = Record::new("compare", String::new()).with_input(Input::new("frame.toml", input));
        let run = Run::new(UNIX_EPOCH, Duration::ZERO, 1, "host");
        let dataset = Dataset::new(record, run, vec![table("fits", most_rows - 1), table("long", most_rows)]).unwrap();
        let bytes = write_up_to(most_rows, &dataset, &About::default()).unwrap();
        Xlsx::new(Cursor::new(bytes)).unwrap()
    }

    fn words(book: &mut Xlsx<Cursor<Vec<u8>>>) -> String {
        let range = book.worksheet_range(ABOUT).unwrap();
        range.used_cells().map(|(_, _, cell)| cell.to_string() + "\n").collect()
    }

    #[test]
    fn a_table_longer_than_a_sheet_is_left_out_and_the_first_sheet_says_where_it_is() {
        let mut book = book(60, "title");
        assert_eq!(book.sheet_names(), [ABOUT, "fits"]);
        assert_eq!(book.worksheet_range("fits").unwrap().height(), 60);
        let words = words(&mut book);
        let said = "long: 60 rows, more than a sheet holds below its head (59). long.csv and result.json hold them.";
        assert!(words.contains(said), "{words}");
        assert!(!words.contains("fits: "), "{words}");
    }

    #[test]
    fn an_input_longer_than_a_sheet_is_left_out_too() {
        let mut long = book(60, &"# line\n".repeat(60));
        assert!(words(&mut long).contains("more lines than a sheet holds"));
        let mut short = book(60, &"# line\n".repeat(20));
        assert_eq!(words(&mut short).matches("# line").count(), 20);
    }
}
