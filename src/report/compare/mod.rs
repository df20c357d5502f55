//! Reports of a comparison: its tables as data, its terminal text, its page and its charts.

mod brief;
mod charts;
mod page;
mod ranking;
mod sheet;
mod sizes;
mod summary;
mod tables;
mod words;

pub use brief::brief;
pub use charts::{Chart, charts};
pub use page::page;
pub use tables::tables;

use super::workbook::About;
use super::{Document, Sentence, TableBlock, TableCell, say};
use crate::compare::verdict::{Subject, Verdict};
use crate::compare::{Comparison, FOOT_RATIOS};
use crate::frame::Frame;
use crate::frame::file::{FrameFile, SizeStatement};
use crate::response::{Caution, Fit};

/// What a comparison's reports are made from.
#[derive(Debug, Clone, Copy)]
pub struct Findings<'a> {
    /// The frame and what its file says about it.
    pub file: &'a FrameFile,
    /// What was found.
    pub comparison: &'a Comparison,
    /// Warnings on the frame and on the results, one sentence each.
    pub warnings: &'a [String],
}

impl Findings<'_> {
    /// The frame.
    pub fn frame(&self) -> &Frame {
        &self.file.frame
    }

    /// Reasons to doubt the quick methods on this frame, one sentence per reason.
    fn cautions_of_methods(&self) -> Vec<Sentence> {
        let mut reasons: Vec<(String, Vec<&str>)> = Vec::new();
        for quick in &self.comparison.quick {
            let cautions = match &quick.fit {
                Fit::Suits => continue,
                Fit::Doubtful(cautions) => cautions.clone(),
                Fit::Refused(reason) => vec![Caution(format!("not run: {}", reason.0))],
            };
            for caution in cautions {
                match reasons.iter_mut().find(|(text, _)| *text == caution.0) {
                    Some((_, methods)) => methods.push(quick.entry.info.name),
                    None => reasons.push((caution.0, vec![quick.entry.info.name])),
                }
            }
        }
        let sentence = |(text, methods): (String, Vec<&str>)| {
            Sentence::default().strong(words::capital(&methods.join(", "))).then(format!(": {text}."))
        };
        let warnings = self.warnings.iter().map(|warning| say(words::capital(warning) + "."));
        let flags = self.comparison.quick_errors().filter_map(|(method, errors)| {
            words::flags(&words::capital(&words::method_name(self.comparison, method)), errors)
        });
        let reasons = reasons.into_iter().map(sentence);
        warnings.chain(self.notices()).chain(reasons).chain(flags.map(Sentence::from)).collect()
    }

    /// What of the file does not enter, and which methods repeat each other here.
    fn notices(&self) -> Vec<Sentence> {
        let mut notices = Vec::new();
        if matches!(self.file.sizes, SizeStatement::Stated { within: Some(_) }) {
            let text = "Sizes are taken as given: what the file says under ";
            notices.push(say(text).code("within").then(" does not enter this comparison."));
        }
        for quick in &self.comparison.quick {
            if let Some(earlier) = self.comparison.repeats(quick.entry.info.id) {
                let name = words::method_name(self.comparison, earlier);
                let own = words::capital(quick.entry.info.name);
                notices.push(say(format!("{own}: gives the same values as the {name} on this frame.")));
            }
        }
        notices
    }
}

/// What the workbook's first sheet says.
pub fn about(findings: &Findings) -> About {
    let notes = [
        "Moments: clockwise on the member end positive. Column shear: positive where it resists load to the right. Axial \
         force: tension positive. Beam shear: positive where it lifts the left joint.",
        "Errors: negative is short, the unsafe side for strength.",
    ];
    About {
        title: findings.frame().title().into(),
        cautions: words::cautions().into_iter().map(Into::into).collect(),
        notes: notes.map(Into::into).into(),
    }
}

/// The second line of fixed feet, where there is one.
fn feet_table(comparison: &Comparison, methods: &[&str]) -> Option<TableBlock> {
    let caption = "Feet are neither fixed nor pinned: lowest error in the two lowest storeys, by foot spring";
    let mut table = TableBlock::new("feet", caption).name("method");
    for subject in Subject::FORCES {
        table = table.under(subject.name()).percent("fixed", 0);
        table = FOOT_RATIOS.iter().fold(table, |table, ratio| table.percent(format!("spring {ratio}"), 0));
    }
    let cell = |percent: f64| summary::percent_cell(percent, comparison.options.tolerance);
    for lines in comparison.feet.chunk_by(|a, b| a.method == b.method) {
        if !methods.contains(&lines[0].method) {
            continue;
        }
        let numbers = Subject::FORCES.into_iter().flat_map(|subject| {
            let line = lines.iter().find(|line| line.subject == subject);
            line.map_or_else(
                || [const { None }; 3],
                |line| [Some(line.fixed), Some(line.sprung[0]), Some(line.sprung[1])],
            )
        });
        let numbers = numbers.map(|percent: Option<f64>| percent.map(cell).into());
        table.row(std::iter::once(TableCell::from(summary::short_name(lines[0].method))).chain(numbers));
    }
    table.note(
        "Springs: rotational foot stiffness over 4 E I/h of each foot's own column. The exact answer changes with the \
         feet, the quick methods keep theirs fixed; percent of the storey's largest exact value, negative is short.",
    );
    (!comparison.feet.is_empty()).then(|| summary::judged(table, comparison))
}

/// One card per verdict of `methods` on `subject`, methods that repeat another left out.
fn verdict_cards(report: &mut Document, findings: &Findings, subject: Subject, methods: &[&str]) {
    let comparison = findings.comparison;
    let wanted = |verdict: &&Verdict| words::own(comparison, verdict) && methods.contains(&verdict.method);
    let verdicts: Vec<_> = comparison.ranked(subject).into_iter().filter(wanted).collect();
    if verdicts.is_empty() {
        report.paragraph("Not judged: the exact values are zero, whatever the quick methods say.");
    }
    for verdict in verdicts {
        let sentence = words::verdict(comparison, verdict, findings.frame().report_units());
        report.verdict_in_words(words::mark(verdict.state), words::word(verdict.state), sentence);
    }
}
