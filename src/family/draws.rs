//! Frames like one frame, its sizes drawn: in lanes for the many, one at a time to write down.

use super::batch::{Population, Shape};
use super::numbers::{MEMBERS, SIZES, WITHIN_ALL, WITHIN_BEAMS};
use super::{DrawFault, Geometry, ModelDraws, Source, WithinDraws};
use crate::frame::sizes::{SIZE_PARAMETERS, SizeModel, SizeSet, Within};
use crate::frame::{Feet, Frame, FrameFault, FrameParts, Member, SizeSource};
use crate::lane::Lane;
use crate::response::Members;

/// Draws of the sizes of one frame, `W` at a time. A draw is a function of the source and its number alone.
#[derive(Debug, Clone, PartialEq)]
pub struct SizeDraws<const W: usize> {
    frame: Frame,
    source: Source,
    kind: Kind<W>,
}

#[derive(Debug, Clone, PartialEq)]
enum Kind<const W: usize> {
    Model { model: Box<SizeModel>, draws: ModelDraws, geometry: Geometry<W> },
    Within { within: Within, draws: WithinDraws },
}

impl Population for SizeDraws<4> {
    fn shape(&self, _draw: u64) -> Shape {
        Shape { storeys: self.frame.storeys(), bays: self.frame.bays() }
    }

    fn example(&self, _shape: Shape) -> Option<Frame> {
        self.frame(0).ok()
    }

    fn members(&self, _shape: Shape) -> Members<4> {
        SizeDraws::members(self)
    }

    #[inline(always)]
    fn fill<L: Lane<4>>(&self, draws: [u64; 4], members: &mut Members<4>) {
        SizeDraws::fill::<L>(self, draws, members);
    }
}

impl<const W: usize> SizeDraws<W> {
    /// Draws of `model` in the geometry, material and loads of `frame`; its feet hold where the model states no foot
    /// springs, its sizes do not count.
    ///
    /// # Errors
    /// [`DrawFault`] where the model makes no sizes for this frame.
    pub fn of_model(frame: &Frame, model: &SizeModel, source: Source) -> Result<Self, DrawFault> {
        let parts = frame.parts();
        let stated = matches!(parts.feet, Feet::Springs(_)) && model.foot_spring.is_none();
        if stated && model.end_column_inertia.is_none() {
            return Err(DrawFault::SpringsBesideRelativeSizes);
        }
        let one = Geometry::of(&parts.bays, &parts.storeys, parts.modulus);
        let geometry = Geometry::side_by_side([&one; W]);
        let draws = ModelDraws::new(model, frame.feet(), source)?;
        draws.check(&geometry)?;
        let kind = Kind::Model { model: Box::new(*model), draws, geometry };
        Ok(Self { frame: frame.clone(), source, kind })
    }

    /// Draws around the sizes of `frame`.
    ///
    /// # Errors
    /// [`DrawFault`] where a factor is below 1.
    pub fn within(frame: &Frame, within: Within, source: Source) -> Result<Self, DrawFault> {
        let kind = Kind::Within { within, draws: WithinDraws::new(frame, within, source)? };
        Ok(Self { frame: frame.clone(), source, kind })
    }

    /// Members of the frame in every lane, for [`Self::fill`] to work on.
    pub fn members(&self) -> Members<W> {
        Members::of(&self.frame).in_every_lane()
    }

    /// Fills what depends on sizes in `members`, for one draw number per lane. A lane's bits depend on its own draw alone.
    ///
    /// # Assumptions
    /// `members` come from [`Self::members`]; heights, widths, positions and shears are left as they are.
    #[inline(always)]
    pub fn fill<L: Lane<W>>(&self, draws: [u64; W], members: &mut Members<W>) {
        match &self.kind {
            Kind::Model { draws: model, geometry, .. } => model.fill::<L, W>(geometry, draws, members),
            Kind::Within { draws: within, .. } => within.fill::<L, W>(draws, members),
        }
    }

    /// One draw as a frame, by plain arithmetic; the lanes agree with it to 1e-13. All but sizes, feet and modulus is
    /// that of the frame the draws were made for. For plain members only: analysis options with stiffnesses of their own
    /// do not know of the draw.
    ///
    /// # Errors
    /// [`FrameFault`] where the drawn sizes make no frame.
    pub fn frame(&self, draw: u64) -> Result<Frame, FrameFault> {
        match &self.kind {
            Kind::Model { model, .. } => self.model_frame(model, draw),
            Kind::Within { within, .. } => self.within_frame(*within, draw),
        }
    }

    /// The drawn parameters of the size model; none where sizes are known.
    pub fn sizes(&self, draw: u64) -> Option<SizeSet> {
        match &self.kind {
            Kind::Model { model, .. } => Some(self.set(model, draw)),
            Kind::Within { .. } => None,
        }
    }

    fn set(&self, model: &SizeModel, draw: u64) -> SizeSet {
        let mut shares = [0.0; SIZE_PARAMETERS];
        for parameter in SIZES {
            shares[parameter] = self.source.share(draw, parameter);
        }
        model.at(&shares)
    }

    fn model_frame(&self, model: &SizeModel, draw: u64) -> Result<Frame, FrameFault> {
        let parts = self.frame.parts();
        let set = self.set(model, draw);
        let scatter = |member| self.factor(model.scatter, draw, self.parameter(member));
        let sections = set.sections(&parts.bays, &parts.storeys, scatter);
        let lowest = &sections.columns[..self.frame.lines()];
        let springs = set.foot_springs(lowest, parts.modulus, parts.storeys[0]);
        let feet = springs.map_or_else(|| parts.feet.clone(), Feet::Springs);
        let real = model.end_column_inertia.is_some();
        let sizes = if real { SizeSource::Assumed } else { SizeSource::AssumedRelative };
        let (columns, beams) = (sections.columns, sections.beams);
        Frame::new(FrameParts { columns, beams, feet, sizes, ..parts.clone() })
    }

    fn within_frame(&self, within: Within, draw: u64) -> Result<Frame, FrameFault> {
        let mut parts = self.frame.parts().clone();
        let beams = self.factor(within.beams, draw, WITHIN_BEAMS);
        let all = self.factor(within.all, draw, WITHIN_ALL);
        let mut parameter = MEMBERS;
        for (class, sections) in [(1.0, &mut parts.columns), (beams, &mut parts.beams)] {
            for section in sections {
                section.inertia *= class * self.factor(within.member, draw, parameter);
                parameter += 1;
            }
        }
        parts.modulus *= all;
        if let Feet::Springs(springs) = &mut parts.feet {
            springs.iter_mut().for_each(|spring| *spring *= all);
        }
        Frame::new(parts)
    }

    /// Parameter number of a member.
    fn parameter(&self, member: Member) -> usize {
        let (bays, lines) = (self.frame.bays(), self.frame.lines());
        MEMBERS
            + match member {
                Member::Column { storey, line } => storey * lines + line,
                Member::Beam { floor, bay } => self.frame.storeys() * lines + floor * bays + bay,
                Member::Storey { storey } => storey,
            }
    }

    /// A log-uniform factor up to `reach` either way.
    fn factor(&self, reach: f64, draw: u64, parameter: usize) -> f64 {
        libm::pow(reach, 2.0 * self.source.share(draw, parameter) - 1.0)
    }
}
