//! Swaybound.
fn main() {}
