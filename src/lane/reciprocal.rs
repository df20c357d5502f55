//! Several reciprocals from one division, which costs as much as a dozen multiplications.

use super::Lane;

/// One over each of `numbers`, from one division.
///
/// # Formula
/// 1/(a b) is found by division; 1/a = b x that, 1/b = a x that; and so on for more.
///
/// # Assumptions
/// Neither the product of the numbers nor that of their reciprocals overflows. Rounds a few times more than a division
/// each would; a zero or a number that is none spoils its whole group, in its own lane.
#[inline(always)]
pub fn reciprocals<L: Lane<W>, const W: usize, const N: usize>(numbers: [L; N]) -> [L; N] {
    let mut results = numbers;
    let mut product = L::splat(1.0);
    for index in 0..N {
        results[index] = product;
        product = if index == 0 { numbers[0] } else { product * numbers[index] };
    }
    let mut rest = L::splat(1.0) / product;
    for index in (0..N).rev() {
        results[index] = if index == 0 { rest } else { results[index] * rest };
        rest = rest * numbers[index];
    }
    results
}

/// Puts one over each number of `row` in its place, four to a division; see [`reciprocals`].
#[inline(always)]
pub fn invert<L: Lane<W>, const W: usize>(row: &mut [[f64; W]]) {
    let (fours, rest) = row.as_chunks_mut::<4>();
    for [a, b, c, d] in fours {
        let [e, f, g, h] = reciprocals([L::load(a), L::load(b), L::load(c), L::load(d)]);
        e.store(a);
        f.store(b);
        g.store(c);
        h.store(d);
    }
    for number in rest {
        (L::splat(1.0) / L::load(number)).store(number);
    }
}
