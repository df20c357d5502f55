//! The substitute frame.

use super::chain::{self, Chain};
use super::{fit, march, sheet, sums};
use crate::frame::{Feet, Frame};
use crate::lane::Lane;
use crate::response::{Amount, Fit, Forces, Gives, Info, Members, Method, Response, Step, Work, Worksheet};

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

    fn respond<L: Lane<W>, const W: usize>(members: &Members<W>, work: &mut Work<W>, forces: &mut Forces<W>) {
        solve::<L, W>(members, work);
        let half = L::splat(0.5);
        for storey in 0..members.storeys {
            let column: L = sums::storey_columns(members, storey);
            let turning: L = sums::turning(members, storey);
            let difference = chain::difference(members, &work.storey[0], storey, column, turning);
            let (foot, head) = (turning * half + difference, turning * half - difference);
            for line in 0..members.lines() {
                let share = sums::column::<L, W>(members, storey, line) / column;
                (-(foot * share)).store(&mut forces.column_foot[members.column(storey, line)]);
                (-(head * share)).store(&mut forces.column_head[members.column(storey, line)]);
            }
            // theta_head - (theta_head - theta_foot) / 2 is the mean rotation, whatever the feet.
            let lean =
                L::load(&work.storey[0][storey]) - half * difference / column + turning / (L::splat(12.0) * column);
            (lean * L::load(&members.height[storey])).store(&mut forces.drift[storey]);
        }
        march::forces_from_beam_stiffness::<L, W>(members, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        worksheet(frame, response)
    }
}

/// Rotations of the floors into the first storey set of `work`.
fn solve<L: Lane<W>, const W: usize>(members: &Members<W>, work: &mut Work<W>) {
    let frame = Chain {
        column: |storey| sums::storey_columns::<L, W>(members, storey),
        spring: |floor| L::splat(12.0) * sums::floor_beams::<L, W>(members, floor),
        turning: |storey| sums::turning::<L, W>(members, storey),
    };
    chain::solve(members, &mut work.storey, &frame);
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
    let members = &Members::of(frame);
    let mut work = Work::for_members(members);
    solve::<f64, 1>(members, &mut work);
    let turns = &work.storey[0];
    let (amount, unit) = sheet::stiffness(frame);
    let columns = |storey: usize| sums::storey_columns::<f64, 1>(members, storey);
    let turning = |storey: usize| sums::turning::<f64, 1>(members, storey);
    let below = |storey: usize| {
        turns[storey][0] - chain::difference(members, turns, storey, columns(storey), turning(storey)) / columns(storey)
    };
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
        ("12 G", amount, &|floor| 12.0 * sums::floor_beams::<f64, 1>(members, floor) / unit),
        ("right side", Amount::Moment, &right),
        ("θ", sheet::per_stiffness(frame), &|floor| turns[floor][0] * unit),
        ("θ below", sheet::per_stiffness(frame), &|storey| below(storey) * unit),
    ];
    sheet::by_storey(frame, "Rotations θ of the floors, each on top of its storey", &rule, &columns_shown)
}
