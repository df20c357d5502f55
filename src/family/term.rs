//! One parameter of the size model, ready to be drawn in lanes.

use super::DrawFault;
use crate::frame::sizes::Range;
use crate::lane::{Lane, exp};

/// A [`Range`] with what every draw needs of it computed once.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Term {
    /// One value and its logarithm; no logarithm is taken of a value that is not positive.
    Fixed { value: f64, log: f64 },
    /// Logarithm of the low end, and how far that of the high end lies above it.
    LogUniform { low: f64, span: f64 },
    /// Low end, and how far the high end lies above it.
    Uniform { low: f64, span: f64 },
}

impl Term {
    /// The number 1.
    pub(super) const ONE: Self = Self::Fixed { value: 1.0, log: 0.0 };

    /// Checks a range: finite ends in order, and positive ones if `positive` or if logarithms are drawn.
    pub(super) fn new(name: &'static str, range: Range, positive: bool) -> Result<Self, DrawFault> {
        let (low, high) = range.ends();
        let positive = positive || matches!(range, Range::LogUniform { .. });
        if !(low.is_finite() && high.is_finite() && low <= high && (low > 0.0 || !positive)) {
            return Err(DrawFault::Range { name, low, high, needed: if positive { "positive, " } else { "" } });
        }
        Ok(match range {
            Range::Fixed(value) => Self::Fixed { value, log: if value > 0.0 { libm::log(value) } else { 0.0 } },
            Range::LogUniform { low, high } => {
                Self::LogUniform { low: libm::log(low), span: libm::log(high) - libm::log(low) }
            }
            Range::Uniform { low, high } => Self::Uniform { low, span: high - low },
        })
    }

    /// The value below which a share of the draws lies.
    #[inline(always)]
    pub(super) fn value<L: Lane<W>, const W: usize>(&self, share: L) -> L {
        match *self {
            Self::Fixed { value, .. } => L::splat(value),
            Self::LogUniform { low, span } => exp(L::splat(low) + share * L::splat(span)),
            Self::Uniform { low, span } => L::splat(low) + share * L::splat(span),
        }
    }

    /// The logarithm of [`Self::value`].
    #[inline(always)]
    pub(super) fn log<L: Lane<W>, const W: usize>(&self, share: L) -> L {
        match *self {
            Self::Fixed { log, .. } => L::splat(log),
            Self::LogUniform { low, span } => L::splat(low) + share * L::splat(span),
            Self::Uniform { .. } => each_log(self.value(share)),
        }
    }

    /// The largest magnitude of the logarithm.
    pub(super) fn largest_log(&self) -> f64 {
        match *self {
            Self::Fixed { log, .. } => log.abs(),
            Self::LogUniform { low, span } => low.abs().max((low + span).abs()),
            Self::Uniform { low, span } => libm::log(low).abs().max(libm::log(low + span).abs()),
        }
    }

    /// The largest magnitude of the value.
    pub(super) fn largest(&self) -> f64 {
        match *self {
            Self::Fixed { value, .. } => value.abs(),
            Self::LogUniform { low, span } => libm::exp(low + span),
            Self::Uniform { low, span } => low.abs().max((low + span).abs()),
        }
    }
}

/// Natural logarithms one after the other: rarely needed, since ratios are drawn log-uniform.
#[inline(always)]
fn each_log<L: Lane<W>, const W: usize>(values: L) -> L {
    let mut row = [0.0; W];
    values.store(&mut row);
    for value in &mut row {
        *value = libm::log(*value);
    }
    L::load(&row)
}
