//! Which random number belongs to which parameter of which draw.
//!
//! # Formula
//! A draw's number for parameter p is u = (w + 1/2) / 2^32, in (0, 1), with w word p mod 4 of the Philox4x32-10 block
//! whose key is the seed (low, high half) and whose counter is (draw number low, high half, p div 4, stream). So a
//! number depends on seed, stream, draw and parameter alone, whatever else is drawn, on any machine.

use super::philox::{Philox, philox};
use crate::frame::sizes::SIZE_PARAMETERS;
use crate::lane::{Lane, Words};
use std::ops::Range;

/// Parameters 0 to 8: the ranges of a size model in the order of `SizeModel::at`, a fixed one included.
pub const SIZES: Range<usize> = 0..SIZE_PARAMETERS;
/// Parameter 9: the factor on all beams of a frame of known sizes.
pub const WITHIN_BEAMS: usize = 9;
/// Parameter 10: the factor on everything in a frame of known sizes.
pub const WITHIN_ALL: usize = 10;
/// Parameters 16 to 31: shape and loads of a family's frames; 11 to 15 are kept free.
pub const SHAPE_AND_LOADS: Range<usize> = 16..32;
/// Parameters from 32 on: one for each column in the order they are stored, then one for each beam.
pub const MEMBERS: usize = 32;

/// Numbers in a block.
const BLOCK: usize = 4;
/// 2^-32.
const STEP: f64 = 1.0 / 4_294_967_296.0;

/// Where draws come from.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub struct Source {
    /// The seed of all draws.
    pub seed: u64,
    /// Streams of one seed share no number; bounds are drawn from stream 0.
    pub stream: u32,
}

impl Source {
    /// Stream 0 of a seed.
    pub fn new(seed: u64) -> Self {
        Self { seed, stream: 0 }
    }

    /// The number in (0, 1) of `parameter` in `draw`.
    pub fn share(self, draw: u64, parameter: usize) -> f64 {
        let [low, high] = halves(draw);
        let words = philox([low, high, (parameter / BLOCK) as u32, self.stream], halves(self.seed));
        (f64::from(words[parameter % BLOCK]) + 0.5) * STEP
    }
}

/// Low and high half.
fn halves(number: u64) -> [u32; 2] {
    [number as u32, (number >> 32) as u32]
}

/// The numbers of `W` draws side by side.
#[derive(Debug, Clone, Copy)]
pub(super) struct Numbers<L: Lane<W>, const W: usize> {
    philox: Philox<L, W>,
    draw: L::Words,
    stream: L::Words,
}

impl<L: Lane<W>, const W: usize> Numbers<L, W> {
    #[inline(always)]
    pub(super) fn new(source: Source, draws: [u64; W]) -> Self {
        let stream = L::Words::splat(u64::from(source.stream));
        Self { philox: Philox::new(halves(source.seed)), draw: L::Words::load(&draws), stream }
    }

    #[inline(always)]
    fn words(&self, block: usize) -> [L::Words; BLOCK] {
        self.philox.words([self.draw, self.draw.high(), L::Words::splat(block as u64), self.stream])
    }

    /// The numbers in (0, 1) of one block of parameters.
    #[inline(always)]
    pub(super) fn shares(&self, block: usize) -> [L; BLOCK] {
        let mut shares = [L::splat(0.0); BLOCK];
        let words = self.words(block);
        for index in 0..BLOCK {
            shares[index] = (L::of_low(words[index]) + L::splat(0.5)) * L::splat(STEP);
        }
        shares
    }

    /// Fills `rows` with `reach` (2u - 1) for the numbers u of consecutive parameters from `first` on.
    #[inline(always)]
    pub(super) fn centred(&self, first: usize, reach: f64, rows: &mut [[f64; W]]) {
        let lead = first.wrapping_neg() % BLOCK;
        let (head, rest) = rows.split_at_mut(lead.min(rows.len()));
        self.some(first, reach, head);
        let (blocks, tail) = rest.as_chunks_mut::<BLOCK>();
        let mut block = (first + lead) / BLOCK;
        for rows in blocks {
            let words = self.words(block);
            for index in 0..BLOCK {
                centre::<L, W>(words[index], reach).store(&mut rows[index]);
            }
            block += 1;
        }
        self.some(block * BLOCK, reach, tail);
    }

    /// [`Self::centred`] within one block.
    #[inline(always)]
    fn some(&self, first: usize, reach: f64, rows: &mut [[f64; W]]) {
        if rows.is_empty() {
            return;
        }
        let words = self.words(first / BLOCK);
        for index in 0..rows.len() {
            centre::<L, W>(words[first % BLOCK + index], reach).store(&mut rows[index]);
        }
    }
}

/// reach (2u - 1) of one word; scaling by powers of two is exact, so it is the same number as from u.
#[inline(always)]
fn centre<L: Lane<W>, const W: usize>(word: L::Words, reach: f64) -> L {
    (L::of_low(word) + L::splat(0.5 - 0.5 / STEP)) * L::splat(2.0 * STEP * reach)
}
