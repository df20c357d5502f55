//! How long drawing takes; for the eye, nothing is asserted about time.

use super::*;
use std::hint::black_box;
use std::time::Instant;

const GROUPS: u64 = 512;

struct Repeat<'a, const W: usize> {
    draws: &'a SizeDraws<W>,
    members: &'a mut Members<W>,
}

impl<const W: usize> Task<W> for Repeat<'_, W> {
    type Output = ();
    #[inline(always)]
    fn run<L: Lane<W>>(self) {
        for group in 0..GROUPS {
            let mut numbers = [group * W as u64; W];
            for (lane, number) in numbers.iter_mut().enumerate() {
                *number += lane as u64;
            }
            self.draws.fill::<L>(numbers, self.members);
            black_box(&mut *self.members);
        }
    }
}

/// Nanoseconds per frame, the least of many rounds: data is hot, one core.
fn least(mut round: impl FnMut(), frames: u64) -> f64 {
    let times = (0..400).map(|_| {
        let start = Instant::now();
        round();
        start.elapsed().as_nanos() as f64 / frames as f64
    });
    times.fold(f64::INFINITY, f64::min)
}

#[test]
#[ignore = "prints times; run by hand with --ignored --nocapture"]
fn time_per_frame() {
    for (bays, storeys) in [(1, 3), (3, 5), (3, 10), (5, 20)] {
        let frame = frame(bays, storeys, Feet::Fixed);
        let four = SizeDraws::<4>::of_model(&frame, &SizeModel::default(), Source::new(SEED)).unwrap();
        let one = SizeDraws::<1>::of_model(&frame, &SizeModel::default(), Source::new(SEED)).unwrap();
        let within = Within { member: 1.15, beams: 1.5, all: 1.3 };
        let known = SizeDraws::<4>::within(&frame, within, Source::new(SEED)).unwrap();
        for form in forms() {
            let (mut side, mut alone) = (four.members(), one.members());
            let four_at_once = least(|| form.four(Repeat { draws: &four, members: &mut side }), 4 * GROUPS);
            let around = least(|| form.four(Repeat { draws: &known, members: &mut side }), 4 * GROUPS);
            let one_at_once = least(|| form.one(Repeat { draws: &one, members: &mut alone }), GROUPS);
            let shape = format!("{bays} bays, {storeys} storeys, {:8}", form.name());
            println!("{shape}: {four_at_once:7.1} ns, known sizes {around:7.1} ns, one lane {one_at_once:7.1} ns");
        }
    }
}
