//! Quick methods beside the exact answer of one frame: errors, flags, places and verdicts.
//!
//! Borrows responses, never alters them.

pub mod amplify;
pub mod errors;
pub mod factors;
pub mod formulas;
pub mod place_map;
pub mod places;
mod run;
pub mod verdict;

pub use run::{Comparison, ExactChoice, FOOT_RATIOS, FootLine, Options, Quick, ResultWarning, compare};
