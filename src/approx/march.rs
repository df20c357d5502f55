//! Steps that several quick methods share: from shear shares to moments, along a floor from the left, and joint by joint.

use crate::lane::Lane;
use crate::response::{Forces, Members, Work, axial_from_beam_shears};

/// Height of the assumed inflection point over the storey height.
pub(super) fn hinge<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize) -> L {
    if storey == 0 { L::load(&members.ground_hinge) } else { L::splat(0.5) }
}

/// Fills all forces from the share of the storey shear that each column line takes, given in `work.line`.
///
/// # Formula
/// Column shear = share x V; M_foot = -shear y h, M_head = -shear (1 - y) h with the inflection point at y h; beams from
/// the left with equal end moments, see [`beams_from_left`].
pub(super) fn forces_from_shares<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    work: &Work<W>,
    forces: &mut Forces<W>,
) {
    for storey in 0..members.storeys {
        let moment = L::load(&members.shear[storey]) * L::load(&members.height[storey]);
        let below: L = hinge(members, storey);
        let above = L::splat(1.0) - below;
        for (line, share) in work.line.iter().enumerate() {
            let column = members.column(storey, line);
            let total = L::load(share) * moment;
            (-(total * below)).store(&mut forces.column_foot[column]);
            (-(total * above)).store(&mut forces.column_head[column]);
        }
    }
    for floor in 0..members.storeys {
        beams_from_left::<L, W>(members, forces, floor);
    }
    axial_from_beam_shears::<L, W>(members, forces);
}

/// Fills the beam moments of a floor from the column moments.
///
/// # Formula
/// M_left = M_right = -(column end moments at the left joint) - M_right of the bay before. The last joint closes where
/// the column moments were chosen for it; the statics check shows it.
fn beams_from_left<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>, floor: usize) {
    let mut before = L::splat(0.0);
    for bay in 0..members.bays {
        let moment = -column_moments_at_joint::<L, W>(members, forces, floor, bay) - before;
        moment.store(&mut forces.beam_left[members.beam(floor, bay)]);
        moment.store(&mut forces.beam_right[members.beam(floor, bay)]);
        before = moment;
    }
}

/// Sum of the column end moments at the joint of `floor` on `line`.
pub(super) fn column_moments_at_joint<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    forces: &Forces<W>,
    floor: usize,
    line: usize,
) -> L {
    let below = L::load(&forces.column_head[members.column(floor, line)]);
    match floor + 1 < members.storeys {
        true => below + L::load(&forces.column_foot[members.column(floor + 1, line)]),
        false => below,
    }
}

/// Turns weights, given in the places of the beam end moments, into end moments that balance every joint; then fills the
/// axial forces.
///
/// # Formula
/// M = -(column end moments at the joint) x weight / (weights of the beam ends at the joint).
pub(super) fn forces_from_weights<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>) {
    for floor in 0..members.storeys {
        for line in 0..members.lines() {
            let left = (line > 0).then(|| members.beam(floor, line.wrapping_sub(1)));
            let right = (line < members.bays).then(|| members.beam(floor, line));
            let weight =
                |beam: Option<usize>, weights: &[[f64; W]]| beam.map_or(L::splat(0.0), |beam| L::load(&weights[beam]));
            let weights = weight(left, &forces.beam_right) + weight(right, &forces.beam_left);
            let each = -column_moments_at_joint::<L, W>(members, forces, floor, line) / weights;
            if let Some(beam) = left {
                (L::load(&forces.beam_right[beam]) * each).store(&mut forces.beam_right[beam]);
            }
            if let Some(beam) = right {
                (L::load(&forces.beam_left[beam]) * each).store(&mut forces.beam_left[beam]);
            }
        }
    }
    axial_from_beam_shears::<L, W>(members, forces);
}

/// Fills the beam moments from the column moments, shared at every joint by beam stiffness; then the axial forces.
pub(super) fn forces_from_beam_stiffness<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>) {
    forces.beam_left.copy_from_slice(&members.beam_stiffness);
    forces.beam_right.copy_from_slice(&members.beam_stiffness);
    forces_from_weights::<L, W>(members, forces);
}
