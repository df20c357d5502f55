//! The three ways of stating lateral forces.
//!
//! # Formula
//! - forces floor by floor as given;
//! - base shear: F_i = V z_i^k / sum(z^k), z the height of a floor above ground; uniform k = 0, triangular k = 1;
//! - pressure: F_i = p b (h_i + h_above) / 2, half the storey below and half the storey above; the ground takes its own.

use super::fault::{FaultKind, FileFault};
use super::grid::runs;
use super::help::THREE_WAYS;
use super::scalar::{Repeated, Scalar, Table, TextOr};
use super::source::{Need, Source, require};
use super::written::{LateralWritten, PowerWritten};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// The lateral forces as checked.
#[derive(Debug)]
pub(super) struct Lateral {
    /// Force at each floor from the lowest, N.
    pub forces: Vec<f64>,
    /// Where each force was typed, or the whole load where it was not typed by floor.
    pub spans: Vec<Range<usize>>,
    /// The whole load.
    pub span: Range<usize>,
    /// As the user typed it.
    pub typed: String,
}

/// Checks `[lateral]` for a frame with these storey heights.
pub(super) fn lateral(
    source: Source,
    written: &Spanned<Table<LateralWritten>>,
    heights: &[f64],
) -> Result<Lateral, FileFault> {
    let table = written.get_ref();
    no_conflict(table)?;
    if let Some(floors) = &table.floors {
        return by_floor(source, floors, heights.len());
    }
    if let Some(base_shear) = &table.base_shear {
        return by_base_shear(source, base_shear, table, heights);
    }
    if let Some(pressure) = &table.pressure {
        return by_pressure(source, pressure, table, heights);
    }
    let missed = |span, what, help| Err(FileFault::new(FaultKind::Missing { what, help }, span));
    match (&table.shape, &table.tributary) {
        (Some(shape), _) => {
            missed(shape.span(), "the base_shear that this shape shares out", "add base_shear = \"900 kN\"")
        }
        (_, Some(width)) => missed(width.span(), "the pressure on this tributary width", "add pressure = \"1.2 kPa\""),
        _ => Err(FileFault::new(FaultKind::NoLoad, written.span())),
    }
}

/// Keys of different ways must not stand together.
fn no_conflict(table: &LateralWritten) -> Result<(), FileFault> {
    let floors = table.floors.as_ref().map(|value| (value.span(), "lateral.floors"));
    let base_shear = table.base_shear.as_ref().map(|value| (value.span(), "lateral.base_shear"));
    let shape = table.shape.as_ref().map(|value| (value.span(), "lateral.shape"));
    let pressure = table.pressure.as_ref().map(|value| (value.span(), "lateral.pressure"));
    let tributary = table.tributary.as_ref().map(|value| (value.span(), "lateral.tributary"));
    let ways = [floors, base_shear.or(shape), pressure.or(tributary)];
    let mut given = ways.into_iter().flatten();
    let (Some(first), Some(second)) = (given.next(), given.next()) else { return Ok(()) };
    let kind = FaultKind::Conflict {
        first: first.1,
        second: second.1,
        help: "state the load in one way only: floors, or base_shear with shape, or pressure with tributary",
    };
    Err(FileFault::new(kind, second.0).beside(first.0, "given here"))
}

fn by_floor(source: Source, floors: &Spanned<Repeated<Scalar>>, storeys: usize) -> Result<Lateral, FileFault> {
    let list = &floors.get_ref().0;
    if list.is_empty() {
        return Err(FileFault::new(FaultKind::NoLoad, floors.span()));
    }
    let forces: Vec<f64> =
        list.iter().map(|entry| source.quantity(entry, Dimension::Force)).collect::<Result<_, _>>()?;
    if list.len() != storeys {
        let help = "give one force for each floor from the lowest to the roof; a floor without force takes \"0 kN\"";
        let kind = FaultKind::Count { what: "forces", found: list.len(), of: "storeys", needed: storeys, help };
        return Err(FileFault::new(kind, floors.span()));
    }
    let typed: Vec<_> = list.iter().map(|entry| source.typed(entry.span())).collect();
    Ok(Lateral { forces, spans: list.iter().map(Spanned::span).collect(), span: floors.span(), typed: runs(&typed) })
}

fn by_base_shear(
    source: Source,
    base_shear: &Spanned<Scalar>,
    table: &LateralWritten,
    heights: &[f64],
) -> Result<Lateral, FileFault> {
    let shear = source.positive(base_shear, Dimension::Force)?;
    let help = "add shape = \"uniform\" (the same force at every floor), \"triangular\" (proportional to the floor's height) or { power = 1.5 }";
    let shape = require(&table.shape, base_shear.span(), "the shape of the base shear", help)?;
    let (power, name) = power(source, shape)?;
    let levels: Vec<f64> = floor_heights(heights);
    let top = levels.last().copied().unwrap_or(1.0);
    let weights: Vec<f64> = levels.iter().map(|level| libm::pow(level / top, power)).collect();
    let whole: f64 = weights.iter().sum();
    let forces = weights.iter().map(|weight| shear * (weight / whole)).collect();
    let typed = format!("base shear {}, {name}", source.typed(base_shear.span()));
    Ok(Lateral { forces, spans: vec![base_shear.span(); heights.len()], span: base_shear.span(), typed })
}

/// The power of the height and its name.
fn power(source: Source, shape: &Spanned<TextOr<PowerWritten>>) -> Result<(f64, String), FileFault> {
    match shape.get_ref() {
        TextOr::Text(word) => {
            let index = source.choice(word, shape.span(), &["uniform", "triangular"], Some("{ power = 1.5 }"))?;
            Ok((index as f64, word.clone()))
        }
        TextOr::Table(table) => {
            let power = require(&table.power, shape.span(), "the power", "write shape = { power = 1.5 }")?;
            let name = format!("proportional to height to the power {}", source.typed(power.span()));
            Ok((source.number(power, Need::Power)?, name))
        }
    }
}

fn by_pressure(
    source: Source,
    pressure: &Spanned<Scalar>,
    table: &LateralWritten,
    heights: &[f64],
) -> Result<Lateral, FileFault> {
    let value = source.positive(pressure, Dimension::Pressure)?;
    let help = "add tributary = \"6 m\", the width of facade that this frame carries";
    let tributary = require(&table.tributary, pressure.span(), "the tributary width of the pressure", help)?;
    let line_load = value * source.positive(tributary, Dimension::Length)?;
    let above = heights.iter().skip(1).chain(std::iter::once(&0.0));
    let forces = heights.iter().zip(above).map(|(below, above)| line_load * 0.5 * (below + above)).collect();
    let typed = format!("pressure {} on {}", source.typed(pressure.span()), source.typed(tributary.span()));
    Ok(Lateral { forces, spans: vec![pressure.span(); heights.len()], span: pressure.span(), typed })
}

fn floor_heights(heights: &[f64]) -> Vec<f64> {
    let mut level = 0.0;
    let rise = |height: &f64| {
        level += height;
        level
    };
    heights.iter().map(rise).collect()
}

/// The fault of a file without `[lateral]`.
pub(super) fn missing(end: Range<usize>) -> FileFault {
    FileFault::new(
        FaultKind::Missing { what: "the table [lateral], and with it any lateral load,", help: THREE_WAYS },
        end,
    )
}
