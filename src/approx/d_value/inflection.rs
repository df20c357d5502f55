//! Inflection heights of columns, computed where the published method reads tables.

use super::Ends;
use crate::lane::{Lane, reciprocals};
use crate::response::MemberRows;

/// The parts of y, the height of the inflection point over the storey height.
#[derive(Clone, Copy)]
pub(super) struct Parts<L> {
    /// y0, of the standard frame.
    pub standard: L,
    /// y1, for unequal beams above and below.
    pub beams: L,
    /// y2, for another height of the storey above.
    pub above: L,
    /// y3, for another height of the storey below.
    pub below: L,
}

impl<L: Copy + std::ops::Add<Output = L>> Parts<L> {
    /// y.
    #[inline(always)]
    pub(super) fn sum(&self) -> L {
        self.standard + self.beams + self.above + self.below
    }
}

/// Fills `right` with the right sides of the standard frame's equations, floor by floor: (V_i + V_{i+1}) / 2, and where the
/// feet turn, what they pass on to the first floor.
#[inline(always)]
pub(super) fn right_sides<L: Lane<W>, const W: usize>(members: &MemberRows<W>, right: &mut [[f64; W]]) {
    let (shear, half) = (members.shear, L::splat(0.5));
    let mut below = L::load(&shear[0]) * (L::splat(2.0) - L::load(&members.foot_fixity));
    for floor in 0..members.storeys {
        let above = if floor + 1 < members.storeys { L::load(&shear[floor + 1]) } else { L::splat(0.0) };
        ((below + above) * half).store(&mut right[floor]);
        below = above;
    }
}

/// What the columns of one storey have in common.
pub(super) struct Storey<'a, L, const W: usize> {
    /// The storey, from 0.
    index: usize,
    /// Right sides of the standard frame's equations.
    right: &'a [[f64; W]],
    /// Fixity of the feet.
    fixity: L,
    /// One over the storey shear.
    per_shear: L,
    /// h_above/h - 1 and h_below/h - 1; 0 where there is no such storey, or where y stays 0 on pinned feet.
    steps: [L; 2],
}

impl<'a, L: Lane<W>, const W: usize> Storey<'a, L, W> {
    /// The storey `index` of `members`; see [`right_sides`].
    #[inline(always)]
    pub(super) fn of(members: &MemberRows<W>, right: &'a [[f64; W]], index: usize) -> Self {
        let (one, zero) = (L::splat(1.0), L::splat(0.0));
        let fixity = L::load(&members.foot_fixity);
        let per_height = one / L::load(&members.height[index]);
        let mut steps = [zero; 2];
        if index + 1 < members.storeys {
            let free = if index == 0 { fixity } else { one };
            steps[0] = free * (L::load(&members.height[index + 1]) * per_height - one);
        }
        if index > 0 {
            steps[1] = L::load(&members.height[index - 1]) * per_height - one;
        }
        Self { index, right, fixity, per_shear: one / L::load(&members.shear[index]), steps }
    }

    /// The inflection heights of `N` columns; see [`super::DValue`] for the formulas.
    #[inline(always)]
    pub(super) fn parts<const N: usize>(&self, ends: &[Ends<L>; N]) -> [Parts<L>; N] {
        let lam = lam(ends);
        let standard = self.standard(lam);
        let zero = L::splat(0.0);
        let mut parts = [Parts { standard: zero, beams: zero, above: zero, below: zero }; N];
        for line in 0..N {
            let half_lam = lam[line] * L::splat(0.5);
            parts[line] = Parts {
                standard: standard[line],
                beams: if self.index == 0 { zero } else { for_beams(&ends[line]) },
                above: self.steps[0] * half_lam,
                below: -(self.steps[1] * half_lam),
            };
        }
        parts
    }

    /// y0, in closed form: what the right side at every joint does to the storey, as on a column without end, with its
    /// images at the feet and at the roof.
    ///
    /// # Formula
    /// Without right sides the equations have the solutions lam^i and lam^-i. h_i = p lam^-i - q lam^(i-1) with
    /// p = 1 - (1 - f) lam, q = lam - (1 - f) satisfies them at the feet of fixity f (theta_0 = (1 - f) theta_1), and
    /// k_i = lam^i + lam^(2n+1-i) at the roof of n storeys. Then, with r the right sides,
    /// theta_i - theta_{i-1} = \[(h_i - h_{i-1}) sum_{j >= i} k_j r_j - (k_{i-1} - k_i) sum_{j < i} h_j r_j\] /
    /// (h_{i+1} k_i - h_i k_{i+1}). Below, powers of 1/lam are cancelled, and both parts are divided by (1 - lam) / lam^2:
    /// no number overflows.
    ///
    /// # References
    /// Derived for this project; a test compares it with elimination.
    #[inline(always)]
    fn standard<const N: usize>(&self, lam: [L; N]) -> [L; N] {
        let (zero, one, half) = (L::splat(0.0), L::splat(1.0), L::splat(0.5));
        let (free, top) = (one - self.fixity, self.right.len() - 1);
        let (mut square, mut from_above, mut from_below) = (lam, lam, [zero; N]);
        let (mut at_roof, mut at_feet, mut at_feet_first) = (lam, lam, lam);
        for column in 0..N {
            square[column] = lam[column] * lam[column];
            from_above[column] = (one + lam[column]) * L::load(&self.right[top]);
            at_feet_first[column] = one - free * lam[column];
            at_feet[column] = lam[column] * (lam[column] - free);
        }
        for right in self.right[self.index..top].iter().rev() {
            let right = L::load(right);
            for column in 0..N {
                at_roof[column] = square[column] * at_roof[column];
                from_above[column] = lam[column] * from_above[column] + (one + at_roof[column]) * right;
            }
        }
        for right in &self.right[..self.index] {
            let right = L::load(right);
            for column in 0..N {
                from_below[column] =
                    lam[column] * from_below[column] + (at_feet_first[column] - at_feet[column]) * right;
                at_feet[column] = square[column] * at_feet[column];
            }
        }
        let mut whole = lam;
        for column in 0..N {
            whole[column] = (one + lam[column]) * (at_feet_first[column] + at_feet[column] * at_roof[column]);
        }
        let per_whole = reciprocals(whole);
        let start = if self.index > 0 { half } else { half - free * half };
        let mut found = lam;
        for column in 0..N {
            let above = (lam[column] * at_feet_first[column] + at_feet[column]) * from_above[column];
            let below = (one - lam[column] * at_roof[column]) * (lam[column] * from_below[column]);
            found[column] = start + (above - below) * per_whole[column] * self.per_shear;
        }
        found
    }
}

/// y1, with all floors above like the one at the head and all below like the one at the foot.
///
/// # Formula
/// With R(B) = root(1 + 2 / (3 B)) mu = (R - 1) / 2 and 1/B = 3 (R^2 - 1) / 2, so that
/// (1/B_t - 1/B_b) / 6 / (1 + mu(B_t) + mu(B_b)) = (R(B_t) - R(B_b)) / 2.
#[inline(always)]
fn for_beams<L: Lane<W>, const W: usize>(ends: &Ends<L>) -> L {
    let [foot, head] = ends.per_beams;
    let two_thirds = L::splat(2.0 / 3.0) * ends.column;
    let one = L::splat(1.0);
    ((one + two_thirds * head).sqrt() - (one + two_thirds * foot).sqrt()) * L::splat(0.5)
}

/// Ratio of the disturbance at one floor to that at the floor before.
///
/// # Formula
/// lam = 1 + 3 K - root(3 K (3 K + 2)) = 1 / (1 + 3 K + root(3 K (3 K + 2))), without the cancellation; K = B / (2 k), B the
/// beams at both ends.
#[inline(always)]
fn lam<L: Lane<W>, const W: usize, const N: usize>(ends: &[Ends<L>; N]) -> [L; N] {
    let mut whole = [L::splat(0.0); N];
    for column in 0..N {
        let triple = L::splat(3.0) * ends[column].both();
        let [double, quadruple] = [L::splat(2.0) * ends[column].column, L::splat(4.0) * ends[column].column];
        whole[column] = double + triple + (triple * (triple + quadruple)).sqrt();
    }
    let mut found = reciprocals(whole);
    for column in 0..N {
        found[column] = L::splat(2.0) * ends[column].column * found[column];
    }
    found
}

#[cfg(test)]
mod tests;
