//! What one thread needs to solve groups of four frames, kept from group to group.

use super::{Batch, Failure, Group, Population, Shape};
use crate::exact::plain::Plain;
use crate::lane::{Lane, Task};
use crate::response::{Forces, Members, Work, statics};
use std::collections::HashMap;

/// A room for each shape met so far.
#[derive(Default)]
pub(super) struct Rooms {
    rooms: HashMap<Shape, Room>,
}

impl Rooms {
    pub(super) fn of<P: Population>(&mut self, shape: Shape, batch: &Batch<P>) -> &mut Room {
        self.rooms.entry(shape).or_insert_with(|| Room::new(shape, batch))
    }
}

/// The room for frames of one shape.
pub(super) struct Room {
    members: Members<4>,
    exact: Plain<4>,
    work: Work<4>,
    forces: Forces<4>,
    quick: Vec<Forces<4>>,
    draws: [u64; 4],
    count: usize,
    failures: [Option<Failure>; 4],
}

impl Room {
    fn new<P: Population>(shape: Shape, batch: &Batch<P>) -> Self {
        let members = batch.population.members(shape);
        let forces = Forces::for_members(&members);
        Self {
            exact: Plain::new(batch.analysis, shape.storeys, shape.bays),
            work: Work::for_members(&members),
            quick: vec![forces.clone(); batch.methods.len()],
            forces,
            members,
            draws: [0; 4],
            count: 0,
            failures: [None; 4],
        }
    }

    /// Draws, solves and analyses up to four frames; where they are fewer the last is repeated.
    pub(super) fn solve<P: Population>(&mut self, batch: &Batch<P>, draws: &[u64]) {
        let Some(last) = draws.last() else { return };
        self.count = draws.len().min(4);
        self.draws = std::array::from_fn(|lane| *draws.get(lane).unwrap_or(last));
        batch.form.four(Fill { population: batch.population, draws: self.draws, members: &mut self.members });
        let stands = self.exact.respond(batch.form, &self.members, &mut self.work, &mut self.forces);
        let imbalance = batch.form.four(Imbalance { members: &self.members, forces: &self.forces });
        for lane in 0..4 {
            self.failures[lane] = match (stands[lane], imbalance[lane]) {
                (false, _) => Some(Failure::CannotStand),
                (true, miss) if miss <= statics::CLOSES => None,
                (true, miss) => Some(Failure::Misses(miss)),
            };
        }
        for (entry, quick) in batch.methods.iter().zip(&mut self.quick) {
            (entry.four)(batch.form, &self.members, &mut self.work, quick);
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

    /// Why frames solved last have no exact analysis.
    pub(super) fn failures(&self) -> impl Iterator<Item = (u64, Failure)> {
        let lanes = self.draws.into_iter().zip(self.failures).take(self.count);
        lanes.filter_map(|(draw, failure)| Some((draw, failure?)))
    }
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
