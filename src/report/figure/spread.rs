//! How far each method goes wrong either way: one row per method from its worst shortfall to its largest excess.

use super::axis::round_ticks;
use super::canvas::{Anchor, Canvas, Fill, SMALL, Stroke, Words};
use super::colour::{GRID, INK, QUIET, WHITE, signed_colour};
use super::font::{shorten, text_width, wrap};
use super::look::look;
use super::number::{percent, rounded_signed};
use super::panel::{heading, paragraph};
use super::plan::MARGIN;
use super::svg::finish;
use super::{Figure, Svg};

const PLOT: f64 = 330.0;
const ROW: f64 = 34.0;
const NAMES: f64 = 130.0;
/// Room beside the plot for numbers and for the word above its edge, CSS px.
const LEAST_SIDE: f64 = 62.0;

/// One method's errors.
#[derive(Debug, Clone, PartialEq)]
pub struct SpreadRow {
    /// Method by its name in the files: sets the marker.
    pub method: String,
    /// Name in the figure.
    pub name: String,
    /// Worst shortfall (the smallest signed error), percent.
    pub low: f64,
    /// Median signed error, percent.
    pub median: f64,
    /// Largest signed error, percent.
    pub high: f64,
}

/// The range of signed errors of each method, short to the left and generous to the right of zero.
#[derive(Debug, Clone, PartialEq)]
pub struct Spread {
    /// What the figure shows, in a few words.
    pub title: String,
    /// What it finds, in a sentence or two.
    pub description: String,
    /// What the percentage is.
    pub measure: String,
    /// One row per method, in the order drawn.
    pub rows: Vec<SpreadRow>,
}

impl Figure for Spread {
    fn svg(&self) -> Svg {
        let mut canvas = Canvas::default();
        let (rows, skipped): (Vec<_>, Vec<_>) = self.rows.iter().partition(|row| row.is_finite());
        for row in skipped {
            canvas.note(format!("{}: an error is not a finite number, so the row is left out.", row.name));
        }
        let ticks = ticks(&rows);
        let label = |value: f64| text_width(&percent(value), SMALL, true) + 10.0;
        let side = rows.iter().flat_map(|row| [label(row.low), label(row.high)]).fold(LEAST_SIDE, f64::max);
        let left = 2.0 * MARGIN + NAMES + side;
        let width = left + PLOT + side + MARGIN;
        let top = heading(&mut canvas, &self.title, width) + 24.0;
        let bottom = top + ROW * rows.len() as f64;
        let (first, last) = (ticks[0], ticks[ticks.len() - 1]);
        let x = |value: f64| left + PLOT * (value - first) / (last - first);
        axes(&mut canvas, &ticks, &x, (top, bottom));
        for (index, row) in rows.iter().enumerate() {
            row.draw(&mut canvas, &x, top + ROW * (index as f64 + 0.5));
        }
        let words =
            format!("{} From the worst shortfall to the largest excess; the marker is the median.", self.measure);
        let below = paragraph(&mut canvas, &words, (2.0 * MARGIN, bottom + 24.0), width - 4.0 * MARGIN);
        finish(canvas, &self.title, &self.description, width, below + MARGIN)
    }
}

fn ticks(rows: &[&SpreadRow]) -> Vec<f64> {
    let low = rows.iter().map(|row| row.low).fold(0.0, f64::min);
    let high = rows.iter().map(|row| row.high).fold(0.0, f64::max);
    if low == 0.0 && high == 0.0 { vec![-10.0, 0.0, 10.0] } else { round_ticks(low, high, 5) }
}

fn axes(canvas: &mut Canvas, ticks: &[f64], x: &impl Fn(f64) -> f64, (top, bottom): (f64, f64)) {
    for tick in ticks {
        let stroke = if *tick == 0.0 { Stroke::solid(INK, 1.2) } else { Stroke::solid(GRID, 0.8) };
        canvas.line((x(*tick), top), (x(*tick), bottom + 3.0), stroke);
        canvas.words(Words::new(format!("{} %", rounded_signed(*tick, 3)), (x(*tick), bottom + 13.0), Anchor::Middle));
    }
    let zero = x(0.0);
    canvas.words(Words::new("short (unsafe side)", (zero - 6.0, top - 10.0), Anchor::End).colour(QUIET));
    canvas.words(Words::new("generous", (zero + 6.0, top - 10.0), Anchor::Start).colour(QUIET));
}

impl SpreadRow {
    fn is_finite(&self) -> bool {
        self.low.is_finite() && self.median.is_finite() && self.high.is_finite()
    }

    fn draw(&self, canvas: &mut Canvas, x: &impl Fn(f64) -> f64, y: f64) {
        let mut lines = wrap(&self.name, SMALL, false, NAMES);
        if lines.len() > 2 {
            let rest = lines.split_off(1).join(" ");
            lines.push(shorten(&rest, SMALL, false, NAMES));
        }
        let first = y - 6.5 * (lines.len() as f64 - 1.0);
        for (index, line) in lines.into_iter().enumerate() {
            let at = (2.0 * MARGIN, first + 13.0 * index as f64);
            canvas.words(Words::new(line, at, Anchor::Start));
        }
        let (low, high) = (x(self.low), x(self.high));
        let (zero, thick) = (x(0.0), 9.0);
        if self.low < 0.0 {
            let end = high.min(zero);
            canvas.bar((low, y - thick / 2.0), (end - low, thick), Fill::plain(signed_colour(-0.55)));
        }
        if self.high > 0.0 {
            let start = low.max(zero);
            canvas.bar((start, y - thick / 2.0), (high - start, thick), Fill::plain(signed_colour(0.55)));
        }
        canvas.disc((x(self.median), y), 5.4, Fill::plain(WHITE));
        canvas.marker((x(self.median), y), look(&self.method));
        canvas.words(Words::new(percent(self.low), (low - 8.0, y), Anchor::End).bold());
        canvas.words(Words::new(percent(self.high), (high + 8.0, y), Anchor::Start).bold());
    }
}
