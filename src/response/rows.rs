//! The rows of members, forces and scratch numbers taken out of their stores, once per call of a method.
//!
//! A method sees slices and numbers only: where they stand is then known in registers, and is not looked up again at every
//! number.

use super::{Forces, Members, Work};
use std::slice::{ChunksExact, ChunksExactMut};

/// The rows of [`Members`]; see there for each.
#[derive(Debug, Clone, Copy)]
pub struct MemberRows<'a, const W: usize> {
    /// Number of storeys.
    pub storeys: usize,
    /// Number of bays.
    pub bays: usize,
    /// Storey heights, m.
    pub height: &'a [[f64; W]],
    /// Bay widths, m.
    pub width: &'a [[f64; W]],
    /// Column line positions from line A, m.
    pub position: &'a [[f64; W]],
    /// Storey shears, N.
    pub shear: &'a [[f64; W]],
    /// Column areas, in any one unit.
    pub area: &'a [[f64; W]],
    /// E I/h of each column, N m.
    pub column_stiffness: &'a [[f64; W]],
    /// E I/L of each beam, N m.
    pub beam_stiffness: &'a [[f64; W]],
    /// E A of each column, N.
    pub axial_stiffness: &'a [[f64; W]],
    /// Foot fixity of the whole frame.
    pub foot_fixity: [f64; W],
    /// Height of the ground storey's assumed inflection point over the storey height.
    pub ground_hinge: [f64; W],
}

/// The rows of [`Forces`]; see there for each.
#[derive(Debug)]
pub struct ForceRows<'a, const W: usize> {
    /// Column moments at the foot, N m.
    pub column_foot: &'a mut [[f64; W]],
    /// Column moments at the head, N m.
    pub column_head: &'a mut [[f64; W]],
    /// Column axial forces, N.
    pub column_axial: &'a mut [[f64; W]],
    /// Beam moments at the left end, N m.
    pub beam_left: &'a mut [[f64; W]],
    /// Beam moments at the right end, N m.
    pub beam_right: &'a mut [[f64; W]],
    /// Storey drifts, m.
    pub drift: &'a mut [[f64; W]],
}

/// The rows of [`Work`]; see there for each.
#[derive(Debug)]
pub struct WorkRows<'a, const W: usize> {
    /// One number per column line.
    pub line: &'a mut [[f64; W]],
    /// One number per bay.
    pub bay: &'a mut [[f64; W]],
    /// One number per joint, in three sets.
    pub joint: [&'a mut [[f64; W]]; 3],
    /// One number per storey, in four sets.
    pub storey: [&'a mut [[f64; W]]; 4],
}

impl<const W: usize> Members<W> {
    /// The rows.
    #[inline(always)]
    pub fn rows(&self) -> MemberRows<'_, W> {
        MemberRows {
            storeys: self.storeys,
            bays: self.bays,
            height: &self.height,
            width: &self.width,
            position: &self.position,
            shear: &self.shear,
            area: &self.area,
            column_stiffness: &self.column_stiffness,
            beam_stiffness: &self.beam_stiffness,
            axial_stiffness: &self.axial_stiffness,
            foot_fixity: self.foot_fixity,
            ground_hinge: self.ground_hinge,
        }
    }
}

impl<const W: usize> Forces<W> {
    /// The rows.
    #[inline(always)]
    pub fn rows(&mut self) -> ForceRows<'_, W> {
        ForceRows {
            column_foot: &mut self.column_foot,
            column_head: &mut self.column_head,
            column_axial: &mut self.column_axial,
            beam_left: &mut self.beam_left,
            beam_right: &mut self.beam_right,
            drift: &mut self.drift,
        }
    }
}

impl<const W: usize> Work<W> {
    /// The rows.
    #[inline(always)]
    pub fn rows(&mut self) -> WorkRows<'_, W> {
        let ([k, l, m], [a, b, c, d]) = (&mut self.joint, &mut self.storey);
        WorkRows { line: &mut self.line, bay: &mut self.bay, joint: [k, l, m], storey: [a, b, c, d] }
    }
}

impl<'a, const W: usize> MemberRows<'a, W> {
    /// The same rows of a frame whose number of bays is known where the code is compiled.
    #[inline(always)]
    pub(super) fn of_bays<const BAYS: usize>(self) -> Self {
        Self { bays: BAYS, ..self }
    }

    /// Index of the column in `storey` on `line`.
    #[inline(always)]
    pub fn column(&self, storey: usize, line: usize) -> usize {
        storey * (self.bays + 1) + line
    }

    /// Index of the beam at `floor` in `bay`.
    #[inline(always)]
    pub fn beam(&self, floor: usize, bay: usize) -> usize {
        floor * self.bays + bay
    }

    /// Number of column lines.
    #[inline(always)]
    pub fn lines(&self) -> usize {
        self.bays + 1
    }

    /// The part of a row of columns that belongs to `storey`.
    #[inline(always)]
    pub fn columns_of<'b>(&self, row: &'b [[f64; W]], storey: usize) -> &'b [[f64; W]] {
        &row[self.column(storey, 0)..][..self.lines()]
    }

    /// The part of a row of columns that belongs to `storey`, to be written.
    #[inline(always)]
    pub fn columns_of_mut<'b>(&self, row: &'b mut [[f64; W]], storey: usize) -> &'b mut [[f64; W]] {
        &mut row[self.column(storey, 0)..][..self.lines()]
    }

    /// The part of a row of beams that belongs to `floor`.
    #[inline(always)]
    pub fn beams_of<'b>(&self, row: &'b [[f64; W]], floor: usize) -> &'b [[f64; W]] {
        &row[self.beam(floor, 0)..][..self.bays]
    }

    /// The part of a row of beams that belongs to `floor`, to be written.
    #[inline(always)]
    pub fn beams_of_mut<'b>(&self, row: &'b mut [[f64; W]], floor: usize) -> &'b mut [[f64; W]] {
        &mut row[self.beam(floor, 0)..][..self.bays]
    }

    /// A row of columns storey by storey.
    #[inline(always)]
    pub fn by_storey<'b>(&self, row: &'b [[f64; W]]) -> ChunksExact<'b, [f64; W]> {
        row.chunks_exact(self.lines())
    }

    /// A row of columns storey by storey, to be written.
    #[inline(always)]
    pub fn by_storey_mut<'b>(&self, row: &'b mut [[f64; W]]) -> ChunksExactMut<'b, [f64; W]> {
        row.chunks_exact_mut(self.lines())
    }

    /// A row of beams floor by floor.
    #[inline(always)]
    pub fn by_floor<'b>(&self, row: &'b [[f64; W]]) -> ChunksExact<'b, [f64; W]> {
        row.chunks_exact(self.bays)
    }

    /// A row of beams floor by floor, to be written.
    #[inline(always)]
    pub fn by_floor_mut<'b>(&self, row: &'b mut [[f64; W]]) -> ChunksExactMut<'b, [f64; W]> {
        row.chunks_exact_mut(self.bays)
    }
}
