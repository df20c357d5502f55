//! Puts the checked parts together to a frame.

use super::fault::{FaultKind, FileFault};
use super::grid::Grid;
use super::lateral::Lateral;
use super::sized::Stated;
use super::source::{Source, require};
use super::written::Written;
use super::{Echo, FrameFile, feet, gravity, grid, joints, lateral, material, sized, warning};
use crate::frame::options::AnalysisOptions;
use crate::frame::{Frame, FrameFault, FrameParts};
use crate::units::ReportUnits;
use std::ops::Range;

/// Checks everything that is written.
pub(super) fn assemble(source: Source, written: &Written) -> Result<FrameFile, FileFault> {
    let end = source.0.trim_end().len();
    let report_units = report_units(source, written)?;
    let table = require(
        &written.grid,
        end..end,
        "the table [grid]",
        "add [grid] with bays = [\"7.2 m\", \"8.4 m\"] and storeys = [\"4.8 m\", \"3.9 m\"]",
    )?;
    let grid = grid::grid(source, table)?;
    let (bays, storeys) = (&grid.bays.lengths, &grid.storeys.lengths);
    let stated = Stated {
        material: material::material(source, written)?,
        feet: feet::feet(source, &written.feet, bays.len() + 1)?,
        joints: joints::joints(source, &written.joints)?,
        gravity: gravity::gravity(source, &written.gravity, bays, storeys.len())?,
    };
    let sized = sized::sized(source, written, &grid, &stated, end..end)?;
    let load = written.lateral.as_ref().ok_or_else(|| lateral::missing(end..end))?;
    let load = lateral::lateral(source, load, storeys)?;
    let parts = FrameParts {
        title: title(written),
        report_units,
        bays: bays.clone(),
        storeys: storeys.clone(),
        feet: sized.feet,
        modulus: stated.modulus().unwrap_or(1.0),
        columns: sized.columns,
        beams: sized.beams,
        lateral: load.forces.clone(),
        sizes: sized.source,
    };
    let frame = Frame::new(parts).map_err(|fault| place(fault, &load, &sized.span, report_units))?;
    let gravity = stated.gravity.as_ref().map(|gravity| gravity.loads.clone());
    let options = AnalysisOptions { gravity, ..sized.options };
    let options = AnalysisOptions::new(&frame, options).map_err(|fault| match &stated.joints {
        Some(joints) => joints.place(fault, report_units.length()),
        None => FileFault::new(fault, sized.span.clone()),
    })?;
    let mut warnings = warning::lengths(source, &grid);
    warnings.extend(stated.material.iter().flat_map(|material| material.warnings.clone()));
    warnings.extend(sized.warnings);
    warnings.extend(warning::of_frame(&frame, sized.span));
    let echo = echo(&frame, &grid, &stated, &sized.echo, &load);
    Ok(FrameFile { frame, echo, sizes: sized.statement, options, warnings })
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

fn echo(frame: &Frame, grid: &Grid, stated: &Stated, sizes: &[Echo], load: &Lateral) -> Vec<Echo> {
    let line = |what: &str, typed: &str| Echo { what: what.into(), typed: typed.into() };
    let mut lines = vec![
        line("title", frame.title()),
        line("bays", &grid.bays.typed),
        line("storeys", &grid.storeys.typed),
        line("feet", &stated.feet.typed),
    ];
    lines.extend(stated.material.iter().flat_map(|material| material.echo.clone()));
    lines.extend_from_slice(sizes);
    lines.extend(stated.joints.iter().map(|joints| line("joints", &joints.typed)));
    lines.extend(stated.gravity.iter().map(|gravity| line("vertical loads", &gravity.typed)));
    lines.push(line("lateral forces", &load.typed));
    lines
}
