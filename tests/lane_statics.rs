//! The equilibrium check in lanes: sound answers pass, every slip and every number that is none is seen in its own lane.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use proptest::prelude::*;
use support::build;
use support::random::{cases, frames};
use swaybound::approx;
use swaybound::frame::{Feet, FrameParts};
use swaybound::lane::{Form, Lane, Rows, Task};
use swaybound::response::{Entry, Forces, Members, Work, statics};

/// What rounding leaves of equilibrium, with a margin.
const SOUND: f64 = 1e-12;

struct Imbalance<'a, const W: usize>(&'a Members<W>, &'a Forces<W>);

impl<const W: usize> Task<W> for Imbalance<'_, W> {
    type Output = [f64; W];
    #[inline(always)]
    fn run<L: Lane<W>>(self) -> [f64; W] {
        let mut found = [0.0; W];
        statics::imbalance::<L, W>(self.0, self.1).store(&mut found);
        found
    }
}

/// Four frames of one shape: the given one with other widths, loads and feet.
fn four(parts: &FrameParts) -> [Members<1>; 4] {
    [1.0, 0.3, 2.0, 5.0].map(|factor| {
        let mut other = parts.clone();
        other.bays.iter_mut().enumerate().for_each(|(bay, width)| *width *= factor + bay as f64);
        other.lateral.iter_mut().for_each(|force| *force *= factor);
        other.feet = if factor > 1.0 { Feet::Pinned } else { Feet::Fixed };
        Members::of(&build(other))
    })
}

fn forms() -> impl Iterator<Item = Form> {
    [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten()
}

fn with_forces() -> impl Iterator<Item = &'static Entry> {
    approx::METHODS.iter().filter(|entry| entry.info.gives.forces())
}

fn answer(entry: &Entry, members: &Members<4>) -> Forces<4> {
    let mut forces = Forces::for_members(members);
    (entry.four)(Form::best(), members, &mut Work::for_members(members), &mut forces);
    forces
}

/// Every row of forces.
fn rows(forces: &mut Forces<4>) -> [&mut Rows<4>; 5] {
    [
        &mut forces.column_foot,
        &mut forces.column_head,
        &mut forces.column_axial,
        &mut forces.beam_left,
        &mut forces.beam_right,
    ]
}

/// The largest |number| in the lane: of end moments, or of axial forces.
fn scale(forces: &mut Forces<4>, row: usize, lane: usize) -> f64 {
    let own = |index: usize| if row == 2 { index == 2 } else { index != 2 };
    let kept = rows(forces).into_iter().enumerate().filter(|(index, _)| own(*index));
    kept.flat_map(|(_, row)| row.iter().map(|numbers| numbers[lane].abs()).collect::<Vec<_>>()).fold(0.0, f64::max)
}

proptest! {
    #![proptest_config(cases(60))]

    #[test]
    fn sound_answers_pass_with_the_same_bits_in_every_form(parts in frames()) {
        let alone = four(&parts);
        let together = Members::side_by_side(alone.each_ref());
        for entry in with_forces() {
            let forces = answer(entry, &together);
            for form in forms() {
                let found = form.four(Imbalance(&together, &forces));
                for (lane, members) in alone.iter().enumerate() {
                    let mut one = Forces::for_members(members);
                    (entry.one)(form, members, &mut Work::for_members(members), &mut one);
                    let [expected] = form.one(Imbalance(members, &one));
                    prop_assert_eq!(found[lane].to_bits(), expected.to_bits(), "{}, {}", entry.info.id, form.name());
                    prop_assert!(found[lane] < SOUND, "{}: {:e}", entry.info.id, found[lane]);
                }
            }
        }
    }

    #[test]
    fn every_slip_is_seen_in_its_own_lane(parts in frames(), which in 0..6_usize, lane in 0..4_usize) {
        let together = Members::side_by_side(four(&parts).each_ref());
        let mut forces = answer(with_forces().nth(which).expect("six methods"), &together);
        for row in 0..5 {
            let whole = scale(&mut forces, row, lane);
            for index in 0..rows(&mut forces)[row].len() {
                let mut slipped = forces.clone();
                let number = &mut rows(&mut slipped)[row][index][lane];
                let share = number.abs() / whole;
                *number *= 1.001;
                let found = Form::best().four(Imbalance(&together, &slipped));
                let place = format!("row {row}, number {index}, lane {lane}: {found:?}, share {share:e}");
                // A number that rounding alone could have made is none to slip on.
                if share > 1e-8 {
                    // A foot moment of the ground storey meets its storey's sum only, which has another scale.
                    prop_assert!(found[lane] > 1e-4 * share && found[lane] > SOUND, "{place}");
                }
                for other in (0..4).filter(|other| *other != lane) {
                    prop_assert!(found[other] < SOUND, "{place}");
                }
            }
        }
    }

    #[test]
    fn numbers_that_are_none_are_seen_in_their_own_lane(parts in frames(), which in 0..6_usize, lane in 0..4_usize) {
        let together = Members::side_by_side(four(&parts).each_ref());
        let mut forces = answer(with_forces().nth(which).expect("six methods"), &together);
        for row in 0..5 {
            for index in 0..rows(&mut forces)[row].len() {
                for none in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY, f64::MAX] {
                    let mut broken = forces.clone();
                    rows(&mut broken)[row][index][lane] = none;
                    for form in forms() {
                        let found = form.four(Imbalance(&together, &broken));
                        let place = format!("{none} in row {row}, number {index}, lane {lane}: {found:?}");
                        let seen = if none == f64::MAX { found[lane] > 0.1 } else { found[lane] == f64::INFINITY };
                        prop_assert!(seen, "{place}");
                        prop_assert!((0..4).all(|other| other == lane || found[other] < SOUND), "{place}");
                    }
                }
            }
        }
    }
}

/// Nothing at all is no answer to a load; loads that are none give none.
#[test]
fn no_forces_and_no_loads_are_refused() {
    let parts = support::parts(&[6.0, 5.0], &[4.0, 3.0], &[1e4, 2e4]);
    let members = Members::of(&build(parts));
    let empty = Forces::for_members(&members);
    assert_eq!(Form::PORTABLE.one(Imbalance(&members, &empty)), [1.0]);
    let mut unloaded = members.clone();
    unloaded.shear.iter_mut().for_each(|shear| *shear = [f64::NAN]);
    assert_eq!(Form::PORTABLE.one(Imbalance(&unloaded, &empty)), [f64::INFINITY]);
}
