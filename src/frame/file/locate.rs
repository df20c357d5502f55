//! From a place in the text to the name of its key, for messages.

use std::cmp::Reverse;
use std::ops::Range;
use toml::de::{DeTable, DeValue};

/// Every key and list entry of a text with its place, read once for all messages about it.
#[derive(Debug, Default)]
pub(super) struct Keys {
    nodes: Vec<Node>,
    /// Places of the keys and values of all nodes, by start; of those with one start the widest first.
    places: Vec<(Range<usize>, usize)>,
}

/// A key with its value, or an entry of a list.
#[derive(Debug)]
struct Node {
    parent: Option<usize>,
    label: Label,
    /// Place of the key itself; of an entry its whole place.
    span: Range<usize>,
}

#[derive(Debug)]
enum Label {
    Key(String),
    /// Counted from 1.
    Entry(usize),
    /// An entry that is a table, counted from 1.
    Table(usize),
}

impl Keys {
    /// Reads what can be read of `text`.
    pub fn read(text: &str) -> Self {
        let mut keys = Self::default();
        keys.table(DeTable::parse_recoverable(text).0.get_ref(), None);
        let nodes = &keys.nodes;
        let depth = |node: usize| std::iter::successors(Some(node), |at| nodes[*at].parent).count();
        keys.places.sort_by_cached_key(|(span, node)| (span.start, Reverse(span.end), depth(*node)));
        keys
    }

    /// Name of the innermost key at `span`, such as `grid.bays, entry 2`; empty where no key is there.
    pub fn name(&self, span: &Range<usize>) -> String {
        let before = self.places.partition_point(|(place, _)| place.start <= span.start);
        let innermost = self.places[..before].iter().rev().find(|(place, _)| span.end <= place.end);
        innermost.filter(|_| !span.is_empty()).map_or(String::new(), |(_, node)| self.node_name(*node))
    }

    /// Place of the last key called `name` that ends at `end` or before.
    pub fn earlier_key(&self, name: &str, end: usize) -> Option<Range<usize>> {
        let called = |node: &&Node| matches!(&node.label, Label::Key(key) if key == name) && node.span.end <= end;
        self.nodes.iter().filter(called).map(|node| node.span.clone()).max_by_key(|span| span.start)
    }

    fn node_name(&self, node: usize) -> String {
        let Node { parent, label, .. } = &self.nodes[node];
        let before = parent.map_or(String::new(), |parent| self.node_name(parent));
        match (label, parent.map(|parent| &self.nodes[parent].label)) {
            (Label::Key(key), None) => key.clone(),
            (Label::Key(key), Some(Label::Key(_))) => format!("{before}.{key}"),
            (Label::Key(key), Some(_)) => format!("{before}, {key}"),
            (Label::Entry(number), _) => format!("{before}, entry {number}"),
            (Label::Table(number), _) => format!("{before}, table {number}"),
        }
    }

    fn table(&mut self, table: &DeTable<'_>, parent: Option<usize>) {
        for (key, value) in table.iter() {
            let node = self.add(parent, Label::Key(key.get_ref().to_string()), key.span());
            self.place(value.span(), node);
            self.value(value.get_ref(), node);
        }
    }

    fn value(&mut self, value: &DeValue<'_>, node: usize) {
        match value {
            DeValue::Table(table) => self.table(table, Some(node)),
            DeValue::Array(list) => {
                for (index, entry) in list.iter().enumerate() {
                    let table = matches!(entry.get_ref(), DeValue::Table(_));
                    let label = if table { Label::Table(index + 1) } else { Label::Entry(index + 1) };
                    let inner = self.add(Some(node), label, entry.span());
                    self.value(entry.get_ref(), inner);
                }
            }
            _ => {}
        }
    }

    fn add(&mut self, parent: Option<usize>, label: Label, span: Range<usize>) -> usize {
        self.nodes.push(Node { parent, label, span: span.clone() });
        self.place(span, self.nodes.len() - 1);
        self.nodes.len() - 1
    }

    fn place(&mut self, span: Range<usize>, node: usize) {
        if !span.is_empty() {
            self.places.push((span, node));
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const TEXT: &str =
        "a = 1\nb.c = [\"x\", { d = 2 }]\n[[t]]\nk = { m = 3 }\n[[t]]\nk = { m = [4, 5] }\n[u.v]\nw = 6\n";

    #[test]
    fn names_are_those_of_the_innermost_key() {
        let keys = Keys::read(TEXT);
        let named = |part: &str| {
            let start = TEXT.rfind(part).unwrap();
            keys.name(&(start..start + part.len()))
        };
        let cases = [
            ("1", "a"),
            ("a", "a"),
            ("\"x\"", "b.c, entry 1"),
            ("2", "b.c, table 2, d"),
            ("d", "b.c, table 2, d"),
            ("{ d = 2 }", "b.c, table 2"),
            ("[\"x\", { d = 2 }]", "b.c"),
            ("3", "t, table 1, k.m"),
            ("[[t]]", "t, table 2"),
            ("[4, 5]", "t, table 2, k.m"),
            ("5", "t, table 2, k.m, entry 2"),
            ("w = 6", ""),
            ("6", "u.v.w"),
            ("[u.v]", "u.v"),
        ];
        for (part, name) in cases {
            assert_eq!(named(part), name, "{part}");
        }
        assert_eq!(keys.name(&(3..3)), "");
    }

    #[test]
    fn the_last_key_of_a_name_before_a_place_is_found() {
        let keys = Keys::read(TEXT);
        let first = TEXT.find("k =").unwrap();
        assert_eq!(keys.earlier_key("k", TEXT.rfind("k =").unwrap()), Some(first..first + 1));
        assert_eq!((keys.earlier_key("k", first), keys.earlier_key("w", 3)), (None, None));
    }
}
