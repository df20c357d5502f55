//! Round numbers for axes.

/// Tick positions from `low` to `high` or beyond, at a round step (1, 2, 2.5 or 5 times a power of ten).
///
/// The first tick is at or below `low`, the last at or above `high`, with at most `most` + 1 steps between.
pub(super) fn round_ticks(low: f64, high: f64, most: usize) -> Vec<f64> {
    let (low, high) = if high > low { (low, high) } else { (low, low + 1.0) };
    let step = round_up((high - low) / most.max(1) as f64);
    let first = (low / step + 1e-9).floor();
    let last = (high / step - 1e-9).ceil();
    let steps = (last - first).max(1.0) as usize;
    (0..=steps).map(|index| (first + index as f64) * step).collect()
}

/// The smallest of 1, 2, 2.5, 5, 10 times a power of ten that is not below `value`; 1 where `value` is not positive.
pub(super) fn round_up(value: f64) -> f64 {
    round_from(value, |step, value| step >= value * (1.0 - 1e-9), false)
}

/// The largest of 1, 2, 2.5, 5 times a power of ten that is not above `value`; 1 where `value` is not positive.
pub(super) fn round_down(value: f64) -> f64 {
    round_from(value, |step, value| step <= value * (1.0 + 1e-9), true)
}

fn round_from(value: f64, accept: impl Fn(f64, f64) -> bool, downwards: bool) -> f64 {
    if !value.is_finite() || value <= 0.0 {
        return 1.0;
    }
    let exponent = format!("{value:e}").split_once('e').and_then(|(_, power)| power.parse::<i32>().ok()).unwrap_or(0);
    let mut steps = [1.0, 2.0, 2.5, 5.0, 10.0].map(|step| decimal(step, exponent));
    if downwards {
        steps.reverse();
    }
    steps.into_iter().find(|step| accept(*step, value)).unwrap_or(steps[4])
}

/// `digits` times ten to `exponent`, correctly rounded on every machine.
fn decimal(digits: f64, exponent: i32) -> f64 {
    format!("{digits}e{exponent}").parse().unwrap_or(1.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ticks_are_round_and_cover_the_range() {
        assert_eq!(round_ticks(0.0, 87.0, 4), [0.0, 25.0, 50.0, 75.0, 100.0]);
        assert_eq!(round_ticks(0.0, 100.0, 4), [0.0, 25.0, 50.0, 75.0, 100.0]);
        assert_eq!(round_ticks(-3.0, 9.0, 4), [-5.0, 0.0, 5.0, 10.0]);
        assert_eq!(round_ticks(0.0, 0.0, 2), [0.0, 0.5, 1.0]);
    }

    #[test]
    fn round_steps_lie_on_the_asked_side() {
        assert_eq!([0.3, 2.1, 5.1, 1.0, -4.0].map(round_up), [0.5, 2.5, 10.0, 1.0, 1.0]);
        assert_eq!([0.3, 2.1, 999.0, 1.0, f64::NAN].map(round_down), [0.25, 2.0, 500.0, 1.0, 1.0]);
    }
}
