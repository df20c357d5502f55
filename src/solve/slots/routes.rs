//! One compiled route for each kind of joint and order of the window, chosen when the shape is known.

use super::joint::{RiseAndRotation, Rotation, Unknowns};
use super::sweep::Sweep;
use super::wide::{self, Wide};
use super::window::{Narrow, Window};
use super::{Joint, Memory, back, moments, refine};
use crate::lane::{Block, Form, Lane, RowTask, RowWidth, Task};
use crate::response::{Forces, Members};
use std::marker::PhantomData;

/// Most bays whose windows have orders that the compiler knows.
const NARROW: usize = 8;

/// A route as a plain function pointer.
#[derive(Clone, Copy)]
pub struct Route<const W: usize>(pub(super) Solve<W>);

/// Solves the frames; says which of them can stand.
type Solve<const W: usize> = fn(Form, &mut Memory<W>, &Members<W>, &mut Forces<W>) -> [bool; W];

/// Numbers of frames that the routes are compiled for, once, in this crate: one and four.
pub trait Routes<const W: usize>: RowWidth<W> {
    /// The route for frames of `bays` bays.
    fn route(joint: Joint, bays: usize) -> Route<W>;

    /// Numbers from row to row of what that route keeps for the way back; `order` is that of its window.
    fn stride(bays: usize, order: usize) -> usize;
}

impl Routes<1> for Form {
    fn route(joint: Joint, _bays: usize) -> Route<1> {
        // One frame alone is no hurry: windows of any order do for all.
        Route(match joint {
            Joint::Rotation => any::<Rotation, 1, 1>,
            Joint::RiseAndRotation => any::<RiseAndRotation, 1, 2>,
        })
    }

    fn stride(_bays: usize, order: usize) -> usize {
        wide::stride::<1>(order)
    }
}

impl Routes<4> for Form {
    fn route(joint: Joint, bays: usize) -> Route<4> {
        Route(choose(joint, bays))
    }

    fn stride(bays: usize, order: usize) -> usize {
        if bays > NARROW { wide::stride::<4>(order) } else { order }
    }
}

fn choose(joint: Joint, bays: usize) -> Solve<4> {
    match (joint, bays) {
        (Joint::Rotation, 1) => fixed::<Rotation, 1, 3>,
        (Joint::Rotation, 2) => fixed::<Rotation, 1, 4>,
        (Joint::Rotation, 3) => fixed::<Rotation, 1, 5>,
        (Joint::Rotation, 4) => fixed::<Rotation, 1, 6>,
        (Joint::Rotation, 5) => fixed::<Rotation, 1, 7>,
        (Joint::Rotation, 6) => fixed::<Rotation, 1, 8>,
        (Joint::Rotation, 7) => fixed::<Rotation, 1, 9>,
        (Joint::Rotation, 8) => fixed::<Rotation, 1, 10>,
        (Joint::Rotation, _) => any::<Rotation, 4, 1>,
        (Joint::RiseAndRotation, 1) => fixed::<RiseAndRotation, 2, 5>,
        (Joint::RiseAndRotation, 2) => fixed::<RiseAndRotation, 2, 7>,
        (Joint::RiseAndRotation, 3) => fixed::<RiseAndRotation, 2, 9>,
        (Joint::RiseAndRotation, 4) => fixed::<RiseAndRotation, 2, 11>,
        (Joint::RiseAndRotation, 5) => fixed::<RiseAndRotation, 2, 13>,
        (Joint::RiseAndRotation, 6) => fixed::<RiseAndRotation, 2, 15>,
        (Joint::RiseAndRotation, 7) => fixed::<RiseAndRotation, 2, 17>,
        (Joint::RiseAndRotation, 8) => fixed::<RiseAndRotation, 2, 19>,
        (Joint::RiseAndRotation, _) => any::<RiseAndRotation, 4, 2>,
    }
}

/// The window's order is `N`, known to the compiler.
fn fixed<U: Unknowns<B>, const B: usize, const N: usize>(
    form: Form,
    memory: &mut Memory<4>,
    members: &Members<4>,
    forces: &mut Forces<4>,
) -> [bool; 4] {
    form.four(Fixed::<U, B, N> { memory, members, forces, unknowns: PhantomData })
}

struct Fixed<'a, U, const B: usize, const N: usize> {
    memory: &'a mut Memory<4>,
    members: &'a Members<4>,
    forces: &'a mut Forces<4>,
    unknowns: PhantomData<U>,
}

impl<U: Unknowns<B>, const B: usize, const N: usize> Task<4> for Fixed<'_, U, B, N> {
    type Output = [bool; 4];

    #[inline(always)]
    fn run<L: Lane<4>>(self) -> [bool; 4] {
        solve::<U, L, _, 4, B>(Narrow::<L, N>::new(), [N, N], self.memory, self.members, self.forces)
    }
}

/// The window's order is a variable.
fn any<U: Unknowns<B>, const W: usize, const B: usize>(
    form: Form,
    memory: &mut Memory<W>,
    members: &Members<W>,
    forces: &mut Forces<W>,
) -> [bool; W]
where
    Form: RowWidth<W>,
{
    form.run_rows(Any::<U, W, B> { memory, members, forces, unknowns: PhantomData })
}

struct Any<'a, U, const W: usize, const B: usize> {
    memory: &'a mut Memory<W>,
    members: &'a Members<W>,
    forces: &'a mut Forces<W>,
    unknowns: PhantomData<U>,
}

impl<U: Unknowns<B>, const W: usize, const B: usize> RowTask<W> for Any<'_, U, W, B> {
    type Output = [bool; W];

    #[inline(always)]
    fn run<L: Lane<W>, K: Block<L, W>>(self) -> [bool; W] {
        let order = 1 + B * self.members.lines();
        let mut room = [wide::room::<W>(order), wide::room::<W>(order)];
        let window = Wide::<L, K, W>::new(order, room.each_mut().map(|rows| &mut rows[..]));
        solve::<U, L, _, W, B>(window, [order, wide::stride::<W>(order)], self.memory, self.members, self.forces)
    }
}

/// Steps 1 to 9 of the module page.
#[inline(always)]
fn solve<U: Unknowns<B>, L: Lane<W>, M: Window<L, W>, const W: usize, const B: usize>(
    window: M,
    sizes: [usize; 2],
    memory: &mut Memory<W>,
    members: &Members<W>,
    forces: &mut Forces<W>,
) -> [bool; W] {
    let Memory { slope, strain, record, found, change, refines } = memory;
    let order = sizes[0];
    let frames = Memory::frames::<L>(slope, strain, members, B > 1);
    let mut sweep = Sweep::<U, L, M, W, B> { window, unknowns: PhantomData };
    let reserve = sweep.run(&frames, record);
    back::substitute::<L, W, B>(sizes, record, found);
    moments::recover::<L, W, B>(order, &frames, found, forces);
    if *refines {
        refine::misfit::<L, W, B>(order, &frames, found, forces, change);
        back::forward::<L, W, B>(sizes, record, change);
        back::substitute::<L, W, B>(sizes, record, change);
        for (found, change) in found.iter_mut().zip(change.iter()) {
            (L::load(found) + L::load(change)).store(found);
        }
        moments::recover::<L, W, B>(order, &frames, found, forces);
    }
    // The unknown found last depends on all others: where any number is none, so is it.
    let (mut reserves, mut last) = ([0.0; W], [0.0; W]);
    reserve.store(&mut reserves);
    L::load(&found[0]).store(&mut last);
    std::array::from_fn(|lane| reserves[lane] > 0.0 && last[lane].is_finite())
}
