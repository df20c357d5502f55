//! What can be wrong with a size model or with factors on known sizes.

use crate::lane::EXP_REACH;
use thiserror::Error;

/// Ranges that make no sizes.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum DrawFault {
    /// A range's ends are not in order, not finite, or not positive where they must be.
    #[error("{name} runs from {low} to {high}, but its ends must be {needed}finite and in order")]
    Range {
        /// The parameter, as the files call it.
        name: &'static str,
        /// Low end.
        low: f64,
        /// High end.
        high: f64,
        /// What is needed besides.
        needed: &'static str,
    },
    /// A factor that stands for "up to so much either way" is below 1 or beyond any use.
    #[error("{name} is {value}, but must be an ordinary number of 1 or more")]
    Factor {
        /// The factor, as the files call it.
        name: &'static str,
        /// Its value.
        value: f64,
    },
    /// The ranges together can make sizes that no number can hold.
    #[error("the ranges together reach sizes of e^{logarithm:.0} either way; at most e^{EXP_REACH} can be held")]
    Reach {
        /// The largest natural logarithm of a size relative to the lowest end column.
        logarithm: f64,
    },
    /// Foot springs are stated in N m/rad, but sizes are only relative.
    #[error(
        "foot springs are stated, but member sizes are only relative; give end_column_inertia, or foot_spring in its place"
    )]
    SpringsBesideRelativeSizes,
}
