//! What member sizes take from a frame's geometry and material, in lane form.

use crate::frame::sizes::{mean, median};
use crate::lane::Rows;

/// Heights, widths and modulus of `W` frames of equal shape, as the size model uses them.
#[derive(Debug, Clone, PartialEq)]
pub struct Geometry<const W: usize> {
    /// Modulus of elasticity E, N/m2.
    pub(super) modulus: [f64; W],
    /// E/h of each storey.
    pub(super) column: Rows<W>,
    /// (E/L) (L_mean/h_median) of each bay.
    pub(super) beam: Rows<W>,
    /// Natural logarithm of L/L_mean of each bay.
    pub(super) relative_width: Rows<W>,
}

impl Geometry<1> {
    /// The geometry of one frame.
    ///
    /// # Units
    /// Bay widths and storey heights in m, modulus in N/m2.
    ///
    /// # Assumptions
    /// All numbers are positive and finite, and there is at least one bay and one storey.
    pub fn of(bays: &[f64], storeys: &[f64], modulus: f64) -> Self {
        let (mean, median) = (mean(bays), median(storeys));
        Self {
            modulus: [modulus],
            column: storeys.iter().map(|height| [modulus / height]).collect(),
            beam: bays.iter().map(|width| [modulus / width * (mean / median)]).collect(),
            relative_width: bays.iter().map(|width| [libm::log(width / mean)]).collect(),
        }
    }
}

impl<const W: usize> Geometry<W> {
    /// Frames of one shape side by side, each with a geometry of its own.
    pub fn side_by_side(frames: [&Geometry<1>; W]) -> Self {
        Self {
            modulus: frames.map(|frame| frame.modulus[0]),
            column: gather(frames, |frame| &frame.column),
            beam: gather(frames, |frame| &frame.beam),
            relative_width: gather(frames, |frame| &frame.relative_width),
        }
    }
}

fn gather<const W: usize>(frames: [&Geometry<1>; W], values: fn(&Geometry<1>) -> &Rows<1>) -> Rows<W> {
    let count = frames.iter().map(|frame| values(frame).len()).min().unwrap_or(0);
    (0..count).map(|index| frames.map(|frame| values(frame)[index][0])).collect()
}
