//! End moments and drifts from the unknowns.

use super::frames::Frames;
use crate::lane::Lane;
use crate::response::Forces;

/// Fills the end moments and drifts of `forces` from the unknowns, which stand level by level.
///
/// # Formula
/// M_near = 2 k (2 theta_near + theta_far + phi), phi = -3 psi of the member's chord; at a foot of fixity rho
/// M_foot = 2 k rho (theta + phi), M_head = k ((3 + rho) theta + (1 + rho) phi); drift = -phi h/3.
#[inline(always)]
pub(super) fn recover<L: Lane<W>, const W: usize, const B: usize>(
    order: usize,
    frames: &Frames<W>,
    found: &[[f64; W]],
    forces: &mut Forces<W>,
) {
    let lines = (order - 1) / B;
    let bays = lines - 1;
    let (mut feet, mut heads) = (&mut forces.column_foot[..], &mut forces.column_head[..]);
    let (mut lefts, mut rights) = (&mut forces.beam_left[..], &mut forces.beam_right[..]);
    let mut below = &found[..0];
    for (storey, drift) in forces.drift.iter_mut().enumerate() {
        let (foot, head) = (take(&mut feet, lines), take(&mut heads, lines));
        let (left, right) = (take(&mut lefts, bays), take(&mut rights, bays));
        let own = &found[storey * order..][..order];
        let level = frames.level::<B>(storey, lines);
        let chord = L::load(&own[0]);
        (chord * level.height() * L::splat(-1.0 / 3.0)).store(drift);
        for line in 0..lines {
            let (stiffness, turn) = (level.column(line), L::load(&own[B * (line + 1)]));
            let moments = if level.is_ground() {
                let (bent, rho) = (stiffness * turn, level.rho::<L>(line));
                let turned = stiffness * (turn + chord);
                let restrained = rho * turned;
                (restrained + restrained, (turned + restrained) + (bent + bent))
            } else {
                end_moments(stiffness, L::load(&below[B * (line + 1)]), turn, chord)
            };
            moments.0.store(&mut foot[line]);
            moments.1.store(&mut head[line]);
        }
        for bay in 0..bays {
            let (near, far) = (L::load(&own[B * (bay + 1)]), L::load(&own[B * (bay + 2)]));
            let mut chord = L::splat(0.0);
            if B > 1 {
                chord = level.slope::<L>(bay) * (L::load(&own[B * (bay + 2) - 1]) - L::load(&own[B * (bay + 1) - 1]));
            }
            let moments = end_moments(level.beam(bay), near, far, chord);
            moments.0.store(&mut left[bay]);
            moments.1.store(&mut right[bay]);
        }
        below = own;
    }
}

/// 2 k (2 theta_near + theta_far + phi) at both ends.
#[inline(always)]
fn end_moments<L: Lane<W>, const W: usize>(stiffness: L, near: L, far: L, chord: L) -> (L, L) {
    let (twice, common) = (stiffness + stiffness, near + far + chord);
    (twice * (common + near), twice * (common + far))
}

/// Splits the first `count` rows off.
#[inline(always)]
fn take<'a, const W: usize>(rows: &mut &'a mut [[f64; W]], count: usize) -> &'a mut [[f64; W]] {
    let (first, rest) = std::mem::take(rows).split_at_mut(count);
    *rows = rest;
    first
}
