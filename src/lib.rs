//! How far a quick lateral analysis of a moment frame can be trusted.
//!
//! A structural engineer sizes a moment frame with the portal or cantilever method before any member is known, or
//! checks one that somebody else has sized. This crate runs the quick methods beside exact analyses of the same
//! frame and states the error of every member force, on which side it lies, and where a method suffices.
//!
//! # Flow
//! text of a frame file -> [`frame::Frame`] -> [`response::Response`], one per method -> errors and verdicts ->
//! dataset -> files, text and page. A module may use only the ones before it in the list below.
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
pub mod approx;
pub mod compare;
pub mod exact;
pub mod frame;
pub mod lane;
pub mod report;
pub mod response;
pub mod solve;
pub mod store;
pub mod units;
