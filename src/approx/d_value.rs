//! The D-value method.

mod inflection;
mod worksheet;

use super::{fit, march, sums};
use crate::frame::{Frame, line_name};
use crate::lane::Lane;
use crate::response::{Caution, Fit, Forces, Gives, Info, Members, Method, Response, Work, Worksheet};

/// The lowest beam to column ratio K of the published tables (from memory).
const LOWEST_RATIO: f64 = 0.1;

/// The D-value method: storey shear shared by sway stiffness, inflection heights from standard frames.
///
/// # Formula
/// D = a 12 (E I/h) / h^2; column shear = V D / sum(D); drift = V / sum(D). With K = (sum of E I/L of the beams at both
/// ends) / (2 E I/h) a = K / (2 + K); in the ground storey K = (beams at the head) / (E I/h), a = (0.5 + K) / (2 + K) on
/// fixed and 0.5 K / (1 + 2 K) on pinned feet. Inflection point at y h, y = y0 + y1 + y2 + y3; M_foot = -shear y h,
/// M_head = -shear (1 - y) h; beam end moments balance the columns of each joint, shared by E I/L.
///
/// y0: inflection height of the *standard frame*, all storeys alike with this column's K, under this frame's storey shears:
/// 6 K theta_i + (theta_i - theta_{i-1}) + (theta_i - theta_{i+1}) = (V_i + V_{i+1}) / 2, y0 = 1/2 + (theta_i - theta_{i-1}) / V_i.
/// With lam(K) = 1 + 3 K - root((1 + 3 K)^2 - 1), B_t and B_b the ratio (beams above, below) / (E I/h) and mu = lam / (1 - lam):
/// y1 = (1/B_t - 1/B_b) / 6 / (1 + mu(B_t) + mu(B_b)), 0 in the ground storey; y2 = (h_above/h - 1) lam/2, 0 in the top
/// storey; y3 = -(h_below/h - 1) lam/2, 0 in the ground storey. On pinned feet y = 0 in the ground storey.
///
/// # Units
/// N, m.
///
/// # Assumptions
/// Columns above and below a column, and the beams at them, resemble its own. Published tables give y0 to y3 rounded to
/// 0.05 for uniform, triangular and top loading on fixed feet; here they are computed. For pinned feet the standard frame
/// is pinned too (derived for this project). Foot springs are refused. No column axial strain.
///
/// # References
/// K. Muto, 1933 and 1956; Aseismic Design Analysis of Buildings, 1974 (from memory; y0 compared with a published table,
/// the closed forms derived for this project).
#[derive(Debug, Clone, Copy)]
pub struct DValue;

impl Method for DValue {
    const INFO: Info = Info {
        id: "d-value",
        name: "D-value method",
        source: "K. Muto, 1933 and 1956; Aseismic Design Analysis of Buildings, 1974",
        assumptions: &[
            "Columns share the storey shear by their stiffness against drift, estimated from the beams at their ends.",
            "Each column bends as in a frame of equal storeys with its own ratio of beam to column stiffness; corrections \
             for unequal beams and heights add up.",
            "Beams at a joint share its moment by E I / L.",
            "Member stiffnesses are known; columns do not stretch or shorten.",
        ],
        needs_sizes: true,
        gives: Gives::Both,
    };

    fn fit(frame: &Frame) -> Fit {
        let refusals = [fit::springs(frame), fit::loose_joint(frame)];
        fit::judge(refusals, [low_ratio(frame), fit::slender_drift(frame)])
    }

    fn respond<L: Lane<W>, const W: usize>(members: &Members<W>, work: &mut Work<W>, forces: &mut Forces<W>) {
        for storey in 0..members.storeys {
            let mut sum = L::splat(0.0);
            for line in 0..members.lines() {
                let stiffness: L = sway_stiffness(members, storey, line);
                stiffness.store(&mut work.line[line]);
                sum = sum + stiffness;
            }
            (L::load(&members.shear[storey]) / sum).store(&mut forces.drift[storey]);
            let turning: L = sums::turning(members, storey);
            for line in 0..members.lines() {
                let part = turning * (L::load(&work.line[line]) / sum);
                let below = inflection::parts::<L, W>(members, work, storey, line).sum();
                (-(part * below)).store(&mut forces.column_foot[members.column(storey, line)]);
                let above = L::splat(1.0) - below;
                (-(part * above)).store(&mut forces.column_head[members.column(storey, line)]);
            }
        }
        march::forces_from_beam_stiffness::<L, W>(members, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        worksheet::worksheet(frame, response)
    }
}

/// E I/L of the beams at the foot and at the head of a column; in the ground storey those at the head twice, so that
/// their mean over E I/h is K throughout.
fn beams_at_ends<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> [L; 2] {
    [storey.saturating_sub(1), storey].map(|floor| sums::joint_beams(members, floor, line))
}

/// K of a column.
fn ratio<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> L {
    let [below, above] = beams_at_ends::<L, W>(members, storey, line);
    (below + above) / (L::splat(2.0) * sums::column(members, storey, line))
}

/// a of a column.
fn reduction<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> L {
    let ratio: L = ratio(members, storey, line);
    let [half, one, two] = [0.5, 1.0, 2.0].map(L::splat);
    if storey > 0 {
        return ratio / (two + ratio);
    }
    let fixity = L::load(&members.foot_fixity);
    fixity * ((half + ratio) / (two + ratio)) + (one - fixity) * (half * ratio / (one + two * ratio))
}

/// D of a column, N/m.
fn sway_stiffness<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> L {
    let height = L::load(&members.height[storey]);
    let column: L = sums::column(members, storey, line);
    reduction::<L, W>(members, storey, line) * L::splat(12.0) * column / (height * height)
}

/// Columns outside the published tables.
fn low_ratio(frame: &Frame) -> Option<Caution> {
    let members = &Members::of(frame);
    let places = (0..frame.storeys()).flat_map(|storey| (0..frame.lines()).map(move |line| (storey, line)));
    let ratios = places.map(|(storey, line)| (ratio::<f64, 1>(members, storey, line), storey, line));
    let (lowest, storey, line) = ratios.min_by(|a, b| a.0.total_cmp(&b.0))?;
    let text = format!(
        "beam to column ratio K is {lowest:.2} at column {}, storey {}; the published tables begin at {LOWEST_RATIO}",
        line_name(line),
        storey + 1
    );
    (lowest < LOWEST_RATIO).then_some(Caution(text))
}
