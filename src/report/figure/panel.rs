//! Parts that every figure has: its heading, and paragraphs of small words.

use super::canvas::{Anchor, Canvas, HEADING, SMALL, Words};
use super::colour::QUIET;
use super::font::wrap;
use super::plan::MARGIN;

/// Height of a line of the heading, CSS px.
const HEADING_LINE: f64 = 18.0;
/// Height of a line of a paragraph, CSS px.
const PARAGRAPH_LINE: f64 = 15.0;

/// Draws `title` at the top left of a figure of `width`; returns the y below.
pub(super) fn heading(canvas: &mut Canvas, title: &str, width: f64) -> f64 {
    let lines = wrap(title, HEADING, true, width - 2.0 * MARGIN);
    let below = MARGIN + HEADING_LINE * lines.len() as f64;
    for (index, line) in lines.into_iter().enumerate() {
        let at = (MARGIN, MARGIN + HEADING_LINE * (index as f64 + 0.4));
        canvas.words(Words::new(line, at, Anchor::Start).size(HEADING).bold());
    }
    below
}

/// Draws quiet words from `(x, y)` (top left corner), no wider than `width`; returns the y below.
pub(super) fn paragraph(canvas: &mut Canvas, words: &str, (x, y): (f64, f64), width: f64) -> f64 {
    let lines = wrap(words, SMALL, false, width);
    let below = y + PARAGRAPH_LINE * lines.len() as f64;
    for (index, line) in lines.into_iter().enumerate() {
        let at = (x, y + PARAGRAPH_LINE * (index as f64 + 0.5));
        canvas.words(Words::new(line, at, Anchor::Start).colour(QUIET));
    }
    below
}
