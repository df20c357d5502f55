//! The closed form of y0 against elimination of the standard frame's own equations.

use super::{Ends, Storey};

/// y0 of `storey` in a chain of springs 6 K under `shears`, by elimination; feet of fixity `fixity` turn by
/// (1 - f)(theta_1 + V_1 / 2).
fn by_elimination(ratio: f64, shears: &[f64], fixity: f64, storey: usize) -> f64 {
    let count = shears.len();
    let above = |floor: usize| shears.get(floor + 1).copied().unwrap_or(0.0);
    // Stiffness of a floor and all below it, without the column above, grows by its spring and the column below in series.
    let (mut pivots, mut turns) = (vec![0.0; count], vec![0.0; count]);
    let (mut stiffness, mut right) = (fixity, (1.0 - fixity) * shears[0] / 2.0);
    for floor in 0..count {
        let column = if floor + 1 < count { 1.0 } else { 0.0 };
        stiffness += 6.0 * ratio;
        right += (shears[floor] + above(floor)) / 2.0;
        pivots[floor] = stiffness + column;
        turns[floor] = right;
        (stiffness, right) = (stiffness / (stiffness + 1.0), right / (stiffness + 1.0));
    }
    for floor in (0..count).rev() {
        let from_above = if floor + 1 < count { turns[floor + 1] } else { 0.0 };
        turns[floor] = (turns[floor] + from_above) / pivots[floor];
    }
    let difference = match storey {
        0 => fixity * turns[0] - (1.0 - fixity) * shears[0] / 2.0,
        _ => turns[storey] - turns[storey - 1],
    };
    0.5 + difference / shears[storey]
}

#[test]
fn the_closed_form_is_what_elimination_gives() {
    for count in 1..=12_usize {
        let shears: Vec<f64> = (0..count).map(|storey| 10.0 + 7.0 * ((storey * storey) % 11) as f64).collect();
        for ratio in [1e-6, 1e-3, 0.05, 0.2, 0.5, 1.0, 3.0, 50.0, 1e6, 1e30] {
            for fixity in [1.0, 0.0, 0.3] {
                let mut right: Vec<[f64; 1]> =
                    (0..count).map(|i| [(shears[i] + shears.get(i + 1).unwrap_or(&0.0)) / 2.0]).collect();
                right[0][0] += (1.0 - fixity) * shears[0] / 2.0;
                for (index, shear) in shears.iter().enumerate() {
                    let storey = Storey { index, right: &right, fixity, per_shear: 1.0 / shear, steps: [0.0; 2] };
                    let ends = Ends { column: 1.0, beams: [ratio; 2], per_beams: [1.0 / ratio; 2] };
                    let found = storey.parts(&[ends])[0].standard;
                    let expected = by_elimination(ratio, &shears, fixity, index);
                    let place = format!("storey {index} of {count}, K {ratio}, fixity {fixity}");
                    // At K = 1e-6 and fixity 0 theta is about 1/K of the shears: both lose digits to it.
                    let room = 1e-13 * (1.0 + 1e-2 / ratio);
                    assert!((found - expected).abs() < room * expected.abs().max(1.0), "{place}: {found}, {expected}");
                }
            }
        }
    }
}
