//! The most that the kernel's arithmetic could reach: multiplications and additions that wait for nothing.

use crate::Failed;
use crate::timing::Contestant;
use std::hint::black_box;
use swaybound::lane::{Form, Lane, Task};

/// Independent chains: enough to hide the latency of both operations, few enough for sixteen registers.
const CHAINS: usize = 12;
const STEPS: usize = 2048;
/// Operations of one pass: a multiplication and an addition per chain, lane and step.
const OPERATIONS: usize = 2 * 4 * CHAINS * STEPS;

/// Chains of x <- x a + b, unfused.
struct Chains {
    start: f64,
}

impl Task<4> for Chains {
    type Output = [f64; 4];
    #[inline(always)]
    fn run<L: Lane<4>>(self) -> [f64; 4] {
        let (factor, part) = (L::splat(0.75 * self.start), L::splat(0.25 * self.start));
        let mut chains = [L::splat(self.start); CHAINS];
        for _ in 0..STEPS {
            for chain in &mut chains {
                *chain = *chain * factor + part;
            }
        }
        let mut sum = L::splat(0.0);
        for chain in chains {
            sum = sum + chain;
        }
        let mut found = [0.0; 4];
        sum.store(&mut found);
        found
    }
}

/// Unfused multiplications and additions in four lanes, operations per second.
pub fn contestant(form: Form) -> Contestant<'static> {
    Contestant::new(OPERATIONS as f64, move || -> Result<(), Failed> {
        black_box(form.four(Chains { start: black_box(1.0) }));
        Ok(())
    })
}
