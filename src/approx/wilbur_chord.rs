//! Wilbur's storey stiffnesses with drift from column axial strain.

use super::{chord, fit, sheet, wilbur};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Fit, ForceRows, Gives, Info, MemberRows, Method, Response, WorkRows, Worksheet};

/// Wilbur's storey stiffnesses with drift from column axial strain: a bare frame is both in series.
///
/// # Formula
/// Drift = drift of [`super::wilbur::Wilbur`] + h x (area of the M / (E sum(A c^2)) diagram from the base to the storey's
/// mid-height); M = overturning moment of the forces above, straight between floors, c = distance of a column from the
/// centroid of the areas.
///
/// # Units
/// N, m.
///
/// # Assumptions
/// Those of the formula for bending; the columns take the whole overturning moment by axial forces in proportion to A c.
/// Frames without areas are refused.
///
/// # References
/// formulas attributed to J. B. Wilbur; chord drift after B. Stafford Smith and A. Coull, Tall Building Structures, 1991 (Wilbur's formulas read, the chord part from memory).
#[derive(Debug, Clone, Copy)]
pub struct WilburChord;

impl Method for WilburChord {
    const INFO: Info = Info {
        id: "wilbur+chord",
        name: "Wilbur's storey stiffness with chord drift",
        source: "formulas attributed to J. B. Wilbur; chord drift after B. Stafford Smith and A. Coull, Tall Building Structures, 1991",
        assumptions: &[
            "Neighbouring storeys carry about the same shear; feet are fixed.",
            "Columns stretch and shorten as the chords of a cantilever that takes the whole overturning moment.",
            "Member stiffnesses and column areas are known.",
        ],
        needs_sizes: true,
        gives: Gives::Drifts,
    };

    fn fit(frame: &Frame) -> Fit {
        fit::judge(wilbur::refusals(frame).into_iter().chain([fit::no_areas(frame)]), [wilbur::doubts(frame)])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        wilbur::drifts::<L, W>(members, work, forces.drift);
        chord::add::<L, W>(members, forces.drift);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let drifts = sheet::drifts(frame, response, "Drift = V / R + chord drift.");
        let steps = wilbur::steps(frame).into_iter().chain(chord::steps(frame));
        Worksheet { steps: steps.chain(drifts).collect() }
    }
}
