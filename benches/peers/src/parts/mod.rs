//! What is measured: one file per part, each a function from a [`Setting`] to its tables, listed in [`PARTS`].

mod chain;
mod hot;
mod large;
mod memory;

use crate::frames::Shape;
use crate::lapack::Lapack;
use crate::table::Table;
use crate::timing::{Contestant, Effort, Rates, Spread, interleave};
use crate::{Failed, Joint};

/// A part by its name on the command line.
pub struct Part {
    /// What `--only` takes.
    pub name: &'static str,
    /// Measures, and gives its tables.
    pub run: fn(&Setting) -> Result<Vec<Table>, Failed>,
}

/// All parts, in the order in which they run.
pub const PARTS: [Part; 4] = [
    Part { name: "hot", run: hot::run },
    Part { name: "memory", run: memory::run },
    Part { name: "large", run: large::run },
    Part { name: "chain", run: chain::run },
];

/// The shapes of the tables.
pub const SHAPES: [Shape; 5] = [shape(1, 3), shape(3, 5), shape(3, 10), shape(5, 20), shape(8, 40)];

/// What every part is given.
pub struct Setting {
    /// Where there is one.
    pub lapack: Option<Lapack>,
    /// How long to measure.
    pub effort: Effort,
}

/// Those who take turns, each under a key.
struct Field<'a, K> {
    keys: Vec<K>,
    contestants: Vec<Contestant<'a>>,
}

/// Their rates.
struct Measured<K> {
    keys: Vec<K>,
    rates: Rates,
}

impl<'a, K: PartialEq> Field<'a, K> {
    fn new() -> Self {
        Self { keys: Vec::new(), contestants: Vec::new() }
    }

    fn add(&mut self, key: K, contestant: Contestant<'a>) {
        self.keys.push(key);
        self.contestants.push(contestant);
    }

    fn measure(mut self, effort: Effort) -> Result<Measured<K>, Failed> {
        Ok(Measured { rates: interleave(&mut self.contestants, effort)?, keys: self.keys })
    }
}

impl<K: PartialEq> Measured<K> {
    /// The largest noise of any rate.
    fn noise(&self) -> f64 {
        (0..self.keys.len()).map(|place| self.rates.rate(place).noise()).fold(0.0, f64::max)
    }

    fn place(&self, key: K) -> Option<usize> {
        self.keys.iter().position(|other| *other == key)
    }

    /// The rate of one, where it took part.
    fn rate(&self, key: K) -> Option<Spread> {
        Some(self.rates.rate(self.place(key)?))
    }

    /// The rate of one over another's, where both took part.
    fn ratio(&self, one: K, other: K) -> Option<Spread> {
        Some(self.rates.ratio(self.place(one)?, self.place(other)?))
    }
}

const fn shape(bays: usize, storeys: usize) -> Shape {
    Shape { bays, storeys }
}

/// How the unknowns are called in headings.
fn heading(joint: Joint) -> &'static str {
    match joint {
        Joint::Rotation => "slope-deflection",
        Joint::RiseAndRotation => "with column axial strain",
    }
}
