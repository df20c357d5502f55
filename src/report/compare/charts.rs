//! The charts of a comparison.

use super::ranking::detailed;
use super::{Findings, words};
use crate::compare::errors::{Flag, ValueError};
use crate::compare::verdict::Subject;
use crate::frame::{Member, MemberKind, line_name};
use crate::report::figure::{
    self, Elevation, EndMoments, Grid, MomentDiagram, OutlineMoments, Panel, Profiles, Series, Shade, colour_limit,
};
use crate::report::number::signed_percent;
use crate::report::{Figure, say};
use crate::response::{Quantity, Response};
use crate::units::Unit;

/// The most column lines that get a panel of their own.
const MOST_PANELS: usize = 12;
/// The most quick methods drawn beside the exact answer.
const MOST_SERIES: usize = 3;
/// How the names of elevations begin.
pub(super) const ELEVATION: &str = "elevation-";
/// Percent, for shares of one.
const PERCENT: Unit = Unit { symbol: "%", si: 0.01 };

/// A finished chart.
#[derive(Debug, Clone, PartialEq)]
pub struct Chart {
    /// Name of its file, without ending.
    pub name: String,
    /// What it shows.
    pub title: String,
    /// What is to be seen in it.
    pub caption: String,
    /// The drawing.
    pub svg: String,
    /// Width at which its letters have their true size, CSS pixels.
    pub width: f64,
}

impl Chart {
    /// The chart as a figure of the page.
    pub fn figure(&self) -> Figure {
        Figure::new(format!("chart-{}", self.name), &self.title, &self.svg, self.width)
            .caption(say(&self.caption))
            .description(&self.caption)
            .file(format!("{}.svg", self.name))
    }
}

/// Every chart: elevations by method, column moments up the height, shares of storey shear, the moment diagram.
pub fn charts(findings: &Findings) -> Vec<Chart> {
    let mut charts = elevations(findings);
    charts.push(column_moments(findings));
    charts.push(shear_shares(findings));
    charts.push(moment_diagram(findings));
    charts.extend(drifts(findings));
    charts
}

fn chart(name: String, title: &str, caption: &str, figure: &dyn figure::Figure) -> Chart {
    let svg = figure.svg();
    let notes = svg.notes().iter().fold(caption.to_string(), |text, note| format!("{text} {note}"));
    Chart { name, title: title.into(), caption: notes, svg: svg.as_str().into(), width: svg.width() }
}

fn elevations(findings: &Findings) -> Vec<Chart> {
    let comparison = findings.comparison;
    let design = |error: &&ValueError| error.quantity == Quantity::DesignMoment;
    let all = comparison.quick_errors().flat_map(|(_, errors)| errors.iter().filter(design));
    let limit = colour_limit(all.filter_map(|error| error.storey_error_percent));
    let one = |(method, errors): (&'static str, &[ValueError])| {
        let design: Vec<_> = errors.iter().filter(design).collect();
        let cells = |kind: MemberKind| {
            design.iter().filter(|error| error.member.kind() == kind).map(|error| cell(error)).collect::<Vec<_>>()
        };
        let name = words::method_name(comparison, method);
        let title = format!("Error of design moments: {name}");
        let caption = elevation_caption(&design);
        let figure = Elevation {
            title: title.clone(),
            description: caption.clone(),
            grid: Grid::of(findings.frame()),
            columns: cells(MemberKind::Column),
            beams: cells(MemberKind::Beam),
            limit,
            measure: "error of the design moment, % of the storey's largest exact value".into(),
        };
        chart(format!("{ELEVATION}{method}"), &title, &caption, &figure)
    };
    comparison
        .quick_errors()
        .filter(|(method, errors)| comparison.repeats(method).is_none() && errors.iter().any(|error| design(&error)))
        .map(one)
        .collect()
}

fn cell(error: &ValueError) -> Shade {
    match error.storey_error_percent {
        _ if error.flags.contains(&Flag::NearZero) => Shade::NearZero,
        Some(percent) => Shade::Error(percent),
        None => Shade::Missing,
    }
}

/// The shortest and the most generous member in words.
fn elevation_caption(design: &[&ValueError]) -> String {
    let percents = || design.iter().filter_map(|error| Some((error.storey_error_percent?, error.member)));
    let low = percents().min_by(|a, b| a.0.total_cmp(&b.0));
    let high = percents().max_by(|a, b| a.0.total_cmp(&b.0));
    match (low, high) {
        (Some(low), Some(high)) => format!(
            "Shortest: {} ({}); most over: {} ({}).",
            words::member(low.1),
            signed_percent(low.0, 0),
            words::member(high.1),
            signed_percent(high.0, 0)
        ),
        _ => String::new(),
    }
}

/// The column lines that get a panel: all, or the end lines and those with the largest errors.
fn panel_lines(findings: &Findings) -> Vec<usize> {
    let frame = findings.frame();
    let mut lines: Vec<_> = (0..frame.lines()).collect();
    if lines.len() <= MOST_PANELS {
        return lines;
    }
    let worst = |line: usize| {
        let errors = findings.comparison.quick_errors().flat_map(|(_, errors)| errors);
        let on_line = errors.filter(|error| matches!(error.member, Member::Column { line: own, .. } if own == line));
        let of_moments = on_line.filter(|error| error.quantity == Quantity::DesignMoment);
        of_moments.filter_map(|error| error.storey_error_percent).map(f64::abs).fold(0.0, f64::max)
    };
    let sizes: Vec<_> =
        lines.iter().map(|line| if frame.is_end_line(*line) { f64::INFINITY } else { worst(*line) }).collect();
    lines.sort_by(|a, b| sizes[*b].total_cmp(&sizes[*a]).then(a.cmp(b)));
    lines.truncate(MOST_PANELS);
    lines.sort_unstable();
    lines
}

/// The exact answer and the least short quick ones.
fn drawn<'a>(findings: &Findings<'a>) -> Vec<&'a Response> {
    let comparison = findings.comparison;
    let methods = detailed(comparison, MOST_SERIES);
    let quick = comparison.quick_responses().filter(|response| methods.contains(&response.method));
    std::iter::once(&comparison.reference).chain(quick).collect()
}

fn panels(findings: &Findings, value: &dyn Fn(&Response, usize, usize) -> f64) -> Vec<Panel> {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let series = |response: &Response, line: usize| Series {
        method: response.method.into(),
        name: words::method_name(comparison, response.method),
        values: (0..frame.storeys()).map(|storey| value(response, storey, line)).collect(),
    };
    let panel = |line: usize| Panel {
        name: format!("line {}", line_name(line)),
        series: drawn(findings).into_iter().map(|response| series(response, line)).collect(),
    };
    panel_lines(findings).into_iter().map(panel).collect()
}

/// What is said where not every line has a panel.
fn left_out(findings: &Findings) -> &'static str {
    if findings.frame().lines() > MOST_PANELS {
        " The end lines and the lines with the largest errors are shown."
    } else {
        ""
    }
}

fn column_moments(findings: &Findings) -> Chart {
    let title = "Column design moments up the height";
    let comparison = findings.comparison;
    let worst = comparison.ranked(Subject::ColumnMoments).first().map_or_else(String::new, |best| {
        format!(
            "Least short: {}, {} in {}.",
            words::method_name(comparison, best.method),
            signed_percent(best.lowest.percent, 0),
            words::member(best.lowest.member)
        )
    });
    let caption = format!("{worst}{}", left_out(findings));
    let figure = Profiles {
        title: title.into(),
        description: caption.clone(),
        quantity: "column design moment".into(),
        unit: findings.frame().report_units().moment(),
        storeys: findings.frame().parts().storeys.clone(),
        panels: panels(findings, &|response, storey, line| response.column(storey, line).design_moment()),
    };
    chart("column-moments".into(), title, &caption, &figure)
}

fn shear_shares(findings: &Findings) -> Chart {
    let frame = findings.frame();
    let title = "Share of each storey's shear by column line";
    let caption = format!("The shares of a storey add up to 100 %.{}", left_out(findings));
    let share = |response: &Response, storey: usize, line: usize| {
        response.column(storey, line).shear / frame.storey_shear(storey)
    };
    let figure = Profiles {
        title: title.into(),
        description: caption.clone(),
        quantity: "share of the storey shear".into(),
        unit: PERCENT,
        storeys: frame.parts().storeys.clone(),
        panels: panels(findings, &share),
    };
    chart("shear-shares".into(), title, &caption, &figure)
}

/// Storey drifts: exact, in the deformed position, and the least short quick methods; `None` where none is stated.
fn drifts(findings: &Findings) -> Option<Chart> {
    let (frame, comparison) = (findings.frame(), findings.comparison);
    let ranked = comparison.ranked(Subject::StoreyDrifts);
    let best = ranked.first()?;
    let methods: Vec<_> = ranked.iter().map(|verdict| verdict.method).take(MOST_SERIES).collect();
    let quick = comparison.quick_responses().filter(|response| methods.contains(&response.method));
    let deformed = comparison.second_order.iter().map(|(answer, _)| &answer.response);
    let series = |response: &Response| Series {
        method: response.method.into(),
        name: words::method_name(comparison, response.method),
        values: (0..frame.storeys())
            .map(|storey| response.movement(storey).map_or(f64::NAN, |movement| movement.drift))
            .collect(),
    };
    let shown = std::iter::once(&comparison.reference).chain(deformed).chain(quick);
    let title = "Storey drifts up the height";
    let caption = format!(
        "Least short: {}, {} in {}.",
        words::method_name(comparison, best.method),
        signed_percent(best.lowest.percent, 0),
        words::member(best.lowest.member)
    );
    let figure = Profiles {
        title: title.into(),
        description: caption.clone(),
        quantity: "storey drift".into(),
        unit: frame.report_units().movement(),
        storeys: frame.parts().storeys.clone(),
        panels: vec![Panel { name: "whole storeys".into(), series: shown.map(series).collect() }],
    };
    Some(chart("storey-drifts".into(), title, &caption, &figure))
}

fn end_moments(findings: &Findings, response: &Response) -> EndMoments {
    let storeys = || 0..findings.frame().storeys();
    let columns = storeys().flat_map(|storey| response.storey_columns(storey)).map(|column| [column.foot, column.head]);
    let beams = storeys().flat_map(|floor| response.floor_beams(floor)).map(|beam| [beam.left, beam.right]);
    EndMoments { columns: columns.collect(), beams: beams.collect() }
}

fn moment_diagram(findings: &Findings) -> Chart {
    let comparison = findings.comparison;
    let reference = &comparison.reference;
    let name = words::method_name(comparison, reference.method);
    let title = "Moment diagram under the lateral forces";
    let best = comparison.ranked(Subject::ColumnMoments).first().map(|verdict| verdict.method);
    let outline = comparison.quick_responses().find(|response| Some(response.method) == best);
    let caption = match outline {
        Some(response) => format!(
            "Drawn on the side in tension. Filled: {name}. Outline: {}, the least short for column design moments.",
            words::method_name(comparison, response.method)
        ),
        None => format!("Drawn on the side in tension: {name}."),
    };
    let figure = MomentDiagram {
        title: title.into(),
        description: caption.clone(),
        grid: Grid::of(findings.frame()),
        exact_name: name,
        exact: end_moments(findings, reference),
        quick: outline.map(|response| OutlineMoments {
            method: response.method.into(),
            name: words::method_name(comparison, response.method),
            moments: end_moments(findings, response),
        }),
        unit: findings.frame().report_units().moment(),
    };
    chart("moment-diagram".into(), title, &caption, &figure)
}
