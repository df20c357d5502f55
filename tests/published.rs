//! Worked examples and statements from the literature, number by number.
//!
//! Marks beside each test: "read" = the numbers were read in a published source; "from memory" = recalled, then derived
//! again for this project; "derived" = found for this project. Sources print magnitudes; the signs are the crate's.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use support::solve::{inextensible, quick};
use support::{Sizes, Within, build, close, parts};
use swaybound::frame::{Feet, Frame};
use swaybound::response::Response;

/// Sums and products of a dozen terms: nothing but rounding may differ from the exact value.
const ROUNDING: Within = Within::Relative(1e-13);

/// Half a unit in the last digit that the source prints.
fn printed(last_digit: f64) -> Within {
    Within::Absolute(0.5 * last_digit * (1.0 + 1e-9))
}

fn kilo(value: f64) -> f64 {
    value / 1e3
}

/// Forces given from the roof down in kN, as most sources do, as the frame wants them: from the ground up in N.
fn from_the_roof(forces: &[f64]) -> Vec<f64> {
    forces.iter().rev().map(|force| 1e3 * force).collect()
}

/// Both ends of the column carry this moment, in kN m, against the clock.
#[track_caller]
fn column_is(response: &Response, storey: usize, line: usize, moment: f64, within: Within) {
    let column = response.column(storey, line);
    close(&format!("foot of storey {storey} line {line}"), kilo(column.foot), -moment, within);
    close(&format!("head of storey {storey} line {line}"), kilo(column.head), -moment, within);
}

/// Both ends of the beam carry this moment, in kN m, with the clock.
#[track_caller]
fn beam_is(response: &Response, floor: usize, bay: usize, moment: f64, within: Within) {
    let beam = response.beam(floor, bay);
    close(&format!("left end at floor {floor} bay {bay}"), kilo(beam.left), moment, within);
    close(&format!("right end at floor {floor} bay {bay}"), kilo(beam.right), moment, within);
}

/// Portal method, one bay of six storeys; read, after C. K. Wang. The printed numbers are exact, so only rounding is
/// allowed.
#[test]
fn portal_one_bay_of_six_storeys() {
    let heights = [3.0, 3.0, 4.0, 3.0, 4.0, 3.0];
    let frame = build(parts(&[5.0], &heights, &from_the_roof(&[8.0, 15.0, 17.0, 16.0, 14.0, 13.0])));
    let from_top = [(6.0, 6.0, 2.4), (23.0, 29.0, 14.0), (30.0, 53.0, 35.2)];
    let from_top = [&from_top[..], &[(56.0, 86.0, 69.6), (52.5, 108.5, 113.0), (62.25, 114.75, 158.9)]].concat();
    for method in ["portal", "portal-tributary"] {
        let response = quick(method, &frame);
        for (down, (column, beam, axial)) in from_top.iter().copied().enumerate() {
            let storey = 5 - down;
            for line in 0..2 {
                column_is(&response, storey, line, column, ROUNDING);
            }
            beam_is(&response, storey, 0, beam, ROUNDING);
            close("line A is pulled", kilo(response.column(storey, 0).axial), axial, ROUNDING);
            close("line B is pressed", kilo(response.column(storey, 1).axial), -axial, ROUNDING);
            let shear = kilo(response.column(storey, 0).shear);
            close("each column takes half", shear, 2.0 * column / heights[storey], ROUNDING);
        }
    }
}

/// Portal method, three bays of 8, 6 and 4 m; read in published teaching notes, printed to 0.001 kN and 0.01 kN m.
#[test]
fn portal_three_bays_of_three_storeys() {
    let frame = build(parts(&[8.0, 6.0, 4.0], &[4.0; 3], &from_the_roof(&[40.0, 80.0, 80.0])));
    let response = quick("portal", &frame);
    let shears = [(33.333, 66.667), (20.0, 40.0), (6.667, 13.333)];
    let moments = [(66.67, 133.33), (40.0, 80.0), (13.33, 26.67)];
    for storey in 0..3 {
        for line in 0..4 {
            let end = line == 0 || line == 3;
            let (shear, moment) = match end {
                true => (shears[storey].0, moments[storey].0),
                false => (shears[storey].1, moments[storey].1),
            };
            close("column shear", kilo(response.column(storey, line).shear), shear, printed(0.001));
            column_is(&response, storey, line, moment, printed(0.01));
        }
        // Joint by joint: every beam end takes the moment of the end columns at its floor (derived).
        let above = if storey < 2 { moments[storey + 1].0 } else { 0.0 };
        for bay in 0..3 {
            beam_is(&response, storey, bay, moments[storey].0 + above, printed(0.02));
        }
    }
}

/// Cantilever method, one storey of 8 m on bays of 8 and 5 m with equal areas; read. Printed to 0.01 kN, 0.1 kN m.
#[test]
fn cantilever_two_unequal_bays() {
    let frame = build(parts(&[8.0, 5.0], &[8.0], &[80e3]).areas(|_, _| 0.09));
    let response = quick("cantilever", &frame);
    let axial = [26.05, -3.72, -22.33];
    let shear = [26.05, 40.0, 13.95];
    let moment = [104.2, 160.0, 55.8];
    for line in 0..3 {
        let column = response.column(0, line);
        close("axial force", kilo(column.axial), axial[line], printed(0.01));
        close("column shear", kilo(column.shear), shear[line], printed(0.01));
        column_is(&response, 0, line, moment[line], printed(0.1));
    }
    beam_is(&response, 0, 0, 104.2, printed(0.1));
    beam_is(&response, 0, 1, 55.8, printed(0.1));
    // Centroid 7 m from the left and second moment 86 A, hence exact fractions (derived).
    for (line, distance) in [-7.0, 1.0, 6.0].into_iter().enumerate() {
        close("axial fraction", response.column(0, line).axial, -320e3 * distance / 86.0, ROUNDING);
    }
}

/// Cantilever method, two storeys of 4 m on a bay of 6 m; axial forces read, moments derived from them.
#[test]
fn cantilever_one_bay_of_two_storeys() {
    let frame = build(parts(&[6.0], &[4.0, 4.0], &[15e3, 30e3]).areas(|_, _| 0.09));
    let response = quick("cantilever", &frame);
    for (storey, axial, shear, column, beam) in [(1, 10.0, 15.0, 30.0, 30.0), (0, 35.0, 22.5, 45.0, 75.0)] {
        for line in 0..2 {
            close("column shear", kilo(response.column(storey, line).shear), shear, ROUNDING);
            column_is(&response, storey, line, column, ROUNDING);
        }
        close("line A is pulled", kilo(response.column(storey, 0).axial), axial, ROUNDING);
        close("line B is pressed", kilo(response.column(storey, 1).axial), -axial, ROUNDING);
        beam_is(&response, storey, 0, beam, ROUNDING);
    }
}

/// Lateral stiffness of a two-storey frame against its two sways, from the sways under two load cases.
///
/// A unit force at floor 1 alone would leave the upper storey without shear, which a frame refuses, so the cases are
/// (0, 1) and (1, 1) and the difference of their sways is the unit case.
fn condensed(frame: impl Fn(&[f64]) -> Frame) -> [[f64; 2]; 2] {
    let sways = |forces: &[f64]| {
        let response = inextensible(&frame(forces));
        [0, 1].map(|floor| response.movement(floor).expect("sizes are stated").sway)
    };
    let roof = sways(&[0.0, 1.0]);
    let both = sways(&[1.0, 1.0]);
    let first = [both[0] - roof[0], both[1] - roof[1]];
    close("Maxwell's law", first[1], roof[0], Within::Relative(1e-12));
    let determinant = first[0] * roof[1] - roof[0] * first[1];
    [[roof[1] / determinant, -roof[0] / determinant], [-first[1] / determinant, first[0] / determinant]]
}

/// Two storeys h on one bay 2h, columns 2EI and EI, beams 2EI and EI; A. K. Chopra, Dynamics of Structures, from memory,
/// derived again. Five digits printed for the stiffness, four for the frequencies, where the lower one is a unit high in
/// the last digit (2.1975).
#[test]
fn condensed_stiffness_of_a_tapering_frame() {
    let size = |level: usize, _: usize| if level == 0 { 2.0 } else { 1.0 };
    let frame = |forces: &[f64]| build(parts(&[2.0], &[1.0, 1.0], forces).columns(size).beams(size));
    let [[a, b], [_, d]] = condensed(frame);
    close("k11", a, 54.885, printed(0.001));
    close("k12", b, -17.508, printed(0.001));
    close("k22", d, 11.607, printed(0.001));
    // Masses 2m and m: 2 w^4 - (a + 2 d) w^2 + (a d - b^2) = 0.
    let half = (a + 2.0 * d) / 4.0;
    let root = (half * half - (a * d - b * b) / 2.0).sqrt();
    close("lower circular frequency", (half - root).sqrt(), 2.198, Within::Absolute(0.001));
    close("upper circular frequency", (half + root).sqrt(), 5.850, Within::Absolute(0.001));
}

/// Two storeys of 3.5 m, unequal columns with 12EI/h^3 of 2886 and 880 t/m, beams with 4EI/L of 2815 t m; read in
/// teaching notes on pseudo-three-dimensional analysis, derived again. The given stiffnesses are rounded to 3 or 4
/// digits, which moves the result in the fourth: one unit is allowed.
#[test]
fn condensed_stiffness_with_unequal_columns() {
    let (height, width) = (3.5f64, 5.0);
    let columns = [2886.0, 880.0].map(|stiffness| stiffness * height.powi(3) / 12.0);
    let frame = |forces: &[f64]| {
        let bare = parts(&[width], &[height, height], forces);
        build(bare.columns(|_, line| columns[line]).beams(|_, _| 2815.0 * width / 4.0))
    };
    let [[a, b], [_, d]] = condensed(frame);
    close("k11", a, 5448.0, Within::Absolute(1.0));
    close("k12", b, -2114.0, Within::Absolute(1.0));
    close("k22", d, 1325.0, Within::Absolute(1.0));
}

/// One bay of 6 m, two storeys of 4 m, one EI, 15 and 30 kN; derived by hand, fractions exact. The solution of six
/// equations may cost two digits.
#[test]
fn exact_moments_of_a_small_frame() {
    let frame = build(parts(&[6.0], &[4.0, 4.0], &[15e3, 30e3]));
    let response = inextensible(&frame);
    let within = Within::Relative(1e-13);
    for line in 0..2 {
        let (lower, upper) = (response.column(0, line), response.column(1, line));
        close("foot of storey 1", kilo(lower.foot), -1710.0 / 29.0, within);
        close("head of storey 1", kilo(lower.head), -900.0 / 29.0, within);
        close("foot of storey 2", kilo(upper.foot), -720.0 / 29.0, within);
        close("head of storey 2", kilo(upper.head), -1020.0 / 29.0, within);
        let side = if line == 0 { 1.0 } else { -1.0 };
        close("axial force of storey 2", kilo(upper.axial), side * 340.0 / 29.0, within);
        close("axial force of storey 1", kilo(lower.axial), side * 880.0 / 29.0, within);
    }
    beam_is(&response, 0, 0, 1620.0 / 29.0, within);
    beam_is(&response, 1, 0, 1020.0 / 29.0, within);
}

/// The frame on which the portal method's shears and beam inflection points are exact: end k_c 1, interior 2, k_b 0.7.
fn portal_frame(bays: &[f64], heights: &[f64], forces: &[f64]) -> Frame {
    let interior = |line| if line == 0 || line == bays.len() { 1.0 } else { 2.0 };
    let bare = parts(bays, heights, forces);
    build(bare.columns(|storey, line| heights[storey] * interior(line)).beams(|_, bay| 0.7 * bays[bay]))
}

/// Interior columns exactly twice as stiff as end ones and equal beams: the exact column shears are 1 : 2 : 2 : 1 and
/// beams turn at mid-span, whatever the bays and heights; derived. Four digits given.
#[test]
fn portal_assumptions_that_are_exact() {
    let heights = [4.0, 3.0, 3.0, 3.0];
    let frame = portal_frame(&[5.0, 8.0, 6.0], &heights, &[10e3, 20e3, 30e3, 25e3]);
    let (exact, portal) = (inextensible(&frame), quick("portal", &frame));
    let inflection = [0.6552, 0.4636, 0.4032, 0.2882];
    let beams = [36.9275, 31.2005, 20.0158, 8.8973];
    for storey in 0..4 {
        for line in 0..4 {
            let (column, by_portal) = (exact.column(storey, line), portal.column(storey, line));
            close("column shear", column.shear, by_portal.shear, Within::Relative(1e-12));
            let height = column.foot / (column.foot + column.head);
            close("inflection height over storey height", height, inflection[storey], printed(1e-4));
        }
        for bay in 0..3 {
            beam_is(&exact, storey, bay, beams[storey], printed(1e-4));
            let beam = exact.beam(storey, bay);
            close("inflection at mid-span", beam.left, beam.right, Within::Relative(1e-12));
        }
    }
}

/// With unequal bays the 1 : 2 : 1 rule gives interior columns axial force, the tributary rule gives it to end columns
/// only; with equal bays both do so; derived.
#[test]
fn axial_forces_of_the_portal_variants() {
    let heights = [4.5, 3.0, 3.5];
    let forces = [20e3, 35e3, 30e3];
    let unequal = build(parts(&[5.0, 8.0, 6.5], &heights, &forces));
    let equal = build(parts(&[6.5; 3], &heights, &forces));
    let interior = |method: &str, frame: &Frame| {
        let response = quick(method, frame);
        let shares = (0..3).map(move |storey| {
            let axial = |line| response.column(storey, line).axial;
            close("end columns balance", axial(0) + axial(1) + axial(2) + axial(3), 0.0, Within::Absolute(1e-9));
            axial(1).abs().max(axial(2).abs()) / axial(0)
        });
        shares.collect::<Vec<_>>()
    };
    assert!(interior("portal", &unequal).iter().all(|share| *share > 0.1), "interior columns must carry axial force");
    // The tributary variant itself: half a bay on either side; read.
    let tributary = quick("portal-tributary", &unequal);
    for (line, width) in [2.5, 6.5, 7.25, 3.25].into_iter().enumerate() {
        for (storey, shear) in [85e3, 65e3, 30e3].into_iter().enumerate() {
            close("tributary shear", tributary.column(storey, line).shear, shear * width / 19.5, ROUNDING);
        }
    }
    for (method, frame) in [("portal", &equal), ("portal-tributary", &equal), ("portal-tributary", &unequal)] {
        for share in interior(method, frame) {
            close("interior axial force over end axial force", share, 0.0, Within::Absolute(1e-13));
        }
    }
}

/// One bay with equal columns: cantilever and portal methods agree in every number; derived. Pinned feet put both
/// ground hinges at the ground (read).
#[test]
fn cantilever_equals_portal_on_one_bay() {
    for feet in [Feet::Fixed, Feet::Pinned, Feet::Springs(vec![3e7, 3e7])] {
        let bare = parts(&[7.5], &[4.4, 3.6, 3.1], &[30e3, -10e3, 45e3]).areas(|storey, _| 0.2 - 0.05 * storey as f64);
        let frame = build(bare.feet(feet.clone()));
        let (portal, cantilever) = (quick("portal", &frame), quick("cantilever", &frame));
        support::close_responses("cantilever beside portal", &frame, &cantilever, &portal, 1e-14);
        let foot = portal.column(0, 0).foot;
        let expected = if feet == Feet::Pinned { 0.0 } else { -65e3 * 4.4 / 4.0 };
        close("foot moment", foot, expected, Within::Relative(1e-14));
        close("head moment", portal.column(0, 0).head, -65e3 * 4.4 / 2.0 - expected, Within::Relative(1e-14));
    }
}
