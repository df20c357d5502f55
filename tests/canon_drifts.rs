//! The quick methods that give storey drifts: exact cases, and how far they miss elsewhere.
//!
//! Marks as in `published.rs`: read, from memory, derived.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use support::solve::{inextensible, quick, strained};
use support::{Sizes, Within, build, close, parts};
use swaybound::frame::{Feet, Frame, FrameParts};
use swaybound::response::Response;

/// The methods that give drifts but no forces.
const DRIFTS: [&str; 4] = ["racking", "wilbur", "racking+chord", "wilbur+chord"];

fn drift(response: &Response, storey: usize) -> f64 {
    response.movement(storey).expect("sizes are stated").drift
}

/// A tall frame of equal storeys under a force at the roof, whose joints of a floor turn alike: interior columns twice as
/// stiff as the end ones. `ratio` = beam over end column stiffness.
fn tall(bays: usize, ratio: f64, feet: Feet) -> Frame {
    let mut forces = vec![0.0; 41];
    forces[40] = 10e3;
    let bare = parts(&vec![2.0; bays], &[1.5; 41], &forces).beams(|_, _| 2.0 * ratio);
    build(bare.columns(|_, line| if line == 0 || line == bays { 1.5 } else { 3.0 }).feet(feet))
}

/// Racking and Wilbur drifts and those of the D-value method are exact for an interior storey of a tall uniform frame whose
/// joints of a floor turn alike; derived. At mid-height of 41 storeys the ends are felt less than 1e-9.
#[test]
fn drifts_of_an_interior_storey_are_exact() {
    for bays in [1, 2, 4] {
        for ratio in [0.3, 1.0, 4.0] {
            let frame = tall(bays, ratio, Feet::Fixed);
            let exact = drift(&inextensible(&frame), 20);
            for method in ["racking", "wilbur", "d-value", "substitute-frame"] {
                close(method, drift(&quick(method, &frame), 20), exact, Within::Relative(1e-9));
            }
        }
    }
}

/// How far the drifts of the end storeys miss on tall uniform frames under constant shear, in whole percent; derived. Negative
/// is short.
#[test]
fn drifts_of_end_storeys_miss_by_what_is_stated() {
    let cases = [
        ("racking", Feet::Fixed, 0, [-32.0, -9.0, -2.0]),
        ("racking", Feet::Pinned, 0, [10.0, 2.0, 1.0]),
        ("wilbur", Feet::Fixed, 0, [-12.0, -1.0, 0.0]),
        ("wilbur", Feet::Fixed, 40, [25.0, 21.0, 14.0]),
    ];
    for (method, feet, storey, percents) in cases {
        for (ratio, percent) in [0.2, 0.8, 2.0].into_iter().zip(percents) {
            for bays in [1, 3] {
                let frame = tall(bays, ratio, feet.clone());
                let found =
                    100.0 * (drift(&quick(method, &frame), storey) / drift(&inextensible(&frame), storey) - 1.0);
                close(&format!("{method}, storey {}, {ratio}", storey + 1), found, percent, Within::Absolute(0.5));
            }
        }
    }
    let frame = tall(1, 0.5, Feet::Fixed);
    let at_the_limit = 100.0 * (drift(&quick("racking", &frame), 0) / drift(&inextensible(&frame), 0) - 1.0);
    close("racking where its caution begins", at_the_limit, -15.0, Within::Absolute(0.5));
}

/// One storey: Wilbur's formula is exact (derived); racking takes the beam for that of two storeys, and is exact with twice
/// the beam on fixed feet (derived).
#[test]
fn drifts_of_a_single_storey() {
    for beam in [0.01, 0.4, 1.0, 30.0] {
        let frame = |beam: f64| build(parts(&[6.0], &[4.0], &[12.0]).columns(|_, _| 4.0).beams(|_, _| 6.0 * beam));
        let exact = drift(&inextensible(&frame(beam)), 0);
        close("wilbur", drift(&quick("wilbur", &frame(beam)), 0), exact, Within::Relative(1e-12));
        close("racking", drift(&quick("racking", &frame(2.0 * beam)), 0), exact, Within::Relative(1e-12));
    }
}

/// Wilbur's formulas with unequal storeys, by hand (formulas read): C = 2, 4, 2 and G = 1, 2, 4 from the ground, heights 4, 3, 2
/// m, V = 48 throughout, E = 1. Drift = V/R = h [..]:
/// 1: 4 (16/2 + 7/(1 + 2/12)) = 4 (8 + 6) = 56;
/// 2: 3 (12/4 + 7/(1 + 2/12) + 5/2) = 3 (3 + 6 + 2.5) = 34.5;
/// 3, top: 2 (8/2 + (2 x 3 + 2)/2 + 2/4) = 2 (4 + 4 + 0.5) = 17.
#[test]
fn wilbur_by_hand() {
    let (heights, columns, beams) = ([4.0, 3.0, 2.0], [1.0, 2.0, 1.0], [1.0, 2.0, 4.0]);
    let bare = parts(&[6.0], &heights, &[0.0, 0.0, 48.0]).columns(|storey, _| heights[storey] * columns[storey]);
    let response = quick("wilbur", &build(bare.beams(|floor, _| 6.0 * beams[floor])));
    for (storey, expected) in [56.0, 34.5, 17.0].into_iter().enumerate() {
        close("drift", drift(&response, storey), expected, Within::Relative(1e-13));
    }
    // Two storeys, the second the top one too: 3 (12/4 + (2 x 4 + 3)/(1 + 2/12) + 3/2).
    let two = parts(&[6.0], &heights[..2], &[0.0, 48.0]).columns(|storey, _| heights[storey] * columns[storey]);
    let response = quick("wilbur", &build(two.beams(|floor, _| 6.0 * beams[floor])));
    close("drift", drift(&response, 1), 3.0 * (3.0 + 11.0 / (7.0 / 6.0) + 1.5), Within::Relative(1e-13));
}

/// Racking by hand (formulas from memory, derived again): C = 2 and G = 3 throughout, h = 3 m, V = 12, E = 1: V h^2/12 = 9.
/// Upper storeys 9 (1/2 + 1/3) = 7.5; first on fixed feet 9 (2/9 + 1/2)/(1 + 2/18) = 5.85; on pinned ones 9 (3/6 + 4/2) = 22.5.
#[test]
fn racking_by_hand() {
    for (feet, first) in [(Feet::Fixed, 5.85), (Feet::Pinned, 22.5)] {
        let bare = parts(&[5.0], &[3.0; 3], &[0.0, 0.0, 12.0]).columns(|_, _| 3.0).beams(|_, _| 15.0);
        let response = quick("racking", &build(bare.feet(feet)));
        for (storey, expected) in [first, 7.5, 7.5].into_iter().enumerate() {
            close("drift", drift(&response, storey), expected, Within::Relative(1e-13));
        }
    }
}

/// Areas 0.2, 0.1 and 0.3 m2 at 0, 6 and 10 m: centroid 3.6/0.6 = 6 m, sum A c^2 = 0.2 x 36 + 0.3 x 16 = 12 m4.
fn with_chords(heights: &[f64], forces: &[f64]) -> Frame {
    let bare = parts(&[6.0, 4.0], heights, forces).areas(|_, line| [0.2, 0.1, 0.3][line]);
    build(FrameParts { modulus: 50.0, ..bare })
}
/// E sum A c^2 of [`with_chords`].
const BENDING: f64 = 600.0;

/// The chord part of both methods' drifts.
fn chord_sways(frame: &Frame) -> Vec<f64> {
    let part = |with: &str, without: &str| {
        let (with, without) = (quick(with, frame), quick(without, frame));
        let sway = |response: &Response, storey| response.movement(storey).unwrap().sway;
        (0..frame.storeys()).map(|storey| sway(&with, storey) - sway(&without, storey)).collect::<Vec<_>>()
    };
    let (racking, wilbur) = (part("racking+chord", "racking"), part("wilbur+chord", "wilbur"));
    for (a, b) in racking.iter().zip(&wilbur) {
        close("one chord part", *a, *b, Within::Relative(1e-8));
    }
    racking
}

/// Chord drift beside the deflection of a cantilever, P H^3/(3 B) under a force at the top and w H^4/(8 B) under a uniform load
/// (common practice), B = E sum A c^2. A storey drift is height times slope at mid-height. The slope being of second degree
/// within a storey, the sum is over the deflection by sum of V h^3/(24 B): exactly P H^3/(24 B n^2) for n equal storeys under
/// P at the top (derived).
#[test]
fn chord_drift_is_that_of_a_cantilever() {
    for storeys in [1, 2, 5, 40] {
        let (height, count) = (60.0, storeys as f64);
        let heights = vec![height / count; storeys];
        let mut forces = vec![0.0; storeys];
        forces[storeys - 1] = 9.0;
        let top = *chord_sways(&with_chords(&heights, &forces)).last().unwrap();
        let deflection = 9.0 * height.powi(3) / (3.0 * BENDING);
        close("force at the top", top, deflection * (1.0 + 1.0 / (8.0 * count * count)), Within::Relative(1e-8));
    }
    let heights = [1.0; 60];
    let mut forces = [2.0; 60];
    forces[59] = 1.0;
    let top = *chord_sways(&with_chords(&heights, &forces)).last().unwrap();
    // Half a storey's load at the roof, as from a load spread along the height: w = 2. The difference goes with 1/n^2.
    close("uniform load", top, 2.0 * 60f64.powi(4) / (8.0 * BENDING), Within::Relative(1e-3));
}

/// Any loads and heights: a cantilever under forces P at heights a bends by sum of P a^2 (3 x - a)/(6 B) at x above them
/// (common practice); the sum of drifts is over it by the sum of V h^3/(24 B) of the storeys below (derived).
#[test]
fn chord_drift_under_any_loads() {
    let (heights, forces) = ([5.0, 3.0, 4.0, 3.5], [6.0, -2.0, 9.0, 4.0]);
    let frame = with_chords(&heights, &forces);
    let sways = chord_sways(&frame);
    let mut over = 0.0;
    for storey in 0..4 {
        over += frame.storey_shear(storey) * heights[storey].powi(3) / (24.0 * BENDING);
        let x = frame.floor_height(storey);
        let bent = |floor: usize| {
            let (near, far) = (frame.floor_height(floor).min(x), frame.floor_height(floor).max(x));
            forces[floor] * near * near * (3.0 * far - near) / (6.0 * BENDING)
        };
        let deflection: f64 = (0..4).map(bent).sum();
        close("sway", sways[storey], deflection + over, Within::Relative(1e-8));
    }
}

/// A bare frame is racking and chord bending in series: on a slender frame with column axial strain the drift of upper storeys
/// is met within 3 % with the chord part, where half of it and more is missed without.
#[test]
fn racking_and_chord_bending_stand_in_series() {
    let mut forces = vec![1e3; 30];
    forces[29] = 5e2;
    let bare = parts(&[4.0], &[3.0; 30], &forces).columns(|_, _| 2e-3).beams(|_, _| 3e-3).areas(|_, _| 0.02);
    let frame = build(FrameParts { modulus: 2e11, ..bare });
    let exact = strained(&frame);
    for (with, without) in [("racking+chord", "racking"), ("wilbur+chord", "wilbur")] {
        let (with, without) = (quick(with, &frame), quick(without, &frame));
        for storey in 5..25 {
            close("in series", drift(&with, storey), drift(&exact, storey), Within::Relative(0.03));
        }
        assert!(drift(&without, 24) < 0.5 * drift(&exact, 24), "axial strain counts here");
    }
}

/// These methods state no forces, in numbers or in values.
#[test]
fn drift_methods_state_drifts_only() {
    let frame = with_chords(&[4.0, 3.0], &[1.0, 2.0]);
    for method in DRIFTS {
        let response = quick(method, &frame);
        assert!(!response.has_forces());
        assert_eq!(response.values(&frame).len(), 4, "{method}: drift and sway of two storeys");
    }
}
