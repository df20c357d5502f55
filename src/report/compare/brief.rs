//! The terminal report of a comparison: tables first, verdicts last.

use super::summary::{READING, Shown, by_storey};
use super::words;
use super::{Findings, feet_table, verdict_cards};
use crate::compare::verdict::Subject;
use crate::report::{Document, say};

/// The most rows of a table on a terminal.
const MOST_ROWS: usize = 20;

/// Builds the terminal report.
pub fn brief(findings: &Findings) -> Document {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let mut report = Document::new(words::title(frame));
    report.subtitle(words::outline(frame));
    if let Some(notice) = words::size_notice(frame) {
        report.paragraph(notice);
    }
    report.paragraph(words::measure(frame, comparison));
    report.paragraph(READING);
    for subject in Subject::ALL {
        report.table(by_storey(frame, comparison, Shown::subject(subject), MOST_ROWS));
    }
    if let Some(table) = feet_table(comparison) {
        report.table(table);
    }
    report.section(format!("Verdicts at a tolerance of {}", words::tolerance(comparison)));
    for subject in Subject::ALL {
        report.subsection(words::capital(subject.name()));
        verdict_cards(&mut report, findings, subject);
    }
    let cautions = findings.cautions_of_methods();
    if !cautions.is_empty() {
        report.section("Read with care");
        report.list(cautions);
    }
    if !comparison.statics.iter().all(|(_, statics)| statics.closes()) {
        report.paragraph("Statics do not close for every method: see the report before using any number.");
    } else {
        report.paragraph(say("Statics close for every method: joints, storeys and overturning."));
    }
    report.footer(
        "Lateral part only, first order (no P-delta), for preliminary sizing and checking; not a design. The licensed \
         engineer and the code in force decide.",
    );
    report
}
