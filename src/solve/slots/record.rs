//! What the way up leaves for the way back.

use crate::lane::{Lane, Rows};

/// Most unknowns that one step eliminates.
pub(super) const WIDEST: usize = 3;

/// One row for each unknown in the order of elimination: the lowest storey, then level by level the joints and the storey
/// above them.
pub(super) struct Record<const W: usize> {
    /// Multipliers of the unknowns that follow, as many as a level has.
    multipliers: Rows<W>,
    /// The block's inverse times its right-hand side.
    right: Rows<W>,
    /// The inverse of the block that the unknown was eliminated with, [`WIDEST`] numbers a row; empty where nobody will
    /// bring another right-hand side.
    inverses: Rows<W>,
}

impl<const W: usize> Record<W> {
    /// Room for the multipliers of `stride` unknowns in a row, `order` or more.
    pub(super) fn new(order: usize, stride: usize, levels: usize) -> Self {
        // One more than there are: above the roof is no storey.
        let unknowns = order * levels + 1;
        let (multipliers, right) = (Rows::zeros(unknowns * stride), Rows::zeros(unknowns));
        Self { multipliers, right, inverses: Rows::zeros(0) }
    }

    /// Makes room for the inverses as well.
    pub(super) fn keep_inverses(&mut self) {
        self.inverses = Rows::zeros(self.right.len() * WIDEST);
    }

    /// The record of the lowest storey, and those of all levels upwards; `order` and `stride` are those of [`Record::new`],
    /// given again where the compiler knows them.
    #[inline(always)]
    pub(super) fn up(
        &mut self,
        [order, stride]: [usize; 2],
    ) -> (LevelRecord<'_, W>, impl Iterator<Item = LevelRecord<'_, W>>) {
        let (multipliers, rest) = self.multipliers.split_at_mut(stride);
        let rows = rest.chunks_exact_mut(order * stride);
        let (right, rest) = self.right.split_at_mut(1);
        let rights = rest.chunks_exact_mut(order);
        let first = WIDEST.min(self.inverses.len());
        let (inverses, rest) = self.inverses.split_at_mut(first);
        let mut blocks = rest.chunks_exact_mut(order * WIDEST);
        let levels = rows.zip(rights).map(move |(multipliers, right)| LevelRecord {
            stride,
            multipliers,
            right,
            inverses: blocks.next().unwrap_or_default(),
        });
        (LevelRecord { stride, multipliers, right, inverses }, levels)
    }

    /// The records of all levels downwards, and that of the lowest storey; inverses are left out.
    #[inline(always)]
    pub(super) fn down(
        &mut self,
        [order, stride]: [usize; 2],
    ) -> (impl Iterator<Item = LevelRecord<'_, W>>, LevelRecord<'_, W>) {
        let (multipliers, rest) = self.multipliers.split_at_mut(stride);
        let rows = rest.chunks_exact_mut(order * stride).rev();
        let (right, rest) = self.right.split_at_mut(1);
        let rights = rest.chunks_exact_mut(order).rev();
        let levels = rows.zip(rights).map(move |(multipliers, right)| LevelRecord {
            stride,
            multipliers,
            right,
            inverses: &mut [],
        });
        (levels, LevelRecord { stride, multipliers, right, inverses: &mut [] })
    }
}

/// The rows of one level.
pub(super) struct LevelRecord<'a, const W: usize> {
    stride: usize,
    multipliers: &'a mut [[f64; W]],
    right: &'a mut [[f64; W]],
    inverses: &'a mut [[f64; W]],
}

impl<const W: usize> LevelRecord<'_, W> {
    /// Keeps the row of one unknown.
    #[inline(always)]
    pub(super) fn keep<L: Lane<W>, const G: usize>(
        &mut self,
        row: usize,
        multipliers: &[L],
        right: L,
        inverse: &[L; G],
    ) {
        let own = self.keep_row(row, multipliers.len(), right, inverse);
        for column in 0..multipliers.len() {
            multipliers[column].store(&mut own[column]);
        }
    }

    /// Keeps the row of one unknown but for its `count` multipliers, which are to be written where this says.
    #[inline(always)]
    pub(super) fn keep_row<L: Lane<W>, const G: usize>(
        &mut self,
        row: usize,
        count: usize,
        right: L,
        inverse: &[L; G],
    ) -> &mut [[f64; W]] {
        right.store(&mut self.right[row]);
        if !self.inverses.is_empty() {
            for column in 0..G {
                inverse[column].store(&mut self.inverses[row * WIDEST + column]);
            }
        }
        &mut self.multipliers[row * self.stride..][..count]
    }

    /// A multiplier.
    #[inline(always)]
    pub(super) fn multiplier(&mut self, row: usize, column: usize) -> &mut [f64; W] {
        &mut self.multipliers[row * self.stride + column]
    }

    /// The multipliers of `count` unknowns, row after row.
    #[inline(always)]
    pub(super) fn multipliers(&self, row: usize, count: usize) -> &[[f64; W]] {
        &self.multipliers[row * self.stride..][..count * self.stride]
    }

    /// The right-hand side of an unknown.
    #[inline(always)]
    pub(super) fn right(&self, row: usize) -> &[f64; W] {
        &self.right[row]
    }

    /// The right-hand side of an unknown, to be replaced.
    #[inline(always)]
    pub(super) fn right_mut(&mut self, row: usize) -> &mut [f64; W] {
        &mut self.right[row]
    }

    /// A number of a block's inverse.
    #[inline(always)]
    pub(super) fn inverse(&self, row: usize, column: usize) -> &[f64; W] {
        &self.inverses[row * WIDEST + column]
    }
}
