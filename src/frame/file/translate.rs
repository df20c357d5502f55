//! From the messages of the TOML reader to the faults of a frame file.

use super::fault::{FaultKind, FileFault};
use super::locate::Keys;
use std::ops::Range;

/// Tables of the file and their keys, to tell where a misplaced key belongs.
const HOMES: &[(&str, &[&str])] = &[
    ("before the first [table], at the top of the file", &["title", "report_units", "within"]),
    ("in the table [grid]", &["storeys", "bays"]),
    ("in the table [feet]", &["fixity"]),
    ("in the table [material]", &["modulus", "shear_modulus", "poisson"]),
    ("in the table [joints]", &["rigid"]),
    ("inside { left = \"80 MN m/rad\", right = \"hinge\" }, the value of end_spring", &["left", "right"]),
    ("in the table [lateral]", &["base_shear", "shape", "pressure", "tributary"]),
    ("in a table [[columns]] or [[beams]]", &["inertia", "rectangle", "stiffness_factor", "shear_area"]),
    ("in a table [[beams]]", &["end_spring"]),
    (
        "in the table [sizes]",
        &["beam_to_column", "interior_to_end", "tier", "taper", "beam_taper", "roof_beam", "span_power", "scatter"],
    ),
    ("in the table [sizes]", &["foot_spring", "end_column_inertia", "area_per_inertia"]),
    ("inside { width = \"400 mm\", depth = \"600 mm\" }, the value of rectangle", &["depth"]),
    ("inside { spring = \"150 MN m/rad\" }, the value of fixity in the table [feet]", &["spring"]),
];

/// The fault that `error` speaks of.
pub(super) fn translate(error: &toml::de::Error, text: &str) -> FileFault {
    let span = clamp(error.span().unwrap_or(text.len()..text.len()), text);
    let message = error.message();
    if message == "duplicate key" {
        return duplicate(text, span);
    }
    if message.contains("number overflowed") {
        let typed = text[span.clone()].into();
        return FileFault::new(crate::units::UnitError::Overflow { text: typed }, span);
    }
    if let Some(rest) = message.strip_prefix("unknown field ") {
        return FileFault::new(unknown_key(rest, text[span.clone()].trim_matches(['"', '\''])), span);
    }
    if let Some((found, expected)) =
        message.strip_prefix("invalid type: ").and_then(|rest| rest.split_once(", expected "))
    {
        let date = found == "map" && !text[span.clone()].starts_with(['{', '[']);
        let found = if date { format!("the date `{}`", &text[span.clone()]) } else { form(found) };
        return FileFault::new(FaultKind::WrongForm { found, expected: due(expected) }, span);
    }
    syntax(message, text, span)
}

fn clamp(span: Range<usize>, text: &str) -> Range<usize> {
    let floor = |mut at: usize| {
        at = at.min(text.len());
        while !text.is_char_boundary(at) {
            at -= 1;
        }
        at
    };
    floor(span.start)..floor(span.end.max(span.start))
}

fn duplicate(text: &str, span: Range<usize>) -> FileFault {
    let key = text[span.clone()].trim_matches(['"', '\'']).to_string();
    let line_start = text[..span.start].rfind('\n').map_or(0, |at| at + 1);
    let header = text[line_start..].lines().next().unwrap_or_default().trim();
    let same_header = || text[..line_start].find(header).map(|at| at..at + header.len());
    let first = if header.starts_with('[') { same_header() } else { Keys::read(text).earlier_key(&key, span.start) };
    let fault = FileFault::new(FaultKind::DuplicateKey { key }, span);
    match first {
        Some(first) => fault.beside(first, "given here first"),
        None => fault,
    }
}

/// Reads `` `key`, expected one of `a`, `b` `` as serde writes it.
fn unknown_key(rest: &str, typed: &str) -> FaultKind {
    let key = typed.to_string();
    let names = rest.rsplit_once(", expected ").map_or("", |(_, names)| names);
    let names = names.split('`').skip(1).step_by(2).map(String::from);
    if rest.starts_with("`$__toml_private") {
        return FaultKind::WrongForm { found: "a date".into(), expected: "a text in quotes or a table".into() };
    }
    let known: Vec<_> = names.filter(|name| name != "area" || !rest.contains("`floors`")).collect();
    let home = HOMES.iter().find(|(_, keys)| keys.contains(&key.as_str())).map(|(place, _)| *place);
    let near = || {
        let near = known.iter().min_by_key(|name| distance(name, &key));
        near.filter(|name| home.is_none() && distance(name, &key) <= 2 + key.len() / 6).cloned()
    };
    let suggestion = twin(&key, &known).or_else(near);
    FaultKind::UnknownKey { key, suggestion, home, known }
}

/// Columns have storeys and lines where beams have floors and bays.
fn twin(key: &str, known: &[String]) -> Option<String> {
    let twins = [("storeys", "floors"), ("floors", "storeys"), ("bays", "lines"), ("lines", "bays")];
    let other = twins.iter().find(|(name, _)| *name == key).map(|(_, other)| (*other).to_string());
    other.filter(|other| known.contains(other) && known.iter().any(|name| name == "inertia"))
}

fn distance(known: &str, typed: &str) -> usize {
    let us = |word: &str| word.to_lowercase().replace('-', "_").replace("storie", "storey").replace("story", "storey");
    strsim::damerau_levenshtein(&us(known), &us(typed))
}

fn form(found: &str) -> String {
    let article = |name: &str| format!("the {name}");
    match found {
        "map" => "a table".into(),
        "sequence" => "a list".into(),
        _ if found.starts_with("boolean") => found.replacen("boolean ", "", 1),
        _ if found.starts_with("string ") => article(&found.replacen("string", "text", 1)),
        _ if found.starts_with("floating point") => article(&found.replacen("floating point", "number", 1)),
        _ if found.starts_with("integer") => article(&found.replacen("integer", "number", 1)),
        _ => found.into(),
    }
}

fn due(expected: &str) -> String {
    if expected == "a string" { "text in quotes".into() } else { expected.into() }
}

/// A text that is no TOML: the usual slips told apart.
fn syntax(message: &str, text: &str, span: Range<usize>) -> FileFault {
    let line_start = text[..span.start].rfind('\n').map_or(0, |at| at + 1);
    let line = text[line_start..].lines().next().unwrap_or_default();
    let in_list = message.contains("array");
    let next_line = in_list && text[line_start..span.start].trim().is_empty();
    let (message, span) = if next_line && (line.contains('=') || line.starts_with('[')) {
        let end = text[..line_start].trim_end().len();
        ("a list is not closed, expected `]`", end..end)
    } else {
        (message, span)
    };
    let doubled = text[..span.start].ends_with('"') && text[span.start..].starts_with('"');
    let message = match message {
        "string values must be quoted, expected literal string" => "a text stands without quotes",
        "invalid basic string, expected `\"`" => "a text is not closed, expected `\"`",
        "missing comma between array elements, expected `,`" => "a comma is missing between the entries of a list",
        other => other,
    };
    let kind = FaultKind::Syntax {
        message: format!("the file cannot be read: {message}"),
        hint: hint(message, line, doubled),
    };
    FileFault::new(kind, span)
}

fn hint(message: &str, line: &str, doubled_quote: bool) -> &'static str {
    let says = |words: &[&str]| words.iter().any(|word| message.contains(word));
    let key_and_value = line.contains('=');
    match () {
        () if doubled_quote => "inches inside a text are written \\\" or in, as in \"12'-6\\\"\" or \"150 in\"",
        () if says(&["string", "quote", "newline", "a text"]) => "a text begins and ends with a quote on the same line",
        () if says(&["array", "list"]) => {
            "a list is written [\"7.2 m\", \"8.4 m\"], with a comma between entries and a closing bracket"
        }
        () if says(&["table", "`}`", "`]`"]) => {
            "a table is headed [grid] on a line of its own, or written { count = 3, width = \"7.2 m\" } in one line"
        }
        () if key_and_value => {
            "a line reads key = value; a value with a unit stands in quotes, as in modulus = \"30 GPa\""
        }
        () => "a line is a [table], a key = value or a # comment",
    }
}
