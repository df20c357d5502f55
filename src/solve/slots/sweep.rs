//! The way up: unknowns are eliminated from the ground to the roof.

use super::frames::{Frames, Level};
use super::group::{Group, WRITTEN_OUT};
use super::joint::{Unknowns, two_thirds};
use super::record::{LevelRecord, Record};
use super::window::{Eliminated, Window};
use crate::lane::Lane;
use std::marker::PhantomData;

/// A sweep over frames whose joints have `B` unknowns of kind `U`.
pub(super) struct Sweep<U, L, M, const W: usize, const B: usize> {
    pub window: M,
    pub unknowns: PhantomData<(U, L)>,
}

impl<U, L, M, const W: usize, const B: usize> Sweep<U, L, M, W, B>
where
    U: Unknowns<B>,
    L: Lane<W>,
    M: Window<L, W>,
{
    /// Eliminates all unknowns; returns what the pivots had to spare: a frame cannot stand where it is not positive.
    #[inline(always)]
    pub(super) fn run(&mut self, frames: &Frames<W>, record: &mut Record<W>) -> L {
        let order = self.window.order();
        let lines = (order - 1) / B;
        let ground = frames.level::<B>(0, lines);
        self.open(&ground);
        let (mut first, mut levels) = record.up([order, self.window.stride()]);
        let _: Eliminated<L, 1> = self.window.eliminate(order, 0, &mut first);
        if !ground.is_roof() {
            self.storey_comes_in(&ground);
        }
        for storey in 1..frames.storeys {
            if let Some(mut record) = levels.next() {
                self.replace(&frames.level::<B>(storey, lines), &mut record);
            }
        }
        if let Some(mut record) = levels.next() {
            self.close(&mut record);
        }
        self.window.reserve()
    }

    /// The lowest level comes in.
    #[inline(always)]
    fn open(&mut self, ground: &Level<W>) {
        let mut storey = L::splat(0.0);
        for line in 0..=ground.bays() {
            let (column, rho, place) = (ground.column::<L>(line), ground.rho::<L>(line), 1 + B * line);
            storey = storey + column * (L::splat(1.0 / 6.0) + L::splat(0.5) * rho);
            self.window.set(0, place + B - 1, column * (L::splat(0.5) + L::splat(0.5) * rho));
            self.add_joint(ground, line, place);
        }
        self.window.set(0, 0, storey);
        self.window.set_diagonal(0, storey);
        self.window.set_right(0, ground.push());
    }

    /// Eliminates the joints in the window, with the last of them the storey above; the joints of `next`, the level above,
    /// take their slots, and the storey above those.
    #[inline(always)]
    fn replace(&mut self, next: &Level<W>, record: &mut LevelRecord<W>) {
        let groups = Group::groups((self.window.order() - 1) / B, B, true);
        if groups > WRITTEN_OUT {
            for index in 0..groups {
                self.replace_group(index, next, record);
            }
        } else {
            self.replace_group(0, next, record);
            if groups > 1 {
                self.replace_group(1, next, record);
            }
            if groups > 2 {
                self.replace_group(2, next, record);
            }
        }
        if !next.is_roof() {
            self.storey_comes_in(next);
        }
    }

    #[inline(always)]
    fn replace_group(&mut self, index: usize, next: &Level<W>, record: &mut LevelRecord<W>) {
        let group = Group::of(index, (self.window.order() - 1) / B, B, true);
        match (group.count * B, group.storey) {
            (1, false) if B == 1 => self.replace_joints::<1>(next, group, record),
            (1, true) if B == 1 => self.replace_joints::<2>(next, group, record),
            (3, _) if B == 1 => self.replace_joints::<3>(next, group, record),
            (_, false) => self.replace_joints::<2>(next, group, record),
            (_, true) => self.replace_joints::<3>(next, group, record),
        }
    }

    /// Eliminates a group, which stands at the front; the joints above come in at the back.
    #[inline(always)]
    fn replace_joints<const G: usize>(&mut self, next: &Level<W>, group: Group, record: &mut LevelRecord<W>) {
        let below = self.window.eliminate::<G>(self.window.order(), B * group.line, record);
        self.joints_come_in::<G>(next, group, &below, record);
    }

    /// Eliminates the joints of the roof; the window runs empty.
    #[inline(always)]
    fn close(&mut self, record: &mut LevelRecord<W>) {
        let groups = Group::groups((self.window.order() - 1) / B, B, false);
        if groups > WRITTEN_OUT {
            for index in 0..groups {
                self.close_group(index, record);
            }
        } else {
            self.close_group(0, record);
            if groups > 1 {
                self.close_group(1, record);
            }
            if groups > 2 {
                self.close_group(2, record);
            }
        }
    }

    /// Eliminates a group at the front of a window that holds it and those behind it.
    #[inline(always)]
    fn close_group(&mut self, index: usize, record: &mut LevelRecord<W>) {
        let lines = (self.window.order() - 1) / B;
        let group = Group::of(index, lines, B, false);
        let (held, first) = (B * (lines - group.line), B * group.line);
        match group.count * B {
            1 if B == 1 => _ = self.window.eliminate::<1>(held, first, record),
            3 if B == 1 => _ = self.window.eliminate::<3>(held, first, record),
            _ => _ = self.window.eliminate::<2>(held, first, record),
        }
    }

    /// The storey above a level comes in behind the level's joints; no term binds it to anything eliminated.
    #[inline(always)]
    fn storey_comes_in(&mut self, level: &Level<W>) {
        let back = self.window.order() - 1;
        let mut sum = L::splat(0.0);
        for line in 0..=level.bays() {
            let column = level.column_above(line);
            sum = sum + column;
            for unknown in 0..B {
                let turns = unknown == B - 1;
                self.window.set(B * line + unknown, back, if turns { column } else { L::splat(0.0) });
            }
        }
        let own = two_thirds::<L, W>() * sum;
        self.window.set(back, back, own);
        self.window.set_diagonal(back, own);
        self.window.set_right(back, level.push_above());
    }

    /// The joints above a group come in at the back. Terms K bind each to the joint just eliminated below it and, through
    /// the same column, its rotation to the storey between them, which may be of the group as well.
    ///
    /// # Formula
    /// With D and y of the eliminated block: the new rows are -K' M in the columns of the others and -K' D^-1 K among
    /// themselves, the new right-hand side -K' y; then come the joints' own terms.
    #[inline(always)]
    fn joints_come_in<const G: usize>(
        &mut self,
        level: &Level<W>,
        group: Group,
        below: &Eliminated<L, G>,
        record: &mut LevelRecord<W>,
    ) {
        let (back, first, joints) = (self.window.order() - G, B * group.line, B * group.count);
        // Whether an unknown above is bound to the storey in the group, the last of it.
        let bound = |index: usize| group.storey && index % B == B - 1;
        let mut bonds = [L::splat(0.0); G];
        for index in 0..joints {
            bonds[index] = U::column::<L, W>(level, group.line + index / B)[index % B];
        }
        for index in 0..joints {
            let minus = -bonds[index];
            let multipliers = record.multipliers(first + index, 1);
            let storey = record.multipliers(first + G - 1, 1);
            for row in 0..back {
                let mut multiplier = L::load(&multipliers[row]);
                if bound(index) {
                    multiplier = multiplier + L::load(&storey[row]);
                }
                self.window.set(row, back + index, minus * multiplier);
            }
            let mut column = [L::splat(0.0); G];
            for row in 0..G {
                column[row] = below.inverse[row][index];
                if bound(index) {
                    column[row] = column[row] + below.inverse[row][G - 1];
                }
                column[row] = column[row] * bonds[index];
                column[row].store(record.multiplier(first + row, back + index));
            }
            for other in 0..=index {
                let sum = if bound(other) { column[other] + column[G - 1] } else { column[other] };
                self.window.set(back + other, back + index, -(bonds[other] * sum));
            }
            let right = if bound(index) { below.right[index] + below.right[G - 1] } else { below.right[index] };
            self.window.set_right(back + index, minus * right);
        }
        let storey = B * (level.bays() + 1 - group.line - group.count);
        for index in 0..group.count {
            let place = back + B * index;
            if !group.storey {
                self.window.add(storey, place + B - 1, bonds[B * index + B - 1]);
            }
            self.add_joint(level, group.line + index, place);
        }
    }

    /// The terms of a joint, which stands at `place`, with itself and with the joint on its left, right before it.
    #[inline(always)]
    fn add_joint(&mut self, level: &Level<W>, line: usize, place: usize) {
        let own = U::own::<L, W>(level, line);
        for row in 0..B {
            self.window.set_diagonal(place + row, own[row][row]);
            for column in row..B {
                self.window.add(place + row, place + column, own[row][column]);
            }
        }
        if line > 0 {
            let beam = U::beam::<L, W>(level, line - 1);
            for row in 0..B {
                for column in 0..B {
                    self.window.add(place - B + row, place + column, beam[row][column]);
                }
            }
        }
    }
}
