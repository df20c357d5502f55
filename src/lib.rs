//! How far a quick lateral analysis of a moment frame can be trusted.
//!
//! A structural engineer sizes a moment frame with the portal or cantilever method before any member is known, or
//! checks one that somebody else has sized. This crate runs the quick methods beside exact analyses of the same
//! frame and states the error of every member force, on which side it lies, and where a method suffices.
//!
//! # Flow
//! text of a frame file -> [`frame::Frame`] -> [`response::Response`], one per method -> errors and verdicts ->
//! dataset -> files, text and page. Many frames at once: draw numbers -> [`response::Members`], four frames side by side ->
//! [`response::Forces`] -> what a [`family::batch::Reducer`] makes of them. Modules use each other in one direction: units and
//! progress, frame, lane, response, solve, exact and approx, compare, family, report, store.
//!
//! # Words
//! *Storey* i lies between two floors, *floor* i on top of storey i, 1 = lowest; the top floor is the *roof*. *Bays*
//! are counted from the left; *column lines* are A, B, C ... (I and O left out, then AA), a bay is `A-B`. A column has
//! a *foot* and a *head*. The outermost lines are *end* lines, the rest *interior*. *Drift* is the movement of a floor
//! relative to the floor below, *sway* relative to the ground. In code all indices count from 0.
//!
//! # Signs and units
//! | quantity | positive where | unit inside |
//! |---|---|---|
//! | lateral force, drift, sway | to the right | N, m |
//! | member end moment | clockwise on the member end | N m |
//! | column shear | it resists load to the right | N |
//! | column axial force | tension | N |
//! | beam shear | it lifts the left joint | N |
//!
//! The column shears of a storey add up to the storey shear V; with loads to the right the column end moments are
//! negative and add up to -V h. Beam shear = (M_left + M_right) / L. Floors are rigid in their own plane: one sway per
//! floor.
//!
//! # Example
//! ```
//! use swaybound::compare::verdict::Subject;
//! use swaybound::compare::{Options, compare};
//! use swaybound::frame::options::AnalysisOptions;
//! use swaybound::frame::{Feet, Frame, FrameParts, Section, SizeSource};
//!
//! // Two storeys of 3.5 m, two bays of 6 m, one size of column and beam.
//! let frame = Frame::new(FrameParts {
//!     title: "Sketch".into(),
//!     report_units: Default::default(),
//!     bays: vec![6.0, 6.0],
//!     storeys: vec![3.5, 3.5],
//!     feet: Feet::Fixed,
//!     modulus: 30e9,
//!     columns: vec![Section { inertia: 2.1e-3, area: Some(0.16) }; 6],
//!     beams: vec![Section { inertia: 1.8e-3, area: None }; 4],
//!     lateral: vec![20e3, 30e3],
//!     sizes: SizeSource::Stated,
//! })?;
//! let found = compare(&frame, &AnalysisOptions::plain(&frame), Options::default())?;
//! let best = found.ranked(Subject::ColumnMoments)[0];
//! println!("{}: {:.0} % of the storey's largest", best.method, best.lowest.percent);
//! assert!(found.statics.iter().all(|(_, statics)| statics.closes()));
//! # Ok::<(), Box<dyn std::error::Error>>(())
//! ```
pub mod approx;
pub mod compare;
pub mod exact;
pub mod family;
pub mod frame;
pub mod lane;
pub mod progress;
pub mod report;
pub mod response;
pub mod solve;
pub mod store;
pub mod units;
