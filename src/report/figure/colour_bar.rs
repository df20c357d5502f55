//! The key of the signed colours.

use super::canvas::{Anchor, Canvas, Fill, Point, Stroke, Words};
use super::colour::{QUIET, RULE, signed_colour};
use super::number::percent;
use super::panel::paragraph;

/// Steps of colour in the bar.
const STEPS: usize = 48;
const WIDEST: f64 = 320.0;
const THICKNESS: f64 = 12.0;

/// Draws the key around the middle `x`, below `y`, no wider than `room`; returns the y below.
///
/// `limit` is the percentage at both ends; `beyond` says on which sides (short, generous) values lie beyond it.
pub(super) fn colour_bar(
    canvas: &mut Canvas,
    words: &str,
    (x, y): Point,
    room: f64,
    (limit, beyond): (f64, (bool, bool)),
) -> f64 {
    let width = room.min(WIDEST);
    let (left, right) = (x - width / 2.0, x + width / 2.0);
    let y = paragraph(canvas, words, (left, y), width) + 3.0;
    canvas.words(Words::new("short (unsafe side)", (left, y + 7.0), Anchor::Start));
    canvas.words(Words::new("generous", (right, y + 7.0), Anchor::End));
    let top = y + 16.0;
    for step in 0..STEPS {
        let share = step as f64 / STEPS as f64;
        let fill = Fill::plain(signed_colour(2.0 * (step as f64 + 0.5) / STEPS as f64 - 1.0));
        canvas.bar((left + share * width, top), (width * (1.0 - share), THICKNESS), fill);
    }
    let bottom = top + THICKNESS;
    let corners = vec![(left, top), (right, top), (right, bottom), (left, bottom), (left, top)];
    canvas.path(corners, Stroke::solid(RULE, 0.7));
    for part in [-1.0, -0.5, 0.0, 0.5, 1.0] {
        let at = f64::midpoint(left, right) + part * width / 2.0;
        canvas.line((at, bottom), (at, bottom + 4.0), Stroke::solid(QUIET, 0.8));
        let (sign, anchor) = match part {
            -1.0 => (if beyond.0 { "≤ " } else { "" }, Anchor::Start),
            1.0 => (if beyond.1 { "≥ " } else { "" }, Anchor::End),
            _ => ("", Anchor::Middle),
        };
        canvas.words(Words::new(format!("{sign}{} %", percent(part * limit)), (at, bottom + 12.0), anchor));
    }
    bottom + 20.0
}
