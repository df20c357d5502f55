//! Member sizes drawn from a size model, in lanes.

use super::feet::DrawnFeet;
use super::numbers::{MEMBERS, Numbers};
use super::term::Term;
use super::{DrawFault, Geometry, Source};
use crate::frame::Feet;
use crate::frame::sizes::{SIZE_NAMES, SIZE_PARAMETERS, SizeModel};
use crate::lane::{EXP_REACH, Lane, exp};
use crate::response::Members;

/// Draws of a [`SizeModel`] for frames of any shape and geometry.
///
/// # Formula
/// That of [`crate::frame::sizes`], by logarithms: those of all factors of a member are added, and one exponential is
/// taken. Of a column it is that of half the sum, the root of its inertia, which its area needs.
#[derive(Debug, Clone, PartialEq)]
pub struct ModelDraws {
    source: Source,
    tier: usize,
    /// Logarithm of the scatter.
    scatter: f64,
    /// In the order of [`SizeModel::at`]; 1 for what the model leaves out.
    terms: [Term; SIZE_PARAMETERS],
    feet: DrawnFeet,
}

/// Drawn parameters of `W` frames.
struct Drawn<L> {
    /// Logarithms of ratios.
    beam_to_column: L,
    interior_to_end: L,
    taper: L,
    beam_taper: L,
    roof_beam: L,
    /// Values.
    span_power: L,
    foot_spring: L,
    end_column_inertia: L,
    area_per_inertia: L,
}

impl ModelDraws {
    /// Prepares draws of `model`; `feet` hold where the model states no foot springs.
    ///
    /// # Errors
    /// [`DrawFault`] where a range or the scatter makes no sizes.
    pub fn new(model: &SizeModel, feet: &Feet, source: Source) -> Result<Self, DrawFault> {
        if !(model.scatter.is_finite() && model.scatter >= 1.0) {
            return Err(DrawFault::Factor { name: "scatter", value: model.scatter });
        }
        let mut terms = [Term::ONE; SIZE_PARAMETERS];
        for (index, range) in model.ranges().into_iter().enumerate() {
            let name = SIZE_NAMES[index];
            if let Some(range) = range {
                terms[index] = Term::new(name, range, name != "span_power")?;
            }
        }
        let feet = if model.foot_spring.is_some() { DrawnFeet::Relative } else { feet.into() };
        Ok(Self { source, tier: model.tier.max(1), scatter: libm::log(model.scatter), terms, feet })
    }

    /// Checks that no size of a frame of this geometry can leave the reach of the exponential.
    ///
    /// # Errors
    /// [`DrawFault::Reach`].
    pub fn check<const W: usize>(&self, geometry: &Geometry<W>) -> Result<(), DrawFault> {
        let [r, x, taper, beam_taper, roof, power, values @ ..] = &self.terms;
        let tiers = (geometry.column.len().saturating_sub(1) / self.tier) as f64;
        let width = geometry.relative_width.iter().flatten().fold(0.0, |widest: f64, width| widest.max(width.abs()));
        let column = x.largest_log() + tiers * taper.largest_log();
        let level = r.largest_log() + tiers * beam_taper.largest_log() + roof.largest_log();
        let beam = level + power.largest() * width;
        let logarithm = values.iter().map(Term::largest_log).fold(column.max(beam), f64::max) + self.scatter;
        if logarithm < EXP_REACH { Ok(()) } else { Err(DrawFault::Reach { logarithm }) }
    }

    /// Fills what depends on sizes in `members`, for one draw number per lane: column and beam stiffness, areas, axial
    /// stiffness and feet.
    ///
    /// # Assumptions
    /// `members` and `geometry` are of one shape, and `geometry` has passed [`Self::check`].
    #[inline(always)]
    pub fn fill<L: Lane<W>, const W: usize>(&self, geometry: &Geometry<W>, draws: [u64; W], members: &mut Members<W>) {
        let numbers = Numbers::<L, W>::new(self.source, draws);
        let drawn = self.drawn(&numbers);
        numbers.centred(MEMBERS, 0.5 * self.scatter, &mut members.column_stiffness);
        numbers.centred(MEMBERS + members.column_stiffness.len(), self.scatter, &mut members.beam_stiffness);
        self.columns(geometry, &drawn, members);
        self.beams(geometry, &drawn, members);
        self.feet.fill(drawn.foot_spring, members);
    }

    #[inline(always)]
    fn drawn<L: Lane<W>, const W: usize>(&self, numbers: &Numbers<L, W>) -> Drawn<L> {
        let (ratios, middle, last) = (numbers.shares(0), numbers.shares(1), numbers.shares(2));
        let [r, x, taper, beam_taper, roof, power, spring, inertia, area] = &self.terms;
        Drawn {
            beam_to_column: r.log(ratios[0]),
            interior_to_end: x.log(ratios[1]),
            taper: taper.log(ratios[2]),
            beam_taper: beam_taper.log(ratios[3]),
            roof_beam: roof.log(middle[0]),
            span_power: power.value(middle[1]),
            foot_spring: spring.value(middle[2]),
            end_column_inertia: inertia.value(middle[3]),
            area_per_inertia: area.value(last[0]),
        }
    }

    /// Columns, whose rows of stiffness hold half the logarithms of their scatter.
    #[inline(always)]
    fn columns<L: Lane<W>, const W: usize>(&self, geometry: &Geometry<W>, drawn: &Drawn<L>, members: &mut Members<W>) {
        let lines = members.lines();
        let half = L::splat(0.5);
        let (taper, interior) = (half * drawn.taper, half * drawn.interior_to_end);
        let inertia = drawn.end_column_inertia;
        let (area, modulus) = (drawn.area_per_inertia * inertia.sqrt(), L::load(&geometry.modulus));
        for storey in 0..members.storeys {
            let stiffness = inertia * L::load(&geometry.column[storey]);
            let end = taper * L::splat((storey / self.tier) as f64);
            let between = end + interior;
            for line in 0..lines {
                let index = storey * lines + line;
                let class = if line == 0 || line + 1 == lines { end } else { between };
                let root = exp(class + L::load(&members.column_stiffness[index]));
                let area = area * root;
                (root * root * stiffness).store(&mut members.column_stiffness[index]);
                area.store(&mut members.area[index]);
                (modulus * area).store(&mut members.axial_stiffness[index]);
            }
        }
    }

    /// Beams, whose rows of stiffness hold the logarithms of their scatter.
    #[inline(always)]
    fn beams<L: Lane<W>, const W: usize>(&self, geometry: &Geometry<W>, drawn: &Drawn<L>, members: &mut Members<W>) {
        let bays = members.bays;
        for floor in 0..members.storeys {
            let mut level = drawn.beam_to_column + drawn.beam_taper * L::splat((floor / self.tier) as f64);
            if floor + 1 == members.storeys {
                level = level + drawn.roof_beam;
            }
            for bay in 0..bays {
                let index = floor * bays + bay;
                let span = drawn.span_power * L::load(&geometry.relative_width[bay]);
                let ratio = exp(level + span + L::load(&members.beam_stiffness[index]));
                let stiffness = drawn.end_column_inertia * L::load(&geometry.beam[bay]);
                (ratio * stiffness).store(&mut members.beam_stiffness[index]);
            }
        }
    }
}
