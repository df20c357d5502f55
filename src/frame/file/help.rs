//! The remedy for each mistake.

use super::fault::{FaultKind, quoted};
use crate::frame::FrameFault;

/// What to write instead.
pub(super) fn help(kind: &FaultKind) -> String {
    match kind {
        FaultKind::Syntax { hint, .. } => (*hint).into(),
        FaultKind::Empty => "`swaybound new` writes a commented frame file to start from".into(),
        FaultKind::UnknownKey { key, suggestion, home, known } => {
            unknown_key(key, suggestion.as_deref(), *home, known)
        },
        FaultKind::DuplicateKey { .. } => "keep one of the two".into(),
        FaultKind::WrongForm { expected, .. } => wrong_form(expected),
        FaultKind::Unit(error) => error.help(),
        FaultKind::OutOfRange { help, .. } => help.clone(),
        FaultKind::Missing { help, .. }
        | FaultKind::Conflict { help, .. }
        | FaultKind::Count { help, .. }
        | FaultKind::ShareSum { help, .. } => (*help).into(),
        FaultKind::NoBays => "give the bay widths from the left, for example bays = [\"7.2 m\", \"8.4 m\"]".into(),
        FaultKind::NoStoreys => {
            "give the storey heights from the ground up, for example storeys = [\"4.8 m\", \"3.9 m\"]".into()
        }
        FaultKind::TooMany { .. } => "check the count; a frame of that size is outside what this tool checks".into(),
        FaultKind::RangeLength { .. } => "write [low, high], or a single value to fix it".into(),
        FaultKind::RangeReversed { low, high } => format!("write [{high}, {low}]"),
        FaultKind::Select(error) => error.help(),
        FaultKind::Unsized { members, .. } => format!(
            "add a [[{members}]] table for it, or begin with one for \"all\" and let later tables replace parts of it"
        ),
        FaultKind::BeamArea => {
            "leave it out: floors are taken as rigid in their own plane, so beams do not change length".into()
        }
        FaultKind::NoLoad => THREE_WAYS.into(),
        FaultKind::StoreyShear { .. } => {
            "the shear of a storey is the sum of the forces at its top floor and above, to the right; a load to the left has the same magnitudes, so state it to the right".into()
        }
        FaultKind::Choice { typed, allowed, table } => choice(typed, allowed, *table),
        FaultKind::SpringNeedsInertia => {
            "give sizes.end_column_inertia and material.modulus, or state the spring as sizes.foot_spring, a ratio to 4 E I_c/h of its column".into()
        }
        FaultKind::NoDepth { .. } => {
            "state lengths in place of the share, column = \"0.3 m\" and beam = \"0.25 m\", or give every member a rectangle".into()
        }
        FaultKind::ZonesTooLong { .. } => "make the rigid zones shorter, and check their units".into(),
        FaultKind::GravityNeedsInertia => {
            "give sizes.end_column_inertia and material.modulus, or leave [gravity] out".into()
        }
        FaultKind::Options(_) => "check the numbers of the options and their units".into(),
        FaultKind::Frame(fault) => of_frame(fault).into(),
    }
}

/// The three forms of the table `[lateral]`.
pub(super) const THREE_WAYS: &str = "write [lateral] with floors = [\"40 kN\", \"60 kN\"] from the lowest floor up, or base_shear = \"900 kN\" with shape = \"triangular\", or pressure = \"1.2 kPa\" with tributary = \"6 m\"";

fn of_frame(fault: &FrameFault) -> &'static str {
    match fault {
        FrameFault::NoLoad => THREE_WAYS,
        FrameFault::Negative { .. } => {
            "give 0 or more; in a file, a beam that carries no moment takes stiffness_factor = 0"
        }
        FrameFault::NotPositive { .. } | FrameFault::NotFinite { .. } => "check the number, its unit and its factor",
        _ => "check the numbers of the frame and their units",
    }
}

fn unknown_key(key: &str, suggestion: Option<&str>, home: Option<&str>, known: &[String]) -> String {
    match (suggestion, home) {
        (Some(better), _) => format!("did you mean `{better}`?"),
        (None, Some(home)) => format!("`{key}` belongs {home}"),
        (None, None) => format!("the keys here are {}", known.join(", ")),
    }
}

fn wrong_form(expected: &str) -> String {
    if expected.contains("double brackets") {
        return "each size is a table of its own, headed by the name in double brackets".into();
    }
    if let Some(name) = expected.strip_prefix("the table ") {
        return format!("write {name} on a line of its own and its keys below it");
    }
    match expected {
        "text in quotes" => "put the value in quotes".into(),
        "a number without quotes" => "leave the quotes out; this value has no unit".into(),
        "a whole number" => "write a whole number without quotes, such as 3".into(),
        _ => format!("write {expected}"),
    }
}

fn choice(typed: &str, allowed: &[&str], table: Option<&str>) -> String {
    let typed = typed.trim().to_lowercase();
    let stem = |word: &str| typed.len() >= 5 && word.starts_with(&typed.chars().take(5).collect::<String>());
    let distance = |word: &str| strsim::damerau_levenshtein(word, &typed);
    let near = allowed.iter().min_by_key(|word| distance(word)).filter(|word| distance(word) <= 2 || stem(word));
    match (near, table) {
        (Some(word), _) => format!("did you mean \"{word}\"?"),
        (None, Some(table)) => format!("write {} or {table}", quoted(allowed).replace(" or ", ", ")),
        (None, None) => format!("write {}", quoted(allowed)),
    }
}
