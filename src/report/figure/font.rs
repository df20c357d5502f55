//! The fonts of the figures: embedded subsets of DejaVu Sans (licence beside them), and text widths read from them.

use std::sync::LazyLock;

use skrifa::instance::{LocationRef, Size};
use skrifa::{FontRef, MetadataProvider};

/// DejaVu Sans, the glyphs that figures use.
pub(super) const REGULAR: &[u8] = include_bytes!("font/DejaVuSans.subset.ttf");
/// DejaVu Sans Bold, the glyphs that figures use.
pub(super) const BOLD: &[u8] = include_bytes!("font/DejaVuSans-Bold.subset.ttf");
/// Families in order of preference; Verdana has nearly the same widths.
pub(super) const FAMILY: &str = "DejaVu Sans, Verdana, sans-serif";
/// The family that the embedded fonts carry.
pub(super) const EMBEDDED_FAMILY: &str = "DejaVu Sans";
/// Height of a capital letter over the font size (DejaVu Sans: 1493 of 2048 units).
pub(super) const CAPITAL: f64 = 0.729;

/// Width over font size of a character that the fonts lack.
const UNKNOWN_ADVANCE: f64 = 0.65;
/// One past the highest character that is looked up in the table.
const TABLE_END: u32 = 0x2300;

struct Advances(Vec<f32>);

impl Advances {
    fn read(bytes: &[u8]) -> Self {
        let Ok(font) = FontRef::new(bytes) else {
            return Self(Vec::new());
        };
        let glyphs = font.charmap();
        let metrics = font.glyph_metrics(Size::new(1.0), LocationRef::default());
        let advance = |code| glyphs.map(code).and_then(|glyph| metrics.advance_width(glyph)).unwrap_or(f32::NAN);
        Self((0..TABLE_END).map(advance).collect())
    }

    fn of(&self, character: char) -> f64 {
        match self.0.get(character as usize) {
            Some(advance) if !advance.is_nan() => f64::from(*advance),
            _ => UNKNOWN_ADVANCE,
        }
    }
}

static REGULAR_ADVANCES: LazyLock<Advances> = LazyLock::new(|| Advances::read(REGULAR));
static BOLD_ADVANCES: LazyLock<Advances> = LazyLock::new(|| Advances::read(BOLD));

/// Width of `words` on one line at font size `size`, from the advances of the embedded fonts.
///
/// # Units
/// The unit of `size`, such as CSS px.
pub fn text_width(words: &str, size: f64, bold: bool) -> f64 {
    let advances = if bold { &BOLD_ADVANCES } else { &REGULAR_ADVANCES };
    size * words.chars().map(|character| advances.of(character)).sum::<f64>()
}

/// Breaks `words` at spaces into lines no wider than `width`; a longer word stands alone and is cut with an ellipsis.
pub(super) fn wrap(words: &str, size: f64, bold: bool, width: f64) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    for word in words.split_whitespace() {
        let joined = lines.last().map(|line| format!("{line} {word}"));
        match (joined, lines.last_mut()) {
            (Some(joined), Some(last)) if text_width(&joined, size, bold) <= width => *last = joined,
            _ => lines.push(shorten(word, size, bold, width)),
        }
    }
    lines
}

/// `words`, cut with an ellipsis where they are wider than `width`.
pub(super) fn shorten(words: &str, size: f64, bold: bool, width: f64) -> String {
    if text_width(words, size, bold) <= width {
        return words.to_owned();
    }
    let mut kept: String = words.to_owned();
    while !kept.is_empty() && text_width(&kept, size, bold) + text_width("…", size, bold) > width {
        kept.pop();
    }
    format!("{}…", kept.trim_end())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_character_that_figures_use_is_in_both_fonts() {
        let used = "ABCZabz0189.,%−+×–…≤≥→←²°αβθψ ()/ äöüß";
        for advances in [&*REGULAR_ADVANCES, &*BOLD_ADVANCES] {
            for character in used.chars() {
                assert!(advances.0[character as usize] > 0.0, "{character}");
            }
        }
    }

    #[test]
    fn widths_are_those_of_the_font() {
        // Digits of DejaVu Sans are 1303 of 2048 units wide, bold 1425 (read from the fonts' hmtx tables).
        assert!((text_width("00", 10.0, false) - 20.0 * 1303.0 / 2048.0).abs() < 1e-4);
        assert!((text_width("0", 10.0, true) - 10.0 * 1425.0 / 2048.0).abs() < 1e-4);
    }

    #[test]
    fn wrapped_lines_fit() {
        let lines = wrap("one two three four Pneumonoultramicroscopic", 12.0, false, 70.0);
        assert_eq!(lines[..2], ["one two", "three four"]);
        assert!(
            lines.len() == 3
                && lines[2].ends_with('…')
                && lines.iter().all(|line| text_width(line, 12.0, false) <= 70.0),
            "{lines:?}"
        );
    }
}
