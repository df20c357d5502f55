//! Tables in Markdown.

use crate::timing::Spread;
use std::fmt;

/// A heading, a line on what was done, and rows under column heads.
pub struct Table {
    title: String,
    note: String,
    rows: Vec<Vec<String>>,
}

impl Table {
    /// A table without rows.
    pub fn new(title: &str, note: &str, heads: &[&str]) -> Self {
        let heads = heads.iter().map(|head| (*head).to_owned()).collect();
        Self { title: title.into(), note: note.into(), rows: vec![heads] }
    }

    /// Adds a sentence to the note.
    pub fn add_note(&mut self, sentence: &str) {
        self.note.push(' ');
        self.note.push_str(sentence);
    }

    /// Adds a row.
    pub fn row(&mut self, cells: Vec<String>) {
        self.rows.push(cells);
    }
}

impl fmt::Display for Table {
    fn fmt(&self, formatter: &mut fmt::Formatter) -> fmt::Result {
        writeln!(formatter, "### {}\n{}\n", self.title, self.note)?;
        for (index, row) in self.rows.iter().enumerate() {
            writeln!(formatter, "| {} |", row.join(" | "))?;
            if index == 0 {
                writeln!(formatter, "|{}", "---|".repeat(row.len()))?;
            }
        }
        Ok(())
    }
}

/// A number with three figures: `73.2 k`, `1.59 M`, `0.08`.
pub fn figures(value: f64) -> String {
    let scaled = [(1e9, " G"), (1e6, " M"), (1e3, " k"), (1.0, "")].into_iter().find(|(unit, _)| value >= *unit);
    let (unit, suffix) = scaled.unwrap_or((1.0, ""));
    format!("{}{suffix}", plain(value / unit))
}

fn plain(value: f64) -> String {
    match value {
        100.0.. => format!("{value:.0}"),
        10.0.. => format!("{value:.1}"),
        _ => format!("{value:.2}"),
    }
}

/// A rate: `73.2 k`, `-` where nothing was measured.
pub fn rate(spread: Option<Spread>) -> String {
    spread.map_or_else(absent, |spread| figures(spread.median))
}

/// A ratio with its quartiles: `24.9 (24.7-25.1)`, `-` where nothing was measured.
pub fn ratio(spread: Option<Spread>) -> String {
    let text = |spread: Spread| [spread.median, spread.low, spread.high].map(plain);
    spread.map(text).map_or_else(absent, |[median, low, high]| format!("{median} ({low}-{high})"))
}

/// A share in percent: `45 %`, `-` where nothing was measured.
pub fn percent(spread: Option<Spread>) -> String {
    spread.map_or_else(absent, |spread| format!("{:.0} %", 100.0 * spread.median))
}

fn absent() -> String {
    "-".into()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn figures_are_three() {
        let found = [1.594e6, 73_210.0, 245_400.0, 999.0, 0.084, 12.34].map(figures);
        assert_eq!(found, ["1.59 M", "73.2 k", "245 k", "999", "0.08", "12.3"]);
    }

    #[test]
    fn a_table_has_a_rule_under_its_heads() {
        let mut table = Table::new("T", "n", &["a", "b"]);
        table.row(vec!["1".into(), "2".into()]);
        assert_eq!(table.to_string(), "### T\nn\n\n| a | b |\n|---|---|\n| 1 | 2 |\n");
    }
}
