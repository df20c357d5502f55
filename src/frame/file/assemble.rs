//! Puts the checked parts together to a frame.

use super::fault::{FaultKind, FileFault};
use super::feet::CheckedFeet;
use super::grid::Grid;
use super::lateral::Lateral;
use super::scalar::Table;
use super::source::{Source, require};
use super::warning::{self, FileWarning};
use super::written::{SizesWritten, Written};
use super::{Echo, FrameFile, SizeStatement, feet, grid, lateral, members, model};
use crate::frame::{Feet, Frame, FrameFault, FrameParts, SizeSource};
use crate::units::{Dimension, ReportUnits};
use std::ops::Range;
use toml::Spanned;

/// Members, feet and modulus, from either way of stating sizes.
struct Sized {
    columns: Vec<crate::frame::Section>,
    beams: Vec<crate::frame::Section>,
    feet: Feet,
    source: SizeSource,
    statement: SizeStatement,
    echo: Vec<Echo>,
    warnings: Vec<FileWarning>,
    /// Where a fault of the sizes as a whole is shown.
    span: Range<usize>,
}

/// Checks everything that is written.
pub(super) fn assemble(source: Source, written: &Written) -> Result<FrameFile, FileFault> {
    let end = || source.0.trim_end().len()..source.0.trim_end().len();
    let report_units = report_units(source, written)?;
    let table = require(
        &written.grid,
        end(),
        "the table [grid]",
        "add [grid] with bays = [\"7.2 m\", \"8.4 m\"] and storeys = [\"4.8 m\", \"3.9 m\"]",
    )?;
    let grid = grid::grid(source, table)?;
    let feet = feet::feet(source, &written.feet, grid.bays.lengths.len() + 1)?;
    let modulus = modulus(source, written)?;
    let sized = match &written.sizes {
        Some(sizes) => unknown_sizes(source, written, sizes, &grid, &feet, modulus.as_ref().map(|(value, _)| *value))?,
        None => known_sizes(source, written, &grid, &feet, modulus.is_some(), end())?,
    };
    let load = written.lateral.as_ref().ok_or_else(|| lateral::missing(end()))?;
    let load = lateral::lateral(source, load, &grid.storeys.lengths)?;
    let parts = FrameParts {
        title: title(written),
        report_units,
        bays: grid.bays.lengths.clone(),
        storeys: grid.storeys.lengths.clone(),
        feet: sized.feet,
        modulus: modulus.as_ref().map_or(1.0, |(value, _)| *value),
        columns: sized.columns,
        beams: sized.beams,
        lateral: load.forces.clone(),
        sizes: sized.source,
    };
    let frame = Frame::new(parts).map_err(|fault| place(fault, &load, &sized.span, report_units))?;
    let mut warnings = warning::lengths(source, &grid);
    warnings.extend(modulus.as_ref().and_then(|(value, span)| warning::modulus(source, *value, span.clone())));
    warnings.extend(sized.warnings);
    warnings.extend(warning::of_frame(&frame, sized.span));
    let modulus = modulus.map(|(_, span)| source.typed(span));
    let echo = echo(&frame, &grid, &feet.typed, modulus, &sized.echo, &load);
    Ok(FrameFile { frame, echo, sizes: sized.statement, warnings })
}

/// The title on one line, without control characters.
fn title(written: &Written) -> String {
    let text = written.title.as_ref().map_or("", |title| title.get_ref());
    let plain: String = text.chars().map(|letter| if letter.is_control() { ' ' } else { letter }).collect();
    let title = plain.split_whitespace().collect::<Vec<_>>().join(" ");
    if title.is_empty() { "Untitled frame".into() } else { title }
}

fn report_units(source: Source, written: &Written) -> Result<ReportUnits, FileFault> {
    let Some(word) = &written.report_units else { return Ok(ReportUnits::default()) };
    match source.choice(word.get_ref(), word.span(), &["metric", "us"], None)? {
        0 => Ok(ReportUnits::Metric),
        _ => Ok(ReportUnits::Us),
    }
}

fn modulus(source: Source, written: &Written) -> Result<Option<(f64, Range<usize>)>, FileFault> {
    let Some(table) = &written.material else { return Ok(None) };
    let value = require(&table.get_ref().modulus, table.span(), "the modulus of elasticity", MODULUS)?;
    Ok(Some((source.positive(value, Dimension::Modulus)?, value.span())))
}

const MODULUS: &str = "add [material] with modulus = \"30 GPa\" (concrete) or modulus = \"29000 ksi\" (steel)";

fn known_sizes(
    source: Source,
    written: &Written,
    grid: &Grid,
    feet: &CheckedFeet,
    has_modulus: bool,
    end: Range<usize>,
) -> Result<Sized, FileFault> {
    let missing = |what, help| FileFault::new(FaultKind::Missing { what, help }, end.clone());
    let columns = written.columns.as_ref().filter(|tables| !tables.get_ref().0.is_empty());
    let beams = written.beams.as_ref().filter(|tables| !tables.get_ref().0.is_empty());
    let columns = columns.ok_or_else(|| {
        missing("the size of the columns", "add [[columns]] with an inertia or a rectangle; or, while sizes are unknown, [sizes] in place of [[columns]] and [[beams]]")
    })?;
    let beams = beams.ok_or_else(|| {
        missing("the size of the beams", "add [[beams]] with an inertia or a rectangle; or, while sizes are unknown, [sizes] in place of [[columns]] and [[beams]]")
    })?;
    let made = members::columns(source, &columns.get_ref().0, grid)?;
    let made_beams = members::beams(source, &beams.get_ref().0, grid)?;
    if !has_modulus {
        return Err(missing("the modulus of elasticity", MODULUS));
    }
    let within = model::within(source, &written.within)?;
    let mut echo = made.echo;
    echo.extend(made_beams.echo);
    echo.extend(
        written
            .within
            .as_ref()
            .map(|table| Echo { what: "sizes within".into(), typed: model::echo_within(source, table.get_ref()) }),
    );
    Ok(Sized {
        columns: made.sections,
        beams: made_beams.sections,
        feet: feet.feet.clone(),
        source: SizeSource::Stated,
        statement: SizeStatement::Stated { within },
        echo,
        warnings: made.warnings.into_iter().chain(made_beams.warnings).collect(),
        span: made.without_area.unwrap_or(columns.span()),
    })
}

fn unknown_sizes(
    source: Source,
    written: &Written,
    sizes: &Spanned<Table<SizesWritten>>,
    grid: &Grid,
    feet: &CheckedFeet,
    modulus: Option<f64>,
) -> Result<Sized, FileFault> {
    no_known_sizes(written, sizes)?;
    model::one_statement(&written.within, sizes)?;
    let table = sizes.get_ref();
    if let Some(ratio) = &table.foot_spring {
        feet::one_statement(feet, ratio.span())?;
    }
    let model = model::model(source, table, grid.storeys.lengths.len())?;
    let real = model.end_column_inertia.is_some();
    if let (Some(inertia), false) = (&table.end_column_inertia, modulus.is_some()) {
        let kind = FaultKind::Missing {
            what: "the modulus of elasticity, which a real inertia needs beside it,",
            help: MODULUS,
        };
        return Err(FileFault::new(kind, inertia.span()));
    }
    if let (Some(spring), false) = (feet.spring(), real) {
        return Err(FileFault::new(FaultKind::SpringNeedsInertia, spring));
    }
    let (bays, storeys) = (&grid.bays.lengths, &grid.storeys.lengths);
    let assumed = model.assumed();
    let made = assumed.sections(bays, storeys, |_| 1.0);
    let springs = assumed.foot_springs(&made.columns[..=bays.len()], modulus.unwrap_or(1.0), storeys[0]);
    Ok(Sized {
        columns: made.columns,
        beams: made.beams,
        feet: springs.map_or_else(|| feet.feet.clone(), Feet::Springs),
        source: if real { SizeSource::Assumed } else { SizeSource::AssumedRelative },
        statement: SizeStatement::Model(model),
        echo: model::echo(source, table, &model),
        warnings: model::growing(table, &model),
        span: sizes.span(),
    })
}

fn no_known_sizes(written: &Written, sizes: &Spanned<Table<SizesWritten>>) -> Result<(), FileFault> {
    let columns = written
        .columns
        .as_ref()
        .and_then(|tables| tables.get_ref().0.first().map(|table| (table.span(), "[[columns]]")));
    let beams =
        written.beams.as_ref().and_then(|tables| tables.get_ref().0.first().map(|table| (table.span(), "[[beams]]")));
    let Some((span, second)) = columns.or(beams) else { return Ok(()) };
    let kind = FaultKind::Conflict {
        first: "[sizes]",
        second,
        help: "keep [[columns]] and [[beams]] where sizes are known, [sizes] alone where they are not",
    };
    Err(FileFault::new(kind, span).beside(sizes.span(), "given here"))
}

/// The place in the file of a fault that the frame itself found.
fn place(fault: FrameFault, load: &Lateral, sizes: &Range<usize>, units: ReportUnits) -> FileFault {
    match fault {
        FrameFault::NoLoad => FileFault::new(FaultKind::NoLoad, load.span.clone()),
        FrameFault::StoreyShear { storey, shear } => {
            let (shear, unit) = (units.force().from_si(shear), units.force().symbol);
            let span = load.spans.get(storey - 1).unwrap_or(&load.span).clone();
            FileFault::new(FaultKind::StoreyShear { storey, shear, unit }, span)
        }
        other => FileFault::new(other, sizes.clone()),
    }
}

fn echo(frame: &Frame, grid: &Grid, feet: &str, modulus: Option<String>, sizes: &[Echo], load: &Lateral) -> Vec<Echo> {
    let line = |what: &str, typed: &str| Echo { what: what.into(), typed: typed.into() };
    let mut lines = vec![
        line("title", frame.title()),
        line("bays", &grid.bays.typed),
        line("storeys", &grid.storeys.typed),
        line("feet", feet),
    ];
    lines.extend(modulus.map(|typed| line("modulus", &typed)));
    lines.extend_from_slice(sizes);
    lines.push(line("lateral forces", &load.typed));
    lines
}
