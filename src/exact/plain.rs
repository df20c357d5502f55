//! Exact analyses of plain frames, `W` at a time: what a family of frames is solved by.

use crate::lane::{Form, Lane, Task, Width};
use crate::response::{Forces, Members, Work, axial_from_beam_shears};
use crate::solve::{Joint, Routes, Slots};

/// Which exact analysis.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Analysis {
    /// Slope-deflection: inextensible columns, see [`super::slope_deflection`].
    SlopeDeflection,
    /// Stiffness: columns stretch and shorten, see [`super::stiffness`].
    Stiffness,
}

impl Analysis {
    /// Name in files.
    pub fn id(self) -> &'static str {
        match self {
            Self::SlopeDeflection => super::slope_deflection::ID,
            Self::Stiffness => super::stiffness::ID,
        }
    }

    fn joint(self) -> Joint {
        match self {
            Self::SlopeDeflection => Joint::Rotation,
            Self::Stiffness => Joint::RiseAndRotation,
        }
    }
}

/// With column axial strain and more storeys than this, one step of refinement is worth its time.
///
/// Unrefined moments of frames up to 40 storeys lie within 1e-10 of the frame's largest; the tests hold it.
pub const REFINED_ABOVE: usize = 40;

/// An exact analysis of `W` plain frames of one shape at a time.
///
/// # Assumptions
/// Linear elastic plane frames, first order, lateral loads at floors; plain members between joint centres, floors rigid in
/// their own plane, elastic feet on supports that do not settle; inextensible columns for slope-deflection. Stiffness needs
/// areas and real sizes: whoever calls sees to that.
pub struct Plain<const W: usize> {
    slots: Slots<W>,
}

impl<const W: usize> Plain<W>
where
    Form: Routes<W>,
{
    /// The analysis of frames of `storeys` storeys and `bays` bays, each 1 or more.
    pub fn new(analysis: Analysis, storeys: usize, bays: usize) -> Self {
        let slots = Slots::new(analysis.joint(), storeys, bays);
        let tall = analysis == Analysis::Stiffness && storeys > REFINED_ABOVE;
        Self { slots: if tall { slots.refined() } else { slots } }
    }

    /// Fills `forces`, made for `members` like `work`, with end moments, axial forces and drifts; returns which frames can stand. The
    /// numbers of one that cannot mean nothing.
    ///
    /// # Units
    /// N m, N, m; relative where the frames' sizes are.
    pub fn respond(
        &mut self,
        form: Form,
        members: &Members<W>,
        work: &mut Work<W>,
        forces: &mut Forces<W>,
    ) -> [bool; W] {
        let stands = self.slots.solve(form, members, forces);
        form.run(Axial { members, work, forces });
        stands
    }
}

/// Column axial forces from beam shears as a task for lanes.
struct Axial<'a, const W: usize> {
    members: &'a Members<W>,
    work: &'a mut Work<W>,
    forces: &'a mut Forces<W>,
}

impl<const W: usize> Task<W> for Axial<'_, W> {
    type Output = ();

    #[inline(always)]
    fn run<L: Lane<W>>(self) {
        axial_from_beam_shears::<L, W>(&self.members.rows(), &mut self.work.rows(), &mut self.forces.rows());
    }
}
