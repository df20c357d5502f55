//! The way back: unknowns from the roof to the ground; and a second right-hand side on the way up.

use super::group::{Group, WRITTEN_OUT};
use super::record::{LevelRecord, Record};
use crate::lane::Lane;

/// Finds all unknowns from the records of the way up; `sizes` are those of [`Record::up`].
#[inline(always)]
pub(super) fn substitute<L: Lane<W>, const W: usize, const B: usize>(
    sizes: [usize; 2],
    record: &mut Record<W>,
    found: &mut [[f64; W]],
) {
    let order = sizes[0];
    let lines = (order - 1) / B;
    let (levels, ground) = record.down(sizes);
    let mut start = found.len();
    for record in levels {
        let roof = start == found.len();
        start = if roof { start - (order - 1) } else { start - order };
        let found = &mut found[start..];
        let groups = Group::groups(lines, B, !roof);
        if groups > WRITTEN_OUT {
            for index in (0..groups).rev() {
                find::<L, W, B>(index, lines, roof, &record, found);
            }
        } else {
            if groups > 2 {
                find::<L, W, B>(2, lines, roof, &record, found);
            }
            if groups > 1 {
                find::<L, W, B>(1, lines, roof, &record, found);
            }
            find::<L, W, B>(0, lines, roof, &record, found);
        }
    }
    step::<L, W, 1>(0, order - 1, &ground, found);
}

/// Finds the unknowns of a group.
#[inline(always)]
fn find<L: Lane<W>, const W: usize, const B: usize>(
    index: usize,
    lines: usize,
    roof: bool,
    record: &LevelRecord<W>,
    found: &mut [[f64; W]],
) {
    let group = Group::of(index, lines, B, !roof);
    let first = B * group.line;
    // Nothing eliminated with a storey is bound to the next storey, the last unknown of the window.
    let (all, rest) = (1 + B * lines - usize::from(group.storey), B * (lines - group.line - group.count));
    match (group.count * B + usize::from(group.storey), roof) {
        (1, false) if B == 1 => step::<L, W, 1>(first, all, record, found),
        (2, false) => step::<L, W, 2>(first, all, record, found),
        (_, false) => step::<L, W, 3>(first, all, record, found),
        (1, true) if B == 1 => step::<L, W, 1>(first, rest, record, found),
        (3, true) if B == 1 => step::<L, W, 3>(first, rest, record, found),
        (_, true) => step::<L, W, 2>(first, rest, record, found),
    }
}

/// x = y - M x_rest for the `G` unknowns from `first` on; the `rest` are those right behind them.
///
/// What was found last comes last, so that the sums need not wait for it.
#[inline(always)]
fn step<L: Lane<W>, const W: usize, const G: usize>(
    first: usize,
    rest: usize,
    record: &LevelRecord<W>,
    found: &mut [[f64; W]],
) {
    let (own, behind) = found[first..].split_at_mut(G);
    let behind = &behind[..rest];
    let (mut sums, mut multipliers): ([L; G], [&[[f64; W]]; G]) = ([L::splat(0.0); G], [&[]; G]);
    for row in 0..G {
        sums[row] = L::load(record.right(first + row));
        multipliers[row] = &record.multipliers(first + row, 1)[..rest];
    }
    for index in (0..rest).rev() {
        let value = L::load(&behind[index]);
        for row in 0..G {
            sums[row] = sums[row] - L::load(&multipliers[row][index]) * value;
        }
    }
    for row in 0..G {
        sums[row].store(&mut own[row]);
    }
}

/// Takes another right-hand side, in the order of the unknowns, through the eliminations of the records, and leaves it
/// there for [`substitute`]. `right` is used up.
#[inline(always)]
pub(super) fn forward<L: Lane<W>, const W: usize, const B: usize>(
    sizes: [usize; 2],
    record: &mut Record<W>,
    right: &mut [[f64; W]],
) {
    let order = sizes[0];
    let lines = (order - 1) / B;
    let (mut ground, levels) = record.up(sizes);
    eliminate::<L, W, 1>(0, order - 1, &mut ground, right);
    let mut start = 1;
    for mut record in levels {
        let right = &mut right[start..];
        let roof = right.len() < order;
        start += order;
        for index in 0..Group::groups(lines, B, !roof) {
            let group = Group::of(index, lines, B, !roof);
            let all = 1 + B * lines - usize::from(group.storey);
            let (first, rest) = (B * group.line, if roof { B * (lines - group.line - group.count) } else { all });
            match group.count * B + usize::from(group.storey) {
                1 => eliminate::<L, W, 1>(first, rest, &mut record, right),
                2 => eliminate::<L, W, 2>(first, rest, &mut record, right),
                _ => eliminate::<L, W, 3>(first, rest, &mut record, right),
            }
        }
    }
}

/// y = D^-1 b; c <- c - M' b for the `rest` right behind.
#[inline(always)]
fn eliminate<L: Lane<W>, const W: usize, const G: usize>(
    first: usize,
    rest: usize,
    record: &mut LevelRecord<W>,
    right: &mut [[f64; W]],
) {
    let (own, behind) = right[first..].split_at_mut(G);
    for row in 0..G {
        let mut sum = L::splat(0.0);
        for column in 0..G {
            sum = sum + L::load(record.inverse(first + row, column)) * L::load(&own[column]);
        }
        sum.store(record.right_mut(first + row));
        let multipliers = record.multipliers(first + row, 1);
        for (number, multiplier) in behind[..rest].iter_mut().zip(multipliers) {
            (L::load(number) - L::load(multiplier) * L::load(&own[row])).store(number);
        }
    }
}
