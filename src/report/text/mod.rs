//! A document as terminal text, never wider than asked for.
//!
//! Figures are left out; a line names each and its file. A table too wide is narrowed by wrapping its text, then
//! cut into parts of whole columns that each begin with the columns that name the row.

mod grid;
mod ink;

use super::document::{Block, Document, Figure, Verdict};
use super::labels::Labels;
use super::sentence::{Sentence, Span, clean_lines};
use ink::{Ink, Tone};

/// How to write.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Options {
    /// Widest line, in terminal cells; at least 40 are used.
    pub width: usize,
    /// Whether to style with ANSI escapes. The words and signs are the same without.
    pub colour: bool,
}

impl Default for Options {
    /// 100 cells, no escapes.
    fn default() -> Self {
        Self { width: 100, colour: false }
    }
}

/// The document as text, LF line ends.
pub fn write(document: &Document, options: Options) -> String {
    let mut page = Page { labels: &Labels::of(document), width: options.width.max(40), lines: Vec::new() };
    page.heading(1, &document.title);
    if let Some(subtitle) = &document.subtitle {
        page.block(&[Ink::new(subtitle, Tone::Faint)]);
    }
    page.blocks(&document.blocks);
    if let Some(footer) = &document.footer {
        page.block(&[ink_of(footer, page.labels).toned(Tone::Faint)]);
    }
    page.lines.iter().map(|line| line.print(options.colour) + "\n").collect()
}

struct Page<'a> {
    labels: &'a Labels,
    width: usize,
    lines: Vec<Ink>,
}

impl Page<'_> {
    fn blocks(&mut self, blocks: &[Block]) {
        for block in blocks {
            self.one(block);
        }
    }

    fn one(&mut self, block: &Block) {
        match block {
            Block::Heading { level, text } => self.heading(*level, text),
            Block::Paragraph(sentence) => self.block(&[ink_of(sentence, self.labels)]),
            Block::List { ordered, items } => self.list(*ordered, items),
            Block::Pairs(pairs) => self.pairs(pairs),
            Block::Verdict(verdict) => self.verdict(verdict),
            Block::Formula(text) => self.hanging("    ", "    ", &Ink::new(text, Tone::Plain), true),
            Block::Table(table) => {
                self.gap();
                self.lines.extend(grid::draw(table, self.labels, self.width));
            }
            Block::Figures(figures) => figures.iter().for_each(|figure| self.figure(figure)),
            Block::Preformatted { caption, text } => self.preformatted(caption, text),
            Block::Caution { title, items } => self.caution(title, items),
            Block::Details { summary, blocks, .. } => {
                self.block(&[Ink::new(summary, Tone::Strong)]);
                self.blocks(blocks);
            }
            Block::PageBreak => {}
        }
    }

    fn gap(&mut self) {
        if self.lines.last().is_some_and(|line| !line.is_empty()) {
            self.lines.push(Ink::default());
        }
    }

    /// A gap, then the texts, wrapped.
    fn block(&mut self, texts: &[Ink]) {
        self.gap();
        for text in texts {
            self.lines.extend(text.wrap(self.width));
        }
    }

    /// A text whose first line begins with one margin and whose other lines begin with another.
    fn hanging(&mut self, first: &str, rest: &str, text: &Ink, gap: bool) {
        if gap {
            self.gap();
        }
        let (first, rest) = (Ink::new(first, Tone::Plain), Ink::new(rest, Tone::Plain));
        for (index, line) in text.wrap(self.width - first.width().max(rest.width())).into_iter().enumerate() {
            let margin = if index == 0 { first.clone() } else { rest.clone() };
            self.lines.push(margin.joined(line));
        }
    }

    fn heading(&mut self, level: u8, text: &str) {
        if level == 2 {
            self.gap();
            self.lines.push(Ink::default());
        }
        self.block(&[Ink::new(text, Tone::Strong)]);
        let underline = match level {
            1 => self.width,
            2 => self.lines.last().map_or(0, Ink::width),
            _ => 0,
        };
        if underline > 0 {
            self.lines.push(Ink::rule(underline));
        }
    }

    fn list(&mut self, ordered: bool, items: &[Sentence]) {
        self.gap();
        let digits = items.len().to_string().len();
        for (index, item) in items.iter().enumerate() {
            let first = if ordered { format!("  {:>digits$}. ", index + 1) } else { "  - ".into() };
            let rest = " ".repeat(first.len());
            self.hanging(&first, &rest, &ink_of(item, self.labels), false);
        }
    }

    fn pairs(&mut self, pairs: &[(String, Sentence)]) {
        self.gap();
        let names: Vec<Ink> = pairs.iter().map(|(name, _)| Ink::new(name, Tone::Faint)).collect();
        let column = names.iter().map(Ink::width).max().unwrap_or(0).min(self.width / 3);
        for (name, (_, value)) in names.iter().zip(pairs) {
            let name = name.wrap(column);
            let value = ink_of(value, self.labels).wrap(self.width - column - 2);
            for line in 0..name.len().max(value.len()) {
                let name = name.get(line).cloned().unwrap_or_default();
                let value = value.get(line).cloned().unwrap_or_default();
                self.lines.push(name.padded(column + 2).joined(value).trimmed());
            }
        }
    }

    fn verdict(&mut self, verdict: &Verdict) {
        let word = Ink::new(&format!("{} {}: ", verdict.state.sign(), verdict.word), Tone::State(verdict.state));
        let text = word.joined(ink_of(&verdict.sentence, self.labels));
        self.hanging("", "  ", &text, !self.follows_verdict());
    }

    /// Verdicts in a row stand without gaps between them.
    fn follows_verdict(&self) -> bool {
        self.lines.iter().rev().find(|line| !line.starts_with(' ')).is_some_and(Ink::starts_with_state)
    }

    fn figure(&mut self, figure: &Figure) {
        let caption = match figure.caption.is_empty() {
            true => Ink::default(),
            false => Ink::new(" ", Tone::Plain).joined(ink_of(&figure.caption, self.labels)),
        };
        let name = Ink::new(&format!("{}. {}.", self.labels.name(&figure.key), figure.title), Tone::Strong);
        let file = figure.file.as_ref().map_or("See the page.".into(), |file| format!("See the file {file}."));
        self.block(&[name.joined(caption).joined(Ink::new(&format!(" {file}"), Tone::Faint))]);
    }

    fn preformatted(&mut self, caption: &str, text: &str) {
        self.block(&[Ink::new(caption, Tone::Strong)]);
        for line in clean_lines(text) {
            let chopped = Ink::new(&line, Tone::Plain).chopped(self.width - 2);
            self.lines.extend(chopped.into_iter().map(|line| Ink::new("│ ", Tone::Faint).joined(line).trimmed()));
        }
    }

    fn caution(&mut self, title: &str, items: &[Sentence]) {
        self.block(&[Ink::new(title, Tone::Strong)]);
        for item in items {
            self.hanging("│ ", "│ ", &ink_of(item, self.labels), false);
        }
    }
}

/// A sentence in its tones.
fn ink_of(sentence: &Sentence, labels: &Labels) -> Ink {
    sentence.spans().iter().fold(Ink::default(), |ink, span| {
        let tone = match span {
            Span::Plain(_) | Span::Reference(_) => Tone::Plain,
            Span::Strong(_) => Tone::Strong,
            Span::Emphasis(_) => Tone::Emphasis,
            Span::Code(_) => Tone::Code,
        };
        ink.joined(Ink::new(&span.words(labels), tone))
    })
}
