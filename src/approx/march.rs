//! Steps that several quick methods share: from shear shares to moments, along a floor from the left, and joint by joint.

use super::sums;
use crate::lane::Lane;
use crate::response::{ForceRows, MemberRows, WorkRows, axial_from_beam_shears};

/// Height of the assumed inflection point over the storey height.
#[inline(always)]
pub(super) fn hinge<L: Lane<W>, const W: usize>(members: &MemberRows<W>, storey: usize) -> L {
    if storey == 0 { L::load(&members.ground_hinge) } else { L::splat(0.5) }
}

/// Fills all forces from the share of the storey shear that each column line takes, given in `work.line`.
///
/// # Formula
/// Column shear = share x V; M_foot = -shear y h, M_head = -shear (1 - y) h with the inflection point at y h; beams from
/// the left with equal end moments, see [`beams_from_left`].
#[inline(always)]
pub(super) fn forces_from_shares<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    work: &mut WorkRows<W>,
    forces: &mut ForceRows<W>,
) {
    let shares = &work.line[..members.lines()];
    let columns = members.by_storey_mut(forces.column_foot).zip(members.by_storey_mut(forces.column_head));
    for (storey, (foot, head)) in columns.enumerate() {
        let whole = -sums::turning::<L, W>(members, storey);
        let below: L = hinge(members, storey);
        let (at_foot, at_head) = (whole * below, whole * (L::splat(1.0) - below));
        for line in 0..members.lines() {
            let share = L::load(&shares[line]);
            (share * at_foot).store(&mut foot[line]);
            (share * at_head).store(&mut head[line]);
        }
    }
    beams_from_left::<L, W>(members, forces);
    axial_from_beam_shears::<L, W>(members, work, forces);
}

/// Fills the beam moments from the column moments, floor by floor.
///
/// # Formula
/// M_left = M_right = -(column end moments at the left joint) - M_right of the bay before. The last joint closes where
/// the column moments were chosen for it; the statics check shows it.
#[inline(always)]
fn beams_from_left<L: Lane<W>, const W: usize>(members: &MemberRows<W>, forces: &mut ForceRows<W>) {
    let beams = members.by_floor_mut(forces.beam_left).zip(members.by_floor_mut(forces.beam_right));
    for (floor, (left, right)) in beams.enumerate() {
        let columns = ColumnEnds::at(members, forces.column_foot, forces.column_head, floor);
        let mut before = L::splat(0.0);
        for bay in 0..members.bays {
            let moment = -columns.moments::<L>(bay) - before;
            moment.store(&mut left[bay]);
            moment.store(&mut right[bay]);
            before = moment;
        }
    }
}

/// The column ends at the joints of a floor.
struct ColumnEnds<'a, const W: usize> {
    /// Moments at the heads of the columns below.
    below: &'a [[f64; W]],
    /// Moments at the feet of the columns above; none at the roof.
    above: Option<&'a [[f64; W]]>,
}

impl<'a, const W: usize> ColumnEnds<'a, W> {
    #[inline(always)]
    fn at(members: &MemberRows<W>, foot: &'a [[f64; W]], head: &'a [[f64; W]], floor: usize) -> Self {
        let roof = floor + 1 == members.storeys;
        let above = if roof { None } else { Some(members.columns_of(foot, floor + 1)) };
        Self { below: members.columns_of(head, floor), above }
    }

    /// Sum of the column end moments at the joint on `line`.
    #[inline(always)]
    fn moments<L: Lane<W>>(&self, line: usize) -> L {
        let below = L::load(&self.below[line]);
        match self.above {
            Some(above) => below + L::load(&above[line]),
            None => below,
        }
    }
}

/// By what the two beam ends at the interior joints of a floor share its moment.
pub(super) trait Weights<L> {
    /// Weight of the left end of the beam in `bay`.
    fn left(&self, bay: usize) -> L;
    /// Weight of the right end.
    fn right(&self, bay: usize) -> L;
}

/// Fills the beam moments of a floor from the column moments so that every joint balances.
///
/// # Formula
/// M = -(column end moments at the joint) x weight / (weights of the beam ends at the joint); on the end lines the one beam
/// takes the whole.
#[inline(always)]
pub(super) fn beams_from_weights<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    floor: usize,
    weights: &impl Weights<L>,
    forces: &mut ForceRows<W>,
) {
    let columns = ColumnEnds::at(members, forces.column_foot, forces.column_head, floor);
    let left = members.beams_of_mut(forces.beam_left, floor);
    let right = members.beams_of_mut(forces.beam_right, floor);
    let last = members.bays - 1;
    (-columns.moments::<L>(0)).store(&mut left[0]);
    (-columns.moments::<L>(last + 1)).store(&mut right[last]);
    for bay in 1..members.bays {
        let (before, after) = (weights.right(bay - 1), weights.left(bay));
        let each = -columns.moments::<L>(bay) / (before + after);
        (before * each).store(&mut right[bay - 1]);
        (after * each).store(&mut left[bay]);
    }
}

/// Beam ends that share by E I/L, the far ends turning alike.
struct ByStiffness<'a, const W: usize>(&'a [[f64; W]]);

impl<L: Lane<W>, const W: usize> Weights<L> for ByStiffness<'_, W> {
    #[inline(always)]
    fn left(&self, bay: usize) -> L {
        L::load(&self.0[bay])
    }
    #[inline(always)]
    fn right(&self, bay: usize) -> L {
        L::load(&self.0[bay])
    }
}

/// Fills the beam moments from the column moments, shared at every joint by E I/L; then the axial forces.
#[inline(always)]
pub(super) fn forces_from_beam_stiffness<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    work: &mut WorkRows<W>,
    forces: &mut ForceRows<W>,
) {
    for floor in 0..members.storeys {
        let weights = ByStiffness(members.beams_of(members.beam_stiffness, floor));
        beams_from_weights::<L, W>(members, floor, &weights, forces);
    }
    axial_from_beam_shears::<L, W>(members, work, forces);
}
