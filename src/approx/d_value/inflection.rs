//! Inflection heights of columns, computed where the published method reads tables.

use super::{beams_at_ends, ratio};
use crate::approx::chain::{self, Chain};
use crate::approx::sums;
use crate::lane::Lane;
use crate::response::{Members, Work};

/// The parts of y, the height of the inflection point over the storey height.
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
    pub(super) fn sum(&self) -> L {
        self.standard + self.beams + self.above + self.below
    }
}

/// The inflection height of a column; see [`super::DValue`] for the formulas.
pub(super) fn parts<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    work: &mut Work<W>,
    storey: usize,
    line: usize,
) -> Parts<L> {
    let (zero, one) = (L::splat(0.0), L::splat(1.0));
    let own: L = ratio(members, storey, line);
    let (first, last) = (storey == 0, storey + 1 == members.storeys);
    let half_lam = lam(own) * L::splat(0.5);
    let relative = |other: usize| L::load(&members.height[other]) / L::load(&members.height[storey]) - one;
    // On pinned feet the ground storey's inflection point stays at the foot.
    let free = if first { L::load(&members.foot_fixity) } else { one };
    Parts {
        standard: standard::<L, W>(members, work, storey, own),
        beams: if first { zero } else { for_beams::<L, W>(members, storey, line) },
        above: if last { zero } else { free * relative(storey + 1) * half_lam },
        below: if first { zero } else { -(relative(storey - 1) * half_lam) },
    }
}

/// y0: the chain with springs 6 K, columns 1 and this frame's storey shears, heights being equal.
fn standard<L: Lane<W>, const W: usize>(members: &Members<W>, work: &mut Work<W>, storey: usize, ratio: L) -> L {
    let shear = |storey: usize| L::load(&members.shear[storey]);
    let frame = Chain { column: |_| L::splat(1.0), spring: |_| L::splat(6.0) * ratio, turning: shear };
    chain::solve(members, &mut work.storey, &frame);
    let difference = chain::difference(members, &work.storey[0], storey, L::splat(1.0), shear(storey));
    L::splat(0.5) + difference / shear(storey)
}

/// y1, with all floors above like the one at the head and all below like the one at the foot.
fn for_beams<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> L {
    let column: L = sums::column(members, storey, line);
    let [below, above] = beams_at_ends::<L, W>(members, storey, line).map(|beams| beams / column);
    let one = L::splat(1.0);
    (one / above - one / below) / L::splat(6.0) / (one + mu(above) + mu(below))
}

/// Ratio of the disturbance at one floor to that at the floor before: lam = 1 + 3 K - root(3 K (3 K + 2)), without the
/// cancellation.
fn lam<L: Lane<W>, const W: usize>(ratio: L) -> L {
    L::splat(1.0) / (L::splat(1.0) + growth(ratio))
}

/// lam / (1 - lam).
fn mu<L: Lane<W>, const W: usize>(ratio: L) -> L {
    L::splat(1.0) / growth(ratio)
}

/// 1 / lam - 1 = 3 K + root(3 K (3 K + 2)).
fn growth<L: Lane<W>, const W: usize>(ratio: L) -> L {
    let triple = L::splat(3.0) * ratio;
    triple + (triple * (triple + L::splat(2.0))).sqrt()
}
