//! The inverse of a small symmetric block, and whether its pivots are sound.

use crate::lane::Lane;

/// A pivot smaller than this, relative to the unknown's own diagonal term, counts as no stiffness at all; the
/// block-tridiagonal elimination takes the same share, for the same reason.
const PIVOT_FLOOR: f64 = 1e-13;

/// The inverse of a symmetric block of 1, 2 or 3 by cofactors; `diagonal` is its diagonal before any elimination.
///
/// `reserve` falls to what the least pivot, times the leading minor before it, has over [`PIVOT_FLOOR`] of its own
/// diagonal term: a frame cannot stand where it is not positive. It also falls to the reciprocal of the determinant, which
/// is zero where that overflows. A pivot that is no number may pass here: it reaches every unknown, and is found there.
#[inline(always)]
pub(super) fn inverse<L: Lane<W>, const W: usize, const G: usize>(
    block: &[[L; G]; G],
    diagonal: &[L; G],
    reserve: &mut L,
) -> [[L; G]; G] {
    let (one, floor) = (L::splat(1.0), L::splat(PIVOT_FLOOR));
    let mut inverse = [[one; G]; G];
    let a = block[0][0];
    *reserve = reserve.min(a - floor * diagonal[0]);
    if G == 1 {
        inverse[0][0] = one / a;
        *reserve = reserve.min(inverse[0][0]);
        return inverse;
    }
    let (b, d) = (block[0][1], block[1][1]);
    let minor = a * d - b * b;
    *reserve = reserve.min(minor - floor * diagonal[1] * a);
    if G == 2 {
        let scale = one / minor;
        *reserve = reserve.min(scale);
        (inverse[0][0], inverse[1][1]) = (d * scale, a * scale);
        inverse[0][1] = -(b * scale);
        inverse[1][0] = inverse[0][1];
        return inverse;
    }
    let (c, e, f) = (block[0][2], block[1][2], block[2][2]);
    let (first, second, third) = (d * f - e * e, c * e - b * f, b * e - c * d);
    let determinant = a * first + b * second + c * third;
    *reserve = reserve.min(determinant - floor * diagonal[2] * minor);
    let scale = one / determinant;
    *reserve = reserve.min(scale);
    (inverse[0][0], inverse[1][1], inverse[2][2]) = (first * scale, (a * f - c * c) * scale, minor * scale);
    (inverse[0][1], inverse[0][2], inverse[1][2]) = (second * scale, third * scale, (b * c - a * e) * scale);
    (inverse[1][0], inverse[2][0], inverse[2][1]) = (inverse[0][1], inverse[0][2], inverse[1][2]);
    inverse
}
