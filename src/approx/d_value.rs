//! The D-value method.

mod inflection;
mod worksheet;

use super::group::{self, Group};
use super::{fit, march, sums};
use crate::frame::{Frame, line_name};
use crate::lane::{Lane, reciprocals};
use crate::response::{
    Caution, Fit, ForceRows, Gives, Info, MemberRows, Members, Method, Response, Work, WorkRows, Worksheet,
};
use inflection::Storey;
use std::ops::Add;

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

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        prepare::<L, W>(members, work);
        for storey in 0..members.storeys {
            let columns = Columns::of(members, &work.joint, storey);
            let height = L::load(&members.height[storey]);
            let mut stiffnesses = Stiffnesses { columns, height, found: work.line, sum: L::splat(0.0) };
            group::all(members.lines(), &mut stiffnesses);
            let found = L::load(&members.shear[storey]) / stiffnesses.sum;
            found.store(&mut forces.drift[storey]);
            let mut moments = Moments {
                columns,
                stiffness: work.line,
                inflection: Storey::of(members, work.storey[0], storey),
                scale: -(found * height),
                foot: members.columns_of_mut(forces.column_foot, storey),
                head: members.columns_of_mut(forces.column_head, storey),
            };
            group::all(members.lines(), &mut moments);
        }
        march::forces_from_beam_stiffness::<L, W>(members, work, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        worksheet::worksheet(frame, response)
    }
}

/// Fills the joint sets of `work` with the sum of E I/L of the beams at every joint and one over it, and the first storey
/// set with the right sides of the standard frame.
#[inline(always)]
fn prepare<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>) {
    let [beams, per_beams, _] = &mut work.joint;
    sums::joint_beams::<L, W>(members, beams);
    // One by one, so that equal beams give equal numbers, and no correction for unequal ones.
    for (beams, per_beams) in beams.iter().zip(per_beams.iter_mut()) {
        (L::splat(1.0) / L::load(beams)).store(per_beams);
    }
    inflection::right_sides::<L, W>(members, work.storey[0]);
}

/// A column and the beams at its ends.
#[derive(Clone, Copy)]
struct Ends<L> {
    /// E I/h of the column, k.
    column: L,
    /// Sum of E I/L of the beams at the foot and at the head; in the ground storey those at the head twice, so that their mean
    /// over k is K throughout.
    beams: [L; 2],
    /// One over each.
    per_beams: [L; 2],
}

impl<L: Copy + Add<Output = L>> Ends<L> {
    /// The beams at both ends, B.
    #[inline(always)]
    fn both(&self) -> L {
        self.beams[0] + self.beams[1]
    }
}

/// The columns of a storey with the beams at their ends.
#[derive(Clone, Copy)]
struct Columns<'a, const W: usize> {
    ground: bool,
    /// Fixity of the feet.
    fixity: [f64; W],
    /// k of the columns.
    column: &'a [[f64; W]],
    /// Beams at foot and head, see [`Ends`].
    beams: [&'a [[f64; W]]; 2],
    /// One over each.
    per_beams: [&'a [[f64; W]]; 2],
}

impl<'a, const W: usize> Columns<'a, W> {
    /// The columns of `storey`, for which the sets of joints were prepared.
    #[inline(always)]
    fn of(members: &MemberRows<'a, W>, joints: &'a [&mut [[f64; W]]; 3], storey: usize) -> Self {
        let [beams, per_beams, _] = joints;
        let foot = storey.saturating_sub(1);
        Self {
            ground: storey == 0,
            fixity: members.foot_fixity,
            column: members.columns_of(members.column_stiffness, storey),
            beams: [members.columns_of(beams, foot), members.columns_of(beams, storey)],
            per_beams: [members.columns_of(per_beams, foot), members.columns_of(per_beams, storey)],
        }
    }

    /// The columns on `N` lines from `first`.
    #[inline(always)]
    fn ends<L: Lane<W>, const N: usize>(&self, first: usize) -> [Ends<L>; N] {
        let mut ends = [Ends { column: L::splat(0.0), beams: [L::splat(0.0); 2], per_beams: [L::splat(0.0); 2] }; N];
        let [foot, head] = self.beams.map(|row| &row[first..][..N]);
        let [per_foot, per_head] = self.per_beams.map(|row| &row[first..][..N]);
        let column = &self.column[first..][..N];
        for line in 0..N {
            ends[line] = Ends {
                column: L::load(&column[line]),
                beams: [L::load(&foot[line]), L::load(&head[line])],
                per_beams: [L::load(&per_foot[line]), L::load(&per_head[line])],
            };
        }
        ends
    }

    /// K of a column.
    #[inline(always)]
    fn ratio<L: Lane<W>>(&self, line: usize) -> L {
        let [ends]: [Ends<L>; 1] = self.ends(line);
        ends.both() / (L::splat(2.0) * ends.column)
    }

    /// a of `N` columns; with B the beams at both ends K = B / (2 k), so that K / (2 + K) = B / (4 k + B).
    #[inline(always)]
    fn reductions<L: Lane<W>, const N: usize>(&self, first: usize) -> [L; N] {
        let ends: [Ends<L>; N] = self.ends(first);
        let mut found = [L::splat(0.0); N];
        for line in 0..N {
            found[line] = L::splat(4.0) * ends[line].column + ends[line].both();
        }
        found = reciprocals(found);
        let fixity = L::load(&self.fixity);
        for line in 0..N {
            let (column, beams) = (ends[line].column, ends[line].both());
            found[line] = if self.ground {
                let (fixed, pinned) = ((column + beams) * found[line], L::splat(0.25) * beams / (column + beams));
                fixity * fixed + (L::splat(1.0) - fixity) * pinned
            } else {
                beams * found[line]
            };
        }
        found
    }

    /// D of `N` columns, N/m.
    #[inline(always)]
    fn sway_stiffnesses<L: Lane<W>, const N: usize>(&self, first: usize, height: L) -> [L; N] {
        let mut found: [L; N] = self.reductions(first);
        let column = &self.column[first..][..N];
        let scale = L::splat(12.0) / (height * height);
        for line in 0..N {
            found[line] = found[line] * L::load(&column[line]) * scale;
        }
        found
    }
}

/// Fills `found` with D of the columns of a storey, and adds them up.
struct Stiffnesses<'a, L, const W: usize> {
    columns: Columns<'a, W>,
    height: L,
    found: &'a mut [[f64; W]],
    sum: L,
}

impl<L: Lane<W>, const W: usize> Group for Stiffnesses<'_, L, W> {
    #[inline(always)]
    fn take<const N: usize>(&mut self, first: usize) {
        let found: [L; N] = self.columns.sway_stiffnesses(first, self.height);
        for (own, row) in found.iter().zip(&mut self.found[first..][..N]) {
            own.store(row);
            self.sum = self.sum + *own;
        }
    }
}

/// Fills the end moments of the columns of a storey; column shear = D x drift.
struct Moments<'a, L, const W: usize> {
    columns: Columns<'a, W>,
    stiffness: &'a [[f64; W]],
    inflection: Storey<'a, L, W>,
    /// -drift x height.
    scale: L,
    foot: &'a mut [[f64; W]],
    head: &'a mut [[f64; W]],
}

impl<L: Lane<W>, const W: usize> Group for Moments<'_, L, W> {
    #[inline(always)]
    fn take<const N: usize>(&mut self, first: usize) {
        let ends: [Ends<L>; N] = self.columns.ends(first);
        let parts = self.inflection.parts(&ends);
        let (foot, head) = (&mut self.foot[first..][..N], &mut self.head[first..][..N]);
        for line in 0..N {
            let whole = L::load(&self.stiffness[first + line]) * self.scale;
            let below = parts[line].sum();
            (whole * below).store(&mut foot[line]);
            (whole * (L::splat(1.0) - below)).store(&mut head[line]);
        }
    }
}

/// Columns outside the published tables.
fn low_ratio(frame: &Frame) -> Option<Caution> {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let work = &mut scratch.rows();
    prepare::<f64, 1>(members, work);
    let columns = &|storey| Columns::of(members, &work.joint, storey);
    let places = (0..frame.storeys()).flat_map(|storey| (0..frame.lines()).map(move |line| (storey, line)));
    let ratios = places.map(|(storey, line)| (columns(storey).ratio::<f64>(line), storey, line));
    let (lowest, storey, line) = ratios.min_by(|a, b| a.0.total_cmp(&b.0))?;
    let text = format!(
        "beam to column ratio K is {lowest:.2} at column {}, storey {}; the published tables begin at {LOWEST_RATIO}",
        line_name(line),
        storey + 1
    );
    (lowest < LOWEST_RATIO).then_some(Caution(text))
}
