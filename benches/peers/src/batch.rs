//! Frames in memory and room for their forces.

use crate::frames::Shape;
use crate::peers::Runner;
use crate::timing::{Contestant, timed};
use crate::{Failed, Peer};
use std::hint::black_box;
use std::sync::Barrier;
use std::thread;
use swaybound::response::{Forces, Members};

/// Groups of `W` frames of one shape, each with room for its forces.
#[derive(Clone)]
pub struct Batch<const W: usize> {
    members: Vec<Members<W>>,
    forces: Vec<Forces<W>>,
}

impl<const W: usize> Batch<W> {
    /// `groups`, each with room for its forces.
    pub fn new(groups: Vec<Members<W>>) -> Self {
        let forces = groups.iter().map(Forces::for_members).collect();
        Self { members: groups, forces }
    }

    /// Number of frames.
    pub fn frames(&self) -> usize {
        self.members.len() * W
    }

    /// Copies of the groups in their order until there are `frames` frames.
    pub fn repeated(&self, frames: usize) -> Self {
        Self::new(self.members.iter().cycle().take(frames.div_ceil(W)).cloned().collect())
    }

    /// Has `peer` solve every frame once.
    fn solve(&mut self, peer: &mut dyn Peer<W>) -> Result<(), Failed> {
        for (members, forces) in self.members.iter().zip(&mut self.forces) {
            peer.solve(black_box(members), forces)?;
            black_box(&*forces);
        }
        Ok(())
    }

    /// Has `peer` solve every frame in each pass.
    pub fn contestant<'a>(mut self, mut peer: Runner<'a, W>) -> Contestant<'a> {
        Contestant::new(self.frames() as f64, move || self.solve(&mut *peer))
    }
}

impl Batch<4> {
    /// Four frames to a group; what is over is left out.
    pub fn four(frames: &[Members<1>]) -> Self {
        Self::new(frames.as_chunks().0.iter().map(|four: &[_; 4]| Members::side_by_side(four.each_ref())).collect())
    }
}

/// Has every peer solve its own frames in each pass, all at the same time. Their mean CPU time counts, not the clock:
/// what else runs on the machine does not.
pub fn at_once<'a, const W: usize>(mut workers: Vec<(Batch<W>, Runner<'a, W>)>) -> Contestant<'a> {
    let frames: usize = workers.iter().map(|(batch, _)| batch.frames()).sum();
    Contestant::timed_by_itself(frames as f64, move |passes| {
        let start = Barrier::new(workers.len());
        let work = |(batch, peer): &mut (Batch<W>, Runner<'a, W>)| {
            start.wait();
            timed(passes, || batch.solve(&mut **peer))
        };
        thread::scope(|scope| {
            let threads: Vec<_> = workers.iter_mut().map(|worker| scope.spawn(|| work(worker))).collect();
            let count = threads.len() as f64;
            let seconds = threads.into_iter().map(|thread| thread.join().map_err(|_| Failed::Thread)?);
            Ok(seconds.sum::<Result<f64, Failed>>()? / count)
        })
    })
}

/// Bytes that a solution reads and writes per frame: stiffnesses, lengths and shears; moments.
pub fn bytes(shape: Shape) -> usize {
    let (columns, beams) = (shape.storeys * (shape.bays + 1), shape.storeys * shape.bays);
    let read = 2 * columns + beams + 2 * shape.storeys + 2 * shape.bays + 1;
    (read + 2 * columns + 2 * beams) * size_of::<f64>()
}
