//! Tables of a page.

use super::Page;
use super::blocks::sign;
use crate::report::sentence::clean;
use crate::report::split::{Extent, parts};
use crate::report::table::{Align, Column, Content, Row, State, TableBlock, TableCell};
use maud::{Markup, html};

/// Room of a column besides its letters, in letters.
const GAP: usize = 2;
/// Letters of a text column that count: longer text is wrapped.
const WRAPPED_TEXT: usize = 26;
/// Letters across a printed page, by the class that makes them fit on A4 and on Letter (see the print styles).
const FITS: [(usize, &str); 4] = [(100, ""), (122, "tight"), (146, "landscape"), (176, "landscape tight")];

/// A table with caption, legend and notes; in parts if no printed page could hold it.
pub(super) fn draw(table: &TableBlock, page: &Page) -> Markup {
    let columns = 0..table.columns.len();
    let signs: Vec<bool> = columns.clone().map(|column| table.has_signs(column)).collect();
    let grid = Grid { table, page, signs };
    let extents: Vec<Extent> = columns.map(|column| grid.extent(column)).collect();
    let widest = FITS[FITS.len() - 1].0;
    let parts = parts(&extents, table.keys(), GAP, widest);
    html! {
        @for (index, part) in parts.iter().enumerate() {
            (grid.part(part, fit(&extents, part), index, parts.len()))
        }
    }
}

/// The class that makes a part fit a printed page.
fn fit(extents: &[Extent], part: &[usize]) -> &'static str {
    let width: usize = part.iter().map(|&column| extents[column].width + GAP).sum();
    FITS.iter().find(|(room, _)| width <= *room).unwrap_or(&FITS[FITS.len() - 1]).1
}

struct Grid<'a> {
    table: &'a TableBlock,
    page: &'a Page<'a>,
    signs: Vec<bool>,
}

impl Grid<'_> {
    fn extent(&self, index: usize) -> Extent {
        let column = &self.table.columns[index];
        let cells = self.table.rows.iter().filter_map(|row| match row {
            Row::Cells(cells) => cells.get(index),
            _ => None,
        });
        let letters = |cell: &TableCell| self.table.words(cell, index, self.page.labels).chars().count();
        let entries = cells.map(letters).max().unwrap_or(0);
        let entries = if column.align == Align::Right { entries } else { entries.min(WRAPPED_TEXT) };
        let head = column.head.split(' ').map(|word| word.chars().count()).max().unwrap_or(0).min(WRAPPED_TEXT);
        let sign = if self.signs[index] { 2 } else { 0 };
        Extent { width: (entries + sign).max(head).max(column.unit.chars().count()), under: column.under.clone() }
    }

    fn part(&self, part: &[usize], fit: &str, index: usize, parts: usize) -> Markup {
        let table = self.table;
        let id = if index == 0 { table.key.clone() } else { format!("{}--{}", table.key, index + 1) };
        let last = index + 1 == parts;
        html! {
            div class={ "table " (fit) } id=(id) {
                div.scroll tabindex="0" role="group" aria-labelledby={ (id) "-caption" } {
                    table {
                        caption id={ (id) "-caption" } {
                            strong { (self.page.labels.name(&table.key)) "." } " " (self.page.sentence(&table.caption))
                            @if parts > 1 { " (part " (index + 1) " of " (parts) ")" }
                        }
                        (self.heads(part))
                        (self.bodies(part))
                    }
                }
                @if last { (self.below()) }
            }
        }
    }

    fn heads(&self, part: &[usize]) -> Markup {
        let under = |index: usize| self.table.columns[index].under.as_str();
        let groups: Vec<&[usize]> = part.chunk_by(|&one, &next| under(one) == under(next)).collect();
        let shared = part.iter().any(|&index| !under(index).is_empty());
        html! {
            thead {
                @if shared {
                    tr.shared {
                        @for group in groups {
                            @if under(group[0]).is_empty() { td colspan=(group.len()) {} }
                            @else { th scope="colgroup" colspan=(group.len()) { (clean(under(group[0]))) } }
                        }
                    }
                }
                tr { @for &index in part { (self.head(index)) } }
            }
        }
    }

    fn head(&self, index: usize) -> Markup {
        let column = &self.table.columns[index];
        html! {
            th scope="col" class=(self.class(index)) {
                (clean(&column.head))
                @if !column.unit.is_empty() { " " span.unit { (clean(&column.unit)) } }
            }
        }
    }

    /// One body per group of rows, so that the group's name is the head of its rows.
    fn bodies(&self, part: &[usize]) -> Markup {
        let starts = |row: &Row| !matches!(row, Row::Cells(_));
        let groups = self.table.rows.chunk_by(|_, next| !starts(next));
        html! {
            @for group in groups {
                tbody.ruled[group.first() == Some(&Row::Rule)] {
                    @for row in group {
                        @match row {
                            Row::Cells(cells) => tr { (self.cells(cells, part)) },
                            Row::Group(name) => tr.group {
                                th scope="rowgroup" colspan=(part.len()) { span { (clean(name)) } }
                            },
                            Row::Rule => {},
                        }
                    }
                }
            }
        }
    }

    fn cells(&self, cells: &[TableCell], part: &[usize]) -> Markup {
        let blank = TableCell::blank();
        html! {
            @for &index in part {
                @let cell = cells.get(index).unwrap_or(&blank);
                @let class = self.cell_class(cell, index);
                @if self.table.columns[index].key { th scope="row" class=(class) { (self.content(cell, index)) } }
                @else { td class=(class) { (self.content(cell, index)) } }
            }
        }
    }

    fn content(&self, cell: &TableCell, index: usize) -> Markup {
        let words = match &cell.content {
            Content::Text(sentence) => self.page.sentence(sentence),
            _ => html! { (self.table.words(cell, index, self.page.labels)) },
        };
        let right = self.table.columns[index].align == Align::Right;
        match cell.state {
            Some(state) if right => html! { (words) (sign(state)) (spoken(cell, state)) },
            Some(state) => html! { (sign(state)) (words) (spoken(cell, state)) },
            None if right && self.signs[index] => html! { (words) span.sign {} },
            None => words,
        }
    }

    fn class(&self, index: usize) -> &'static str {
        match self.table.columns[index] {
            Column { align: Align::Right, .. } => "right",
            Column { align: Align::Centre, .. } => "centre",
            Column { key: true, .. } if index == 0 => "key",
            _ => "left",
        }
    }

    fn cell_class(&self, cell: &TableCell, index: usize) -> String {
        let state = cell.state.map(|state| format!(" {}", state.class())).unwrap_or_default();
        let strong = if cell.strong { " strong" } else { "" };
        format!("{}{state}{strong}", self.class(index))
    }

    fn below(&self) -> Markup {
        let legend = self.table.legend();
        html! {
            @if !legend.is_empty() {
                p.legend {
                    @for (state, meaning) in legend {
                        span { span class={ "chip " (state.class()) } { (sign(state)) } " " (clean(&meaning)) } " "
                    }
                }
            }
            @for note in &self.table.notes { p.note { (self.page.sentence(note)) } }
        }
    }
}

/// The state in words for those who hear the page, unless the entry says it itself.
fn spoken(cell: &TableCell, state: State) -> Markup {
    let said = *cell == TableCell::state(state) || *cell == TableCell::state(state).strong();
    html! { @if !said { span.heard { " (" (state.word()) ")" } } }
}
