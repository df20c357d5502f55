//! What groups of four frames need to be solved, kept from group to group.

use super::{Batch, Failure, Group, Population, QuickSizes, Refusal, Shape};
use crate::exact::plain::{Analysis, Plain};
use crate::frame::Frame;
use crate::lane::{Lane, Task};
use crate::response::{Caution, Fit, Forces, Gives, Members, Work, statics};
use std::collections::HashMap;
use std::collections::hash_map::Entry;

/// A room for each shape met so far.
#[derive(Default)]
pub(super) struct Rooms {
    rooms: HashMap<Shape, Room>,
}

impl Rooms {
    /// The room for a shape, or why no frame of it can be solved.
    pub(super) fn of<P: Population>(&mut self, shape: Shape, batch: &Batch<P>) -> Result<&mut Room, Failure> {
        match self.rooms.entry(shape) {
            Entry::Occupied(room) => Ok(room.into_mut()),
            Entry::Vacant(place) => Ok(place.insert(Room::new(shape, batch)?)),
        }
    }
}

/// The room for frames of one shape.
pub(super) struct Room {
    members: Members<4>,
    exact: Plain<4>,
    work: Work<4>,
    forces: Forces<4>,
    /// None where a method is refused.
    quick: Vec<Option<Forces<4>>>,
    refusals: Vec<Refusal>,
    draws: [u64; 4],
    count: usize,
    failures: [Option<Failure>; 4],
}

impl Room {
    fn new<P: Population>(shape: Shape, batch: &Batch<P>) -> Result<Self, Failure> {
        let example = batch.population.example(shape).ok_or(Failure::NoSuchShape)?;
        let stated = |storeys, bays| (storeys, bays) == (shape.storeys, shape.bays);
        if !stated(example.storeys(), example.bays()) {
            return Err(Failure::NoSuchShape);
        }
        let members = batch.population.members(shape);
        if !stated(members.storeys, members.bays) {
            return Err(Failure::NoSuchShape);
        }
        if batch.analysis == Analysis::Stiffness && !(example.has_areas() && example.has_real_stiffness()) {
            return Err(Failure::NoRealSizes);
        }
        let (mut work, forces) = (Work::for_members(&members), Forces::for_members(&members));
        let mut refusals = refusals(shape, batch, &example);
        let mut quick = Vec::new();
        for entry in batch.methods {
            let mut answer = forces.clone();
            let mut answers = refusals.iter().all(|refusal| refusal.method != entry.info.id);
            // On assumed sizes once for all draws; on drawn ones with each draw.
            if answers && batch.quick_sizes == QuickSizes::Assumed {
                (entry.four)(batch.form, &members, &mut work, &mut answer);
                answers = batch.form.four(Finite { gives: entry.info.gives, forces: &answer }) == [true; 4];
                if !answers {
                    let reason = Caution("on the assumed sizes it comes to no number".into());
                    refusals.push(Refusal { shape, method: entry.info.id, reason });
                }
            }
            quick.push(answers.then_some(answer));
        }
        let exact = Plain::new(batch.analysis, shape.storeys, shape.bays);
        Ok(Self { members, exact, work, forces, quick, refusals, draws: [0; 4], count: 0, failures: [None; 4] })
    }

    /// Methods that do not answer for this shape.
    pub(super) fn refusals(&self) -> &[Refusal] {
        &self.refusals
    }

    /// Draws, solves and analyses up to four frames; where they are fewer the last is repeated.
    pub(super) fn solve<P: Population>(&mut self, batch: &Batch<P>, draws: &[u64]) {
        let Some(last) = draws.last() else { return };
        self.count = draws.len().min(4);
        self.draws = std::array::from_fn(|lane| *draws.get(lane).unwrap_or(last));
        batch.form.four(Fill { population: batch.population, draws: self.draws, members: &mut self.members });
        let stands = self.exact.respond(batch.form, &self.members, &mut self.work, &mut self.forces);
        let imbalance = batch.form.four(Imbalance { members: &self.members, forces: &self.forces });
        self.failures = std::array::from_fn(|lane| Failure::of(stands[lane], imbalance[lane]));
        if batch.quick_sizes == QuickSizes::Assumed {
            return;
        }
        for (entry, quick) in batch.methods.iter().zip(&mut self.quick) {
            let Some(quick) = quick else { continue };
            (entry.four)(batch.form, &self.members, &mut self.work, quick);
            let finite = batch.form.four(Finite { gives: entry.info.gives, forces: quick });
            for (failure, finite) in self.failures.iter_mut().zip(finite) {
                if !finite {
                    failure.get_or_insert(Failure::NoNumber(entry.info.id));
                }
            }
        }
    }

    /// The frames solved last.
    pub(super) fn group(&self) -> Group<'_> {
        Group {
            draws: self.draws,
            count: self.count,
            sound: self.failures.map(|failure| failure.is_none()),
            members: &self.members,
            exact: &self.forces,
            quick: &self.quick,
        }
    }

    /// Why frames solved last are left out.
    pub(super) fn failures(&self) -> impl Iterator<Item = (u64, Failure)> {
        let lanes = self.draws.into_iter().zip(self.failures).take(self.count);
        lanes.filter_map(|(draw, failure)| Some((draw, failure?)))
    }
}

/// Methods that do not answer for frames like `example`.
fn refusals<P>(shape: Shape, batch: &Batch<P>, example: &Frame) -> Vec<Refusal> {
    let reason = |fit: Fit| -> Option<Caution> { if let Fit::Refused(reason) = fit { Some(reason) } else { None } };
    let refused = batch
        .methods
        .iter()
        .filter_map(|entry| Some(Refusal { shape, method: entry.info.id, reason: reason((entry.fit)(example))? }));
    refused.collect()
}

/// [`Population::fill`] as a task for lanes.
struct Fill<'a, P> {
    population: &'a P,
    draws: [u64; 4],
    members: &'a mut Members<4>,
}

impl<P: Population> Task<4> for Fill<'_, P> {
    type Output = ();

    #[inline(always)]
    fn run<L: Lane<4>>(self) {
        self.population.fill::<L>(self.draws, self.members);
    }
}

/// [`statics::imbalance`] as a task for lanes.
struct Imbalance<'a> {
    members: &'a Members<4>,
    forces: &'a Forces<4>,
}

impl Task<4> for Imbalance<'_> {
    type Output = [f64; 4];

    #[inline(always)]
    fn run<L: Lane<4>>(self) -> [f64; 4] {
        let mut imbalance = [0.0; 4];
        statics::imbalance::<L, 4>(self.members, self.forces).store(&mut imbalance);
        imbalance
    }
}

/// Whether all numbers that a method gives are finite, as a task for lanes.
struct Finite<'a> {
    gives: Gives,
    forces: &'a Forces<4>,
}

impl Task<4> for Finite<'_> {
    type Output = [bool; 4];

    #[inline(always)]
    fn run<L: Lane<4>>(self) -> [bool; 4] {
        let (mut sum, mut last) = (L::splat(0.0), [0.0; 4]);
        if self.gives.forces() {
            sum = sum + total::<L>(&self.forces.column_foot) + total::<L>(&self.forces.column_head);
            sum = sum + total::<L>(&self.forces.beam_left) + total::<L>(&self.forces.beam_right);
            sum = sum + total::<L>(&self.forces.column_axial);
        }
        if self.gives.drifts() {
            sum = sum + total::<L>(&self.forces.drift);
        }
        sum.store(&mut last);
        last.map(f64::is_finite)
    }
}

/// The sum of the rows: no number where any of them is none.
#[inline(always)]
fn total<L: Lane<4>>(rows: &[[f64; 4]]) -> L {
    let mut sum = L::splat(0.0);
    for row in rows {
        sum = sum + L::load(row);
    }
    sum
}
