//! The portal method with shears by tributary width.

use super::{march, range_fit, sheet};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Amount, Fit, ForceRows, Gives, Info, MemberRows, Method, Response, WorkRows, Worksheet};

/// The portal method in its variant for unequal bays: each column takes shear in proportion to its tributary width.
///
/// # Formula
/// Column shear = V b / W, b = half the bay on the left plus half the bay on the right, W = total width. The rest as in
/// the portal method.
///
/// # Assumptions
/// Foot springs are treated as fixed feet and cautioned about. Interior columns carry no axial force.
///
/// # References
/// A variant found in textbooks beside the portal method of A. Smith, 1915 (common practice).
#[derive(Debug, Clone, Copy)]
pub struct PortalTributary;

impl Method for PortalTributary {
    const INFO: Info = Info {
        id: "portal-tributary",
        name: "portal method by tributary width",
        source: "variant of the portal method (A. Smith, 1915) for unequal bays, common practice",
        assumptions: &[
            "Columns take shear in proportion to half the bays beside them.",
            "Columns bend to an inflection point at mid-height; in the ground storey on pinned feet, at the foot.",
            "Beams bend to an inflection point at mid-span.",
        ],
        needs_sizes: false,
        gives: Gives::Forces,
    };

    fn fit(frame: &Frame) -> Fit {
        range_fit(frame, 25, 4.0, [])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        let position = members.position;
        let share_per_width = L::splat(0.5) / L::load(&position[members.bays]);
        for (line, share) in work.line.iter_mut().enumerate() {
            let left = L::load(&position[line.saturating_sub(1)]);
            let right = L::load(&position[(line + 1).min(members.bays)]);
            ((right - left) * share_per_width).store(share);
        }
        march::forces_from_shares::<L, W>(members, work, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let rule = "Each column takes the storey shear V in proportion to its tributary width b: \
                    half the bay on its left plus half the bay on its right.";
        let width = |bay: usize| if bay < frame.bays() { frame.bay_width(bay) } else { 0.0 };
        let tributary = |line: usize| 0.5 * (width(line) + if line > 0 { width(line - 1) } else { 0.0 });
        sheet::shear_share_sheet(frame, response, rule, sheet::Part { head: "b", amount: Amount::Length }, &tributary)
    }
}
