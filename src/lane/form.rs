//! The form in which this processor computes lanes, chosen once per batch.

#[cfg(target_arch = "x86_64")]
use super::avx2::Proof;
use super::{Lane, Plain};

/// Work written once over lanes.
///
/// # Assumptions
/// `run` and all that it calls per number should be `#[inline(always)]`, and hold no closures: code that is not inlined
/// into the form's own function is compiled for the oldest processor, and runs many times slower.
pub trait Task<const W: usize> {
    /// What the work gives.
    type Output;
    /// Does the work in lanes `L`.
    fn run<L: Lane<W>>(self) -> Self::Output;
}

/// How lanes are computed. Every form gives the same bits, but for the payload of numbers that are none.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Form(Kind);

#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Kind {
    Portable,
    #[cfg(target_arch = "x86_64")]
    Avx2(Proof),
}

impl Form {
    /// Arithmetic that every processor has.
    pub const PORTABLE: Self = Self(Kind::Portable);

    /// 256-bit registers, where this processor has them (AVX2).
    pub fn avx2() -> Option<Self> {
        #[cfg(target_arch = "x86_64")]
        return Proof::find().map(|proof| Self(Kind::Avx2(proof)));
        #[cfg(not(target_arch = "x86_64"))]
        None
    }

    /// The fastest form this processor has.
    pub fn best() -> Self {
        Self::avx2().unwrap_or(Self::PORTABLE)
    }

    /// Name for people, `portable` or `AVX2`.
    pub fn name(self) -> &'static str {
        match self.0 {
            Kind::Portable => "portable",
            #[cfg(target_arch = "x86_64")]
            Kind::Avx2(_) => "AVX2",
        }
    }

    /// Does `task` four frames at a time.
    pub fn four<T: Task<4>>(self, task: T) -> T::Output {
        match self.0 {
            Kind::Portable => task.run::<Plain>(),
            #[cfg(target_arch = "x86_64")]
            Kind::Avx2(proof) => proof.four(task),
        }
    }

    /// Does `task` one frame at a time; wide registers have nothing to offer it.
    pub fn one<T: Task<1>>(self, task: T) -> T::Output {
        task.run::<f64>()
    }
}

/// A form as the runner of tasks of `W` lanes, for code that is generic over their number.
pub trait Width<const W: usize> {
    /// Does `task`.
    fn run<T: Task<W>>(self, task: T) -> T::Output;
}

impl Width<1> for Form {
    fn run<T: Task<1>>(self, task: T) -> T::Output {
        self.one(task)
    }
}

impl Width<4> for Form {
    fn run<T: Task<4>>(self, task: T) -> T::Output {
        self.four(task)
    }
}
