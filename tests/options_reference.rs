//! Replays the random frames of `tests/reference/options.json`: shear deformation, end springs, rigid zones and second
//! order, solved with 40 digits by `tests/reference/generate_options.py`, which uses no stability function.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use serde::Deserialize;
use support::close::close;
use support::{Within, build};
use swaybound::exact::{second_order, stiffness};
use swaybound::frame::options::{AnalysisOptions, EndSpring};
use swaybound::frame::{Feet, Frame, FrameParts, Section, SizeSource};
use swaybound::response::Response;
use swaybound::units::ReportUnits;

/// First order, over the frame's largest moment, axial force or drift: as with plain frames with axial strain, whose
/// axial and bending stiffness differ widely; see `reference.rs`. The worst frame is off by 1e-14.
const FIRST_ORDER: f64 = 1e-12;

/// Second order: axial forces count as settled when they change by less than 1e-10 of the largest gravity force; what is
/// left in the rest of the answer is that, magnified by 1 / (1 - 1 / critical load factor), here at most 8.
/// The worst frame is off by 5e-11.
const SECOND_ORDER: f64 = 1e-9;

/// Critical load factors are found by bisection to 1e-9 of themselves; the worst is off by 7e-10.
const CRITICAL: f64 = 2e-9;

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
    shear_modulus: Option<f64>,
    column_shear_area: Vec<Option<f64>>,
    beam_shear_area: Vec<Option<f64>>,
    /// `null` rigid, 0 a hinge.
    beam_springs: Vec<[Option<f64>; 2]>,
    column_zones: Vec<[f64; 2]>,
    beam_zones: Vec<[f64; 2]>,
    gravity: Option<Vec<f64>>,
    first_order: Answer,
    second_order: Option<Answer>,
    critical_load_factor: Option<f64>,
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
    /// Foot, head, foot face and head face moment, shear, axial force of each column.
    columns: Vec<[f64; 6]>,
    /// Left, right, left face and right face moment of each beam.
    beams: Vec<[f64; 4]>,
    drifts: Vec<f64>,
}

fn cases() -> Vec<Case> {
    serde_json::from_str(include_str!("reference/options.json")).expect("the stored frames can be read")
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

    fn options(&self, frame: &Frame) -> AnalysisOptions {
        let spring = |stored: Option<f64>| match stored {
            None => EndSpring::Rigid,
            Some(0.0) => EndSpring::Hinge,
            Some(stiffness) => EndSpring::Spring(stiffness),
        };
        let mut options = AnalysisOptions::plain(frame);
        options.shear_modulus = self.shear_modulus;
        options.column_shear_area = self.column_shear_area.clone();
        options.beam_shear_area = self.beam_shear_area.clone();
        options.beam_springs = self.beam_springs.iter().map(|ends| ends.map(spring)).collect();
        options.column_zones = self.column_zones.clone();
        options.beam_zones = self.beam_zones.clone();
        options.gravity = self.gravity.clone();
        options
    }

    fn has_zones(&self) -> bool {
        self.column_zones.iter().chain(&self.beam_zones).flatten().any(|zone| *zone > 0.0)
    }
}

/// Largest magnitude of some numbers.
fn largest(values: impl Iterator<Item = f64>) -> f64 {
    values.map(f64::abs).fold(0.0, f64::max)
}

/// Compares numbers and keeps the worst difference over its scale.
struct Judge {
    name: String,
    allowed: f64,
    worst: f64,
}

impl Judge {
    #[track_caller]
    fn same(&mut self, what: &str, found: f64, expected: f64, scale: f64) {
        close(&format!("{}: {what}", self.name), found, expected, Within::Of { share: self.allowed, scale });
        self.worst = self.worst.max((found - expected).abs() / scale);
    }

    /// Every number of a response against the stored ones.
    fn response(&mut self, frame: &Frame, found: &Response, stored: &Answer, has_zones: bool) {
        let ends = stored.columns.iter().flat_map(|column| [column[0], column[1]]);
        let moment = largest(ends.chain(stored.beams.iter().flat_map(|beam| [beam[0], beam[1]])));
        self.columns(frame, found, stored, moment, has_zones);
        for (index, beam) in stored.beams.iter().enumerate() {
            let (floor, bay) = (index / frame.bays(), index % frame.bays());
            let place = format!("floor {floor} bay {bay}");
            let ends = found.beam(floor, bay);
            self.same(&format!("left end at {place}"), ends.left, beam[0], moment);
            self.same(&format!("right end at {place}"), ends.right, beam[1], moment);
            let width = frame.bay_width(bay);
            self.same(&format!("shear at {place}"), ends.shear, (beam[0] + beam[1]) / width, moment / width);
            self.faces(&place, found.beam_face(floor, bay), [beam[2], beam[3]], moment, has_zones);
        }
        let drift = largest(stored.drifts.iter().copied());
        for (storey, expected) in stored.drifts.iter().enumerate() {
            let movement = found.movement(storey).expect("sizes are stated");
            self.same(&format!("drift of storey {storey}"), movement.drift, *expected, drift);
        }
    }

    fn columns(&mut self, frame: &Frame, found: &Response, stored: &Answer, moment: f64, has_zones: bool) {
        let shear = largest(stored.columns.iter().map(|column| column[4]));
        let axial = largest(stored.columns.iter().map(|column| column[5]));
        for (index, column) in stored.columns.iter().enumerate() {
            let (storey, line) = (index / frame.lines(), index % frame.lines());
            let place = format!("storey {storey} line {line}");
            let forces = found.column(storey, line);
            self.same(&format!("foot of {place}"), forces.foot, column[0], moment);
            self.same(&format!("head of {place}"), forces.head, column[1], moment);
            self.same(&format!("shear of {place}"), forces.shear, column[4], shear);
            self.same(&format!("axial force of {place}"), forces.axial, column[5], axial);
            self.faces(&place, found.column_face(storey, line), [column[2], column[3]], moment, has_zones);
        }
    }

    fn faces(&mut self, place: &str, found: Option<[f64; 2]>, stored: [f64; 2], scale: f64, has_zones: bool) {
        assert!(found.is_some() || !has_zones, "{}: no face moments at {place}", self.name);
        for (end, found) in found.into_iter().flatten().enumerate() {
            self.same(&format!("face {end} at {place}"), found, stored[end], scale);
        }
    }
}

#[test]
fn first_order_meets_the_reference() {
    let mut worst = (0.0, 0);
    for (number, case) in cases().iter().enumerate() {
        let frame = case.frame();
        let found = stiffness::analyse_with(&frame, &case.options(&frame)).expect("a sound frame");
        let mut judge = Judge { name: format!("frame {number}"), allowed: FIRST_ORDER, worst: 0.0 };
        judge.response(&frame, &found, &case.first_order, case.has_zones());
        worst = if judge.worst > worst.0 { (judge.worst, number) } else { worst };
    }
    println!("worst difference {:e}, in frame {}", worst.0, worst.1);
}

#[test]
fn second_order_meets_the_reference() {
    let (mut worst, mut worst_factor, mut most_rounds) = ((0.0, 0), (0.0, 0), 0);
    for (number, case) in cases().iter().enumerate() {
        let (frame, name) = (case.frame(), format!("frame {number}"));
        let Some(stored) = &case.second_order else { continue };
        let answer = second_order::analyse(&frame, &case.options(&frame)).expect("it stands").expect("it has gravity");
        let factor = answer.critical_load_factor.expect("gravity is felt");
        let expected = case.critical_load_factor.expect("stored with gravity");
        close(&format!("{name}: critical load factor"), factor, expected, Within::Relative(CRITICAL));
        let off = (factor / expected - 1.0).abs();
        worst_factor = if off > worst_factor.0 { (off, number) } else { worst_factor };
        let mut judge = Judge { name, allowed: SECOND_ORDER, worst: 0.0 };
        judge.response(&frame, &answer.response, stored, case.has_zones());
        worst = if judge.worst > worst.0 { (judge.worst, number) } else { worst };
        most_rounds = most_rounds.max(answer.rounds);
    }
    println!("worst difference {:e}, in frame {}; at most {most_rounds} rounds", worst.0, worst.1);
    println!("worst critical load factor off by {:e}, in frame {}", worst_factor.0, worst_factor.1);
}

/// Gravity pushed past the critical load is refused, a little or far over it.
#[test]
fn gravity_over_the_critical_load_is_refused() {
    for (number, case) in cases().iter().enumerate() {
        let (frame, Some(factor)) = (case.frame(), case.critical_load_factor) else { continue };
        let mut options = case.options(&frame);
        let gravity = options.gravity.take().expect("stored with the factor");
        for share in [1.001, 1.5, 4.0, 30.0] {
            options.gravity = Some(gravity.iter().map(|force| force * factor * share).collect());
            let answer = second_order::analyse(&frame, &options);
            assert!(answer.is_err(), "frame {number} stands under {share} times its critical load");
        }
    }
}

/// The frames cover what they are meant to, and every option is felt.
#[test]
fn the_reference_frames_are_varied() {
    let cases = cases();
    assert!(cases.len() >= 40);
    let count = |want: &dyn Fn(&Case) -> bool| cases.iter().filter(|case| want(case)).count();
    let has_springs = |case: &Case| case.beam_springs.iter().flatten().any(Option::is_some);
    let is_fixed = |case: &Case| matches!(&case.feet, StoredFeet::Named(name) if name == "fixed");
    let is_pinned = |case: &Case| matches!(&case.feet, StoredFeet::Named(name) if name == "pinned");
    for feet in [&is_fixed as &dyn Fn(&Case) -> bool, &is_pinned, &|case| !is_fixed(case) && !is_pinned(case)] {
        assert!(count(feet) >= 10, "too few frames of some kind of feet");
    }
    assert!(count(&|case| case.shear_modulus.is_some()) >= 15);
    assert!(count(&|case| case.shear_modulus.is_some() && case.column_shear_area.contains(&None)) >= 5);
    assert!(count(&has_springs) >= 15);
    assert!(count(&|case| case.beam_springs.iter().flatten().any(|spring| *spring == Some(0.0))) >= 8);
    assert!(count(&Case::has_zones) >= 15);
    assert!(count(&|case| case.second_order.is_some()) >= 20);
    let everything = |case: &Case| {
        case.shear_modulus.is_some() && has_springs(case) && case.has_zones() && case.second_order.is_some()
    };
    assert!(count(&everything) >= 4, "few frames have every option at once");
    let amplified = |case: &Case, least: f64| {
        let Some(second) = &case.second_order else { return false };
        let drifts = second.drifts.iter().zip(&case.first_order.drifts);
        largest(drifts.map(|(second, first)| second / first)) > least
    };
    assert!(count(&|case| amplified(case, 1.1)) >= 10, "few frames feel second order");
    assert!(count(&|case| amplified(case, 2.0)) >= 4, "few frames are near buckling");
    assert!(count(&in_net_tension) >= 3, "few frames have columns pulled in spite of gravity");
    assert!(count(&past_euler) >= 2, "few frames have columns over pi^2 E I / h^2");
}

/// Compression in each column: gravity from above less the axial force of the lateral answer.
fn compressions(case: &Case) -> Vec<f64> {
    let (Some(gravity), Some(second)) = (&case.gravity, &case.second_order) else { return Vec::new() };
    let lines = case.bays.len() + 1;
    let above = |index: usize| gravity[index..].iter().step_by(lines).sum::<f64>();
    second.columns.iter().enumerate().map(|(index, column)| above(index) - column[5]).collect()
}

fn in_net_tension(case: &Case) -> bool {
    compressions(case).iter().any(|force| *force < 0.0)
}

/// A column loaded over its Euler load as if hinged at both ends, propped by the frame: past a pole of usual functions.
fn past_euler(case: &Case) -> bool {
    let lines = case.bays.len() + 1;
    let euler = |index: usize| {
        let height = case.storeys[index / lines];
        std::f64::consts::PI.powi(2) * case.modulus * case.columns[index].0 / (height * height)
    };
    compressions(case).iter().enumerate().any(|(index, force)| *force > euler(index))
}
