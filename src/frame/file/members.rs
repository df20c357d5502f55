//! Known sizes: the tables `[[columns]]` and `[[beams]]`, the later replacing the earlier member by member.

use super::fault::{FaultKind, FileFault};
use super::owners::{self, Owner, Selection};
use super::scalar::{Scalar, Table};
use super::select;
use super::source::{Need, Source, require};
use super::warning::{FileWarning, SIDE, WarningKind};
use super::written::{BeamsWritten, ColumnsWritten, Maybe, RectangleWritten};
use super::{Echo, grid::Grid};
use crate::frame::{Section, bay_name, line_name};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;

/// Members of one kind, sized.
#[derive(Debug)]
pub(super) struct Members {
    /// In the order of [`crate::frame::FrameParts`].
    pub sections: Vec<Section>,
    pub echo: Vec<Echo>,
    pub warnings: Vec<FileWarning>,
    /// The first table with an effect that states no area.
    pub without_area: Option<Range<usize>>,
}

/// One table as checked.
struct Checked {
    selection: Selection,
    section: Section,
    /// The factor as typed, where it is stated.
    factor: Option<(f64, String)>,
    span: Range<usize>,
    echo: Echo,
}

/// Checks all `[[columns]]` tables.
pub(super) fn columns(
    source: Source,
    tables: &[Spanned<Table<ColumnsWritten>>],
    grid: &Grid,
) -> Result<Members, FileFault> {
    let lines = grid.bays.lengths.len() + 1;
    let storeys = grid.storeys.lengths.len();
    let mut warnings = Vec::new();
    let mut checked = Vec::new();
    for written in tables {
        let table = written.get_ref();
        let levels = selected(source, &table.storeys, |text| select::levels(text, storeys, "storey"))?;
        let places = selected(source, &table.lines, |text| select::lines(text, lines))?;
        let (mut section, mut typed) = column_size(source, table, written.span(), &mut warnings)?;
        let factor = factor(source, &table.stiffness_factor, Need::Positive)?;
        scale(&mut section, &mut typed, &factor);
        let what = format!("columns, storeys {}, lines {}", levels.1, places.1);
        let echo = Echo { what, typed };
        let selection = Selection::new(&levels.0, &places.0);
        checked.push(Checked { selection, section, factor, span: written.span(), echo });
    }
    let name =
        |index: usize| format!("the column of storey {} on line {}", index / lines + 1, line_name(index % lines));
    assign(checked, [storeys, lines], "columns", name, warnings)
}

/// Checks all `[[beams]]` tables.
pub(super) fn beams(
    source: Source,
    tables: &[Spanned<Table<BeamsWritten>>],
    grid: &Grid,
) -> Result<Members, FileFault> {
    let bays = grid.bays.lengths.len();
    let floors = grid.storeys.lengths.len();
    let mut warnings = Vec::new();
    let mut checked = Vec::new();
    for written in tables {
        let table = written.get_ref();
        if let Some(area) = &table.area {
            return Err(FileFault::new(FaultKind::BeamArea, area.span()));
        }
        let levels = selected(source, &table.floors, |text| select::levels(text, floors, "floor"))?;
        let places = selected(source, &table.bays, |text| select::bays(text, bays))?;
        let (mut section, mut typed) = beam_size(source, table, written.span(), &mut warnings)?;
        let factor = factor(source, &table.stiffness_factor, Need::ZeroOrMore)?;
        scale(&mut section, &mut typed, &factor);
        let what = format!("beams, floors {}, bays {}", levels.1, places.1);
        let echo = Echo { what, typed };
        let selection = Selection::new(&levels.0, &places.0);
        checked.push(Checked { selection, section, factor, span: written.span(), echo });
    }
    let name = |index: usize| format!("the beam of floor {} in bay {}", index / bays + 1, bay_name(index % bays));
    assign(checked, [floors, bays], "beams", name, warnings)
}

/// Flags of a selection and the words it was made with; everything where it is left out.
fn selected(
    source: Source,
    written: &Maybe<Scalar>,
    read: impl Fn(&str) -> Result<Vec<bool>, select::SelectError>,
) -> Result<(Vec<bool>, String), FileFault> {
    let (text, span) = match written {
        Some(value) => (source.typed(value.span()), value.span()),
        None => ("all".into(), 0..0),
    };
    read(&text).map(|flags| (flags, text)).map_err(|error| FileFault::new(error, span))
}

const SIZE_HELP: &str = "each table states the whole size of the members it selects: add inertia = \"9e-4 m4\" or rectangle = { width = \"400 mm\", depth = \"600 mm\" }";

fn column_size(
    source: Source,
    table: &ColumnsWritten,
    span: Range<usize>,
    warnings: &mut Vec<FileWarning>,
) -> Result<(Section, String), FileFault> {
    let keep_one = |second: &Spanned<Scalar>, name| {
        let first = table.rectangle.as_ref().map_or(0..0, Spanned::span);
        conflict(
            "rectangle",
            name,
            "a rectangle gives both inertia and area: keep it, or inertia with area",
            first,
            second.span(),
        )
    };
    match (&table.rectangle, &table.inertia, &table.area) {
        (Some(_), Some(inertia), _) => Err(keep_one(inertia, "inertia")),
        (Some(_), None, Some(area)) => Err(keep_one(area, "area")),
        (Some(rectangle), None, None) => {
            let ([width, depth], typed) = sides(source, rectangle, warnings)?;
            Ok((Section { inertia: width * depth * depth * depth / 12.0, area: Some(width * depth) }, typed))
        }
        (None, inertia, area) => {
            let inertia = require(inertia, span, "the size of these columns", SIZE_HELP)?;
            let mut typed = format!("inertia {}", source.typed(inertia.span()));
            let mut section = Section { inertia: source.positive(inertia, Dimension::Inertia)?, area: None };
            if let Some(area) = area {
                section.area = Some(source.positive(area, Dimension::Area)?);
                typed += &format!(", area {}", source.typed(area.span()));
            }
            Ok((section, typed))
        }
    }
}

fn beam_size(
    source: Source,
    table: &BeamsWritten,
    span: Range<usize>,
    warnings: &mut Vec<FileWarning>,
) -> Result<(Section, String), FileFault> {
    match (&table.rectangle, &table.inertia) {
        (Some(first), Some(second)) => Err(conflict(
            "rectangle",
            "inertia",
            "a rectangle gives the inertia: keep one of the two",
            first.span(),
            second.span(),
        )),
        (Some(rectangle), None) => {
            let ([width, depth], typed) = sides(source, rectangle, warnings)?;
            Ok((Section { inertia: width * depth * depth * depth / 12.0, area: None }, typed))
        }
        (None, inertia) => {
            let inertia = require(inertia, span, "the size of these beams", SIZE_HELP)?;
            if let Ok(0.0) = source.quantity(inertia, Dimension::Inertia) {
                let help = "a beam that carries no moment takes its inertia and stiffness_factor = 0";
                return Err(source.out_of_range(inertia.span(), "an inertia must be more than 0", help));
            }
            let typed = format!("inertia {}", source.typed(inertia.span()));
            Ok((Section { inertia: source.positive(inertia, Dimension::Inertia)?, area: None }, typed))
        }
    }
}

fn conflict(
    first: &'static str,
    second: &'static str,
    help: &'static str,
    at: Range<usize>,
    span: Range<usize>,
) -> FileFault {
    FileFault::new(FaultKind::Conflict { first, second, help }, span).beside(at, "given here")
}

/// Width and depth, m, and how they were typed.
fn sides(
    source: Source,
    rectangle: &Spanned<Table<RectangleWritten>>,
    warnings: &mut Vec<FileWarning>,
) -> Result<([f64; 2], String), FileFault> {
    let help = "write rectangle = { width = \"400 mm\", depth = \"600 mm\" }, the depth in the frame's plane";
    let width = require(&rectangle.get_ref().width, rectangle.span(), "the width of the rectangle", help)?;
    let depth = require(&rectangle.get_ref().depth, rectangle.span(), "the depth of the rectangle", help)?;
    let mut lengths = [0.0; 2];
    for (length, (side, name)) in lengths.iter_mut().zip([(width, "the width"), (depth, "the depth")]) {
        *length = source.positive(side, Dimension::Length)?;
        warnings.extend(SIDE.check(*length, &format!("{name} of the rectangle"), source, side.span()));
    }
    Ok((lengths, format!("rectangle {} x {}", source.typed(width.span()), source.typed(depth.span()))))
}

fn factor(source: Source, written: &Maybe<Scalar>, need: Need) -> Result<Option<(f64, String)>, FileFault> {
    let read = |value: &Spanned<Scalar>| Ok((source.number(value, need)?, source.typed(value.span())));
    written.as_ref().map(read).transpose()
}

fn scale(section: &mut Section, typed: &mut String, factor: &Option<(f64, String)>) {
    if let Some((value, text)) = factor {
        section.inertia *= value;
        *typed += &format!(", stiffness factor {text}");
    }
}

/// Gives every member the section of the last table that selects it.
fn assign(
    tables: Vec<Checked>,
    [levels, places]: [usize; 2],
    members: &'static str,
    name: impl Fn(usize) -> String,
    warnings: Vec<FileWarning>,
) -> Result<Members, FileFault> {
    let selections: Vec<_> = tables.iter().map(|table| &table.selection).collect();
    let owners = owners::owners(&selections, levels, places);
    let without: Vec<usize> = (0..owners.len()).filter(|index| owners[*index].is_none()).collect();
    if let Some(first) = without.first() {
        let kind = FaultKind::Unsized { first: name(*first), more: without.len() - 1, members };
        return Err(FileFault::new(kind, tables.last().map_or(0..0, |table| table.span.clone())));
    }
    let owners: Vec<Owner> = owners.into_iter().flatten().collect();
    let mut used = vec![false; tables.len()];
    owners.iter().for_each(|owner| used[owner.last] = true);
    let mut warnings = warnings;
    warnings.extend(factors_lost(&tables, &owners));
    let unused = tables.iter().zip(&used).filter(|(_, used)| !**used);
    warnings.extend(unused.map(|(table, _)| no_effect(table, members)));
    let bare = tables.iter().zip(&used).find(|(table, used)| **used && table.section.area.is_none());
    let without_area = bare.map(|(table, _)| table.span.clone());
    let sections = owners.iter().map(|owner| tables[owner.last].section).collect();
    let echo = tables.into_iter().map(|table| table.echo).collect();
    Ok(Members { sections, echo, warnings, without_area })
}

/// One warning for each table without a factor that takes members from one with a factor.
fn factors_lost(tables: &[Checked], owners: &[Owner]) -> Vec<FileWarning> {
    let mut lost: Vec<Option<&str>> = vec![None; tables.len()];
    for owner in owners.iter().filter(|owner| tables[owner.last].factor.is_none()) {
        let earlier = owner.replaced.and_then(|number| tables[number].factor.as_ref());
        let earlier = earlier.filter(|(value, _)| *value != 1.0).map(|(_, typed)| typed.as_str());
        lost[owner.last] = lost[owner.last].or(earlier);
    }
    let warn = |(table, earlier): (&Checked, Option<&str>)| {
        Some(FileWarning::new(WarningKind::FactorLost { earlier: earlier?.into() }, table.span.clone()))
    };
    tables.iter().zip(lost).filter_map(warn).collect()
}

fn no_effect(table: &Checked, members: &'static str) -> FileWarning {
    let nothing = table.selection.is_empty();
    let kind = if nothing { WarningKind::SelectsNothing { members } } else { WarningKind::Overridden { members } };
    FileWarning::new(kind, table.span.clone())
}
