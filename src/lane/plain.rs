//! Four lanes in arithmetic that every processor has.

use super::{Lane, PlainWords};
use std::ops::{Add, Div, Mul, Neg, Sub};

/// Four frames in portable arithmetic.
#[derive(Debug, Clone, Copy, PartialEq)]
#[repr(align(32))]
pub struct Plain([f64; 4]);

impl Add for Plain {
    type Output = Self;
    #[inline(always)]
    fn add(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a + e, b + f, c + g, d + h])
    }
}

impl Sub for Plain {
    type Output = Self;
    #[inline(always)]
    fn sub(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a - e, b - f, c - g, d - h])
    }
}

impl Mul for Plain {
    type Output = Self;
    #[inline(always)]
    fn mul(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a * e, b * f, c * g, d * h])
    }
}

impl Div for Plain {
    type Output = Self;
    #[inline(always)]
    fn div(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([a / e, b / f, c / g, d / h])
    }
}

impl Neg for Plain {
    type Output = Self;
    #[inline(always)]
    fn neg(self) -> Self {
        let [a, b, c, d] = self.0;
        Self([-a, -b, -c, -d])
    }
}

impl Lane<4> for Plain {
    type Words = PlainWords;
    #[inline(always)]
    fn load(from: &[f64; 4]) -> Self {
        Self(*from)
    }
    #[inline(always)]
    fn store(self, to: &mut [f64; 4]) {
        *to = self.0;
    }
    #[inline(always)]
    fn splat(value: f64) -> Self {
        Self([value; 4])
    }
    #[inline(always)]
    fn min(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([Lane::<1>::min(a, e), Lane::<1>::min(b, f), Lane::<1>::min(c, g), Lane::<1>::min(d, h)])
    }
    #[inline(always)]
    fn max(self, other: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        Self([Lane::<1>::max(a, e), Lane::<1>::max(b, f), Lane::<1>::max(c, g), Lane::<1>::max(d, h)])
    }
    #[inline(always)]
    fn if_less(self, other: Self, then: Self, otherwise: Self) -> Self {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        let ([i, j, k, l], [m, n, o, p]) = (then.0, otherwise.0);
        Self([a.if_less(e, i, m), b.if_less(f, j, n), c.if_less(g, k, o), d.if_less(h, l, p)])
    }
    #[inline(always)]
    fn any_less(self, other: Self) -> bool {
        let ([a, b, c, d], [e, f, g, h]) = (self.0, other.0);
        (a < e) | (b < f) | (c < g) | (d < h)
    }
    #[inline(always)]
    fn abs(self) -> Self {
        let [a, b, c, d] = self.0;
        Self([a.abs(), b.abs(), c.abs(), d.abs()])
    }
    #[inline(always)]
    fn sqrt(self) -> Self {
        let [a, b, c, d] = self.0;
        Self([a.sqrt(), b.sqrt(), c.sqrt(), d.sqrt()])
    }
    #[inline(always)]
    fn power_of_two(self) -> Self {
        let [a, b, c, d] = self.0;
        Self([a.power_of_two(), b.power_of_two(), c.power_of_two(), d.power_of_two()])
    }
    #[inline(always)]
    fn of_low(words: PlainWords) -> Self {
        let [a, b, c, d] = words.0;
        Self([f64::of_low(a), f64::of_low(b), f64::of_low(c), f64::of_low(d)])
    }
}
