//! Steps of the methods that need member sizes: stiffnesses, values at both ends of members, drifts.

use super::{
    axial_forces, beam_shears, by_bay, by_line, column, column_shears, floor_label, storey_label, with_column,
};
use crate::frame::{Feet, Frame, bay_name, line_name};
use crate::response::{Amount, Response, SheetCell, Step};

/// A number for each (storey or floor, line or bay).
type Grid<'a> = &'a dyn Fn(usize, usize) -> f64;
/// A column of a table by storey: head, kind, number.
pub(in crate::approx) type StoreyColumn<'a> = (&'a str, Amount, &'a dyn Fn(usize) -> f64);

/// What stiffnesses E I/length are shown as, and the size of one of it, N m: relative sizes are shown over the stiffness of
/// the lowest column on line A.
pub(in crate::approx) fn stiffness(frame: &Frame) -> (Amount, f64) {
    match frame.has_real_stiffness() {
        true => (Amount::Stiffness, 1.0),
        false => (Amount::Ratio, frame.column_stiffness(0, 0)),
    }
}

/// What a moment over a stiffness as shown is: a rotation, or a moment where stiffnesses are ratios.
pub(in crate::approx) fn per_stiffness(frame: &Frame) -> Amount {
    if frame.has_real_stiffness() { Amount::Rotation } else { Amount::Moment }
}

fn note(frame: &Frame) -> &'static str {
    if frame.has_real_stiffness() { "" } else { " Relative sizes: over that of the lowest column on line A." }
}

/// Column stiffnesses with their sum C by storey.
pub(in crate::approx) fn column_stiffnesses(frame: &Frame) -> Step {
    let (amount, unit) = stiffness(frame);
    let value = |storey, line| frame.column_stiffness(storey, line) / unit;
    let rule = format!("k = E I / h.{}", note(frame));
    let step = by_line(frame, "Column stiffnesses k", &rule, amount, &value);
    with_column(step, frame, "sum C", amount, &|storey| (0..frame.lines()).map(|line| value(storey, line)).sum())
}

/// The sum S of foot springs; nothing for other feet.
pub(in crate::approx) fn foot_springs(frame: &Frame) -> Option<Step> {
    let Feet::Springs(springs) = frame.feet() else { return None };
    let (amount, unit) = stiffness(frame);
    let row = |name: String, spring: f64| vec![SheetCell::Name(name), SheetCell::Number(spring / unit)];
    let lines = springs.iter().enumerate().map(|(line, spring)| row(line_name(line), *spring));
    Some(Step {
        title: "Foot springs and their sum S".into(),
        rule: format!("Moment at the foot per rotation.{}", note(frame)),
        columns: vec![column("line", Amount::Name), column("spring", amount)],
        rows: lines.chain([row("sum S".into(), springs.iter().sum())]).collect(),
    })
}

/// Beam stiffnesses with their sum G by floor.
pub(in crate::approx) fn beam_stiffnesses(frame: &Frame) -> Step {
    let (amount, unit) = stiffness(frame);
    let value = |floor, bay| frame.beam_stiffness(floor, bay) / unit;
    let rule = format!("k = E I / L.{}", note(frame));
    let step = by_bay(frame, "Beam stiffnesses k", &rule, amount, &value);
    with_column(step, frame, "sum G", amount, &|floor| (0..frame.bays()).map(|bay| value(floor, bay)).sum())
}

/// A table with one row per floor from the roof and one column per line.
pub(in crate::approx) fn by_joint(frame: &Frame, title: &str, rule: &str, amount: Amount, value: Grid) -> Step {
    let mut step = by_line(frame, title, rule, amount, value);
    step.columns[0] = column("floor", Amount::Name);
    let floors = (0..frame.storeys()).rev();
    step.rows.iter_mut().zip(floors).for_each(|(row, floor)| row[0] = floor_label(frame, floor));
    step
}

/// A table with two rows per storey from the roof, head and foot; `values` gives foot and head.
pub(in crate::approx) fn by_line_ends(
    frame: &Frame,
    title: &str,
    rule: &str,
    amount: Amount,
    [foot, head]: [Grid; 2],
) -> Step {
    let names = (0..frame.lines()).map(line_name).collect::<Vec<_>>();
    let rows = (0..frame.storeys()).rev().flat_map(|storey| {
        [("head", head), ("foot", foot)]
            .map(|(end, value)| ends_row(storey_label(frame, storey), end, storey, &names, value))
    });
    ends_step(title, rule, "storey", amount, &names, rows.collect())
}

/// A table with two rows per floor from the roof, left and right end.
pub(in crate::approx) fn by_bay_ends(
    frame: &Frame,
    title: &str,
    rule: &str,
    amount: Amount,
    [left, right]: [Grid; 2],
) -> Step {
    let names = (0..frame.bays()).map(bay_name).collect::<Vec<_>>();
    let rows = (0..frame.storeys()).rev().flat_map(|floor| {
        [("left", left), ("right", right)]
            .map(|(end, value)| ends_row(floor_label(frame, floor), end, floor, &names, value))
    });
    ends_step(title, rule, "floor", amount, &names, rows.collect())
}

fn ends_row(label: SheetCell, end: &str, level: usize, names: &[String], value: Grid) -> Vec<SheetCell> {
    let numbers = (0..names.len()).map(|place| SheetCell::Number(value(level, place)));
    [label, SheetCell::Name(end.into())].into_iter().chain(numbers).collect()
}

fn ends_step(
    title: &str,
    rule: &str,
    level: &str,
    amount: Amount,
    names: &[String],
    rows: Vec<Vec<SheetCell>>,
) -> Step {
    let heads = [column(level, Amount::Name), column("end", Amount::Name)];
    let columns = heads.into_iter().chain(names.iter().map(|name| column(name, amount))).collect();
    Step { title: title.into(), rule: rule.into(), columns, rows }
}

/// Column end moments, two rows per storey.
pub(in crate::approx) fn column_end_moments(frame: &Frame, response: &Response, rule: &str) -> Step {
    let foot = |storey, line| -response.column(storey, line).foot;
    let head = |storey, line| -response.column(storey, line).head;
    by_line_ends(frame, "Column end moments", rule, Amount::Moment, [&foot, &head])
}

/// Beam end moments, two rows per floor.
pub(in crate::approx) fn beam_end_moments(frame: &Frame, response: &Response, rule: &str) -> Step {
    let left = |floor, bay| response.beam(floor, bay).left;
    let right = |floor, bay| response.beam(floor, bay).right;
    by_bay_ends(frame, "Beam end moments", rule, Amount::Moment, [&left, &right])
}

/// Column shears, beam shears and axial forces, as they follow from end moments.
pub(in crate::approx) fn shears_and_axial_forces(frame: &Frame, response: &Response) -> [Step; 3] {
    [
        column_shears(
            frame,
            response,
            "Column shear = (moment at head + moment at foot) / storey height. The sum over the storey must be V.",
        ),
        beam_shears(frame, response, "Beam shear = sum of its end moments / bay width."),
        axial_forces(
            frame,
            response,
            "From the roof: axial force = force in the column above + shear of the beam on the right − shear of the \
             beam on the left.",
        ),
    ]
}

/// A table with one row per storey from the roof.
pub(in crate::approx) fn by_storey(frame: &Frame, title: &str, rule: &str, columns: &[StoreyColumn]) -> Step {
    let row = |storey: usize| {
        let numbers = columns.iter().map(|(_, _, value)| SheetCell::Number(value(storey)));
        std::iter::once(storey_label(frame, storey)).chain(numbers).collect()
    };
    let heads = columns.iter().map(|(head, amount, _)| column(*head, *amount));
    Step {
        title: title.into(),
        rule: rule.into(),
        columns: std::iter::once(column("storey", Amount::Name)).chain(heads).collect(),
        rows: (0..frame.storeys()).rev().map(row).collect(),
    }
}

/// V, h, C and G of every storey; G belongs to its top floor.
pub(in crate::approx) fn storey_stiffnesses(frame: &Frame) -> Step {
    let columns = |storey| (0..frame.lines()).map(|line| frame.column_stiffness(storey, line)).sum();
    let beams = |floor| (0..frame.bays()).map(|bay| frame.beam_stiffness(floor, bay)).sum();
    by_storey(
        frame,
        "Sums by storey",
        "C = sum of E I / h of the columns; G = sum of E I / L of the beams of the storey's top floor.",
        &[
            ("h", Amount::Length, &|storey| frame.storey_height(storey)),
            ("C", Amount::Stiffness, &columns),
            ("G", Amount::Stiffness, &beams),
        ],
    )
}

/// Drift and sway of the answer; none where it states none.
pub(in crate::approx) fn drifts(frame: &Frame, response: &Response, rule: &str) -> Option<Step> {
    response.movement(0)?;
    let movement = |storey| response.movement(storey).unwrap_or_default();
    Some(by_storey(
        frame,
        "Storey drifts and sways",
        &format!("{rule} Sway = sum of the drifts from the ground."),
        &[
            ("drift", Amount::Movement, &|storey| movement(storey).drift),
            ("sway", Amount::Movement, &|storey| movement(storey).sway),
        ],
    ))
}
