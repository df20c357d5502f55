//! Errors of one response against another, value by value.

use super::formulas::{self, NEAR_ZERO, WEAK, ZERO};
use super::places::Place;
use crate::frame::{Frame, Member, MemberKind};
use crate::response::{Quantity, Response, Value};
use std::collections::HashMap;

/// A reason to read an error with care.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub enum Flag {
    /// |e| is under 10 % of the reference: a percentage of it means nothing.
    NearZero,
    /// |q| is under 1e-9 of the storey's largest: no factor exists.
    Zero,
    /// |q| is under 5 % of the storey's largest: a factor misleads.
    Weak,
    /// Exact and quick differ in sign.
    Sign,
}

impl Flag {
    /// Name in files.
    pub fn id(self) -> &'static str {
        match self {
            Self::NearZero => "near-zero",
            Self::Zero => "zero",
            Self::Weak => "weak",
            Self::Sign => "sign",
        }
    }
}

/// The error of one quick value. Exact and quick are in N, m with the signs of the crate's table.
#[derive(Debug, Clone, PartialEq)]
pub struct ValueError {
    /// The member or storey.
    pub member: Member,
    /// The place it is judged with.
    pub place: Place,
    /// The quantity.
    pub quantity: Quantity,
    /// The exact value e.
    pub exact: f64,
    /// The quick value q.
    pub quick: f64,
    /// 100 (|q| - |e|) / |e|; `None` where e is near zero.
    pub error_percent: Option<f64>,
    /// 100 (|q| - |e|) / reference; `None` where the whole frame's values are zero.
    pub storey_error_percent: Option<f64>,
    /// |e| / |q|; `None` where q is zero.
    pub factor: Option<f64>,
    /// Reasons for care.
    pub flags: Vec<Flag>,
}

/// Largest values of one quantity, by storey and over the frame.
#[derive(Default)]
struct Largest {
    by_storey: HashMap<(MemberKind, Quantity, usize), f64>,
    of_frame: HashMap<(MemberKind, Quantity), f64>,
}

impl Largest {
    fn of(values: &[Value]) -> Self {
        let mut largest = Self::default();
        for value in values {
            let (kind, size) = (value.member.kind(), value.value.abs());
            let storey = largest.by_storey.entry((kind, value.quantity, value.member.storey())).or_default();
            *storey = storey.max(size);
            let frame = largest.of_frame.entry((kind, value.quantity)).or_default();
            *frame = frame.max(size);
        }
        largest
    }

    fn storey(&self, value: &Value) -> f64 {
        self.by_storey.get(&(value.member.kind(), value.quantity, value.member.storey())).copied().unwrap_or(0.0)
    }

    fn frame(&self, value: &Value) -> f64 {
        self.of_frame.get(&(value.member.kind(), value.quantity)).copied().unwrap_or(0.0)
    }
}

/// Errors of every value that both responses state, in the order of [`Response::values`].
///
/// # Formula
/// See [`formulas`].
///
/// # Units
/// Percent; factors have none.
pub fn errors(frame: &Frame, exact: &Response, quick: &Response) -> Vec<ValueError> {
    let (exact, quick) = (exact.values(frame), quick.values(frame));
    let (exact_largest, quick_largest) = (Largest::of(&exact), Largest::of(&quick));
    // Both lists stand in one order; what only one of them states is passed over.
    let mut stated = exact.iter();
    let same = |q: &Value, e: &Value| e.member == q.member && e.quantity == q.quantity;
    let pairs = quick.iter().filter_map(|q| stated.by_ref().find(|e| same(q, e)).map(|e| (e, q)));
    pairs
        .map(|(e, q)| {
            let reference = formulas::reference::<f64, 1>(exact_largest.storey(e), exact_largest.frame(e));
            value_error(frame, e, q, reference, quick_largest.storey(q))
        })
        .collect()
}

fn value_error(frame: &Frame, e: &Value, q: &Value, reference: f64, quick_largest: f64) -> ValueError {
    let (exact, quick) = (e.value, q.value);
    let near_zero = exact.abs() < NEAR_ZERO * reference || reference == 0.0;
    let zero = quick.abs() < ZERO * quick_largest || quick == 0.0;
    let weak = !zero && quick.abs() < WEAK * quick_largest;
    let sign = !zero && exact * quick < 0.0;
    let flags = [(near_zero, Flag::NearZero), (zero, Flag::Zero), (weak, Flag::Weak), (sign, Flag::Sign)];
    let percent = |base: f64| formulas::error_percent::<f64, 1>(exact, quick, base);
    ValueError {
        member: e.member,
        place: Place::of(frame, e.member),
        quantity: e.quantity,
        exact,
        quick,
        error_percent: (!near_zero).then(|| percent(exact.abs())),
        storey_error_percent: (reference > 0.0).then(|| percent(reference)),
        factor: (!zero).then(|| formulas::factor::<f64, 1>(exact, quick)),
        flags: flags.into_iter().filter_map(|(set, flag)| set.then_some(flag)).collect(),
    }
}
