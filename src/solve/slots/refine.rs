//! The misfit of a solution in every equation, for a step of iterative refinement.

use super::frames::Frames;
use crate::lane::Lane;
use crate::response::Forces;

/// Fills `misfit`, in the order of the unknowns, from the unknowns and the end moments they gave.
///
/// # Formula
/// theta: minus half the sum of the end moments at the joint; phi: -V h/6 less a sixth of the storey's column end moments;
/// u: minus (q Delta u of the column below - q Delta u of the one above + g S of the beam on the left - g S of the one on
/// the right), S = a sixth of a beam's end moments.
#[inline(always)]
pub(super) fn misfit<L: Lane<W>, const W: usize, const B: usize>(
    order: usize,
    frames: &Frames<W>,
    found: &[[f64; W]],
    forces: &Forces<W>,
    misfit: &mut [[f64; W]],
) {
    let (lines, sixth) = ((order - 1) / B, L::splat(1.0 / 6.0));
    let bays = lines - 1;
    let (foot, head) = (&forces.column_foot[..], &forces.column_head[..]);
    let (left, right) = (&forces.beam_left[..], &forces.beam_right[..]);
    for storey in 0..frames.storeys {
        let level = frames.level::<B>(storey, lines);
        let own = &mut misfit[storey * order..][..order];
        let mut turning = L::splat(0.0);
        for line in 0..lines {
            let column = storey * lines + line;
            let mut joint = L::load(&head[column]);
            turning = turning + (L::load(&foot[column]) + joint);
            if !level.is_roof() {
                joint = joint + L::load(&foot[column + lines]);
            }
            if line > 0 {
                joint = joint + L::load(&right[storey * bays + line - 1]);
            }
            if line < bays {
                joint = joint + L::load(&left[storey * bays + line]);
            }
            (joint * L::splat(-0.5)).store(&mut own[B * (line + 1)]);
        }
        (level.push::<L>() - turning * sixth).store(&mut own[0]);
        for line in 0..if B > 1 { lines } else { 0 } {
            let place = storey * order + 1 + B * line;
            let rise = L::load(&found[place]);
            let mut below = rise;
            if !level.is_ground() {
                below = rise - L::load(&found[place - order]);
            }
            let mut sum = level.axial::<L>(line) * below;
            if !level.is_roof() {
                sum = sum - level.axial_above::<L>(line) * (L::load(&found[place + order]) - rise);
            }
            if line > 0 {
                let beam = storey * bays + line - 1;
                sum = sum + level.slope::<L>(line - 1) * ((L::load(&left[beam]) + L::load(&right[beam])) * sixth);
            }
            if line < bays {
                let beam = storey * bays + line;
                sum = sum - level.slope::<L>(line) * ((L::load(&left[beam]) + L::load(&right[beam])) * sixth);
            }
            (-sum).store(&mut own[1 + B * line]);
        }
    }
}
