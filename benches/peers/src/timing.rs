//! Contestants in turns, thread CPU time, medians of paired rounds.

use crate::Failed;
use rustix::time::{ClockId, clock_gettime};

/// One who is timed.
pub struct Contestant<'a> {
    /// What one pass does, in units of its rate: frames, or operations.
    amount: f64,
    /// Does this many passes and says how many seconds they took.
    pass: Box<dyn FnMut(usize) -> Result<f64, Failed> + 'a>,
}

impl<'a> Contestant<'a> {
    /// One whose passes are timed by the CPU time of this thread.
    pub fn new(amount: f64, mut pass: impl FnMut() -> Result<(), Failed> + 'a) -> Self {
        Self::timed_by_itself(amount, move |passes| timed(passes, &mut pass))
    }

    /// One that measures its own seconds.
    pub fn timed_by_itself(amount: f64, pass: impl FnMut(usize) -> Result<f64, Failed> + 'a) -> Self {
        Self { amount, pass: Box::new(pass) }
    }
}

/// How long is measured.
#[derive(Debug, Clone, Copy)]
pub struct Effort {
    /// Rounds in which every contestant has its turn.
    pub rounds: usize,
    /// Seconds that a turn lasts at least.
    pub turn: f64,
}

/// CPU seconds that `passes` passes take on this thread.
///
/// # Errors
/// The pass's.
pub fn timed(passes: usize, mut pass: impl FnMut() -> Result<(), Failed>) -> Result<f64, Failed> {
    let start = thread_seconds();
    (0..passes).try_for_each(|_| pass())?;
    Ok(thread_seconds() - start)
}

fn thread_seconds() -> f64 {
    let time = clock_gettime(ClockId::ThreadCPUTime);
    time.tv_sec as f64 + 1e-9 * time.tv_nsec as f64
}

/// Rates of every contestant in every round.
#[derive(Debug, Clone)]
pub struct Rates(Vec<Vec<f64>>);

/// A median between its quartiles.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Spread {
    /// Lower quartile.
    pub low: f64,
    /// Median.
    pub median: f64,
    /// Upper quartile.
    pub high: f64,
}

/// Lets the contestants take turns; the order of the turns moves on by one from round to round.
///
/// # Errors
/// A contestant's.
pub fn interleave(contestants: &mut [Contestant], effort: Effort) -> Result<Rates, Failed> {
    let passes: Vec<usize> =
        contestants.iter_mut().map(|contestant| passes(contestant, effort.turn)).collect::<Result<_, _>>()?;
    let count = contestants.len();
    let mut rates = vec![Vec::with_capacity(effort.rounds); count];
    for round in 0..effort.rounds {
        for place in 0..count {
            let turn = (round + place) % count;
            let seconds = (contestants[turn].pass)(passes[turn])?;
            rates[turn].push(contestants[turn].amount * passes[turn] as f64 / seconds);
        }
    }
    Ok(Rates(rates))
}

/// How many passes last a turn; warms up meanwhile.
fn passes(contestant: &mut Contestant, turn: f64) -> Result<usize, Failed> {
    let mut passes = 1;
    loop {
        let seconds = (contestant.pass)(passes)?;
        if seconds >= 0.5 * turn {
            return Ok((passes as f64 * turn / seconds).ceil() as usize);
        }
        passes *= 2;
    }
}

impl Rates {
    /// The rate of one contestant, per second.
    pub fn rate(&self, one: usize) -> Spread {
        Spread::of(self.0[one].clone())
    }

    /// The rate of one contestant over another's in the same round.
    pub fn ratio(&self, one: usize, other: usize) -> Spread {
        Spread::of(self.0[one].iter().zip(&self.0[other]).map(|(one, other)| one / other).collect())
    }
}

impl Spread {
    fn of(mut values: Vec<f64>) -> Self {
        values.sort_unstable_by(f64::total_cmp);
        // Between the two nearest of sorted values, as most programs do.
        let at = |share: f64| {
            let place = share * (values.len() - 1) as f64;
            let (below, part) = (place as usize, place.fract());
            let above = (below + 1).min(values.len() - 1);
            values[below] + part * (values[above] - values[below])
        };
        Self { low: at(0.25), median: at(0.5), high: at(0.75) }
    }

    /// The same times `factor`, which is positive.
    pub fn times(self, factor: f64) -> Self {
        Self { low: self.low * factor, median: self.median * factor, high: self.high * factor }
    }

    /// Half the distance of the quartiles over the median.
    pub fn noise(self) -> f64 {
        0.5 * (self.high - self.low) / self.median
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quartiles_stand_between_sorted_values() {
        let spread = Spread::of(vec![5.0, 1.0, 2.0, 4.0, 3.0]);
        assert_eq!(spread, Spread { low: 2.0, median: 3.0, high: 4.0 });
        assert_eq!(Spread::of(vec![7.0]), Spread { low: 7.0, median: 7.0, high: 7.0 });
        assert_eq!(Spread::of(vec![1.0, 2.0]).median, 1.5);
    }

    #[test]
    fn ratios_are_paired_by_round() {
        let rates = Rates(vec![vec![2.0, 20.0, 200.0], vec![1.0, 10.0, 100.0]]);
        assert_eq!(rates.ratio(0, 1), Spread { low: 2.0, median: 2.0, high: 2.0 });
    }

    #[test]
    fn every_contestant_has_a_turn_in_every_round() -> Result<(), Failed> {
        let mut contestants = [
            Contestant::timed_by_itself(3.0, |passes| Ok(passes as f64)),
            Contestant::timed_by_itself(1.0, |passes| Ok(0.25 * passes as f64)),
        ];
        let rates = interleave(&mut contestants, Effort { rounds: 3, turn: 2.0 })?;
        assert_eq!(rates.rate(0).median, 3.0);
        assert_eq!(rates.ratio(0, 1).median, 0.75);
        Ok(())
    }
}
