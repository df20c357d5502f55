//! Closed forms and published tables that the exact analysis must meet.
//!
//! Marks as in `published.rs`: read, from memory, derived.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use support::solve::{inextensible, quick, strained};
use support::{Sizes, Within, build, close, parts};
use swaybound::frame::{Feet, Frame};
use swaybound::response::Response;

/// A handful of equations solved in double precision: all but the last two or three digits.
const SOLVED: Within = Within::Relative(1e-12);

fn drift(response: &Response, storey: usize) -> f64 {
    response.movement(storey).expect("sizes are stated").drift
}

/// One bay, one storey: width, height, I of columns and beam, modulus, force.
struct Portal {
    width: f64,
    height: f64,
    column: f64,
    beam: f64,
    modulus: f64,
    force: f64,
}

/// Many proportions: from beams a thousand times softer to a thousand times stiffer than the columns.
fn portals() -> Vec<Portal> {
    let mut all = Vec::new();
    for ratio in [1e-3, 0.05, 0.3, 1.0, 2.5, 40.0, 1e3] {
        for (width, height) in [(3.0, 6.0), (6.0, 6.0), (12.0, 3.5)] {
            let column = 4e-3;
            all.push(Portal { width, height, column, beam: ratio * column, modulus: 3e10, force: 70e3 });
        }
    }
    all
}

impl Portal {
    fn frame(&self, feet: Feet) -> Frame {
        let bare = parts(&[self.width], &[self.height], &[self.force]);
        let sized = bare.columns(|_, _| self.column).beams(|_, _| self.beam).feet(feet);
        build(swaybound::frame::FrameParts { modulus: self.modulus, ..sized })
    }

    /// Stiffness of the beam over that of a column.
    fn k(&self) -> f64 {
        (self.beam / self.column) * (self.height / self.width)
    }
}

/// Fixed feet, force at beam level; A. Kleinlogel, Rigid Frame Formulas, from memory, derived again.
#[test]
fn one_bay_one_storey_on_fixed_feet() {
    for portal in portals() {
        let (k, response) = (portal.k(), inextensible(&portal.frame(Feet::Fixed)));
        let half = portal.force * portal.height / 2.0;
        let flexibility = portal.force * portal.height.powi(3) / (12.0 * portal.modulus * portal.column);
        for line in 0..2 {
            let column = response.column(0, line);
            close("foot", column.foot, -half * (3.0 * k + 1.0) / (6.0 * k + 1.0), SOLVED);
            close("head", column.head, -half * 3.0 * k / (6.0 * k + 1.0), SOLVED);
        }
        let beam = response.beam(0, 0);
        close("beam, left", beam.left, half * 3.0 * k / (6.0 * k + 1.0), SOLVED);
        close("beam, right", beam.right, half * 3.0 * k / (6.0 * k + 1.0), SOLVED);
        close("line A is pulled", response.column(0, 0).axial, 2.0 * beam.left / portal.width, SOLVED);
        close("drift", drift(&response, 0), flexibility * (3.0 * k + 2.0) / (6.0 * k + 1.0), SOLVED);
    }
}

/// Pinned feet; same source, from memory, derived again. With the softest beam the columns lean thousands of times
/// further than they bend, which costs another digit.
#[test]
fn one_bay_one_storey_on_pinned_feet() {
    for portal in portals() {
        let (k, response) = (portal.k(), inextensible(&portal.frame(Feet::Pinned)));
        let half = portal.force * portal.height / 2.0;
        let flexibility = portal.force * portal.height.powi(3) / (12.0 * portal.modulus * portal.column);
        for line in 0..2 {
            close("foot", response.column(0, line).foot, 0.0, Within::Of { share: 1e-11, scale: half });
            close("head", response.column(0, line).head, -half, Within::Relative(1e-11));
        }
        close("drift", drift(&response, 0), flexibility * (2.0 * k + 1.0) / k, Within::Relative(1e-11));
    }
}

/// Lateral stiffness for L = 2h and r = I_b/(4 I_c); A. K. Chopra, Dynamics of Structures, from memory, derived again.
#[test]
fn lateral_stiffness_of_a_wide_portal() {
    for r in [0.0, 0.01, 0.125, 0.5, 2.0, 1e4] {
        let frame = build(parts(&[2.0], &[1.0], &[1.0]).beams(|_, _| 4.0 * r));
        let stiffness = 1.0 / drift(&inextensible(&frame), 0);
        close("lateral stiffness", stiffness, 24.0 * (12.0 * r + 1.0) / (12.0 * r + 4.0), SOLVED);
    }
}

/// Beams without stiffness leave cantilevers side by side: deflection of a cantilever under forces along its length,
/// sum of P a^2 (3 x - a)/(6 E I) for x above a; common practice.
#[test]
fn columns_without_beams_are_cantilevers() {
    let heights = [3.5, 3.0, 4.0];
    let forces = [20e3, -5e3, 30e3];
    let inertias = [2e-3, 5e-3, 1e-3];
    let bare = parts(&[6.0, 5.0], &heights, &forces).columns(|_, line| inertias[line]).beams(|_, _| 0.0);
    let frame = build(bare.areas(|_, _| 0.1));
    let levels = [3.5, 6.5, 10.5];
    let total: f64 = inertias.iter().sum();
    for response in [inextensible(&frame), strained(&frame)] {
        for floor in 0..3 {
            let under = |(a, force): (&f64, &f64)| {
                let (near, far) = (a.min(levels[floor]), a.max(levels[floor]));
                force * near * near * (3.0 * far - near) / (6.0 * total)
            };
            let expected: f64 = levels.iter().zip(&forces).map(under).sum();
            close("sway", response.movement(floor).expect("stated").sway, expected, SOLVED);
        }
        let turning: f64 = levels.iter().zip(&forces).map(|(level, force)| level * force).sum();
        for (column, inertia) in response.storey_columns(0).iter().zip(inertias) {
            close("foot", column.foot, -turning * inertia / total, SOLVED);
            close("axial force", column.axial, 0.0, Within::Absolute(1e-6));
        }
    }
}

/// A tall one-bay frame of equal storeys under a force at the roof alone: beam stiffness `ratio` times a column's.
fn tall(ratio: f64, feet: Feet) -> (Frame, Response) {
    let mut forces = vec![0.0; 41];
    forces[40] = 10e3;
    let frame = build(parts(&[2.0], &[1.5; 41], &forces).columns(|_, _| 1.5).beams(|_, _| 2.0 * ratio).feet(feet));
    let response = inextensible(&frame);
    (frame, response)
}

/// Racking drift V h^2/(12 E) (1/C + 1/G) of an interior storey, C and G the sums of column and beam stiffness;
/// B. Stafford Smith and A. Coull, Tall Building Structures, from memory. Exact in a uniform frame with equal rotations
/// (derived); at mid-height of 41 storeys the ends are felt less than 1e-9 for ratio 0.3, the smallest here.
#[test]
fn racking_drift_of_an_interior_storey() {
    for ratio in [0.3, 1.0, 4.0] {
        let (frame, response) = tall(ratio, Feet::Fixed);
        let expected = frame.storey_shear(20) * 1.5 * 1.5 / 12.0 * (1.0 / 2.0 + 1.0 / ratio);
        close("drift", drift(&response, 20), expected, Within::Relative(1e-9));
        let column = response.column(20, 0);
        close("inflection at mid-height", column.foot, column.head, Within::Relative(1e-9));
    }
}

/// First-storey racking drift on fixed feet, V h^2/(12 E) (2/(3 G) + 1/C)/(1 + C/(6 G)); from memory, derived again. It
/// gives half of the first floor's beam to the storey above: exact for one storey with G twice the beam (derived).
#[test]
fn first_storey_drift_on_fixed_feet() {
    for portal in portals() {
        let response = inextensible(&portal.frame(Feet::Fixed));
        let columns = 2.0 * portal.column / portal.height;
        let beams = 2.0 * portal.beam / portal.width;
        let shape = (2.0 / (3.0 * beams) + 1.0 / columns) / (1.0 + columns / (6.0 * beams));
        let expected = portal.force * portal.height.powi(2) / (12.0 * portal.modulus) * shape;
        close("drift", drift(&response, 0), expected, SOLVED);
    }
}

/// First-storey racking drift on pinned feet, V h^2/(12 E) (3/(2 G) + 4/C); from memory, derived again. It takes the
/// second floor to turn as much as the first: exact for two storeys of equal shear whose roof beam is a third of the
/// first floor's (derived), whatever the columns.
#[test]
fn first_storey_drift_on_pinned_feet() {
    for (column, beam) in [(1.0, 1.0), (5.0, 0.2), (0.3, 7.0)] {
        let bare = parts(&[6.0], &[3.0, 3.0], &[0.0, 12e3]).columns(|_, _| 3.0 * column);
        let sized = bare.beams(|floor, _| 6.0 * beam / if floor == 0 { 1.0 } else { 3.0 });
        let response = inextensible(&build(sized.feet(Feet::Pinned)));
        let expected = 12e3 * 9.0 / 12.0 * (3.0 / (2.0 * beam) + 4.0 / (2.0 * column));
        close("drift", drift(&response, 0), expected, SOLVED);
    }
}

/// How far quick drift formulas miss on tall uniform frames under constant shear, in whole percent; derived. K is beam
/// over column stiffness. Wilbur's storey stiffnesses: read.
#[test]
fn how_far_drift_formulas_miss() {
    let fixed_racking = |k: f64| (2.0 / (3.0 * k) + 0.5) / (1.0 + 1.0 / (3.0 * k)) / 12.0;
    let pinned_racking = |k: f64| (3.0 / (2.0 * k) + 2.0) / 12.0;
    let wilbur_first = |k: f64| (2.0 + 2.0 / (k + 1.0 / 6.0)) / 48.0;
    let wilbur_top = |k: f64| (2.0 + 3.0 / k + 1.0 / k) / 48.0;
    for (k, percents) in [(0.2, [-32, -12, 10, 25]), (0.8, [-9, -1, 2, 21]), (2.0, [-2, 0, 1, 14])] {
        let (fixed, pinned) = (tall(k, Feet::Fixed).1, tall(k, Feet::Pinned).1);
        let exact = [drift(&fixed, 0), drift(&fixed, 0), drift(&pinned, 0), drift(&fixed, 40)];
        let quick = [fixed_racking(k), wilbur_first(k), pinned_racking(k), wilbur_top(k)];
        for case in 0..4 {
            let percent = 100.0 * (10e3 * 1.5 * 1.5 * quick[case] / exact[case] - 1.0);
            close(&format!("case {case} at K = {k}"), percent, f64::from(percents[case]), Within::Absolute(0.5));
        }
    }
}

/// Inflection height of a column over its storey height.
fn inflection(response: &Response, storey: usize) -> f64 {
    let column = response.column(storey, 0);
    column.foot / (column.foot + column.head)
}

/// Inflection height of the ground storey: one storey (3K + 1)/(6K + 1) and the limits of a tall frame; derived, four
/// digits given.
#[test]
fn ground_inflection_heights() {
    for k in [0.1, 0.5, 1.0, 3.0] {
        let frame = build(parts(&[1.0], &[1.0], &[1.0]).beams(|_, _| k));
        close("one storey", inflection(&inextensible(&frame), 0), (3.0 * k + 1.0) / (6.0 * k + 1.0), SOLVED);
    }
    for (k, limit) in [(0.5, 0.7638), (1.0, 0.6455), (2.0, 0.5774), (3.0, 0.5528), (5.0, 0.5323)] {
        let (_, response) = tall(k, Feet::Fixed);
        close("tall frame", inflection(&response, 0), limit, Within::Absolute(0.5e-4));
        let lam = 1.0 + 3.0 * k - ((1.0 + 3.0 * k).powi(2) - 1.0f64).sqrt();
        close("its closed form", inflection(&response, 0), 0.5 + (1.0 - lam) / (6.0 * k), Within::Relative(1e-10));
    }
}

/// Beam over column stiffness at the head of the columns below.
const RATIOS: [f64; 11] = [0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1.0, 2.0, 3.0];

/// Inflection heights y0 under inverted-triangle loading: (storeys, storey, one number per ratio).
const INFLECTION_TABLE: [(usize, usize, [f64; 11]); 8] = [
    (1, 1, [0.75, 0.70, 0.65, 0.65, 0.60, 0.60, 0.60, 0.60, 0.55, 0.55, 0.55]),
    (2, 2, [0.45, 0.40, 0.40, 0.40, 0.40, 0.40, 0.40, 0.40, 0.45, 0.45, 0.45]),
    (2, 1, [0.85, 0.75, 0.70, 0.70, 0.65, 0.65, 0.65, 0.60, 0.60, 0.55, 0.55]),
    (3, 3, [0.25, 0.25, 0.30, 0.30, 0.35, 0.35, 0.35, 0.40, 0.40, 0.45, 0.45]),
    (3, 2, [0.50, 0.50, 0.50, 0.50, 0.45, 0.45, 0.45, 0.45, 0.45, 0.50, 0.50]),
    (3, 1, [0.90, 0.80, 0.75, 0.75, 0.70, 0.70, 0.65, 0.65, 0.65, 0.60, 0.55]),
    (4, 4, [0.15, 0.20, 0.25, 0.30, 0.30, 0.35, 0.35, 0.35, 0.40, 0.45, 0.45]),
    (4, 1, [0.95, 0.85, 0.80, 0.75, 0.70, 0.70, 0.70, 0.65, 0.65, 0.55, 0.55]),
];

/// Standard inflection heights of the D-value method after K. Muto, as printed by A. San Bartolome, Analisis de
/// edificios, annex; read. The tables are the exact solution of a uniform frame rounded to 0.05 (derived), a few cells
/// rounded a little further: 0.04 is allowed, and nine cells in ten must lie within half a step.
#[test]
fn standard_inflection_heights_of_uniform_frames() {
    let (mut cells, mut near) = (0, 0);
    for (storeys, storey, row) in INFLECTION_TABLE {
        for (ratio, expected) in RATIOS.into_iter().zip(row) {
            let forces: Vec<f64> = (1..=storeys).map(|floor| floor as f64).collect();
            let frame = build(parts(&[1.0], &vec![1.0; storeys], &forces).beams(|_, _| ratio));
            let found = inflection(&inextensible(&frame), storey - 1);
            let what = format!("storey {storey} of {storeys}, K = {ratio}");
            close(&what, found, expected, Within::Absolute(0.04));
            cells += 1;
            near += usize::from((found - expected).abs() <= 0.025 + 1e-9);
        }
    }
    assert!(10 * near >= 9 * cells, "only {near} of {cells} cells within half a step");
}

/// The cantilever method is a statement about axial stress: N_i = M A_i d_i / sum(A d^2) about the storey's hinges, with
/// different areas line by line and storey by storey; A. C. Wilson 1908, read. The frame's own equations are summed
/// here from the statement, not from the method.
#[test]
fn cantilever_axial_stress_is_linear_across_the_frame() {
    let positions = [0.0, 5.0, 13.0, 19.5];
    let areas = [[0.2, 0.3, 0.25, 0.1], [0.1, 0.3, 0.2, 0.15]];
    for (feet, hinge) in [(Feet::Fixed, 2.0), (Feet::Pinned, 0.0)] {
        let bare = parts(&[5.0, 8.0, 6.5], &[4.0, 3.0], &[25e3, 40e3]).areas(|storey, line| areas[storey][line]);
        let response = quick("cantilever", &build(bare.feet(feet)));
        let moments = [25e3 * (4.0 - hinge) + 40e3 * (7.0 - hinge), 40e3 * 1.5];
        for storey in 0..2 {
            let area: f64 = areas[storey].iter().sum();
            let first: f64 = areas[storey].iter().zip(positions).map(|(area, x)| area * x).sum();
            let from_centroid = positions.map(|x| x - first / area);
            let second: f64 = areas[storey].iter().zip(from_centroid).map(|(area, d)| area * d * d).sum();
            for line in 0..4 {
                let expected = -moments[storey] * areas[storey][line] * from_centroid[line] / second;
                close("axial force", response.column(storey, line).axial, expected, Within::Relative(1e-12));
            }
        }
    }
}
