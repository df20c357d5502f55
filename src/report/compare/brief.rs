//! The terminal report of a comparison: tables first, verdicts last.

use super::ranking::{amplification, detailed, judged_subjects, ranking, stated};
use super::summary::{READING, Shown, by_storey};
use super::words;
use super::{Findings, feet_table, verdict_cards};
use crate::compare::Comparison;
use crate::compare::verdict::Subject;
use crate::report::{Document, say};

/// The most rows of a table on a terminal.
const MOST_ROWS: usize = 20;

/// The most methods shown in detail on a terminal.
const MOST_METHODS: usize = 2;

/// Builds the terminal report.
pub fn brief(findings: &Findings) -> Document {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let mut report = Document::new(words::title(frame));
    report.subtitle(words::outline(frame));
    if let Some(notice) = words::size_notice(frame) {
        report.paragraph(notice);
    }
    report.paragraph(words::measure(frame, comparison));
    report.table(ranking(findings, false));
    let methods = detailed(comparison, MOST_METHODS);
    report.paragraph(READING);
    for subject in stated(comparison) {
        let methods = if subject == Subject::StoreyDrifts { drift_methods(comparison) } else { methods.clone() };
        report.table(by_storey(frame, comparison, Shown::subject(subject), MOST_ROWS, &methods));
    }
    for table in [amplification(findings), feet_table(comparison, &methods)].into_iter().flatten() {
        report.table(table);
    }
    report.section(format!("Verdicts at a tolerance of {}", words::tolerance(comparison)));
    if let Some((state, word, sentence)) = words::gravity_finding(comparison) {
        report.verdict_in_words(state, word, sentence);
    }
    for subject in judged_subjects(comparison) {
        report.subsection(words::capital(subject.name()));
        let methods = if subject == Subject::StoreyDrifts { drift_methods(comparison) } else { methods.clone() };
        verdict_cards(&mut report, findings, subject, &methods);
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
    report.footer(words::footer(comparison));
    report
}

/// The least short methods for drifts.
fn drift_methods(comparison: &Comparison) -> Vec<&'static str> {
    comparison.ranked(Subject::StoreyDrifts).into_iter().map(|verdict| verdict.method).take(MOST_METHODS).collect()
}
