//! Long rows of numbers taken four at a time, whether they belong to four frames or to one.

use super::{Form, Lane, Task, Width};
use std::marker::PhantomData;

/// How a row of `W` lanes is taken in blocks of four numbers: with four frames a block is one entry of each, with one
/// frame it is four entries of that frame.
pub trait Block<L: Lane<W>, const W: usize> {
    /// Four numbers.
    type Four: Lane<4>;
    /// What a block is multiplied by where every entry is multiplied by `factor`.
    fn factor(factor: L) -> Self::Four;
}

/// One entry of four frames.
#[derive(Debug, Clone, Copy)]
pub struct OneEntry;

impl<L: Lane<4>> Block<L, 4> for OneEntry {
    type Four = L;
    #[inline(always)]
    fn factor(factor: L) -> L {
        factor
    }
}

/// Four entries of one frame.
#[derive(Debug, Clone, Copy)]
pub struct Entries<Four>(PhantomData<Four>);

impl<Four: Lane<4>> Block<f64, 1> for Entries<Four> {
    type Four = Four;
    #[inline(always)]
    fn factor(factor: f64) -> Four {
        Four::splat(factor)
    }
}

/// Work written once over lanes, most of it on long rows. See [`Task`].
pub trait RowTask<const W: usize> {
    /// What the work gives.
    type Output;
    /// Does the work in lanes `L`, long rows in blocks `B`.
    fn run<L: Lane<W>, B: Block<L, W>>(self) -> Self::Output;
}

/// A form as the runner of row tasks of `W` lanes.
pub trait RowWidth<const W: usize>: Width<W> {
    /// Does `task`.
    fn run_rows<T: RowTask<W>>(self, task: T) -> T::Output;
}

impl RowWidth<1> for Form {
    fn run_rows<T: RowTask<1>>(self, task: T) -> T::Output {
        self.four(OfOne(task))
    }
}

impl RowWidth<4> for Form {
    fn run_rows<T: RowTask<4>>(self, task: T) -> T::Output {
        self.four(OfFour(task))
    }
}

struct OfOne<T>(T);

impl<T: RowTask<1>> Task<4> for OfOne<T> {
    type Output = T::Output;
    #[inline(always)]
    fn run<Four: Lane<4>>(self) -> T::Output {
        self.0.run::<f64, Entries<Four>>()
    }
}

struct OfFour<T>(T);

impl<T: RowTask<4>> Task<4> for OfFour<T> {
    type Output = T::Output;
    #[inline(always)]
    fn run<L: Lane<4>>(self) -> T::Output {
        self.0.run::<L, OneEntry>()
    }
}
