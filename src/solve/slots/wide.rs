//! A window of any order.

use super::inverse::inverse;
use super::record::{LevelRecord, WIDEST};
use super::window::{Eliminated, Window};
use crate::lane::{Block, Lane, Rows};
use std::marker::PhantomData;

/// A window of any order; its long rows are taken in blocks `B`.
///
/// It does the arithmetic of [`super::window::Narrow`] in the same order, and so gives the same bits.
///
/// Of one frame, a block is four columns. Rows are worked on in whole blocks, counted from the first column that stays;
/// what that touches left of the diagonal and behind the last column is never read, but for being moved about.
pub(super) struct Wide<'a, L, B, const W: usize> {
    order: usize,
    /// Numbers from row to row, of `matrix` and `next`.
    stride: usize,
    /// The upper triangle, in rows.
    matrix: &'a mut [[f64; W]],
    /// The triangle that a step leaves.
    next: &'a mut [[f64; W]],
    right: Vec<L>,
    diagonal: Vec<L>,
    reserve: L,
    block: PhantomData<B>,
}

impl<'a, L: Lane<W>, B, const W: usize> Wide<'a, L, B, W> {
    /// `room` are two times the rows of [`room`], all zero.
    pub(super) fn new(order: usize, room: [&'a mut [[f64; W]]; 2]) -> Self {
        let ([matrix, next], zeros) = (room, vec![L::splat(0.0); order]);
        let (stride, right) = (stride::<W>(order), zeros.clone());
        Self { order, stride, matrix, next, right, diagonal: zeros, reserve: L::splat(f64::MAX), block: PhantomData }
    }
}

/// The rows of a window's triangle.
pub(super) fn room<const W: usize>(order: usize) -> Rows<W> {
    Rows::zeros(order * stride::<W>(order))
}

impl<L: Lane<W>, B: Block<L, W>, const W: usize> Window<L, W> for Wide<'_, L, B, W> {
    #[inline(always)]
    fn order(&self) -> usize {
        self.order
    }

    #[inline(always)]
    fn stride(&self) -> usize {
        self.stride
    }

    #[inline(always)]
    fn add(&mut self, row: usize, column: usize, term: L) {
        let entry = &mut self.matrix[row * self.stride + column];
        (L::load(entry) + term).store(entry);
    }

    #[inline(always)]
    fn set(&mut self, row: usize, column: usize, term: L) {
        term.store(&mut self.matrix[row * self.stride + column]);
    }

    #[inline(always)]
    fn set_right(&mut self, row: usize, value: L) {
        self.right[row] = value;
    }

    #[inline(always)]
    fn set_diagonal(&mut self, row: usize, term: L) {
        self.diagonal[row] = term;
    }

    #[inline(always)]
    fn reserve(&self) -> L {
        self.reserve
    }

    #[inline(always)]
    fn eliminate<const G: usize>(
        &mut self,
        held: usize,
        first: usize,
        record: &mut LevelRecord<W>,
    ) -> Eliminated<L, G> {
        let (stride, zero) = (self.stride, L::splat(0.0));
        let (mut block, mut diagonal, mut right) = ([[zero; G]; G], [zero; G], [zero; G]);
        for row in 0..G {
            diagonal[row] = self.diagonal[row];
            for column in row..G {
                block[row][column] = L::load(&self.matrix[row * stride + column]);
            }
        }
        let inverse = inverse(&block, &diagonal, &mut self.reserve);
        let columns = (held - G).next_multiple_of(unit(W));
        for row in 0..G {
            right[row] = times(&inverse[row], &self.right);
            let multipliers = record.keep_row(first + row, columns, right[row], &inverse[row]);
            multiply::<L, B, W, G>(&inverse[row], self.matrix, stride, multipliers);
        }
        self.reduce::<G>(held, columns, record.multipliers(first, G));
        for row in G..held {
            let mut sum = zero;
            for index in 0..G {
                sum = sum + L::load(&self.matrix[index * stride + row]) * right[index];
            }
            self.right[row - G] = self.right[row] - sum;
            self.diagonal[row - G] = self.diagonal[row];
        }
        std::mem::swap(&mut self.matrix, &mut self.next);
        Eliminated { inverse, right }
    }
}

impl<L: Lane<W>, B: Block<L, W>, const W: usize> Wide<'_, L, B, W> {
    /// A <- A - C' M, four rows at a time, so that every multiplier is loaded once for four.
    #[inline(always)]
    fn reduce<const G: usize>(&mut self, held: usize, columns: usize, multipliers: &[[f64; W]]) {
        let stride = self.stride;
        let (front, below) = self.matrix.split_at(G * stride);
        let sources = below.chunks(4 * stride);
        let targets = self.next.chunks_mut(4 * stride);
        for (quarter, (source, target)) in sources.zip(targets).enumerate().take((held - G).div_ceil(4)) {
            let mut rows = Rows4 { first: 4 * quarter, columns, stride, front, multipliers, source, target };
            if rows.first + 4 <= held - G {
                rows.four::<L, B, G>();
            } else {
                rows.rest::<L, B, G>(held - G - rows.first);
            }
        }
    }
}

/// Columns in a block of four numbers.
const fn unit(lanes: usize) -> usize {
    4 / lanes
}

/// Numbers from row to row of a window of an order: room for whole blocks from any column on.
pub(super) const fn stride<const W: usize>(order: usize) -> usize {
    (order + WIDEST).next_multiple_of(unit(W))
}

/// Sum of the products of the first `G` numbers.
#[inline(always)]
fn times<L: Lane<W>, const W: usize, const G: usize>(factors: &[L; G], values: &[L]) -> L {
    let mut sum = factors[0] * values[0];
    for index in 1..G {
        sum = sum + factors[index] * values[index];
    }
    sum
}

/// One row of M = D^-1 C.
#[inline(always)]
fn multiply<L: Lane<W>, B: Block<L, W>, const W: usize, const G: usize>(
    inverse: &[L; G],
    front: &[[f64; W]],
    stride: usize,
    multipliers: &mut [[f64; W]],
) {
    let mut rows: [&[[f64; 4]]; G] = [&[]; G];
    let multipliers = multipliers.as_flattened_mut().as_chunks_mut().0;
    for index in 0..G {
        rows[index] = &front[index * stride + G..].as_flattened().as_chunks().0[..multipliers.len()];
    }
    for block in 0..multipliers.len() {
        let mut sum = B::factor(inverse[0]) * B::Four::load(&rows[0][block]);
        for index in 1..G {
            sum = sum + B::factor(inverse[index]) * B::Four::load(&rows[index][block]);
        }
        sum.store(&mut multipliers[block]);
    }
}

/// Up to four rows of a step of elimination.
struct Rows4<'a, const W: usize> {
    /// The first of them, counted from the first row that stays.
    first: usize,
    /// Columns that stay, in whole blocks.
    columns: usize,
    stride: usize,
    /// The front rows C.
    front: &'a [[f64; W]],
    /// M.
    multipliers: &'a [[f64; W]],
    /// The rows as they were.
    source: &'a [[f64; W]],
    /// The rows as they become.
    target: &'a mut [[f64; W]],
}

impl<const W: usize> Rows4<'_, W> {
    /// Blocks of `row` in `rows`, from the block of this quarter's first diagonal on.
    #[inline(always)]
    fn blocks<'b>(&self, rows: &'b [[f64; W]], row: usize, first_column: usize) -> &'b [[f64; 4]] {
        let from = row * self.stride + first_column + self.first;
        rows[from..from + self.columns - self.first].as_flattened().as_chunks().0
    }

    /// The factors C' of a row.
    #[inline(always)]
    fn factors<L: Lane<W>, B: Block<L, W>, const G: usize>(&self, row: usize) -> [B::Four; G] {
        let mut factors = [B::factor(L::splat(0.0)); G];
        for index in 0..G {
            factors[index] = B::factor(L::load(&self.front[index * self.stride + G + self.first + row]));
        }
        factors
    }

    /// All four rows.
    #[inline(always)]
    fn four<L: Lane<W>, B: Block<L, W>, const G: usize>(&mut self) {
        let mut multipliers: [&[[f64; 4]]; G] = [&[]; G];
        for index in 0..G {
            multipliers[index] = self.blocks(self.multipliers, index, 0);
        }
        let mut sources: [&[[f64; 4]]; 4] = [&[]; 4];
        let mut factors = [[B::factor(L::splat(0.0)); G]; 4];
        for row in 0..4 {
            sources[row] = self.blocks(self.source, row, G);
            factors[row] = self.factors::<L, B, G>(row);
        }
        let (first, columns) = (self.first, self.columns);
        let mut targets = self.target.chunks_exact_mut(self.stride);
        let mut next = || targets.next().map(|row| row[first..columns].as_flattened_mut().as_chunks_mut::<4>().0);
        let (Some(a), Some(b), Some(c), Some(d)) = (next(), next(), next(), next()) else { return };
        let count = a.len();
        let [e, f, g, h] = sources.map(|source| &source[..count]);
        for index in 0..G {
            multipliers[index] = &multipliers[index][..count];
        }
        let (b, c, d) = (&mut b[..count], &mut c[..count], &mut d[..count]);
        for block in 0..count {
            let mut loaded = [B::factor(L::splat(0.0)); G];
            for index in 0..G {
                loaded[index] = B::Four::load(&multipliers[index][block]);
            }
            less(&e[block], &factors[0], &loaded, &mut a[block]);
            less(&f[block], &factors[1], &loaded, &mut b[block]);
            less(&g[block], &factors[2], &loaded, &mut c[block]);
            less(&h[block], &factors[3], &loaded, &mut d[block]);
        }
    }

    /// The first `count` rows, one by one.
    #[inline(always)]
    fn rest<L: Lane<W>, B: Block<L, W>, const G: usize>(&mut self, count: usize) {
        for row in 0..count {
            let (factors, source) = (self.factors::<L, B, G>(row), self.blocks(self.source, row, G));
            let mut multipliers: [&[[f64; 4]]; G] = [&[]; G];
            for index in 0..G {
                multipliers[index] = &self.blocks(self.multipliers, index, 0)[..source.len()];
            }
            let from = row * self.stride;
            let target = &mut self.target[from + self.first..from + self.columns];
            for (block, target) in target.as_flattened_mut().as_chunks_mut().0.iter_mut().enumerate() {
                let mut loaded = [B::factor(L::splat(0.0)); G];
                for index in 0..G {
                    loaded[index] = B::Four::load(&multipliers[index][block]);
                }
                less(&source[block], &factors, &loaded, target);
            }
        }
    }
}

/// target <- source - the sum of factors times multipliers.
#[inline(always)]
fn less<Four: Lane<4>, const G: usize>(
    source: &[f64; 4],
    factors: &[Four; G],
    multipliers: &[Four; G],
    target: &mut [f64; 4],
) {
    let mut sum = factors[0] * multipliers[0];
    for index in 1..G {
        sum = sum + factors[index] * multipliers[index];
    }
    (Four::load(source) - sum).store(target);
}
