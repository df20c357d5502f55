//! The substitute frame.

use super::chain::Chain;
use super::{fit, march, sheet, sums};
use crate::frame::{Feet, Frame};
use crate::lane::Lane;
use crate::response::{
    Amount, Fit, ForceRows, Gives, Info, MemberRows, Members, Method, Response, Step, Work, WorkRows, Worksheet,
};

/// The substitute frame: all columns of a storey in one, all beams of a floor in one, joints of a floor turning alike.
///
/// # Formula
/// With C_i = sum of E I/h of storey i and G_i = sum of E I/L of floor i, at every floor
/// 12 G_i theta_i + C_i (theta_i - theta_{i-1}) + C_{i+1} (theta_i - theta_{i+1}) = (V_i h_i + V_{i+1} h_{i+1}) / 2;
/// drift = h (theta_i + theta_{i-1}) / 2 + V h^2 / (12 C). Moments of a storey: foot -V h/2 - C (theta_i - theta_{i-1}), head
/// -V h/2 + C (theta_i - theta_{i-1}), shared among the columns by E I/h; beam end moments balance the columns of each
/// joint, shared by E I/L. Feet with springs of sum S: (S + C_1) theta_0 - C_1 theta_1 = V_1 h_1 / 2; fixed feet
/// theta_0 = 0, pinned ones S = 0.
///
/// # Units
/// N, m, rad.
///
/// # Assumptions
/// All joints of a floor turn by one angle. Exact without axial strain for one symmetrical bay, and where every interior
/// column is twice as stiff as the end ones and the beams of a floor have equal E I/L (foot springs in proportion to
/// their columns). Foot springs enter by their sum. No column axial strain.
///
/// # References
/// L. E. Grinter, 1937; N. Naylor, 1950; E. Lightfoot, 1956-58 (attributions from memory, equations derived again).
#[derive(Debug, Clone, Copy)]
pub struct SubstituteFrame;

impl Method for SubstituteFrame {
    const INFO: Info = Info {
        id: "substitute-frame",
        name: "substitute frame",
        source: "L. E. Grinter, 1937; N. Naylor, 1950; E. Lightfoot, 1956-58",
        assumptions: &[
            "All joints of a floor turn by one angle.",
            "Columns of a storey share its moments by E I / h, beams at a joint by E I / L.",
            "Member stiffnesses are known; columns do not stretch or shorten.",
        ],
        needs_sizes: true,
        gives: Gives::Both,
    };

    fn fit(frame: &Frame) -> Fit {
        fit::judge([fit::loose_joint(frame)], [fit::slender_drift(frame)])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        let chain = solve::<L, W>(members, work);
        let half = L::splat(0.5);
        for storey in 0..members.storeys {
            let turning: L = sums::turning(members, storey);
            let difference: L = chain.difference(members, storey);
            let per_column = L::splat(1.0) / L::load(&chain.column[storey]);
            let at_foot = -((turning * half + difference) * per_column);
            let at_head = -((turning * half - difference) * per_column);
            let stiffness = members.columns_of(members.column_stiffness, storey);
            let foot = members.columns_of_mut(forces.column_foot, storey);
            let head = members.columns_of_mut(forces.column_head, storey);
            for line in 0..members.lines() {
                let own = L::load(&stiffness[line]);
                (at_foot * own).store(&mut foot[line]);
                (at_head * own).store(&mut head[line]);
            }
            // theta_head - (theta_head - theta_foot) / 2 is the mean rotation, whatever the feet.
            let bent = (turning * L::splat(1.0 / 12.0) - half * difference) * per_column;
            ((L::load(&chain.turns[storey]) + bent) * L::load(&members.height[storey]))
                .store(&mut forces.drift[storey]);
        }
        march::forces_from_beam_stiffness::<L, W>(members, work, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        worksheet(frame, response)
    }
}

/// The chain of the frame, solved.
#[inline(always)]
fn solve<'a, L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &'a mut WorkRows<'_, W>) -> Chain<'a, W> {
    let mut chain = Chain::in_sets(&mut work.storey);
    for storey in 0..members.storeys {
        sums::storey_columns::<L, W>(members, storey).store(&mut chain.column[storey]);
        (L::splat(12.0) * sums::floor_beams::<L, W>(members, storey)).store(&mut chain.spring[storey]);
    }
    chain.solve::<L>(members);
    chain
}

fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
    let sum = |storey: usize, head: bool| {
        -response.storey_columns(storey).iter().map(|column| if head { column.head } else { column.foot }).sum::<f64>()
    };
    let moments = [
        sheet::by_storey(
            frame,
            "Column moments of each storey",
            "Foot: V h / 2 + C (θ − θ below); head: V h / 2 − C (θ − θ below).",
            &[
                ("sum at heads", Amount::Moment, &|storey| sum(storey, true)),
                ("sum at feet", Amount::Moment, &|storey| sum(storey, false)),
            ],
        ),
        sheet::column_end_moments(frame, response, "Column end moment = moment of the storey × k / C."),
        sheet::beam_end_moments(
            frame,
            response,
            "Beam end moment = sum of the column end moments at the joint × k / (sum of beam k at the joint).",
        ),
    ];
    let sizes = [sheet::storey_shears(frame), sheet::column_stiffnesses(frame), sheet::beam_stiffnesses(frame)];
    let steps = sizes.into_iter().chain(sheet::foot_springs(frame)).chain([rotations(frame)]).chain(moments);
    let forces = steps.chain(sheet::shears_and_axial_forces(frame, response));
    let drifts = sheet::drifts(frame, response, "Drift = h × (mean of θ and θ below + V h / (12 C)).");
    Worksheet { steps: forces.chain(drifts).collect() }
}

/// The equations of the chain and their solution.
fn rotations(frame: &Frame) -> Step {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let work = &mut scratch.rows();
    let chain = solve::<f64, 1>(members, work);
    let (amount, unit) = sheet::stiffness(frame);
    let columns = |storey: usize| chain.column[storey][0];
    let turning = |storey: usize| sums::turning::<f64, 1>(members, storey);
    let below = |storey: usize| chain.turns[storey][0] - chain.difference::<f64>(members, storey) / columns(storey);
    let pinned = *frame.feet() == Feet::Pinned;
    let right = |storey: usize| {
        let above = if storey + 1 < frame.storeys() { turning(storey + 1) } else { 0.0 };
        0.5 * above + if storey == 0 && pinned { turning(0) } else { 0.5 * turning(storey) }
    };
    let feet = match frame.feet() {
        Feet::Fixed => "Fixed feet do not turn.",
        Feet::Pinned => {
            "Pinned feet: the row of floor 1 has no term of C below, and V h below counts in full; the feet turn by θ of \
             floor 1 + V h / (2 C)."
        }
        Feet::Springs(_) => "Feet: one more row, (S + C) θ of the feet − C θ of floor 1 = V h / 2.",
    };
    let rule = format!(
        "At the top floor of every storey: 12 G θ + C (θ − θ below) + C above × (θ − θ above) = right side = half of V h \
         below and above together. {feet} To check, put the rotations into each row."
    );
    let columns_shown: [sheet::StoreyColumn; 5] = [
        ("C", amount, &|storey| columns(storey) / unit),
        ("12 G", amount, &|floor| chain.spring[floor][0] / unit),
        ("right side", Amount::Moment, &right),
        ("θ", sheet::per_stiffness(frame), &|floor| chain.turns[floor][0] * unit),
        ("θ below", sheet::per_stiffness(frame), &|storey| below(storey) * unit),
    ];
    sheet::by_storey(frame, "Rotations θ of the floors, each on top of its storey", &rule, &columns_shown)
}
