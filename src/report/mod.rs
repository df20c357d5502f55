//! Reports: what an engineer reads and files.

pub mod figure;
