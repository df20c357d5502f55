//! The error measures, once, over lanes. e = exact, q = quick, of one quantity at one place.

use crate::lane::Lane;

/// Share of the frame's largest value that a storey's reference never falls below.
pub const REFERENCE_FLOOR: f64 = 0.05;
/// Share of the reference under which an exact value is too small for a percentage of itself to mean anything.
pub const NEAR_ZERO: f64 = 0.10;
/// Share of the storey's largest quick value under which a quick value is zero: no factor exists.
pub const ZERO: f64 = 1e-9;
/// Share of the storey's largest quick value under which a factor misleads.
pub const WEAK: f64 = 0.05;

/// What the errors of a storey are measured by.
///
/// # Formula
/// max(storey's largest |e|, 5 % of the frame's largest |e|).
#[inline(always)]
pub fn reference<L: Lane<W>, const W: usize>(storey_largest: L, frame_largest: L) -> L {
    storey_largest.max(frame_largest * L::splat(REFERENCE_FLOOR))
}

/// Error in percent of `base`, negative where the quick value is short.
///
/// # Formula
/// 100 (|q| - |e|) / base, with base = |e| for `error_percent` and the storey's reference for `storey_error_percent`.
#[inline(always)]
pub fn error_percent<L: Lane<W>, const W: usize>(exact: L, quick: L, base: L) -> L {
    L::splat(100.0) * (quick.abs() - exact.abs()) / base
}

/// What the quick value must be multiplied by to reach the exact one in size.
///
/// # Formula
/// |e| / |q|.
#[inline(always)]
pub fn factor<L: Lane<W>, const W: usize>(exact: L, quick: L) -> L {
    exact.abs() / quick.abs()
}
