//! Member forces in lane form.

use super::{ForceRows, MemberRows, Members, WorkRows};
use crate::lane::{Lane, Rows};

/// Member forces of `W` frames, stored like [`Members`]. Signs are those of the crate's table.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Forces<const W: usize> {
    /// Column moments at the foot, N m.
    pub column_foot: Rows<W>,
    /// Column moments at the head, N m.
    pub column_head: Rows<W>,
    /// Column axial forces, N.
    pub column_axial: Rows<W>,
    /// Beam moments at the left end, N m.
    pub beam_left: Rows<W>,
    /// Beam moments at the right end, N m.
    pub beam_right: Rows<W>,
    /// Storey drifts, m; relative where the frame's sizes are.
    pub drift: Rows<W>,
}

impl<const W: usize> Forces<W> {
    /// Room for the forces of `members`, all zero.
    pub fn for_members(members: &Members<W>) -> Self {
        let columns = Rows::zeros(members.storeys * members.lines());
        let beams = Rows::zeros(members.storeys * members.bays);
        Self {
            column_foot: columns.clone(),
            column_head: columns.clone(),
            column_axial: columns,
            beam_left: beams.clone(),
            beam_right: beams,
            drift: Rows::zeros(members.storeys),
        }
    }
}

/// Scratch numbers a method may use. Their contents mean nothing between calls.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Work<const W: usize> {
    /// One number per column line.
    pub line: Rows<W>,
    /// One number per bay.
    pub bay: Rows<W>,
    /// One number per joint, stored like the columns under the joints, in three sets.
    pub joint: [Rows<W>; 3],
    /// One number per storey, in four sets.
    pub storey: [Rows<W>; 4],
}

impl<const W: usize> Work<W> {
    /// Scratch room for `members`.
    pub fn for_members(members: &Members<W>) -> Self {
        let (joint, storey) = (Rows::zeros(members.storeys * members.lines()), Rows::zeros(members.storeys));
        Self {
            line: Rows::zeros(members.lines()),
            bay: Rows::zeros(members.bays),
            joint: [joint.clone(), joint.clone(), joint],
            storey: [storey.clone(), storey.clone(), storey.clone(), storey],
        }
    }
}

/// Fills the column axial forces from the beam moments, floor by floor from the roof.
///
/// # Formula
/// N_i,j = N_i+1,j + S_right - S_left, with beam shear S = (M_left + M_right) / L: every joint's vertical
/// equilibrium (common practice).
///
/// # Units
/// N; tension positive.
#[inline(always)]
pub fn axial_from_beam_shears<L: Lane<W>, const W: usize>(
    members: &MemberRows<W>,
    work: &mut WorkRows<W>,
    forces: &mut ForceRows<W>,
) {
    for (width, per_width) in members.width.iter().zip(&mut *work.bay) {
        (L::splat(1.0) / L::load(width)).store(per_width);
    }
    let per_width = &work.bay[..members.bays];
    let beams = members.by_floor(forces.beam_left).zip(members.by_floor(forces.beam_right));
    let mut above: Option<&[[f64; W]]> = None;
    for ((left, right), own) in beams.zip(members.by_storey_mut(forces.column_axial)).rev() {
        let mut before = L::splat(0.0);
        for line in 0..members.lines() {
            let mut force = -before;
            if line < members.bays {
                before = (L::load(&left[line]) + L::load(&right[line])) * L::load(&per_width[line]);
                force = force + before;
            }
            if let Some(above) = above {
                force = force + L::load(&above[line]);
            }
            force.store(&mut own[line]);
        }
        above = Some(own);
    }
}
