//! Philox4x32-10: random words as a pure function of a counter and a key.
//!
//! # References
//! J. K. Salmon, M. A. Moraes, R. O. Dror, D. E. Shaw, Parallel random numbers: as easy as 1, 2, 3, SC11 (2011).

use crate::lane::{Lane, Words};

const ROUNDS: usize = 10;
/// What the first and third word are multiplied by.
const MULTIPLIERS: [u32; 2] = [0xd251_1f53, 0xcd9e_8d57];
/// What is added to the key between rounds.
const WEYL: [u32; 2] = [0x9e37_79b9, 0xbb67_ae85];

/// The four words of one counter.
///
/// # Formula
/// Ten rounds of (a, b, c, d) -> (high(M1 c) ^ b ^ k0, low(M1 c), high(M0 a) ^ d ^ k1, low(M0 a)), the key growing
/// by W0, W1 between rounds.
pub fn philox(counter: [u32; 4], key: [u32; 2]) -> [u32; 4] {
    let [mut a, mut b, mut c, mut d] = counter;
    for [k0, k1] in schedule(key) {
        let first = u64::from(MULTIPLIERS[0]) * u64::from(a);
        let second = u64::from(MULTIPLIERS[1]) * u64::from(c);
        [a, b] = [(second >> 32) as u32 ^ b ^ k0, second as u32];
        [c, d] = [(first >> 32) as u32 ^ d ^ k1, first as u32];
    }
    [a, b, c, d]
}

/// The keys of all rounds.
#[inline(always)]
fn schedule(key: [u32; 2]) -> [[u32; 2]; ROUNDS] {
    let mut keys = [key; ROUNDS];
    for round in 1..ROUNDS {
        let before = keys[round - 1];
        keys[round] = [before[0].wrapping_add(WEYL[0]), before[1].wrapping_add(WEYL[1])];
    }
    keys
}

/// [`philox`] of `W` counters at once under one key.
#[derive(Debug, Clone, Copy)]
pub(super) struct Philox<L: Lane<W>, const W: usize> {
    keys: [[L::Words; 2]; ROUNDS],
}

impl<L: Lane<W>, const W: usize> Philox<L, W> {
    #[inline(always)]
    pub(super) fn new(key: [u32; 2]) -> Self {
        let mut keys = [[L::Words::splat(0); 2]; ROUNDS];
        let words = schedule(key);
        for round in 0..ROUNDS {
            keys[round] = [L::Words::splat(u64::from(words[round][0])), L::Words::splat(u64::from(words[round][1]))];
        }
        Self { keys }
    }

    /// The four words of each lane's counter, in the low halves; high halves mean nothing, neither here nor in `counter`.
    #[inline(always)]
    pub(super) fn words(&self, counter: [L::Words; 4]) -> [L::Words; 4] {
        let [mut a, mut b, mut c, mut d] = counter;
        let multipliers = [L::Words::splat(u64::from(MULTIPLIERS[0])), L::Words::splat(u64::from(MULTIPLIERS[1]))];
        for [k0, k1] in self.keys {
            let (first, second) = (multipliers[0].multiply_low(a), multipliers[1].multiply_low(c));
            [a, b] = [second.high() ^ (b ^ k0), second];
            [c, d] = [first.high() ^ (d ^ k1), first];
        }
        [a, b, c, d]
    }
}
