//! Random frames for property tests.

use proptest::collection::vec;
use proptest::prelude::*;
use proptest::test_runner::{Config, RngSeed};
use swaybound::frame::{Feet, FrameParts, Section, SizeSource};
use swaybound::units::ReportUnits;

/// Run `cases` draws from a fixed seed, so that a test that passes today passes tomorrow.
pub fn cases(cases: u32) -> Config {
    Config { cases, rng_seed: RngSeed::Fixed(20_260_711), failure_persistence: None, ..Config::default() }
}

/// Ordinary frames: inertias over two orders of magnitude, areas that let axial strain count, all kinds of feet.
pub fn frames() -> BoxedStrategy<FrameParts> {
    sized(1..=9, 1..=5, -4.0..-2.0)
}

/// Frames whose inertias lie up to `orders` powers of ten either side of an ordinary one.
pub fn extreme_frames(orders: f64) -> BoxedStrategy<FrameParts> {
    sized(1..=7, 1..=4, (-3.0 - orders)..(-3.0 + orders))
}

/// Frames of these numbers of storeys and bays; `exponents` of ten for the inertias.
fn sized(
    storeys: std::ops::RangeInclusive<usize>,
    bays: std::ops::RangeInclusive<usize>,
    exponents: std::ops::Range<f64>,
) -> BoxedStrategy<FrameParts> {
    let shape = (storeys, bays);
    shape.prop_flat_map(move |(storeys, bays)| of_shape(storeys, bays, exponents.clone())).boxed()
}

/// Frames of one shape; `exponents` of ten for the inertias.
pub fn of_shape(storeys: usize, bays: usize, exponents: std::ops::Range<f64>) -> impl Strategy<Value = FrameParts> {
    let lines = bays + 1;
    let inertia = move |count| vec(exponents.clone().prop_map(|exponent| 10f64.powf(exponent)), count);
    let grid = (vec(3.0..10.0, bays), vec(2.5..6.0, storeys));
    let members = (inertia(storeys * lines), vec(0.01..0.5, storeys * lines), inertia(storeys * bays));
    (grid, members, feet(lines), lateral(storeys)).prop_map(|((bays, storeys), members, feet, lateral)| {
        let (inertias, areas, beams): (Vec<f64>, Vec<f64>, Vec<f64>) = members;
        let column = |(inertia, area): (f64, f64)| Section { inertia, area: Some(area) };
        FrameParts {
            title: "random frame".into(),
            report_units: ReportUnits::Metric,
            bays,
            storeys,
            feet,
            modulus: 3e10,
            columns: inertias.into_iter().zip(areas).map(column).collect(),
            beams: beams.into_iter().map(|inertia| Section { inertia, area: None }).collect(),
            lateral,
            sizes: SizeSource::Stated,
        }
    })
}

fn feet(lines: usize) -> impl Strategy<Value = Feet> {
    let springs = vec((5.0..9.5).prop_map(|exponent| 10f64.powf(exponent)), lines);
    prop_oneof![Just(Feet::Fixed), Just(Feet::Pinned), springs.prop_map(Feet::Springs)]
}

/// Forces from the ground up, some zero or negative, whose storey shears are all positive.
pub fn lateral(storeys: usize) -> impl Strategy<Value = Vec<f64>> {
    vec((5e3..9e4, 0..4, 0.0..0.7), storeys).prop_map(|draws| {
        let mut shear = 0.0;
        let from_the_roof = draws.into_iter().map(|(push, kind, share): (f64, i32, f64)| {
            let force = match kind {
                0 if shear > 0.0 => -share * shear,
                1 if shear > 0.0 => 0.0,
                _ => push,
            };
            shear += force;
            force
        });
        let mut forces: Vec<f64> = from_the_roof.collect();
        forces.reverse();
        forces
    })
}
