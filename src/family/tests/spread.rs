//! How numbers are spread.

/// Kolmogorov-Smirnov: with so many draws one honest generator in a thousand goes beyond this distance times the root
/// of their number (the asymptotic distribution's upper 0.1 % point, 1.95; recalled from memory).
const FARTHEST: f64 = 1.95;

/// Shares must be uniform on (0, 1) and reach both ends. Seeds are fixed, so this holds or fails for good.
pub(super) fn assert_uniform(name: &str, shares: &[f64]) {
    let mut sorted = shares.to_vec();
    sorted.sort_by(f64::total_cmp);
    let count = sorted.len() as f64;
    let off = |(index, share): (usize, &f64)| (share - index as f64 / count).max((index + 1) as f64 / count - share);
    let distance = sorted.iter().enumerate().map(off).fold(0.0, f64::max);
    assert!(distance * count.sqrt() < FARTHEST, "{name}: distance {distance}");
    let (low, high) = (sorted[0], sorted[sorted.len() - 1]);
    // The nearest of N draws lies about 1/N from an end, farther than 12/N in six trials of a million.
    assert!(low > -1e-12 && low < 12.0 / count, "{name}: lowest {low}");
    assert!(high < 1.0 + 1e-12 && high > 1.0 - 12.0 / count, "{name}: highest {high}");
}

/// No two columns may be correlated beyond four standard deviations of an honest correlation, nor a column with itself
/// one draw later.
pub(super) fn assert_independent(columns: &[Vec<f64>]) {
    for (index, left) in columns.iter().enumerate() {
        let later = columns[index + 1..].iter().map(|right| correlation(left, right));
        let own = correlation(&left[1..], &left[..left.len() - 1]);
        for found in later.chain([own]) {
            assert!(found.abs() * (left.len() as f64).sqrt() < 4.0, "column {index}: {found}");
        }
    }
}

fn correlation(left: &[f64], right: &[f64]) -> f64 {
    let product: f64 = left.iter().zip(right).map(|(a, b)| (a - 0.5) * (b - 0.5)).sum();
    12.0 * product / left.len() as f64
}
