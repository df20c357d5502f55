//! W frames side by side: the arithmetic every method is written in.
//!
//! A method is written once over [`Lane`]. With `f64` it computes one frame; with [`Plain`], or on processors that have
//! them with 256-bit registers, it computes four frames whose numbers stand side by side as `[f64; 4]`. No operation is
//! fused and lanes never mix, so a frame gives the same bits in every form
//! (but for the payload of numbers that are none).
//!
//! Work is handed to a [`Form`] as a [`Task`]: the form runs it in the lanes it stands for. [`Rows`] holds lanes in memory.

#[cfg(target_arch = "x86_64")]
mod avx2;
mod block;
mod exp;
mod form;
mod plain;
mod reciprocal;
mod rows;
mod words;

pub use block::{Block, RowTask, RowWidth};
pub use exp::{EXP_REACH, exp};
pub use form::{Form, Task, Width};
pub use plain::Plain;
pub use reciprocal::{invert, reciprocals};
pub use rows::Rows;
pub use words::{PlainWords, Words};

use std::ops::{Add, Div, Mul, Neg, Sub};

/// `W` independent numbers, one per frame.
///
/// # Assumptions
/// Every operation acts on each lane alone and rounds once, as plain `f64` arithmetic does.
pub trait Lane<const W: usize>:
    Copy + Add<Output = Self> + Sub<Output = Self> + Mul<Output = Self> + Div<Output = Self> + Neg<Output = Self>
{
    /// Whole numbers in the same lanes.
    type Words: Words<W>;

    /// Reads the lanes of `from`.
    fn load(from: &[f64; W]) -> Self;
    /// Writes the lanes to `to`.
    fn store(self, to: &mut [f64; W]);
    /// The same number in every lane.
    fn splat(value: f64) -> Self;
    /// The smaller number, lane by lane; `other` where either is no number.
    fn min(self, other: Self) -> Self;
    /// The larger number, lane by lane; `other` where either is no number.
    fn max(self, other: Self) -> Self;
    /// `then` where `self < other`, `otherwise` elsewhere and where either is no number, lane by lane.
    fn if_less(self, other: Self, then: Self, otherwise: Self) -> Self;
    /// Whether `self < other` in any lane: for skipping work that would change nothing in the others.
    fn any_less(self, other: Self) -> bool;
    /// The magnitude, lane by lane.
    fn abs(self) -> Self;
    /// The square root, lane by lane; IEEE 754 rounds it once, so it has the same bits everywhere.
    fn sqrt(self) -> Self;
    /// 2^self, exact, where `self` is a whole number from -1022 to 1023.
    fn power_of_two(self) -> Self;
    /// The low halves of `words` as numbers, exact.
    fn of_low(words: Self::Words) -> Self;
}

/// 2^52: in a number from here to 2^53 the low bits are those of the whole number above it.
const WHOLE: f64 = 4_503_599_627_370_496.0;
/// What the exponent of a number is stored above.
const BIAS: f64 = 1023.0;
/// Where the exponent of a number is stored.
const EXPONENT: u32 = 52;

impl Lane<1> for f64 {
    type Words = u64;
    #[inline(always)]
    fn load(from: &[f64; 1]) -> Self {
        from[0]
    }
    #[inline(always)]
    fn store(self, to: &mut [f64; 1]) {
        to[0] = self;
    }
    #[inline(always)]
    fn splat(value: f64) -> Self {
        value
    }
    #[inline(always)]
    fn min(self, other: Self) -> Self {
        if self < other { self } else { other }
    }
    #[inline(always)]
    fn max(self, other: Self) -> Self {
        if self > other { self } else { other }
    }
    #[inline(always)]
    fn if_less(self, other: Self, then: Self, otherwise: Self) -> Self {
        if self < other { then } else { otherwise }
    }
    #[inline(always)]
    fn any_less(self, other: Self) -> bool {
        self < other
    }
    #[inline(always)]
    fn abs(self) -> Self {
        f64::abs(self)
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        f64::sqrt(self)
    }
    #[inline(always)]
    fn power_of_two(self) -> Self {
        f64::from_bits((self + (WHOLE + BIAS)).to_bits() << EXPONENT)
    }
    #[inline(always)]
    fn of_low(words: u64) -> Self {
        f64::from_bits((words & 0xffff_ffff) | WHOLE.to_bits()) - WHOLE
    }
}

#[cfg(test)]
mod tests;
