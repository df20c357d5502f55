//! Tables that show a whole frame in few rows: exact values and errors by storey and class.

use super::words;
use crate::compare::Comparison;
use crate::compare::errors::ValueError;
use crate::compare::places::Class;
use crate::compare::verdict::{Subject, TIE};
use crate::frame::{Frame, MemberKind};
use crate::report::number::Form;
use crate::report::{State, TableBlock, TableCell, say};
use crate::response::Quantity;
use std::ops::Range;

/// How the cells of [`by_storey`] are to be read.
pub(super) const READING: &str = "Errors are in percent of the storey's largest exact value: in a row of one storey, the \
                                  larger of its exact values (or 5 % of the frame's largest). Of the members of a cell \
                                  the one most off is shown, but the shortest where any is short by more than the \
                                  tolerance.";

/// A quantity shown storey by storey.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Shown {
    /// What it is called.
    pub name: &'static str,
    kind: MemberKind,
    quantity: Quantity,
}

impl Shown {
    /// Moments at the column feet: foundations and splices go by them.
    pub(super) const FOOT_MOMENTS: Self =
        Self { name: "column foot moments", kind: MemberKind::Column, quantity: Quantity::MomentFoot };
    /// Moments at the column heads.
    pub(super) const HEAD_MOMENTS: Self =
        Self { name: "column head moments", kind: MemberKind::Column, quantity: Quantity::MomentHead };
    /// The larger of a column's moments at the faces of its rigid zones.
    pub(super) const COLUMN_FACES: Self =
        Self { name: "column moments at the faces", kind: MemberKind::Column, quantity: Quantity::DesignMomentFace };
    /// The larger of a beam's moments at the faces of its rigid zones.
    pub(super) const BEAM_FACES: Self =
        Self { name: "beam moments at the faces", kind: MemberKind::Beam, quantity: Quantity::DesignMomentFace };
    /// Column axial forces.
    pub(super) const AXIAL: Self =
        Self { name: "column axial forces", kind: MemberKind::Column, quantity: Quantity::Axial };

    /// What a verdict is about.
    pub(super) fn subject(subject: Subject) -> Self {
        Self { name: subject.name(), kind: subject.kind(), quantity: subject.quantity() }
    }

    fn is_of_beams(self) -> bool {
        self.kind == MemberKind::Beam
    }

    fn class_head(self, class: Class) -> &'static str {
        match (self.is_of_beams(), class) {
            (true, Class::End) => "beams of end bays",
            (true, _) => "beams of interior bays",
            (false, Class::End) => "end columns",
            (false, Class::Interior) => "interior columns",
            (false, Class::Whole) => "whole storey",
        }
    }

    fn classes(self, frame: &Frame) -> Vec<Class> {
        if self.kind == MemberKind::Storey {
            return vec![Class::Whole];
        }
        let across = if self.is_of_beams() { frame.bays() } else { frame.lines() };
        if across > 2 { vec![Class::End, Class::Interior] } else { vec![Class::End] }
    }

    fn holds(self, error: &ValueError, class: Class, group: &Range<usize>) -> bool {
        error.place.kind == self.kind
            && error.quantity == self.quantity
            && error.place.class == class
            && group.contains(&error.member.storey())
    }
}

/// Whether the answers state `shown`.
pub(super) fn is_stated(comparison: &Comparison, shown: Shown) -> bool {
    let states = |error: &ValueError| error.place.kind == shown.kind && error.quantity == shown.quantity;
    comparison.quick_errors().any(|(_, errors)| errors.iter().any(states))
}

/// Groups of storeys from the ground, single ones where they fit.
pub(super) fn groups(storeys: usize, most: usize) -> Vec<Range<usize>> {
    if storeys <= most {
        return (0..storeys).map(|storey| storey..storey + 1).collect();
    }
    let middle = storeys - 4;
    let size = middle.div_ceil(most - 4);
    let chunks = (0..middle.div_ceil(size)).map(|index| 2 + index * size..(2 + (index + 1) * size).min(storeys - 2));
    let ends = |first: usize| [first..first + 1, first + 1..first + 2];
    ends(0).into_iter().chain(chunks).chain(ends(storeys - 2)).collect()
}

/// Name of a group of storeys or floors: `3`, `4–8`, `9 top`.
pub(super) fn group_name(group: &Range<usize>, storeys: usize, of_beams: bool) -> String {
    let top = if of_beams { "roof" } else { "top" };
    match (group.len(), group.end == storeys) {
        (1, true) => format!("{} {top}", group.end),
        (1, false) => group.end.to_string(),
        _ => format!("{}–{}", group.start + 1, group.end),
    }
}

/// Exact values and errors of the quick methods of `methods` that state the quantity: storeys from the roof, ends and
/// interior side by side.
pub(super) fn by_storey(
    frame: &Frame,
    comparison: &Comparison,
    shown: Shown,
    most: usize,
    methods: &[&str],
) -> TableBlock {
    let states = |errors: &[ValueError]| {
        errors.iter().any(|error| error.place.kind == shown.kind && error.quantity == shown.quantity)
    };
    let sets = comparison.quick_errors().filter(|(method, errors)| methods.contains(method) && states(errors));
    let sets: Vec<_> = sets.collect();
    let unit = shown.quantity.unit(frame.report_units());
    let name = words::capital(shown.name);
    let caption = say(format!("{name}: largest exact value, and error of each method in % of the storey's largest"));
    let row_head = if shown.is_of_beams() { "floor" } else { "storey" };
    let mut table = TableBlock::new(shown.name.replace(' ', "-"), caption).name(row_head);
    let classes = shown.classes(frame);
    for class in &classes {
        table = table.under(shown.class_head(*class)).number("exact", unit.symbol, 3);
        table = sets.iter().fold(table, |table, (method, _)| table.percent(short_name(method), 0));
    }
    for group in groups(frame.storeys(), most).iter().rev() {
        let mut cells = vec![TableCell::from(group_name(group, frame.storeys(), shown.is_of_beams()))];
        for class in &classes {
            let mut exact = None;
            let mut errors = Vec::new();
            for (_, set) in &sets {
                let found: Vec<_> = set.iter().filter(|error| shown.holds(error, *class, group)).collect();
                exact = found.iter().map(|error| error.exact.abs()).reduce(f64::max).or(exact);
                errors.push(telling(&found, comparison.options.tolerance));
            }
            cells.push(exact.map(|value| unit.from_si(value)).into());
            cells.extend(errors);
        }
        table.row(cells);
    }
    judged(table, comparison)
}

/// Name of a method over a narrow column.
pub(super) fn short_name(method: &str) -> &str {
    method.strip_prefix("portal-").unwrap_or(method)
}

/// Says what the marks of [`percent_cell`] mean.
pub(super) fn judged(mut table: TableBlock, comparison: &Comparison) -> TableBlock {
    let tolerance = words::tolerance(comparison);
    table.meaning(State::FallsShort, format!("short by more than {tolerance}"));
    table.meaning(State::SafeSide, format!("over by more than {tolerance}"));
    table
}

/// A storey error, marked where it is beyond the tolerance; with a decimal where rounding would hide on which side.
pub(super) fn percent_cell(percent: f64, tolerance: f64) -> TableCell {
    let state = match percent {
        short if short < -tolerance - TIE => Some(State::FallsShort),
        over if over > tolerance + TIE => Some(State::SafeSide),
        _ => None,
    };
    // The fewest decimals that show on which side of the tolerance the value lies; two are enough to be honest.
    let shows = |places: i32| {
        let scale = 10_f64.powi(places);
        let rounded = (percent.abs() * scale).round() / scale;
        (rounded > tolerance) == state.is_some()
    };
    let places = (0..2).find(|places| shows(*places)).unwrap_or(2);
    let cell = match places {
        0 => TableCell::from(percent),
        places => TableCell::formed(percent, Form::Signed(places as usize)),
    };
    cell.marked(state)
}

/// The error that tells most of several members.
fn telling(found: &[&ValueError], tolerance: f64) -> TableCell {
    let percents = || found.iter().filter_map(|error| error.storey_error_percent).filter(|percent| percent.is_finite());
    let lowest = percents().reduce(f64::min);
    let farthest = percents().reduce(|a, b| if b.abs() > a.abs() { b } else { a });
    let told = lowest.filter(|lowest| *lowest < -tolerance - TIE).or(farthest);
    told.map_or_else(TableCell::blank, |percent| percent_cell(percent, tolerance))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::report::{Content, number};

    #[test]
    fn groups_cover_every_storey_once_and_keep_to_the_limit() {
        for storeys in 1..=500 {
            let groups = groups(storeys, 20);
            assert!(groups.len() <= 20, "{storeys}");
            assert!(groups.iter().cloned().flatten().eq(0..storeys), "{storeys}");
        }
    }

    #[test]
    fn rounding_never_hides_on_which_side_of_the_tolerance_a_value_lies() {
        let shown = |percent| match percent_cell(percent, 20.0).content {
            Content::Number(value) => number::signed(value, 0),
            Content::Formed(value, form) => form.show(value),
            other => panic!("{other:?}"),
        };
        let cases = [
            (-20.3, "−20.3"),
            (-20.04, "−20.04"),
            (-19.7, "−20"),
            (-20.6, "−21"),
            (20.4, "+20.4"),
            (20.0, "+20"),
            (3.2, "+3"),
        ];
        for (percent, text) in cases {
            assert_eq!(shown(percent), text);
            assert_eq!(percent_cell(percent, 20.0).state.is_some(), f64::abs(percent) > 20.0);
        }
    }
}
