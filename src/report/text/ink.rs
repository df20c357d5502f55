//! Letters with a tone each, measured in terminal cells.

use crate::report::sentence::clean;
use crate::report::table::State;
use anstyle::{AnsiColor, Style};
use unicode_width::UnicodeWidthStr;

/// What a letter's style says.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Tone {
    /// Ordinary.
    Plain,
    /// Of weight.
    Strong,
    /// Stressed.
    Emphasis,
    /// As typed.
    Code,
    /// Of less weight.
    Faint,
    /// A judgement.
    State(State),
}

impl Tone {
    fn style(self) -> Style {
        let coloured = |colour: AnsiColor| Style::new().fg_color(Some(colour.into()));
        match self {
            Self::Plain => Style::new(),
            Self::Strong => Style::new().bold(),
            Self::Emphasis => Style::new().italic(),
            Self::Code => coloured(AnsiColor::Cyan),
            Self::Faint | Self::State(State::NearZero | State::NotJudged) => Style::new().dimmed(),
            Self::State(State::Suffices) => coloured(AnsiColor::Green),
            Self::State(State::SafeSide) => coloured(AnsiColor::Blue),
            Self::State(State::FallsShort) => coloured(AnsiColor::Red).bold(),
        }
    }
}

/// Text with a tone for each letter; one line, or one yet to be wrapped.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub(super) struct Ink {
    letters: Vec<(char, Tone)>,
}

impl Ink {
    /// Text in one tone.
    pub fn new(text: &str, tone: Tone) -> Self {
        Self { letters: clean(text).chars().map(|letter| (letter, tone)).collect() }
    }

    /// A thin line.
    pub fn rule(width: usize) -> Self {
        Self::new(&"─".repeat(width), Tone::Faint)
    }

    /// The text in another tone.
    pub fn toned(mut self, tone: Tone) -> Self {
        self.letters.iter_mut().for_each(|letter| letter.1 = tone);
        self
    }

    /// This text, then another.
    pub fn joined(mut self, other: Self) -> Self {
        self.letters.extend(other.letters);
        self
    }

    pub fn is_empty(&self) -> bool {
        self.letters.is_empty()
    }

    pub fn starts_with(&self, letter: char) -> bool {
        self.letters.first().is_some_and(|first| first.0 == letter)
    }

    pub fn starts_with_state(&self) -> bool {
        self.letters.first().is_some_and(|first| matches!(first.1, Tone::State(_)))
    }

    /// Width in terminal cells.
    pub fn width(&self) -> usize {
        width(&self.letters)
    }

    /// Width of its longest word.
    pub fn longest_word(&self) -> usize {
        self.letters.split(|letter| letter.0 == ' ').map(width).max().unwrap_or(0)
    }

    /// Blanks behind, up to a width.
    pub fn padded(self, to: usize) -> Self {
        let blanks = to.saturating_sub(self.width());
        self.joined(Self::new(&" ".repeat(blanks), Tone::Plain))
    }

    /// Blanks before, up to a width.
    pub fn indented(self, to: usize) -> Self {
        let blanks = to.saturating_sub(self.width());
        Self::new(&" ".repeat(blanks), Tone::Plain).joined(self)
    }

    /// Without blanks at its end.
    pub fn trimmed(mut self) -> Self {
        while self.letters.last().is_some_and(|letter| letter.0 == ' ') {
            self.letters.pop();
        }
        self
    }

    /// Lines no wider than `limit`, broken at blanks, and within words that are wider themselves. At least one line.
    pub fn wrap(&self, limit: usize) -> Vec<Self> {
        let mut lines = Vec::new();
        let mut line: Vec<(char, Tone)> = Vec::new();
        for word in self.letters.split(|letter| letter.0 == ' ').filter(|word| !word.is_empty()) {
            for piece in chop(word, limit) {
                if !line.is_empty() && width(&line) + 1 + width(piece) > limit {
                    lines.push(Self { letters: std::mem::take(&mut line) });
                }
                if let Some(&(_, tone)) = line.last() {
                    let tone = if tone == piece[0].1 { tone } else { Tone::Plain };
                    line.push((' ', tone));
                }
                line.extend(piece);
            }
        }
        lines.push(Self { letters: line });
        lines
    }

    /// Lines no wider than `limit`, blanks kept. At least one line.
    pub fn chopped(&self, limit: usize) -> Vec<Self> {
        let lines: Vec<Self> =
            chop(&self.letters, limit).into_iter().map(|piece| Self { letters: piece.to_vec() }).collect();
        if lines.is_empty() { vec![Self::default()] } else { lines }
    }

    /// The text, with ANSI escapes if asked for.
    pub fn print(&self, colour: bool) -> String {
        let mut text = String::new();
        for run in self.letters.chunk_by(|one, next| one.1 == next.1) {
            let words: String = run.iter().map(|letter| letter.0).collect();
            let style = run[0].1.style();
            match colour && style != Style::new() {
                true => text.push_str(&format!("{style}{words}{style:#}")),
                false => text.push_str(&words),
            }
        }
        text
    }
}

fn width(letters: &[(char, Tone)]) -> usize {
    letters.iter().map(|letter| letter.0).collect::<String>().width()
}

/// Pieces no wider than `limit`, each of at least one letter.
fn chop(letters: &[(char, Tone)], limit: usize) -> Vec<&[(char, Tone)]> {
    let mut pieces = Vec::new();
    let mut rest = letters;
    while !rest.is_empty() {
        let mut end = rest.len().min(4 * limit.max(1));
        while end > 1 && width(&rest[..end]) > limit {
            end -= 1;
        }
        let (piece, behind) = rest.split_at(end);
        pieces.push(piece);
        rest = behind;
    }
    pieces
}
