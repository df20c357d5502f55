//! Known sizes: the tables `[[columns]]` and `[[beams]]`, the later replacing the earlier member by member.

use super::fault::{FaultKind, FileFault};
use super::owners::{self, Owner, Selection};
use super::scalar::{Scalar, Table};
use super::size::{self, Size};
use super::source::{Need, Source};
use super::warning::{FileWarning, WarningKind};
use super::written::{BeamsWritten, ColumnsWritten, Maybe};
use super::{Echo, grid::Grid, select};
use crate::frame::options::EndSpring;
use crate::frame::{Section, bay_name, line_name};
use std::ops::Range;
use toml::Spanned;

/// Members of one kind, sized, in the order of [`crate::frame::FrameParts`].
#[derive(Debug)]
pub(super) struct Members {
    pub sections: Vec<Section>,
    /// Effective shear areas, m2.
    pub shear_areas: Vec<Option<f64>>,
    /// Depths of rectangles, m.
    pub depths: Vec<Option<f64>>,
    /// Springs at the left and right end; rigid for columns.
    pub springs: Vec<[EndSpring; 2]>,
    pub echo: Vec<Echo>,
    pub warnings: Vec<FileWarning>,
    /// The first table with an effect that states no area.
    pub without_area: Option<Range<usize>>,
    /// The first member whose table states no rectangle, and that table.
    pub without_depth: Option<(String, Range<usize>)>,
}

/// One table as checked.
struct Checked {
    selection: Selection,
    section: Section,
    depth: Option<f64>,
    shear_area: Option<f64>,
    springs: [EndSpring; 2],
    stated: [Option<Stated>; KEYS.len()],
    span: Range<usize>,
    echo: Echo,
}

/// Keys that a later table drops by not repeating them, and what its members then do.
const KEYS: [(&str, &str); 3] = [
    ("stiffness_factor", "take the factor 1"),
    ("shear_area", "do not deform in shear"),
    ("end_spring", "are joined rigidly"),
];

/// One of [`KEYS`] as a table states it.
struct Stated {
    typed: String,
    /// Whether leaving it out would change anything.
    matters: bool,
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
        let mut size = size::of_columns(source, table, written.span(), &mut warnings)?;
        let factor = factor(source, &table.stiffness_factor, Need::Positive, &mut size)?;
        let (shear_area, shear) = shear_area(source, &table.shear_area, &mut size, &mut warnings)?;
        checked.push(Checked {
            selection: Selection::new(&levels.0, &places.0),
            section: size.section,
            depth: size.sides.map(|[_, depth]| depth),
            shear_area,
            springs: [EndSpring::Rigid; 2],
            stated: [factor, shear, None],
            span: written.span(),
            echo: Echo { what: format!("columns, storeys {}, lines {}", levels.1, places.1), typed: size.typed },
        });
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
        let mut size = size::of_beams(source, table, written.span(), &mut warnings)?;
        let factor = factor(source, &table.stiffness_factor, Need::ZeroOrMore, &mut size)?;
        let (shear_area, shear) = shear_area(source, &table.shear_area, &mut size, &mut warnings)?;
        let (springs, spring) = end_springs(source, table, &mut size)?;
        checked.push(Checked {
            selection: Selection::new(&levels.0, &places.0),
            section: size.section,
            depth: size.sides.map(|[_, depth]| depth),
            shear_area,
            springs,
            stated: [factor, shear, spring],
            span: written.span(),
            echo: Echo { what: format!("beams, floors {}, bays {}", levels.1, places.1), typed: size.typed },
        });
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

/// Scales the inertia of `size` by the factor, where one is stated.
fn factor(source: Source, written: &Maybe<Scalar>, need: Need, size: &mut Size) -> Result<Option<Stated>, FileFault> {
    let Some(value) = written else { return Ok(None) };
    let (number, typed) = (source.number(value, need)?, source.typed(value.span()));
    size.section.inertia *= number;
    size.typed += &format!(", stiffness factor {typed}");
    Ok(Some(Stated { typed, matters: number != 1.0 }))
}

fn shear_area(
    source: Source,
    written: &Maybe<Scalar>,
    size: &mut Size,
    warnings: &mut Vec<FileWarning>,
) -> Result<(Option<f64>, Option<Stated>), FileFault> {
    let Some(value) = written else { return Ok((None, None)) };
    let area = size::shear_area(source, value, size, warnings)?;
    let typed = source.typed(value.span());
    size.typed += &format!(", shear area {typed}");
    Ok((Some(area), Some(Stated { typed, matters: true })))
}

fn end_springs(
    source: Source,
    table: &BeamsWritten,
    size: &mut Size,
) -> Result<([EndSpring; 2], Option<Stated>), FileFault> {
    let rigid = [EndSpring::Rigid; 2];
    let Some(value) = &table.end_spring else { return Ok((rigid, None)) };
    let (springs, typed) = size::end_springs(source, value)?;
    size.typed += &format!(", end spring {typed}");
    Ok((springs, Some(Stated { typed, matters: springs != rigid })))
}

/// Gives every member the size of the last table that selects it.
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
    warnings.extend(dropped(&tables, &owners));
    let unused = tables.iter().zip(&used).filter(|(_, used)| !**used);
    warnings.extend(unused.map(|(table, _)| no_effect(table, members)));
    let bare = tables.iter().zip(&used).find(|(table, used)| **used && table.section.area.is_none());
    let without_area = bare.map(|(table, _)| table.span.clone());
    let owner = |index: usize| &tables[owners[index].last];
    let shallow = (0..owners.len()).find(|index| owner(*index).depth.is_none());
    let without_depth = shallow.map(|index| (name(index), owner(index).span.clone()));
    Ok(Members {
        sections: owners.iter().map(|owner| tables[owner.last].section).collect(),
        shear_areas: owners.iter().map(|owner| tables[owner.last].shear_area).collect(),
        depths: owners.iter().map(|owner| tables[owner.last].depth).collect(),
        springs: owners.iter().map(|owner| tables[owner.last].springs).collect(),
        echo: tables.into_iter().map(|table| table.echo).collect(),
        warnings,
        without_area,
        without_depth,
    })
}

/// One warning for each table and key that it drops by taking members from a table that states the key.
fn dropped(tables: &[Checked], owners: &[Owner]) -> Vec<FileWarning> {
    let mut lost: Vec<[Option<usize>; KEYS.len()]> = vec![[None; KEYS.len()]; tables.len()];
    for owner in owners {
        let Some(replaced) = owner.replaced else { continue };
        for (key, lost) in lost[owner.last].iter_mut().enumerate() {
            let states = |number: usize| tables[number].stated[key].as_ref();
            if states(owner.last).is_none() && states(replaced).is_some_and(|stated| stated.matters) {
                lost.get_or_insert(replaced);
            }
        }
    }
    let warn = |(table, lost): (&Checked, [Option<usize>; KEYS.len()])| {
        let each = lost.into_iter().enumerate().filter_map(|(key, replaced)| {
            let earlier = tables[replaced?].stated[key].as_ref()?.typed.clone();
            let (key, instead) = KEYS[key];
            Some(FileWarning::new(WarningKind::Dropped { key, instead, earlier }, table.span.clone()))
        });
        each.collect::<Vec<_>>()
    };
    tables.iter().zip(lost).flat_map(warn).collect()
}

fn no_effect(table: &Checked, members: &'static str) -> FileWarning {
    let nothing = table.selection.is_empty();
    let kind = if nothing { WarningKind::SelectsNothing { members } } else { WarningKind::Overridden { members } };
    FileWarning::new(kind, table.span.clone())
}
