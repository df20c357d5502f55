//! One column line with a rotational spring at every floor: the substitute frame and the D-value method's standard frame.

use crate::lane::{Lane, Rows};
use crate::response::Members;

/// What a chain is made of, storey by storey and floor by floor.
pub(super) struct Chain<Column, Spring, Turning> {
    /// E I/h of the column in a storey, C.
    pub column: Column,
    /// Stiffness of the beams at a floor against rotation, B.
    pub spring: Spring,
    /// Storey shear times storey height, T.
    pub turning: Turning,
}

/// Solves a chain: joint rotations into the first set of `scratch`, pivots into the second.
///
/// # Formula
/// At floor i: B_i theta_i + C_i (theta_i - theta_{i-1}) + C_{i+1} (theta_i - theta_{i+1}) = (T_i + T_{i+1}) / 2, without
/// upper terms at the roof. The foot turns by theta_0 = (1 - f)(theta_1 + T_1 / (2 C_1)), f = fixity of the feet.
///
/// # References
/// Slope-deflection with the chord rotations eliminated by storey equilibrium; the foot derived for this project.
pub(super) fn solve<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    scratch: &mut [Rows<W>; 4],
    chain: &Chain<impl Fn(usize) -> L, impl Fn(usize) -> L, impl Fn(usize) -> L>,
) {
    let [turns, pivots, ..] = scratch;
    let half = L::splat(0.5);
    let fixity = L::load(&members.foot_fixity);
    for floor in 0..members.storeys {
        let (column, turning) = ((chain.column)(floor), (chain.turning)(floor));
        let (mut pivot, mut right) = ((chain.spring)(floor), turning * half);
        if floor + 1 < members.storeys {
            pivot = pivot + (chain.column)(floor + 1);
            right = right + (chain.turning)(floor + 1) * half;
        }
        if floor == 0 {
            pivot = pivot + fixity * column;
            right = right + (L::splat(1.0) - fixity) * turning * half;
        } else {
            let carried = column / L::load(&pivots[floor - 1]);
            pivot = pivot + (column - carried * column);
            right = right + carried * L::load(&turns[floor - 1]);
        }
        pivot.store(&mut pivots[floor]);
        right.store(&mut turns[floor]);
    }
    for floor in (0..members.storeys).rev() {
        let mut right = L::load(&turns[floor]);
        if floor + 1 < members.storeys {
            right = right + (chain.column)(floor + 1) * L::load(&turns[floor + 1]);
        }
        (right / L::load(&pivots[floor])).store(&mut turns[floor]);
    }
}

/// C (theta_head - theta_foot) of a storey of the solved chain: half the difference of foot and head moment.
///
/// # Formula
/// M_foot = -T/2 - C (theta_head - theta_foot), M_head = -T/2 + C (theta_head - theta_foot). In the ground storey the
/// difference is f C theta_1 - (1 - f) T / 2.
pub(super) fn difference<L: Lane<W>, const W: usize>(
    members: &Members<W>,
    turns: &[[f64; W]],
    storey: usize,
    column: L,
    turning: L,
) -> L {
    let head = L::load(&turns[storey]);
    if storey > 0 {
        return column * (head - L::load(&turns[storey - 1]));
    }
    let fixity = L::load(&members.foot_fixity);
    fixity * column * head - (L::splat(1.0) - fixity) * turning * L::splat(0.5)
}
