//! Member forces in lane form.

use super::Members;
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
    /// One number per storey, in four sets.
    pub storey: [Rows<W>; 4],
}

impl<const W: usize> Work<W> {
    /// Scratch room for `members`.
    pub fn for_members(members: &Members<W>) -> Self {
        let storey = Rows::zeros(members.storeys);
        Self { line: Rows::zeros(members.lines()), storey: [storey.clone(), storey.clone(), storey.clone(), storey] }
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
pub fn axial_from_beam_shears<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &mut Forces<W>) {
    for storey in (0..members.storeys).rev() {
        let mut left_beam = L::splat(0.0);
        for line in 0..members.lines() {
            let above = match storey + 1 < members.storeys {
                true => L::load(&forces.column_axial[members.column(storey + 1, line)]),
                false => L::splat(0.0),
            };
            let right_beam = match line < members.bays {
                true => beam_shear(members, forces, storey, line),
                false => L::splat(0.0),
            };
            let axial = above + right_beam - left_beam;
            axial.store(&mut forces.column_axial[members.column(storey, line)]);
            left_beam = right_beam;
        }
    }
}

fn beam_shear<L: Lane<W>, const W: usize>(members: &Members<W>, forces: &Forces<W>, floor: usize, bay: usize) -> L {
    let beam = members.beam(floor, bay);
    (L::load(&forces.beam_left[beam]) + L::load(&forces.beam_right[beam])) / L::load(&members.width[bay])
}
