//! The racking formula for storey drift.

use super::{fit, sheet, sums};
use crate::frame::{Feet, Frame};
use crate::lane::Lane;
use crate::response::{
    Amount, Caution, Fit, ForceRows, Gives, Info, MemberRows, Members, Method, Response, Step, WorkRows, Worksheet,
};

/// Beam over column stiffness under which the first-storey formula for fixed feet is markedly short.
pub(super) const FLEXIBLE: f64 = 0.5;

/// Storey drift from the bending of columns and beams, inflection points at mid-height and mid-span.
///
/// # Formula
/// With C = sum of E I/h of a storey and G = sum of E I/L of its top floor: drift = (V h^2 / 12)(1/C + 1/G). First storey on
/// fixed feet: (V h^2 / 12)(2/(3 G) + 1/C) / (1 + C/(6 G)); on pinned feet: (V h^2 / 12)(3/(2 G) + 4/C).
///
/// # Units
/// N, m.
///
/// # Assumptions
/// Storeys above and below are alike and the joints of a floor turn by one angle: exact for an interior storey of a
/// uniform tall frame with equal rotations. The first storey of tall uniform frames comes out short on fixed feet (by 32, 9
/// and 2 % at a beam over column stiffness of 0.2, 0.8 and 2), over on pinned ones (by 10, 2 and 1 %). Foot springs are
/// refused. No column axial strain.
///
/// # References
/// B. Stafford Smith and A. Coull, Tall Building Structures, 1991 (from memory, derived again).
#[derive(Debug, Clone, Copy)]
pub struct Racking;

impl Method for Racking {
    const INFO: Info = Info {
        id: "racking",
        name: "racking formula",
        source: "B. Stafford Smith and A. Coull, Tall Building Structures, 1991",
        assumptions: &[
            "Columns bend to an inflection point at mid-height, beams at mid-span; the first storey has formulas of its own.",
            "The storeys above and below are alike.",
            "Member stiffnesses are known; columns do not stretch or shorten.",
        ],
        needs_sizes: true,
        gives: Gives::Drifts,
    };

    fn fit(frame: &Frame) -> Fit {
        fit::judge(refusals(frame), [doubts(frame), fit::slender_drift(frame)])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(
        members: &MemberRows<W>,
        _work: &mut WorkRows<W>,
        forces: &mut ForceRows<W>,
    ) {
        for (storey, own) in forces.drift.iter_mut().enumerate() {
            drift::<L, W>(members, storey).store(own);
        }
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let drifts = sheet::drifts(frame, response, "Drift = the racking drift.");
        Worksheet { steps: steps(frame).into_iter().chain(drifts).collect() }
    }
}

/// Reasons to refuse that the formula has with or without a chord part.
pub(super) fn refusals(frame: &Frame) -> [Option<Caution>; 3] {
    [fit::relative_sizes(frame), fit::springs(frame), fit::loose_floor(frame)]
}

/// Reasons to doubt the formula itself.
pub(super) fn doubts(frame: &Frame) -> Option<Caution> {
    let ratio = beams_to_columns(frame);
    let text = format!(
        "on fixed feet the formula makes the drift of the first storey too small where beams are flexible: 2 G/C is \
         {ratio:.2} there; at 0.5 a tall frame's first storey is short by 15 %, at 0.2 by 32 %"
    );
    (*frame.feet() == Feet::Fixed && frame.storeys() > 1 && ratio < FLEXIBLE).then_some(Caution(text))
}

/// 2 G/C of the lowest storey: 1 in one bay of equal stiffness, where C is twice that of a column and G that of the beam.
pub(super) fn beams_to_columns(frame: &Frame) -> f64 {
    let frame_members = Members::of(frame);
    let members = &frame_members.rows();
    let (columns, beams): (f64, f64) = (sums::storey_columns(members, 0), sums::floor_beams(members, 0));
    2.0 * beams / columns
}

/// Racking drift of a storey.
#[inline(always)]
pub(super) fn drift<L: Lane<W>, const W: usize>(members: &MemberRows<W>, storey: usize) -> L {
    let height = L::load(&members.height[storey]);
    let (columns, beams): (L, L) = (sums::storey_columns(members, storey), sums::floor_beams(members, storey));
    let flexibility = if storey > 0 {
        L::splat(1.0) / columns + L::splat(1.0) / beams
    } else {
        let fixity = L::load(&members.foot_fixity);
        let fixed = (L::splat(2.0 / 3.0) + beams / columns) / (beams + columns * L::splat(1.0 / 6.0));
        let pinned = L::splat(1.5) / beams + L::splat(4.0) / columns;
        fixity * fixed + (L::splat(1.0) - fixity) * pinned
    };
    L::load(&members.shear[storey]) * height * height * L::splat(1.0 / 12.0) * flexibility
}

/// The racking part of a hand calculation.
pub(super) fn steps(frame: &Frame) -> [Step; 5] {
    let frame_members = Members::of(frame);
    let members = &frame_members.rows();
    let first = match frame.feet() {
        Feet::Pinned => "(V h² / 12)(3 / (2 G) + 4 / C)",
        _ => "(V h² / 12)(2 / (3 G) + 1 / C) / (1 + C / (6 G))",
    };
    [
        sheet::storey_shears(frame),
        sheet::column_stiffnesses(frame),
        sheet::beam_stiffnesses(frame),
        sheet::storey_stiffnesses(frame),
        sheet::by_storey(
            frame,
            "Racking drift",
            &format!("(V h² / 12)(1 / C + 1 / G); first storey: {first}."),
            &[
                ("V", Amount::Force, &|storey| frame.storey_shear(storey)),
                ("racking drift", Amount::Movement, &|storey| drift::<f64, 1>(members, storey)),
            ],
        ),
    ]
}
