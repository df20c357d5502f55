//! One column line with a rotational spring at every floor: the substitute frame.

use super::sums;
use crate::lane::Lane;
use crate::response::MemberRows;

/// A chain in the four storey sets of scratch numbers.
pub(super) struct Chain<'a, const W: usize> {
    /// Rotations of the floors: what is found.
    pub turns: &'a mut [[f64; W]],
    /// How much of a floor's rotation the floor below it takes over.
    carried: &'a mut [[f64; W]],
    /// E I/h of the column in a storey, C.
    pub column: &'a mut [[f64; W]],
    /// Stiffness of the beams at a floor against rotation, B.
    pub spring: &'a mut [[f64; W]],
}

impl<'a, const W: usize> Chain<'a, W> {
    /// The chain in `sets`.
    #[inline(always)]
    pub(super) fn in_sets([turns, carried, column, spring]: &'a mut [&mut [[f64; W]]; 4]) -> Self {
        Self { turns, carried, column, spring }
    }

    /// Finds the rotations; T = V h of the storeys of `members`, and their feet.
    ///
    /// # Formula
    /// At floor i: B_i theta_i + C_i (theta_i - theta_{i-1}) + C_{i+1} (theta_i - theta_{i+1}) = (T_i + T_{i+1}) / 2, without
    /// upper terms at the roof. The foot turns by theta_0 = (1 - f)(theta_1 + T_1 / (2 C_1)), f = fixity of the feet. From
    /// the feet up, floor i and all below it resist with S_i = B_i + C_i S_{i-1} / (C_i + S_{i-1}), S_1 = B_1 + f C_1.
    ///
    /// # References
    /// Slope-deflection with the chord rotations eliminated by storey equilibrium; the foot derived for this project.
    #[inline(always)]
    pub(super) fn solve<L: Lane<W>>(&mut self, members: &MemberRows<W>) {
        let (zero, half) = (L::splat(0.0), L::splat(0.5));
        let fixity = L::load(&members.foot_fixity);
        let mut turning: L = sums::turning(members, 0);
        let mut stiffness = fixity * L::load(&self.column[0]);
        let mut right = (L::splat(1.0) - fixity) * turning * half;
        for floor in 0..members.storeys {
            let last = floor + 1 == members.storeys;
            let above = if last { zero } else { L::load(&self.column[floor + 1]) };
            let next = if last { zero } else { sums::turning(members, floor + 1) };
            stiffness = stiffness + L::load(&self.spring[floor]);
            right = right + (turning + next) * half;
            let per_pivot = L::splat(1.0) / (stiffness + above);
            let carried = above * per_pivot;
            (right * per_pivot).store(&mut self.turns[floor]);
            carried.store(&mut self.carried[floor]);
            (stiffness, right, turning) = (carried * stiffness, carried * right, next);
        }
        let mut above = zero;
        for floor in (0..members.storeys).rev() {
            above = L::load(&self.turns[floor]) + L::load(&self.carried[floor]) * above;
            above.store(&mut self.turns[floor]);
        }
    }

    /// C (theta_head - theta_foot) of a storey of the solved chain: half the difference of foot and head moment.
    ///
    /// # Formula
    /// M_foot = -T/2 - C (theta_head - theta_foot), M_head = -T/2 + C (theta_head - theta_foot). In the ground storey the
    /// difference is f C theta_1 - (1 - f) T / 2.
    #[inline(always)]
    pub(super) fn difference<L: Lane<W>>(&self, members: &MemberRows<W>, storey: usize) -> L {
        let (column, head) = (L::load(&self.column[storey]), L::load(&self.turns[storey]));
        if storey > 0 {
            return column * (head - L::load(&self.turns[storey - 1]));
        }
        let fixity = L::load(&members.foot_fixity);
        fixity * column * head - (L::splat(1.0) - fixity) * sums::turning(members, 0) * L::splat(0.5)
    }
}
