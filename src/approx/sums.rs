//! Sums of member stiffness over storeys, floors and joints. E I/h of columns, E I/L of beams, N m.

use crate::lane::Lane;
use crate::response::Members;

/// C: sum over the columns of a storey.
pub(super) fn storey_columns<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize) -> L {
    (0..members.lines()).fold(L::splat(0.0), |sum, line| sum + column(members, storey, line))
}

/// G: sum over the beams of a floor.
pub(super) fn floor_beams<L: Lane<W>, const W: usize>(members: &Members<W>, floor: usize) -> L {
    (0..members.bays).fold(L::splat(0.0), |sum, bay| sum + beam(members, floor, bay))
}

/// Sum over the beams at the joint of `floor` on `line`.
pub(super) fn joint_beams<L: Lane<W>, const W: usize>(members: &Members<W>, floor: usize, line: usize) -> L {
    match line {
        0 => beam(members, floor, 0),
        end if end == members.bays => beam(members, floor, end - 1),
        _ => beam::<L, W>(members, floor, line - 1) + beam(members, floor, line),
    }
}

/// Sum over the columns below and above the joint of `floor` on `line`.
pub(super) fn joint_columns<L: Lane<W>, const W: usize>(members: &Members<W>, floor: usize, line: usize) -> L {
    let below: L = column(members, floor, line);
    if floor + 1 < members.storeys { below + column(members, floor + 1, line) } else { below }
}

/// E I/h of one column.
pub(super) fn column<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize, line: usize) -> L {
    L::load(&members.column_stiffness[members.column(storey, line)])
}

/// E I/L of one beam.
pub(super) fn beam<L: Lane<W>, const W: usize>(members: &Members<W>, floor: usize, bay: usize) -> L {
    L::load(&members.beam_stiffness[members.beam(floor, bay)])
}

/// V h of a storey: what its column end moments add up to, N m.
pub(super) fn turning<L: Lane<W>, const W: usize>(members: &Members<W>, storey: usize) -> L {
    L::load(&members.shear[storey]) * L::load(&members.height[storey])
}
