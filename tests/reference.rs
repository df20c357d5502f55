//! Replays the random frames of `tests/reference/frames.json`, solved with 40 digits by `tests/reference/generate.py`.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use serde::Deserialize;
use support::close::close;
use support::solve::{inextensible, strained};
use support::{Within, build};
use swaybound::frame::{Feet, Frame, FrameParts, Section, SizeSource};
use swaybound::response::Response;
use swaybound::units::ReportUnits;

/// Difference allowed without axial strain, over the frame's largest moment, axial force or drift.
///
/// The stored numbers are right to the last bit or two; the solution in double precision loses little, its equations
/// being well conditioned. The worst frame is off by 4e-15.
const INEXTENSIBLE: f64 = 1e-13;

/// The same with axial strain: axial stiffness stands beside bending stiffness up to ten thousand times smaller, which
/// costs about two digits. The worst frame is off by 7e-14.
const STRAINED: f64 = 1e-12;

#[derive(Deserialize)]
struct Case {
    bays: Vec<f64>,
    storeys: Vec<f64>,
    modulus: f64,
    /// Inertia and area of each column.
    columns: Vec<(f64, f64)>,
    beams: Vec<f64>,
    feet: StoredFeet,
    lateral: Vec<f64>,
    inextensible: Answer,
    axial_strain: Answer,
}

/// `"fixed"`, `"pinned"` or one spring per line.
#[derive(Deserialize)]
#[serde(untagged)]
enum StoredFeet {
    Named(String),
    Springs(Vec<f64>),
}

#[derive(Deserialize)]
struct Answer {
    /// Foot moment, head moment and axial force of each column.
    columns: Vec<(f64, f64, f64)>,
    /// Left and right moment of each beam.
    beams: Vec<(f64, f64)>,
    drifts: Vec<f64>,
}

fn cases() -> Vec<Case> {
    serde_json::from_str(include_str!("reference/frames.json")).expect("the stored frames can be read")
}

impl Case {
    fn frame(&self) -> Frame {
        let feet = match &self.feet {
            StoredFeet::Named(name) if name == "fixed" => Feet::Fixed,
            StoredFeet::Named(name) if name == "pinned" => Feet::Pinned,
            StoredFeet::Named(name) => panic!("feet called {name}"),
            StoredFeet::Springs(springs) => Feet::Springs(springs.clone()),
        };
        let column = |(inertia, area): &(f64, f64)| Section { inertia: *inertia, area: Some(*area) };
        build(FrameParts {
            title: "reference frame".into(),
            report_units: ReportUnits::Metric,
            bays: self.bays.clone(),
            storeys: self.storeys.clone(),
            feet,
            modulus: self.modulus,
            columns: self.columns.iter().map(column).collect(),
            beams: self.beams.iter().map(|inertia| Section { inertia: *inertia, area: None }).collect(),
            lateral: self.lateral.clone(),
            sizes: SizeSource::Stated,
        })
    }
}

/// Largest magnitude of some numbers.
fn largest(values: impl Iterator<Item = f64>) -> f64 {
    values.map(f64::abs).fold(0.0, f64::max)
}

/// Checks every number of a response against the stored ones and returns the worst difference over its scale.
fn replay(name: &str, frame: &Frame, found: &Response, stored: &Answer, allowed: f64) -> f64 {
    let ends = stored.columns.iter().flat_map(|column| [column.0, column.1]);
    let moment = largest(ends.chain(stored.beams.iter().flat_map(|beam| [beam.0, beam.1])));
    let axial = largest(stored.columns.iter().map(|column| column.2));
    let drift = largest(stored.drifts.iter().copied());
    let mut worst: f64 = 0.0;
    let mut same = |what: String, found: f64, expected: f64, scale: f64| {
        close(&format!("{name}: {what}"), found, expected, Within::Of { share: allowed, scale });
        worst = worst.max((found - expected).abs() / scale);
    };
    for (index, (foot, head, force)) in stored.columns.iter().enumerate() {
        let (storey, line) = (index / frame.lines(), index % frame.lines());
        let column = found.column(storey, line);
        same(format!("foot of storey {storey} line {line}"), column.foot, *foot, moment);
        same(format!("head of storey {storey} line {line}"), column.head, *head, moment);
        same(format!("axial force of storey {storey} line {line}"), column.axial, *force, axial);
    }
    for (index, (left, right)) in stored.beams.iter().enumerate() {
        let (floor, bay) = (index / frame.bays(), index % frame.bays());
        let beam = found.beam(floor, bay);
        same(format!("left end at floor {floor} bay {bay}"), beam.left, *left, moment);
        same(format!("right end at floor {floor} bay {bay}"), beam.right, *right, moment);
    }
    for (storey, expected) in stored.drifts.iter().enumerate() {
        let movement = found.movement(storey).expect("sizes are stated");
        same(format!("drift of storey {storey}"), movement.drift, *expected, drift);
    }
    worst
}

/// Checks all frames by one analysis and prints the worst difference, so that what is allowed can be judged.
fn replay_all(analyse: impl Fn(&Frame) -> Response, stored: impl Fn(&Case) -> &Answer, allowed: f64) {
    let mut worst: (f64, usize) = (0.0, 0);
    for (number, case) in cases().iter().enumerate() {
        let frame = case.frame();
        let off = replay(&format!("frame {number}"), &frame, &analyse(&frame), stored(case), allowed);
        if off > worst.0 {
            worst = (off, number);
        }
    }
    println!("worst difference {:e}, in frame {}", worst.0, worst.1);
}

#[test]
fn slope_deflection_meets_the_reference() {
    replay_all(inextensible, |case| &case.inextensible, INEXTENSIBLE);
}

#[test]
fn stiffness_meets_the_reference() {
    replay_all(strained, |case| &case.axial_strain, STRAINED);
}

/// The frames cover what they are meant to: shapes, feet, odd loads, open bays, and axial strain that matters.
#[test]
fn the_reference_frames_are_varied() {
    let cases = cases();
    assert!(cases.len() >= 60);
    for bays in 1..=6 {
        assert!(cases.iter().any(|case| case.bays.len() == bays), "no frame of {bays} bays");
    }
    for storeys in 1..=12 {
        assert!(cases.iter().any(|case| case.storeys.len() == storeys), "no frame of {storeys} storeys");
    }
    let count = |want: &dyn Fn(&Case) -> bool| cases.iter().filter(|case| want(case)).count();
    assert!(count(&|case| matches!(case.feet, StoredFeet::Springs(_))) >= 15);
    assert!(count(&|case| case.lateral.iter().any(|force| *force < 0.0)) >= 15);
    assert!(count(&|case| case.lateral.contains(&0.0)) >= 15);
    assert!(count(&|case| case.beams.contains(&0.0)) >= 5);
    let strain_matters = |case: &Case| {
        let pairs = case.inextensible.columns.iter().zip(&case.axial_strain.columns);
        let moment = largest(case.inextensible.columns.iter().map(|column| column.0));
        largest(pairs.map(|(rigid, strained)| rigid.0 - strained.0)) > 0.01 * moment
    };
    assert!(count(&strain_matters) >= 40, "axial strain must change moments by over 1 % in most frames");
}
