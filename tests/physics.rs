//! Laws that hold for every frame, tried on random ones.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use proptest::prelude::*;
use support::close::{close, close_responses, difference, scale_of};
use support::random::{cases, extreme_frames, frames, lateral};
use support::solve::{every, every_quick, inextensible, quick, strained, with_forces};
use support::{Sizes, Within, build, energy, laws, parts};
use swaybound::approx;
use swaybound::exact::{Unsolvable, slope_deflection, stiffness};
use swaybound::frame::{Feet, Frame, FrameParts, Member, SizeSource};
use swaybound::lane::Form;
use swaybound::response::{Forces, Members, Quantity, Response, Work, statics};

/// Two solutions of one ordinary frame in different forms: what rounding does to it, with a margin of a hundred.
const SAME: f64 = 1e-11;

/// The frame with other forces, from the ground up.
fn loaded(parts: &FrameParts, lateral: Vec<f64>) -> Frame {
    build(FrameParts { lateral, ..parts.clone() })
}

/// The frame with every foot spring times `factor`.
fn with_springs(feet: &Feet, factor: f64) -> Feet {
    match feet {
        Feet::Springs(springs) => Feet::Springs(springs.iter().map(|spring| factor * spring).collect()),
        other => other.clone(),
    }
}

/// The frame seen from behind: lines, bays and springs in reverse, loads still to the right.
fn mirrored(parts: &FrameParts) -> FrameParts {
    let lines = parts.bays.len() + 1;
    let mut mirror = parts.clone();
    mirror.bays.reverse();
    mirror.columns.chunks_mut(lines).for_each(<[_]>::reverse);
    mirror.beams.chunks_mut(lines - 1).for_each(<[_]>::reverse);
    if let Feet::Springs(springs) = &mut mirror.feet {
        springs.reverse();
    }
    mirror
}

/// Every number of a response times what `factor` gives for its kind is the number of another.
#[track_caller]
fn proportional(frame: &Frame, found: &Response, expected: &Response, factor: impl Fn(Quantity) -> f64) {
    let (found, expected) = (found.values(frame), expected.values(frame));
    for (found, other) in found.iter().zip(&expected) {
        let factor = factor(other.quantity);
        let scale = factor * scale_of(&expected, other.quantity);
        let place = format!("{:?} of {:?}", other.quantity, other.member);
        close(&place, found.value, factor * other.value, Within::Of { share: SAME, scale });
    }
}

/// Whether a quantity is a movement.
fn moves(quantity: Quantity) -> bool {
    matches!(quantity, Quantity::Drift | Quantity::Sway)
}

/// Whether a quantity is a moment.
fn turns(quantity: Quantity) -> bool {
    !moves(quantity) && !matches!(quantity, Quantity::Shear | Quantity::Axial)
}

proptest! {
    #![proptest_config(cases(150))]

    /// Joints, members, storeys and free bodies balance, by the crate's own check and by another one.
    #[test]
    fn every_method_is_in_equilibrium(parts in frames()) {
        let frame = build(parts);
        for response in with_forces(every(&frame)) {
            laws::balanced(&frame, &response, 1e-11);
            let statics = statics::check(&frame, &response);
            prop_assert!(statics.closes(), "{}: {:?}", response.method, statics::Law::ALL.map(|law| statics.worst(law)));
        }
        for response in every_quick(&frame) {
            let gives = approx::find(response.method).expect("it is listed").info.gives;
            prop_assert!(response.has_forces() == gives.forces(), "{}", response.method);
            prop_assert!(response.movement(0).is_some() == gives.drifts(), "{}", response.method);
            prop_assert!(response.residual().is_none(), "{}", response.method);
        }
        for response in with_forces(every_quick(&frame)) {
            laws::balanced(&frame, &response, 1e-13);
        }
        for response in [inextensible(&frame), strained(&frame)] {
            let residual = response.residual();
            prop_assert!(residual.is_some_and(|residual| residual < 1e-11), "{}: {residual:?}", response.method);
        }
    }

    /// Mirroring frame and load and then turning the load round leaves moments and shears and reverses axial forces.
    #[test]
    fn a_mirrored_frame_gives_mirrored_forces(parts in frames()) {
        let (frame, mirror) = (build(parts.clone()), build(mirrored(&parts)));
        for (here, there) in every(&frame).iter().zip(every(&mirror)) {
            mirror_images(&frame, here, &there);
        }
    }

    /// Forces follow the loads in proportion.
    #[test]
    fn forces_grow_with_the_loads(parts in frames(), factor in 0.01f64..100.0) {
        let frame = build(parts.clone());
        let heavier = loaded(&parts, parts.lateral.iter().map(|force| factor * force).collect());
        for (light, heavy) in every(&frame).iter().zip(every(&heavier)) {
            proportional(&frame, &heavy, light, |_| factor);
        }
    }

    /// A frame twice as large in every direction: moments with the length, forces as they are, movements inversely.
    #[test]
    fn lengths_scale(parts in frames(), factor in 0.1f64..10.0) {
        let frame = build(parts.clone());
        let mut larger = parts.clone();
        larger.bays.iter_mut().chain(&mut larger.storeys).for_each(|length| *length *= factor);
        for section in larger.columns.iter_mut().chain(&mut larger.beams) {
            section.inertia *= factor.powi(4);
            section.area = section.area.map(|area| area * factor.powi(2));
        }
        larger.feet = with_springs(&parts.feet, factor.powi(3));
        let by_kind = |quantity| match quantity {
            _ if moves(quantity) => 1.0 / factor,
            _ if turns(quantity) => factor,
            _ => 1.0,
        };
        for (small, large) in every(&frame).iter().zip(every(&build(larger))) {
            proportional(&frame, &large, small, by_kind);
        }
    }

    /// A stiffer material leaves forces as they are and movements go down with it.
    #[test]
    fn modulus_scales(parts in frames(), factor in 0.01f64..100.0) {
        let frame = build(parts.clone());
        let feet = with_springs(&parts.feet, factor);
        let stiffer = build(FrameParts { modulus: factor * parts.modulus, feet, ..parts });
        for (soft, stiff) in every(&frame).iter().zip(every(&stiffer)) {
            proportional(&frame, &stiff, soft, |quantity| if moves(quantity) { 1.0 / factor } else { 1.0 });
        }
    }

    /// One bay with equal columns: the cantilever method gives the portal method's numbers.
    #[test]
    fn cantilever_is_portal_on_one_bay(
        heights in proptest::collection::vec(2.5f64..6.0, 1..10),
        width in 3.0f64..12.0,
        area in 0.01f64..1.0,
        pinned in any::<bool>(),
    ) {
        let forces: Vec<f64> = (0..heights.len()).map(|floor| 1e4 * (1.0 + floor as f64)).collect();
        let feet = if pinned { Feet::Pinned } else { Feet::Fixed };
        let frame = build(parts(&[width], &heights, &forces).areas(|_, _| area).feet(feet));
        let (portal, cantilever) = (quick("portal", &frame), quick("cantilever", &frame));
        close_responses("cantilever beside portal", &frame, &cantilever, &portal, 1e-13);
    }

    /// The answer to two load cases together is the sum of the answers.
    #[test]
    fn load_cases_add_up((parts, other) in frames().prop_flat_map(|parts| {
        let storeys = parts.storeys.len();
        (Just(parts), lateral(storeys))
    })) {
        let both = loaded(&parts, parts.lateral.iter().zip(&other).map(|(a, b)| a + b).collect());
        let (first, second) = (build(parts.clone()), loaded(&parts, other));
        for ((first, second), sum) in every(&first).iter().zip(every(&second)).zip(every(&both)) {
            adds_up(&both, first, &second, &sum);
        }
    }

    /// Betti: the forces of one case do as much work on the sways of another as the other's on its own.
    #[test]
    fn work_is_mutual((parts, other) in frames().prop_flat_map(|parts| {
        let storeys = parts.storeys.len();
        (Just(parts), lateral(storeys))
    })) {
        let (first, second) = (build(parts.clone()), loaded(&parts, other));
        for analyse in [inextensible, strained] {
            let here = energy::work(&first, &analyse(&second));
            let there = energy::work(&second, &analyse(&first));
            let scale = energy::work(&first, &analyse(&first)).max(energy::work(&second, &analyse(&second)));
            close("mutual work", here, there, Within::Of { share: SAME, scale });
        }
    }

    /// Clapeyron: the work of the loads is the energy in the members and springs, so drifts fit the forces.
    #[test]
    fn work_is_stored_as_energy(parts in frames()) {
        let frame = build(parts);
        let (rigid, soft) = (inextensible(&frame), strained(&frame));
        let stored = energy::of_bending(&frame, &rigid);
        close("without axial strain", energy::work(&frame, &rigid) / 2.0, stored, Within::Relative(SAME));
        let stored = energy::of_bending(&frame, &soft) + energy::of_axial(&frame, &soft);
        close("with axial strain", energy::work(&frame, &soft) / 2.0, stored, Within::Relative(SAME));
        prop_assert!(energy::work(&frame, &soft) >= energy::work(&frame, &rigid) * (1.0 - SAME), "strain must soften");
    }

    /// Castigliano: among all forces in equilibrium with the loads the exact ones store the least energy, so every quick
    /// method stores more.
    #[test]
    fn exact_forces_store_the_least_energy(parts in frames()) {
        let frame = build(parts);
        let of_both = |response: &Response| energy::of_bending(&frame, response) + energy::of_axial(&frame, response);
        let least = energy::of_bending(&frame, &inextensible(&frame));
        let least_with_strain = of_both(&strained(&frame));
        for quick in with_forces(every_quick(&frame)) {
            prop_assert!(energy::of_bending(&frame, &quick) >= least * (1.0 - SAME), "{}", quick.method);
            prop_assert!(of_both(&quick) >= least_with_strain * (1.0 - SAME), "{} with axial strain", quick.method);
        }
        prop_assert!(least <= energy::of_bending(&frame, &strained(&frame)) * (1.0 + SAME));
        prop_assert!(least_with_strain <= of_both(&inextensible(&frame)) * (1.0 + SAME));
    }

    /// Growing areas take the stiffness analysis to slope-deflection, ten times nearer for ten times the area.
    #[test]
    fn stiffness_tends_to_slope_deflection(parts in frames()) {
        let limit = inextensible(&build(parts.clone()));
        let frame = build(parts.clone());
        for kind in [Quantity::DesignMoment, Quantity::Axial, Quantity::Drift] {
            let off = |area: f64| {
                let mut stiffer = parts.clone();
                stiffer.columns.iter_mut().for_each(|column| column.area = Some(area));
                difference(&frame, &strained(&build(stiffer)), &limit, kind)
            };
            let [small, large, huge] = [1e4, 1e5, 1e7].map(off);
            prop_assert!(huge < 1e-6, "{kind:?}: still {huge:e} off at the largest area");
            // Where all is symmetrical, or nothing bends, axial strain changes nothing to begin with.
            if small > 1e-9 {
                let ratio = small / large;
                prop_assert!((9.0..11.0).contains(&ratio), "{kind:?}: {small:e} falls {ratio} times to {large:e}");
            }
        }
    }

    /// Springs lie between pinned and fixed feet, stiffer springs stiffen, and both ends are reached.
    #[test]
    fn springs_lie_between_pinned_and_fixed(parts in frames()) {
        let frame = build(parts);
        let on = |feet: Feet| frame.with_feet(feet).expect("springs are positive");
        for analyse in [inextensible, strained] {
            let sway = |frame: &Frame| energy::work(frame, &analyse(frame));
            let held: Vec<f64> = [1e-3, 0.1, 1.0, 10.0, 1e3].map(|ratio| sway(&on(Feet::Springs(frame.foot_springs(ratio))))).into();
            let mut order = vec![sway(&on(Feet::Pinned))];
            order.extend(held);
            order.push(sway(&on(Feet::Fixed)));
            prop_assert!(order.windows(2).all(|pair| pair[0] >= pair[1] * (1.0 - SAME)), "work {order:?}");
            for (feet, ratios, shrinks) in [(Feet::Fixed, [1e4, 1e5], 10.0), (Feet::Pinned, [1e-4, 1e-5], 10.0)] {
                let limit = analyse(&on(feet));
                let off = |ratio| {
                    let response = analyse(&on(Feet::Springs(frame.foot_springs(ratio))));
                    difference(&frame, &response, &limit, Quantity::DesignMoment)
                };
                let [far, near] = ratios.map(off);
                prop_assert!(far < 0.05 && near < far, "{far:e}, then {near:e}");
                prop_assert!(far / near > 0.8 * shrinks && far / near < 1.2 * shrinks, "{far:e}, then {near:e}");
            }
        }
    }

    /// Four frames side by side give every frame the bits it has alone.
    #[test]
    fn four_lanes_give_the_bits_of_one(parts in frames(), factors in [0.2f64..5.0, 0.2..5.0, 0.2..5.0]) {
        let members = Members::of(&build(parts.clone()));
        same_bits_side_by_side(&Members::side_by_side([&members; 4]), [&members; 4]);
        let other = factors.map(|factor| Members::of(&build(changed(&parts, factor))));
        let four = Members::side_by_side([&members, &other[0], &other[1], &other[2]]);
        same_bits_side_by_side(&four, [&members, &other[0], &other[1], &other[2]]);
    }

    /// Members up to a million times stiffer than others: solved, and balanced.
    #[test]
    fn wide_stiffness_ratios_are_solved(parts in extreme_frames(3.0)) {
        let frame = build(parts);
        for response in with_forces(every(&frame)) {
            laws::balanced(&frame, &response, statics::CLOSES);
            prop_assert!(statics::check(&frame, &response).closes(), "{}", response.method);
        }
    }

    /// Members up to fourteen orders of magnitude apart: a balanced answer or a refusal, never numbers that do not add up.
    #[test]
    fn absurd_stiffness_ratios_are_balanced_or_refused(parts in extreme_frames(7.0)) {
        let frame = build(parts);
        for response in [slope_deflection::analyse(&frame), stiffness::analyse(&frame)].into_iter().flatten() {
            let statics = statics::check(&frame, &response);
            prop_assert!(statics.closes(), "{}: {:?}", response.method, statics::Law::ALL.map(|law| statics.worst(law)));
        }
    }
}

/// Every number of `sum` is the sum of the other two; design moments, which have no sign, are left out.
#[track_caller]
fn adds_up(frame: &Frame, first: &Response, second: &Response, sum: &Response) {
    let sums = sum.values(frame);
    for ((one, two), found) in first.values(frame).iter().zip(second.values(frame)).zip(&sums) {
        if found.quantity != Quantity::DesignMoment {
            let scale = scale_of(&sums, found.quantity);
            let place = format!("{}: {:?} of {:?}", sum.method, found.quantity, found.member);
            close(&place, found.value, one.value + two.value, Within::Of { share: SAME, scale });
        }
    }
}

/// `there` is the answer for the mirrored frame.
#[track_caller]
fn mirror_images(frame: &Frame, here: &Response, there: &Response) {
    if here.has_forces() {
        mirrored_forces(frame, here, there);
    }
    for storey in 0..frame.storeys() {
        if let (Some(left), Some(right)) = (here.movement(storey), there.movement(storey)) {
            let scale = here.movement(frame.storeys() - 1).map_or(0.0, |roof| roof.sway);
            close("drift", right.drift, left.drift, Within::Of { share: SAME, scale });
        }
    }
}

#[track_caller]
fn mirrored_forces(frame: &Frame, here: &Response, there: &Response) {
    let last = frame.lines() - 1;
    let moment = Within::Of { share: SAME, scale: here.largest_moment() };
    let axials = (0..frame.storeys()).flat_map(|storey| here.storey_columns(storey)).map(|column| column.axial.abs());
    let axial = Within::Of { share: SAME, scale: axials.fold(0.0, f64::max) };
    for storey in 0..frame.storeys() {
        for line in 0..=last {
            let (left, right) = (here.column(storey, line), there.column(storey, last - line));
            close("foot", right.foot, left.foot, moment);
            close("head", right.head, left.head, moment);
            close("axial force", right.axial, -left.axial, axial);
        }
        for bay in 0..last {
            let (left, right) = (here.beam(storey, bay), there.beam(storey, last - 1 - bay));
            close("beam end", right.left, left.right, moment);
            close("beam end", right.right, left.left, moment);
        }
    }
}

/// A frame of the same shape with other numbers throughout.
fn changed(parts: &FrameParts, factor: f64) -> FrameParts {
    let mut other = parts.clone();
    other.bays.iter_mut().enumerate().for_each(|(bay, width)| *width *= factor + bay as f64);
    other.storeys.iter_mut().enumerate().for_each(|(storey, height)| *height *= factor + (storey % 3) as f64);
    other.lateral.iter_mut().for_each(|force| *force *= factor);
    for (index, column) in other.columns.iter_mut().enumerate() {
        column.area = column.area.map(|area| area * (factor + (index % 5) as f64));
    }
    other.feet = if other.feet == Feet::Pinned { Feet::Fixed } else { Feet::Pinned };
    other
}

/// Runs every quick method on four frames together, in every form, and on each alone.
#[track_caller]
fn same_bits_side_by_side(together: &Members<4>, alone: [&Members<1>; 4]) {
    for entry in &approx::METHODS {
        for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
            let mut four = Forces::for_members(together);
            (entry.four)(form, together, &mut Work::for_members(together), &mut four);
            for (lane, members) in alone.into_iter().enumerate() {
                let mut one = Forces::for_members(members);
                (entry.one)(form, members, &mut Work::for_members(members), &mut one);
                same_bits(entry.info.id, &one, &four, lane);
            }
        }
    }
}

#[track_caller]
fn same_bits(method: &str, one: &Forces<1>, four: &Forces<4>, lane: usize) {
    let pairs = [
        (&one.column_foot, &four.column_foot),
        (&one.column_head, &four.column_head),
        (&one.column_axial, &four.column_axial),
        (&one.beam_left, &four.beam_left),
        (&one.beam_right, &four.beam_right),
        (&one.drift, &four.drift),
    ];
    for (one, four) in pairs {
        assert_eq!(one.len(), four.len(), "{method}");
        for ([alone], together) in one.iter().zip(four) {
            assert_eq!(together[lane].to_bits(), alone.to_bits(), "{method}, lane {lane}: {alone} and {together:?}");
        }
    }
}

/// A change to one number of a response.
type Slip = fn(&mut Forces<1>);

/// The crate's statics check finds one number in the whole frame that is off by a thousandth, and says where.
#[test]
fn statics_find_a_single_slip() {
    use statics::Law;
    let bare = parts(&[6.0, 5.0], &[4.0, 3.5, 3.0], &[1e4, 2e4, 3e4]).areas(|_, _| 0.1);
    let frame = build(bare);
    let members = Members::of(&frame);
    let mut sound = Forces::for_members(&members);
    (approx::find("cantilever").unwrap().one)(Form::PORTABLE, &members, &mut Work::for_members(&members), &mut sound);
    let check = |forces: &Forces<1>| statics::check(&frame, &Response::from_forces("slip", &frame, forces));
    assert!(check(&sound).closes());
    let column = Member::Column { storey: 1, line: 2 };
    let slips: [(Slip, Law, Member); 6] = [
        (|forces| forces.column_head[5][0] *= 1.001, Law::JointMoments, column),
        (|forces| forces.column_foot[8][0] *= 1.001, Law::JointMoments, column),
        (|forces| forces.beam_right[3][0] *= 1.001, Law::JointMoments, column),
        (|forces| forces.column_head[5][0] *= 1.001, Law::StoreyShears, Member::Storey { storey: 1 }),
        (|forces| forces.column_axial[3][0] *= 1.001, Law::StoreyVertical, Member::Storey { storey: 1 }),
        (|forces| forces.column_axial[5][0] *= 1.001, Law::Overturning, Member::Storey { storey: 1 }),
    ];
    for (slip, law, place) in slips {
        let mut forces = sound.clone();
        slip(&mut forces);
        let found = check(&forces);
        assert!(!found.closes(), "{law:?} at {place:?} went unseen");
        let worst = found.worst(law).unwrap();
        assert_eq!(worst.member, place, "{law:?}");
        assert!(worst.relative.abs() > 1e-5, "{worst:?}");
    }
    let mut broken = sound;
    broken.beam_left[0][0] = f64::NAN;
    assert!(!check(&broken).closes(), "a number that is none must not pass");
}

/// Pinned feet and beams without stiffness: nothing resists sway, and the error says where.
#[test]
fn a_mechanism_is_refused_with_its_place() {
    for (bays, storeys) in [(1, 1), (3, 1), (2, 4)] {
        let heights = vec![3.5; storeys];
        let bare = parts(&vec![6.0; bays], &heights, &vec![1e4; storeys]).areas(|_, _| 0.1).feet(Feet::Pinned);
        let loose = build(bare.clone().beams(|_, _| 0.0));
        for result in [slope_deflection::analyse(&loose), stiffness::analyse(&loose)] {
            let reason = result.expect_err("nothing holds this frame").to_string();
            assert!(reason.contains("storey 1") || reason.contains("floor 0"), "no place in: {reason}");
        }
        // One beam, even of the roof, makes the frame stand; so do springs.
        let one_beam = build(bare.clone().beams(|floor, bay| if (floor, bay) == (storeys - 1, 0) { 1.0 } else { 0.0 }));
        let on_springs = build(bare.clone().beams(|_, _| 0.0).feet(Feet::Springs(vec![1.0; bays + 1])));
        for frame in [one_beam, on_springs] {
            laws::balanced(&frame, &inextensible(&frame), 1e-10);
            laws::balanced(&frame, &strained(&frame), 1e-10);
        }
    }
}

/// What an exact analysis cannot know it does not answer: axial strain without areas or with relative sizes, drifts with
/// relative sizes.
#[test]
fn analyses_say_what_they_lack() {
    let bare = parts(&[6.0, 5.0], &[3.5, 3.0], &[1e4, 2e4]);
    let relative = FrameParts { sizes: SizeSource::AssumedRelative, ..bare.clone().areas(|_, _| 0.1) };
    let (stated, relative, without) = (build(bare.clone().areas(|_, _| 0.1)), build(relative), build(bare));
    assert_eq!(stiffness::analyse(&without), Err(Unsolvable::NoAreas));
    assert_eq!(stiffness::analyse(&relative), Err(Unsolvable::RelativeSizes));
    let (known, unknown) = (inextensible(&stated), inextensible(&relative));
    assert!(known.movement(0).is_some() && unknown.movement(0).is_none());
    assert_eq!(known.column(0, 1), unknown.column(0, 1), "forces do not depend on where the sizes come from");
}

/// A frame that hangs by a thread: balanced or refused, whatever is left of the beams.
#[test]
fn a_frame_next_to_a_mechanism_is_balanced_or_refused() {
    let (mut answered, mut refused) = (0, 0);
    for power in 0..40 {
        let beam = 10f64.powi(-power);
        let bare = parts(&[6.0, 7.0], &[3.5, 3.0, 3.0], &[1e4, 1e4, 2e4]).areas(|_, _| 0.1).feet(Feet::Pinned);
        let frame = build(bare.beams(|_, _| beam));
        for result in [slope_deflection::analyse(&frame), stiffness::analyse(&frame)] {
            match result {
                Ok(response) => {
                    answered += 1;
                    assert!(statics::check(&frame, &response).closes(), "{} at {beam:e}", response.method);
                }
                Err(_) => refused += 1,
            }
        }
    }
    assert!(answered > 10 && refused > 15, "{answered} answered, {refused} refused");
}

/// 200 storeys of 20 bays.
#[test]
fn a_very_large_frame_is_solved() {
    let bays: Vec<f64> = (0..20).map(|bay| 5.0 + 0.3 * f64::from(bay % 4)).collect();
    let heights: Vec<f64> = (0..200).map(|storey| 3.0 + 0.2 * f64::from(storey % 3)).collect();
    let forces: Vec<f64> = (0..200).map(|floor| 1e3 + 20.0 * f64::from(floor)).collect();
    let sized = parts(&bays, &heights, &forces)
        .columns(|storey, line| 8e-2 / (1.0 + storey as f64 / 40.0) * (1.0 + 0.1 * (line % 3) as f64));
    let frame = build(FrameParts { modulus: 3e10, ..sized.beams(|_, bay| 1e-2 + 1e-3 * bay as f64).areas(|_, _| 1.5) });
    for response in with_forces(every(&frame)) {
        laws::balanced(&frame, &response, 1e-9);
        assert!(statics::check(&frame, &response).closes(), "{}", response.method);
    }
    let (rigid, soft) = (inextensible(&frame), strained(&frame));
    let stored = energy::of_bending(&frame, &soft) + energy::of_axial(&frame, &soft);
    close("work", energy::work(&frame, &soft) / 2.0, stored, Within::Relative(1e-8));
    close("work", energy::work(&frame, &rigid) / 2.0, energy::of_bending(&frame, &rigid), Within::Relative(1e-8));
}
