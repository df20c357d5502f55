//! Four lanes in one 256-bit register, and the one way to run code that uses them.
//!
//! The only unsafe code of the crate. It rests on one fact: an [`Avx2`] and its words exist only inside [`four`], which
//! runs only with a [`Proof`] that the processor has these registers; nothing outside this file makes any of them.
#![allow(unsafe_code, reason = "intrinsics of registers that not every processor has; see the module page")]

use super::{BIAS, EXPONENT, Lane, Task, WHOLE, Words};
use std::arch::x86_64::{
    __m256d, __m256i, _CMP_LT_OQ, _mm256_add_pd, _mm256_andnot_pd, _mm256_blend_epi32, _mm256_blendv_pd,
    _mm256_castpd_si256, _mm256_castsi256_pd, _mm256_cmp_pd, _mm256_div_pd, _mm256_loadu_pd, _mm256_loadu_si256,
    _mm256_max_pd, _mm256_min_pd, _mm256_movemask_pd, _mm256_mul_epu32, _mm256_mul_pd, _mm256_set1_epi64x,
    _mm256_set1_pd, _mm256_slli_epi64, _mm256_sqrt_pd, _mm256_srli_epi64, _mm256_storeu_pd, _mm256_storeu_si256,
    _mm256_sub_pd, _mm256_xor_pd, _mm256_xor_si256,
};
use std::ops::{Add, BitXor, Div, Mul, Neg, Sub};

/// Four frames in one register.
#[derive(Debug, Clone, Copy)]
struct Avx2(__m256d);

/// Whole numbers of four frames in one register; made from an [`Avx2`]'s own operations only.
#[derive(Debug, Clone, Copy)]
struct Avx2Words(__m256i);

/// The proof that this processor has AVX2.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Proof(());

impl Proof {
    /// Asks the processor.
    pub(super) fn find() -> Option<Self> {
        std::is_x86_feature_detected!("avx2").then_some(Self(()))
    }

    /// Does `task` four frames at a time.
    pub(super) fn four<T: Task<4>>(self, task: T) -> T::Output {
        // SAFETY: a proof is made in `find` only, where the processor said that it has AVX2.
        unsafe { four(task) }
    }
}

/// The trampoline: all that is inlined here is compiled for AVX2.
#[target_feature(enable = "avx2")]
fn four<T: Task<4>>(task: T) -> T::Output {
    task.run::<Avx2>()
}

impl Add for Avx2 {
    type Output = Self;
    #[inline(always)]
    fn add(self, other: Self) -> Self {
        // SAFETY: see the module page: the processor has AVX2. This holds for every block below.
        Self(unsafe { _mm256_add_pd(self.0, other.0) })
    }
}

impl Sub for Avx2 {
    type Output = Self;
    #[inline(always)]
    fn sub(self, other: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_sub_pd(self.0, other.0) })
    }
}

impl Mul for Avx2 {
    type Output = Self;
    #[inline(always)]
    fn mul(self, other: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_mul_pd(self.0, other.0) })
    }
}

impl Div for Avx2 {
    type Output = Self;
    #[inline(always)]
    fn div(self, other: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_div_pd(self.0, other.0) })
    }
}

impl Neg for Avx2 {
    type Output = Self;
    #[inline(always)]
    fn neg(self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_xor_pd(self.0, _mm256_set1_pd(-0.0)) })
    }
}

impl Lane<4> for Avx2 {
    type Words = Avx2Words;
    #[inline(always)]
    fn load(from: &[f64; 4]) -> Self {
        // SAFETY: as in `add`; the reference covers the 32 bytes read, which need no alignment.
        Self(unsafe { _mm256_loadu_pd(from.as_ptr()) })
    }
    #[inline(always)]
    fn store(self, to: &mut [f64; 4]) {
        // SAFETY: as in `add`; the reference covers the 32 bytes written, which need no alignment.
        unsafe { _mm256_storeu_pd(to.as_mut_ptr(), self.0) }
    }
    #[inline(always)]
    fn splat(value: f64) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_set1_pd(value) })
    }
    #[inline(always)]
    fn min(self, other: Self) -> Self {
        // SAFETY: as in `add`. The instruction gives `self < other ? self : other`.
        Self(unsafe { _mm256_min_pd(self.0, other.0) })
    }
    #[inline(always)]
    fn max(self, other: Self) -> Self {
        // SAFETY: as in `add`. The instruction gives `self > other ? self : other`.
        Self(unsafe { _mm256_max_pd(self.0, other.0) })
    }
    #[inline(always)]
    fn if_less(self, other: Self, then: Self, otherwise: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_blendv_pd(otherwise.0, then.0, _mm256_cmp_pd::<_CMP_LT_OQ>(self.0, other.0)) })
    }
    #[inline(always)]
    fn any_less(self, other: Self) -> bool {
        // SAFETY: as in `add`.
        unsafe { _mm256_movemask_pd(_mm256_cmp_pd::<_CMP_LT_OQ>(self.0, other.0)) != 0 }
    }
    #[inline(always)]
    fn abs(self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_andnot_pd(_mm256_set1_pd(-0.0), self.0) })
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_sqrt_pd(self.0) })
    }
    #[inline(always)]
    fn power_of_two(self) -> Self {
        // SAFETY: as in `add`.
        let whole = unsafe { _mm256_castpd_si256(_mm256_add_pd(self.0, _mm256_set1_pd(WHOLE + BIAS))) };
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_castsi256_pd(_mm256_slli_epi64::<{ EXPONENT as i32 }>(whole)) })
    }
    #[inline(always)]
    fn of_low(words: Avx2Words) -> Self {
        // SAFETY: as in `add`.
        let whole = unsafe { _mm256_set1_pd(WHOLE) };
        // SAFETY: as in `add`. The blend takes every second 32 bits, the high halves, from `whole`.
        let above = unsafe { _mm256_blend_epi32::<0b1010_1010>(words.0, _mm256_castpd_si256(whole)) };
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_sub_pd(_mm256_castsi256_pd(above), whole) })
    }
}

impl BitXor for Avx2Words {
    type Output = Self;
    #[inline(always)]
    fn bitxor(self, other: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_xor_si256(self.0, other.0) })
    }
}

impl Words<4> for Avx2Words {
    #[inline(always)]
    fn load(from: &[u64; 4]) -> Self {
        // SAFETY: as in `add`; the reference covers the 32 bytes read, which need no alignment.
        Self(unsafe { _mm256_loadu_si256(from.as_ptr().cast()) })
    }
    #[inline(always)]
    fn store(self, to: &mut [u64; 4]) {
        // SAFETY: as in `add`; the reference covers the 32 bytes written, which need no alignment.
        unsafe { _mm256_storeu_si256(to.as_mut_ptr().cast(), self.0) }
    }
    #[inline(always)]
    fn splat(value: u64) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_set1_epi64x(value.cast_signed()) })
    }
    #[inline(always)]
    fn multiply_low(self, other: Self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_mul_epu32(self.0, other.0) })
    }
    #[inline(always)]
    fn high(self) -> Self {
        // SAFETY: as in `add`.
        Self(unsafe { _mm256_srli_epi64::<32>(self.0) })
    }
}
