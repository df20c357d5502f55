//! The member sizes that entered the analyses, so that a checker can repeat them.

use crate::frame::file::SizeStatement;
use crate::frame::{Frame, Section, SizeSource, bay_name, line_name};
use crate::report::{Document, Sentence, TableBlock, TableCell, say};
use crate::units::{METRES_PER_INCH, ReportUnits, Unit};
use std::ops::Range;

/// The most column lines whose sizes stand side by side.
const MOST_LINES: usize = 24;

/// Adds the sizes used: inertias with their stiffness factors, and areas where there are any.
pub(super) fn add(report: &mut Document, frame: &Frame, sizes: &SizeStatement) {
    report.subsection("Sizes used");
    report.paragraph(origin(frame, sizes));
    if let SizeStatement::Model(model) = sizes {
        let set = model.assumed();
        let pairs = [
            ("beam to column ratio r", set.beam_to_column),
            ("interior over end column inertia x", set.interior_to_end),
            ("taper of columns per tier", set.taper),
            ("taper of beams per tier", set.beam_taper),
            ("roof beams", set.roof_beam),
            ("span power p", set.span_power),
            ("area per root of inertia a", set.area_per_inertia),
        ];
        report.pairs(pairs.map(|(name, value)| (name.to_string(), say(format!("{value:.4}")))));
    }
    if frame.lines() > MOST_LINES {
        report.paragraph("This frame is too wide for a table of sizes; they follow from the input file.");
        return;
    }
    let relative = !frame.has_real_stiffness();
    let inertia = inertia_unit(frame.report_units(), relative);
    report.table(table(frame, "inertia-columns", "Column inertias", inertia, &column_names(frame), &|storey, line| {
        frame.column(storey, line).inertia
    }));
    report.table(table(frame, "inertia-beams", "Beam inertias", inertia, &beam_names(frame), &|floor, bay| {
        frame.beam(floor, bay).inertia
    }));
    if frame.has_areas() {
        let unit = area_unit(frame.report_units(), relative);
        report.table(table(frame, "areas", "Column areas", unit, &column_names(frame), &|storey, line| {
            let Section { area, .. } = frame.column(storey, line);
            area.unwrap_or(0.0)
        }));
    }
}

fn origin(frame: &Frame, sizes: &SizeStatement) -> Sentence {
    match (frame.size_source(), sizes) {
        (SizeSource::AssumedRelative, _) => say(
            "The middle of the ranges in [sizes]; inertias and areas are relative, an end column of the lowest tier \
             having inertia 1.",
        ),
        (SizeSource::Assumed, _) => say("The middle of the ranges in [sizes]; no scatter."),
        (SizeSource::Stated, SizeStatement::Stated { within: Some(_) }) => say(
            "As the file gives them, inertias with their stiffness factors. What the file says under `within` does not \
             enter this comparison: sizes are taken as given.",
        ),
        (SizeSource::Stated, _) => say("As the file gives them, inertias with their stiffness factors."),
    }
}

fn column_names(frame: &Frame) -> Vec<String> {
    (0..frame.lines()).map(line_name).collect()
}

fn beam_names(frame: &Frame) -> Vec<String> {
    (0..frame.bays()).map(bay_name).collect()
}

fn inertia_unit(units: ReportUnits, relative: bool) -> Unit {
    match (relative, units) {
        (true, _) => Unit { symbol: "relative", si: 1.0 },
        (false, ReportUnits::Metric) => Unit { symbol: "10⁻³ m⁴", si: 1e-3 },
        (false, ReportUnits::Us) => Unit { symbol: "in⁴", si: METRES_PER_INCH.powi(4) },
    }
}

fn area_unit(units: ReportUnits, relative: bool) -> Unit {
    match (relative, units) {
        (true, _) => Unit { symbol: "relative", si: 1.0 },
        (false, ReportUnits::Metric) => Unit { symbol: "m²", si: 1.0 },
        (false, ReportUnits::Us) => Unit { symbol: "in²", si: METRES_PER_INCH.powi(2) },
    }
}

/// One row per run of storeys or floors with equal sizes, from the roof.
fn table(
    frame: &Frame,
    key: &str,
    caption: &str,
    unit: Unit,
    names: &[String],
    size: &dyn Fn(usize, usize) -> f64,
) -> TableBlock {
    let of_beams = key == "inertia-beams";
    let head = if of_beams { "floors" } else { "storeys" };
    let caption = format!("{caption}, {}", unit.symbol);
    let table = TableBlock::new(format!("sizes-{key}"), caption.as_str()).name(head);
    let mut table = names.iter().fold(table, |table, name| table.number(name, "", 4));
    for run in
        runs(frame.storeys(), &|a, b| (0..names.len()).all(|place| size(a, place) == size(b, place))).iter().rev()
    {
        let numbers = (0..names.len()).map(|place| TableCell::from(unit.from_si(size(run.start, place))));
        let name = TableCell::from(super::summary::group_name(run, frame.storeys(), of_beams));
        table.row(std::iter::once(name).chain(numbers));
    }
    table
}

/// Runs of neighbouring storeys that are equal.
fn runs(storeys: usize, equal: &dyn Fn(usize, usize) -> bool) -> Vec<Range<usize>> {
    let mut runs: Vec<Range<usize>> = Vec::new();
    for storey in 0..storeys {
        match runs.last_mut() {
            Some(run) if equal(run.start, storey) => run.end = storey + 1,
            _ => runs.push(storey..storey + 1),
        }
    }
    runs
}
