//! The frame as figures need it: widths, heights, feet and forces.

use crate::frame::{Feet, Frame};
use crate::units::Unit;

/// How the column feet are held against rotation.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum FootKind {
    /// No rotation.
    Fixed,
    /// Free rotation.
    Pinned,
    /// On rotational springs.
    Sprung,
}

/// The frame's elevation in numbers.
///
/// # Units
/// N and m; `length` and `force` are the units that the figure prints.
#[derive(Debug, Clone, PartialEq)]
pub struct Grid {
    /// Bay widths from the left, m.
    pub bays: Vec<f64>,
    /// Storey heights from the ground, m.
    pub storeys: Vec<f64>,
    /// How the columns are held at the ground.
    pub feet: FootKind,
    /// Lateral force at each floor from the lowest, to the right, N; empty: no arrows.
    pub lateral: Vec<f64>,
    /// Unit of printed lengths.
    pub length: Unit,
    /// Unit of printed forces.
    pub force: Unit,
}

impl Grid {
    /// The grid of a frame, in the frame's report units.
    pub fn of(frame: &Frame) -> Self {
        let parts = frame.parts();
        let feet = match parts.feet {
            Feet::Fixed => FootKind::Fixed,
            Feet::Pinned => FootKind::Pinned,
            Feet::Springs(_) => FootKind::Sprung,
        };
        let units = frame.report_units();
        Self {
            bays: parts.bays.clone(),
            storeys: parts.storeys.clone(),
            feet,
            lateral: parts.lateral.clone(),
            length: units.length(),
            force: units.force(),
        }
    }

    /// Number of column lines.
    pub(super) fn lines(&self) -> usize {
        self.bays.len() + 1
    }

    /// Number of members: columns and beams.
    pub(super) fn members(&self) -> usize {
        self.storeys.len() * (2 * self.bays.len() + 1)
    }
}
