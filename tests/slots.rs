//! The slot elimination against other solutions, against itself in other forms, and against what should break it.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use nalgebra::{DMatrix, DVector};
use proptest::prelude::*;
use support::build;
use support::random::{cases, extreme_frames, frames, of_shape};
use swaybound::exact::plain::{Analysis, Plain};
use swaybound::exact::{slope_deflection, stiffness};
use swaybound::frame::{Feet, Frame, FrameParts};
use swaybound::lane::{Form, Rows};
use swaybound::response::{Forces, Members, Response, Work};
use swaybound::solve::{Joint, Routes, Slots};

const BOTH: [Analysis; 2] = [Analysis::SlopeDeflection, Analysis::Stiffness];

/// Every form this processor has.
fn forms() -> impl Iterator<Item = Form> {
    [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten()
}

/// The frames' forces, and which can stand.
fn solve<const W: usize>(analysis: Analysis, form: Form, members: &Members<W>) -> (Forces<W>, [bool; W])
where
    Form: Routes<W>,
{
    let (mut work, mut forces) = (Work::for_members(members), Forces::for_members(members));
    let stands = Plain::new(analysis, members.storeys, members.bays).respond(form, members, &mut work, &mut forces);
    (forces, stands)
}

/// One frame's forces.
#[track_caller]
fn alone(analysis: Analysis, frame: &Frame) -> Forces<1> {
    let (forces, [stands]) = solve(analysis, Form::best(), &Members::of(frame));
    assert!(stands, "a sound frame was said not to stand");
    forces
}

/// Rows of forces: what the rows hold, and the rows.
fn rows<const W: usize>(forces: &Forces<W>) -> [(&'static str, &Rows<W>); 6] {
    [
        ("foot moment", &forces.column_foot),
        ("head moment", &forces.column_head),
        ("left moment", &forces.beam_left),
        ("right moment", &forces.beam_right),
        ("axial force", &forces.column_axial),
        ("drift", &forces.drift),
    ]
}

/// The largest end moment.
fn largest_moment(forces: &Forces<1>) -> f64 {
    rows(forces)[..4].iter().flat_map(|(_, rows)| rows.iter()).fold(0.0, |largest, [value]| largest.max(value.abs()))
}

/// The largest difference of end moments over the frame's largest moment; infinite where a number is none.
fn difference(found: &Forces<1>, expected: &Forces<1>) -> f64 {
    let scale = largest_moment(expected);
    let mut worst = 0.0_f64;
    for ((_, found), (_, expected)) in rows(found).iter().zip(rows(expected)).take(4) {
        for ([found], [expected]) in found.iter().zip(expected) {
            let miss = (found - expected).abs() / scale;
            worst = if miss.is_nan() { f64::INFINITY } else { worst.max(miss) };
        }
    }
    worst
}

/// A response in lane form.
fn forces_of(frame: &Frame, response: &Response) -> Forces<1> {
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    for storey in 0..frame.storeys() {
        for line in 0..frame.lines() {
            let (index, column) = (members.column(storey, line), response.column(storey, line));
            (forces.column_foot[index], forces.column_head[index]) = ([column.foot], [column.head]);
        }
        for bay in 0..frame.bays() {
            let (index, beam) = (members.beam(storey, bay), response.beam(storey, bay));
            (forces.beam_left[index], forces.beam_right[index]) = ([beam.left], [beam.right]);
        }
    }
    forces
}

/// The block-tridiagonal solution.
fn witness(analysis: Analysis, frame: &Frame) -> Forces<1> {
    let response = match analysis {
        Analysis::SlopeDeflection => slope_deflection::analyse(frame),
        Analysis::Stiffness => stiffness::analyse(frame),
    };
    forces_of(frame, &response.unwrap())
}

/// Slope-deflection in full, one dense matrix for all joints, feet and storeys, solved by nalgebra's LU decomposition.
fn dense(frame: &Frame) -> Forces<1> {
    let (lines, storeys) = (frame.lines(), frame.storeys());
    let turn = |floor: usize, line: usize| floor * lines + line;
    let chord = |storey: usize| (storeys + 1) * lines + storey;
    let unknowns = (storeys + 1) * lines + storeys;
    let (mut matrix, mut right) = (DMatrix::<f64>::zeros(unknowns, unknowns), DVector::<f64>::zeros(unknowns));
    for line in 0..lines {
        match frame.feet() {
            Feet::Fixed => matrix[(turn(0, line), turn(0, line))] = 1.0,
            Feet::Pinned => {}
            Feet::Springs(springs) => matrix[(turn(0, line), turn(0, line))] = springs[line],
        }
    }
    let held = |floor: usize| floor == 0 && *frame.feet() == Feet::Fixed;
    for storey in 0..storeys {
        for line in 0..lines {
            let k = frame.column_stiffness(storey, line);
            for (near, far) in [(storey, storey + 1), (storey + 1, storey)] {
                // M_near = 2 k (2 theta_near + theta_far - 3 psi), in the joint's row and, as -V h = sum M, the storey's.
                for row in [(!held(near)).then_some(turn(near, line)), Some(chord(storey))].into_iter().flatten() {
                    matrix[(row, turn(near, line))] += 4.0 * k;
                    matrix[(row, turn(far, line))] += 2.0 * k;
                    matrix[(row, chord(storey))] -= 6.0 * k;
                }
            }
        }
        right[chord(storey)] = -frame.storey_shear(storey) * frame.storey_height(storey);
        for bay in 0..frame.bays() {
            let k = frame.beam_stiffness(storey, bay);
            let (left, right) = (turn(storey + 1, bay), turn(storey + 1, bay + 1));
            for (near, far) in [(left, right), (right, left)] {
                matrix[(near, near)] += 4.0 * k;
                matrix[(near, far)] += 2.0 * k;
            }
        }
    }
    let factors = matrix.clone().lu();
    let rough = factors.solve(&right).expect("the frame stands");
    // One step of refinement: the equations' rows are of very different size.
    let found = &rough + factors.solve(&(right - matrix * &rough)).expect("the frame stands");
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    let moment = |k: f64, near: usize, far: usize, psi: f64| [2.0 * k * (2.0 * found[near] + found[far] - 3.0 * psi)];
    for storey in 0..storeys {
        for line in 0..lines {
            let (k, psi) = (frame.column_stiffness(storey, line), found[chord(storey)]);
            let (foot, head) = (turn(storey, line), turn(storey + 1, line));
            forces.column_foot[members.column(storey, line)] = moment(k, foot, head, psi);
            forces.column_head[members.column(storey, line)] = moment(k, head, foot, psi);
        }
        for bay in 0..frame.bays() {
            let (k, left, right) =
                (frame.beam_stiffness(storey, bay), turn(storey + 1, bay), turn(storey + 1, bay + 1));
            forces.beam_left[members.beam(storey, bay)] = moment(k, left, right, 0.0);
            forces.beam_right[members.beam(storey, bay)] = moment(k, right, left, 0.0);
        }
    }
    forces
}

/// How near two solutions of an ordinary frame come, of its largest moment.
fn limit(analysis: Analysis) -> f64 {
    match analysis {
        // Rounding alone.
        Analysis::SlopeDeflection => 1e-13,
        // Rises grow up the height against their differences: about a digit for every ten storeys is lost.
        Analysis::Stiffness => 1e-10,
    }
}

proptest! {
    #![proptest_config(cases(1500))]

    /// The block-tridiagonal route has its own assembly, unknowns and factorisation.
    #[test]
    fn agrees_with_the_block_tridiagonal_route(parts in frames()) {
        let frame = build(parts);
        for analysis in BOTH {
            let miss = difference(&alone(analysis, &frame), &witness(analysis, &frame));
            prop_assert!(miss <= limit(analysis), "{analysis:?}: {miss:e}");
        }
    }

    /// nalgebra's LU decomposition of the full equations.
    #[test]
    fn agrees_with_a_dense_solution(parts in frames()) {
        let frame = build(parts);
        let miss = difference(&alone(Analysis::SlopeDeflection, &frame), &dense(&frame));
        prop_assert!(miss <= 1e-13, "{miss:e}");
    }

    /// One lane, four lanes, portable and in registers.
    #[test]
    fn every_form_gives_the_same_bits(parts in frames(), factors in [0.2f64..5.0, 0.2..5.0, 0.2..5.0]) {
        let scaled = |factor: f64| {
            let mut other = parts.clone();
            other.columns.iter_mut().for_each(|column| column.inertia *= factor);
            other.bays.iter_mut().for_each(|width| *width *= 1.0 + 0.1 * factor);
            Members::of(&build(other))
        };
        let four = [scaled(1.0), scaled(factors[0]), scaled(factors[1]), scaled(factors[2])];
        let together = Members::side_by_side(four.each_ref());
        for analysis in BOTH {
            for form in forms() {
                let (found, stands) = solve(analysis, form, &together);
                prop_assert_eq!(stands, [true; 4]);
                for (lane, members) in four.iter().enumerate() {
                    same_bits(&found, lane, &solve(analysis, Form::PORTABLE, members).0);
                    same_bits(&found, lane, &solve(analysis, form, members).0);
                }
            }
        }
    }

    /// Members up to a million times stiffer than others.
    #[test]
    fn stays_accurate_between_extremes(parts in extreme_frames(3.0)) {
        let frame = build(parts);
        for analysis in BOTH {
            let miss = difference(&alone(analysis, &frame), &witness(analysis, &frame));
            prop_assert!(miss <= 1e-8, "{analysis:?}: {miss:e}");
        }
    }
}

#[track_caller]
fn same_bits(four: &Forces<4>, lane: usize, one: &Forces<1>) {
    for ((what, four), (_, one)) in rows(four).iter().zip(rows(one)) {
        assert_eq!(four.len(), one.len());
        for (four, [one]) in four.iter().zip(one) {
            assert_eq!(four[lane].to_bits(), one.to_bits(), "{what} in lane {lane}: {} and {one}", four[lane]);
        }
    }
}

/// A frame of a given shape; the same for the same seed.
fn shaped(storeys: usize, bays: usize, seed: u64) -> FrameParts {
    use proptest::strategy::ValueTree;
    use proptest::test_runner::{RngAlgorithm, RngSeed, TestRunner};
    let config = ProptestConfig { rng_seed: RngSeed::Fixed(seed), rng_algorithm: RngAlgorithm::ChaCha, ..cases(1) };
    of_shape(storeys, bays, -4.0..-2.0).new_tree(&mut TestRunner::new(config)).unwrap().current()
}

#[test]
fn every_shape_up_to_twelve_by_twelve_is_solved() {
    for storeys in 1..=12 {
        for bays in 1..=12 {
            let frame = build(shaped(storeys, bays, (storeys * 100 + bays) as u64));
            let members = Members::of(&frame);
            for analysis in BOTH {
                let one = alone(analysis, &frame);
                let miss = difference(&one, &witness(analysis, &frame));
                assert!(miss <= limit(analysis), "{analysis:?}, {storeys} storeys, {bays} bays: {miss:e}");
                for form in forms() {
                    same_bits(&solve(analysis, form, &Members::side_by_side([&members; 4])).0, 3, &one);
                }
            }
        }
    }
}

/// Tall and wide frames; refinement where axial strain costs digits.
#[test]
fn tall_and_wide_frames_are_solved() {
    for (storeys, bays) in [(40, 8), (40, 3), (500, 1), (1, 100), (200, 20)] {
        let frame = build(shaped(storeys, bays, 7));
        for analysis in BOTH {
            let miss = difference(&alone(analysis, &frame), &witness(analysis, &frame));
            assert!(miss <= limit(analysis), "{analysis:?}, {storeys} storeys, {bays} bays: {miss:e}");
        }
    }
}

/// Refinement works on what the equations miss: joints and storeys close better for it. (Moments differ less than that from
/// the witness: rises grow up the height against their differences, and no refinement gives digits to a rise that has none.)
#[test]
fn refinement_closes_joints_and_storeys() {
    for (joint, limit) in [(Joint::Rotation, 1e-13), (Joint::RiseAndRotation, 1e-12)] {
        let mut open = [0.0_f64; 2];
        for seed in 0..40 {
            let frame = build(shaped(40, 3, seed));
            let members = Members::of(&frame);
            let plain = Slots::<1>::new(joint, 40, 3);
            let refined = Slots::<1>::new(joint, 40, 3).refined();
            for (mut slots, open) in [plain, refined].into_iter().zip(&mut open) {
                let mut forces = Forces::for_members(&members);
                assert_eq!(slots.solve(Form::best(), &members, &mut forces), [true]);
                *open = open.max(opening(&members, &forces));
                if joint == Joint::RiseAndRotation {
                    let miss = difference(&forces, &witness(Analysis::Stiffness, &frame));
                    assert!(miss <= limit, "frame {seed}: {miss:e}");
                }
            }
        }
        assert!(open[1] < 0.7 * open[0], "{joint:?}: {open:?}");
    }
}

/// The largest sum of end moments at a joint, over the frame's largest moment.
fn opening(members: &Members<1>, forces: &Forces<1>) -> f64 {
    let mut worst = 0.0_f64;
    for storey in 0..members.storeys {
        for line in 0..members.lines() {
            let mut sum = forces.column_head[members.column(storey, line)][0];
            if storey + 1 < members.storeys {
                sum += forces.column_foot[members.column(storey + 1, line)][0];
            }
            if line > 0 {
                sum += forces.beam_right[members.beam(storey, line - 1)][0];
            }
            if line < members.bays {
                sum += forces.beam_left[members.beam(storey, line)][0];
            }
            worst = worst.max(sum.abs());
        }
    }
    worst / largest_moment(forces)
}

/// What a lane holds is no matter to the others, and is reported.
#[test]
fn a_lane_that_cannot_be_solved_is_reported_and_disturbs_no_other() {
    type Spoil = fn(&mut Members<1>);
    let spoils: [(&str, Spoil); 11] = [
        ("no column stands", |members| members.column_stiffness.iter_mut().for_each(|row| *row = [0.0])),
        ("a storey of pins", |members| {
            members.foot_rho.iter_mut().for_each(|row| *row = [0.0]);
            members.beam_stiffness.iter_mut().for_each(|row| *row = [0.0]);
        }),
        ("no number", |members| members.beam_stiffness[0] = [f64::NAN]),
        ("an infinite stiffness", |members| members.column_stiffness[1] = [f64::INFINITY]),
        ("a stiffness under nothing", |members| members.column_stiffness[1] = [-1e12]),
        ("an absurd stiffness", |members| members.column_stiffness[0] = [1e308]),
        ("an infinite load", |members| members.shear[0] = [f64::INFINITY]),
        ("no load on the roof", |members| *members.shear.last_mut().unwrap() = [f64::NAN]),
        ("no last beam", |members| *members.beam_stiffness.last_mut().unwrap() = [f64::NAN]),
        ("no last column", |members| *members.column_stiffness.last_mut().unwrap() = [f64::NAN]),
        ("denormal stiffnesses", |members| {
            members.column_stiffness.iter_mut().for_each(|row| *row = [5e-324]);
            members.beam_stiffness.iter_mut().for_each(|row| *row = [5e-324]);
            members.axial_stiffness.iter_mut().for_each(|row| *row = [5e-324]);
        }),
    ];
    for (storeys, bays) in [(1, 1), (3, 2), (4, 3), (6, 9)] {
        let sound = [0, 1, 2, 3].map(|seed| Members::of(&build(shaped(storeys, bays, seed))));
        for (what, spoil) in spoils {
            for broken in 0..4 {
                let mut four = sound.clone();
                spoil(&mut four[broken]);
                for analysis in BOTH {
                    for form in forms() {
                        let (found, stands) = solve(analysis, form, &Members::side_by_side(four.each_ref()));
                        let place =
                            format!("{what} in lane {broken}, {analysis:?}, {storeys} by {bays}, {}", form.name());
                        for lane in 0..4 {
                            assert_eq!(stands[lane], lane != broken, "{place}: {stands:?}");
                            if lane != broken {
                                same_bits(&found, lane, &solve(analysis, form, &sound[lane]).0);
                            }
                        }
                    }
                }
            }
        }
    }
}

/// Very small and very large numbers, where nothing overflows, change nothing: all is linear.
#[test]
fn powers_of_two_change_no_bit() {
    let frame = shaped(5, 3, 3);
    let members = Members::of(&build(frame));
    for analysis in BOTH {
        let plain = solve(analysis, Form::best(), &members).0;
        for exponent in [-60, -7, 40] {
            let factor = 2f64.powi(exponent);
            let mut scaled = members.clone();
            for rows in [&mut scaled.column_stiffness, &mut scaled.beam_stiffness, &mut scaled.axial_stiffness] {
                rows.iter_mut().for_each(|[value]| *value *= factor);
            }
            let (found, stands) = solve(analysis, Form::best(), &scaled);
            assert_eq!(stands, [true]);
            for ((what, found), (_, plain)) in rows(&found).iter().zip(rows(&plain)).take(5) {
                for ([found], [plain]) in found.iter().zip(plain) {
                    assert_eq!(found.to_bits(), plain.to_bits(), "{what}, stiffness times 2^{exponent}");
                }
            }
        }
    }
}

#[test]
fn frames_of_another_shape_are_not_solved() {
    let members = Members::of(&build(shaped(3, 2, 1)));
    let mut forces = Forces::for_members(&members);
    for joint in [Joint::Rotation, Joint::RiseAndRotation] {
        for (storeys, bays) in [(3, 3), (2, 2), (4, 2), (0, 2), (3, 0)] {
            let mut slots = Slots::<1>::new(joint, storeys, bays);
            assert_eq!(slots.solve(Form::best(), &members, &mut forces), [false], "{storeys} by {bays}");
        }
        let mut others = Forces::for_members(&Members::of(&build(shaped(4, 2, 1))));
        assert_eq!(Slots::<1>::new(joint, 3, 2).refined().solve(Form::best(), &members, &mut others), [false]);
        let mut short = members.clone();
        short.shear = Rows::zeros(2);
        assert_eq!(Slots::<1>::new(joint, 3, 2).solve(Form::best(), &short, &mut forces), [false]);
    }
}
