//! Known sizes that may be off by drawn factors, in lanes.

use super::feet::DrawnFeet;
use super::numbers::{MEMBERS, Numbers, WITHIN_ALL};
use super::{DrawFault, Source};
use crate::frame::Frame;
use crate::frame::sizes::Within;
use crate::lane::{Lane, exp};
use crate::response::Members;

/// Draws around the sizes of one frame.
///
/// # Formula
/// Each inertia times member^u of its own, beams also times beams^u, one u for all; then everything that is stiff,
/// stated foot springs included, times all^u, so that `all` moves drifts only. u uniform in (-1, 1).
///
/// # Assumptions
/// Factors of members do not reach column areas, as a stiffness factor does not.
#[derive(Debug, Clone, PartialEq)]
pub struct WithinDraws {
    source: Source,
    /// Logarithms of the factors.
    member: f64,
    beams: f64,
    all: f64,
    given: Members<1>,
    feet: DrawnFeet,
}

/// The largest factor a size may be off by.
const LARGEST: f64 = 1e60;

impl WithinDraws {
    /// Prepares draws around the sizes of `frame`.
    ///
    /// # Errors
    /// [`DrawFault::Factor`] where a factor is below 1 or beyond any use.
    pub fn new(frame: &Frame, within: Within, source: Source) -> Result<Self, DrawFault> {
        for (name, value) in [("member", within.member), ("beams", within.beams), ("all", within.all)] {
            if !(1.0..LARGEST).contains(&value) {
                return Err(DrawFault::Factor { name, value });
            }
        }
        let [member, beams, all] = [within.member, within.beams, within.all].map(libm::log);
        Ok(Self { source, member, beams, all, given: Members::of(frame), feet: frame.feet().into() })
    }

    /// Fills what depends on sizes in `members`, for one draw number per lane.
    ///
    /// # Assumptions
    /// `members` has the shape of the frame the draws were made for.
    #[inline(always)]
    pub fn fill<L: Lane<W>, const W: usize>(&self, draws: [u64; W], members: &mut Members<W>) {
        let numbers = Numbers::<L, W>::new(self.source, draws);
        let [_, beams, all, _] = numbers.shares(WITHIN_ALL / 4);
        let (beams, all) = (centred(beams, self.beams), centred(all, self.all));
        let columns = self.given.column_stiffness.len();
        numbers.centred(MEMBERS, self.member, &mut members.column_stiffness);
        numbers.centred(MEMBERS + columns, self.member, &mut members.beam_stiffness);
        multiply(all, &self.given.column_stiffness, &mut members.column_stiffness);
        multiply(all + beams, &self.given.beam_stiffness, &mut members.beam_stiffness);
        let all = exp(all);
        for index in 0..columns {
            members.area[index] = [self.given.area[index][0]; W];
            (all * L::splat(self.given.axial_stiffness[index][0])).store(&mut members.axial_stiffness[index]);
        }
        self.feet.fill(all, members);
    }
}

/// reach (2u - 1).
#[inline(always)]
fn centred<L: Lane<W>, const W: usize>(share: L, reach: f64) -> L {
    (share + share - L::splat(1.0)) * L::splat(reach)
}

/// Each given value times the exponential of `common` and of what its row holds.
#[inline(always)]
fn multiply<L: Lane<W>, const W: usize>(common: L, given: &[[f64; 1]], rows: &mut [[f64; W]]) {
    for index in 0..given.len() {
        (exp(common + L::load(&rows[index])) * L::splat(given[index][0])).store(&mut rows[index]);
    }
}
