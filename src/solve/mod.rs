//! Elimination: symmetric systems whose unknowns stand in levels, each coupled to its neighbours only.

mod block_tridiagonal;
mod slots;

pub use block_tridiagonal::{BlockTridiagonal, Singular, Solution};
pub use slots::{Joint, Routes, Slots};
