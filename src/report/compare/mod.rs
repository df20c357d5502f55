//! Reports of a comparison: its tables as data, its terminal text, its page and its charts.

mod brief;
mod charts;
mod page;
mod sheet;
mod summary;
mod tables;
mod words;

pub use brief::brief;
pub use charts::{Chart, charts};
pub use page::page;
pub use tables::tables;

use super::workbook::About;
use super::{Sentence, TableBlock, TableCell, say};
use crate::compare::Comparison;
use crate::frame::Frame;
use crate::frame::file::FrameFile;
use crate::response::Fit;

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
                Fit::Refused(reason) => vec![reason.clone()],
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
        let warnings = self.warnings.iter().map(|warning| say(warning.as_str()));
        warnings.chain(reasons.into_iter().map(sentence)).collect()
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
fn feet_table(comparison: &Comparison) -> Option<TableBlock> {
    let mut table =
        TableBlock::new("feet", "Feet are neither fixed nor pinned: lowest error with springs under the columns")
            .name("method")
            .name("quantity")
            .percent("fixed feet", 0)
            .under("foot spring over 4 E I/h")
            .percent("20", 0)
            .percent("1", 0);
    let tolerance = comparison.options.tolerance;
    let cell = |percent: f64| {
        let short = percent < -tolerance;
        TableCell::from(percent).marked(short.then_some(super::State::FallsShort))
    };
    for line in &comparison.feet {
        let names = [comparison_name(comparison, line.method), line.subject.name().into()].map(TableCell::from);
        table.row(names.into_iter().chain([line.fixed, line.sprung[0], line.sprung[1]].map(cell)));
    }
    table.note(
        "The exact answer with rotational springs of 20 and of 1 times 4 E I/h of the lowest columns, beside the quick \
         methods with fixed feet; percent of the storey's largest exact value, negative is short.",
    );
    (!comparison.feet.is_empty()).then_some(table)
}

fn comparison_name(comparison: &Comparison, method: &str) -> String {
    words::method_name(comparison, method)
}
