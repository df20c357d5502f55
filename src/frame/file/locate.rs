//! From a place in the text to the name of its key, for messages.

use std::ops::Range;
use toml::de::{DeTable, DeValue};

/// Name of the key at `span`, such as `grid.bays, entry 2`; empty where no key is there.
pub(super) fn key_at(text: &str, span: &Range<usize>) -> String {
    let (document, _) = DeTable::parse_recoverable(text);
    in_table(document.get_ref(), span, "").unwrap_or_default()
}

/// Place of the last key called `name` before `end`.
pub(super) fn earlier_key(text: &str, name: &str, end: usize) -> Option<Range<usize>> {
    let (document, _) = DeTable::parse_recoverable(text);
    let mut found = None;
    visit_keys(document.get_ref(), &mut |key, span| {
        let later = found.as_ref().is_none_or(|best: &Range<usize>| best.start < span.start);
        if key == name && span.end <= end && later {
            found = Some(span);
        }
    });
    found
}

fn visit_keys(table: &DeTable<'_>, seen: &mut impl FnMut(&str, Range<usize>)) {
    for (key, value) in table.iter() {
        seen(key.get_ref(), key.span());
        visit_values(value.get_ref(), seen);
    }
}

fn visit_values(value: &DeValue<'_>, seen: &mut dyn FnMut(&str, Range<usize>)) {
    match value {
        DeValue::Table(table) => visit_keys(table, &mut |key, span| seen(key, span)),
        DeValue::Array(list) => list.iter().for_each(|entry| visit_values(entry.get_ref(), seen)),
        _ => {}
    }
}

fn in_table(table: &DeTable<'_>, span: &Range<usize>, path: &str) -> Option<String> {
    let joint = if path.is_empty() { "" } else { "." };
    for (key, value) in table.iter() {
        let name = format!("{path}{joint}{}", key.get_ref());
        let inside = in_value(value.get_ref(), span, &name);
        let here = || holds(&key.span(), span) || holds(&value.span(), span);
        if inside.is_some() || here() {
            return inside.or(Some(name));
        }
    }
    None
}

fn in_value(value: &DeValue<'_>, span: &Range<usize>, path: &str) -> Option<String> {
    match value {
        DeValue::Table(table) => in_table(table, span, path),
        DeValue::Array(list) => list.iter().enumerate().find_map(|(index, entry)| {
            let kind = if matches!(entry.get_ref(), DeValue::Table(_)) { "table" } else { "entry" };
            let name = format!("{path}, {kind} {}", index + 1);
            let inside = match entry.get_ref() {
                DeValue::Table(table) => {
                    in_table(table, span, &format!("{name}, ")).map(|path| path.replace(", .", ", "))
                }
                other => in_value(other, span, &name),
            };
            inside.or_else(|| holds(&entry.span(), span).then_some(name))
        }),
        _ => None,
    }
}

fn holds(outer: &Range<usize>, inner: &Range<usize>) -> bool {
    outer.start <= inner.start && inner.end <= outer.end && outer.start < outer.end
}
