//! Sentences of a comparison.

use crate::compare::Comparison;
use crate::compare::amplify::Amplification;
use crate::compare::errors::{Flag, ValueError};
use crate::compare::places::{Class, Place};
use crate::compare::verdict::{Extreme, Standing, Subject, Verdict};
use crate::exact::{Unsolvable, second_order, slope_deflection, stiffness};
use crate::frame::{Feet, Frame, Member, SizeSource};
use crate::report::number::{NO_BREAK, decimals, quantity, rounded_up, signed_percent};
use crate::report::{Sentence, State, say};
use crate::response::Quantity;
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
        (None, second_order::ID) => "second-order analysis (gravity on the sway)".into(),
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
    let reference = &comparison.reference;
    let mut sentence = say("Errors are measured by ").strong(method_name(comparison, reference.method)).then(
        ", in percent of the largest exact value of the same storey (at least 5 % of the frame's largest). \
         Negative is short: the unsafe side for strength. A member that carries less than the largest can be short of \
         its own value by more than that percentage: the factor tells.",
    );
    if comparison.has_options {
        sentence = sentence.then(
            " The stiffness and second-order analyses take in what the file says of rigid zones, springs and shear \
             deformation; slope-deflection and the quick methods know plain members between joint centres only.",
        );
    }
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

/// The finding on one subject for the first screen: which methods hold, or the least short one.
pub(super) fn finding(
    frame: &Frame,
    comparison: &Comparison,
    subject: Subject,
) -> Option<(State, &'static str, Sentence)> {
    let tolerance = tolerance(comparison);
    let ranked: Vec<_> = comparison.ranked(subject).into_iter().filter(|verdict| own(comparison, verdict)).collect();
    let best = ranked.first()?;
    let good: Vec<_> = ranked.iter().filter(|verdict| verdict.state != Standing::Short).collect();
    let (subject_name, sizes) = (capital(subject.name()), for_sizes(frame));
    let start = if good.is_empty() {
        say(format!(
            "{subject_name}{sizes}: every quick method is somewhere short by more than {tolerance}. The least short is \
             the {}, {}",
            method_name(comparison, best.method),
            short_by(best)
        ))
    } else {
        let names = good.iter().map(|verdict| {
            let name = method_name(comparison, verdict.method);
            let sizes = if needs_sizes(comparison, verdict.method) { "needs sizes; " } else { "" };
            format!("{name} ({sizes}{} to {})", verdict_percent(verdict.lowest), verdict_percent(verdict.highest))
        });
        let names: Vec<_> = names.collect();
        say(format!("{subject_name}{sizes}: nowhere short by more than {tolerance}: {}", names.join("; ")))
    };
    let standing = good.first().map_or(Standing::Short, |verdict| verdict.state);
    let covered = format!(" The {} multiplied by", method_name(comparison, best.method));
    Some((mark(standing), word(standing), start.then(".").then(cover(best, &covered, frame.report_units()))))
}

/// What gravity on the sway does, for the first screen; `None` without gravity.
pub(super) fn gravity_finding(comparison: &Comparison) -> Option<(State, &'static str, Sentence)> {
    let (answer, storeys) = comparison.second_order.as_ref()?;
    let largest = |value: fn(&Amplification) -> f64| storeys.iter().map(value).fold(1.0, f64::max);
    let factor = answer.critical_load_factor.unwrap_or(f64::INFINITY);
    let (state, word) = match factor {
        near if near < 3.0 => (State::FallsShort, "near buckling"),
        low if low < 10.0 => (State::FallsShort, "sways"),
        _ => (State::Suffices, "stands"),
    };
    let buckles = match answer.critical_load_factor {
        Some(factor) => format!("the frame buckles sideways at {} times the gravity given", rounded_down(factor)),
        None => "gravity is negligible against the sway buckling load".into(),
    };
    let measured = match comparison.reference.method {
        second_order::ID => "The errors and factors below are measured by second order and cover it.",
        _ => "The errors and factors below are of first order: multiply by these too.",
    };
    let text = format!(
        "Gravity on the sway: {buckles}. Second order enlarges storey drifts by up to {}, column moments by up to {}, beam \
         moments by up to {}. {measured}",
        rounded_up(largest(|storey| storey.drift), 2),
        rounded_up(largest(|storey| storey.columns), 2),
        rounded_up(largest(|storey| storey.beams), 2)
    );
    Some((state, word, text.into()))
}

/// The tolerance as it was asked for.
pub(super) fn tolerance(comparison: &Comparison) -> String {
    format!("{}{NO_BREAK}%", comparison.options.tolerance)
}

/// What a verdict says of assumed sizes.
fn for_sizes(frame: &Frame) -> &'static str {
    if frame.size_source() == SizeSource::Stated { "" } else { " (for the assumed sizes)" }
}

/// Whether the method's values are not those of an earlier method.
pub(super) fn own(comparison: &Comparison, verdict: &Verdict) -> bool {
    comparison.repeats(verdict.method).is_none()
}

/// Whether a quick method needs member sizes.
fn needs_sizes(comparison: &Comparison, method: &str) -> bool {
    comparison.quick.iter().any(|quick| quick.entry.info.id == method && quick.entry.info.needs_sizes)
}

/// A signed storey error, rounded to whole percent.
fn verdict_percent(extreme: Extreme) -> String {
    signed_percent(extreme.percent, 0)
}

/// The word of a verdict.
pub(super) fn word(standing: Standing) -> &'static str {
    match standing {
        Standing::Suffices => "suffices",
        Standing::Generous => "generous",
        Standing::Short => "falls short",
    }
}

/// A verdict in words: how far, where, in which places the method holds, and what covers every member.
pub(super) fn verdict(comparison: &Comparison, verdict: &Verdict, units: ReportUnits) -> Sentence {
    let tolerance = tolerance(comparison);
    let name = capital(&method_name(comparison, verdict.method));
    let unit = verdict.subject.quantity().unit(units);
    let over = match verdict.highest.percent {
        none if none < 0.05 => "nowhere over".into(),
        some => format!("over by up to {}", size(some)),
    };
    let text = match verdict.state {
        Standing::Short => format!("{}, worst in {}", short_by(verdict), extreme(verdict.lowest, unit)),
        Standing::Generous => format!("{}; {over}, most in {}", short_by(verdict), extreme(verdict.highest, unit)),
        Standing::Suffices => format!("{}, {over}", short_by(verdict)),
    };
    let by_state = |state: Standing| {
        let of_state = verdict.places.iter().filter(|place| place.state == state);
        of_state.map(|place| place.place).collect::<Vec<_>>()
    };
    let kinds = [
        (Standing::Short, format!("Short by more than {tolerance}")),
        (Standing::Suffices, format!("Within {tolerance}")),
        (Standing::Generous, format!("Over by more than {tolerance}, not short by more than {tolerance}")),
    ];
    let lists = kinds.into_iter().filter_map(|(state, head)| {
        let found = by_state(state);
        let all = found.len() == verdict.places.len();
        (!found.is_empty()).then(|| format!(" {head}: {}.", if all { "everywhere".into() } else { places(&found) }))
    });
    let start = Sentence::default().strong(name).then(format!(": {text}."));
    lists.fold(start, Sentence::then).then(cover(verdict, " Multiplied by", units))
}

/// What covers every member: the factor and the member that sets it, and the members that no factor helps.
fn cover(verdict: &Verdict, start: &str, units: ReportUnits) -> String {
    let subject = verdict.subject;
    let mut text = match verdict.governing() {
        Some(member) if needed(member.factor).is_some() => format!(
            "{start} {} no {} is short: {} sets this, {} short of its own exact value.",
            factor(member.factor),
            if subject == Subject::StoreyDrifts { "storey" } else { "member" },
            member_name(member),
            size(member.own_shortfall())
        ),
        _ => String::new(),
    };
    if let Some((largest, count)) = verdict.unloaded() {
        let members = if count == 1 { "member is" } else { "members are" };
        let exact = amount(largest.exact.abs(), unit(subject, units));
        text += &format!(
            " {count} {members} left almost without load by the method, and no factor helps: design for the exact value \
             (up to {exact}, {}).",
            member_name(largest)
        );
    }
    text
}

fn member_name(extreme: Extreme) -> String {
    member(extreme.member)
}

/// A factor over 1, if the value must be multiplied at all.
pub(super) fn needed(factor: Option<f64>) -> Option<f64> {
    factor.filter(|factor| *factor > 1.0 + 1e-9)
}

/// A factor for people: rounded up, never under 1: a quick value is not reduced by it.
pub(super) fn factor(factor: Option<f64>) -> String {
    factor.map_or_else(|| "none".into(), |factor| rounded_up(factor.max(1.0), 2))
}

/// A load factor, rounded down to three figures.
pub(super) fn rounded_down(factor: f64) -> String {
    let places = (2 - factor.log10().floor() as i32).clamp(0, 6);
    let scale = 10_f64.powi(places);
    decimals((factor * scale).floor() / scale, places as usize)
}

/// `short by up to 40 % of the storey's largest` of −39.2: rounded to the far side.
fn short_by(verdict: &Verdict) -> String {
    let base = if verdict.subject == Subject::StoreyDrifts { "" } else { " of the storey's largest" };
    match -verdict.lowest.percent {
        none if none < 0.05 => "nowhere short".into(),
        some => format!("short by up to {}{base}", size(some)),
    }
}

/// A percentage without sign, rounded away from zero; one decimal under 1 %.
fn size(percent: f64) -> String {
    let places = usize::from(percent < 1.0);
    format!("{}{NO_BREAK}%", rounded_up(percent.max(0.0), places))
}

/// A member with both values: `column A, storey 1 (120 kN m where 182 kN m is exact, 35 % short of it)`.
fn extreme(extreme: Extreme, unit: Unit) -> String {
    let (quick, exact) = (amount(extreme.quick.abs(), unit), amount(extreme.exact.abs(), unit));
    let off = match extreme.own_shortfall() {
        short if short > 0.0 => format!("{} short of it", size(short)),
        over => format!("{} over it", size(-over)),
    };
    format!("{} ({quick} where {exact} is exact: {off})", member(extreme.member))
}

/// How many values of a method carry a flag.
pub(super) fn flags(method: &str, errors: &[ValueError]) -> Option<String> {
    let count = |flag: Flag| errors.iter().filter(|error| error.flags.contains(&flag)).count();
    let (sign, weak, zero) = (count(Flag::Sign), count(Flag::Weak), count(Flag::Zero));
    (sign + weak > 0).then(|| {
        format!(
            "{method}: of {} values {sign} differ in sign from the exact ones, {weak} are weak and {zero} zero beside \
             the largest of their storey (column flag of errors.csv).",
            errors.len()
        )
    })
}

/// The text with a capital first letter.
pub(super) fn capital(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map(|first| first.to_uppercase().chain(letters).collect()).unwrap_or_default()
}

/// Unit of a subject's values.
pub(super) fn unit(subject: Subject, units: ReportUnits) -> Unit {
    let quantity: Quantity = subject.quantity();
    quantity.unit(units)
}

/// The last line of every report.
pub(super) fn footer(comparison: &Comparison) -> String {
    let order = if comparison.second_order.is_some() { "" } else { ", first order (no P-delta)" };
    format!(
        "Lateral part only{order}, for preliminary sizing and checking; not a design. The licensed engineer and the code in \
         force decide."
    )
}

/// The usual cautions.
pub(super) fn cautions() -> Vec<&'static str> {
    vec![
        "Linear elastic lateral analysis of a plane frame, for preliminary sizing and for checking. It is not a design: \
         gravity, torsion, connections, foundations, detailing, load combinations and drift limits remain with the \
         licensed engineer and the code in force.",
        "First order, but for the second-order analysis where gravity is given: elsewhere gravity acting on the sway \
         (P-delta) is in none of the values. Real moments and drifts are larger, in tall and flexible frames markedly.",
        "A drift that is too small is on the unsafe side for drift limits, not for periods: a drift that is too large \
         lengthens the period.",
        "Every quick method satisfies statics. Where it is short, a ductile frame without instability yields early and \
         redistributes; brittle parts (base plates, splices, column shear) need the full factor, and codes restrict \
         redistribution in columns.",
        "Not for frames with walls, braces, infill, flat slabs, transfer columns or setbacks, nor for accidental torsion.",
        "Factors multiply the lateral part only, before gravity is added. Factored values are an envelope and balance \
         no joint: never derive shears or beam moments from factored column moments.",
        "The factor of a design moment is not for the single ends: foundations, base plates and splices go by the foot \
         and head moments.",
        "Errors hold for this frame and these member sizes; other sizes give other errors.",
    ]
}
