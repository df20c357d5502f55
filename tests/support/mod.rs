//! What the test files share: frames built in a line, closeness with the tolerance in the call, random frames.
#![allow(dead_code, unused_imports, reason = "each test file uses its own part")]

pub mod close;
pub mod energy;
pub mod frames;
pub mod laws;
pub mod random;
pub mod solve;

pub use close::{Within, close, close_responses};
pub use frames::{Sizes, build, parts};
