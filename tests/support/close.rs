//! Comparing numbers; every call states how near they must be.

use swaybound::frame::Frame;
use swaybound::response::{Quantity, Response, Value};

/// How near a number must come.
#[derive(Debug, Clone, Copy)]
pub enum Within {
    /// This much, in the number's own unit.
    Absolute(f64),
    /// This share of the expected number.
    Relative(f64),
    /// A share of another number, such as the frame's largest moment.
    Of {
        /// The share.
        share: f64,
        /// The other number.
        scale: f64,
    },
}

impl Within {
    /// The room it leaves around `expected`.
    fn room(self, expected: f64) -> f64 {
        match self {
            Self::Absolute(room) => room,
            Self::Relative(share) => share * expected.abs(),
            Self::Of { share, scale } => share * scale.abs(),
        }
    }
}

/// Fails where `found` is not within `within` of `expected`, or is no number.
#[track_caller]
pub fn close(what: &str, found: f64, expected: f64, within: Within) {
    let miss = (found - expected).abs();
    assert!(
        miss <= within.room(expected),
        "{what}: found {found:e}, expected {expected:e}, off by {miss:e}, allowed {:e} ({within:?})",
        within.room(expected)
    );
}

/// The largest magnitude a response gives to a kind of quantity: moments, forces or movements.
pub fn scale_of(values: &[Value], quantity: Quantity) -> f64 {
    let same = values.iter().filter(|value| family(value.quantity) == family(quantity));
    same.map(|value| value.value.abs()).fold(0.0, f64::max)
}

fn family(quantity: Quantity) -> u8 {
    match quantity {
        Quantity::Shear => 1,
        Quantity::Axial => 2,
        Quantity::Drift | Quantity::Sway => 3,
        _ => 0,
    }
}

/// Fails where two responses of one frame differ by more than `share` of the largest value of the same kind.
#[track_caller]
pub fn close_responses(what: &str, frame: &Frame, found: &Response, expected: &Response, share: f64) {
    let (found, expected) = (found.values(frame), expected.values(frame));
    assert_eq!(found.len(), expected.len(), "{what}: not the same quantities");
    for (found, other) in found.iter().zip(&expected) {
        assert_eq!((found.member, found.quantity), (other.member, other.quantity), "{what}: another order");
        let scale = scale_of(&expected, other.quantity);
        let place = format!("{what}: {:?} of {:?}", other.quantity, other.member);
        close(&place, found.value, other.value, Within::Of { share, scale });
    }
}

/// The largest difference of two responses in one kind of quantity, over the largest value of that kind.
pub fn difference(frame: &Frame, found: &Response, expected: &Response, quantity: Quantity) -> f64 {
    let (found, expected) = (found.values(frame), expected.values(frame));
    let scale = scale_of(&expected, quantity);
    let pairs = found.iter().zip(&expected).filter(|(_, other)| family(other.quantity) == family(quantity));
    pairs.map(|(found, other)| (found.value - other.value).abs() / scale).fold(0.0, f64::max)
}
