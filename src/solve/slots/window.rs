//! The window of unknowns that are being eliminated, and one step of elimination.

use super::inverse::inverse;
use super::record::LevelRecord;
use crate::lane::Lane;

/// The unknowns that have been met and not yet eliminated, in the order of their elimination: the upper triangle of their
/// reduced matrix, its right-hand side, and their diagonal terms as they were before any elimination.
pub(super) trait Window<L: Lane<W>, const W: usize> {
    /// The most unknowns the window holds.
    fn order(&self) -> usize;
    /// Numbers from row to row of the record's multipliers.
    fn stride(&self) -> usize;
    /// Adds to a number of the upper triangle.
    fn add(&mut self, row: usize, column: usize, term: L);
    /// Replaces a number of the upper triangle.
    fn set(&mut self, row: usize, column: usize, term: L);
    /// Replaces a right-hand side.
    fn set_right(&mut self, row: usize, value: L);
    /// Replaces a diagonal term as it is before any elimination.
    fn set_diagonal(&mut self, row: usize, term: L);
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
    fn stride(&self) -> usize {
        N
    }

    #[inline(always)]
    fn add(&mut self, row: usize, column: usize, term: L) {
        self.matrix[row][column] = self.matrix[row][column] + term;
    }

    #[inline(always)]
    fn set(&mut self, row: usize, column: usize, term: L) {
        self.matrix[row][column] = term;
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
