//! What moves at a joint, and the terms it brings into the equations (those of the module page).

use super::frames::Level;
use crate::lane::Lane;

/// The `B` unknowns of a joint; the rotation is the last.
pub(super) trait Unknowns<const B: usize> {
    /// Terms of the joint on top of a column with itself.
    fn own<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [[L; B]; B];
    /// Terms of the joint at the left end of a beam (rows) with the one at its right end (columns).
    fn beam<L: Lane<W>, const W: usize>(level: &Level<W>, bay: usize) -> [[L; B]; B];
    /// Terms of each unknown with the same one at the foot of the column.
    fn column<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [L; B];
}

/// Rotation alone: columns keep their length.
pub(super) struct Rotation;

impl Unknowns<1> for Rotation {
    #[inline(always)]
    fn own<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [[L; 1]; 1] {
        [[turning(level, line)]]
    }

    #[inline(always)]
    fn beam<L: Lane<W>, const W: usize>(level: &Level<W>, bay: usize) -> [[L; 1]; 1] {
        [[level.beam(bay)]]
    }

    #[inline(always)]
    fn column<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [L; 1] {
        [level.column(line)]
    }
}

/// Rise and rotation: columns stretch and shorten.
pub(super) struct RiseAndRotation;

impl Unknowns<2> for RiseAndRotation {
    #[inline(always)]
    fn own<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [[L; 2]; 2] {
        let mut rise = level.axial(line);
        let mut both = L::splat(0.0);
        if !level.is_roof() {
            rise = rise + level.axial_above(line);
        }
        if line > 0 {
            let sloped = level.beam::<L>(line - 1) * level.slope(line - 1);
            rise = rise + two_thirds::<L, W>() * (sloped * level.slope(line - 1));
            both = both + sloped;
        }
        if line < level.bays() {
            let sloped = level.beam::<L>(line) * level.slope(line);
            rise = rise + two_thirds::<L, W>() * (sloped * level.slope(line));
            both = both - sloped;
        }
        [[rise, both], [both, turning(level, line)]]
    }

    #[inline(always)]
    fn beam<L: Lane<W>, const W: usize>(level: &Level<W>, bay: usize) -> [[L; 2]; 2] {
        let beam = level.beam::<L>(bay);
        let sloped = beam * level.slope(bay);
        [[-(two_thirds::<L, W>() * (sloped * level.slope(bay))), -sloped], [sloped, beam]]
    }

    #[inline(always)]
    fn column<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> [L; 2] {
        [-level.axial::<L>(line), level.column(line)]
    }
}

#[inline(always)]
pub(super) fn two_thirds<L: Lane<W>, const W: usize>() -> L {
    L::splat(2.0 / 3.0)
}

/// Twice the stiffness of all members at a joint; a lowest column counts with (3 + rho)/4 of its own.
#[inline(always)]
fn turning<L: Lane<W>, const W: usize>(level: &Level<W>, line: usize) -> L {
    let mut sum = level.column::<L>(line);
    if level.is_ground() {
        sum = sum * (L::splat(0.75) + L::splat(0.25) * level.rho(line));
    }
    if !level.is_roof() {
        sum = sum + level.column_above(line);
    }
    if line > 0 {
        sum = sum + level.beam(line - 1);
    }
    if line < level.bays() {
        sum = sum + level.beam(line);
    }
    sum + sum
}
