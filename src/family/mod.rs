//! Frames like these: sizes drawn at random, many frames at a time.
//!
//! A draw is a pure function of seed, stream and draw number ([`Source`]), whichever thread or lane computes it and
//! whatever else is drawn. [`SizeDraws`] draws the sizes of one frame, `W` draws side by side; [`ModelDraws`] does so
//! for any [`Geometry`], also one that differs from lane to lane.

pub mod batch;
mod draws;
mod fault;
mod feet;
mod geometry;
mod model;
pub mod numbers;
mod philox;
mod term;
mod within;

pub use draws::SizeDraws;
pub use fault::DrawFault;
pub use geometry::Geometry;
pub use model::ModelDraws;
pub use numbers::Source;
pub use philox::philox;
pub use within::WithinDraws;

#[cfg(test)]
mod tests;
