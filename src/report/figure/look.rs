//! One look for each method through every report: colour, dash and marker, never colour alone.

use super::colour::{Colour, INK, QUIET, SERIES};

/// Shape of the points of a series.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Marker {
    /// No marker.
    Bare,
    /// Filled circle.
    Disc,
    /// Circle.
    Circle,
    /// Filled square.
    Square,
    /// Square.
    OpenSquare,
    /// Filled diamond.
    Diamond,
    /// Diamond.
    OpenDiamond,
    /// Filled triangle, point up.
    Up,
    /// Triangle, point up.
    OpenUp,
    /// Filled triangle, point down.
    Down,
    /// Triangle, point down.
    OpenDown,
    /// Diagonal cross.
    Cross,
    /// Upright cross.
    Plus,
}

/// How a method's line is drawn.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Look {
    /// Colour of line and marker.
    pub colour: Colour,
    /// Line width, CSS px.
    pub width: f64,
    /// Dash and gap lengths in CSS px; empty means solid.
    pub dash: &'static [f64],
    /// Shape of the points.
    pub marker: Marker,
}

/// Methods whose results stand for the truth: black.
pub const EXACT_METHODS: [&str; 4] = ["slope-deflection", "stiffness", "second-order", "assumed-exact"];

/// Quick methods, in the order of the result files.
pub const QUICK_METHODS: [&str; 10] = [
    "portal",
    "portal-tributary",
    "cantilever",
    "factor",
    "d-value",
    "substitute-frame",
    "racking",
    "wilbur",
    "racking+chord",
    "wilbur+chord",
];

const THICK: f64 = 2.5;
const THIN: f64 = 1.7;
const BLUE: Colour = SERIES[0];
const VERMILLION: Colour = SERIES[1];
const GREEN: Colour = SERIES[2];
const PURPLE: Colour = SERIES[3];

/// The look of a method by its name in the files; a name that is not listed gets a thin grey line without markers.
pub fn look(method: &str) -> Look {
    let (colour, width, dash, marker): (Colour, f64, &'static [f64], Marker) = match method {
        "slope-deflection" => (INK, THICK, &[], Marker::Disc),
        "stiffness" => (INK, THICK, &[], Marker::Square),
        "second-order" => (INK, THICK, &[12.0, 4.0], Marker::Up),
        "assumed-exact" => (INK, THICK, &[5.0, 3.0], Marker::Diamond),
        "portal" => (BLUE, THIN, &[7.0, 3.0], Marker::Circle),
        "portal-tributary" => (BLUE, THIN, &[2.0, 2.5], Marker::OpenDiamond),
        "cantilever" => (VERMILLION, THIN, &[9.0, 3.0, 2.0, 3.0], Marker::OpenSquare),
        "factor" => (GREEN, THIN, &[12.0, 3.0], Marker::OpenUp),
        "d-value" => (PURPLE, THIN, &[4.0, 2.5], Marker::OpenDown),
        "substitute-frame" => (VERMILLION, THIN, &[2.0, 2.5], Marker::Cross),
        "racking" => (BLUE, THIN, &[5.0, 2.0], Marker::Square),
        "wilbur" => (GREEN, THIN, &[5.0, 2.0], Marker::Up),
        "racking+chord" => (BLUE, THIN, &[9.0, 2.5, 2.0, 2.5], Marker::Plus),
        "wilbur+chord" => (GREEN, THIN, &[9.0, 2.5, 2.0, 2.5], Marker::Down),
        _ => (QUIET, 1.2, &[], Marker::Bare),
    };
    Look { colour, width, dash, marker }
}
