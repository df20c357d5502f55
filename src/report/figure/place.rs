//! Finding free places for labels among lines and other labels.

use super::canvas::{Anchor, Point, Words};

/// A rectangle in CSS px.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Rect {
    pub left: f64,
    pub top: f64,
    pub right: f64,
    pub bottom: f64,
}

impl Rect {
    /// The room that words take.
    pub fn of(words: &Words) -> Self {
        let (along, half) = (words.width(), 0.55 * words.size);
        let before = match words.anchor {
            Anchor::Start => 0.0,
            Anchor::Middle => along / 2.0,
            Anchor::End => along,
        };
        let (x, y) = words.at;
        if words.upright {
            Self { left: x - half, right: x + half, top: y + before - along, bottom: y + before }
        } else {
            Self { left: x - before, right: x - before + along, top: y - half, bottom: y + half }
        }
    }

    fn meets(&self, other: &Self, gap: f64) -> bool {
        self.left < other.right + gap
            && other.left < self.right + gap
            && self.top < other.bottom + gap
            && other.top < self.bottom + gap
    }

    fn holds(&self, (x, y): Point) -> bool {
        self.left <= x && x <= self.right && self.top <= y && y <= self.bottom
    }
}

/// What is already drawn: labels, and points along lines.
#[derive(Debug, Default)]
pub(super) struct Taken {
    labels: Vec<Rect>,
    points: Vec<Point>,
}

impl Taken {
    /// Keeps labels off the line from `from` to `to`.
    pub fn line(&mut self, from: Point, to: Point) {
        let steps = (f64::max((to.0 - from.0).abs(), (to.1 - from.1).abs()) / 4.0).ceil().clamp(1.0, 500.0) as usize;
        let at = |step: usize| {
            let share = step as f64 / steps as f64;
            (from.0 + share * (to.0 - from.0), from.1 + share * (to.1 - from.1))
        };
        self.points.extend((0..=steps).map(at));
    }

    /// Keeps labels off the area between the lines from `from` to `to` at their beginnings and at their ends.
    pub fn band(&mut self, from: [Point; 2], to: [Point; 2]) {
        let along = |ends: [Point; 2], share: f64| {
            (ends[0].0 + share * (ends[1].0 - ends[0].0), ends[0].1 + share * (ends[1].1 - ends[0].1))
        };
        let long = f64::max((from[1].0 - from[0].0).abs(), (from[1].1 - from[0].1).abs());
        let steps = (long / 5.0).ceil().clamp(1.0, 200.0);
        for step in 0..=steps as usize {
            let share = step as f64 / steps;
            self.line(along(from, share), along(to, share));
        }
    }

    /// Takes the room of `words` if it is free; `over_lines` allows lines beneath, never other labels.
    pub fn claim(&mut self, words: &Words, over_lines: bool) -> bool {
        let rect = Rect::of(words);
        let free = !self.labels.iter().any(|label| label.meets(&rect, 2.0))
            && (over_lines || !self.points.iter().any(|point| rect.holds(*point)));
        if free {
            self.labels.push(rect);
        }
        free
    }
}
