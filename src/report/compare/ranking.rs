//! Quick methods ranked, and what gravity on the sway adds.

use super::summary::{judged, percent_cell};
use super::{Findings, words};
use crate::compare::verdict::{Extreme, Subject, Verdict};
use crate::compare::{Comparison, Quick};
use crate::report::number::{Form, decimals};
use crate::report::{State, TableBlock, TableCell};
use crate::response::Response;

/// The quick methods whose values are not those of an earlier one.
pub(super) fn own_methods(comparison: &Comparison) -> impl Iterator<Item = &Quick> {
    comparison.quick.iter().filter(|quick| comparison.repeats(quick.entry.info.id).is_none())
}

/// The methods that a short report shows in detail: what was asked for, if it is few, else the least short ones.
pub(super) fn detailed(comparison: &Comparison, most: usize) -> Vec<&'static str> {
    let with_forces = |method: &&str| {
        let mut answers = comparison.quick_responses();
        answers.any(|response| response.method == *method && response.has_forces())
    };
    let asked: Vec<_> = comparison.options.methods.iter().copied().filter(with_forces).collect();
    if !asked.is_empty() && asked.len() <= most {
        return asked;
    }
    let ranked = comparison.ranked(Subject::ColumnMoments);
    let own = ranked.into_iter().filter(|verdict| words::own(comparison, verdict));
    own.map(|verdict| verdict.method).take(most).collect()
}

/// The quick methods in the order of their shortfall in column design moments; those that state drifts alone last.
fn ranked(comparison: &Comparison) -> Vec<&Quick> {
    let mut methods: Vec<_> = own_methods(comparison).filter(|quick| quick.response.is_some()).collect();
    let order: Vec<_> = comparison.ranked(Subject::ColumnMoments).iter().map(|verdict| verdict.method).collect();
    let drifts: Vec<_> = comparison.ranked(Subject::StoreyDrifts).iter().map(|verdict| verdict.method).collect();
    let place = |list: &[&str], quick: &Quick| {
        list.iter().position(|method| *method == quick.entry.info.id).unwrap_or(usize::MAX)
    };
    methods.sort_by_key(|quick| (place(&order, quick), place(&drifts, quick)));
    methods
}

/// One row per quick method: errors on every subject. The `full` table has the highest errors and redistribution too.
pub(super) fn ranking(findings: &Findings, full: bool) -> TableBlock {
    let comparison = findings.comparison;
    let caption = "Quick methods ranked: error of any member, % of its storey's largest exact value";
    let mut table = TableBlock::new("ranking", caption).name("method").text("needs sizes");
    let subjects: Vec<_> = stated(comparison).collect();
    for subject in &subjects {
        table = table.under(subject.name()).percent("lowest", 0);
        if full {
            table = table.percent("highest", 0);
        }
        table = table.number("multiply by", "", 3);
        if full {
            table = table.number("redistribution", "%", 2);
        }
    }
    for quick in ranked(comparison) {
        let id = quick.entry.info.id;
        let name = if full { words::method_name(comparison, id) } else { id.into() };
        let mut cells = vec![TableCell::from(name), if quick.entry.info.needs_sizes { "yes" } else { "no" }.into()];
        for subject in &subjects {
            let found = comparison.verdicts.iter().find(|verdict| verdict.method == id && verdict.subject == *subject);
            let row = |verdict: &Verdict| extremes(comparison.options.tolerance, verdict, full);
            cells.extend(found.map_or_else(|| vec![TableCell::blank(); if full { 4 } else { 2 }], row));
        }
        table.row(cells);
    }
    table.note(
        "“Multiply by”: the largest |exact| / |quick| of any member, rounded up; with it no member of this frame is short \
         (members that a method leaves almost without load aside). It multiplies the lateral part only.",
    );
    if full {
        table.note(
            "“Redistribution”: 1 − 1 / factor, the share of its moment that the shortest member must shed if the factor \
             is not used: for ductile parts of a stable frame only.",
        );
    }
    judged(table, comparison)
}

/// The subjects on which some quick method states something.
pub(super) fn stated(comparison: &Comparison) -> impl Iterator<Item = Subject> {
    let has = |subject: &Subject| comparison.verdicts.iter().any(|verdict| verdict.subject == *subject);
    Subject::ALL.into_iter().filter(has)
}

/// Member forces, and drifts where some quick method states them.
pub(super) fn judged_subjects(comparison: &Comparison) -> Vec<Subject> {
    let drifts = stated(comparison).filter(|subject| *subject == Subject::StoreyDrifts);
    Subject::FORCES.into_iter().chain(drifts).collect()
}

fn extremes(tolerance: f64, verdict: &Verdict, full: bool) -> Vec<TableCell> {
    let governing = verdict.governing();
    let shed = |member: Extreme| words::needed(member.factor).map_or(0.0, |factor| 100.0 * (1.0 - 1.0 / factor));
    let mut cells = vec![percent_cell(verdict.lowest.percent, tolerance)];
    if full {
        cells.push(percent_cell(verdict.highest.percent, tolerance));
    }
    cells.push(words::factor(governing.and_then(|member| member.factor)).into());
    if full {
        cells.push(governing.map(|member| TableCell::formed(shed(member), Form::Whole)).into());
    }
    cells
}

/// Second order over first order by storey; `None` without gravity.
pub(super) fn amplification(findings: &Findings) -> Option<TableBlock> {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let (answer, storeys) = comparison.second_order.as_ref()?;
    let unit = frame.report_units().movement();
    let caption = "Second order over first order: gravity on the sway";
    let mut table = TableBlock::new("second-order", caption)
        .name("storey")
        .number("drift", unit.symbol, 3)
        .under("exact amplifier")
        .decimals("drift", "", 3)
        .decimals("columns", "", 3)
        .decimals("beams", "", 3)
        .under("quick amplifier")
        .decimals("plain", "", 3)
        .decimals("with 1.2", "", 3);
    for (storey, found) in storeys.iter().enumerate().rev() {
        let drift = answer.response.movement(storey).map(|movement| unit.from_si(movement.drift));
        let largest = found.drift.max(found.columns).max(found.beams);
        let amplifier = |value: Option<f64>| {
            let short = value.is_none_or(|value| value < largest - 5e-4).then_some(State::FallsShort);
            value.map_or_else(|| TableCell::from("none"), TableCell::from).marked(short)
        };
        table.row([
            TableCell::from((storey + 1).to_string()),
            drift.into(),
            found.drift.into(),
            found.columns.into(),
            found.beams.into(),
            amplifier(found.plain),
            amplifier(found.safer),
        ]);
    }
    let factor = answer.critical_load_factor.map_or_else(
        || "Gravity is negligible against the sway buckling load.".into(),
        |factor| {
            let frame_wide = 1.0 / (1.0 - 1.0 / factor);
            format!(
                "The frame buckles sideways at {} times this gravity. Frame-wide quick amplifier 1 / (1 − 1 / that): {}.",
                words::rounded_down(factor),
                decimals(frame_wide, 3)
            )
        },
    );
    table.note(factor);
    table.note(format!(
        "Exact: second over first order of the drift, and the largest ratio of any column and of any beam on top of the \
         storey that is not near zero. Plain: 1 / (1 − ΣP·drift / (V h)) with the exact first-order drift; the other with \
         1.2 ΣP·drift; none: the denominator is not positive. They look at one storey alone and miss what its neighbours \
         feed into it. Axial forces settled after {} rounds.",
        answer.rounds
    ));
    table.meaning(State::FallsShort, "under an exact amplification of the storey");
    Some(table)
}

/// The exact answers and that in the deformed position, with their names.
pub(super) fn exact_answers(comparison: &Comparison) -> Vec<&Response> {
    comparison.exact().chain(comparison.deformed_beside()).collect()
}
