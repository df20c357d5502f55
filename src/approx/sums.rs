//! Sums of member stiffness over storeys, floors and joints. E I/h of columns, E I/L of beams, N m.

use crate::lane::Lane;
use crate::response::MemberRows;

/// C: sum over the columns of a storey.
#[inline(always)]
pub(super) fn storey_columns<L: Lane<W>, const W: usize>(members: &MemberRows<W>, storey: usize) -> L {
    of_row(members.columns_of(members.column_stiffness, storey))
}

/// G: sum over the beams of a floor.
#[inline(always)]
pub(super) fn floor_beams<L: Lane<W>, const W: usize>(members: &MemberRows<W>, floor: usize) -> L {
    of_row(members.beams_of(members.beam_stiffness, floor))
}

#[inline(always)]
fn of_row<L: Lane<W>, const W: usize>(row: &[[f64; W]]) -> L {
    let mut sum = L::splat(0.0);
    for number in row {
        sum = sum + L::load(number);
    }
    sum
}

/// Fills `sums` with the sum over the beams at every joint.
#[inline(always)]
pub(super) fn joint_beams<L: Lane<W>, const W: usize>(members: &MemberRows<W>, sums: &mut [[f64; W]]) {
    for (beams, sums) in members.by_floor(members.beam_stiffness).zip(members.by_storey_mut(sums)) {
        let mut left = L::splat(0.0);
        for bay in 0..members.bays {
            let right = L::load(&beams[bay]);
            (left + right).store(&mut sums[bay]);
            left = right;
        }
        left.store(&mut sums[members.bays]);
    }
}

/// Fills `sums` with the sum over the columns below and above every joint.
#[inline(always)]
pub(super) fn joint_columns<L: Lane<W>, const W: usize>(members: &MemberRows<W>, sums: &mut [[f64; W]]) {
    let mut above: Option<&[[f64; W]]> = None;
    for (columns, sums) in members.by_storey(members.column_stiffness).zip(members.by_storey_mut(sums)).rev() {
        for line in 0..members.lines() {
            let mut sum = L::load(&columns[line]);
            if let Some(above) = above {
                sum = sum + L::load(&above[line]);
            }
            sum.store(&mut sums[line]);
        }
        above = Some(columns);
    }
}

/// V h of a storey: what its column end moments add up to, N m.
#[inline(always)]
pub(super) fn turning<L: Lane<W>, const W: usize>(members: &MemberRows<W>, storey: usize) -> L {
    L::load(&members.shear[storey]) * L::load(&members.height[storey])
}

/// The centroid of weights at `positions`, and their second moment sum(w d^2) about it.
#[inline(always)]
pub(super) fn about_centroid<L: Lane<W>, const W: usize>(weights: &[[f64; W]], positions: &[[f64; W]]) -> [L; 2] {
    let (mut sum, mut first, mut second) = (L::splat(0.0), L::splat(0.0), L::splat(0.0));
    for (weight, position) in weights.iter().zip(positions) {
        let weight = L::load(weight);
        sum = sum + weight;
        first = first + weight * L::load(position);
    }
    let centroid = first / sum;
    for (weight, position) in weights.iter().zip(positions) {
        let distance = L::load(position) - centroid;
        second = second + L::load(weight) * distance * distance;
    }
    [centroid, second]
}
