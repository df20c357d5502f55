//! Wilbur's formulas for storey stiffness.

use super::{fit, racking, sheet, sums};
use crate::frame::Frame;
use crate::lane::Lane;
use crate::response::{
    Amount, Caution, Fit, ForceRows, Gives, Info, MemberRows, Members, Method, Response, Step, Work, WorkRows,
    Worksheet,
};

/// Storey drift by Wilbur's formulas for the stiffness of a storey.
///
/// # Formula
/// Drift = V / R. With C_i = sum of E I/h of storey i, G_i = sum of E I/L of its top floor:
/// R_1 = 48 / {h_1 [4 h_1/C_1 + (h_1 + h_2)/(G_1 + C_1/12)]};
/// R_2 = 48 / {h_2 [4 h_2/C_2 + (h_1 + h_2)/(G_1 + C_1/12) + (h_2 + h_3)/G_2]};
/// upper storeys R_n = 48 / {h_n [4 h_n/C_n + (h_m + h_n)/G_m + (h_n + h_o)/G_n]}, m below and o above n. In the top storey
/// 2 h_m stands for h_m, and h_o = 0; in a frame of one storey h_2 = 0.
///
/// # Units
/// N, m.
///
/// # Assumptions
/// Fixed feet: others are refused. Shears of neighbouring storeys are about equal, and the joints of a floor turn by one
/// angle. Exact for one storey with equal rotations. On tall uniform frames under constant shear with a beam over column
/// stiffness of 0.2, 0.8 and 2 the first storey is short by 12, 1 and 0 %, the top one over by 25, 21 and 14 %. No column
/// axial strain.
///
/// # References
/// J. B. Wilbur (the formulas read in a published source).
#[derive(Debug, Clone, Copy)]
pub struct Wilbur;

impl Method for Wilbur {
    const INFO: Info = Info {
        id: "wilbur",
        name: "Wilbur's storey stiffness",
        source: "formulas attributed to J. B. Wilbur",
        assumptions: &[
            "Neighbouring storeys carry about the same shear.",
            "All joints of a floor turn by one angle; feet are fixed.",
            "Member stiffnesses are known; columns do not stretch or shorten.",
        ],
        needs_sizes: true,
        gives: Gives::Drifts,
    };

    fn fit(frame: &Frame) -> Fit {
        fit::judge(refusals(frame), [fit::slender_drift(frame), doubts(frame)])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        drifts::<L, W>(members, work, forces.drift);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        let drifts = sheet::drifts(frame, response, "Drift = V / R.");
        Worksheet { steps: steps(frame).into_iter().chain(drifts).collect() }
    }
}

/// Reasons to doubt the formula itself.
pub(super) fn doubts(frame: &Frame) -> Option<Caution> {
    let ratio = racking::beams_to_columns(frame);
    let text = format!(
        "with flexible beams the formula makes the drift of the first storey too small and of upper storeys too large, far \
         too large in low frames: 2 G/C is {ratio:.2} at the ground; at 0.2 a tall uniform frame's first storey is short by \
         12 %, its top storey over by 25 %"
    );
    (frame.storeys() > 1 && ratio < racking::FLEXIBLE).then_some(Caution(text))
}

/// Reasons to refuse that the formulas have with or without a chord part.
pub(super) fn refusals(frame: &Frame) -> [Option<Caution>; 3] {
    [fit::relative_sizes(frame), fit::not_fixed(frame), fit::loose_floor(frame)]
}

/// Fills the drifts; the first two storey sets of `work` hold 1/C and 1/G'.
#[inline(always)]
pub(super) fn drifts<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    work: &mut WorkRows<W>,
    drift: &mut [[f64; W]],
) {
    let [per_columns, per_restraint, ..] = &mut work.storey;
    for storey in 0..members.storeys {
        (L::splat(1.0) / sums::storey_columns::<L, W>(members, storey)).store(&mut per_columns[storey]);
        (L::splat(1.0) / restraint::<L, W>(members, storey)).store(&mut per_restraint[storey]);
    }
    for (storey, drift) in drift.iter_mut().enumerate() {
        let flexibility: L = flexibility(members, per_columns, per_restraint, storey);
        (L::load(&members.shear[storey]) * flexibility).store(drift);
    }
}

/// 1/R of a storey, m/N.
#[inline(always)]
fn flexibility<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    per_columns: &[[f64; W]],
    per_restraint: &[[f64; W]],
    storey: usize,
) -> L {
    let height = members.height;
    let own = L::load(&height[storey]);
    let top = storey + 1 == members.storeys;
    let above = if top { L::splat(0.0) } else { L::load(&height[storey + 1]) };
    let mut sum = L::splat(4.0) * own * L::load(&per_columns[storey]);
    sum = sum + (own + above) * L::load(&per_restraint[storey]);
    if storey > 0 {
        let times = if top { L::splat(2.0) } else { L::splat(1.0) };
        sum = sum + (times * L::load(&height[storey - 1]) + own) * L::load(&per_restraint[storey - 1]);
    }
    own * sum * L::splat(1.0 / 48.0)
}

/// G' of a floor: G; at the first floor the fixed columns below help by C/12.
#[inline(always)]
fn restraint<L: Lane<W>, const W: usize>(members: &MemberRows<W>, floor: usize) -> L {
    let beams: L = sums::floor_beams(members, floor);
    if floor > 0 { beams } else { beams + sums::storey_columns::<L, W>(members, 0) * L::splat(1.0 / 12.0) }
}

/// The steps that give the drifts of these formulas.
pub(super) fn steps(frame: &Frame) -> [Step; 5] {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let (work, mut drift) = (&mut scratch.rows(), vec![[0.0]; frame.storeys()]);
    drifts::<f64, 1>(members, work, &mut drift);
    [
        sheet::storey_shears(frame),
        sheet::column_stiffnesses(frame),
        sheet::beam_stiffnesses(frame),
        sheet::storey_stiffnesses(frame),
        sheet::by_storey(
            frame,
            "Storey stiffness R",
            "R = 48 / {h [4 h / C + (h below + h) / G' below + (h + h above) / G']}, with G' = G, at the first floor G + C / \
             12 of storey 1. In storey 1 the middle term falls away; in the top storey put 2 h below for h below, and h \
             above = 0.",
            &[
                ("G'", Amount::Stiffness, &|floor| restraint::<f64, 1>(members, floor)),
                ("R", Amount::StoreyStiffness, &|storey| frame.storey_shear(storey) / drift[storey][0]),
                ("V / R", Amount::Movement, &|storey| drift[storey][0]),
            ],
        ),
    ]
}
