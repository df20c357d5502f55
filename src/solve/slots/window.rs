//! The window of unknowns that are being eliminated, and one step of elimination.

use super::inverse::inverse;
use super::record::{LevelRecord, WIDEST};
use crate::lane::Lane;

/// The unknowns that have been met and not yet eliminated, in the order of their elimination: the upper triangle of their
/// reduced matrix, its right-hand side, and their diagonal terms as they were before any elimination.
pub(super) trait Window<L: Lane<W>, const W: usize> {
    /// The most unknowns the window holds.
    fn order(&self) -> usize;
    /// A number of the upper triangle.
    fn at(&mut self, row: usize, column: usize) -> &mut L;
    /// A right-hand side.
    fn right(&mut self, row: usize) -> &mut L;
    /// A diagonal term before any elimination.
    fn diagonal(&mut self, row: usize) -> &mut L;
    /// What the pivots so far had to spare, see [`inverse`].
    fn reserve(&self) -> L;

    /// Eliminates the `G` unknowns at the front of a window that holds `held`, moves the others up to the front, and keeps
    /// the step from row `first` of `record` on.
    ///
    /// # Formula
    /// With D the block of the front unknowns, C its rows in the other columns, A the rest and b, c the right-hand sides:
    /// M = D^-1 C, y = D^-1 b; A <- A - C' M, c <- c - C' y. On the way back x = y - M x_rest.
    fn eliminate<const G: usize>(&mut self, held: usize, first: usize, record: &mut LevelRecord<W>)
    -> Eliminated<L, G>;
}

/// What a step leaves for the unknowns that come in at the back.
pub(super) struct Eliminated<L, const G: usize> {
    /// D^-1.
    pub inverse: [[L; G]; G],
    /// y.
    pub right: [L; G],
}

/// A window of an order that the compiler knows, so that it can unroll the loops.
pub(super) struct Narrow<L, const N: usize> {
    matrix: [[L; N]; N],
    right: [L; N],
    diagonal: [L; N],
    reserve: L,
}

impl<L, const N: usize> Narrow<L, N> {
    #[inline(always)]
    pub(super) fn new<const W: usize>() -> Self
    where
        L: Lane<W>,
    {
        let row = [L::splat(0.0); N];
        Self { matrix: [row; N], right: row, diagonal: row, reserve: L::splat(f64::MAX) }
    }
}

impl<L: Lane<W>, const W: usize, const N: usize> Window<L, W> for Narrow<L, N> {
    #[inline(always)]
    fn order(&self) -> usize {
        N
    }

    #[inline(always)]
    fn at(&mut self, row: usize, column: usize) -> &mut L {
        &mut self.matrix[row][column]
    }

    #[inline(always)]
    fn right(&mut self, row: usize) -> &mut L {
        &mut self.right[row]
    }

    #[inline(always)]
    fn diagonal(&mut self, row: usize) -> &mut L {
        &mut self.diagonal[row]
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
        let zero = L::splat(0.0);
        let (mut front, mut multipliers) = ([[zero; N]; G], [[zero; N]; G]);
        let (mut block, mut diagonal) = ([[zero; G]; G], [zero; G]);
        for row in 0..G {
            diagonal[row] = self.diagonal[row];
            for column in row..G {
                block[row][column] = self.matrix[row][column];
            }
            for column in G..held {
                front[row][column] = self.matrix[row][column];
            }
        }
        let inverse = inverse(&block, &diagonal, &mut self.reserve);
        let mut right = [zero; G];
        for row in 0..G {
            right[row] = inverse[row][0] * self.right[0];
            for index in 1..G {
                right[row] = right[row] + inverse[row][index] * self.right[index];
            }
            for column in G..held {
                let mut sum = inverse[row][0] * front[0][column];
                for index in 1..G {
                    sum = sum + inverse[row][index] * front[index][column];
                }
                multipliers[row][column] = sum;
            }
        }
        for row in 0..G {
            record.keep(first + row, &multipliers[row][G..held], right[row], &inverse[row]);
        }
        for row in G..held {
            for column in row..held {
                let mut sum = front[0][row] * multipliers[0][column];
                for index in 1..G {
                    sum = sum + front[index][row] * multipliers[index][column];
                }
                self.matrix[row - G][column - G] = self.matrix[row][column] - sum;
            }
            let mut sum = front[0][row] * right[0];
            for index in 1..G {
                sum = sum + front[index][row] * right[index];
            }
            self.right[row - G] = self.right[row] - sum;
            self.diagonal[row - G] = self.diagonal[row];
        }
        Eliminated { inverse, right }
    }
}

/// A window of any order.
pub(super) struct Wide<L> {
    order: usize,
    /// In rows of `order`.
    matrix: Vec<L>,
    right: Vec<L>,
    diagonal: Vec<L>,
    /// Copies of a step's front rows, in rows of `order`.
    front: Vec<L>,
    reserve: L,
}

impl<L> Wide<L> {
    pub(super) fn new<const W: usize>(order: usize) -> Self
    where
        L: Lane<W>,
    {
        let numbers = |count: usize| vec![L::splat(0.0); count];
        Self {
            order,
            matrix: numbers(order * order),
            right: numbers(order),
            diagonal: numbers(order),
            front: numbers(order * WIDEST),
            reserve: L::splat(f64::MAX),
        }
    }
}

impl<L: Lane<W>, const W: usize> Window<L, W> for Wide<L> {
    #[inline(always)]
    fn order(&self) -> usize {
        self.order
    }

    #[inline(always)]
    fn at(&mut self, row: usize, column: usize) -> &mut L {
        &mut self.matrix[row * self.order + column]
    }

    #[inline(always)]
    fn right(&mut self, row: usize) -> &mut L {
        &mut self.right[row]
    }

    #[inline(always)]
    fn diagonal(&mut self, row: usize) -> &mut L {
        &mut self.diagonal[row]
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
        let (order, zero) = (self.order, L::splat(0.0));
        let (mut block, mut diagonal, mut right) = ([[zero; G]; G], [zero; G], [zero; G]);
        for row in 0..G {
            diagonal[row] = self.diagonal[row];
            for column in row..G {
                block[row][column] = self.matrix[row * order + column];
            }
            let from = row * order..row * order + held;
            self.front[from.clone()].copy_from_slice(&self.matrix[from]);
        }
        let inverse = inverse(&block, &diagonal, &mut self.reserve);
        for row in 0..G {
            right[row] = inverse[row][0] * self.right[0];
            for index in 1..G {
                right[row] = right[row] + inverse[row][index] * self.right[index];
            }
            let multipliers = record.keep_row(first + row, held - G, right[row], &inverse[row]);
            for (column, multiplier) in multipliers.iter_mut().enumerate() {
                let mut sum = inverse[row][0] * self.front[G + column];
                for index in 1..G {
                    sum = sum + inverse[row][index] * self.front[index * order + G + column];
                }
                sum.store(multiplier);
            }
        }
        for row in G..held {
            let mut factors = [zero; G];
            let mut multipliers: [&[[f64; W]]; G] = [&[]; G];
            for index in 0..G {
                factors[index] = self.front[index * order + row];
                multipliers[index] = &record.multipliers(first + index)[row - G..held - G];
            }
            let (above, own) = self.matrix.split_at_mut(row * order);
            let target = &mut above[(row - G) * (order + 1)..][..held - row];
            subtract(&factors, &multipliers, &own[row..held], target);
            let mut sum = factors[0] * right[0];
            for index in 1..G {
                sum = sum + factors[index] * right[index];
            }
            self.right[row - G] = self.right[row] - sum;
            self.diagonal[row - G] = self.diagonal[row];
        }
        Eliminated { inverse, right }
    }
}

/// target <- source - the sum of factors times rows.
#[inline(always)]
fn subtract<L: Lane<W>, const W: usize, const G: usize>(
    factors: &[L; G],
    rows: &[&[[f64; W]]; G],
    source: &[L],
    target: &mut [L],
) {
    let length = target.len();
    let source = &source[..length];
    let mut even = *rows;
    for row in &mut even {
        *row = &row[..length];
    }
    for column in 0..length {
        let mut sum = factors[0] * L::load(&even[0][column]);
        for index in 1..G {
            sum = sum + factors[index] * L::load(&even[index][column]);
        }
        target[column] = source[column] - sum;
    }
}
