//! Figures for reports: drawn once as SVG, turned into PNG on request.
//!
//! Every figure is a plain struct of numbers in N, m and words; [`Figure::svg`] draws it. The same struct gives the
//! same bytes on every machine: coordinates are whole tenths of a CSS pixel and text is measured with the fonts
//! embedded here, never with the system's.
//!
//! # Assumptions
//! White background. A number that is not finite is left out, and [`Svg::notes`] says what was left out.

mod axis;
mod canvas;
mod colour;
mod colour_bar;
mod elevation;
mod font;
mod grid;
mod legend;
mod look;
mod moments;
mod number;
mod panel;
mod place;
mod plan;
mod plan_marks;
mod png;
mod profiles;
mod spread;
mod svg;

pub use colour::{Colour, INK, SERIES, contrast_on_white, signed_colour};
pub use elevation::{Elevation, Shade, colour_limit};
pub use font::text_width;
pub use grid::{FootKind, Grid};
pub use look::{EXACT_METHODS, Look, Marker, QUICK_METHODS, look};
pub use moments::{EndMoments, MomentDiagram, OutlineMoments};
pub use number::{percent, three_figures};
pub use png::{PngError, png};
pub use profiles::{Panel, Profiles, Series};
pub use spread::{Spread, SpreadRow};
pub use svg::Svg;

/// A picture that can be drawn as SVG.
pub trait Figure {
    /// Draws the figure.
    fn svg(&self) -> Svg;
}
