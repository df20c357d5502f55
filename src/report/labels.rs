//! Numbers of tables and figures, and the faults of a document.

use super::document::{Block, Document};
use super::sentence::{Sentence, Span};
use std::collections::HashMap;

/// `Table 3` and `Figure 2` by key, in the order of the document.
#[derive(Debug, Default)]
pub(super) struct Labels {
    names: HashMap<String, String>,
    tables: usize,
    figures: usize,
    faults: Vec<String>,
}

impl Labels {
    /// Numbers every table and figure.
    pub fn of(document: &Document) -> Self {
        let mut labels = Self::default();
        labels.number(&document.blocks);
        labels
    }

    /// The name to show for a key; an unknown key shows as itself and is a fault of the document.
    pub fn name(&self, key: &str) -> String {
        self.names.get(key).cloned().unwrap_or_else(|| key.to_string())
    }

    fn number(&mut self, blocks: &[Block]) {
        for block in blocks {
            match block {
                Block::Table(table) => {
                    self.tables += 1;
                    self.give(&table.key, format!("Table\u{a0}{}", self.tables));
                }
                Block::Figures(figures) => {
                    for figure in figures {
                        self.figures += 1;
                        self.give(&figure.key, format!("Figure\u{a0}{}", self.figures));
                    }
                }
                Block::Details { blocks, .. } => self.number(blocks),
                _ => {}
            }
        }
    }

    fn give(&mut self, key: &str, name: String) {
        if slug(key) != key {
            self.faults.push(format!("key `{key}` of {name}: use small letters, digits and hyphens"));
        }
        if let Some(earlier) = self.names.insert(key.into(), name.clone()) {
            self.faults.push(format!("{name} and {earlier} share the key `{key}`"));
        }
    }
}

/// What is wrong with a document: for tests of what builds it.
pub(super) fn faults(document: &Document) -> Vec<String> {
    let mut labels = Labels::of(document);
    let mut search = Search { faults: std::mem::take(&mut labels.faults), labels, level: 1 };
    search.blocks(&document.blocks);
    search.faults
}

struct Search {
    labels: Labels,
    faults: Vec<String>,
    level: u8,
}

impl Search {
    fn blocks(&mut self, blocks: &[Block]) {
        for block in blocks {
            self.block(block);
        }
    }

    fn block(&mut self, block: &Block) {
        match block {
            Block::Heading { level, text } => {
                if *level > self.level + 1 {
                    self.faults.push(format!("heading `{text}` skips a level"));
                }
                self.level = *level;
            }
            Block::Paragraph(sentence) => self.sentence(sentence),
            Block::Verdict(verdict) => self.sentence(&verdict.sentence),
            Block::List { items, .. } | Block::Caution { items, .. } => {
                items.iter().for_each(|item| self.sentence(item));
            }
            Block::Pairs(pairs) => pairs.iter().for_each(|(_, value)| self.sentence(value)),
            Block::Table(table) => {
                let name = self.labels.name(&table.key);
                self.faults.extend(table.faults().into_iter().map(|fault| format!("{name}: {fault}")));
                table.sentences().for_each(|sentence| self.sentence(sentence));
            }
            Block::Figures(figures) => {
                for figure in figures {
                    self.sentence(&figure.caption);
                    self.svg(&figure.key, &figure.svg);
                }
            }
            Block::Details { blocks, .. } => self.blocks(blocks),
            Block::Formula(_) | Block::Preformatted { .. } | Block::PageBreak => {}
        }
    }

    fn sentence(&mut self, sentence: &Sentence) {
        for span in sentence.spans() {
            if let Span::Reference(key) = span
                && !self.labels.names.contains_key(key)
            {
                self.faults.push(format!("a sentence names `{key}`, which is neither a table nor a figure"));
            }
        }
    }

    /// A style element would restyle the page; a script would not run; without `<svg` there is nothing to show.
    fn svg(&mut self, key: &str, svg: &str) {
        for bad in ["<style", "<script", "<foreignObject"] {
            if svg.contains(bad) {
                self.faults.push(format!("figure `{key}` has a {bad}> element"));
            }
        }
        if !svg.contains("<svg") {
            self.faults.push(format!("figure `{key}` has no svg element"));
        }
    }
}

/// Small letters, digits and hyphens, for anchors.
pub(super) fn slug(text: &str) -> String {
    let mut slug = String::new();
    for letter in text.chars() {
        if letter.is_ascii_alphanumeric() {
            slug.push(letter.to_ascii_lowercase());
        } else if !slug.is_empty() && !slug.ends_with('-') {
            slug.push('-');
        }
    }
    slug.trim_end_matches('-').into()
}
