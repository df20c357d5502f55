//! Whole numbers in lanes: what random numbers are made of.

use std::ops::BitXor;

/// `W` independent whole numbers of 64 bits, one per frame. Their *low half* is the lower 32 bits.
pub trait Words<const W: usize>: Copy + BitXor<Output = Self> {
    /// Reads the lanes of `from`.
    fn load(from: &[u64; W]) -> Self;
    /// Writes the lanes to `to`.
    fn store(self, to: &mut [u64; W]);
    /// The same number in every lane.
    fn splat(value: u64) -> Self;
    /// The whole product of the low halves; high halves do not count.
    fn multiply_low(self, other: Self) -> Self;
    /// The high half, moved into the low half's place.
    fn high(self) -> Self;
}

const LOW: u64 = 0xffff_ffff;

impl Words<1> for u64 {
    #[inline(always)]
    fn load(from: &[u64; 1]) -> Self {
        from[0]
    }
    #[inline(always)]
    fn store(self, to: &mut [u64; 1]) {
        to[0] = self;
    }
    #[inline(always)]
    fn splat(value: u64) -> Self {
        value
    }
    #[inline(always)]
    fn multiply_low(self, other: Self) -> Self {
        (self & LOW) * (other & LOW)
    }
    #[inline(always)]
    fn high(self) -> Self {
        self >> 32
    }
}

/// Four frames in portable arithmetic.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[repr(align(32))]
pub struct PlainWords(pub(super) [u64; 4]);

impl BitXor for PlainWords {
    type Output = Self;
    #[inline(always)]
    fn bitxor(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a ^ e, b ^ f, c ^ g, d ^ h])
    }
}

impl Words<4> for PlainWords {
    #[inline(always)]
    fn load(from: &[u64; 4]) -> Self {
        Self(*from)
    }
    #[inline(always)]
    fn store(self, to: &mut [u64; 4]) {
        *to = self.0;
    }
    #[inline(always)]
    fn splat(value: u64) -> Self {
        Self([value; 4])
    }
    #[inline(always)]
    fn multiply_low(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a.multiply_low(e), b.multiply_low(f), c.multiply_low(g), d.multiply_low(h)])
    }
    #[inline(always)]
    fn high(self) -> Self {
        let [a, b, c, d] = self.0;
        Self([a >> 32, b >> 32, c >> 32, d >> 32])
    }
}
