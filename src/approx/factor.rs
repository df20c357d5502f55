//! The factor method.

use super::{fit, march, sheet, sums};
use crate::frame::{Feet, Frame};
use crate::lane::{Lane, invert};
use crate::response::{
    Amount, Caution, Fit, ForceRows, Gives, Info, MemberRows, Members, Method, Response, Step, Work, WorkRows,
    Worksheet, axial_from_beam_shears,
};

/// The factor method: slope-deflection with the rotations estimated joint by joint.
///
/// # Formula
/// With k = E I/h of columns and E I/L of beams, at every joint g = (sum of column k) / (sum of all k) and c = 1 - g; at a
/// fixed foot c = 1. Beam factor of an end = (g there + g at the other end / 2) k, column factor of an end =
/// (c there + c at the other end / 2) k. Column end moment = column factor x A, A = V h / (sum of the column factors of
/// the storey); beam end moment = beam factor x B, B = (column end moments at the joint) / (beam factors at the joint).
///
/// # Units
/// N m; A is a rotation, B as well.
///
/// # Assumptions
/// The joints around a joint turn as much as it does and neighbouring storeys lean equally. So shear shares are exact
/// where all joints of a floor have equal g. Pinned feet are an extension derived for this project, c = -c_above / 2 at
/// the foot, under which **the design moments of storey 2 come out too small, by a factor of 1.3 to 1.6 in the median**
/// and up to 2.5 with flexible beams.
/// Foot springs are refused. No column axial strain.
///
/// # References
/// J. B. Wilbur, 1934; C. H. Norris and J. B. Wilbur, Elementary Structural Analysis, 2nd ed., 1960 (the rules read in a
/// published source, the citation from memory).
#[derive(Debug, Clone, Copy)]
pub struct Factor;

impl Method for Factor {
    const INFO: Info = Info {
        id: "factor",
        name: "factor method",
        source: "J. B. Wilbur, 1934; C. H. Norris and J. B. Wilbur, Elementary Structural Analysis, 2nd ed., 1960",
        assumptions: &[
            "The joints around a joint turn as much as the joint itself.",
            "Neighbouring storeys lean equally.",
            "Member stiffnesses are known; columns do not stretch or shorten.",
        ],
        needs_sizes: true,
        gives: Gives::Forces,
    };

    fn fit(frame: &Frame) -> Fit {
        let text = "on pinned feet the design moments of storey 2 come out too small, by a factor of 1.3 to 1.6 in the \
                    median and up to 2.5 with flexible beams: do not use them. Pinned feet are an extension of the published rules";
        let pinned = *frame.feet() == Feet::Pinned && frame.storeys() > 1;
        fit::judge([fit::springs(frame), fit::loose_joint(frame)], [pinned.then(|| Caution(text.into()))])
    }

    #[inline(always)]
    fn respond<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>, forces: &mut ForceRows<W>) {
        joints::<L, W>(members, work);
        let [g, c, _] = &work.joint;
        columns::<L, W>(members, c, forces);
        for floor in 0..members.storeys {
            march::beams_from_weights::<L, W>(members, floor, &BeamFactors::of(members, g, floor), forces);
        }
        axial_from_beam_shears::<L, W>(members, work, forces);
    }

    fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
        worksheet(frame, response)
    }
}

/// Fills the first two joint sets of `work` with g and c.
#[inline(always)]
fn joints<L: Lane<W>, const W: usize>(members: &MemberRows<W>, work: &mut WorkRows<W>) {
    let [g, c, per_all] = &mut work.joint;
    sums::joint_columns::<L, W>(members, g);
    sums::joint_beams::<L, W>(members, c);
    for floor in 0..members.storeys {
        let (g, c) = (members.columns_of_mut(g, floor), members.columns_of_mut(c, floor));
        let per_all = members.columns_of_mut(per_all, floor);
        for line in 0..members.lines() {
            (L::load(&g[line]) + L::load(&c[line])).store(&mut per_all[line]);
        }
        invert::<L, W>(per_all);
        for line in 0..members.lines() {
            let per_all = L::load(&per_all[line]);
            (L::load(&g[line]) * per_all).store(&mut g[line]);
            (L::load(&c[line]) * per_all).store(&mut c[line]);
        }
    }
}

/// Fills the column end moments: factor x A.
#[inline(always)]
fn columns<L: Lane<W>, const W: usize>(members: &MemberRows<W>, c: &[[f64; W]], forces: &mut ForceRows<W>) {
    let moments = members.by_storey_mut(forces.column_foot).zip(members.by_storey_mut(forces.column_head));
    for (storey, (foot, head)) in moments.enumerate() {
        let factors = ColumnFactors::of(members, c, storey);
        let mut sum = L::splat(0.0);
        for line in 0..members.lines() {
            let [at_foot, at_head]: [L; 2] = factors.at(line);
            sum = sum + at_foot + at_head;
        }
        let scale = -(sums::turning::<L, W>(members, storey) / sum);
        for line in 0..members.lines() {
            let [at_foot, at_head]: [L; 2] = factors.at(line);
            (at_foot * scale).store(&mut foot[line]);
            (at_head * scale).store(&mut head[line]);
        }
    }
}

/// The column factors of a storey.
struct ColumnFactors<'a, const W: usize> {
    /// c of the joints at the feet; none in the ground storey.
    foot: Option<&'a [[f64; W]]>,
    /// c of the joints at the heads.
    head: &'a [[f64; W]],
    /// k.
    stiffness: &'a [[f64; W]],
    /// Fixity of the ground storey's feet.
    fixity: [f64; W],
}

impl<'a, const W: usize> ColumnFactors<'a, W> {
    #[inline(always)]
    fn of(members: &MemberRows<'a, W>, c: &'a [[f64; W]], storey: usize) -> Self {
        Self {
            foot: if storey > 0 { Some(members.columns_of(c, storey - 1)) } else { None },
            head: members.columns_of(c, storey),
            stiffness: members.columns_of(members.column_stiffness, storey),
            fixity: members.foot_fixity,
        }
    }

    /// Column factors at foot and head.
    #[inline(always)]
    fn at<L: Lane<W>>(&self, line: usize) -> [L; 2] {
        let head = L::load(&self.head[line]);
        let foot = if let Some(foot) = self.foot {
            L::load(&foot[line])
        } else {
            let fixity = L::load(&self.fixity);
            fixity - (L::splat(1.0) - fixity) * head * L::splat(0.5)
        };
        let stiffness = L::load(&self.stiffness[line]);
        [with_half_of_other(foot, head) * stiffness, with_half_of_other(head, foot) * stiffness]
    }
}

/// The beam factors of a floor.
struct BeamFactors<'a, const W: usize> {
    /// g of the joints.
    joints: &'a [[f64; W]],
    /// k.
    stiffness: &'a [[f64; W]],
}

impl<'a, const W: usize> BeamFactors<'a, W> {
    #[inline(always)]
    fn of(members: &MemberRows<'a, W>, g: &'a [[f64; W]], floor: usize) -> Self {
        let stiffness = members.beams_of(members.beam_stiffness, floor);
        Self { joints: members.columns_of(g, floor), stiffness }
    }

    /// Beam factor of the end on line `near`.
    #[inline(always)]
    fn end<L: Lane<W>>(&self, bay: usize, near: usize, far: usize) -> L {
        with_half_of_other(L::load(&self.joints[near]), L::load(&self.joints[far])) * L::load(&self.stiffness[bay])
    }
}

impl<L: Lane<W>, const W: usize> march::Weights<L> for BeamFactors<'_, W> {
    #[inline(always)]
    fn left(&self, bay: usize) -> L {
        self.end(bay, bay, bay + 1)
    }
    #[inline(always)]
    fn right(&self, bay: usize) -> L {
        self.end(bay, bay + 1, bay)
    }
}

#[inline(always)]
fn with_half_of_other<L: Lane<W>, const W: usize>(near: L, far: L) -> L {
    near + far * L::splat(0.5)
}

fn worksheet(frame: &Frame, response: &Response) -> Worksheet {
    let frame_members = Members::of(frame);
    let (members, mut scratch) = (&frame_members.rows(), Work::for_members(&frame_members));
    let work = &mut scratch.rows();
    let (amount, unit) = sheet::stiffness(frame);
    joints::<f64, 1>(members, work);
    let [g_of, c_of, _] = &work.joint;
    let g = |floor, line| g_of[members.column(floor, line)][0];
    let column = |end: usize| move |storey, line| ColumnFactors::of(members, c_of, storey).at::<f64>(line)[end] / unit;
    let beam = |end: usize| {
        move |floor, bay| {
            let (near, far) = (bay + end, bay + 1 - end);
            BeamFactors::of(members, g_of, floor).end::<f64>(bay, near, far) / unit
        }
    };
    let sum = |storey| (0..frame.lines()).map(|line| column(0)(storey, line) + column(1)(storey, line)).sum::<f64>();
    let turning = |storey: usize| frame.storey_shear(storey) * frame.storey_height(storey);
    let steps = vec![
        sheet::storey_shears(frame),
        sheet::column_stiffnesses(frame),
        sheet::beam_stiffnesses(frame),
        joint_factors(frame, &g),
        sheet::by_line_ends(
            frame,
            "Column factors",
            "Factor of an end = (c there + half of c at the other end) × k.",
            amount,
            [&column(0), &column(1)],
        ),
        sheet::by_storey(
            frame,
            "Factor A of each storey",
            "A = V h / sum of the column factors of the storey, both ends of all columns.",
            &[
                ("V h", Amount::Moment, &turning),
                ("sum of column factors", amount, &sum),
                ("A", sheet::per_stiffness(frame), &|storey| turning(storey) / sum(storey)),
            ],
        ),
        sheet::column_end_moments(frame, response, "Column end moment = column factor × A of the storey."),
        sheet::by_bay_ends(
            frame,
            "Beam factors",
            "Factor of an end = (g there + half of g at the other end) × k.",
            amount,
            [&beam(0), &beam(1)],
        ),
        sheet::beam_end_moments(
            frame,
            response,
            "Beam end moment = beam factor × B, B = sum of the column end moments at the joint / sum of the beam factors \
             at the joint.",
        ),
    ];
    Worksheet { steps: steps.into_iter().chain(sheet::shears_and_axial_forces(frame, response)).collect() }
}

fn joint_factors(frame: &Frame, g: &dyn Fn(usize, usize) -> f64) -> Step {
    let pinned = *frame.feet() == Feet::Pinned;
    let foot = if pinned { "at a pinned foot −(c at the head) / 2" } else { "at a fixed foot 1" };
    let rule = format!("g = sum of column k at the joint / sum of all k at the joint. c = 1 − g; {foot}.");
    sheet::by_joint(frame, "Joint factors g", &rule, Amount::Ratio, g)
}
