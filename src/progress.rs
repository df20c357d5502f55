//! How long work says how far it is, and learns that it should stop.

/// What long work reports to.
pub trait Progress: Sync {
    /// So many draws more are done. Of a run that is stopped, some that were told of here are thrown away again.
    fn advance(&self, draws: u64);
    /// Whether the work should stop where it is; asked between chunks.
    fn stopped(&self) -> bool;
}

/// Nobody watches, nobody stops.
#[derive(Debug, Clone, Copy, Default)]
pub struct Unwatched;

impl Progress for Unwatched {
    fn advance(&self, _draws: u64) {}

    fn stopped(&self) -> bool {
        false
    }
}
