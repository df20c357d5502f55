//! The key of methods: a piece of each line with its marker and its name.

use super::canvas::{Anchor, Canvas, Point, SMALL, Stroke, Words};
use super::font::{shorten, text_width};
use super::look::Look;

const SAMPLE: f64 = 34.0;
const ROW: f64 = 18.0;

/// One entry: the look, whether markers are drawn, the name.
pub(super) type Entry = (Look, bool, String);

/// Rows of entries that fit into `width`.
fn rows(entries: &[Entry], width: f64) -> Vec<Vec<(f64, String)>> {
    let mut rows: Vec<Vec<(f64, String)>> = vec![Vec::new()];
    let mut x = 0.0;
    for (_, _, name) in entries {
        let name = shorten(name, SMALL, false, width - SAMPLE - 6.0);
        let long = SAMPLE + 6.0 + text_width(&name, SMALL, false);
        if x > 0.0 && x + long > width {
            rows.push(Vec::new());
            x = 0.0;
        }
        if let Some(row) = rows.last_mut() {
            row.push((x, name));
        }
        x += long + 18.0;
    }
    rows
}

/// Draws the key from `(x, y)` (top left corner), no wider than `width`; returns the y below.
pub(super) fn legend(canvas: &mut Canvas, entries: &[Entry], (x, mut y): Point, width: f64) -> f64 {
    let mut left = entries.iter();
    for row in rows(entries, width) {
        for ((at, name), (look, marked, _)) in row.into_iter().zip(left.by_ref()) {
            let (start, middle) = (x + at, y + ROW / 2.0);
            canvas.line((start, middle), (start + SAMPLE, middle), Stroke::of(*look));
            if *marked {
                canvas.marker((start + SAMPLE / 2.0, middle), *look);
            }
            canvas.words(Words::new(name, (start + SAMPLE + 6.0, middle), Anchor::Start));
        }
        y += ROW;
    }
    y
}
