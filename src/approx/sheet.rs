//! Hand calculations as tables: the steps a person would take, with the frame's own numbers.
//!
//! Column moments, beam moments and shears are shown positive in their usual sense under load to the right (columns
//! resist it, beams lift their left joints), axial forces positive in tension.

mod sized;

pub(super) use sized::*;

use crate::frame::{Feet, Frame, SizeSource, bay_name, line_name};
use crate::response::{Amount, Response, SheetCell, SheetColumn, Step, Worksheet};

/// What the shear of a storey is shared by.
pub(super) struct Part {
    /// Head of the column that holds it.
    pub head: &'static str,
    /// What its numbers are.
    pub amount: Amount,
}

/// The hand calculation of a method that shares the storey shear among the columns by `part`.
pub(super) fn shear_share_sheet(
    frame: &Frame,
    response: &Response,
    rule: &str,
    part: Part,
    parts: &dyn Fn(usize) -> f64,
) -> Worksheet {
    let steps = vec![
        storey_shears(frame),
        shares(frame, rule, part, parts),
        column_shears(frame, response, "Column shear = share × V of the storey."),
        column_moments(
            frame,
            response,
            "Moment = column shear × distance from the inflection point: half the storey height to either end, the \
             whole height to the head where the ground storey stands on pinned feet.",
        ),
        beam_moments(
            frame,
            response,
            "From the left: beam moment = moments of the columns above and below the joint − moment of the beam on \
             the left; equal at both ends. Right of the last beam nothing may be left over: the last column of this \
             table must read zero.",
        ),
        beam_shears(frame, response, "Beam shear = 2 × beam moment / bay width."),
        axial_forces(
            frame,
            response,
            "From the roof: axial force = force in the column above + shear of the beam on the right − shear of the \
             beam on the left.",
        ),
    ];
    Worksheet { steps }
}

/// The hand calculation of the cantilever method.
pub(super) fn axial_sheet(frame: &Frame, response: &Response) -> Worksheet {
    let mut steps = vec![storey_shears(frame), hinge_moments(frame)];
    if frame.has_areas() {
        let area = |storey, line| frame.column(storey, line).area.unwrap_or(1.0);
        let (rule, amount) = match frame.size_source() {
            SizeSource::Stated => ("As the frame file gives them.", Amount::Area),
            SizeSource::Assumed => ("Assumed from [sizes]: A = a × root of I.", Amount::Area),
            SizeSource::AssumedRelative => {
                ("Assumed from [sizes]: A in proportion to the root of I; only ratios have meaning.", Amount::Ratio)
            }
        };
        let scale = if amount == Amount::Ratio { area(0, 0) } else { 1.0 };
        steps.push(by_line(frame, "Column areas A", rule, amount, &|storey, line| area(storey, line) / scale));
    }
    let area_note = if frame.has_areas() { "" } else { " No areas are known: all A are taken as equal." };
    steps.extend([
        axial_coefficients(frame, area_note),
        axial_forces(
            frame,
            response,
            "Axial force = coefficient × M of the storey: tension on the left, compression on the right.",
        ),
        beam_shears(
            frame,
            response,
            "From the left: beam shear = shear of the beam on the left + axial force in the column below the floor − \
             axial force in the column above it.",
        ),
        beam_moments(frame, response, "Beam moment = beam shear × bay width / 2, equal at both ends."),
        column_moments(
            frame,
            response,
            "From the roof: moment at the head = moments of the beams at the joint − moment at the foot of the column \
             above. The foot takes as much as the head (inflection point at mid-height), nothing on a pinned foot.",
        ),
        column_shears(
            frame,
            response,
            "Column shear = (moment at head + moment at foot) / storey height. The sum over the storey must be V.",
        ),
    ]);
    Worksheet { steps }
}

fn column(head: impl Into<String>, amount: Amount) -> SheetColumn {
    SheetColumn { head: head.into(), amount }
}

fn storey_label(frame: &Frame, storey: usize) -> SheetCell {
    let roof = if storey + 1 == frame.storeys() { " (top)" } else { "" };
    SheetCell::Name(format!("{}{roof}", storey + 1))
}

fn floor_label(frame: &Frame, floor: usize) -> SheetCell {
    if floor + 1 == frame.storeys() { SheetCell::Name("roof".into()) } else { SheetCell::Name((floor + 1).to_string()) }
}

/// A table with one row per storey from the roof and one column per line.
pub(super) fn by_line(
    frame: &Frame,
    title: &str,
    rule: &str,
    amount: Amount,
    value: &dyn Fn(usize, usize) -> f64,
) -> Step {
    let lines = (0..frame.lines()).map(|line| column(line_name(line), amount));
    let row = |storey: usize| {
        let numbers = (0..frame.lines()).map(|line| SheetCell::Number(value(storey, line)));
        std::iter::once(storey_label(frame, storey)).chain(numbers).collect()
    };
    Step {
        title: title.into(),
        rule: rule.into(),
        columns: std::iter::once(column("storey", Amount::Name)).chain(lines).collect(),
        rows: (0..frame.storeys()).rev().map(row).collect(),
    }
}

/// A table with one row per floor from the roof and one column per bay.
fn by_bay(frame: &Frame, title: &str, rule: &str, amount: Amount, value: &dyn Fn(usize, usize) -> f64) -> Step {
    let bays = (0..frame.bays()).map(|bay| column(bay_name(bay), amount));
    let row = |floor: usize| {
        let numbers = (0..frame.bays()).map(|bay| SheetCell::Number(value(floor, bay)));
        std::iter::once(floor_label(frame, floor)).chain(numbers).collect()
    };
    Step {
        title: title.into(),
        rule: rule.into(),
        columns: std::iter::once(column("floor", Amount::Name)).chain(bays).collect(),
        rows: (0..frame.storeys()).rev().map(row).collect(),
    }
}

/// Adds a column at the right end of a step's table.
pub(super) fn with_column(
    mut step: Step,
    frame: &Frame,
    head: &str,
    amount: Amount,
    value: &dyn Fn(usize) -> f64,
) -> Step {
    step.columns.push(column(head, amount));
    let levels = (0..frame.storeys()).rev();
    step.rows.iter_mut().zip(levels).for_each(|(row, level)| row.push(SheetCell::Number(value(level))));
    step
}

pub(super) fn storey_shears(frame: &Frame) -> Step {
    let row = |storey: usize| {
        let numbers = [frame.lateral(storey), frame.storey_shear(storey)].map(SheetCell::Number);
        std::iter::once(storey_label(frame, storey)).chain(numbers).collect()
    };
    Step {
        title: "Storey shears V".into(),
        rule: "From the roof: V = force at the storey's top floor + V of the storey above.".into(),
        columns: vec![
            column("storey", Amount::Name),
            column("force at its top floor", Amount::Force),
            column("V", Amount::Force),
        ],
        rows: (0..frame.storeys()).rev().map(row).collect(),
    }
}

fn shares(frame: &Frame, rule: &str, part: Part, parts: &dyn Fn(usize) -> f64) -> Step {
    let sum: f64 = (0..frame.lines()).map(parts).sum();
    let row = |line: usize| {
        vec![SheetCell::Name(line_name(line)), SheetCell::Number(parts(line)), SheetCell::Number(parts(line) / sum)]
    };
    let total = vec![SheetCell::Name("sum".into()), SheetCell::Number(sum), SheetCell::Number(1.0)];
    Step {
        title: "Share of each column line".into(),
        rule: rule.into(),
        columns: vec![column("line", Amount::Name), column(part.head, part.amount), column("share", Amount::Ratio)],
        rows: (0..frame.lines()).map(row).chain([total]).collect(),
    }
}

pub(super) fn column_shears(frame: &Frame, response: &Response, rule: &str) -> Step {
    let shear = |storey, line| response.column(storey, line).shear;
    let step = by_line(frame, "Column shears", rule, Amount::Force, &shear);
    with_column(step, frame, "sum", Amount::Force, &|storey| response.storey_shear(storey))
}

fn column_moments(frame: &Frame, response: &Response, rule: &str) -> Step {
    let head = |storey, line| -response.column(storey, line).head;
    let mut step = by_line(frame, "Column end moments", rule, Amount::Moment, &head);
    step.columns.insert(1, column("end", Amount::Name));
    let pinned = *frame.feet() == Feet::Pinned;
    for (row, storey) in step.rows.iter_mut().zip((0..frame.storeys()).rev()) {
        let label = if storey == 0 && pinned { "head (foot: 0)" } else { "head = foot" };
        row.insert(1, SheetCell::Name(label.into()));
    }
    step
}

fn beam_moments(frame: &Frame, response: &Response, rule: &str) -> Step {
    let moment = |floor, bay| response.beam(floor, bay).left;
    let step = by_bay(frame, "Beam end moments", rule, Amount::Moment, &moment);
    with_column(step, frame, "left over", Amount::Moment, &|floor| left_over(frame, response, floor))
}

/// Sum of the moments at the last joint of a floor.
fn left_over(frame: &Frame, response: &Response, floor: usize) -> f64 {
    let line = frame.bays();
    let above = if floor + 1 < frame.storeys() { response.column(floor + 1, line).foot } else { 0.0 };
    let sum = response.column(floor, line).head + above + response.beam(floor, line - 1).right;
    if sum.abs() < 1e-9 * response.largest_moment() { 0.0 } else { sum }
}

fn beam_shears(frame: &Frame, response: &Response, rule: &str) -> Step {
    by_bay(frame, "Beam shears", rule, Amount::Force, &|floor, bay| response.beam(floor, bay).shear)
}

fn axial_forces(frame: &Frame, response: &Response, rule: &str) -> Step {
    by_line(frame, "Column axial forces", rule, Amount::Force, &|storey, line| response.column(storey, line).axial)
}

/// Height of the inflection points above the ground, m.
fn hinge_level(frame: &Frame, storey: usize) -> f64 {
    let pinned = storey == 0 && *frame.feet() == Feet::Pinned;
    frame.storey_base(storey) + if pinned { 0.0 } else { 0.5 * frame.storey_height(storey) }
}

fn hinge_moments(frame: &Frame) -> Step {
    let row = |storey: usize| {
        let level = hinge_level(frame, storey);
        let numbers = [level, frame.overturning_above(level)].map(SheetCell::Number);
        std::iter::once(storey_label(frame, storey)).chain(numbers).collect()
    };
    Step {
        title: "Moment M of the forces above, about the inflection points of each storey".into(),
        rule: "Inflection points at mid-height, on pinned feet at the ground; M = sum of force × height above them."
            .into(),
        columns: vec![
            column("storey", Amount::Name),
            column("inflection points above ground", Amount::Length),
            column("M", Amount::Moment),
        ],
        rows: (0..frame.storeys()).rev().map(row).collect(),
    }
}

fn axial_coefficients(frame: &Frame, note: &str) -> Step {
    let area = |storey: usize, line: usize| {
        if frame.has_areas() { frame.column(storey, line).area.unwrap_or(1.0) } else { 1.0 }
    };
    let lines = 0..frame.lines();
    let centroid = |storey: usize| {
        let (sum, moment) = lines.clone().fold((0.0, 0.0), |(sum, moment), line| {
            (sum + area(storey, line), moment + area(storey, line) * frame.line_position(line))
        });
        moment / sum
    };
    let distance = |storey: usize, line: usize| frame.line_position(line) - centroid(storey);
    let second =
        |storey: usize| lines.clone().map(|line| area(storey, line) * distance(storey, line).powi(2)).sum::<f64>();
    let coefficient = |storey: usize, line: usize| -area(storey, line) * distance(storey, line) / second(storey);
    let rule = format!(
        "d = distance of a line from the centroid of the column areas (centroid measured from line A), to the right \
         positive; coefficient = −A d / sum(A d²).{note}"
    );
    let step = by_line(frame, "Axial force per unit of M", &rule, Amount::PerLength, &coefficient);
    with_column(step, frame, "centroid", Amount::Length, &centroid)
}
