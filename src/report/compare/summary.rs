//! Tables that show a whole frame in few rows: exact values and errors by storey and class.

use super::words::{class_head, kind, unit};
use crate::compare::Comparison;
use crate::compare::errors::ValueError;
use crate::compare::places::Class;
use crate::compare::verdict::Subject;
use crate::frame::Frame;
use crate::report::{State, TableBlock, TableCell, say};
use std::ops::Range;

/// How the cells of [`by_storey`] are to be read.
pub(super) const READING: &str = "Errors in percent of the largest exact value of the same storey: of the members of a \
                                  cell the one most off, but the shortest where any is short by more than the \
                                  tolerance.";

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
pub(super) fn group_name(group: &Range<usize>, storeys: usize, subject: Subject) -> String {
    let top = if subject == Subject::BeamMoments { "roof" } else { "top" };
    match (group.len(), group.end == storeys) {
        (1, true) => format!("{} {top}", group.end),
        (1, false) => group.end.to_string(),
        _ => format!("{}–{}", group.start + 1, group.end),
    }
}

/// Exact values and errors of every quick method on `subject`: storeys from the roof, ends and interior side by side.
pub(super) fn by_storey(frame: &Frame, comparison: &Comparison, subject: Subject, most: usize) -> TableBlock {
    let unit = unit(subject, frame.report_units());
    let row_head = if subject == Subject::BeamMoments { "floor" } else { "storey" };
    let key = subject.name().replace(' ', "-");
    let caption =
        say(format!("{}: largest exact value, and error of each method", super::words::capital(subject.name())));
    let mut table = TableBlock::new(key, caption).name(row_head);
    let classes = classes(frame, subject);
    let methods: Vec<_> = quick_errors(comparison).map(|(method, _)| method).collect();
    for class in &classes {
        table = table.under(class_head(subject, *class)).number("exact", unit.symbol, 3);
        table = methods.iter().fold(table, |table, method| table.percent(short_name(method), 0));
    }
    let groups = groups(frame.storeys(), most);
    for group in groups.iter().rev() {
        let mut cells = vec![TableCell::from(group_name(group, frame.storeys(), subject))];
        for class in &classes {
            let of_place = |error: &&ValueError| {
                error.place.kind == kind(subject)
                    && error.quantity == subject.quantity()
                    && error.place.class == *class
                    && group.contains(&error.member.storey())
            };
            let mut exact = None;
            let mut errors = Vec::new();
            for (_, set) in quick_errors(comparison) {
                let found: Vec<_> = set.iter().filter(of_place).collect();
                exact = found.iter().map(|error| error.exact.abs()).reduce(f64::max).or(exact);
                errors.push(telling(&found, comparison.options.tolerance));
            }
            cells.push(exact.map(|value| unit.from_si(value)).into());
            cells.extend(errors);
        }
        table.row(cells);
    }
    let tolerance = comparison.options.tolerance;
    table.meaning(State::FallsShort, format!("short by more than {tolerance} %"));
    table.meaning(State::SafeSide, format!("over by more than {tolerance} %"));
    table
}

/// The error sets of the quick methods.
pub(super) fn quick_errors(comparison: &Comparison) -> impl Iterator<Item = (&'static str, &Vec<ValueError>)> {
    let is_quick = |method: &str| comparison.quick.iter().any(|quick| quick.entry.info.id == method);
    comparison.errors.iter().filter(move |(method, _)| is_quick(method)).map(|(method, errors)| (*method, errors))
}

/// Name of a method over a narrow column.
pub(super) fn short_name(method: &str) -> &str {
    method.strip_prefix("portal-").unwrap_or(method)
}

fn classes(frame: &Frame, subject: Subject) -> Vec<Class> {
    let places = if subject == Subject::BeamMoments { frame.bays() } else { frame.lines() };
    if places > 2 { vec![Class::End, Class::Interior] } else { vec![Class::End] }
}

/// The error that tells most of several members.
fn telling(found: &[&ValueError], tolerance: f64) -> TableCell {
    let percents = || found.iter().filter_map(|error| error.storey_error_percent).filter(|percent| percent.is_finite());
    let lowest = percents().reduce(f64::min);
    let farthest = percents().reduce(|a, b| if b.abs() > a.abs() { b } else { a });
    let told = lowest.filter(|lowest| *lowest < -tolerance).or(farthest);
    let state = |percent: f64| match percent {
        short if short < -tolerance => Some(State::FallsShort),
        over if over > tolerance => Some(State::SafeSide),
        _ => None,
    };
    told.map_or_else(TableCell::blank, |percent| TableCell::from(percent).marked(state(percent)))
}

#[cfg(test)]
mod tests {
    use super::groups;

    #[test]
    fn groups_cover_every_storey_once_and_keep_to_the_limit() {
        for storeys in 1..=500 {
            let groups = groups(storeys, 20);
            assert!(groups.len() <= 20, "{storeys}");
            assert!(groups.iter().cloned().flatten().eq(0..storeys), "{storeys}");
        }
    }
}
