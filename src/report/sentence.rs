//! Running text with emphasis and references, free of layout.

use super::labels::Labels;

/// A piece of a [`Sentence`].
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Span {
    /// Ordinary text.
    Plain(String),
    /// Text of weight.
    Strong(String),
    /// Stressed text, such as a new word.
    Emphasis(String),
    /// A name as it stands in a file or on the command line.
    Code(String),
    /// The key of a table or figure; shown as `Table 3` or `Figure 2`.
    Reference(String),
}

/// Text with emphasis, code and references to tables and figures.
///
/// `say("The portal method ").strong("falls short").then(" in storey 3, see ").refer("errors").then(".")`
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub struct Sentence {
    spans: Vec<Span>,
}

/// A sentence that begins with ordinary text.
pub fn say(text: impl Into<String>) -> Sentence {
    Sentence::default().then(text)
}

impl Sentence {
    /// Goes on with ordinary text.
    pub fn then(self, text: impl Into<String>) -> Self {
        self.with(Span::Plain(text.into()))
    }

    /// Goes on with text of weight.
    pub fn strong(self, text: impl Into<String>) -> Self {
        self.with(Span::Strong(text.into()))
    }

    /// Goes on with stressed text.
    pub fn emphasis(self, text: impl Into<String>) -> Self {
        self.with(Span::Emphasis(text.into()))
    }

    /// Goes on with a name as it stands in a file or on the command line.
    pub fn code(self, text: impl Into<String>) -> Self {
        self.with(Span::Code(text.into()))
    }

    /// Goes on with the number of a table or figure, by its key.
    pub fn refer(self, key: impl Into<String>) -> Self {
        self.with(Span::Reference(key.into()))
    }

    /// Goes on with another sentence.
    pub fn and(mut self, other: Sentence) -> Self {
        self.spans.extend(other.spans);
        self
    }

    /// The pieces in order.
    pub fn spans(&self) -> &[Span] {
        &self.spans
    }

    /// Whether there is nothing to read.
    pub fn is_empty(&self) -> bool {
        self.spans.iter().all(|span| matches!(span, Span::Plain(text) if text.is_empty()))
    }

    fn with(mut self, span: Span) -> Self {
        self.spans.push(span);
        self
    }

    /// The words without emphasis.
    pub(super) fn words(&self, labels: &Labels) -> String {
        self.spans.iter().map(|span| span.words(labels)).collect()
    }
}

impl Span {
    /// The words, cleaned of anything that is not text.
    pub(super) fn words(&self, labels: &Labels) -> String {
        match self {
            Self::Plain(text) | Self::Strong(text) | Self::Emphasis(text) | Self::Code(text) => clean(text),
            Self::Reference(key) => labels.name(key),
        }
    }
}

impl From<&str> for Sentence {
    fn from(text: &str) -> Self {
        say(text)
    }
}

impl From<String> for Sentence {
    fn from(text: String) -> Self {
        say(text)
    }
}

/// Text on one line without letters that steer a terminal, reorder the line or have no agreed width.
pub(super) fn clean(text: &str) -> String {
    text.chars().filter_map(clean_letter).collect()
}

/// As [`clean`], but lines stay lines and a tab is four blanks.
pub(super) fn clean_lines(text: &str) -> Vec<String> {
    text.lines().map(|line| clean(&line.replace('\t', "    "))).collect()
}

fn clean_letter(letter: char) -> Option<char> {
    match letter {
        '\n' | '\t' | '\r' | '\u{b}' | '\u{c}' | '\u{85}' | '\u{2028}' | '\u{2029}' => Some(' '),
        // Soft hyphen, directional marks and isolates, joiners, variation selectors, byte order mark.
        '\u{ad}' | '\u{61c}' | '\u{200b}'..='\u{200f}' | '\u{202a}'..='\u{202e}' | '\u{2060}'..='\u{206f}' => None,
        '\u{fe00}'..='\u{fe0f}' | '\u{feff}' => None,
        control if control.is_control() => Some('\u{fffd}'),
        other => Some(other),
    }
}
