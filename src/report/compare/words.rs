//! Sentences of a comparison.

use crate::compare::Comparison;
use crate::compare::places::{Class, Kind, Place};
use crate::compare::verdict::{Extreme, State as Standing, Subject, Verdict};
use crate::exact::{Unsolvable, slope_deflection, stiffness};
use crate::frame::{Feet, Frame, SizeSource};
use crate::report::number::{percent, quantity};
use crate::report::{Sentence, State, say};
use crate::response::{Member, Quantity};
use crate::units::{ReportUnits, Unit};

/// A number in N, m as three significant figures and its unit.
pub(super) fn amount(value: f64, unit: Unit) -> String {
    quantity(unit.from_si(value), unit.symbol)
}

/// How a report marks a verdict.
pub(super) fn mark(standing: Standing) -> State {
    match standing {
        Standing::Suffices => State::Suffices,
        Standing::Generous => State::SafeSide,
        Standing::Short => State::FallsShort,
    }
}

/// Name of any method in sentences.
pub(super) fn method_name(comparison: &Comparison, method: &str) -> String {
    let quick = comparison.quick.iter().find(|quick| quick.entry.info.id == method);
    match (quick, method) {
        (Some(quick), _) => quick.entry.info.name.into(),
        (None, slope_deflection::ID) => "slope-deflection (inextensible members)".into(),
        (None, stiffness::ID) => "stiffness analysis (with column axial strain)".into(),
        (None, other) => other.into(),
    }
}

/// A member in words: `column B, storey 3`.
pub(super) fn member(member: Member) -> String {
    let number = member.storey() + 1;
    match member {
        Member::Column { .. } => format!("column {}, storey {number}", member.at()),
        Member::Beam { .. } => format!("beam {}, floor {number}", member.at()),
        Member::Storey { .. } => format!("storey {number}"),
    }
}

/// Places in words; where both classes of a band are there, the band alone.
pub(super) fn places(places: &[Place]) -> String {
    let twin =
        |place: &Place| Place { class: if place.class == Class::End { Class::Interior } else { Class::End }, ..*place };
    let words = |place: &Place| match (places.contains(&twin(place)), place.class) {
        (false, _) => Some(place.words()),
        (true, Class::End) => Some(place.band.words(place.kind).to_string()),
        (true, _) => None,
    };
    places.iter().filter_map(words).collect::<Vec<_>>().join("; ")
}

/// Title of a report: it says at once where sizes are only assumed.
pub(super) fn title(frame: &Frame) -> String {
    match frame.size_source() {
        SizeSource::Stated => frame.title().into(),
        _ => format!("{}: member sizes assumed", frame.title()),
    }
}

/// What assumed sizes mean for the report.
pub(super) fn size_notice(frame: &Frame) -> Option<Sentence> {
    let rest = match frame.size_source() {
        SizeSource::Stated => return None,
        SizeSource::Assumed => "the middle of the ranges in [sizes]. Real sizes will differ, and so will these errors.",
        SizeSource::AssumedRelative => {
            "the middle of the ranges in [sizes], relative to each other only: forces have meaning, drifts do not. \
             Real sizes will differ, and so will these errors."
        }
    };
    Some(Sentence::default().strong("Member sizes are assumed: ").then(rest))
}

/// What the frame is, in one line.
pub(super) fn outline(frame: &Frame) -> String {
    let length = frame.report_units().length();
    let counted = |count: usize, word: &str| format!("{count} {word}{}", if count == 1 { "" } else { "s" });
    let feet = match frame.feet() {
        Feet::Fixed => "fixed feet",
        Feet::Pinned => "pinned feet",
        Feet::Springs(_) => "feet on rotational springs",
    };
    format!(
        "{}, {}; {} high, {} wide; {feet}; base shear {}",
        counted(frame.storeys(), "storey"),
        counted(frame.bays(), "bay"),
        amount(frame.height(), length),
        amount(frame.width(), length),
        amount(frame.storey_shear(0), frame.report_units().force()),
    )
}

/// What errors are measured by, and what that leaves out.
pub(super) fn measure(frame: &Frame, comparison: &Comparison) -> Sentence {
    let reference = comparison.reference();
    let mut sentence = say("Errors are measured by ").strong(method_name(comparison, reference.method)).then(
        ", in percent of the largest exact value of the same storey (at least 5 % of the frame's largest). \
         Negative is short: the unsafe side for strength.",
    );
    if let Some(reason) = &comparison.no_stiffness {
        sentence = sentence.then(format!(" The stiffness analysis was not run: {reason}."));
    }
    if !comparison.axial_strain_missing {
        return sentence;
    }
    let remedy = match &comparison.no_stiffness {
        Some(Unsolvable::RelativeSizes) => "give end_column_inertia in [sizes]",
        Some(_) => "give every column an area",
        None => "leave --exact at auto",
    };
    sentence.then(format!(
        " This frame is tall or slender ({} storeys, height over width {:.1}), and the measure leaves out column axial \
         strain: for a better one, {remedy}.",
        frame.storeys(),
        frame.height() / frame.width()
    ))
}

/// The finding on one subject in one sentence: the best method and how it stands.
pub(super) fn finding(comparison: &Comparison, subject: Subject) -> Option<(State, Sentence)> {
    let tolerance = percent(comparison.options.tolerance, 0);
    let ranked = comparison.ranked(subject);
    let best = ranked.first()?;
    let good: Vec<_> = ranked.iter().filter(|verdict| verdict.state != Standing::Short).collect();
    let subject_name = capital(subject.name());
    let sentence = if good.is_empty() {
        say(format!(
            "{subject_name}: no quick method stays within {tolerance} on the unsafe side; the least short is the "
        ))
        .then(method_name(comparison, best.method))
        .then(format!(", by up to {}.", short_by(best.lowest.percent)))
    } else {
        let names: Vec<_> = good
            .iter()
            .map(|verdict| format!("{} ({})", method_name(comparison, verdict.method), span(verdict)))
            .collect();
        let verb = if names.len() == 1 { "is" } else { "are" };
        say(format!("{subject_name}: nowhere more than {tolerance} short {verb} the {}.", names.join(" and the ")))
    };
    Some((mark(good.first().map_or(Standing::Short, |verdict| verdict.state)), sentence))
}

/// Lowest and highest error of a verdict: `−12 % to +31 %`.
fn span(verdict: &Verdict) -> String {
    use crate::report::number::signed_percent;
    format!("{} to {}", signed_percent(verdict.lowest.percent, 0), signed_percent(verdict.highest.percent, 0))
}

/// A verdict in words: how far, where, and in which places the method holds.
pub(super) fn verdict(comparison: &Comparison, verdict: &Verdict, units: ReportUnits) -> Sentence {
    let tolerance = percent(comparison.options.tolerance, 0);
    let name = capital(&method_name(comparison, verdict.method));
    let unit = verdict.subject.quantity().unit(units);
    let sentence = Sentence::default().strong(name).then(": ");
    let sentence = match verdict.state {
        Standing::Short => sentence.then(format!(
            "up to {} short, worst in {}",
            short_by(verdict.lowest.percent),
            extreme(verdict.lowest, unit)
        )),
        Standing::Generous => sentence.then(format!(
            "{}, but up to {} over in {}",
            nowhere_short(verdict),
            percent(verdict.highest.percent, 0),
            extreme(verdict.highest, unit)
        )),
        Standing::Suffices => sentence.then(format!(
            "{}, nowhere more than {} over",
            nowhere_short(verdict),
            percent(verdict.highest.percent.max(0.0).ceil(), 0)
        )),
    };
    let by_state = |state: Standing| {
        let of_state = verdict.places.iter().filter(|place| place.state == state);
        of_state.map(|place| place.place).collect::<Vec<_>>()
    };
    let kinds = [
        (Standing::Short, format!("Short by more than {tolerance}")),
        (Standing::Suffices, format!("Within {tolerance}")),
        (Standing::Generous, format!("Over by more than {tolerance}, nowhere short by more")),
    ];
    let lists = kinds.into_iter().filter_map(|(state, head)| {
        let found = by_state(state);
        let all = found.len() == verdict.places.len();
        (!found.is_empty()).then(|| format!(" {head}: {}.", if all { "everywhere".into() } else { places(&found) }))
    });
    let factor = match verdict.largest_factor() {
        Some(factor) if factor > 1.005 => format!(" Multiplied by {factor:.2}, no member would be short."),
        Some(_) => String::new(),
        None => " Some value is zero: no factor covers every member.".into(),
    };
    lists.fold(sentence.then("."), Sentence::then).then(factor)
}

/// `34 %` of −34.2, never rounded to nothing.
fn short_by(lowest: f64) -> String {
    let size = (-lowest).max(0.0);
    percent(size, usize::from(size < 1.0))
}

fn nowhere_short(verdict: &Verdict) -> String {
    match verdict.lowest.percent {
        lowest if lowest > -0.5 => "nowhere short".into(),
        lowest => {
            format!("nowhere more than {} short ({})", percent((-lowest).ceil(), 0), member(verdict.lowest.member))
        }
    }
}

/// A member with both values: `column A, storey 1 (120 kN m where 182 kN m is exact)`.
fn extreme(extreme: Extreme, unit: Unit) -> String {
    let (quick, exact) = (amount(extreme.quick.abs(), unit), amount(extreme.exact.abs(), unit));
    format!("{} ({quick} where {exact} is exact)", member(extreme.member))
}

/// The text with a capital first letter.
pub(super) fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map(|first| first.to_uppercase().chain(letters).collect()).unwrap_or_default()
}

/// Head of the class columns of a subject.
pub(super) fn class_head(subject: Subject, class: Class) -> &'static str {
    match (subject == Subject::BeamMoments, class) {
        (true, Class::End) => "beams of end bays",
        (true, _) => "beams of interior bays",
        (false, Class::End) => "end columns",
        (false, _) => "interior columns",
    }
}

/// Kind of member that a subject judges.
pub(super) fn kind(subject: Subject) -> Kind {
    if subject == Subject::BeamMoments { Kind::Beams } else { Kind::Columns }
}

/// Unit of a subject's values.
pub(super) fn unit(subject: Subject, units: ReportUnits) -> Unit {
    let quantity: Quantity = subject.quantity();
    quantity.unit(units)
}

/// The usual cautions.
pub(super) fn cautions() -> Vec<&'static str> {
    vec![
        "Linear elastic lateral analysis of a plane frame, for preliminary sizing and for checking. It is not a design: \
         gravity, torsion, connections, foundations, detailing, load combinations and drift limits remain with the \
         licensed engineer and the code in force.",
        "Not for frames with walls, braces, infill, flat slabs, transfer columns or setbacks, nor for accidental torsion.",
        "Factors multiply the lateral part only, before gravity is added. Factored values are an envelope and balance \
         no joint: never derive shears or beam moments from factored column moments.",
        "The factor of a design moment is not for the single ends: foundations, base plates and splices go by the foot \
         and head moments.",
        "Errors hold for this frame and these member sizes; other sizes give other errors.",
    ]
}
