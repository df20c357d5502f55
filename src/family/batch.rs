//! Many frames: drawn, solved, analysed and reduced four at a time, in chunks that stay in cache.
//!
//! The draws of a run fall into chunks of [`Batch::chunk`] consecutive numbers. A chunk's draws are sorted by shape, taken
//! four by four, the last four filled up by repetition, and handed to a [`Reducer`] of the chunk's own as soon as they are
//! solved; nothing else of them is kept. Chunks run on any number of threads; their reducers are merged in the order of the
//! chunks. So a result depends neither on the number of threads nor on which of them was faster.

mod room;

use crate::exact::plain::Analysis;
use crate::lane::{Form, Lane};
use crate::progress::Progress;
use crate::response::{Entry, Forces, Members};
use rayon::prelude::*;
use room::Rooms;
use std::collections::BTreeMap;
use std::ops::Range;
use thiserror::Error;

/// Draws in a chunk, where nothing else is asked for.
pub const CHUNK: u64 = 4096;

/// Chunks that are under way together, before their reducers are merged.
const ROUND: u64 = 64;

/// How many storeys and bays a frame has.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Shape {
    /// Storeys, 1 or more.
    pub storeys: usize,
    /// Bays, 1 or more.
    pub bays: usize,
}

/// Frames that are known by their draw numbers alone.
pub trait Population: Sync {
    /// The shape of a draw.
    fn shape(&self, draw: u64) -> Shape;

    /// Members of a shape in every lane, for [`Population::fill`] to work on.
    fn members(&self, shape: Shape) -> Members<4>;

    /// Fills all that depends on the draw, for four draws of the shape that `members` were made for. A lane's bits depend
    /// on its own draw alone. Should be `#[inline(always)]`, see [`crate::lane::Task`].
    fn fill<L: Lane<4>>(&self, draws: [u64; 4], members: &mut Members<4>);
}

/// Four frames of one shape, solved and analysed.
#[derive(Debug, Clone, Copy)]
pub struct Group<'a> {
    /// Draw numbers, one for each lane; lanes from `count` on repeat the last.
    pub draws: [u64; 4],
    /// Lanes that count, 1 to 4.
    pub count: usize,
    /// Lanes whose exact analysis holds; the others are reported as [`Failure`]s and must be left out.
    pub sound: [bool; 4],
    /// The frames.
    pub members: &'a Members<4>,
    /// The exact analysis.
    pub exact: &'a Forces<4>,
    /// The quick methods, in the order of [`Batch::methods`].
    pub quick: &'a [Forces<4>],
}

impl Group<'_> {
    /// The lanes that count and are sound.
    pub fn lanes(&self) -> impl Iterator<Item = usize> {
        let (count, sound) = (self.count, self.sound);
        (0..count).filter(move |lane| sound[*lane])
    }
}

/// What frames are reduced to.
pub trait Reducer: Send {
    /// Takes four frames. `form` is how lanes are computed in this run.
    fn group(&mut self, form: Form, group: Group);

    /// Takes what a later chunk was reduced to.
    fn merge(&mut self, later: Self);
}

/// A run over a population.
#[derive(Debug, Clone)]
pub struct Batch<'a, P> {
    /// The frames.
    pub population: &'a P,
    /// What they are measured by.
    pub analysis: Analysis,
    /// What is measured.
    pub methods: &'a [&'static Entry],
    /// How lanes are computed.
    pub form: Form,
    /// Draws in a chunk.
    pub chunk: u64,
}

/// Why a draw has no exact analysis.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum Failure {
    /// Some movement of the frame is not resisted.
    #[error("the frame cannot stand")]
    CannotStand,
    /// The solution misses equilibrium by more than [`crate::response::statics::CLOSES`].
    #[error("the solution misses equilibrium by {0:.1e} of the frame's largest values")]
    Misses(f64),
}

/// What a run came to.
#[derive(Debug, Clone, PartialEq)]
pub struct Outcome<R> {
    /// What the draws were reduced to.
    pub reduced: R,
    /// The draws that were done, whole chunks from the first on; fewer than asked for where the run was stopped.
    pub done: Range<u64>,
    /// Draws without an exact analysis, in order.
    pub failures: Vec<(u64, Failure)>,
}

impl<'a, P: Population> Batch<'a, P> {
    /// A run in the fastest form and in chunks of [`CHUNK`] draws.
    pub fn new(population: &'a P, analysis: Analysis, methods: &'a [&'static Entry]) -> Self {
        Self { population, analysis, methods, form: Form::best(), chunk: CHUNK }
    }

    /// Runs `draws`; `new` makes an empty reducer. Stops between chunks when `progress` says so.
    ///
    /// Uses the threads of the rayon pool it is called in, see [`with_threads`].
    pub fn run<R: Reducer>(
        &self,
        draws: Range<u64>,
        new: impl Fn() -> R + Sync,
        progress: &impl Progress,
    ) -> Outcome<R> {
        let mut outcome = Outcome { reduced: new(), done: draws.start..draws.start, failures: Vec::new() };
        let chunk = self.chunk.max(1);
        while outcome.done.end < draws.end && !progress.stopped() {
            let first = outcome.done.end;
            let chunks = (draws.end - first).div_ceil(chunk).min(ROUND);
            let of = |index: u64| {
                let start = first + index * chunk;
                start..draws.end.min(start.saturating_add(chunk))
            };
            let work = |rooms: &mut Rooms, index: u64| {
                (!progress.stopped()).then(|| {
                    let reduced = self.chunk(of(index), new(), rooms);
                    progress.advance(of(index).end - of(index).start);
                    reduced
                })
            };
            let reduced: Vec<_> = (0..chunks).into_par_iter().map_init(Rooms::default, work).collect();
            // Chunks after one that was left out are left out too: what is done has no gaps.
            for (index, (reduced, failures)) in (0..).zip(reduced.into_iter().map_while(|reduced| reduced)) {
                outcome.reduced.merge(reduced);
                outcome.failures.extend(failures);
                outcome.done.end = of(index).end;
            }
        }
        outcome
    }

    /// Reduces the draws of one chunk.
    fn chunk<R: Reducer>(&self, draws: Range<u64>, mut reducer: R, rooms: &mut Rooms) -> (R, Vec<(u64, Failure)>) {
        let mut shapes: BTreeMap<Shape, Vec<u64>> = BTreeMap::new();
        for draw in draws {
            shapes.entry(self.population.shape(draw)).or_default().push(draw);
        }
        let mut failures = Vec::new();
        for (shape, draws) in shapes {
            let room = rooms.of(shape, self);
            for draws in draws.chunks(4) {
                room.solve(self, draws);
                failures.extend(room.failures());
                reducer.group(self.form, room.group());
            }
        }
        failures.sort_by_key(|(draw, _)| *draw);
        (reducer, failures)
    }
}

/// Does `work` on a pool of so many threads.
///
/// # Errors
/// Where the system gives no threads.
pub fn with_threads<R: Send>(
    threads: usize,
    work: impl FnOnce() -> R + Send,
) -> Result<R, rayon::ThreadPoolBuildError> {
    let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build()?;
    Ok(pool.install(work))
}
