//! A table as lines of text: heads over a thin line, no boxes.

use super::ink::{Ink, Tone};
use super::ink_of;
use crate::report::labels::Labels;
use crate::report::split::{Extent, parts};
use crate::report::table::{Align, Content, Row, TableBlock, TableCell};

/// Blanks between two columns.
const GAP: usize = 2;
/// Text columns are wrapped down to this width before a table is cut, or to their longest word.
const NARROW_TEXT: usize = 14;
/// Text columns are wrapped to this width where the table must be cut anyway.
const COMFORTABLE_TEXT: usize = 32;
/// A head takes at most this many lines, if its words allow it.
const HEAD_LINES: usize = 3;

/// The lines of a table with caption, legend and notes.
pub(super) fn draw(table: &TableBlock, labels: &Labels, width: usize) -> Vec<Ink> {
    let grid = Grid::new(table, labels, width);
    let parts = parts(&grid.extents(), table.keys(), GAP, width);
    let mut lines = Vec::new();
    for (index, part) in parts.iter().enumerate() {
        if index > 0 {
            lines.push(Ink::default());
        }
        lines.extend(grid.caption(index, parts.len()).wrap(width));
        lines.extend(grid.heads(part));
        lines.extend(grid.body(part));
    }
    lines.extend(grid.legend().into_iter().flat_map(|line| line.wrap(width)));
    lines.extend(table.notes.iter().flat_map(|note| ink_of(note, labels).wrap(width)));
    lines
}

struct Grid<'a> {
    table: &'a TableBlock,
    labels: &'a Labels,
    page: usize,
    signs: Vec<bool>,
    widths: Vec<usize>,
}

impl<'a> Grid<'a> {
    /// Measures the columns and narrows those of text as far as needed.
    fn new(table: &'a TableBlock, labels: &'a Labels, page: usize) -> Self {
        let columns = 0..table.columns.len();
        let signs = columns.clone().map(|column| table.has_signs(column)).collect();
        let mut grid = Self { table, labels, page, signs, widths: Vec::new() };
        let natural: Vec<usize> = columns.clone().map(|column| grid.natural(column)).collect();
        let least: Vec<usize> = columns.map(|column| grid.least(column).min(natural[column])).collect();
        grid.widths = narrowed(natural, &least, page);
        grid.limit();
        grid
    }

    /// Keys take at most half of the page and any other column the rest, whatever their words.
    fn limit(&mut self) {
        let keys = self.table.keys();
        let others = self.table.columns.len() > keys;
        let room = if others { self.page / 2 } else { self.page };
        let used = self.widths[..keys].iter().map(|width| width + GAP).sum::<usize>();
        if used > room && keys > 0 {
            let each = (room / keys).saturating_sub(GAP).max(1);
            self.widths[..keys].iter_mut().for_each(|width| *width = (*width).min(each));
        }
        let used = self.widths[..keys].iter().map(|width| width + GAP).sum::<usize>();
        let rest = self.page.saturating_sub(used).max(1);
        self.widths[keys..].iter_mut().for_each(|width| *width = (*width).min(rest));
    }

    fn extents(&self) -> Vec<Extent> {
        let column = |(column, &width): (&crate::report::Column, &usize)| Extent { width, under: column.under.clone() };
        self.table.columns.iter().zip(&self.widths).map(column).collect()
    }

    fn entries(&self, column: usize) -> impl Iterator<Item = Ink> {
        let cells = self.table.rows.iter().filter_map(move |row| match row {
            Row::Cells(cells) => cells.get(column),
            _ => None,
        });
        cells.map(move |cell| self.ink(cell, column))
    }

    fn natural(&self, column: usize) -> usize {
        let entries = self.entries(column).map(|entry| entry.width()).max().unwrap_or(1);
        let head = self.head_width(column);
        entries.max(head).max(Ink::new(&self.table.columns[column].unit, Tone::Plain).width()).max(1)
    }

    /// The narrowest width at which the head takes no more lines than it may.
    fn head_width(&self, column: usize) -> usize {
        let head = Ink::new(&self.table.columns[column].head, Tone::Strong);
        let least = head.longest_word().max(1);
        (least..=head.width()).find(|&width| head.wrap(width).len() <= HEAD_LINES).unwrap_or(least)
    }

    fn least(&self, column: usize) -> usize {
        if self.table.columns[column].align == Align::Right {
            return self.natural(column);
        }
        let words = self.entries(column).map(|entry| entry.longest_word()).max().unwrap_or(1);
        words.max(NARROW_TEXT).max(self.head_width(column))
    }

    /// An entry with its sign. In a column with signs every entry leaves room for one.
    fn ink(&self, cell: &TableCell, column: usize) -> Ink {
        let tone = match (cell.state, cell.strong) {
            (Some(state), _) => Tone::State(state),
            (None, true) => Tone::Strong,
            (None, false) => Tone::Plain,
        };
        let words = match &cell.content {
            Content::Text(sentence) if tone == Tone::Plain => ink_of(sentence, self.labels),
            _ => Ink::new(&self.table.words(cell, column, self.labels), tone),
        };
        let right = self.table.columns[column].align == Align::Right;
        match cell.state {
            Some(state) if right => words.joined(Ink::new(&format!("\u{a0}{}", state.sign()), tone)),
            Some(state) => Ink::new(&format!("{}\u{a0}", state.sign()), tone).joined(words),
            None if right && self.signs[column] => words.joined(Ink::new("\u{a0}\u{a0}", Tone::Plain)),
            None => words,
        }
    }

    fn caption(&self, part: usize, parts: usize) -> Ink {
        let mut name = format!("{}. ", self.labels.name(&self.table.key));
        if parts > 1 {
            name = format!("{} (part {} of {parts}). ", self.labels.name(&self.table.key), part + 1);
        }
        Ink::new(&name, Tone::Strong).joined(ink_of(&self.table.caption, self.labels))
    }

    fn heads(&self, part: &[usize]) -> Vec<Ink> {
        let columns = || part.iter().map(|&index| &self.table.columns[index]);
        let mut lines = self.shared_heads(part);
        let heads: Vec<Vec<Ink>> =
            part.iter().zip(columns()).map(|(&i, c)| Ink::new(&c.head, Tone::Strong).wrap(self.widths[i])).collect();
        let tallest = heads.iter().map(Vec::len).max().unwrap_or(0);
        let sunk = heads.into_iter().map(|head| {
            let above = vec![Ink::default(); tallest - head.len()];
            above.into_iter().chain(head).collect()
        });
        lines.extend(self.stacked(part, sunk.collect()));
        if columns().any(|column| !column.unit.is_empty()) {
            let units = part.iter().zip(columns()).map(|(&i, c)| Ink::new(&c.unit, Tone::Faint).wrap(self.widths[i]));
            lines.extend(self.stacked(part, units.collect()));
        }
        lines.push(Ink::rule(self.width(part)));
        lines
    }

    /// Heads that neighbours share, each over a line as long as its columns.
    fn shared_heads(&self, part: &[usize]) -> Vec<Ink> {
        if part.iter().all(|&index| self.table.columns[index].under.is_empty()) {
            return Vec::new();
        }
        let under = |index: usize| self.table.columns[index].under.as_str();
        let groups: Vec<(usize, Vec<Ink>)> = part
            .chunk_by(|&one, &next| under(one) == under(next))
            .map(|group| {
                let width = self.width(group);
                let head = Ink::new(under(group[0]), Tone::Strong);
                let mut lines = if head.is_empty() { vec![Ink::default()] } else { head.wrap(width) };
                lines.push(if head.is_empty() { Ink::default() } else { Ink::rule(width) });
                (width, lines)
            })
            .collect();
        let tallest = groups.iter().map(|(_, lines)| lines.len()).max().unwrap_or(0);
        let line = |index: usize| {
            let cell = |(width, lines): &(usize, Vec<Ink>)| {
                let at = (index + lines.len()).checked_sub(tallest);
                at.and_then(|at| lines.get(at)).cloned().unwrap_or_default().padded(*width)
            };
            joined(groups.iter().map(cell))
        };
        (0..tallest).map(line).collect()
    }

    fn body(&self, part: &[usize]) -> Vec<Ink> {
        let mut lines = Vec::new();
        for row in &self.table.rows {
            match row {
                Row::Cells(cells) => {
                    let blank = TableCell::blank();
                    let wrapped = |&column: &usize| {
                        self.ink(cells.get(column).unwrap_or(&blank), column).wrap(self.widths[column])
                    };
                    lines.extend(self.stacked(part, part.iter().map(wrapped).collect()));
                }
                Row::Group(name) => lines.extend(Ink::new(name, Tone::Emphasis).wrap(self.page)),
                Row::Rule => lines.push(Ink::rule(self.width(part))),
            }
        }
        lines
    }

    /// Wrapped entries side by side.
    fn stacked(&self, part: &[usize], entries: Vec<Vec<Ink>>) -> Vec<Ink> {
        let height = entries.iter().map(Vec::len).max().unwrap_or(0);
        let line = |index: usize| {
            let cell = |(&column, lines): (&usize, &Vec<Ink>)| {
                let ink = lines.get(index).cloned().unwrap_or_default();
                let width = self.widths[column];
                match self.table.columns[column].align {
                    Align::Left => ink.padded(width),
                    Align::Right => ink.indented(width),
                    Align::Centre => {
                        let left = (width.saturating_sub(ink.width())) / 2 + ink.width();
                        ink.indented(left).padded(width)
                    }
                }
            };
            joined(part.iter().zip(&entries).map(cell))
        };
        (0..height).map(line).collect()
    }

    fn width(&self, part: &[usize]) -> usize {
        (part.iter().map(|&column| self.widths[column] + GAP).sum::<usize>()).saturating_sub(GAP)
    }

    fn legend(&self) -> Option<Ink> {
        let signs = self.table.legend().into_iter().map(|(state, meaning)| {
            let sign = Ink::new(&format!("{}\u{a0}", state.sign()), Tone::State(state));
            sign.joined(Ink::new(&meaning, Tone::Faint))
        });
        signs.reduce(|legend, sign| legend.joined(Ink::new(" · ", Tone::Faint)).joined(sign))
    }
}

fn joined(cells: impl Iterator<Item = Ink>) -> Ink {
    let gap = || Ink::new(&" ".repeat(GAP), Tone::Plain);
    cells.reduce(|line, cell| line.joined(gap()).joined(cell)).unwrap_or_default().trimmed()
}

/// Takes width from the widest columns that have some to spare, one cell at a time, until the page holds them. Where
/// the table must be cut anyway, columns are narrowed to a comfortable width only.
fn narrowed(mut widths: Vec<usize>, least: &[usize], page: usize) -> Vec<usize> {
    let total = |widths: &[usize]| (widths.iter().map(|width| width + GAP).sum::<usize>()).saturating_sub(GAP);
    if total(least) > page {
        let comfortable = |(&width, &least): (&usize, &usize)| width.min(least.max(COMFORTABLE_TEXT));
        return widths.iter().zip(least).map(comfortable).collect();
    }
    while total(&widths) > page {
        let spare = (0..widths.len()).filter(|&index| widths[index] > least[index]);
        let Some(widest) = spare.max_by_key(|&index| widths[index]) else { break };
        widths[widest] -= 1;
    }
    widths
}
