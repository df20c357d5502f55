//! The racking formula with drift from column axial strain.

use super::{chord, fit, racking, sheet};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Fit, ForceRows, Gives, Info, MemberRows, Method, Response, WorkRows, Worksheet};

/// The racking formula with drift from column axial strain: a bare frame is both in series.
///
/// # Formula
/// Drift = drift of [`super::racking::Racking`] + h x (area of the M / (E sum(A c^2)) diagram from the base to the storey's
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
/// B. Stafford Smith and A. Coull, Tall Building Structures, 1991 (formulas from memory, derived again).
#[derive(Debug, Clone, Copy)]
pub struct RackingChord;

impl Method for RackingChord {
    const INFO: Info = Info {
        id: "racking+chord",
        name: "racking formula with chord drift",
        source: "B. Stafford Smith and A. Coull, Tall Building Structures, 1991",
        assumptions: &[
            "Columns bend to an inflection point at mid-height, beams at mid-span; the first storey has formulas of its own.",
            "Columns stretch and shorten as the chords of a cantilever that takes the whole overturning moment.",
            "Member stiffnesses and column areas are known.",
        ],
        needs_sizes: true,
        gives: Gives::Drifts,
    };

    fn fit(frame: &Frame) -> Fit {
        fit::judge(racking::refusals(frame).into_iter().chain([fit::no_areas(frame)]), [racking::doubts(frame)])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(
        members: &MemberRows<W>,
        _work: &mut WorkRows<W>,
        forces: &mut ForceRows<W>,
    ) {
        for (storey, own) in forces.drift.iter_mut().enumerate() {
            racking::drift::<L, W>(members, storey).store(own);
        }
        chord::add::<L, W>(members, forces.drift);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let drifts = sheet::drifts(frame, response, "Drift = racking drift + chord drift.");
        let steps = racking::steps(frame).into_iter().chain(chord::steps(frame));
        Worksheet { steps: steps.chain(drifts).collect() }
    }
}
