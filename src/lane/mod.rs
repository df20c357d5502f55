//! W frames side by side: the arithmetic every method is written in.
//!
//! A method is written once over [`Lane`]. With `f64` it computes one frame; with [`Plain`] it computes four
//! frames whose numbers stand side by side as `[f64; 4]`. No operation is fused and lanes never mix, so a
//! frame gives the same bits in either form.

use std::ops::{Add, Div, Mul, Neg, Sub};

/// `W` independent numbers, one per frame.
///
/// # Assumptions
/// Every operation acts on each lane alone and rounds once, as plain `f64` arithmetic does.
pub trait Lane<const W: usize>:
    Copy + Add<Output = Self> + Sub<Output = Self> + Mul<Output = Self> + Div<Output = Self> + Neg<Output = Self>
{
    /// Reads the lanes of `from`.
    fn load(from: &[f64; W]) -> Self;
    /// Writes the lanes to `to`.
    fn store(self, to: &mut [f64; W]);
    /// The same number in every lane.
    fn splat(value: f64) -> Self;
    /// The smaller number, lane by lane.
    fn min(self, other: Self) -> Self;
    /// The larger number, lane by lane.
    fn max(self, other: Self) -> Self;
    /// The magnitude, lane by lane.
    fn abs(self) -> Self;
    /// The square root, lane by lane; IEEE 754 rounds it once, so it has the same bits everywhere.
    fn sqrt(self) -> Self;
}

impl Lane<1> for f64 {
    fn load(from: &[f64; 1]) -> Self {
        from[0]
    }
    fn store(self, to: &mut [f64; 1]) {
        to[0] = self;
    }
    fn splat(value: f64) -> Self {
        value
    }
    fn min(self, other: Self) -> Self {
        if self < other { self } else { other }
    }
    fn max(self, other: Self) -> Self {
        if self > other { self } else { other }
    }
    fn abs(self) -> Self {
        f64::abs(self)
    }
    fn sqrt(self) -> Self {
        f64::sqrt(self)
    }
}

/// Four frames in portable arithmetic.
#[derive(Debug, Clone, Copy, PartialEq)]
#[repr(align(32))]
pub struct Plain([f64; 4]);

impl Plain {
    fn map(self, operation: impl Fn(f64) -> f64) -> Self {
        Self(self.0.map(operation))
    }

    fn zip(self, other: Self, operation: impl Fn(f64, f64) -> f64) -> Self {
        let [a, b, c, d] = self.0;
        let [e, f, g, h] = other.0;
        Self([operation(a, e), operation(b, f), operation(c, g), operation(d, h)])
    }
}

impl Add for Plain {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        self.zip(other, |a, b| a + b)
    }
}

impl Sub for Plain {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        self.zip(other, |a, b| a - b)
    }
}

impl Mul for Plain {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        self.zip(other, |a, b| a * b)
    }
}

impl Div for Plain {
    type Output = Self;
    fn div(self, other: Self) -> Self {
        self.zip(other, |a, b| a / b)
    }
}

impl Neg for Plain {
    type Output = Self;
    fn neg(self) -> Self {
        self.map(|a| -a)
    }
}

impl Lane<4> for Plain {
    fn load(from: &[f64; 4]) -> Self {
        Self(*from)
    }
    fn store(self, to: &mut [f64; 4]) {
        *to = self.0;
    }
    fn splat(value: f64) -> Self {
        Self([value; 4])
    }
    fn min(self, other: Self) -> Self {
        self.zip(other, Lane::<1>::min)
    }
    fn max(self, other: Self) -> Self {
        self.zip(other, Lane::<1>::max)
    }
    fn abs(self) -> Self {
        self.map(f64::abs)
    }
    fn sqrt(self) -> Self {
        self.map(f64::sqrt)
    }
}
