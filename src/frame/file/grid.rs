//! Bays and storeys as checked.

use super::fault::{FaultKind, FileFault};
use super::scalar::{ListOr, Scalar, Table};
use super::source::{Source, require};
use super::written::{EqualBays, EqualStoreys, GridWritten};
use crate::frame::{MAX_BAYS, MAX_STOREYS};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// A row of lengths, each with the place it was typed at.
#[derive(Debug)]
pub(super) struct Row {
    /// Lengths, m.
    pub lengths: Vec<f64>,
    /// Where each was typed; the same place for equal ones.
    pub spans: Vec<Range<usize>>,
    /// As the user typed it.
    pub typed: String,
}

/// Bays and storeys.
#[derive(Debug)]
pub(super) struct Grid {
    pub bays: Row,
    pub storeys: Row,
}

/// What a row is made of, for its messages.
struct Kind {
    what: &'static str,
    most: usize,
    none: FaultKind,
}

/// Checks `[grid]`.
pub(super) fn grid(source: Source, written: &Spanned<Table<GridWritten>>) -> Result<Grid, FileFault> {
    let table = || written.span();
    let bays = require(
        &written.get_ref().bays,
        table(),
        "the list of bays",
        "add bays = [\"7.2 m\", \"8.4 m\"] or bays = { count = 3, width = \"7.2 m\" } to [grid]",
    )?;
    let storeys = require(
        &written.get_ref().storeys,
        table(),
        "the list of storeys",
        "add storeys = [\"4.8 m\", \"3.9 m\"] or storeys = { count = 8, height = \"3.9 m\" } to [grid]",
    )?;
    Ok(Grid { bays: bay_row(source, bays)?, storeys: storey_row(source, storeys)? })
}

fn bay_row(source: Source, written: &Spanned<ListOr<EqualBays>>) -> Result<Row, FileFault> {
    let kind = Kind { what: "bays", most: MAX_BAYS, none: FaultKind::NoBays };
    let equal = match written.get_ref() {
        ListOr::List(list) => return listed(source, list, written.span(), kind),
        ListOr::Table(equal) => equal,
    };
    let help = "write bays = { count = 3, width = \"7.2 m\" }";
    let count = require(&equal.count, written.span(), "the count of bays", help)?;
    let width = require(&equal.width, written.span(), "the width of the bays", help)?;
    let count = counted(source, count, kind)?;
    let length = source.positive(width, Dimension::Length)?;
    let typed = format!("{count} of {}", source.typed(width.span()));
    Ok(Row { lengths: vec![length; count], spans: vec![width.span(); count], typed })
}

fn storey_row(source: Source, written: &Spanned<ListOr<EqualStoreys>>) -> Result<Row, FileFault> {
    let kind = Kind { what: "storeys", most: MAX_STOREYS, none: FaultKind::NoStoreys };
    let equal = match written.get_ref() {
        ListOr::List(list) => return listed(source, list, written.span(), kind),
        ListOr::Table(equal) => equal,
    };
    let help = "write storeys = { count = 8, height = \"3.9 m\", first = \"4.8 m\" }; first may be left out";
    let count = require(&equal.count, written.span(), "the count of storeys", help)?;
    let height = require(&equal.height, written.span(), "the height of the storeys", help)?;
    let count = counted(source, count, kind)?;
    let length = source.positive(height, Dimension::Length)?;
    let mut row = Row {
        lengths: vec![length; count],
        spans: vec![height.span(); count],
        typed: format!("{count} of {}", source.typed(height.span())),
    };
    if let Some(first) = &equal.first {
        row.lengths[0] = source.positive(first, Dimension::Length)?;
        row.spans[0] = first.span();
        row.typed += &format!(", the first {}", source.typed(first.span()));
    }
    Ok(row)
}

fn counted(source: Source, count: &Spanned<Scalar>, kind: Kind) -> Result<usize, FileFault> {
    match source.count(count)? {
        0 => Err(FileFault::new(kind.none, count.span())),
        number if number > kind.most => Err(too_many(source.typed(count.span()), count.span(), &kind)),
        number => Ok(number),
    }
}

fn listed(source: Source, list: &[Spanned<Scalar>], span: Range<usize>, kind: Kind) -> Result<Row, FileFault> {
    if list.is_empty() {
        return Err(FileFault::new(kind.none, span));
    }
    if list.len() > kind.most {
        return Err(too_many(list.len().to_string(), list[kind.most].span(), &kind));
    }
    let lengths = list.iter().map(|entry| source.positive(entry, Dimension::Length)).collect::<Result<_, _>>()?;
    let typed = list.iter().map(|entry| source.typed(entry.span())).collect::<Vec<_>>();
    Ok(Row { lengths, spans: list.iter().map(Spanned::span).collect(), typed: runs(&typed) })
}

fn too_many(found: String, span: Range<usize>, kind: &Kind) -> FileFault {
    FileFault::new(FaultKind::TooMany { what: kind.what, found, most: kind.most }, span)
}

/// Entries joined by commas, four or more equal ones in a row counted: `4.8 m, 8 of 3.9 m`.
pub(super) fn runs(entries: &[String]) -> String {
    let groups = entries.chunk_by(|a, b| a == b);
    let words = groups.flat_map(|group| match group.len() {
        0..4 => group.to_vec(),
        count => vec![format!("{count} of {}", group[0])],
    });
    words.collect::<Vec<_>>().join(", ")
}
