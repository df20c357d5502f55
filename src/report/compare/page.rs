//! The page of a comparison: verdict first, method sheet and record last.

use super::charts::ELEVATION;
use super::ranking::{amplification, exact_answers, judged_subjects, own_methods, ranking, stated};
use super::summary::{READING, Shown, by_storey, is_stated, judged, percent_cell, short_name};
use super::{Findings, feet_table, sheet, sizes, verdict_cards, words};
use crate::compare::Comparison;
use crate::compare::verdict::Subject;
use crate::frame::{Feet, MemberKind};
use crate::report::number::{Form, decimals, signed_percent, significant};
use crate::report::{Document, Figure, Record, Sentence, State, TableBlock, TableCell, say};
use crate::response::statics::{Law, Statics};
use crate::response::{Quantity, Response};
use std::cmp::Reverse;

/// The most rows of a table by storey on the page.
const MOST_ROWS: usize = 60;
/// The most columns (members) of a frame whose hand calculation is printed in full.
const SHEET_LIMIT: usize = 1000;

/// Builds the page. `figures` stand in the order of [`super::charts`].
pub fn page(findings: &Findings, record: &Record, figures: Vec<Figure>) -> Document {
    let frame = findings.frame();
    let mut report = Document::new(words::title(frame));
    report.subtitle(words::outline(frame));
    if let Some(notice) = words::size_notice(frame) {
        report.paragraph(notice);
    }
    opening(&mut report, findings);
    verdicts(&mut report, findings);
    charts(&mut report, figures);
    storeys(&mut report, findings);
    statics(&mut report, findings);
    described(&mut report, findings);
    method_sheet(&mut report, findings);
    closing(&mut report, findings, record);
    report
}

fn opening(report: &mut Document, findings: &Findings) {
    let comparison = findings.comparison;
    report.section("Verdict");
    if let Some((state, word, sentence)) = words::gravity_finding(comparison) {
        report.verdict_in_words(state, word, sentence.then(" See ").refer("second-order").then("."));
    }
    let found = |subject| words::finding(findings.frame(), comparison, subject);
    for (state, word, sentence) in Subject::ALL.into_iter().filter_map(found) {
        report.verdict_in_words(state, word, sentence.then(" See ").refer("ranking").then("."));
    }
    report.paragraph(words::measure(findings.frame(), comparison));
    report.table(ranking(findings, true));
    let cautions = findings.cautions_of_methods();
    if !cautions.is_empty() {
        report.caution("Read with care", cautions);
    }
}

fn verdicts(report: &mut Document, findings: &Findings) {
    let comparison = findings.comparison;
    report.section("Where each method holds");
    let methods: Vec<_> = own_methods(comparison).map(|quick| quick.entry.info.id).collect();
    for subject in judged_subjects(comparison) {
        report.subsection(words::capital(subject.name()));
        verdict_cards(report, findings, subject, &methods);
        if stated(comparison).any(|with_verdict| with_verdict == subject) {
            report.table(place_table(findings, subject));
        }
    }
    if let Some(table) = amplification(findings) {
        report.subsection("Gravity on the sway");
        report.table(table);
    }
    if let Some(table) = feet_table(comparison, &methods) {
        report.subsection("If the fixed feet turn a little");
        report.table(table);
    }
}

/// One row per place: lowest and highest error and factor of every method.
fn place_table(findings: &Findings, subject: Subject) -> TableBlock {
    let comparison = findings.comparison;
    let of_subject = comparison.verdicts.iter().filter(|verdict| verdict.subject == subject);
    let verdicts: Vec<_> = of_subject.filter(|verdict| words::own(comparison, verdict)).collect();
    let key = format!("places-{}", subject.name().replace(' ', "-"));
    let caption = format!("{}: lowest and highest error by place", words::capital(subject.name()));
    let mut table = TableBlock::new(key, caption.as_str()).name("place").count("members");
    for verdict in &verdicts {
        let head = short_name(verdict.method);
        table = table.under(head).percent("lowest", 0).percent("highest", 0).number("factor", "", 3);
    }
    let Some(first) = verdicts.first() else { return table };
    let mut order: Vec<_> = (0..first.places.len()).collect();
    order.sort_by_key(|index| (Reverse(first.places[*index].place.band), first.places[*index].place.class));
    for index in order {
        let first = &first.places[index];
        let mut cells = vec![TableCell::from(words::capital(&first.place.words())), first.members.into()];
        for verdict in &verdicts {
            let place = &verdict.places[index];
            let tolerance = comparison.options.tolerance;
            let factor = words::factor(place.governing.and_then(|member| member.factor));
            let percents = [place.lowest, place.highest].map(|extreme| percent_cell(extreme.percent, tolerance));
            cells.extend(percents.into_iter().chain([factor.into()]));
        }
        table.row(cells);
    }
    judged(table, comparison)
}

/// Elevations stand side by side to be compared, the others one below the other.
fn charts(report: &mut Document, figures: Vec<Figure>) {
    report.section("Charts");
    let (elevations, others): (Vec<_>, Vec<_>) = figures.into_iter().partition(|figure| figure.key.contains(ELEVATION));
    report.figures(elevations);
    others.into_iter().for_each(|figure| {
        report.figure(figure);
    });
}

fn storeys(report: &mut Document, findings: &Findings) {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    report.section("Storey by storey");
    report.paragraph(READING);
    let further = [Shown::COLUMN_FACES, Shown::BEAM_FACES, Shown::FOOT_MOMENTS, Shown::HEAD_MOMENTS, Shown::AXIAL];
    let methods: Vec<_> = own_methods(comparison).map(|quick| quick.entry.info.id).collect();
    for shown in
        stated(comparison).map(Shown::subject).chain(further.into_iter().filter(|shown| is_stated(comparison, *shown)))
    {
        report.table(by_storey(frame, comparison, shown, MOST_ROWS, &methods));
    }
    for table in [drift_table(findings), roof_sway(findings)].into_iter().flatten() {
        report.table(table);
    }
    report.paragraph(
        say("Every value of every member stands in ")
            .code("values.csv")
            .then(", every error in ")
            .code("errors.csv")
            .then("; both are sheets of ")
            .code("results.xlsx")
            .then("."),
    );
}

/// Exact drifts; `None` where sizes are only relative.
fn drift_table(findings: &Findings) -> Option<TableBlock> {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let unit = Quantity::Drift.unit(frame.report_units());
    comparison.reference.movement(0)?;
    let mut table = TableBlock::new("drift", "Storey drift and sway of the exact analyses").name("storey");
    for response in exact_answers(comparison) {
        table = table.under(response.method).number("drift", unit.symbol, 3).text("height / drift").number(
            "sway",
            unit.symbol,
            3,
        );
    }
    for storey in (0..frame.storeys()).rev() {
        let mut cells = vec![TableCell::from((storey + 1).to_string())];
        for response in exact_answers(comparison) {
            let Some(movement) = response.movement(storey) else { continue };
            let ratio = frame.storey_height(storey) / movement.drift.abs();
            cells.extend([
                unit.from_si(movement.drift).into(),
                TableCell::from(decimals(ratio, 0)),
                unit.from_si(movement.sway).into(),
            ]);
        }
        table.row(cells);
    }
    table.note(
        "A drift that is too small is on the unsafe side for drift limits; one that is too large lengthens the period.",
    );
    Some(table)
}

/// Roof sway of every answer that states movements; `None` where sizes are only relative.
fn roof_sway(findings: &Findings) -> Option<TableBlock> {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let (unit, roof) = (Quantity::Sway.unit(frame.report_units()), frame.storeys() - 1);
    let exact = comparison.reference.movement(roof)?.sway;
    let mut table =
        TableBlock::new("roof-sway", "Roof sway of every method").name("method").number("sway", unit.symbol, 3);
    table = table.percent("error", 0).number("multiply by", "", 3);
    for response in comparison.responses() {
        let Some(movement) = response.movement(roof) else { continue };
        let percent = 100.0 * (movement.sway.abs() - exact.abs()) / exact.abs();
        let name = TableCell::from(words::method_name(comparison, response.method));
        let cells = if response.method == comparison.reference.method {
            [name, unit.from_si(movement.sway).into(), "measure".into(), TableCell::blank()]
        } else {
            let factor = words::factor(Some(exact.abs() / movement.sway.abs()));
            [
                name,
                unit.from_si(movement.sway).into(),
                percent_cell(percent, comparison.options.tolerance),
                factor.into(),
            ]
        };
        table.row(cells);
    }
    Some(judged(table, comparison))
}

fn statics(report: &mut Document, findings: &Findings) {
    let comparison = findings.comparison;
    report.section("Statics");
    let close = comparison.statics.iter().all(|(_, statics)| statics.closes());
    let (state, text) = match close {
        true => (State::Suffices, "Statics close for every method: what is left over, see "),
        false => (State::FallsShort, "Statics do not close: do not use these numbers. What is left over, see "),
    };
    let word = if close { "closes" } else { "does not close" };
    report.verdict_in_words(state, word, say(text).refer("equilibrium").then("."));
    report.table(equilibrium(findings));
    for (method, statics) in &comparison.statics {
        let name = words::capital(&words::method_name(comparison, method));
        report.details(format!("Storey sums: {name}"), |inner| {
            inner.table(storey_sums(findings, method, statics));
        });
    }
}

/// What every law leaves over, by method.
fn equilibrium(findings: &Findings) -> TableBlock {
    let comparison = findings.comparison;
    let mut table =
        TableBlock::new("equilibrium", "Equilibrium: the largest sum that should be zero, relative").name("law");
    table = comparison.statics.iter().fold(table, |table, (method, _)| table.number(short_name(method), "", 1));
    for law in Law::ALL {
        let cells = comparison.statics.iter().map(|(_, statics)| match statics.worst(law) {
            Some(worst) if worst.relative.abs() < 1e-12 => TableCell::from("< 10⁻¹²"),
            Some(worst) => worst.relative.abs().into(),
            None => TableCell::blank(),
        });
        table.row(std::iter::once(TableCell::from(law.name())).chain(cells));
    }
    table.note(
        "Over the frame's largest moment, storey shear, axial force or overturning moment. Every quick method here \
         satisfies statics; statics alone say nothing about how it shares the forces out.",
    );
    table
}

fn storey_sums(findings: &Findings, method: &str, statics: &Statics) -> TableBlock {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let (force, moment) = (frame.report_units().force(), frame.report_units().moment());
    let caption = format!("Storey sums, {}", words::method_name(comparison, method));
    let mut table = TableBlock::new(format!("statics-{method}"), caption.as_str())
        .name("storey")
        .under("shear")
        .number("applied", force.symbol, 4)
        .number("sum of columns", force.symbol, 4)
        .under("overturning at the storey's foot")
        .number("applied", moment.symbol, 4)
        .number("by column moments", moment.symbol, 4)
        .number("by axial forces", moment.symbol, 4)
        .number("left over", moment.symbol, 4)
        .under("")
        .number("sum of axial forces", force.symbol, 4)
        .number("largest joint sum", moment.symbol, 4);
    let tidy = |value: f64, scale: f64| if value.abs() < 1e-12 * scale { 0.0 } else { value };
    let (largest_force, largest_moment) = (frame.storey_shear(0), frame.overturning_above(0.0));
    for (storey, sums) in statics.storeys.iter().enumerate().rev() {
        let left_over = sums.overturning_applied - sums.by_moments - sums.by_axial;
        table.row([
            TableCell::from((storey + 1).to_string()),
            force.from_si(sums.shear_applied).into(),
            force.from_si(sums.shear_found).into(),
            moment.from_si(sums.overturning_applied).into(),
            moment.from_si(sums.by_moments).into(),
            moment.from_si(tidy(sums.by_axial, largest_moment)).into(),
            moment.from_si(tidy(left_over, largest_moment)).into(),
            force.from_si(tidy(sums.axial_sum, largest_force)).into(),
            moment.from_si(tidy(sums.joint_moment, largest_moment)).into(),
        ]);
    }
    table
}

fn described(report: &mut Document, findings: &Findings) {
    let frame = findings.frame();
    report.section("The frame as typed");
    let pairs = findings.file.echo.iter().map(|echo| (echo.what.clone(), say(echo.typed.as_str())));
    report.pairs(pairs);
    if let Feet::Springs(springs) = frame.feet() {
        let own = frame.foot_springs(1.0);
        let ratios: Vec<_> = springs.iter().zip(&own).map(|(spring, own)| significant(spring / own, 3)).collect();
        report.paragraph(format!("Foot springs over 4 E I/h of their columns, from line A: {}.", ratios.join(", ")));
    }
    sizes::add(report, frame, &findings.file.sizes);
}

fn method_sheet(report: &mut Document, findings: &Findings) {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    report.page_break();
    report.section("Method sheet");
    report.paragraph(
        "The hand calculations with this frame's numbers, in the order a checker would take them. Moments and shears \
         are positive in their usual sense under load to the right; axial forces are positive in tension.",
    );
    if frame.storeys() * frame.lines() > SHEET_LIMIT {
        report.paragraph(
            say(format!("This frame has more than {SHEET_LIMIT} columns: the calculation is not printed; all its values stand in "))
                .code("values.csv")
                .then("."),
        );
        return;
    }
    for quick in own_methods(comparison) {
        let Some(response) = &quick.response else { continue };
        let info = quick.entry.info;
        report.details(format!("{}: line by line", words::capital(info.name)), |inner| {
            inner.paragraph(say(format!("Source: {}.", info.source)));
            inner.list(info.assumptions.iter().copied());
            sheet::add(
                inner,
                &format!("sheet-{}", info.id.replace('+', "-and-")),
                &(quick.entry.worksheet)(frame, response),
                frame.report_units(),
            );
        });
    }
}

fn closing(report: &mut Document, findings: &Findings, record: &Record) {
    report.section("Assumptions");
    report.list(assumptions(findings));
    report.section("Cautions");
    report.caution("Before these numbers are used", words::cautions());
    report.section("Record");
    report.record(record);
    report.footer(words::footer(findings.comparison));
}

fn assumptions(findings: &Findings) -> Vec<Sentence> {
    let comparison = findings.comparison;
    let mut list = vec![
        say(
            "Plane frame, linear elastic. The quick methods and slope-deflection: first order, no shear deformation, members \
             from joint centre to joint centre.",
        ),
        say(options_in_force(comparison)),
        say("Floors are rigid in their own plane: one sway per floor."),
        say("slope-deflection: inextensible members. stiffness: columns stretch and shorten as well."),
        say(
            "Loads act to the right at the floors. Load from the other side reverses every sign and changes no magnitude.",
        ),
        say("Design moment: the larger end moment of a member."),
        say("Places: ground, second, middle, below the top and top storey, by end and interior; in low frames ground \
             wins, then the top, then the second."),
    ];
    list.extend(comparison.exact().filter_map(|response: &Response| {
        let residual = Form::Significant(2).show(response.residual()?);
        Some(say(format!("{}: relative residual {residual}.", words::method_name(comparison, response.method))))
    }));
    if let [other] = &comparison.other_exact[..] {
        list.extend(strain_effect(findings, &comparison.reference, other));
    }
    list
}

/// What the stiffness and second-order analyses take in.
fn options_in_force(comparison: &Comparison) -> &'static str {
    match (comparison.has_options, comparison.second_order.is_some()) {
        (false, _) => "stiffness: first order, no shear deformation, members from joint centre to joint centre.",
        (true, false) => {
            "stiffness: first order, with the rigid zones, springs and shear areas of the file; axial strain over the whole \
             length between joint centres."
        }
        (true, true) => {
            "stiffness: first order, with the rigid zones, springs and shear areas of the file; axial strain over the whole \
             length between joint centres. second-order: the same in the deformed position; the gravity of a floor is shared \
             to its columns by tributary width or by the shares given, and acts through their compression alone: it shortens \
             no column and bends no beam."
        }
    }
}

/// How far the two exact analyses lie apart.
fn strain_effect(findings: &Findings, first: &Response, second: &Response) -> Option<Sentence> {
    let (_, errors) = findings.comparison.errors.iter().find(|(method, _)| *method == second.method)?;
    let of_columns = errors
        .iter()
        .filter(|error| error.quantity == Quantity::DesignMoment && error.member.kind() == MemberKind::Column);
    let farthest = of_columns
        .filter_map(|error| Some((error, error.storey_error_percent?)))
        .max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()))?;
    let (error, percent) = farthest;
    Some(say(format!(
        "Column axial strain: {} differs from {} by up to {} of a storey's largest column design moment ({}).",
        second.method,
        first.method,
        signed_percent(percent, 1),
        words::member(error.member)
    )))
}
