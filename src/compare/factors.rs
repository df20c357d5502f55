//! Factors by place for many frames of one shape: what [`super::errors`] states of one frame, reduced to one number per
//! place.

use super::formulas::{WEAK, ZERO};
use super::place_map::{Kind, PlaceMap};
use super::places::Class;
use crate::lane::{Lane, Rows};
use crate::response::{Forces, Gives, Members, Quantity};

/// The exact answers of `W` frames, made ready to measure quick ones by.
#[derive(Debug, Clone, PartialEq)]
pub struct Measure<const W: usize> {
    /// One over each exact value by quantity and member; 0 where the value is 0.
    columns: Vec<Rows<W>>,
    beams: Vec<Rows<W>>,
    drifts: Vec<Rows<W>>,
    /// One over each bay width, 1/m.
    per_width: Rows<W>,
    /// By slot: how many members have an exact value other than 0.
    pub counted: Rows<W>,
}

/// What is kept of one method by slot; see [`PlaceMap::slots`].
#[derive(Debug, Clone, PartialEq)]
pub struct Factors<const W: usize> {
    /// The largest factor |e| / |q| of the members whose quick value is not zero, weak ones included; 0 where no member has
    /// both values. No bound may be stated from it where [`Factors::zeros`] counts any. Infinite where a number is none.
    pub factor: Rows<W>,
    /// 1 where exact and quick differ in sign on any member whose quick value is not zero, else 0.
    pub signs: Rows<W>,
    /// Members whose quick value is zero: under 1e-9 of the storey's largest.
    pub zeros: Rows<W>,
    /// Members whose quick value is weak: under 5 % of the storey's largest, but not zero.
    pub weak: Rows<W>,
    /// Sum of |q| / |e| over the members counted in [`Measure::counted`], for the prices of design moments. Of quantities whose
    /// exact value can change its sign (end moments, axial forces) the mean over draws does not settle.
    pub ratio_sum: Rows<W>,
}

impl<const W: usize> Measure<W> {
    /// Room for the exact values of frames of the shape of `map`.
    pub fn for_map(map: &PlaceMap) -> Self {
        let rows = |kind: &Kind| {
            kind.quantities.iter().map(|_| Rows::zeros(kind.levels * kind.across)).collect::<Vec<Rows<W>>>()
        };
        Self {
            columns: rows(&map.columns),
            beams: rows(&map.beams),
            drifts: rows(&map.drifts),
            per_width: Rows::zeros(map.beams.across),
            counted: Rows::zeros(map.slots().len()),
        }
    }
}

impl<const W: usize> Factors<W> {
    /// Room for the factors of frames of the shape of `map`.
    pub fn for_map(map: &PlaceMap) -> Self {
        let slots = Rows::zeros(map.slots().len());
        Self {
            factor: slots.clone(),
            signs: slots.clone(),
            zeros: slots.clone(),
            weak: slots.clone(),
            ratio_sum: slots,
        }
    }

    #[inline(always)]
    fn rows(&mut self) -> FactorRows<'_, W> {
        FactorRows {
            factor: &mut self.factor,
            signs: &mut self.signs,
            zeros: &mut self.zeros,
            weak: &mut self.weak,
            ratio_sum: &mut self.ratio_sum,
        }
    }
}

/// Makes `exact` ready to measure quick answers by, whatever their number.
///
/// # Assumptions
/// All numbers are finite; [`crate::response::statics::imbalance`] finds those that are not.
#[inline(always)]
pub fn measure<L: Lane<W>, const W: usize>(
    map: &PlaceMap,
    members: &Members<W>,
    exact: &Forces<W>,
    measure: &mut Measure<W>,
) {
    for (width, per_width) in members.width.iter().zip(measure.per_width.iter_mut()) {
        (L::splat(1.0) / L::load(width)).store(per_width);
    }
    let values = Values::of(exact, &measure.per_width);
    for (index, quantity) in map.columns.quantities.iter().enumerate() {
        let to = Kept { kind: &map.columns, index, row: &mut measure.columns[index], counted: &mut measure.counted };
        values.columns::<L, _>(*quantity, to);
    }
    for (index, quantity) in map.beams.quantities.iter().enumerate() {
        let to = Kept { kind: &map.beams, index, row: &mut measure.beams[index], counted: &mut measure.counted };
        values.beams::<L, _>(*quantity, to);
    }
    for (index, row) in measure.drifts.iter_mut().enumerate() {
        let to = Kept { kind: &map.drifts, index, row, counted: &mut measure.counted };
        to.take::<L, _>(&Each(&exact.drift));
    }
}

/// Fills `found` with the factors of `quick` by slot. Slots of what a method does not give are left as they are.
///
/// # Formula
/// Those of [`super::formulas`]: factor = |e| / |q| = 1 / (|q| x (1/|e|)), the largest of the place; zero where |q| is under
/// 1e-9, weak where it is under 5 % of the storey's largest |q|.
///
/// # Assumptions
/// All numbers are finite; [`crate::response::statics::imbalance`] finds those that are not.
#[inline(always)]
pub fn factors<L: Lane<W>, const W: usize>(
    map: &PlaceMap,
    measure: &Measure<W>,
    gives: Gives,
    quick: &Forces<W>,
    found: &mut Factors<W>,
) {
    let job = Job { map, measure, gives, values: Values::of(quick, &measure.per_width), drift: &quick.drift };
    let found = &mut found.rows();
    // One frame alone is no hurry; four at a time, usual widths are compiled with their loops laid out.
    match map.beams.across {
        1 if W > 1 => job.run::<L>(1, found),
        2 if W > 1 => job.run::<L>(2, found),
        3 if W > 1 => job.run::<L>(3, found),
        4 if W > 1 => job.run::<L>(4, found),
        5 if W > 1 => job.run::<L>(5, found),
        bays => job.run::<L>(bays, found),
    }
}

/// What [`factors`] is given.
struct Job<'a, const W: usize> {
    map: &'a PlaceMap,
    measure: &'a Measure<W>,
    gives: Gives,
    values: Values<'a, W>,
    drift: &'a [[f64; W]],
}

impl<const W: usize> Job<'_, W> {
    #[inline(always)]
    fn run<L: Lane<W>>(&self, bays: usize, found: &mut FactorRows<W>) {
        let (map, measure) = (self.map, self.measure);
        if self.gives.forces() {
            for (index, quantity) in map.columns.quantities.iter().enumerate() {
                let per_exact = &measure.columns[index];
                let judge = Judged { kind: &map.columns, across: bays + 1, index, per_exact, found };
                self.values.columns::<L, _>(*quantity, judge);
            }
            for (index, quantity) in map.beams.quantities.iter().enumerate() {
                let judge = Judged { kind: &map.beams, across: bays, index, per_exact: &measure.beams[index], found };
                self.values.beams::<L, _>(*quantity, judge);
            }
        }
        if self.gives.drifts() {
            for (index, per_exact) in measure.drifts.iter().enumerate() {
                let judge = Judged { kind: &map.drifts, across: 1, index, per_exact, found };
                judge.take::<L, _>(&Each(self.drift));
            }
        }
    }
}

/// A quantity of the members of one kind.
trait Value<L>: Sized {
    /// Whether it can be negative.
    const SIGNED: bool;
    /// The same of those on one level, of `across` members.
    fn on(&self, level: usize, across: usize) -> Self;
    /// Of the member at `index`.
    fn at(&self, index: usize) -> L;
}

/// What is done with a quantity of the members of one kind.
trait Take<const W: usize> {
    /// Does it.
    fn take<L: Lane<W>, V: Value<L>>(self, value: &V);
}

/// The quantities that follow from the forces of an answer.
struct Values<'a, const W: usize> {
    foot: &'a [[f64; W]],
    head: &'a [[f64; W]],
    axial: &'a [[f64; W]],
    left: &'a [[f64; W]],
    right: &'a [[f64; W]],
    per_width: &'a [[f64; W]],
}

impl<'a, const W: usize> Values<'a, W> {
    #[inline(always)]
    fn of(forces: &'a Forces<W>, per_width: &'a [[f64; W]]) -> Self {
        Self {
            foot: &forces.column_foot,
            head: &forces.column_head,
            axial: &forces.column_axial,
            left: &forces.beam_left,
            right: &forces.beam_right,
            per_width,
        }
    }

    /// A quantity of columns; the shear times the storey height, with which its factors are the same.
    #[inline(always)]
    fn columns<L: Lane<W>, T: Take<W>>(&self, quantity: Quantity, take: T) {
        match quantity {
            Quantity::DesignMoment => take.take::<L, _>(&Larger([self.foot, self.head])),
            Quantity::Shear => take.take::<L, _>(&Sum([self.foot, self.head])),
            Quantity::MomentFoot => take.take::<L, _>(&Each(self.foot)),
            Quantity::MomentHead => take.take::<L, _>(&Each(self.head)),
            _ => take.take::<L, _>(&Each(self.axial)),
        }
    }

    /// A quantity of beams.
    #[inline(always)]
    fn beams<L: Lane<W>, T: Take<W>>(&self, quantity: Quantity, take: T) {
        match quantity {
            Quantity::DesignMoment => take.take::<L, _>(&Larger([self.left, self.right])),
            Quantity::MomentLeft => take.take::<L, _>(&Each(self.left)),
            Quantity::MomentRight => take.take::<L, _>(&Each(self.right)),
            _ => take.take::<L, _>(&BeamShear { ends: Sum([self.left, self.right]), per_width: self.per_width }),
        }
    }
}

#[inline(always)]
fn on<const W: usize>(row: &[[f64; W]], level: usize, across: usize) -> &[[f64; W]] {
    &row[level * across..][..across]
}

/// A number as it stands.
struct Each<'a, const W: usize>(&'a [[f64; W]]);

impl<L: Lane<W>, const W: usize> Value<L> for Each<'_, W> {
    const SIGNED: bool = true;
    #[inline(always)]
    fn on(&self, level: usize, across: usize) -> Self {
        Self(on(self.0, level, across))
    }
    #[inline(always)]
    fn at(&self, index: usize) -> L {
        L::load(&self.0[index])
    }
}

/// The larger of two end moments, without sign.
struct Larger<'a, const W: usize>([&'a [[f64; W]]; 2]);

impl<L: Lane<W>, const W: usize> Value<L> for Larger<'_, W> {
    const SIGNED: bool = false;
    #[inline(always)]
    fn on(&self, level: usize, across: usize) -> Self {
        Self([on(self.0[0], level, across), on(self.0[1], level, across)])
    }
    #[inline(always)]
    fn at(&self, index: usize) -> L {
        L::load(&self.0[0][index]).abs().max(L::load(&self.0[1][index]).abs())
    }
}

/// The sum of two end moments: column shear times height, but for the sign.
struct Sum<'a, const W: usize>([&'a [[f64; W]]; 2]);

impl<L: Lane<W>, const W: usize> Value<L> for Sum<'_, W> {
    const SIGNED: bool = true;
    #[inline(always)]
    fn on(&self, level: usize, across: usize) -> Self {
        Self([on(self.0[0], level, across), on(self.0[1], level, across)])
    }
    #[inline(always)]
    fn at(&self, index: usize) -> L {
        L::load(&self.0[0][index]) + L::load(&self.0[1][index])
    }
}

/// The shear of a beam.
struct BeamShear<'a, const W: usize> {
    ends: Sum<'a, W>,
    per_width: &'a [[f64; W]],
}

impl<L: Lane<W>, const W: usize> Value<L> for BeamShear<'_, W> {
    const SIGNED: bool = true;
    #[inline(always)]
    fn on(&self, level: usize, across: usize) -> Self {
        Self { ends: Value::<L>::on(&self.ends, level, across), per_width: &self.per_width[..across] }
    }
    #[inline(always)]
    fn at(&self, index: usize) -> L {
        let sum: L = self.ends.at(index);
        sum * L::load(&self.per_width[index])
    }
}

/// Keeps one over a quantity, and how many members have one.
struct Kept<'a, const W: usize> {
    kind: &'a Kind,
    /// The quantity's place among those of the kind.
    index: usize,
    row: &'a mut [[f64; W]],
    counted: &'a mut [[f64; W]],
}

impl<const W: usize> Take<W> for Kept<'_, W> {
    #[inline(always)]
    fn take<L: Lane<W>, V: Value<L>>(self, value: &V) {
        let Self { kind, index, row, counted } = self;
        let (zero, one, smallest) = (L::splat(0.0), L::splat(1.0), L::splat(f64::MIN_POSITIVE));
        for band in &kind.bands {
            let mut sums = [zero; 2];
            for level in band.levels.clone() {
                let value = value.on(level, kind.across);
                let row = &mut row[level * kind.across..][..kind.across];
                for (index, per_exact) in row.iter_mut().enumerate() {
                    let exact = value.at(index);
                    exact.abs().if_less(smallest, zero, one / exact).store(per_exact);
                    let counts = exact.abs().if_less(smallest, zero, one);
                    let class = usize::from(Class::of(index, kind.across) == Class::Interior);
                    sums[class] = sums[class] + counts;
                }
            }
            let [outer, interior] = kind.slots_of(index, band);
            sums[0].store(&mut counted[outer]);
            if has_interior(kind.across) {
                sums[1].store(&mut counted[interior]);
            }
        }
    }
}

/// Whether any of `count` lines or bays is an interior one.
#[inline(always)]
fn has_interior(count: usize) -> bool {
    Class::of(count / 2, count) == Class::Interior
}

/// The rows of [`Factors`].
struct FactorRows<'a, const W: usize> {
    factor: &'a mut [[f64; W]],
    signs: &'a mut [[f64; W]],
    zeros: &'a mut [[f64; W]],
    weak: &'a mut [[f64; W]],
    ratio_sum: &'a mut [[f64; W]],
}

/// Judges a quantity.
struct Judged<'a, 'b, const W: usize> {
    kind: &'a Kind,
    /// Members on a level.
    across: usize,
    /// The quantity's place among those of the kind.
    index: usize,
    /// One over the exact values.
    per_exact: &'a [[f64; W]],
    found: &'a mut FactorRows<'b, W>,
}

impl<const W: usize> Take<W> for Judged<'_, '_, W> {
    #[inline(always)]
    fn take<L: Lane<W>, V: Value<L>>(self, value: &V) {
        let Self { kind, across, index, per_exact, found } = self;
        for band in &kind.bands {
            let (mut outer, mut interior) = (Tally::none(), Tally::none());
            for level in band.levels.clone() {
                let (value, per_exact) = (value.on(level, across), on(per_exact, level, across));
                let limits = Limits::of(&value, across);
                for index in 0..across {
                    let (quick, per_exact) = (value.at(index), L::load(&per_exact[index]));
                    let tally = if Class::of(index, across) == Class::Interior { &mut interior } else { &mut outer };
                    if limits.any {
                        tally.add_slight(quick, per_exact, &limits);
                    } else {
                        tally.add::<W>(quick * per_exact, V::SIGNED);
                    }
                }
            }
            let slots = kind.slots_of(index, band);
            outer.store(found, slots[0]);
            if has_interior(across) {
                interior.store(found, slots[1]);
            }
        }
    }
}

/// Under what a quick value of a storey is zero, and weak.
struct Limits<L> {
    zero: L,
    weak: L,
    /// Whether any value of any lane is zero or weak.
    any: bool,
}

impl<L> Limits<L> {
    #[inline(always)]
    fn of<const W: usize>(value: &impl Value<L>, across: usize) -> Self
    where
        L: Lane<W>,
    {
        let (mut largest, mut smallest) = (L::splat(0.0), L::splat(f64::INFINITY));
        for index in 0..across {
            let size = value.at(index).abs();
            largest = largest.max(size);
            smallest = smallest.min(size);
        }
        // Where all are 0, all are zero.
        let zero = (largest * L::splat(ZERO)).max(L::splat(f64::MIN_POSITIVE));
        let weak = largest * L::splat(WEAK);
        Self { zero, weak, any: smallest.any_less(zero.max(weak)) }
    }
}

/// The statistics of one slot as its members come in.
struct Tally<L> {
    /// The smallest |q| / |e|.
    least_ratio: L,
    ratio_sum: L,
    signs: L,
    zeros: L,
    weak: L,
}

impl<L> Tally<L> {
    #[inline(always)]
    fn none<const W: usize>() -> Self
    where
        L: Lane<W>,
    {
        let zero = L::splat(0.0);
        Self { least_ratio: L::splat(f64::INFINITY), ratio_sum: zero, signs: zero, zeros: zero, weak: zero }
    }

    /// Adds a member whose quick value is neither zero nor weak in any lane, by q/e.
    #[inline(always)]
    fn add<const W: usize>(&mut self, ratio: L, signed: bool)
    where
        L: Lane<W>,
    {
        let (zero, one, none) = (L::splat(0.0), L::splat(1.0), L::splat(f64::INFINITY));
        let size = if signed { ratio.abs() } else { ratio };
        if signed {
            self.signs = self.signs.max(ratio.if_less(zero, one, zero));
        }
        self.ratio_sum = self.ratio_sum + size;
        // An exact value of 0 makes no factor larger.
        self.least_ratio = self.least_ratio.min(zero.if_less(size, size, none));
    }

    /// Adds a member whose quick value may be zero or weak: the same, but that a zero one has neither sign nor factor.
    #[inline(always)]
    fn add_slight<const W: usize>(&mut self, quick: L, per_exact: L, limits: &Limits<L>)
    where
        L: Lane<W>,
    {
        let (zero, one, none) = (L::splat(0.0), L::splat(1.0), L::splat(f64::INFINITY));
        let (size, ratio) = (quick.abs(), quick * per_exact);
        self.ratio_sum = self.ratio_sum + ratio.abs();
        self.zeros = self.zeros + size.if_less(limits.zero, one, zero);
        self.weak = self.weak + size.if_less(limits.zero, zero, size.if_less(limits.weak, one, zero));
        self.signs = self.signs.max(size.if_less(limits.zero, zero, ratio.if_less(zero, one, zero)));
        let counts = zero.if_less(ratio.abs(), ratio.abs(), none);
        self.least_ratio = self.least_ratio.min(size.if_less(limits.zero, none, counts));
    }

    #[inline(always)]
    fn store<const W: usize>(&self, found: &mut FactorRows<W>, slot: usize)
    where
        L: Lane<W>,
    {
        // A sum that is not finite has met a number that is none, which the least of the ratios forgets.
        let (factor, sound) = (L::splat(1.0) / self.least_ratio, (self.ratio_sum * L::splat(0.0)).abs());
        let factor = sound.if_less(L::splat(f64::MIN_POSITIVE), factor, L::splat(f64::INFINITY));
        factor.store(&mut found.factor[slot]);
        self.signs.store(&mut found.signs[slot]);
        self.zeros.store(&mut found.zeros[slot]);
        self.weak.store(&mut found.weak[slot]);
        self.ratio_sum.store(&mut found.ratio_sum[slot]);
    }
}
