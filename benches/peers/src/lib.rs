//! Swaybound's batch kernel beside general-purpose linear algebra.
//!
//! Every contestant is a [`Peer`]: it does the whole work from [`Members`] to all end moments, that is assembly, solution
//! and recovery. All are first shown to agree with the exact analyses of the crate ([`agreement`]); only then are they
//! timed, in one process and in turns ([`timing`]). What is measured stands in [`parts`], one file per table.
//!
//! ```text
//! cargo bench -p peers                       all tables
//! cargo bench -p peers -- --only hot --quick one table, roughly
//! ```

pub mod agreement;
pub mod assembly;
pub mod batch;
pub mod dense;
pub mod flops;
pub mod frames;
pub mod kernel;
pub mod lapack;
pub mod machine;
pub mod parts;
pub mod peak;
pub mod peers;
mod recovery;
pub mod sparse;
pub mod table;
pub mod timing;

pub use swaybound::solve::Joint;

use swaybound::response::{Forces, Members};

/// Solves `W` frames of one shape at once, in room of its own that is used again.
pub trait Peer<const W: usize>: Send {
    /// Fills the end moments of `members`.
    ///
    /// # Errors
    /// [`Failed`] where it has no solution.
    fn solve(&mut self, members: &Members<W>, forces: &mut Forces<W>) -> Result<(), Failed>;
}

/// Why nothing was measured.
#[derive(Debug, thiserror::Error)]
pub enum Failed {
    /// A factorisation broke down.
    #[error("{peer} finds the equations of a sound frame not positive definite")]
    NotDefinite {
        /// Who.
        peer: &'static str,
    },
    /// A library did not take the problem.
    #[error("{peer} cannot analyse the equations' pattern")]
    Refused {
        /// Who.
        peer: &'static str,
    },
    /// Sizes cannot be drawn.
    #[error(transparent)]
    Draws(#[from] swaybound::family::DrawFault),
    /// A peer has another solution.
    #[error("{peer} differs from the exact analysis of {frame} by {difference:.1e} of the largest moment")]
    Differs {
        /// Who.
        peer: String,
        /// Which frame.
        frame: String,
        /// By how much.
        difference: f64,
    },
    /// The generator made a frame that is none.
    #[error(transparent)]
    Frame(#[from] swaybound::frame::FrameFault),
    /// The exact analysis has no answer.
    #[error(transparent)]
    Exact(#[from] swaybound::exact::Unsolvable),
    /// A thread did not end well.
    #[error("a measuring thread broke off")]
    Thread,
}
