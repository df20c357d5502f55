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
    let columns = forces.column_foot.chunks_exact_mut(lines).zip(forces.column_head.chunks_exact_mut(lines));
    let bays = lines - 1;
    let beams = forces.beam_left.chunks_exact_mut(bays).zip(forces.beam_right.chunks_exact_mut(bays));
    let drifts = forces.drift.iter_mut();
    let mut below = &found[..0];
    let rows = found.chunks_exact(order).zip(columns).zip(beams).zip(drifts).enumerate();
    for (storey, (((own, (foot, head)), (left, right)), drift)) in rows {
        let level = frames.level(storey, lines);
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
