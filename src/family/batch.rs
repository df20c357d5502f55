//! Many frames: drawn, solved, analysed and reduced four at a time, in chunks that stay in cache.
//!
//! The draws of a run fall into chunks of [`field@Batch::chunk`] consecutive numbers. A chunk's draws are sorted by shape, taken
//! four by four, the last four filled up by repetition, and handed to a [`Reducer`] of the chunk's own as soon as they are
//! solved; nothing else of them is kept. Each thread keeps room for the shapes it meets. Chunks run on any number of threads; their reducers are merged in the order of the
//! chunks. So a result depends neither on the number of threads nor on which of them was faster.

mod room;

use crate::exact::plain::Analysis;
use crate::frame::Frame;
use crate::lane::{Form, Lane};
use crate::progress::Progress;
use crate::response::{Caution, Entry, Forces, Members};
use rayon::prelude::*;
use room::Rooms;
use std::collections::BTreeMap;
use std::ops::Range;
use thiserror::Error;

/// Draws in a chunk, where nothing else is asked for.
pub const CHUNK: u64 = 4096;

/// Most draws in a chunk.
const LONGEST_CHUNK: u64 = 1 << 20;

/// Most failures that are kept one by one; beyond, they are counted.
pub const FAILURES_KEPT: usize = 1000;

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

    /// One frame of a shape, of assumed sizes, by which is decided which analyses and methods may be used on the shape: its
    /// feet are of the kind that is drawn, and its sizes real only if the drawn ones are. None where there is no such frame.
    fn example(&self, shape: Shape) -> Option<Frame>;

    /// Members of a shape in every lane, of assumed sizes, for [`Population::fill`] to work on.
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
    /// Lanes whose analyses hold; the others are reported as [`Failure`]s and must be left out.
    pub sound: [bool; 4],
    /// The frames.
    pub members: &'a Members<4>,
    /// The exact analysis.
    pub exact: &'a Forces<4>,
    /// The quick methods in the order of [`Batch::methods`]; none where a method is refused. What a method does not give
    /// ([`crate::response::Info::gives`]) means nothing.
    pub quick: &'a [Option<Forces<4>>],
}

impl Group<'_> {
    /// The lanes that count and are sound.
    pub fn lanes(&self) -> impl Iterator<Item = usize> {
        let (count, sound) = (self.count, self.sound);
        (0..count).filter(move |lane| sound[*lane])
    }
}

/// Which sizes the quick methods see that need them.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum QuickSizes {
    /// Those of the draw: the errors are the methods' own. For families of frames.
    Drawn,
    /// The assumed ones, whatever is drawn: what an engineer can calculate before sizes are known. For one frame whose sizes
    /// are unknown; drawn sizes would make methods that need sizes look better than they can be.
    Assumed,
}

/// What frames are reduced to. Some tens of reducers are held at a time, one for each chunk under way.
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
    /// What is measured. Methods refuse by the shape's example ([`Population::example`]), as for one frame.
    pub methods: &'a [&'static Entry],
    /// Which sizes they see.
    pub quick_sizes: QuickSizes,
    /// How lanes are computed.
    pub form: Form,
    /// Draws in a chunk, 1 to about a million. Reducers that round may give other digits for other chunks.
    pub chunk: u64,
}

/// Why a draw is left out.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum Failure {
    /// Some movement of the frame is not resisted, or so much less than others that no digit of it is left.
    #[error("the frame cannot stand, or its sizes differ too widely")]
    CannotStand,
    /// The solution misses equilibrium by more than [`crate::response::statics::CLOSES`].
    #[error("the solution misses equilibrium by {0:.1e} of the frame's largest values")]
    Misses(f64),
    /// Column axial strain is asked for, but sizes are only relative or columns have no areas.
    #[error("column axial strain needs areas and real sizes, and these frames have none")]
    NoRealSizes,
    /// A quick method comes to something that is no number, or infinite.
    #[error("the method {0} comes to no number")]
    NoNumber(&'static str),
    /// The population gives members of another shape than it states, or none.
    #[error("the population has no frame of the shape it states")]
    NoSuchShape,
}

impl Failure {
    /// What an exact analysis that stands or not and misses equilibrium by `imbalance` is worth.
    fn of(stands: bool, imbalance: f64) -> Option<Self> {
        match (stands, imbalance) {
            (false, _) => Some(Self::CannotStand),
            (true, miss) if miss <= crate::response::statics::CLOSES => None,
            (true, miss) => Some(Self::Misses(miss)),
        }
    }
}

/// A method that does not answer for a shape.
#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
pub struct Refusal {
    /// The shape.
    pub shape: Shape,
    /// The method's name in files.
    pub method: &'static str,
    /// Why.
    pub reason: Caution,
}

/// What a run came to.
#[derive(Debug, Clone, PartialEq)]
pub struct Outcome<R> {
    /// What the draws were reduced to.
    pub reduced: R,
    /// The draws that were done, whole chunks from the first on; fewer than asked for where the run was stopped.
    pub done: Range<u64>,
    /// Draws that were left out, in order; of very many the first [`FAILURES_KEPT`].
    pub failures: Vec<(u64, Failure)>,
    /// How many draws were left out.
    pub failed: u64,
    /// Methods that do not answer for shapes that were met, each once.
    pub refusals: Vec<Refusal>,
}

/// What a chunk came to.
struct Chunk<R> {
    reduced: R,
    failures: Vec<(u64, Failure)>,
    refusals: Vec<Refusal>,
}

impl<'a, P: Population> Batch<'a, P> {
    /// A run in the fastest form and in chunks of [`CHUNK`] draws, in which methods see the sizes drawn.
    pub fn new(population: &'a P, analysis: Analysis, methods: &'a [&'static Entry]) -> Self {
        Self { population, analysis, methods, quick_sizes: QuickSizes::Drawn, form: Form::best(), chunk: CHUNK }
    }

    /// Runs `draws`; `new` makes an empty reducer. Stops between chunks when `progress` says so; chunks that were done
    /// after the first one left out are thrown away, so that what is done has no gaps.
    ///
    /// Uses the threads of the rayon pool it is called in, see [`with_threads`].
    pub fn run<R: Reducer>(
        &self,
        draws: Range<u64>,
        new: impl Fn() -> R + Sync,
        progress: &dyn Progress,
    ) -> Outcome<R> {
        let done = draws.start..draws.start;
        let mut outcome = Outcome { reduced: new(), done, failures: Vec::new(), failed: 0, refusals: Vec::new() };
        let chunk = self.chunk.clamp(1, LONGEST_CHUNK);
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
            let chunks: Vec<_> = (0..chunks).into_par_iter().map_init(Rooms::default, work).collect();
            for (index, chunk) in (0..).zip(chunks.into_iter().map_while(|chunk| chunk)) {
                outcome.take(chunk, of(index).end);
            }
        }
        outcome
    }

    /// Reduces the draws of one chunk.
    fn chunk<R: Reducer>(&self, draws: Range<u64>, reducer: R, rooms: &mut Rooms) -> Chunk<R> {
        let mut shapes: BTreeMap<Shape, Vec<u64>> = BTreeMap::new();
        for draw in draws {
            shapes.entry(self.population.shape(draw)).or_default().push(draw);
        }
        let mut chunk = Chunk { reduced: reducer, failures: Vec::new(), refusals: Vec::new() };
        for (shape, draws) in shapes {
            let room = match rooms.of(shape, self) {
                Ok(room) => room,
                Err(failure) => {
                    chunk.failures.extend(draws.into_iter().map(|draw| (draw, failure)));
                    continue;
                }
            };
            chunk.refusals.extend_from_slice(room.refusals());
            for draws in draws.chunks(4) {
                room.solve(self, draws);
                chunk.failures.extend(room.failures());
                chunk.reduced.group(self.form, room.group());
            }
        }
        chunk.failures.sort_by_key(|(draw, _)| *draw);
        chunk
    }
}

impl<R: Reducer> Outcome<R> {
    /// Takes the next chunk, which ends before draw `end`.
    fn take(&mut self, chunk: Chunk<R>, end: u64) {
        self.reduced.merge(chunk.reduced);
        self.failed += chunk.failures.len() as u64;
        let room = FAILURES_KEPT.saturating_sub(self.failures.len());
        self.failures.extend(chunk.failures.into_iter().take(room));
        self.refusals.extend(chunk.refusals);
        self.refusals.sort_unstable();
        self.refusals.dedup();
        self.done.end = end;
    }
}

/// Does `work` on a pool of so many threads, 1 or more; of none, as many as the machine has.
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

#[cfg(test)]
mod tests {
    use super::Failure;

    #[test]
    fn an_answer_holds_where_it_stands_and_closes() {
        assert_eq!(Failure::of(true, 1e-13), None);
        assert_eq!(Failure::of(true, 0.1), Some(Failure::Misses(0.1)));
        assert_eq!(Failure::of(true, f64::INFINITY), Some(Failure::Misses(f64::INFINITY)));
        assert!(matches!(Failure::of(true, f64::NAN), Some(Failure::Misses(_))));
        assert_eq!(Failure::of(false, 0.0), Some(Failure::CannotStand));
    }
}
