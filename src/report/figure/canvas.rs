//! The one wrapper around the drawing library: takes CSS pixels and sets every stroke, fill and font itself.
//!
//! Shapes are recorded first and drawn at the end, so that a figure's size may depend on what it holds.

use super::colour::{Colour, INK};
use super::font::{CAPITAL, text_width};
use super::look::{Look, Marker};

/// A position in CSS px from the top left corner.
pub(super) type Point = (f64, f64);

/// A line's look: colour, width in CSS px, dash and gap lengths in CSS px (empty: solid).
#[derive(Debug, Clone, Copy)]
pub(super) struct Stroke {
    pub colour: Colour,
    pub width: f64,
    pub dash: &'static [f64],
}

impl Stroke {
    /// A solid line.
    pub fn solid(colour: Colour, width: f64) -> Self {
        Self { colour, width, dash: &[] }
    }

    /// The line of a method.
    pub fn of(look: Look) -> Self {
        Self { colour: look.colour, width: look.width, dash: look.dash }
    }
}

/// An area's look.
#[derive(Debug, Clone, Copy)]
pub(super) struct Fill {
    pub colour: Colour,
    pub outline: Option<Stroke>,
}

impl Fill {
    /// A fill without outline.
    pub fn plain(colour: Colour) -> Self {
        Self { colour, outline: None }
    }

    /// A fill with a solid outline.
    pub fn outlined(colour: Colour, outline: Colour, width: f64) -> Self {
        Self { colour, outline: Some(Stroke::solid(outline, width)) }
    }
}

/// Which point of the words stands at the given x.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Anchor {
    Start,
    Middle,
    End,
}

/// One line of words; `at.1` is the middle of its capitals.
#[derive(Debug, Clone)]
pub(super) struct Words {
    pub text: String,
    pub at: Point,
    pub size: f64,
    pub anchor: Anchor,
    pub colour: Colour,
    pub bold: bool,
    /// Turned to read upwards.
    pub upright: bool,
    /// A white edge, for words that may lie on lines.
    pub halo: bool,
}

/// Size of ordinary words, CSS px: the smallest that figures use.
pub(super) const SMALL: f64 = 11.0;
/// Size of headings, CSS px.
pub(super) const HEADING: f64 = 14.0;

impl Words {
    /// Small black words.
    pub fn new(text: impl Into<String>, at: Point, anchor: Anchor) -> Self {
        let text = text.into();
        Self { text, at, size: SMALL, anchor, colour: INK, bold: false, upright: false, halo: false }
    }

    pub fn colour(self, colour: Colour) -> Self {
        Self { colour, ..self }
    }

    pub fn bold(self) -> Self {
        Self { bold: true, ..self }
    }

    pub fn size(self, size: f64) -> Self {
        Self { size, ..self }
    }

    pub fn upright(self) -> Self {
        Self { upright: true, ..self }
    }

    pub fn halo(self) -> Self {
        Self { halo: true, ..self }
    }

    /// Width of the words, CSS px.
    pub fn width(&self) -> f64 {
        text_width(&self.text, self.size, self.bold)
    }
}

/// One recorded shape.
#[derive(Debug, Clone)]
pub(super) enum Shape {
    Bar { corner: Point, size: Point, fill: Fill },
    Area { points: Vec<Point>, fill: Fill },
    Path { points: Vec<Point>, stroke: Stroke },
    Disc { centre: Point, radius: f64, fill: Fill },
    Words(Words),
}

impl Shape {
    fn is_finite(&self) -> bool {
        let fine = |point: &Point| point.0.is_finite() && point.1.is_finite();
        match self {
            Self::Bar { corner, size, .. } => fine(corner) && fine(size),
            Self::Area { points, .. } | Self::Path { points, .. } => points.iter().all(fine),
            Self::Disc { centre, radius, .. } => fine(centre) && radius.is_finite(),
            Self::Words(words) => fine(&words.at),
        }
    }
}

/// Shapes in the order they are painted, and what had to be left out.
#[derive(Debug, Default)]
pub(super) struct Canvas {
    pub shapes: Vec<Shape>,
    pub notes: Vec<String>,
}

impl Canvas {
    fn push(&mut self, shape: Shape) {
        if shape.is_finite() {
            self.shapes.push(shape);
        } else if !self.notes.iter().any(|note| note == UNDRAWABLE) {
            self.notes.push(UNDRAWABLE.to_owned());
        }
    }

    /// Says what was left out.
    pub fn note(&mut self, note: String) {
        self.notes.push(note);
    }

    /// A filled rectangle.
    pub fn bar(&mut self, corner: Point, size: Point, fill: Fill) {
        self.push(Shape::Bar { corner, size, fill });
    }

    /// A filled polygon.
    pub fn area(&mut self, points: Vec<Point>, fill: Fill) {
        self.push(Shape::Area { points, fill });
    }

    /// A line through `points`.
    pub fn path(&mut self, points: Vec<Point>, stroke: Stroke) {
        if points.len() > 1 {
            self.push(Shape::Path { points, stroke });
        }
    }

    /// A straight line.
    pub fn line(&mut self, from: Point, to: Point, stroke: Stroke) {
        self.path(vec![from, to], stroke);
    }

    /// A filled circle.
    pub fn disc(&mut self, centre: Point, radius: f64, fill: Fill) {
        self.push(Shape::Disc { centre, radius, fill });
    }

    /// A line of words; empty words are not drawn.
    pub fn words(&mut self, words: Words) {
        if !words.text.is_empty() {
            self.push(Shape::Words(words));
        }
    }

    /// A marker of about 7 CSS px.
    pub fn marker(&mut self, at: Point, look: Look) {
        let open = Fill::outlined(super::colour::WHITE, look.colour, 1.3);
        let full = Fill::outlined(look.colour, look.colour, 1.3);
        let around = |corners: &[Point]| corners.iter().map(|(x, y)| (at.0 + x, at.1 + y)).collect::<Vec<_>>();
        let square = [(-2.8, -2.8), (2.8, -2.8), (2.8, 2.8), (-2.8, 2.8)];
        let diamond = [(0.0, -3.9), (3.9, 0.0), (0.0, 3.9), (-3.9, 0.0)];
        let up = [(0.0, -3.8), (3.6, 2.7), (-3.6, 2.7)];
        let down = [(0.0, 3.8), (3.6, -2.7), (-3.6, -2.7)];
        let stroke = Stroke::solid(look.colour, 1.6);
        match look.marker {
            Marker::Bare => {}
            Marker::Disc => self.disc(at, 2.9, full),
            Marker::Circle => self.disc(at, 2.9, open),
            Marker::Square => self.area(around(&square), full),
            Marker::OpenSquare => self.area(around(&square), open),
            Marker::Diamond => self.area(around(&diamond), full),
            Marker::OpenDiamond => self.area(around(&diamond), open),
            Marker::Up => self.area(around(&up), full),
            Marker::OpenUp => self.area(around(&up), open),
            Marker::Down => self.area(around(&down), full),
            Marker::OpenDown => self.area(around(&down), open),
            Marker::Cross => {
                self.path(around(&[(-3.2, -3.2), (3.2, 3.2)]), stroke);
                self.path(around(&[(-3.2, 3.2), (3.2, -3.2)]), stroke);
            }
            Marker::Plus => {
                self.path(around(&[(-3.8, 0.0), (3.8, 0.0)]), stroke);
                self.path(around(&[(0.0, -3.8), (0.0, 3.8)]), stroke);
            }
        }
    }
}

const UNDRAWABLE: &str = "A shape whose position is not a finite number was left out.";

/// Distance from the middle of the capitals down to the baseline, CSS px.
pub(super) fn baseline_drop(size: f64) -> f64 {
    CAPITAL / 2.0 * size
}
