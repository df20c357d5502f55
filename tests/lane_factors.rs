//! Factors by place in lanes: what `compare` states of one frame, and the same bits in every form.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use proptest::prelude::*;
use support::close::{Within, close};
use support::random::{cases, frames};
use support::solve::{inextensible, strained};
use support::{Sizes, build, parts};
use swaybound::approx;
use swaybound::compare::errors::{Flag, ValueError, errors};
use swaybound::compare::factors::{Factors, Measure, factors, measure};
use swaybound::compare::place_map::{PlaceMap, Scope, Slot};
use swaybound::frame::{Feet, Frame, FrameParts};
use swaybound::lane::{Form, Lane, Task};
use swaybound::response::{Forces, Gives, Members, Quantity, Response, Work};

/// Measures one answer by another, as a batch does.
struct Judge<'a, const W: usize> {
    map: &'a PlaceMap,
    members: &'a Members<W>,
    exact: &'a Forces<W>,
    quick: &'a Forces<W>,
    gives: Gives,
}

impl<const W: usize> Task<W> for Judge<'_, W> {
    type Output = (Measure<W>, Factors<W>);
    #[inline(always)]
    fn run<L: Lane<W>>(self) -> Self::Output {
        let (mut by, mut found) = (Measure::for_map(self.map), Factors::for_map(self.map));
        measure::<L, W>(self.map, self.members, self.exact, &mut by);
        factors::<L, W>(self.map, &by, self.gives, self.quick, &mut found);
        (by, found)
    }
}

/// The lane form of an answer.
fn lanes(frame: &Frame, response: &Response) -> Forces<1> {
    let members = Members::of(frame);
    let mut forces = Forces::for_members(&members);
    for storey in 0..frame.storeys() {
        for (line, column) in response.storey_columns(storey).iter().enumerate() {
            let index = members.column(storey, line);
            forces.column_foot[index] = [column.foot];
            forces.column_head[index] = [column.head];
            forces.column_axial[index] = [column.axial];
        }
        for (bay, beam) in response.floor_beams(storey).iter().enumerate() {
            let index = members.beam(storey, bay);
            forces.beam_left[index] = [beam.left];
            forces.beam_right[index] = [beam.right];
        }
        forces.drift[storey] = [response.movement(storey).map_or(0.0, |movement| movement.drift)];
    }
    forces
}

/// The same statistics from the errors of one frame.
fn expected(slot: &Slot, errors: &[ValueError]) -> [f64; 6] {
    let here = || errors.iter().filter(|error| error.place == slot.place && error.quantity == slot.quantity);
    let count = |flag: Flag| here().filter(|error| error.flags.contains(&flag)).count() as f64;
    assert_eq!(here().count(), slot.members, "{slot:?}");
    let counted = || here().filter(|error| error.exact != 0.0);
    [
        here().filter_map(|error| error.factor).fold(0.0, f64::max),
        count(Flag::Sign).min(1.0),
        count(Flag::Zero),
        count(Flag::Weak),
        counted().map(|error| error.quick.abs() / error.exact.abs()).sum(),
        counted().count() as f64,
    ]
}

fn same_as_compare(frame: &Frame, exact: &Response) {
    let (members, reference) = (Members::of(frame), lanes(frame, exact));
    let map = PlaceMap::new(frame.storeys(), frame.bays(), Scope::Everything);
    for entry in approx::METHODS.iter() {
        let mut quick = Forces::for_members(&members);
        (entry.one)(Form::PORTABLE, &members, &mut Work::for_members(&members), &mut quick);
        let gives = entry.info.gives;
        let task = Judge { map: &map, members: &members, exact: &reference, quick: &quick, gives };
        let (by, found) = Form::PORTABLE.one(task);
        let errors = errors(frame, exact, &entry.analyse(frame));
        let stated = |slot: &Slot| if slot.quantity == Quantity::Drift { gives.drifts() } else { gives.forces() };
        for (number, slot) in map.slots().iter().enumerate().filter(|(_, slot)| stated(slot)) {
            let [factor, signs, zeros, weak, ratios, counted] = expected(slot, &errors);
            let place = format!("{}: {slot:?}", entry.info.id);
            close(&place, found.factor[number][0], factor, Within::Relative(1e-14));
            close(&place, found.ratio_sum[number][0], ratios, Within::Relative(1e-13));
            let counts = [found.signs[number], found.zeros[number], found.weak[number], by.counted[number]];
            assert_eq!(
                counts.map(|[count]| count),
                [signs, zeros, weak, counted],
                "{place}: signs, zeros, weak, counted"
            );
        }
    }
}

proptest! {
    #![proptest_config(cases(120))]

    #[test]
    fn one_lane_states_what_compare_states(parts in frames()) {
        let frame = build(parts);
        same_as_compare(&frame, &inextensible(&frame));
        same_as_compare(&frame, &strained(&frame));
    }

    #[test]
    fn four_lanes_give_the_bits_of_one(parts in frames(), factors in [0.2f64..5.0, 0.2..5.0, 0.2..5.0]) {
        let alone = [1.0, factors[0], factors[1], factors[2]].map(|factor| build(changed(&parts, factor)));
        let exact = alone.each_ref().map(|frame| lanes(frame, &inextensible(frame)));
        let members = alone.each_ref().map(Members::of);
        let (storeys, bays) = (alone[0].storeys(), alone[0].bays());
        for scope in [Scope::DesignMoments, Scope::Everything] {
            let map = PlaceMap::new(storeys, bays, scope);
            for entry in &approx::METHODS {
                same_bits(&map, entry, members.each_ref(), exact.each_ref());
            }
        }
    }
}

/// A frame of the same shape, each lane another, where one may have zero and weak values that the others have not.
fn changed(parts: &FrameParts, factor: f64) -> FrameParts {
    let mut other = parts.clone();
    other.bays.iter_mut().enumerate().for_each(|(bay, width)| *width *= factor + bay as f64);
    other.columns.iter_mut().step_by(3).for_each(|column| column.inertia *= factor);
    other.feet = if factor > 1.0 { Feet::Pinned } else { Feet::Fixed };
    other
}

#[track_caller]
fn same_bits(map: &PlaceMap, entry: &swaybound::response::Entry, members: [&Members<1>; 4], exact: [&Forces<1>; 4]) {
    let together = Members::side_by_side(members);
    let side_by_side = side_by_side(&together, exact);
    for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
        let mut quick = Forces::for_members(&together);
        (entry.four)(form, &together, &mut Work::for_members(&together), &mut quick);
        let gives = entry.info.gives;
        let (by, four) = form.four(Judge { map, members: &together, exact: &side_by_side, quick: &quick, gives });
        for lane in 0..4 {
            let mut quick = Forces::for_members(members[lane]);
            (entry.one)(form, members[lane], &mut Work::for_members(members[lane]), &mut quick);
            let task = Judge { map, members: members[lane], exact: exact[lane], quick: &quick, gives };
            let (by_one, one) = form.one(task);
            let pairs = [
                (&four.factor, &one.factor),
                (&four.signs, &one.signs),
                (&four.zeros, &one.zeros),
                (&four.weak, &one.weak),
                (&four.ratio_sum, &one.ratio_sum),
                (&by.counted, &by_one.counted),
            ];
            for (which, (four, one)) in pairs.into_iter().enumerate() {
                for (slot, (four, [one])) in map.slots().iter().zip(four.iter().zip(one)) {
                    assert_eq!(four[lane].to_bits(), one.to_bits(), "{}: {which} of {slot:?}", entry.info.id);
                }
            }
        }
    }
}

fn side_by_side(members: &Members<4>, alone: [&Forces<1>; 4]) -> Forces<4> {
    let mut four = Forces::for_members(members);
    for (lane, one) in alone.into_iter().enumerate() {
        let pairs = [
            (&mut four.column_foot, &one.column_foot),
            (&mut four.column_head, &one.column_head),
            (&mut four.column_axial, &one.column_axial),
            (&mut four.beam_left, &one.beam_left),
            (&mut four.beam_right, &one.beam_right),
            (&mut four.drift, &one.drift),
        ];
        for (four, one) in pairs {
            four.iter_mut().zip(one).for_each(|(four, [one])| four[lane] = *one);
        }
    }
    four
}

/// Exact zeros, quick zeros and signs by hand: one storey, two bays.
#[test]
fn zeros_and_signs_are_counted_by_lane() {
    let frame = build(parts(&[6.0, 6.0], &[4.0], &[1e4]).areas(|_, _| 0.1));
    let members = Members::of(&frame);
    let map = PlaceMap::new(1, 2, Scope::Everything);
    let forces = |axial: [f64; 3]| {
        let mut forces = Forces::for_members(&members);
        forces.column_axial.copy_from_slice(&axial.map(|axial| [axial]));
        forces
    };
    let by_hand = |exact: [f64; 3], quick: [f64; 3]| {
        let (exact, quick) = (forces(exact), forces(quick));
        let task = Judge { map: &map, members: &members, exact: &exact, quick: &quick, gives: Gives::Forces };
        let (by, found) = Form::PORTABLE.one(task);
        let axial = |class| {
            let of = |slot: &Slot| slot.quantity == Quantity::Axial && slot.place.class == class;
            let slot = map.slots().iter().position(of).unwrap();
            [&found.factor, &found.signs, &found.zeros, &found.weak, &found.ratio_sum, &by.counted]
                .map(|row| row[slot][0])
        };
        [axial(swaybound::compare::places::Class::End), axial(swaybound::compare::places::Class::Interior)]
    };
    let sound = by_hand([8.0, 1.0, -8.0], [4.0, 2.0, -16.0]);
    assert_eq!(sound, [[2.0, 0.0, 0.0, 0.0, 2.5, 2.0], [0.5, 0.0, 0.0, 0.0, 2.0, 1.0]]);
    let turned = by_hand([8.0, -1.0, -8.0], [-4.0, 0.0, -4.0]);
    assert_eq!(turned, [[2.0, 1.0, 0.0, 0.0, 1.0, 2.0], [0.0, 0.0, 1.0, 0.0, 0.0, 1.0]]);
    let weak = by_hand([8.0, 1.0, 0.0], [100.0, -4.0, -100.0]);
    assert_eq!(weak, [[0.08, 0.0, 0.0, 0.0, 12.5, 1.0], [0.25, 1.0, 0.0, 1.0, 4.0, 1.0]]);
    for place in [0, 2] {
        let mut quick = [4.0, 2.0, -16.0];
        for none in [f64::NAN, f64::INFINITY, f64::NEG_INFINITY] {
            quick[place] = none;
            let [end, interior] = by_hand([8.0, 1.0, -8.0], quick);
            assert_eq!(end[0], f64::INFINITY, "{none} at {place} gave the factor {}", end[0]);
            assert!(none.is_infinite() || interior[0] == 0.5);
        }
    }
    let nothing = by_hand([0.0; 3], [0.0; 3]);
    assert_eq!(nothing, [[0.0, 0.0, 2.0, 0.0, 0.0, 0.0], [0.0, 0.0, 1.0, 0.0, 0.0, 0.0]]);
}
