//! Vertical loads: the table `[gravity]`.
//!
//! # Formula
//! The load of a floor is shared to the column lines as stated, or by tributary width: half of each adjoining bay over
//! the width of the frame.

use super::fault::{FaultKind, FileFault};
use super::grid::runs;
use super::scalar::{Repeated, Scalar, Share, Table};
use super::source::{Need, Source, require};
use super::written::{GravityWritten, Maybe};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// Shares must add up to 1 as nearly as this: three thirds typed as 0.333333 do.
const SUM_MARGIN: f64 = 1e-6;

/// Vertical loads as checked.
#[derive(Debug)]
pub(super) struct Gravity {
    /// At each floor on each line, N, floor by floor.
    pub loads: Vec<f64>,
    /// As the user typed it.
    pub typed: String,
    pub span: Range<usize>,
}

/// Checks `[gravity]` for a frame with these bays and so many storeys.
pub(super) fn gravity(
    source: Source,
    written: &Maybe<Table<GravityWritten>>,
    bays: &[f64],
    storeys: usize,
) -> Result<Option<Gravity>, FileFault> {
    let Some(table) = written else { return Ok(None) };
    let help =
        "add floors = [\"900 kN\", \"700 kN\"], the total vertical load of each floor from the lowest to the roof";
    let floors = require(&table.get_ref().floors, table.span(), "the vertical load of the floors", help)?;
    let (loads, typed) = floor_loads(source, floors, storeys)?;
    let (shares, by) = match &table.get_ref().lines {
        Some(lines) => stated_shares(source, lines, bays.len() + 1)?,
        None => (tributary_shares(bays), "shared by tributary width".into()),
    };
    let loads = loads.iter().flat_map(|load| shares.iter().map(move |share| load * share)).collect();
    Ok(Some(Gravity { loads, typed: format!("{typed}; {by}"), span: table.span() }))
}

fn floor_loads(
    source: Source,
    floors: &Spanned<Repeated<Scalar>>,
    storeys: usize,
) -> Result<(Vec<f64>, String), FileFault> {
    let list = &floors.get_ref().0;
    let loads: Vec<f64> = list.iter().map(|entry| load(source, entry)).collect::<Result<_, _>>()?;
    if list.len() != storeys {
        let help = "give the total vertical load of each floor from the lowest to the roof; a floor without load takes \"0 kN\"";
        let kind = FaultKind::Count { what: "vertical loads", found: list.len(), of: "floors", needed: storeys, help };
        return Err(FileFault::new(kind, floors.span()));
    }
    let typed: Vec<_> = list.iter().map(|entry| source.typed(entry.span())).collect();
    Ok((loads, runs(&typed)))
}

fn load(source: Source, entry: &Spanned<Scalar>) -> Result<f64, FileFault> {
    let load = source.quantity(entry, Dimension::Force)?;
    if load >= 0.0 {
        return Ok(load);
    }
    let typed = source.typed(entry.span());
    let help = format!("write \"{}\"", typed.trim_start_matches(['-', '\u{2212}']).trim_start());
    Err(source.out_of_range(entry.span(), "a vertical load acts downwards and must be 0 or more", &help))
}

fn stated_shares(
    source: Source,
    lines: &Spanned<Repeated<Share>>,
    needed: usize,
) -> Result<(Vec<f64>, String), FileFault> {
    let list = &lines.get_ref().0;
    let shares: Vec<f64> = list
        .iter()
        .map(|entry| source.number_at(&entry.get_ref().0, entry.span(), Need::Share))
        .collect::<Result<_, _>>()?;
    if list.len() != needed {
        let help = "give one share for each column line from the left, one more than bays, or leave lines out for shares by tributary width";
        let kind = FaultKind::Count { what: "shares", found: list.len(), of: "column lines", needed, help };
        return Err(FileFault::new(kind, lines.span()));
    }
    let sum: f64 = shares.iter().sum();
    if (sum - 1.0).abs() > SUM_MARGIN {
        let help = "change the shares so that their sum is 1, or leave lines out for shares by tributary width";
        return Err(FileFault::new(FaultKind::ShareSum { sum, help }, lines.span()));
    }
    let typed: Vec<_> = list.iter().map(|entry| source.typed(entry.span())).collect();
    let by = format!("shared to the lines by {}", typed.join(", "));
    Ok((shares.iter().map(|share| share / sum).collect(), by))
}

fn tributary_shares(bays: &[f64]) -> Vec<f64> {
    let width: f64 = bays.iter().sum();
    let bay = |index: Option<usize>| index.and_then(|index| bays.get(index)).copied().unwrap_or(0.0);
    (0..=bays.len()).map(|line| 0.5 * (bay(line.checked_sub(1)) + bay(Some(line))) / width).collect()
}
