//! The portal method.

use super::{march, range_fit, sheet};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{Amount, Fit, ForceRows, Gives, Info, MemberRows, Method, Response, WorkRows, Worksheet};

/// The portal method: interior columns take twice the shear of the end columns.
///
/// # Formula
/// With m bays and storey shear V: column shear = V / (2 m) in end columns, V / m in interior columns. Inflection points
/// at mid-height of columns (ground storey on pinned feet: at the foot) and mid-span of beams; beam moments joint by
/// joint from the left; axial forces from beam shears.
///
/// # Assumptions
/// Foot springs are treated as fixed feet and cautioned about. Exact for inextensible frames whose interior columns are
/// twice as stiff (I/h) as the end ones and whose beams of a floor have equal I/L, but for the inflection heights.
///
/// # References
/// A. Smith, 1915; R. Fleming, 1913 (attributions; from memory).
#[derive(Debug, Clone, Copy)]
pub struct Portal;

impl Method for Portal {
    const INFO: Info = Info {
        id: "portal",
        name: "portal method",
        source: "A. Smith, 1915; also attributed to R. Fleming, 1913",
        assumptions: &[
            "Interior columns take twice the shear of the two end columns.",
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
        let bays = members.bays as f64;
        for (line, share) in work.line.iter_mut().enumerate() {
            let end = line == 0 || line == members.bays;
            *share = [if end { 0.5 / bays } else { 1.0 / bays }; W];
        }
        march::forces_from_shares::<L, W>(members, work, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let rule = "Each end column counts as one part of the storey shear V, each interior column as two: \
                    with m bays, V / (2 m) and V / m.";
        let part = |line| if frame.is_end_line(line) { 1.0 } else { 2.0 };
        sheet::shear_share_sheet(frame, response, rule, sheet::Part { head: "parts", amount: Amount::Ratio }, &part)
    }
}
